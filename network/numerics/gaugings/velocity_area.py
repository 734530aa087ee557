"""Depths and mean velocities across one channel to area and discharge, by both methods."""

from collections.abc import Sequence
from dataclasses import dataclass

import numpy as np

from network.numerics.arrays import Floats, Indices


@dataclass(frozen=True, eq=False)
class Panels:
    """Panels in the order of the section: ends of each in the distances' own scale, area, flow."""

    from_m: Floats
    to_m: Floats
    area_m2: Floats
    flow_m3s: Floats


@dataclass(frozen=True, eq=False)
class ChannelFlow:
    """Both discharges of a channel.

    verticals intp[k]: places of the velocity verticals among the given nodes; mid: one panel each;
    mean: k + 1 zones, the first and the last touching the banks.
    """

    verticals: Indices
    mid: Panels
    mean: Panels


@dataclass(frozen=True)
class Section:
    """The wetted section of one or several channels."""

    area_m2: float
    width_m: float
    greatest_depth_m: float
    wetted_perimeter_m: float

    @property
    def hydraulic_radius_m(self) -> float:
        """Give R = A / P, 0 without water."""
        return self.area_m2 / self.wetted_perimeter_m if self.area_m2 else 0.0


def section(distance_m: Floats, depth_m: Floats, ice_m: Floats) -> Section:
    """Measure the section of one channel from bank to bank.

    distance_m, depth_m (of flowing water), ice_m (underside of the ice below the surface, 0 in open
    water) float64[n]. Source: geometry; see section_area_m2 and wetted_perimeter_m.
    """
    return Section(
        area_m2=float(section_area_m2(distance_m, depth_m).sum()),
        width_m=float(abs(distance_m[-1] - distance_m[0])),
        greatest_depth_m=float(depth_m.max()),
        wetted_perimeter_m=wetted_perimeter_m(distance_m, depth_m, ice_m),
    )


def joined(sections: Sequence[Section]) -> Section:
    """Join the sections of several channels: sums, and the greatest depth of all."""
    return Section(
        area_m2=sum(s.area_m2 for s in sections),
        width_m=sum(s.width_m for s in sections),
        greatest_depth_m=max((s.greatest_depth_m for s in sections), default=0.0),
        wetted_perimeter_m=sum(s.wetted_perimeter_m for s in sections),
    )


def section_area_m2(distance_m: Floats, depth_m: Floats) -> Floats:
    """Give the area between each sounding and the next, float64[n − 1] in m² (trapezoids)."""
    return np.abs(distance_m[1:] - distance_m[:-1]) * (depth_m[1:] + depth_m[:-1]) / 2


def wetted_perimeter_m(distance_m: Floats, depth_m: Floats, ice_m: Floats) -> float:
    """Give the length of bed, walls and ice that the water touches.

    distance_m, depth_m (of flowing water), ice_m (underside of the ice below the surface, 0 in open
    water) float64[n] from bank to bank. A depth at a bank is a wall. Where either end of a stretch
    is under ice its underside counts. Source: geometry.
    """
    dx = distance_m[1:] - distance_m[:-1]
    bed_m = depth_m + ice_m
    # P = Σ √(Δx² + Δz²) + depth at both banks (+ the underside of the ice)
    bed = np.hypot(dx, bed_m[1:] - bed_m[:-1]).sum() + depth_m[0] + depth_m[-1]
    if not ice_m.any():
        return float(bed)
    covered = (ice_m[1:] > 0) | (ice_m[:-1] > 0)
    return float(bed + np.hypot(dx, ice_m[1:] - ice_m[:-1])[covered].sum())


def discharge(
    distance_m: Floats, depth_m: Floats, velocity_ms: Floats, edge_factors: tuple[float, float]
) -> ChannelFlow:
    """Compute the panels of the mid-section and the mean-section method.

    distance_m (rising or falling, equal at walls), depth_m, velocity_ms float64[n] from bank to
    bank; the first and the last node are the banks. A velocity that is not a number marks a
    sounding; at a bank it is then taken from edge_factors: k, the mean velocity of the edge zone
    over that of the nearest vertical. At least one node between the banks has a velocity.
    Source: ISO 748 (both methods). Edge zone: flow = k·v₁·A, so that the bank has (2k − 1)·v₁.
    Soundings refine the area of a zone; in the mid-section method that area is shared between its
    two verticals as their depths are, which without soundings is exactly vᵢ·dᵢ·|xᵢ₊₁ − xᵢ₋₁|/2
    (own rule: the standard is silent; a sounding on the straight line changes nothing).
    """
    known = ~np.isnan(velocity_ms)
    known[0] = known[-1] = True
    nodes = known.nonzero()[0]
    x, d, v = distance_m[nodes], depth_m[nodes], velocity_ms[nodes]
    for bank, nearest, k in ((0, 1, edge_factors[0]), (-1, -2, edge_factors[1])):
        if np.isnan(v[bank]):
            v[bank] = (2 * k - 1) * v[nearest]
    area = np.add.reduceat(section_area_m2(distance_m, depth_m), nodes[:-1])
    # mean-section: q = (vᵢ + vᵢ₊₁)/2 · A
    mean = Panels(x[:-1], x[1:], area, (v[:-1] + v[1:]) / 2 * area)
    return ChannelFlow(nodes[1:-1], _mid_section(x, d, v, area), mean)


def _mid_section(x: Floats, d: Floats, v: Floats, area: Floats) -> Panels:
    both = d[:-1] + d[1:]
    near = np.where(both > 0, d[:-1] / np.where(both > 0, both, 1), 0.5) * area
    share = np.zeros(len(x))
    share[:-1] += near
    share[1:] += area - near
    flow = v * share
    # The half panels at the banks belong to the nearest verticals.
    for values in (share, flow):
        values[1] += values[0]
        values[-2] += values[-1]
    middle = (x[:-1] + x[1:]) / 2
    middle[0], middle[-1] = x[0], x[-1]
    return Panels(middle[:-1], middle[1:], share[1:-1], flow[1:-1])
