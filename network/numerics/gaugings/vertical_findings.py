"""What a hydrographer would ask about single verticals and points of a gauging."""

from collections.abc import Iterator
from dataclasses import dataclass

import numpy as np

from network.numerics.arrays import Bools, Floats, Indices
from network.numerics.gaugings.gauging_columns import Columns
from network.numerics.gaugings.gauging_input import GaugingSettings, Meter
from network.numerics.gaugings.measured_verticals import Measured, velocity_range_ms
from network.numerics.gaugings.verticals import Method
from network.numerics.sentences import Sentence, gettext_noop, sentence

COMMON = gettext_noop("common practice")
NEIGHBOURS_SOURCE = gettext_noop("USBR Water Measurement Manual, chapter 10")
EXPOSURE_SOURCE = gettext_noop("USGS practice; Morgenschweis, Hydrometrie")
POINTS_SOURCE = gettext_noop("agency setting; practice differs from 0.5 m to 3 m")
RANGE_SOURCE = gettext_noop("the meter's calibration, else common practice")
WADING_SOURCE = gettext_noop("USGS TWRI 9-A9, from memory; local rules decide")

# A value differs from its neighbours by less than this without a question (m or m/s).
SMALLEST_OUTLIER = 0.1


@dataclass(frozen=True)
class Finding:
    """Something to look at: places from 0, None where it concerns the whole gauging.

    row: of the transects, floats, fills or samples of another method. limit in the unit of the
    field (in % for shares and differences); advice: good to have only.
    """

    kind: str
    field: str
    sentence: Sentence
    limit: float | None
    source: str
    channel: int | None = None
    vertical: int | None = None
    point: int | None = None
    row: int | None = None
    advice: bool = False


def of_verticals(
    measured: Measured, *, meter: Meter | None, wading: bool, settings: GaugingSettings
) -> Iterator[Finding]:
    """Find what to ask about verticals and points. Limits: settings; sources: in the findings."""
    yield from _exposure(measured, settings.exposure_s)
    yield from _range(measured, meter, settings)
    yield from _depth_fit(measured, settings)
    yield from _neighbours(measured, settings.neighbours_percent)
    yield from _outliers(measured, settings.outlier_ratio)
    if wading:
        yield from _wading(measured, settings.wading_product_m2s)


def _exposure(m: Measured, limit_s: float) -> Iterator[Finding]:
    c = m.columns
    text = gettext_noop(
        "Vertical {vertical}: {value} s is a short exposure; the least is {limit} s."
    )
    for p in (c.seconds < limit_s).nonzero()[0].tolist():
        i = int(c.point_vertical[p])
        said = sentence(text, vertical=i + 1, value=float(c.seconds[p]), limit=limit_s)
        place = (*c.place(i), c.point_place(p))
        yield Finding("exposure", "seconds", said, limit_s, EXPOSURE_SOURCE, *place)


def _range(m: Measured, meter: Meter | None, settings: GaugingSettings) -> Iterator[Finding]:
    if meter is None or not m.outside.any():
        return
    c = m.columns
    low, high = velocity_range_ms(meter, settings)
    text = gettext_noop(
        "Vertical {vertical}: {value} m/s lies outside the calibrated range of the meter."
    )
    for p in m.outside.nonzero()[0].tolist():
        i, value_ms = int(c.point_vertical[p]), float(m.point_velocity_ms[p])
        said = sentence(text, vertical=i + 1, value=round(value_ms, 3))
        limit = low if value_ms < low else high if value_ms > high else None
        place = (*c.place(i), c.point_place(p))
        yield Finding("calibrated_range", "revolutions", said, limit, RANGE_SOURCE, *place)


def _depth_fit(m: Measured, settings: GaugingSettings) -> Iterator[Finding]:
    method, depth_m = m.columns.method, m.depth_m
    one = (method == Method.ONE_POINT) | (method == Method.HALF_DEPTH)
    more = (method >= Method.TWO_POINTS) & (method <= Method.SIX_POINTS)
    deep = gettext_noop(
        "Vertical {vertical}: one point in {value} m of water; two are wanted above {limit} m."
    )
    shallow = gettext_noop(
        "Vertical {vertical}: several points in {value} m of water; one suffices up to {limit} m."
    )
    for mask, limit_m, text in (
        (one & (depth_m > settings.two_point_depth_m), settings.two_point_depth_m, deep),
        (more & (depth_m < settings.one_point_depth_m), settings.one_point_depth_m, shallow),
    ):
        for i in mask.nonzero()[0].tolist():
            value_m = round(float(depth_m[i]), 3)
            said = sentence(text, vertical=i + 1, value=value_m, limit=limit_m)
            place = m.columns.place(i)
            yield Finding("depth_for_points", "points", said, limit_m, POINTS_SOURCE, *place)


