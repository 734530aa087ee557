"""The map sketch of a volume: all its stations to scale, north up, numbered as in its contents."""

from collections.abc import Sequence

import numpy as np
from matplotlib.axes import Axes

from reports.figures import style
from reports.figures.inputs import LocationSketch, Place
from reports.figures.sketch import LEAST_KM, kilometres, scale_and_north

WIDTH_MM, HEIGHT_MM = 174.0, 200.0
NAMED_UP_TO = 30  # more stations than this bear their number alone


def draw(places: Sequence[Place], north: str) -> str:
    """Return the sketch as SVG; the first place is number 1, north the word at its arrow."""
    frame = LocationSketch(station=places[0])
    latitude = np.array([place.latitude for place in places])
    longitude = np.array([place.longitude for place in places])
    east_km, north_km = kilometres(frame, latitude, longitude)
    half_km = _half_width(np.ptp(east_km), np.ptp(north_km))
    height_mm = _height(np.ptp(north_km), half_km)
    with style.styled():
        figure = style.sheet(WIDTH_MM, height_mm)
        axes = style.panel(figure, left=0.5, bottom=0.5, right=0.5, top=0.5)
        axes.set_xticks([])
        axes.set_yticks([])
        for side in axes.spines.values():
            side.set(visible=True, color=style.RULE)
        middle = (east_km.max() + east_km.min()) / 2, (north_km.max() + north_km.min()) / 2
        axes.set_xlim(middle[0] - half_km, middle[0] + half_km)
        half_height = half_km * height_mm / WIDTH_MM
        axes.set_ylim(middle[1] - half_height, middle[1] + half_height)
        for number, (x, y, place) in enumerate(zip(east_km, north_km, places, strict=True), 1):
            label = f"{number} {place.name}" if len(places) <= NAMED_UP_TO else str(number)
            _mark(axes, float(x), float(y), label=label, middle=middle[0], half_km=half_km)
        scale_and_north(axes, half_km, north)
        return style.svg(figure)


def _half_width(east_km: float, north_km: float) -> float:
    """Return half the width of the frame in km, so that names and a margin fit round all."""
    shape = WIDTH_MM / HEIGHT_MM
    return max(east_km / 2 * 1.4, north_km / 2 * shape * 1.2, LEAST_KM)


def _height(north_km: float, half_km: float) -> float:
    """Return the height of the frame in mm, no more than the stations need."""
    needed = north_km * 1.2 * WIDTH_MM / (2 * half_km)
    return float(np.clip(needed, HEIGHT_MM * 0.4, HEIGHT_MM))


def _mark(axes: Axes, x: float, y: float, *, label: str, middle: float, half_km: float) -> None:
    """Draw a station as a triangle, its label on the side that is nearer the middle."""
    leftwards = x > middle
    axes.plot(
        x, y, color=style.WATER, marker="^", markersize=7, markerfacecolor=style.WATER,
        markeredgecolor=style.PAPER, markeredgewidth=0.6, zorder=3,
    )  # fmt: skip
    axes.text(
        x + (-0.025 if leftwards else 0.025) * half_km,
        y,
        label,
        ha="right" if leftwards else "left",
        va="center",
        fontsize=style.TEXT,
        bbox={"facecolor": style.PAPER, "edgecolor": "none", "alpha": 0.8, "pad": 0.4},
        zorder=4,
    )
