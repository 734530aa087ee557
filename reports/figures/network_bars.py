"""Plots of the network's figures: made against planned, and how many stations lie where."""

from collections.abc import Sequence
from dataclasses import dataclass

import numpy as np
from matplotlib.ticker import MaxNLocator

from reports.figures import style

WIDTH_MM = 84
ROW_MM = 7.0


@dataclass(frozen=True)
class Pairs:
    """A pair of numbers for each name: made and planned."""

    names: Sequence[str]
    made: Sequence[float]
    planned: Sequence[float]
    made_word: str
    planned_word: str


@dataclass(frozen=True)
class Bars:
    """How many lie in each class; the axis says what the classes are, count_word what counts."""

    names: Sequence[str]
    counts: Sequence[int]
    axis: str
    count_word: str


def draw_pairs(pairs: Pairs) -> str:
    """Draw a bar for what was made and a line across it for what was planned, a row each."""
    rows = np.arange(len(pairs.names))[::-1].astype(np.float64)
    with style.styled():
        figure = style.sheet(WIDTH_MM, 16 + ROW_MM * len(rows))
        axes = style.panel(figure, left=27, bottom=7, right=4, top=6)
        axes.barh(rows, pairs.made, height=0.55, color=style.WATER_MID, label=pairs.made_word)
        axes.plot(
            pairs.planned, rows, linestyle="none", marker="|", markersize=11, markeredgewidth=1.4,
            color=style.INK, label=pairs.planned_word,
        )  # fmt: skip
        axes.set_yticks(rows, pairs.names)
        axes.set_ylim(-0.6, len(rows) - 0.4)
        axes.set_xlim(0, max([*pairs.made, *pairs.planned, 1]) * 1.05)
        axes.grid(axis="x")
        axes.legend(
            loc="lower left", bbox_to_anchor=(0, 1.0), ncols=2, frameon=False, borderaxespad=0.2
        )
        return style.svg(figure)


def draw_bars(bars: Bars) -> str:
    """Draw a bar for each class with its count above."""
    places = [float(place) for place in range(len(bars.names))]
    with style.styled():
        figure = style.sheet(WIDTH_MM, 48)
        axes = style.panel(figure, left=9, bottom=11, right=2, top=7)
        axes.bar(places, bars.counts, width=0.7, color=style.WATER_MID)
        for place, count in zip(places, bars.counts, strict=True):
            if count:
                axes.text(place, count, str(count), ha="center", va="bottom", fontsize=style.SMALL)
        axes.set_xticks(places, bars.names)
        axes.set_xlabel(bars.axis)
        axes.set_ylim(0, max([*bars.counts, 1]) * 1.15)
        axes.yaxis.set_major_locator(MaxNLocator(integer=True))
        style.title(axes, bars.count_word)
        return style.svg(figure)
