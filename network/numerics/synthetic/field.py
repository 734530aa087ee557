"""Makes invented field measurements: gauged verticals, tow runs and level sights."""

from collections.abc import Sequence
from dataclasses import dataclass
from itertools import pairwise

import numpy as np

from network.numerics.arrays import Floats
from network.numerics.gaugings.gauging_input import Bank, Channel, Point, Vertical
from network.numerics.gaugings.verticals import method_factors, point_method
from network.numerics.levels.level_book import Sight
from network.numerics.meters.meter_rating import Piece

SURFACE_FACTOR = 0.86
EXPOSURE_S = 40.0
POINTS: dict[str, tuple[float, ...]] = {
    "one": (0.6,),
    "half": (0.5,),
    "two": (0.2, 0.8),
    "three": (0.2, 0.6, 0.8),
    "five": (0.0, 0.2, 0.6, 0.8, 1.0),
    "six": (0.0, 0.2, 0.4, 0.6, 0.8, 1.0),
    "surface": (0.0,),
}


@dataclass(frozen=True)
class Section:
    """A gauging section at one flow: width and mean depth (m), and the form of its bed (0–1)."""

    width_m: float
    depth_m: float
    form: float = 0.5

    def at(self, ratio: float) -> "Section":
        """Return the section at `ratio` times the flow.

        Width and depth grow with flow to the powers 0.14 and 0.45, velocity so to 0.41.
        Source: hydraulic geometry at a station (Leopold and Maddock 1953), from memory.
        """
        return Section(self.width_m * ratio**0.14, self.depth_m * ratio**0.45, self.form)


@dataclass(frozen=True)
class TowRun:
    """One tow of a meter: carriage speed (m/s), revolutions, seconds."""

    speed_ms: float
    revolutions: int
    seconds: float


def make_channel(
    flow_m3s: float,
    *,
    section: Section,
    count: int,
    points: str,
    pieces: Sequence[Piece],
    rng: np.random.Generator,
    ice_m: float = 0.0,
) -> Channel:
    """Make the verticals of a gauging whose mid-section discharge is near `flow_m3s`.

    `count` verticals lie between two water's edges of no depth; `points` names a set of POINTS;
    `ice_m` is the underside of the ice below the water surface, on top of the section's depth.
    Depths are to 1 cm, distances to 5 cm, revolutions whole; each point carries 2 % of noise, so
    the flow comes back within about 1.5 %. Raises ValueError for an unknown set of points, fewer
    than three verticals or a flow not above zero. Source: own model, sixth-power profile.
    """
    if points not in POINTS or count < 3 or flow_m3s <= 0:
        raise ValueError("a gauging needs a known set of points, three verticals and a flow")
    distance_m = np.linspace(0.0, section.width_m, count + 2)
    distance_m[1:-1] = np.round(distance_m[1:-1] / 0.05) * 0.05
    water_m = _depths(distance_m / section.width_m, section=section)
    # mid-section: q = v·d·(x₊ − x₋)/2, v growing with depth to the 2/3 as on one slope
    shape = water_m ** (2 / 3) * (1 + rng.normal(0.0, 0.03, count))
    mean_ms = shape * flow_m3s / np.sum(shape * water_m * (distance_m[2:] - distance_m[:-2]) / 2)
    profile = _profile(points, under_ice=ice_m > 0)
    verticals = tuple(
        Vertical(
            distance_m=round(float(x), 2),
            depth_m=round(float(d) + ice_m, 2),
            points=tuple(
                Point(fraction, None, *revolutions(float(v), pieces=pieces))
                for fraction, v in zip(
                    POINTS[points],
                    mean * profile * (1 + rng.normal(0.0, 0.02, profile.size)),
                    strict=True,
                )
            ),
            ice_underside_m=ice_m,
        )
        for x, d, mean in zip(distance_m[1:-1], water_m, mean_ms, strict=True)
    )
    return Channel(Bank(0.0), Bank(round(float(distance_m[-1]), 2)), verticals)


