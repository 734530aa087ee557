"""The charts of a rating sheet: curve, band and gaugings on log and plain axes, and residuals."""

from collections.abc import Sequence
from dataclasses import dataclass
from datetime import UTC, datetime

import numpy as np
from django.utils.translation import gettext as _

from network.numerics.arrays import Bools, Floats
from network.numerics.ratings import curves as kernel
from network.queries.chart_axes import Axis, Tick, area, around, around_log, polyline
from network.queries.held_gaugings import Held
from network.queries.rating_points import UNSTATED_U95_PERCENT, Point
from network.queries.rating_sheet import Sheet

WIDTH, HEIGHT = 420.0, 320.0
LEFT, RIGHT, TOP, BOTTOM = 48.0, 10.0, 10.0, 40.0
FLAT = 200.0  # height of a chart of residuals
CURVE_POINTS = 160
LOG_SPAN = 1e4  # a log axis reaches no further below its highest figure
LEAST_HEAD = 0.01  # of the highest head: where a curve on log axes begins
YEAR_S = 365.25 * 86_400


@dataclass(frozen=True)
class Dot:
    """A gauging: used, left out or made later; its U as a line between two heights."""

    x: float
    y: float
    kind: str
    title: str
    whisker: tuple[float, float] | None = None


@dataclass(frozen=True)
class Chart:
    """A chart in its own units."""

    name: str
    x_label: str
    y_label: str
    x_ticks: Sequence[Tick]
    y_ticks: Sequence[Tick]
    dots: Sequence[Dot]
    curve: str = ""
    other: str = ""
    band: str = ""
    zero: float | None = None
    height: float = HEIGHT
    width: float = WIDTH
    left: float = LEFT
    right: float = WIDTH - RIGHT
    top: float = TOP

    @property
    def bottom(self) -> float:
        """The place of the lower axis."""
        return self.height - BOTTOM

    @property
    def middle(self) -> tuple[float, float]:
        """The middle of the axes, for their labels."""
        return (self.left + self.right) / 2, (self.top + self.bottom) / 2


def charts(
    sheet: Sheet, *, before: kernel.Curve | None = None, decimal_sign: str = "."
) -> list[Chart]:
    """Return curve and gaugings on plain and on log axes, then residuals over stage and time.

    before: the curve in force, drawn beside the new one.
    """
    drawn = [_relation(sheet, before, log=log, decimal_sign=decimal_sign) for log in (False, True)]
    if not np.isnan(sheet.deviations_percent).all():
        drawn += [_residuals(sheet, by_time=by, decimal_sign=decimal_sign) for by in (False, True)]
    return drawn


def zero_of(curve: kernel.Curve) -> float:
    """Return the stage of zero flow that a curve states, or its lowest point."""
    if isinstance(curve, kernel.SegmentCurve):
        return curve.segments[0].h0_m
    assert isinstance(curve, kernel.TableCurve)
    return curve.h0_m if curve.rule == "log" else float(curve.stages_m[0])


def in_time(held: Sequence[Held], *, decimal_sign: str = ".") -> Chart | None:
    """Return the deviations of a station's gaugings, each from the rating of its own time."""
    if not held:
        return None
    u95 = [UNSTATED_U95_PERCENT if h.gauging.u95_percent is None else h.gauging.u95_percent
           for h in held]  # fmt: skip
    years = np.array([_year(one.at) for one in held])
    deviations = np.array([one.deviation_percent for one in held], np.float64)
    titles = [f"{one.at:%Y-%m-%d}: {one.deviation_percent:+.1f} %" for one in held]
    return _deviations(
        years, deviations, np.array(u95), ["used"] * len(held), titles,
        by_time=True, decimal_sign=decimal_sign,
    )  # fmt: skip


def _relation(sheet: Sheet, before: kernel.Curve | None, *, log: bool, decimal_sign: str) -> Chart:
    low, high = sheet.curve.allowed_m
    zero = zero_of(sheet.curve) if log else 0.0
    points = sheet.points
    known = ~np.isnan(points.stage_m)
    if log:
        known &= (points.flow_m3s > 0) & (points.stage_m > zero)
    stage_m, flow_m3s = points.stage_m[known], points.flow_m3s[known]
    start = max(low, zero + (high - zero) * LEAST_HEAD) if log else low
    grid = (
        zero + np.geomspace(start - zero, high - zero, CURVE_POINTS)
        if log
        else np.linspace(low, high, CURVE_POINTS)
    )
    rated = sheet.curve.flow_at(grid)
    x = _axis(np.append(rated, flow_m3s), LEFT, WIDTH - RIGHT, log=log)
    y = _axis(np.append(grid, stage_m) - zero, HEIGHT - BOTTOM, TOP, log=log)
    shown = known & y.holds(points.stage_m - zero) & x.holds(points.flow_m3s)
    return Chart(
        name=_("On logarithmic axes") if log else _("On plain axes"),
        x_label=_("flow, m³/s"),
        y_label=_("stage above h₀, m") if log else _("stage, m"),
        x_ticks=x.ticks(decimal_sign=decimal_sign),
        y_ticks=y.ticks(decimal_sign=decimal_sign),
        curve=_line(x, y, rated, grid - zero),
        other=_line(x, y, before.flow_at(grid), grid - zero) if before else "",
        band=_band(sheet, x, y, zero),
        dots=_dots(sheet, shown, x.places(points.flow_m3s), y.places(points.stage_m - zero)),
    )


