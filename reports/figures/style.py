"""One style for every figure: colours of tokens.css, the report's font files, print size in mm."""

import io
from collections.abc import Iterator
from contextlib import contextmanager
from pathlib import Path
from typing import Any

import fontpkg_ibm_plex_sans_condensed as plex
import matplotlib as mpl
import numpy as np
from matplotlib import font_manager
from matplotlib.axes import Axes
from matplotlib.axis import Axis
from matplotlib.figure import Figure

from reports.figures.inputs import Times, Values, Words

INK = "#1b2429"
INK_SOFT = "#4d5a61"
PAPER = "#ffffff"
RULE = "#b9c3c4"
WATER = "#134f66"
WATER_MID = "#7fa3ae"
WATER_PALE = "#c3d5da"
WATER_FAINT = "#e3ecee"
CLAY = "#9a4a1c"
MOSS = "#4a6332"

FONT_FILES = {
    weight: Path(plex.__file__).parent / "files" / f"IBMPlexSansCondensed-{name}.ttf"
    for weight, name in ((400, "Regular"), (600, "SemiBold"))
}
for _file in FONT_FILES.values():
    font_manager.fontManager.addfont(_file)

SMALL = 7.0  # points; ticks and direct labels
TEXT = 7.5  # points; axis titles

_SETTINGS: Any = {
    "font.family": [plex.FAMILY],
    "font.size": SMALL,
    "axes.edgecolor": INK,
    "axes.labelcolor": INK,
    "axes.labelsize": TEXT,
    "axes.linewidth": 0.5,
    "axes.spines.top": False,
    "axes.spines.right": False,
    "axes.unicode_minus": True,
    "grid.color": RULE,
    "grid.linewidth": 0.3,
    "grid.alpha": 0.7,
    "hatch.linewidth": 0.5,
    "path.simplify": True,
    "svg.fonttype": "none",  # real text, set in the report's font by the renderer
    "svg.hashsalt": "yearbook",
    "text.color": INK,
    "xtick.color": INK,
    "ytick.color": INK,
    "xtick.labelsize": SMALL,
    "ytick.labelsize": SMALL,
    "xtick.major.size": 2.5,
    "ytick.major.size": 2.5,
    "xtick.major.width": 0.5,
    "ytick.major.width": 0.5,
}


@contextmanager
def styled() -> Iterator[None]:
    """Apply the figures' settings while one is drawn."""
    with mpl.rc_context(_SETTINGS):
        yield


def sheet(width_mm: float, height_mm: float) -> Figure:
    """Return an empty figure of a size in millimetres of paper."""
    return Figure(figsize=(width_mm / 25.4, height_mm / 25.4))


def panel(figure: Figure, *, left: float, bottom: float, right: float, top: float) -> Axes:
    """Add axes that keep the given distances, in mm, from the edges of the figure."""
    width, height = figure.get_size_inches() * 25.4
    box = (
        left / width,
        bottom / height,
        (width - left - right) / width,
        (height - bottom - top) / height,
    )
    axes = figure.add_axes(box)
    axes.set_axisbelow(True)
    return axes


def title(axes: Axes, text: str) -> None:
    """Write what the upright axis counts above it, level and clear of its numbers."""
    # With y given matplotlib does not measure all axes to find a free place, which takes longest.
    axes.set_title(text, loc="left", fontsize=TEXT, pad=5, y=1.0)


def svg(figure: Figure) -> str:
    """Return the figure as SVG text, the same bytes for the same figure."""
    out = io.StringIO()
    figure.savefig(out, format="svg", transparent=True, metadata={"Date": None, "Creator": None})
    text = out.getvalue()
    return text[text.index("<svg") :]


def number(value: float, words: Words) -> str:
    """Return an axis number with the agency's decimal sign and a true minus."""
    return f"{value:.10g}".replace(".", words.decimal_sign).replace("-", "−")


def number_ticks(axis: Axis, words: Words) -> None:
    """Print the numbers of an axis with the agency's decimal sign."""
    axis.set_major_formatter(lambda value, _position: number(value, words))
    axis.set_minor_locator(mpl.ticker.NullLocator())


def decades(axes: Axes, which: str, *, lowest: float, highest: float) -> None:
    """Make one axis logarithmic with ticks at 1, 2 and 5 of each decade in range.

    One label a decade is kept where more than three decades are covered.
    """
    low, high = 10 ** np.floor(np.log10(lowest)), highest * 1.25
    # A power of ten may lie a hair above a lowest that equals it.
    low = max((step for step in (low, 2 * low, 5 * low) if step <= lowest), default=low)
    wide = np.log10(high / low) > 3
    exponents = range(int(np.floor(np.log10(low))), int(np.floor(np.log10(high))) + 1)
    ticks = [d * 10.0**e for e in exponents for d in ((1,) if wide else (1, 2, 5))]
    axis = getattr(axes, f"{which}axis")
    getattr(axes, f"set_{which}scale")("log")
    getattr(axes, f"set_{which}lim")(low, high)
    axis.set_major_locator(mpl.ticker.FixedLocator([t for t in ticks if low <= t <= high]))


def month_axis(axes: Axes, days: Times, words: Words) -> None:
    """Divide the time axis at the firsts of the months and name the months between them."""
    first, last = days[0], days[-1] + np.timedelta64(1, "D")
    months = np.arange(first.astype("datetime64[M]"), last.astype("datetime64[M]"))
    starts = day_numbers(months.astype("datetime64[D]"))
    ends = np.append(starts[1:], day_numbers(last))
    axes.set_xlim(starts[0], ends[-1])
    axes.set_xticks(starts[1:], [""] * (len(starts) - 1))
    axes.grid(axis="x")
    for month, start, end in zip(months, starts, ends, strict=True):
        number = int(month.astype(int) % 12)
        _below(axes, (start + end) / 2, words.months[number], down=10)
        if month == months[0] or number == 0:
            _below(axes, (start + end) / 2, str(month)[:4], down=19)


def _below(axes: Axes, x: float, text: str, *, down: float) -> None:
    """Write a text centred under the time axis, its base line so many points below."""
    axes.annotate(
        text,
        (x, 0),
        xycoords=("data", "axes fraction"),
        xytext=(0, -down),
        textcoords="offset points",
        ha="center",
        va="baseline",
        fontsize=SMALL,
    )


def day_numbers(times: Times | np.datetime64) -> Values:
    """Return days since 1970 as floats, the number line of every time axis."""
    return np.asarray(times).astype("datetime64[s]").astype(np.int64) / 86_400