def _depths(at: Floats, *, section: Section) -> Floats:
    """Return the water depths (m) at the inner of the places 0–1 across, to the centimetre."""
    inner = at[1:-1]
    trough = (1 - np.abs(2 * inner - 1) ** 3) ** 0.8
    bumps = 1 + 0.16 * np.sin(9 * inner + 6.3 * section.form) + 0.05 * np.sin(31 * inner)
    shape = trough * bumps
    depth_m: Floats = np.round(section.depth_m * shape / shape.mean(), 2)
    return np.clip(depth_m, 0.03, None)


def _profile(points: str, *, under_ice: bool) -> Floats:
    """Return point velocities over the mean velocity, so that the method gives the mean back."""
    fractions = np.array(POINTS[points])
    method = point_method(POINTS[points])
    if method is None:
        raise ValueError(f"{points} is no method of the kernel")
    weight = np.array([method.weights[fraction] for fraction in POINTS[points]])
    factor = method_factors(
        np.array([method.method]),
        under_ice=np.array([under_ice]),
        surface_factor=SURFACE_FACTOR,
    )
    # v ~ (height above the bed)^(1/6); at the bed the meter sits a little above it
    shape = np.maximum(1.0 - fractions, 0.04) ** (1 / 6)
    mean = float(factor[0]) * float(np.dot(weight, shape))
    return np.asarray(shape / mean, dtype=np.float64)


def revolutions(velocity_ms: float, *, pieces: Sequence[Piece]) -> tuple[int, float]:
    """Return the whole revolutions counted and the time taken (s) at a velocity.

    The count runs on to the first whole revolution after 40 s, the watch is read to 0.1 s; below
    the velocity at which the rotor starts it is 0 revolutions. Source: ISO 2537.
    """
    piece = next((p for p in reversed(pieces) if velocity_ms >= p.velocity_ms(p.n_from)), pieces[0])
    n = max(0.0, (velocity_ms - piece.a_ms) / piece.b_m)
    count = int(np.ceil(n * EXPOSURE_S))
    return (count, round(count / n, 1)) if count else (0, EXPOSURE_S)


def make_tow_runs(
    *, pieces: Sequence[Piece], speeds_ms: Sequence[float], rng: np.random.Generator
) -> tuple[TowRun, ...]:
    """Make the tow runs of a meter with these pieces, scattered by 0.3 % of the speed (m/s)."""
    scattered = np.asarray(speeds_ms) * (1 + rng.normal(0.0, 0.003, len(speeds_ms)))
    return tuple(
        TowRun(speed, *revolutions(float(seen), pieces=pieces))
        for speed, seen in zip(speeds_ms, scattered, strict=True)
    )


def make_level_book(
    *,
    path: Sequence[tuple[str, float]],
    plates: Sequence[tuple[str, float]],
    rng: np.random.Generator,
    error_m: float = 0.0003,
) -> tuple[Sight, ...]:
    """Make a level book along `path` and back, with each plate sighted from two set-ups.

    `path` and `plates` are (name, elevation in m above datum), the path beginning at the
    benchmark; plates are sighted from the first set-up out and the last one back. Readings are
    to the millimetre with `error_m` standard error. Raises ValueError for a path of one point.
    Source: height of collimation, common practice.
    """
    if len(path) < 2:
        raise ValueError("the path needs the benchmark and at least one more point")
    legs = [*pairwise(path), *pairwise(reversed(path))]
    # the instrument stands somewhat above every staff it reads
    height_m = [max(z for _, z in (*leg, *plates)) + float(rng.uniform(0.3, 0.9)) for leg in legs]

    def staff(set_up: int, elevation_m: float) -> float:
        return round(height_m[set_up] - elevation_m + float(rng.normal(0.0, error_m)), 3)

    sights = [Sight(path[0][0], backsight_m=staff(0, path[0][1]))]
    last = len(legs) - 1
    for set_up, (_, (name, elevation_m)) in enumerate(legs):
        if set_up in (0, last):
            sights += [Sight(plate, intermediate_m=staff(set_up, z)) for plate, z in plates]
        foresight_m = staff(set_up, elevation_m)
        backsight_m = None if set_up == last else staff(set_up + 1, elevation_m)
        sights.append(Sight(name, backsight_m, foresight_m=foresight_m))
    return tuple(sights)
