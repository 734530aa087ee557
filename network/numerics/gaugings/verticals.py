"""Point velocities to the mean velocity in a vertical, with ice and oblique flow."""

from collections.abc import Iterable, Mapping
from dataclasses import dataclass
from enum import IntEnum

import numpy as np

from network.numerics.arrays import Bools, Floats, Indices

SURFACE = 0.0  # fractions of the effective depth, from the surface (or the ice) down
BED = 1.0


class Method(IntEnum):
    """Say how the mean velocity of a vertical was found; the values index the tables below."""

    SOUNDING = -1  # a depth without a velocity
    ONE_POINT = 0
    HALF_DEPTH = 1
    TWO_POINTS = 2
    THREE_POINTS = 3
    FIVE_POINTS = 4
    SIX_POINTS = 5
    SURFACE = 6
    GIVEN = 7


@dataclass(frozen=True)
class PointMethod:
    """A set of points: the weight of each fraction, and factors in open water and under ice.

    A factor that is not a number is no rule of the method: the agency's value in open water
    (surface), a refusal under ice.
    """

    method: Method
    weights: Mapping[float | None, float]
    factor: float = 1.0
    ice_factor: float = 1.0


# ISO 748, WMO-No. 1044 (weights and the factors of 0.5 depth: from memory); ice: ISO 9196.
_METHODS = (
    PointMethod(Method.ONE_POINT, {0.6: 1.0}, ice_factor=0.92),
    PointMethod(Method.HALF_DEPTH, {0.5: 1.0}, factor=0.95, ice_factor=0.88),
    # v = (v₂ + v₈)/2
    PointMethod(Method.TWO_POINTS, {0.2: 0.5, 0.8: 0.5}),
    # v = (v₂ + 2v₆ + v₈)/4
    PointMethod(Method.THREE_POINTS, {0.2: 0.25, 0.6: 0.5, 0.8: 0.25}),
    # v = (v_s + 3v₂ + 3v₆ + 2v₈ + v_b)/10
    PointMethod(Method.FIVE_POINTS, {SURFACE: 0.1, 0.2: 0.3, 0.6: 0.3, 0.8: 0.2, BED: 0.1}),
    # v = (v_s + 2v₂ + 2v₄ + 2v₆ + 2v₈ + v_b)/10
    PointMethod(
        Method.SIX_POINTS, {SURFACE: 0.1, 0.2: 0.2, 0.4: 0.2, 0.6: 0.2, 0.8: 0.2, BED: 0.1}
    ),
    PointMethod(Method.SURFACE, {SURFACE: 1.0}, factor=np.nan, ice_factor=np.nan),
    PointMethod(Method.GIVEN, {0.6: 1.0}),
)
_BY_FRACTIONS = {frozenset(m.weights): m for m in _METHODS if m.method != Method.GIVEN}
_FACTORS = np.array([m.factor for m in _METHODS])
_ICE_FACTORS = np.array([m.ice_factor for m in _METHODS])


def point_method(fractions: Iterable[float | None]) -> PointMethod | None:
    """Find the method that a set of points makes, whatever their order.

    fractions: of the effective depth, 0 at the surface and 1 at the bed. None for an unknown set.
    """
    return _BY_FRACTIONS.get(frozenset(fractions))


def method_factors(method: Indices, *, under_ice: Bools, surface_factor: float) -> Floats:
    """Give the factor on the weighted mean of each vertical.

    method intp[n] of Method, under_ice bool[n]; surface_factor: k of the surface velocity (0.86
    natural, 0.90 lined: USGS WSP 2175 p. 170). Not a number for a surface velocity under ice.
    """
    open_water = np.where(np.isnan(_FACTORS), surface_factor, _FACTORS)
    return np.where(under_ice, _ICE_FACTORS[method], open_water[method])


def mean_velocity_ms(
    point_velocity_ms: Floats,
    *,
    weight: Floats,
    vertical: Indices,
    factor: Floats,
    angle_deg: Floats,
) -> Floats:
    """Give the mean velocity of every vertical, at right angles to the section.

    point_velocity_ms, weight, vertical [m]: each point, its weight and its vertical's index;
    factor, angle_deg float64[n] per vertical. Result float64[n] in m/s; 0 without points.
    Source: ISO 748 (oblique flow: cosine of the angle to the normal of the section).
    """
    # v̄ = factor · cos(angle) · Σ wᵢ·vᵢ
    total = np.bincount(vertical, weights=weight * point_velocity_ms, minlength=len(factor))
    return np.asarray(total * factor * np.cos(np.radians(angle_deg)), dtype=np.float64)


def effective_depth_m(depth_m: Floats, ice_underside_m: Floats) -> Floats:
    """Give the depth of flowing water below the ice or slush.

    depth_m float64[n] from the water surface (in the hole) to the bed, ice_underside_m float64[n]
    from the water surface to the underside of ice or slush, 0 in open water. Source: ISO 9196.
    """
    return depth_m - ice_underside_m
