"""A gauging sheet laid out in columns, so that it can be checked and computed as arrays."""

from dataclasses import dataclass, replace
from functools import lru_cache
from operator import attrgetter

import numpy as np

from network.numerics.arrays import Bools, Floats, Indices
from network.numerics.gaugings.gauging_input import Bank, GaugingSettings, Point, Sheet, Vertical
from network.numerics.gaugings.verticals import Method, point_method

UNKNOWN_SET = -2  # points that make no method
LARGEST = 1e12  # far beyond any value of a sheet, epoch seconds included
GIVEN_TWICE = -3  # points and a mean velocity
_SOUNDING_CELLS = attrgetter(
    *("distance_m", "depth_m", "angle_deg", "ice_underside_m"),
    *("line_angle_deg", "air_line_m", "time_s"),
)
_POINT_CELLS = attrgetter("fraction", "velocity_ms", "revolutions", "seconds")
_FRACTION = attrgetter("fraction")


@dataclass(frozen=True, eq=False)
class Columns:
    """All verticals of all channels in order, all points in order, two banks a channel.

    Blank cells are not a number. used: the verticals that take part (all of a faultless sheet).
    A mean velocity given directly stands as one point of its vertical.
    """

    channel: Indices
    first_of_channel: Indices  # with the number of verticals at the end
    distance_m: Floats
    depth_m: Floats
    angle_deg: Floats
    ice_m: Floats
    line_angle_deg: Floats
    air_line_m: Floats
    time_s: Floats
    method: Indices
    used: Bools
    point_vertical: Indices
    fraction: Floats
    point_velocity_ms: Floats
    revolutions: Floats
    seconds: Floats
    weight: Floats
    bank_distance_m: Floats  # [channels, 2]
    bank_depth_m: Floats
    bank_velocity_ms: Floats
    bank_factor: Floats

    def of_channel(self, channel: int) -> slice:
        """Give the places of a channel's verticals."""
        return slice(*self.first_of_channel[channel : channel + 2].tolist())

    def place(self, vertical: int) -> tuple[int, int]:
        """Give the channel of a vertical and its place in it, from 0."""
        channel = int(self.channel[vertical])
        return channel, vertical - int(self.first_of_channel[channel])

    def point_place(self, point: int) -> int:
        """Give the place of a point within its vertical, from 0."""
        vertical = self.point_vertical[point]
        return point - int(np.searchsorted(self.point_vertical, vertical))

    def without(self, *, verticals: Bools, velocities: Bools) -> "Columns":
        """Leave out some verticals, and turn others into soundings."""
        points = ~(verticals | velocities)[self.point_vertical]
        kept = {
            name: getattr(self, name)[points]
            for name in (
                *("point_vertical", "fraction", "point_velocity_ms"),
                *("revolutions", "seconds", "weight"),
            )
        }
        method = np.where(verticals | velocities, Method.SOUNDING, self.method)
        return replace(self, used=self.used & ~verticals, method=method, **kept)


def lay_out(sheet: Sheet, settings: GaugingSettings) -> Columns:
    """Lay a sheet out in columns; nothing is checked, an unknown set of points is marked.

    A number no river can give (beyond LARGEST) counts as a blank cell.
    """
    verticals = [v for c in sheet.channels for v in c.verticals]
    counts = [len(c.verticals) for c in sheet.channels]
    rows = np.array([*map(_SOUNDING_CELLS, verticals)], dtype=np.float64).reshape(-1, 7).T
    method, weight, owner, points = _points(verticals)
    cells = np.array([*map(_POINT_CELLS, points)], dtype=np.float64).reshape(-1, 4).T
    banks = [[_bank(b, settings) for b in (c.first_bank, c.last_bank)] for c in sheet.channels]
    bank = np.array(banks, dtype=np.float64).reshape(-1, 2, 4)
    for numbers in (rows, cells, bank[:, :, :2]):
        numbers[np.abs(numbers) > LARGEST] = np.nan
    first = np.zeros(len(counts) + 1, dtype=np.intp)
    first[1:] = np.cumsum(counts)
    return Columns(
        channel=np.repeat(np.arange(len(counts)), counts),
        first_of_channel=first,
        distance_m=rows[0],
        depth_m=rows[1],
        angle_deg=rows[2],
        ice_m=rows[3],
        line_angle_deg=rows[4],
        air_line_m=rows[5],
        time_s=rows[6],
        method=np.array(method, dtype=np.intp),
        used=np.ones(len(verticals), dtype=np.bool_),
        point_vertical=np.array(owner, dtype=np.intp),
        fraction=cells[0],
        point_velocity_ms=cells[1],
        revolutions=cells[2],
        seconds=cells[3],
        weight=np.array(weight, dtype=np.float64),
        bank_distance_m=bank[:, :, 0],
        bank_depth_m=bank[:, :, 1],
        bank_velocity_ms=bank[:, :, 2],
        bank_factor=bank[:, :, 3],
    )


def _bank(bank: Bank, settings: GaugingSettings) -> tuple[float | None, ...]:
    factor = settings.edge_factors[bank.edge] if bank.factor is None else bank.factor
    return (bank.distance_m, bank.depth_m, bank.velocity_ms, factor)


def _points(verticals: list[Vertical]) -> tuple[list[int], list[float], list[int], list[Point]]:
    """Give the method of each vertical, and weight, vertical and cells of each point."""
    methods: list[int] = []
    weights: list[float] = []
    owners: list[int] = []
    points: list[Point] = []
    for i, vertical in enumerate(verticals):
        if vertical.points:
            method, weight = _method_of(tuple(map(_FRACTION, vertical.points)))
            methods.append(GIVEN_TWICE if vertical.mean_velocity_ms is not None else method)
            weights += weight
            owners += [i] * len(vertical.points)
            points += vertical.points
        elif vertical.mean_velocity_ms is not None:
            methods.append(Method.GIVEN)
            weights.append(1.0)
            owners.append(i)
            points.append(Point(0.6, vertical.mean_velocity_ms))
        else:
            methods.append(Method.SOUNDING)
    return methods, weights, owners, points


@lru_cache(maxsize=256)  # a sheet repeats a few sets in all its verticals
def _method_of(fractions: tuple[float | None, ...]) -> tuple[int, tuple[float, ...]]:
    found = point_method(fractions)
    if found is None or len(found.weights) != len(fractions):
        return UNKNOWN_SET, (0.0,) * len(fractions)
    return found.method, tuple(found.weights[f] for f in fractions)