def _residuals(sheet: Sheet, *, by_time: bool, decimal_sign: str) -> Chart:
    known = ~np.isnan(sheet.deviations_percent)
    points, kinds = sheet.points.part(known), np.array(_kinds(sheet))[known].tolist()
    deviations = sheet.deviations_percent[known]
    across = np.array([_year(row.at) for row in points.rows]) if by_time else points.stage_m
    return _deviations(
        across,
        deviations,
        points.u95_percent,
        kinds,
        [_title(row, value) for row, value in zip(points.rows, deviations.tolist(), strict=True)],
        by_time=by_time,
        decimal_sign=decimal_sign,
    )


def _deviations(
    across: Floats,
    deviations: Floats,
    u95: Floats,
    kinds: Sequence[str],
    titles: Sequence[str],
    *,
    by_time: bool,
    decimal_sign: str,
) -> Chart:
    """Draw deviations with their U around a line of zero, cut off at ±100 %."""
    ends = np.clip([deviations - u95, deviations, deviations + u95], -100, 100)
    x = _axis(across, LEFT, WIDTH - RIGHT, log=False)
    y = _axis(np.append(ends.ravel(), 0.0), FLAT - BOTTOM, TOP, log=False)
    places = x.places(across).tolist()
    low, middle, high = (y.places(row).tolist() for row in ends)
    return Chart(
        name=_("Deviations in time") if by_time else _("Deviations over stage"),
        x_label="" if by_time else _("stage, m"),
        y_label=_("deviation, %"),
        x_ticks=x.year_ticks() if by_time else x.ticks(decimal_sign=decimal_sign),
        y_ticks=y.ticks(wanted=5, decimal_sign=decimal_sign),
        dots=[
            Dot(places[k], middle[k], kinds[k], titles[k], (low[k], high[k]))
            for k in range(len(places))
        ],
        zero=float(y.places(np.zeros(1))[0]),
        height=FLAT,
    )


def _kinds(sheet: Sheet) -> list[str]:
    return [
        "used" if row.is_used else "later" if later else "left"
        for row, later in zip(sheet.points.rows, sheet.later.tolist(), strict=True)
    ]


def _axis(values: Floats, start: float, end: float, *, log: bool) -> Axis:
    if not log:
        return Axis(*around(values), start, end)
    return Axis(*around_log(np.maximum(values, values.max() / LOG_SPAN)), start, end, is_log=True)


def _line(x: Axis, y: Axis, flow_m3s: Floats, head_m: Floats) -> str:
    inside = x.holds(flow_m3s) & y.holds(head_m)
    return polyline(x.places(flow_m3s[inside]), y.places(head_m[inside]))


def _band(sheet: Sheet, x: Axis, y: Axis, zero: float) -> str:
    if sheet.band is None:
        return ""
    stage_m = sheet.band.stage_m
    flow_m3s, part = sheet.curve.flow_at(stage_m), sheet.band.u95_percent / 100
    ends = [np.clip(flow_m3s * factor, x.low, x.high) for factor in (1 - part, 1 + part)]
    head = np.clip(stage_m - zero, y.low, y.high)
    return area([x.places(end) for end in ends], [y.places(head)] * 2)


def _dots(sheet: Sheet, shown: Bools, x: Floats, y: Floats) -> list[Dot]:
    kinds, deviations = _kinds(sheet), sheet.deviations_percent.tolist()
    return [
        Dot(float(x[k]), float(y[k]), kinds[k], _title(row, deviations[k]))
        for k, row in enumerate(sheet.points.rows)
        if shown[k]
    ]


def _title(row: Point, deviation: float) -> str:
    text = f"{row.at:%Y-%m-%d}: {row.stage_m:.3f} m, {row.flow_m3s:.3g} m³/s"
    told = "" if np.isnan(deviation) else f", {deviation:+.1f} %"
    return text + told + (f" ({row.left_out_because})" if row.left_out_because else "")


def _year(at: datetime) -> float:
    start = datetime(at.year, 1, 1, tzinfo=UTC)
    return at.year + (at - start).total_seconds() / YEAR_S
