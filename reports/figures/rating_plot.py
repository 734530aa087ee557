"""The ratings of the year on logarithmic and on plain axes, with their gaugings and 95 % bands."""

import numpy as np
from matplotlib.axes import Axes
from matplotlib.typing import LineStyleType

from reports.figures import keys, style
from reports.figures.inputs import RatingCurve, RatingSheet, Words

WIDTH_MM, HEIGHT_MM = 174, 94
LINES: tuple[
    tuple[str, LineStyleType], ...
] = (  # told apart by dashes and by name, not by colour alone
    (style.WATER, "-"),
    (style.INK, (0, (5, 1.5))),
    (style.INK_SOFT, (0, (5, 1.5, 1, 1.5))),
    (style.WATER_MID, (0, (2, 1))),
)
EXTRAPOLATED: LineStyleType = (0, (1, 1.5))


def draw(sheet: RatingSheet, words: Words) -> str:
    """Return both plots side by side as SVG, stage upright and flow across."""
    with style.styled():
        figure = style.sheet(WIDTH_MM, HEIGHT_MM)
        left = style.panel(figure, left=11, bottom=10, right=100, top=7)
        right = style.panel(figure, left=83, bottom=10, right=30, top=7)
        for axes, title in ((left, words.log_axes), (right, words.plain_axes)):
            style.title(axes, title)
            axes.set_xlabel(words.flow_axis)
        _make_logarithmic(left, sheet)
        for axes in (left, right):
            _draw(axes, sheet)
            style.number_ticks(axes.xaxis, words)
            style.number_ticks(axes.yaxis, words)
            axes.grid()
        right.set_xlim(left=0)
        _write_numbers(left, sheet)
        keys.draw(right, _entries(sheet, words))
        return style.svg(figure)


def _make_logarithmic(axes: Axes, sheet: RatingSheet) -> None:
    """Make the flow logarithmic, the stage too where all of it lies above the station zero."""
    flow = np.concatenate([sheet.gauged_m3s, *(curve.flow_m3s for curve in sheet.curves)])
    stage = np.concatenate([sheet.gauged_stage_m, *(curve.stage_m for curve in sheet.curves)])
    flow = flow[np.isfinite(flow) & (flow > 0)]
    if flow.size:
        style.decades(axes, "x", lowest=flow.min(), highest=flow.max())
    if stage.size and stage.min() > 0:
        style.decades(axes, "y", lowest=stage.min(), highest=stage.max())


def _draw(axes: Axes, sheet: RatingSheet) -> None:
    """Draw bands, curves and gaugings, those of the year filled and with their U."""
    for curve, (colour, dashes) in zip(sheet.curves, LINES * 9, strict=False):
        _draw_curve(axes, curve, colour=colour, dashes=dashes)
    year = sheet.in_year
    u = np.nan_to_num(sheet.gauged_u95_percent) / 100 * sheet.gauged_m3s
    axes.errorbar(
        sheet.gauged_m3s[year],
        sheet.gauged_stage_m[year],
        xerr=u[year],
        fmt="o",
        color=style.MOSS,
        markersize=4,
        elinewidth=0.8,
        zorder=4,
    )
    axes.plot(
        sheet.gauged_m3s[~year],
        sheet.gauged_stage_m[~year],
        linestyle="none",
        marker="o",
        markersize=3,
        markerfacecolor=style.PAPER,
        markeredgecolor=style.MOSS,
        markeredgewidth=0.7,
        zorder=3,
    )


def _draw_curve(axes: Axes, curve: RatingCurve, *, colour: str, dashes: LineStyleType) -> None:
    """Draw one rating, dotted where it is extrapolated, over its band."""
    if curve.lower_m3s.size:
        axes.fill_betweenx(
            curve.stage_m,
            curve.lower_m3s,
            curve.upper_m3s,
            color=style.WATER_PALE,
            alpha=0.7,
            linewidth=0,
            zorder=1,
        )
    beyond = curve.extrapolated if curve.extrapolated.size else np.zeros(len(curve.stage_m), bool)
    inside = np.where(beyond, np.nan, curve.flow_m3s)
    # The dots begin at the last point inside, so that the curve has no gap.
    reach = beyond | np.append(beyond[1:], False) | np.append(False, beyond[:-1])
    outside = np.where(reach, curve.flow_m3s, np.nan)
    axes.plot(inside, curve.stage_m, color=colour, linewidth=1.1, linestyle=dashes, zorder=2)
    axes.plot(outside, curve.stage_m, color=colour, linewidth=1.3, linestyle=EXTRAPOLATED, zorder=2)


def _write_numbers(axes: Axes, sheet: RatingSheet) -> None:
    """Write the numbers of the year's gaugings beside the curve, left and right in turn.

    Where two would touch, the upper one moves up and a hair line leads to its gauging.
    """
    axes.get_ylim()  # settles the limits that the points are placed by
    points = np.column_stack([sheet.gauged_m3s, sheet.gauged_stage_m])
    heights = axes.transData.transform(points)[:, 1] * 72 / axes.figure.dpi
    order = [i for i in np.argsort(heights) if sheet.in_year[i]]
    free = {-1: -np.inf, 1: -np.inf}
    for place, index in enumerate(order):
        side = -1 if place % 2 else 1
        wanted = heights[index] + (3 if side < 0 else -11)
        height = max(wanted, free[side])
        free[side] = height + 8
        axes.annotate(
            sheet.numbers[index],
            points[index],
            xytext=(8 * side, height - heights[index]),
            textcoords="offset points",
            ha="right" if side < 0 else "left",
            fontsize=style.SMALL,
            arrowprops={"arrowstyle": "-", "linewidth": 0.35, "color": style.INK_SOFT},
            zorder=5,
        )


def _entries(sheet: RatingSheet, words: Words) -> list[keys.Entry]:
    """Return the key: one line a rating, then band, extrapolation and gaugings as they occur."""
    entries = [
        keys.Entry(words=curve.label, colour=colour, line=1.1, dashes=dashes)
        for curve, (colour, dashes) in zip(sheet.curves, LINES * 9, strict=False)
    ]
    if any(curve.lower_m3s.size for curve in sheet.curves):
        pale = style.WATER_PALE
        entries.append(keys.Entry(words=words.band, colour=pale, band=True, fill=pale))
    if any(curve.extrapolated.any() for curve in sheet.curves):
        entries.append(
            keys.Entry(words=words.extrapolated, colour=style.WATER, line=1.3, dashes=EXTRAPOLATED)
        )
    return [
        *entries,
        keys.Entry(
            words=words.gauging_in_year,
            colour=style.MOSS,
            line=0.8,
            marker="o",
            fill=style.MOSS,
        ),
        keys.Entry(words=words.gauging_before, colour=style.MOSS, marker="o"),
    ]
