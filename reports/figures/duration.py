"""The duration curve: the share of days on which a value is reached or exceeded."""

import numpy as np
from matplotlib.typing import LineStyleType

from reports.figures import keys, style
from reports.figures.inputs import DurationCurves, Words

WIDTH_MM, HEIGHT_MM = 112, 66
DASHES: LineStyleType = (0, (5, 1.5))


def draw(curves: DurationCurves, words: Words) -> str:
    """Return this year's curve and that of the earlier years as SVG."""
    with style.styled():
        figure = style.sheet(WIDTH_MM, HEIGHT_MM)
        axes = style.panel(figure, left=11, bottom=10, right=3, top=6)
        axes.set_xlim(0, 100)
        axes.set_xticks(range(0, 101, 10))
        axes.set_xlabel(words.percent_axis)
        style.title(axes, words.stage_axis if curves.of_stage else words.flow_axis)
        values = np.concatenate([curves.value, curves.earlier_value])
        if not curves.of_stage and values.size and values.min() > 0:
            style.decades(axes, "y", lowest=values.min(), highest=values.max())
        style.number_ticks(axes.yaxis, words)
        axes.grid()
        entries = [keys.Entry(words=words.this_year, colour=style.WATER, line=1.2)]
        axes.plot(curves.percent, curves.value, color=style.WATER, linewidth=1.2)
        if curves.earlier_value.size:
            axes.plot(
                curves.earlier_percent,
                curves.earlier_value,
                color=style.INK_SOFT,
                linewidth=0.9,
                linestyle=DASHES,
            )
            earlier = words.earlier.format(years=curves.earlier_years)
            entries.append(
                keys.Entry(words=earlier, colour=style.INK_SOFT, line=0.9, dashes=DASHES)
            )
        keys.draw(axes, entries, inside_mm=30)
        return style.svg(figure)
