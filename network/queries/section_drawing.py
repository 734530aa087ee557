"""The drawing of a gauged section: water, bed, ice, verticals, and what each panel carries."""

from collections.abc import Callable
from dataclasses import dataclass

from network.numerics.gaugings.gauging_input import Channel
from network.queries.gaugings import Answer

WIDTH, HEIGHT = 400.0, 250.0
LEFT, RIGHT = 46.0, 8.0
SURFACE, BED = 118.0, 226.0  # y of the water surface and of the greatest depth
SHARE_TOP = 16.0


@dataclass(frozen=True)
class Bar:
    """The share of a panel: a rectangle on the water surface."""

    x: float
    y: float
    width: float
    height: float
    percent: float
    grade: str  # "", "advice" or "limit"


@dataclass(frozen=True)
class Mark:
    """A vertical: where, how deep, and whether a velocity was measured there."""

    x: float
    y: float
    measured: bool


@dataclass(frozen=True)
class Level:
    """A line of the shares' scale."""

    y: float
    text: str


@dataclass(frozen=True)
class Drawing:
    """A drawing in its own units; water and ice are the points of polygons."""

    water: tuple[str, ...]
    ice: tuple[str, ...]
    marks: tuple[Mark, ...]
    bars: tuple[Bar, ...]
    levels: tuple[Level, ...]
    first_m: float
    last_m: float
    greatest_m: float
    width: float = WIDTH
    height: float = HEIGHT
    surface: float = SURFACE
    bed: float = BED
    left: float = LEFT
    right: float = WIDTH - RIGHT


def drawing(answer: Answer, *, advice: float = 5.0, limit: float = 10.0) -> Drawing | None:
    """Draw a section as far as it is known; None where there is no water to draw."""
    channels = [c for c in answer.sheet.channels if len(_nodes(c)) > 1]
    nodes = [node for channel in channels for node in _nodes(channel)]
    if not nodes or max(depth for _x, depth, _ice in nodes) <= 0:
        return None
    first, last = min(n[0] for n in nodes), max(n[0] for n in nodes)
    deepest = max(depth for _x, depth, _ice in nodes)
    if last <= first:
        return None

    def x(at_m: float) -> float:
        return round(LEFT + (at_m - first) / (last - first) * (WIDTH - LEFT - RIGHT), 1)

    def y(depth_m: float) -> float:
        return round(SURFACE + depth_m / deepest * (BED - SURFACE), 1)

    bars, levels = _bars(answer, x, advice=advice, limit=limit)
    return Drawing(
        water=tuple(_polygon([(x(a), y(d)) for a, d, _i in _nodes(c)]) for c in channels),
        ice=tuple(
            _polygon([(x(a), y(i)) for a, _d, i in _nodes(c)])
            for c in channels
            if any(i for *_rest, i in _nodes(c))
        ),
        marks=tuple(
            Mark(x(v.distance_m), y(v.depth_m), bool(v.points) or v.mean_velocity_ms is not None)
            for c in channels
            for v in c.verticals
            if v.distance_m is not None and v.depth_m is not None and v.depth_m >= 0
        ),
        bars=bars,
        levels=levels,
        first_m=first,
        last_m=last,
        greatest_m=deepest,
    )


def _nodes(channel: Channel) -> list[tuple[float, float, float]]:
    """List distance, depth and underside of ice from bank to bank, as far as noted."""
    first, last = channel.first_bank, channel.last_bank
    rows = [
        (first.distance_m, first.depth_m, 0.0),
        *((v.distance_m, v.depth_m, v.ice_underside_m or 0.0) for v in channel.verticals),
        (last.distance_m, last.depth_m, 0.0),
    ]
    return [(a, d, i) for a, d, i in rows if a is not None and d is not None and d >= 0]


def _polygon(bottom: list[tuple[float, float]]) -> str:
    points = [(bottom[0][0], SURFACE), *bottom, (bottom[-1][0], SURFACE)]
    return " ".join(f"{x},{y}" for x, y in points)


def _bars(
    answer: Answer, x: Callable[[float], float], *, advice: float, limit: float
) -> tuple[tuple[Bar, ...], tuple[Level, ...]]:
    panels = answer.result.panels if answer.result else ()
    if not panels:
        return (), ()
    most = max(limit * 1.1, *(100 * abs(panel.share) for panel in panels))
    scale = (SURFACE - 4 - SHARE_TOP) / most
    bars = []
    for panel in panels:
        percent = 100 * abs(panel.share)
        grade = "limit" if percent > limit else "advice" if percent > advice else ""
        ends = sorted((x(panel.from_m), x(panel.to_m)))
        height = round(percent * scale, 1)
        width = round(max(ends[1] - ends[0] - 0.8, 0.5), 1)
        bars.append(Bar(ends[0], SURFACE - 4 - height, width, height, percent, grade))
    shown = (advice, limit) if (limit - advice) * scale > 9 else (limit,)  # not on one another
    levels = [Level(round(SURFACE - 4 - at * scale, 1), f"{at:g}") for at in shown]
    return tuple(bars), tuple(levels)
