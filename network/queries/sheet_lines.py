"""The table of a sheet line by line, as forms and workbooks have it: edges and verticals."""

import datetime as dt
from collections.abc import Iterator, Sequence
from dataclasses import dataclass
from datetime import datetime, timedelta

from django.utils import timezone

from network.numerics.gaugings.gauging_faults import Fault
from network.numerics.gaugings.gauging_input import Bank, Channel, Edge, Point, Vertical
from network.numerics.sentences import gettext_noop, sentence
from network.queries.field_sheets import instant

HALF_DAY, DAY = timedelta(hours=12), timedelta(days=1)
NO_EDGE = gettext_noop("A channel begins and ends with an edge of water: this line is outside.")
NO_END = gettext_noop("The last channel has no second edge of water.")


@dataclass(frozen=True, kw_only=True)
class Line:
    """An edge of water (edge names its kind) or a vertical; points are of the kernel.

    velocity_ms: measured at an edge, or the mean of a vertical given directly. Time of the day on
    the record clock.
    """

    is_edge: bool = False
    distance_m: float | None = None
    depth_m: float | None = None
    edge: str = Edge.SLOPING
    time: dt.time | None = None
    angle_deg: float | None = None
    ice_underside_m: float | None = None
    line_angle_deg: float | None = None
    air_line_m: float | None = None
    velocity_ms: float | None = None
    points: tuple[Point, ...] = ()


@dataclass(frozen=True)
class Table:
    """The channels of a table, which line each part came from, and lines that fit nowhere."""

    channels: tuple[Channel, ...]
    places: dict[tuple[int, int | str], int]  # (channel, vertical or name of a bank) → line
    faults: tuple[tuple[int, Fault], ...]

    def line_of(self, fault: Fault) -> int | None:
        """Return the line a kernel's fault or finding speaks of, None where of no single one."""
        if fault.channel is None:
            return None
        part = fault.field.partition(".")[0] if fault.vertical is None else fault.vertical
        return self.places.get((fault.channel, part))


def table_of(lines: Sequence[Line], start: datetime, *, from_left: bool) -> Table:
    """Cut lines at their edges into channels: the first edge opens one, the next closes it."""
    channels: list[Channel] = []
    places: dict[tuple[int, int | str], int] = {}
    faults: list[tuple[int, Fault]] = []
    first: Line | None = None
    verticals: list[Vertical] = []
    for place, line in enumerate(lines):
        if not line.is_edge and first is None:
            faults.append((place, Fault("kind", sentence(NO_EDGE))))
        elif not line.is_edge:
            places[len(channels), len(verticals)] = place
            verticals.append(_vertical(line, start))
        elif first is None:
            places[len(channels), "first_bank"] = place
            first = line
        else:
            places[len(channels), "last_bank"] = place
            channels.append(_channel(first, line, verticals, from_left=from_left))
            first, verticals = None, []
    if first is not None:
        faults.append((len(lines) - 1, Fault("kind", sentence(NO_END))))
        if verticals:  # what is there counts, up to the last vertical
            end = Line(is_edge=True, distance_m=verticals[-1].distance_m)
            channels.append(_channel(first, end, verticals, from_left=from_left))
    return Table(tuple(channels), places, tuple(faults))


def lines_of(channels: Sequence[Channel]) -> Iterator[Line]:
    """Give the lines of channels, edges included."""
    for channel in channels:
        yield _edge(channel.first_bank)
        yield from (_line(vertical) for vertical in channel.verticals)
        yield _edge(channel.last_bank)


def near(start: datetime, at: dt.time) -> datetime:
    """Return the instant of a time of the day within half a day of the start."""
    local = timezone.localtime(start)
    found = local.replace(hour=at.hour, minute=at.minute, second=at.second, microsecond=0)
    if found - local < -HALF_DAY:
        return found + DAY
    return found - DAY if found - local > HALF_DAY else found


def _channel(first: Line, last: Line, verticals: list[Vertical], *, from_left: bool) -> Channel:
    return Channel(_bank(first), _bank(last), tuple(verticals), starts_at_left_bank=from_left)


def _bank(line: Line) -> Bank:
    edge = Edge(line.edge or Edge.SLOPING)
    return Bank(line.distance_m, line.depth_m or 0.0, edge, velocity_ms=line.velocity_ms)


def _vertical(line: Line, start: datetime) -> Vertical:
    return Vertical(
        line.distance_m,
        line.depth_m,
        line.points,
        mean_velocity_ms=line.velocity_ms,
        angle_deg=line.angle_deg or 0.0,
        ice_underside_m=line.ice_underside_m or 0.0,
        line_angle_deg=line.line_angle_deg or 0.0,
        air_line_m=line.air_line_m or 0.0,
        time_s=None if line.time is None else int(near(start, line.time).timestamp()),
    )


def _edge(bank: Bank) -> Line:
    return Line(
        is_edge=True,
        distance_m=bank.distance_m,
        depth_m=bank.depth_m,
        edge=bank.edge,
        velocity_ms=bank.velocity_ms,
    )


def _line(vertical: Vertical) -> Line:
    at = None if vertical.time_s is None else timezone.localtime(instant(vertical.time_s))
    return Line(
        distance_m=vertical.distance_m,
        depth_m=vertical.depth_m,
        time=None if at is None else at.time(),
        angle_deg=vertical.angle_deg or None,
        ice_underside_m=vertical.ice_underside_m or None,
        line_angle_deg=vertical.line_angle_deg or None,
        air_line_m=vertical.air_line_m or None,
        velocity_ms=vertical.mean_velocity_ms,
        points=vertical.points,
    )
