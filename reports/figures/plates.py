"""The staff gauge drawn to scale beside the year's lowest and highest stage."""

import numpy as np
from matplotlib.axes import Axes

from reports.figures import style
from reports.figures.inputs import PlateBar, PlateStack, Words

WIDTH_MM, HEIGHT_MM = 78, 56


def draw(stack: PlateStack, words: Words) -> str:
    """Return the plates side by side against the stage scale as SVG."""
    with style.styled():
        figure = style.sheet(WIDTH_MM, HEIGHT_MM)
        axes = style.panel(figure, left=9, bottom=1, right=2, top=6)
        axes.set_xlim(0, len(stack.plates) * 1.55 + 0.4)
        axes.set_xticks([])
        axes.spines["bottom"].set_visible(False)
        style.title(axes, words.stage_axis)
        style.number_ticks(axes.yaxis, words)
        axes.grid(axis="y")
        for place, plate in enumerate(stack.plates):
            _draw_plate(axes, place + 0.6, plate)
        bottom, top = axes.get_ylim()
        axes.set_ylim(bottom - 0.05 * (top - bottom), top)
        _draw_level(axes, stack.year_highest_m, words.year_highest)
        _draw_level(axes, stack.year_lowest_m, words.year_lowest)
        if np.isfinite(stack.cease_to_flow_m):
            _draw_level(axes, stack.cease_to_flow_m, words.cease_to_flow, below=True)
        return style.svg(figure)


def _draw_plate(axes: Axes, x: float, plate: PlateBar) -> None:
    """Draw one plate as a bar graduated in decimetres, its name above it."""
    axes.bar(
        x,
        plate.highest_m - plate.lowest_m,
        bottom=plate.lowest_m,
        width=0.34,
        facecolor=style.PAPER,
        edgecolor=style.INK,
        linewidth=0.6,
        zorder=2,
    )
    marks = np.arange(np.ceil(plate.lowest_m * 10), plate.highest_m * 10 + 0.01) / 10
    axes.hlines(marks, x - 0.17, x - 0.02, color=style.INK, linewidth=0.5, zorder=2.1)
    axes.annotate(
        plate.label,
        (x, plate.highest_m),
        xytext=(0, 3),
        textcoords="offset points",
        ha="center",
        fontsize=style.SMALL,
        fontweight=600,
        bbox={"facecolor": style.PAPER, "edgecolor": "none", "pad": 0.6},
        zorder=4,
    )


def _draw_level(axes: Axes, stage_m: float, text: str, *, below: bool = False) -> None:
    """Draw one level across the plates with its name at the right end."""
    axes.axhline(stage_m, color=style.WATER, linewidth=0.9, zorder=3)
    axes.annotate(
        text,
        (1, stage_m),
        xycoords=("axes fraction", "data"),
        xytext=(0, -2 if below else 1.5),
        textcoords="offset points",
        ha="right",
        va="top" if below else "bottom",
        color=style.WATER,
        fontsize=style.SMALL,
        bbox={"facecolor": style.PAPER, "edgecolor": "none", "pad": 0.4},
        zorder=4,
    )
