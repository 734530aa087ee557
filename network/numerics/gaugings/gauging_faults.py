"""What makes a gauging sheet impossible to compute: every fault at once, by row and field."""

from collections.abc import Iterator
from dataclasses import dataclass

import numpy as np

from network.numerics.arrays import Bools, Floats
from network.numerics.gaugings.gauging_columns import GIVEN_TWICE, LARGEST, UNKNOWN_SET, Columns
from network.numerics.gaugings.gauging_input import Sheet
from network.numerics.gaugings.sounding_lines import LARGEST_ANGLE_DEG, corrected_depth_m
from network.numerics.gaugings.verticals import Method
from network.numerics.meters.meter_rating import check_pieces
from network.numerics.sentences import Refused, Sentence, gettext_noop, sentence

FEWEST_VERTICALS = 3


@dataclass(frozen=True)
class Fault:
    """A cell that cannot be computed: places from 0, None where the fault is wider than a row.

    row: of the transects, floats, fills or samples of another method.
    """

    field: str
    sentence: Sentence
    channel: int | None = None
    vertical: int | None = None
    point: int | None = None
    row: int | None = None


class BadSheet(Refused):
    """Say why a sheet cannot be computed; faults holds every reason found."""

    def __init__(self, faults: tuple[Fault, ...]) -> None:
        super().__init__(faults[0].sentence, field_name=faults[0].field)
        self.faults = faults


def find_faults(sheet: Sheet, columns: Columns) -> tuple[Fault, ...]:
    """Find every fault of a sheet; columns are its own. Source: common practice.

    Vertical numbers in the sentences count from 1 through all channels.
    """
    return (
        *_rows(columns),
        *_points(sheet, columns),
        *_banks(columns),
        *(f for c in range(len(sheet.channels)) for f in _order(columns, c)),
        *_whole(sheet, columns),
    )


def _rows(c: Columns) -> Iterator[Fault]:
    missing = gettext_noop("Vertical {vertical}: the distance is missing.")
    yield from _where(c, np.isnan(c.distance_m), "distance_m", missing)
    missing = gettext_noop("Vertical {vertical}: the depth is missing.")
    yield from _where(c, np.isnan(c.depth_m), "depth_m", missing)
    negative = gettext_noop("Vertical {vertical}: the depth is negative.")
    yield from _where(c, c.depth_m < 0, "depth_m", negative)
    oblique = gettext_noop("Vertical {vertical}: the angle of the flow must lie within ±90°.")
    yield from _where(c, ~(np.abs(c.angle_deg) < 90), "angle_deg", oblique)
    ice = gettext_noop("Vertical {vertical}: the ice must end between the surface and the bed.")
    outside = ~(c.ice_m >= 0) | ((c.ice_m > c.depth_m) & (c.ice_m > 0))
    yield from _where(c, outside, "ice_underside_m", ice)
    steep = gettext_noop("Vertical {vertical}: line angles are corrected from 0° to 30° only.")
    outside = ~((c.line_angle_deg >= 0) & (c.line_angle_deg <= LARGEST_ANGLE_DEG))
    yield from _where(c, outside, "line_angle_deg", steep)
    air = gettext_noop("Vertical {vertical}: the length of the air line must be 0 or more.")
    yield from _where(c, ~(c.air_line_m >= 0), "air_line_m", air)
    used_up = gettext_noop(
        "Vertical {vertical}: the line corrections leave no depth below the ice."
    )
    angle_deg = np.minimum(np.abs(c.line_angle_deg), LARGEST_ANGLE_DEG)
    depth_m = corrected_depth_m(c.depth_m, angle_deg=angle_deg, air_line_m=c.air_line_m)
    yield from _where(c, (depth_m < c.ice_m) & (c.depth_m >= c.ice_m), "air_line_m", used_up)


def _points(sheet: Sheet, c: Columns) -> Iterator[Fault]:
    counted, timed = ~np.isnan(c.revolutions), ~np.isnan(c.seconds)
    given = ~np.isnan(c.point_velocity_ms)
    off = ~((c.fraction >= 0) & (c.fraction <= 1))
    text = gettext_noop("Vertical {vertical}: a point must lie between 0 and 1 of the depth.")
    yield from _where_point(c, off, "fraction", text)
    text = gettext_noop("Vertical {vertical}: revolutions without seconds.")
    yield from _where_point(c, counted & ~timed, "seconds", text)
    text = gettext_noop("Vertical {vertical}: the time must be more than 0 seconds.")
    yield from _where_point(c, c.seconds <= 0, "seconds", text)
    text = gettext_noop("Vertical {vertical}: the revolutions are negative.")
    yield from _where_point(c, c.revolutions < 0, "revolutions", text)
    text = gettext_noop("Vertical {vertical}: both revolutions and a velocity at one point.")
    yield from _where_point(c, counted & given, "velocity_ms", text)
    text = gettext_noop("Vertical {vertical}: neither revolutions nor a velocity at a point.")
    yield from _where_point(c, ~counted & ~given, "velocity_ms", text)
    if not (sheet.meter and sheet.meter.pieces):
        text = gettext_noop("Vertical {vertical}: revolutions need a meter with a rating.")
        yield from _where_point(c, counted, "revolutions", text)
    placed = np.ones(len(c.method), dtype=np.bool_)
    placed[c.point_vertical[off]] = False
    text = gettext_noop(
        "Vertical {vertical}: these points make no known set; known are 0.6 · 0.5 · 0.2 and 0.8 · "
        "0.2, 0.6 and 0.8 · surface, 0.2, 0.6, 0.8 and bed · the same with 0.4 · surface alone."
    )
    yield from _where(c, (c.method == UNKNOWN_SET) & placed, "points", text)
    text = gettext_noop("Vertical {vertical}: both points and a mean velocity.")
    yield from _where(c, c.method == GIVEN_TWICE, "mean_velocity_ms", text)
    text = gettext_noop("Vertical {vertical}: a surface velocity under ice gives no mean velocity.")
    yield from _where(c, (c.method == Method.SURFACE) & (c.ice_m > 0), "points", text)


