"""The location sketch: the station among its neighbours, to scale, north up."""

from typing import Any

import numpy as np
from matplotlib.axes import Axes

from reports.figures import style
from reports.figures.inputs import LocationSketch, Values, Words

WIDTH_MM, HEIGHT_MM = 78, 58
KM_PER_DEGREE = 111.2
LEAST_KM = 6.0  # half the width shown around a station without neighbours


def draw(sketch: LocationSketch, words: Words) -> str:
    """Return the sketch as SVG with scale bar and north arrow."""
    with style.styled():
        figure = style.sheet(WIDTH_MM, HEIGHT_MM)
        axes = style.panel(figure, left=0.5, bottom=0.5, right=0.5, top=0.5)
        axes.set_xticks([])
        axes.set_yticks([])
        for side in axes.spines.values():
            side.set(visible=True, color=style.RULE)
        half_km = _frame(axes, sketch)
        for river in sketch.rivers:
            x, y = kilometres(sketch, river[:, 0], river[:, 1])
            axes.plot(x, y, color=style.WATER_MID, linewidth=1.4, zorder=1)
        for place in sketch.neighbours:
            x, y = kilometres(sketch, np.array([place.latitude]), np.array([place.longitude]))
            _mark(axes, x=float(x[0]), y=float(y[0]), name=place.name, half_km=half_km, main=False)
        _mark(axes, x=0, y=0, name=sketch.station.name, half_km=half_km, main=True)
        scale_and_north(axes, half_km, words.north)
        return style.svg(figure)


def kilometres(
    sketch: LocationSketch, latitude: Values, longitude: Values
) -> tuple[Values, Values]:
    """Return east and north of the station in km (plane, good to 1 % within 100 km)."""
    shrink = np.cos(np.radians(sketch.station.latitude))
    east = (longitude - sketch.station.longitude) * KM_PER_DEGREE * shrink
    north = (latitude - sketch.station.latitude) * KM_PER_DEGREE
    return east, north


def _frame(axes: Axes, sketch: LocationSketch) -> float:
    """Fit station and neighbours into the frame and return half its width in km."""
    latitudes = np.array([sketch.station.latitude] + [p.latitude for p in sketch.neighbours])
    longitudes = np.array([sketch.station.longitude] + [p.longitude for p in sketch.neighbours])
    east, north = kilometres(sketch, latitudes, longitudes)
    middle = (east.max() + east.min()) / 2, (north.max() + north.min()) / 2
    shape = WIDTH_MM / HEIGHT_MM
    reach = max(np.ptp(east) / 2, np.ptp(north) / 2 * shape)
    half = max(reach * 1.35, LEAST_KM)
    axes.set_xlim(middle[0] - half, middle[0] + half)
    axes.set_ylim(middle[1] - half / shape, middle[1] + half / shape)
    return half


def _mark(axes: Axes, *, x: float, y: float, name: str, half_km: float, main: bool) -> None:
    """Draw a station as a triangle, this one filled and its name bold, names kept in the frame."""
    low, high = axes.get_xlim()
    leftwards = x > (low + high) / 2
    axes.plot(
        x,
        y,
        color=style.WATER,
        marker="^",
        markersize=7 if main else 5,
        markerfacecolor=style.WATER if main else style.PAPER,
        markeredgecolor=style.WATER,
        markeredgewidth=0.9,
        zorder=3,
    )
    axes.text(
        x + (-0.06 if leftwards else 0.06) * half_km,
        y,
        name,
        ha="right" if leftwards else "left",
        va="center",
        fontweight=600 if main else 400,
        fontsize=style.TEXT if main else style.SMALL,
        bbox={"facecolor": style.PAPER, "edgecolor": "none", "alpha": 0.8, "pad": 0.6},
        zorder=4,
    )


def scale_and_north(axes: Axes, half_km: float, north: str) -> None:
    """Draw a bar of a round length at lower left and an arrow to the north at upper right."""
    rough = half_km * 0.5
    step = 10 ** np.floor(np.log10(rough))
    length = max(s * step for s in (1, 2, 5) if s * step <= rough)
    share = length / (2 * half_km)
    place: dict[str, Any] = {"transform": axes.transAxes, "zorder": 5}
    axes.plot([0.05, 0.05 + share], [0.06, 0.06], color=style.INK, linewidth=1.6, **place)
    axes.text(0.05, 0.085, f"{length:g} km", va="bottom", fontsize=style.SMALL, **place)
    axes.annotate(
        north,
        (0.94, 0.955),
        xytext=(0.94, 0.83),
        xycoords="axes fraction",
        ha="center",
        fontsize=style.TEXT,
        arrowprops={"arrowstyle": "-|>", "color": style.INK, "linewidth": 0.8},
    )
