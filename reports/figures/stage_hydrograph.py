"""The year's stage: daily means within their daily range, staff readings beside them."""

import numpy as np
from matplotlib.axes import Axes

from reports.figures import keys, style, time_lines
from reports.figures.inputs import StageYear, Words

WIDTH_MM, HEIGHT_MM = 174, 62
TALL_MM = 88  # for stage-only stations, where it is the main figure


def draw(year: StageYear, words: Words) -> str:
    """Return the stage hydrograph as SVG, against the earlier range where one is given."""
    with style.styled():
        figure = style.sheet(WIDTH_MM, TALL_MM if year.earlier else HEIGHT_MM)
        axes = style.panel(figure, left=11, bottom=9, right=29, top=6)
        style.month_axis(axes, year.days, words)
        style.title(axes, words.stage_axis)
        axes.grid(axis="y")
        style.number_ticks(axes.yaxis, words)
        if year.earlier is not None:
            time_lines.draw_earlier(axes, year.days, year.earlier)
        _draw_daily_range(axes, year)
        time_lines.draw_missing(axes, year.days, np.isnan(year.mean_m), words)
        time_lines.draw_year(axes, year.days, year.mean_m, estimated=year.estimated)
        time_lines.label_estimated(axes, year.days, year.estimated, words)
        time_lines.draw_points(axes, year.read_at, year.read_m)
        mid = style.WATER_MID
        ranges = keys.Entry(words=words.daily_range, colour=mid, band=True, fill=mid)
        time_lines.key(axes, words, earlier=year.earlier, points=words.reading, more=(ranges,))
        return style.svg(figure)


def _draw_daily_range(axes: Axes, year: StageYear) -> None:
    """Shade lowest to highest stage of each day."""
    axes.fill_between(
        style.day_numbers(year.days) + 0.5,
        year.lowest_m,
        year.highest_m,
        color=style.WATER_MID,
        linewidth=0,
        zorder=2,
    )