def _neighbours(m: Measured, limit_percent: float) -> Iterator[Finding]:
    """Compare with the smaller of the two, so that the bank of start does not matter."""
    c = m.columns
    at = (~np.isnan(m.velocity_ms)).nonzero()[0]
    v = m.velocity_ms[at]
    smaller = np.minimum(np.abs(v[1:]), np.abs(v[:-1]))
    apart = np.abs(v[1:] - v[:-1])
    beyond = (apart * 100 > limit_percent * smaller + 1e-9) & (
        c.channel[at[1:]] == c.channel[at[:-1]]
    )
    text = gettext_noop(
        "Verticals {first} and {vertical}: {before} and {after} m/s are more than {limit} % apart."
    )
    for k in beyond.nonzero()[0].tolist():
        first, i = at[k : k + 2].tolist()
        said = sentence(
            text,
            first=first + 1,
            vertical=i + 1,
            before=round(float(v[k]), 3),
            after=round(float(v[k + 1]), 3),
            limit=limit_percent,
        )
        place = c.place(i)
        yield Finding("neighbours", "points", said, limit_percent, NEIGHBOURS_SOURCE, *place)


def _outliers(m: Measured, ratio: float) -> Iterator[Finding]:
    """Ask about a value far from both its neighbours: a comma may have slipped."""
    c = m.columns
    depth = gettext_noop(
        "Vertical {vertical}: a depth of {value} m stands far from its neighbours. Is it right?"
    )
    velocity = gettext_noop(
        "Vertical {vertical}: a velocity of {value} m/s stands far from its neighbours. "
        "Is it right?"
    )
    for channel in range(len(c.bank_distance_m)):
        here = c.of_channel(channel)
        at = here.start + c.used[here].nonzero()[0]
        with_velocity = at[~np.isnan(m.velocity_ms[at])]
        for field, values, places, text in (
            ("depth_m", m.depth_m, at, depth),
            ("points", np.abs(m.velocity_ms), with_velocity, velocity),
        ):
            for k in _far(values[places], ratio).nonzero()[0].tolist():
                i = int(places[k])
                said = sentence(text, vertical=i + 1, value=round(float(values[i]), 3))
                yield Finding("outlier", field, said, ratio, COMMON, *c.place(i))
        yield from _wide_gap(c, channel, at, ratio)


def _far(values: Floats, ratio: float) -> Bools:
    if len(values) < 3:
        return np.zeros(len(values), dtype=np.bool_)
    before = np.concatenate((values[2:3], values[:-1]))
    after = np.concatenate((values[1:], values[-3:-2]))
    most, least = np.maximum(before, after), np.minimum(before, after)
    low = (values * ratio < least) & (least - values > SMALLEST_OUTLIER)
    low[0] = low[-1] = False  # towards a bank every value falls
    return low | ((values > ratio * most) & (values - most > SMALLEST_OUTLIER))


def _wide_gap(c: Columns, channel: int, at: Indices, ratio: float) -> Iterator[Finding]:
    first, last = c.bank_distance_m[channel]
    x = np.concatenate(([first], c.distance_m[at], [last]))
    gaps = np.abs(x[1:] - x[:-1])
    usual_m = float(np.sort(gaps)[len(gaps) // 2])
    if len(gaps) < 4 or usual_m == 0:
        return
    text = gettext_noop(
        "{value} m between {before} m and {after} m, where {usual} m is usual. "
        "Are the distances right?"
    )
    for k in (gaps > ratio * usual_m).nonzero()[0].tolist():
        said = sentence(
            text,
            value=round(float(gaps[k]), 3),
            before=float(x[k]),
            after=float(x[k + 1]),
            usual=round(usual_m, 3),
        )
        place = c.place(int(at[min(k, len(at) - 1)]))
        yield Finding("outlier", "distance_m", said, ratio, COMMON, *place)


def _wading(m: Measured, limit_m2s: float) -> Iterator[Finding]:
    product = m.depth_m * np.abs(m.velocity_ms)
    text = gettext_noop(
        "Vertical {vertical}: depth × velocity is {value} m²/s; wading is usual only below "
        "{limit} m²/s."
    )
    for i in (product > limit_m2s).nonzero()[0].tolist():
        said = sentence(text, vertical=i + 1, value=round(float(product[i]), 2), limit=limit_m2s)
        place = m.columns.place(i)
        yield Finding("wading", "depth_m", said, limit_m2s, WADING_SOURCE, *place)
