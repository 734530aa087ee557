"""The ten digits as outlines of the report's font, for page numbers put on pages already made."""

from functools import cache

import numpy as np
from matplotlib.font_manager import FontProperties
from matplotlib.path import Path as Outline
from matplotlib.textpath import TextPath

from reports.figures.style import FONT_FILES

SIZE = 9.0  # points
DIGITS = "0123456789"
ADVANCE = 0.54 * SIZE  # digits of the report's font are tabular


@cache
def outlines() -> dict[str, str]:
    """Return {digit: its outline as PDF path operators}, in points from its left foot."""
    font = FontProperties(fname=str(FONT_FILES[600]))
    return {digit: _operators(TextPath((0, 0), digit, size=SIZE, prop=font)) for digit in DIGITS}


def _operators(outline: Outline) -> str:
    """Write an outline with the operators m, l, c and h, filled by f (ISO 32000-1, 8.5.2)."""
    parts: list[str] = []
    at = np.zeros(2)
    for points, code in outline.iter_segments(simplify=False):
        ends = points.reshape(-1, 2)
        if code == Outline.MOVETO:
            parts.append(_written(ends, "m"))
        elif code == Outline.LINETO:
            parts.append(_written(ends, "l"))
        elif code == Outline.CURVE3:  # a quadratic curve as the cubic one that equals it
            control, end = ends
            inner = [at + 2 / 3 * (control - at), end + 2 / 3 * (control - end), end]
            parts.append(_written(np.array(inner), "c"))
        elif code == Outline.CURVE4:
            parts.append(_written(ends, "c"))
        else:
            parts.append("h")
            continue
        at = ends[-1]
    return " ".join([*parts, "f"])


def _written(points: np.ndarray, operator: str) -> str:
    return " ".join([*(f"{value:.3f}" for value in points.ravel()), operator])
