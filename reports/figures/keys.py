"""The column of samples and words in the right margin of a figure."""

from dataclasses import dataclass
from typing import Any

from matplotlib.axes import Axes
from matplotlib.lines import Line2D
from matplotlib.patches import Rectangle
from matplotlib.typing import LineStyleType

from reports.figures import style

STEP_POINTS = 13.0
SAMPLE_POINTS = 13.0


@dataclass(frozen=True, kw_only=True)
class Entry:
    """One sample, a band or a line with or without a marker, and its words (line breaks kept)."""

    words: str
    colour: str
    band: bool = False
    line: float = 0.0  # width in points; 0 draws none
    dashes: LineStyleType = "-"
    marker: str = ""
    fill: str = style.PAPER


def draw(axes: Axes, entries: list[Entry], *, inside_mm: float = 0) -> None:
    """Draw the samples from the top down, beginning right of the axes or so far inside them."""
    figure: Any = axes.figure  # never a subfigure here
    width, height = figure.get_size_inches() * 72
    box = axes.get_position()
    x, y = box.x1 * width + 6 - inside_mm * 72 / 25.4, box.y1 * height - 5
    for entry in entries:
        figure.add_artist(_sample(entry, x=x, y=y, width=width, height=height))
        figure.text(
            (x + SAMPLE_POINTS + 4) / width,
            (y + 3) / height,
            entry.words,
            va="top",
            fontsize=style.SMALL,
            linespacing=1.25,
            bbox={"facecolor": style.PAPER, "edgecolor": "none", "pad": 0.8},
        )
        y -= STEP_POINTS + entry.words.count("\n") * style.SMALL * 1.35


def _sample(entry: Entry, *, x: float, y: float, width: float, height: float) -> Line2D | Rectangle:
    """Return the sample with its left end at (x, y) in points of a figure of the given size."""
    if entry.band:
        return Rectangle(
            (x / width, (y - 4) / height),
            SAMPLE_POINTS / width,
            7 / height,
            facecolor=entry.fill,
            edgecolor=entry.colour,
            linewidth=0.5,
        )
    return Line2D(
        [x / width, (x + SAMPLE_POINTS / 2) / width, (x + SAMPLE_POINTS) / width],
        [(y - 0.5) / height] * 3,
        color=entry.colour,
        linewidth=entry.line,
        linestyle=entry.dashes if entry.line else "none",
        marker=entry.marker,
        markevery=[1],
        markersize=4,
        markerfacecolor=entry.fill,
        markeredgecolor=entry.colour,
        markeredgewidth=1,
    )
