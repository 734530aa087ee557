"""What the two hydrographs share: earlier range, the year's line and its gaps, direct labels."""

import numpy as np
from matplotlib.axes import Axes
from matplotlib.typing import LineStyleType

from reports.figures import keys, style
from reports.figures.inputs import EarlierRange, Flags, Times, Values, Words

DASHES: LineStyleType = (0, (2.2, 1.3))  # of every estimated line


def draw_earlier(axes: Axes, days: Times, earlier: EarlierRange) -> None:
    """Draw the range of the earlier years, its middle half and its median."""
    x = style.day_numbers(days) + 0.5
    axes.fill_between(
        x, earlier.lowest, earlier.highest, color=style.WATER_FAINT, linewidth=0, zorder=1
    )
    axes.fill_between(
        x,
        earlier.lower_quartile,
        earlier.upper_quartile,
        color=style.WATER_PALE,
        linewidth=0,
        zorder=1.1,
    )
    axes.plot(x, earlier.median, color=style.WATER_MID, linewidth=0.7, zorder=1.2)


def draw_year(axes: Axes, days: Times, values: Values, *, estimated: Flags) -> None:
    """Draw the year's line: full where recorded, dashed in another colour where estimated."""
    x = style.day_numbers(days) + 0.5
    known = np.where(estimated, np.nan, values)
    axes.plot(x, known, color=style.WATER, linewidth=1.1, zorder=3)
    # The dashes reach one day into the recorded parts so that the line does not break.
    reach = estimated | np.append(estimated[1:], False) | np.append(False, estimated[:-1])
    axes.plot(
        x,
        np.where(reach, values, np.nan),
        color=style.CLAY,
        linewidth=1.2,
        linestyle=DASHES,
        zorder=3.1,
    )


def spans(flags: Flags) -> list[tuple[int, int]]:
    """Return first and last index of every run of true flags."""
    edges = np.flatnonzero(np.diff(np.concatenate(([0], flags.astype(np.int8), [0]))))
    return [(int(a), int(b) - 1) for a, b in zip(edges[::2], edges[1::2], strict=True)]


def draw_missing(axes: Axes, days: Times, missing: Flags, words: Words) -> None:
    """Hatch the days without a value and say so at the longest run."""
    runs = spans(missing)
    x = style.day_numbers(days)
    for first, last in runs:
        axes.axvspan(
            x[first], x[last] + 1, facecolor="none", edgecolor=style.RULE, hatch="////", lw=0
        )
    if runs:
        first, last = max(runs, key=lambda run: run[1] - run[0])
        label(axes, (x[first] + x[last] + 1) / 2, 0.98, words.missing, va="top", fraction=True)


def label_estimated(axes: Axes, days: Times, estimated: Flags, words: Words) -> None:
    """Name the longest estimated run by a bracket at the foot of the axes."""
    runs = spans(estimated)
    x = style.day_numbers(days)
    for first, last in runs:
        axes.plot(
            [x[first], x[last] + 1],
            [0.02, 0.02],
            transform=axes.get_xaxis_transform(),
            color=style.CLAY,
            linewidth=2,
            solid_capstyle="butt",
            zorder=4,
        )
    if runs:
        first, last = max(runs, key=lambda run: run[1] - run[0])
        middle = (x[first] + x[last] + 1) / 2
        label(axes, middle, 0.04, words.estimated, colour=style.CLAY, va="bottom", fraction=True)


def label(
    axes: Axes,
    x: float,
    y: float,
    text: str,
    *,
    colour: str = style.INK,
    va: str = "center",
    fraction: bool = False,
) -> None:
    """Write a direct label on a slip of paper; ``fraction`` counts y from 0 to 1."""
    axes.text(
        x,
        y,
        text,
        color=colour,
        ha="center",
        va=va,
        transform=axes.get_xaxis_transform() if fraction else axes.transData,
        fontsize=style.SMALL,
        bbox={"facecolor": style.PAPER, "edgecolor": "none", "alpha": 0.82, "pad": 0.8},
        zorder=5,
    )


def draw_points(axes: Axes, times: Times, values: Values) -> None:
    """Draw gaugings or staff readings as rings."""
    axes.plot(
        style.day_numbers(times),
        values,
        linestyle="none",
        marker="o",
        markersize=4,
        markerfacecolor=style.PAPER,
        markeredgecolor=style.MOSS,
        markeredgewidth=1,
        zorder=4,
    )


def key(
    axes: Axes,
    words: Words,
    *,
    earlier: EarlierRange | None,
    points: str,
    more: tuple[keys.Entry, ...] = (),
) -> None:
    """Explain the lines, bands and rings in the right margin."""
    entries = [
        keys.Entry(words=words.this_year, colour=style.WATER, line=1.1),
        keys.Entry(words=words.estimated, colour=style.CLAY, line=1.2, dashes=DASHES),
        keys.Entry(words=points, colour=style.MOSS, marker="o"),
        *more,
    ]
    if earlier is not None:
        entries += [
            keys.Entry(words=words.median, colour=style.WATER_MID, line=0.7),
            keys.Entry(
                words=words.middle_half, colour=style.WATER_PALE, band=True, fill=style.WATER_PALE
            ),
            keys.Entry(
                words=words.extreme_range.format(years=earlier.years, count=earlier.count),
                colour=style.WATER_FAINT,
                band=True,
                fill=style.WATER_FAINT,
            ),
        ]
    keys.draw(axes, entries)