def _banks(c: Columns) -> Iterator[Fault]:
    rules = (
        (
            np.isnan(c.bank_distance_m),
            "distance_m",
            gettext_noop("Channel {channel}: the distance of a bank is missing."),
        ),
        (
            ~(c.bank_depth_m >= 0),
            "depth_m",
            gettext_noop("Channel {channel}: the depth at a bank must be 0 or more."),
        ),
        (
            ~((c.bank_factor >= 0) & (c.bank_factor <= 1)),
            "factor",
            gettext_noop("Channel {channel}: the factor of an edge zone lies between 0 and 1."),
        ),
        (
            np.abs(c.bank_velocity_ms) > LARGEST,
            "velocity_ms",
            gettext_noop("Channel {channel}: the velocity at a bank must be a number."),
        ),
    )
    for mask, field, text in rules:
        for channel, end in zip(*(axis.tolist() for axis in mask.nonzero()), strict=True):
            yield _bank_fault(channel, end, field, sentence(text, channel=channel + 1))


def _order(c: Columns, channel: int) -> Iterator[Fault]:
    """Find the distances that neither rise nor fall with the others, banks included."""
    places = c.of_channel(channel)
    rows = [-1, *range(places.start, places.stop), -2]
    first, last = c.bank_distance_m[channel]
    x = np.array([first, *c.distance_m[places], last])
    there = ~np.isnan(x)
    rows, x = [r for r, t in zip(rows, there, strict=True) if t], x[there]
    steps = np.diff(x)
    if len(x) < 2:
        return
    if not steps.any():
        text = gettext_noop("Channel {channel}: all verticals stand at one place.")
        yield Fault("distance_m", sentence(text, channel=channel + 1), channel)
        return
    falling = np.sign(steps).sum() < 0
    x = -x if falling else x
    for step in np.flatnonzero(np.diff(x) < 0).tolist():
        yield _misplaced(c, channel, rows, x, step)


def _misplaced(c: Columns, channel: int, rows: list[int], x: Floats, step: int) -> Fault:
    """Name the node that breaks the order between step and step + 1."""
    ahead = x[step - 1] if step else -np.inf
    node = step if ahead <= x[step + 1] and rows[step + 1] != -2 else step + 1
    value_m = float(abs(x[node]))
    if (row := rows[node]) < 0:
        text = gettext_noop("Channel {channel}: the bank at {value} m lies inside the section.")
        said = sentence(text, channel=channel + 1, value=value_m)
        return _bank_fault(channel, -1 - row, "distance_m", said)
    low, high = x[node - 1], x[node + 1] if node + 1 < len(x) else np.inf
    tenth = x[node] / 10
    if low <= tenth <= high:
        text = gettext_noop(
            "Vertical {vertical}: {value} m neither rises nor falls with its neighbours. "
            "Is {tenth} m meant?"
        )
        said = sentence(text, vertical=row + 1, value=value_m, tenth=round(abs(tenth), 3))
    else:
        text = gettext_noop(
            "Vertical {vertical}: {value} m neither rises nor falls with its neighbours."
        )
        said = sentence(text, vertical=row + 1, value=value_m)
    return Fault("distance_m", said, *c.place(row))


def _whole(sheet: Sheet, c: Columns) -> Iterator[Fault]:
    count = int((c.method != Method.SOUNDING).sum())
    if count < FEWEST_VERTICALS:
        text = gettext_noop("{count} verticals with a velocity; a gauging needs at least {least}.")
        yield Fault("verticals", sentence(text, count=count, least=FEWEST_VERTICALS))
    for channel in range(len(sheet.channels)):
        if not (c.method[c.of_channel(channel)] != Method.SOUNDING).any():
            text = gettext_noop("Channel {channel}: no vertical has a velocity.")
            yield Fault("verticals", sentence(text, channel=channel + 1), channel)
    if not all(abs(s.stage_m) <= LARGEST for s in sheet.stages):
        yield Fault("stages", sentence(gettext_noop("A stage reading is no number.")))
    if sheet.started_s is not None and (sheet.ended_s or sheet.started_s) < sheet.started_s:
        yield Fault("ended_s", sentence(gettext_noop("The gauging ends before it starts.")))
    if sheet.meter and sheet.meter.pieces:
        try:
            check_pieces(sheet.meter.pieces)
        except Refused as refused:
            yield Fault("meter", refused.sentence)


def _bank_fault(channel: int, end: int, field: str, said: Sentence) -> Fault:
    return Fault(f"{('first_bank', 'last_bank')[end]}.{field}", said, channel)


def _where(c: Columns, mask: Bools, field: str, text: str) -> Iterator[Fault]:
    for i in mask.nonzero()[0].tolist():
        yield Fault(field, sentence(text, vertical=i + 1), *c.place(i))


def _where_point(c: Columns, mask: Bools, field: str, text: str) -> Iterator[Fault]:
    for p in mask.nonzero()[0].tolist():
        i = int(c.point_vertical[p])
        said = sentence(text, vertical=i + 1)
        if c.method[i] == Method.GIVEN:
            yield Fault("mean_velocity_ms", said, *c.place(i))
        else:
            yield Fault(field, said, *c.place(i), c.point_place(p))
