"""The year's flow against the range of earlier years, with gaugings, estimates and gaps."""

import numpy as np
from matplotlib.axes import Axes

from reports.figures import style, time_lines
from reports.figures.inputs import FlowYear, Words

WIDTH_MM, HEIGHT_MM = 174, 88
LOG_FROM = 12.0  # highest over lowest flow from which low flows need a logarithmic axis


def draw(year: FlowYear, words: Words) -> str:
    """Return the hydrograph as SVG; logarithmic where no flow is zero and the range is wide."""
    with style.styled():
        figure = style.sheet(WIDTH_MM, HEIGHT_MM)
        axes = style.panel(figure, left=11, bottom=9, right=29, top=6)
        _scale(axes, year, words)
        style.month_axis(axes, year.days, words)
        style.title(axes, words.flow_axis)
        if year.earlier is not None:
            time_lines.draw_earlier(axes, year.days, year.earlier)
        time_lines.draw_missing(axes, year.days, np.isnan(year.flow_m3s), words)
        time_lines.draw_year(axes, year.days, year.flow_m3s, estimated=year.estimated)
        time_lines.label_estimated(axes, year.days, year.estimated, words)
        time_lines.draw_points(axes, year.gauged_at, year.gauged_m3s)
        time_lines.key(axes, words, earlier=year.earlier, points=words.gauging)
        return style.svg(figure)


def _scale(axes: Axes, year: FlowYear, words: Words) -> None:
    """Choose the flow axis from everything that is drawn on it."""
    drawn = [year.flow_m3s, year.gauged_m3s]
    if year.earlier is not None:
        drawn += [year.earlier.lowest, year.earlier.highest]
    values = np.concatenate(drawn)
    values = values[np.isfinite(values)]
    lowest, highest = (values.min(), values.max()) if values.size else (0.0, 1.0)
    if lowest > 0 and highest / lowest >= LOG_FROM:
        style.decades(axes, "y", lowest=lowest, highest=highest)
    else:
        axes.set_ylim(0, highest * 1.06 or 1.0)
    style.number_ticks(axes.yaxis, words)
    axes.grid(axis="y")
