"""Uncertainty of a discharge from verticals, by the tables of ISO 748:2007."""

import math
from bisect import bisect_left
from dataclasses import dataclass

import numpy as np

from network.numerics.arrays import Bools, Floats, Indices
from network.numerics.gaugings.gauging_input import GaugingSettings
from network.numerics.gaugings.verticals import Method
from network.numerics.sentences import gettext_noop

# Standard uncertainties in %, ISO 748:2007 as printed in Morgenschweis, Hydrometrie (2010),
# tables 4.8 to 4.13. Linear between the entries, ends clamped.
VERTICALS = np.array([5, 10, 15, 20, 25, 30, 35, 40, 45], float)
U_VERTICALS = np.array([7.5, 4.5, 3.0, 2.5, 2.0, 1.5, 1.0, 1.0, 1.0])
WIDTHS_M = (100.0, 150.0)  # up to 100, up to 150, beyond
U_WIDTH = (0.15, 0.20, 0.25)
SHALLOW_M, DEEP_M = 0.4, 6.0
U_DEPTH_ROD, U_DEPTH_LINE = 0.65, 0.25
U_ONE_POINT, U_TWO_POINTS, U_FIVE_POINTS, U_SURFACE = 7.5, 3.5, 2.5, 15.0
METER_MS = np.array([0.03, 0.10, 0.15, 0.25, 0.50, 1.0])
# The last figure of the table ("above 0.50") is reached at 1 m/s, our reading of a banded entry.
U_METER_SINGLE = np.array([10, 2.5, 1.25, 1.0, 0.5, 0.5])
U_METER_GROUP = np.array([10, 5.0, 2.5, 2.0, 1.5, 1.0])
EXPOSURE_S = np.array([30, 60, 120, 180], float)
EXPOSURE_MS = np.array([0.05, 0.1, 0.2, 0.3, 0.4, 0.5, 1.0])
_LOW_SPEED_ALIKE = [[5, 4, 3, 3], [4, 3, 3, 3], [4, 3, 3, 2], [4, 3, 3, 2]]
U_EXPOSURE = np.array(
    [
        # points at 0.2 to 0.6 of the depth, then at 0.8 to 0.9
        [[25, 20, 15, 10], [14, 11, 8, 7], [8, 6, 5, 4], *_LOW_SPEED_ALIKE],
        [[40, 30, 25, 20], [17, 14, 10, 8], [9, 7, 5, 4], *_LOW_SPEED_ALIKE],
    ],
    dtype=np.float64,
)

SHALLOW = gettext_noop("depth under 0.4 m")
THREE = gettext_noop("three points in a vertical")
SIX = gettext_noop("six points in a vertical")
ICE = gettext_noop("points under ice")
GIVEN = gettext_noop("mean velocity given directly")
EXPOSURE = gettext_noop("exposure time not stated")


@dataclass(frozen=True)
class Uncertainty:
    """Standard uncertainties of the discharge in %, by cause; their squares add up to u².

    u_percent and u95_percent (k = 2) are None at zero flow; u95_m3s stands always. agency_values:
    where the standard's tables say nothing and a value of the agency stands.
    """

    verticals_percent: float
    systematic_percent: float
    width_percent: float | None
    depth_percent: float | None
    points_percent: float | None
    meter_percent: float | None
    exposure_percent: float | None
    u_percent: float | None
    u95_percent: float | None
    u95_m3s: float
    agency_values: tuple[str, ...] = ()


def combine(
    flow_m3s: Floats,
    *,
    verticals_percent: float,
    systematic_percent: float,
    random_percent: Floats,
    agency_values: tuple[str, ...] = (),
) -> Uncertainty:
    """Combine the uncertainties of the panels and of the whole.

    flow_m3s float64[n] of the verticals' panels, their sum the discharge; random_percent
    float64[5, n]: width, depth, points, meter and exposure, the last two divided by √(number of
    points) already.
    Result in % and m³/s. Source: ISO 748:2007, equation of u(Q).
    """
    total = abs(float(flow_m3s.sum()))
    # Σ qᵢ²·u² for each cause, in (m³/s · %)²
    causes = (random_percent**2 @ flow_m3s**2).tolist()
    whole = (verticals_percent**2 + systematic_percent**2) * total**2
    # u(Q)² = u_m² + u_s² + Σ qᵢ²(u_b² + u_d² + u_p² + (u_c² + u_e²)/nᵢ) / (Σ qᵢ)²
    u = math.sqrt(whole + sum(causes))
    width, depth, points, meter, exposure = (
        math.sqrt(c) / total if total else None for c in causes
    )
    u_percent = u / total if total else None
    return Uncertainty(
        verticals_percent,
        systematic_percent,
        width,
        depth,
        points,
        meter,
        exposure,
        u_percent,
        None if u_percent is None else 2 * u_percent,
        2 * u / 100,
        agency_values,
    )


def verticals_percent(count: int) -> float:
    """Give u_m for a number of verticals. Source: ISO 748:2007."""
    return float(np.interp(count, VERTICALS, U_VERTICALS))


def width_percent(width_m: float) -> float:
    """Give u_b for the width of the section in m. Source: ISO 748:2007."""
    return U_WIDTH[bisect_left(WIDTHS_M, width_m)]


def depth_percent(depth_m: Floats, shallow_percent: float) -> Floats:
    """Give u_d by depth float64[n] in m; shallow_percent is the agency's under 0.4 m."""
    u = np.where(depth_m < DEEP_M, U_DEPTH_ROD, U_DEPTH_LINE)
    u[depth_m < SHALLOW_M] = shallow_percent
    return u


def points_percent(method: Indices, under_ice: Bools, settings: GaugingSettings) -> Floats:
    """Give u_p by method intp[n] of Method; three, six, given and ice are agency values."""
    table = np.array(
        [
            *(U_ONE_POINT, U_ONE_POINT, U_TWO_POINTS, settings.three_points_percent),
            *(U_FIVE_POINTS, settings.six_points_percent, U_SURFACE, settings.given_mean_percent),
        ]
    )
    if not under_ice.any():
        return table[method]
    ice = np.where(
        method <= Method.HALF_DEPTH,
        settings.ice_one_point_percent,
        settings.ice_more_points_percent,
    )
    return np.where(under_ice, ice, table[method])


def meter_percent(velocity_ms: Floats, *, calibrated_singly: bool) -> Floats:
    """Give u_c by point velocity float64[m] in m/s; otherwise by a group rating."""
    table = U_METER_SINGLE if calibrated_singly else U_METER_GROUP
    return np.asarray(np.interp(np.abs(velocity_ms), METER_MS, table), dtype=np.float64)


def exposure_percent(velocity_ms: Floats, seconds: Floats, fraction: Floats) -> Floats:
    """Give u_e by point velocity in m/s, exposure in s and fraction of the depth, float64[m]."""
    v = np.minimum(np.maximum(np.abs(velocity_ms), EXPOSURE_MS[0]), EXPOSURE_MS[-1])
    t = np.minimum(np.maximum(seconds, EXPOSURE_S[0]), EXPOSURE_S[-1])
    i = np.minimum(np.searchsorted(EXPOSURE_MS, v, side="right") - 1, len(EXPOSURE_MS) - 2)
    j = np.minimum(np.searchsorted(EXPOSURE_S, t, side="right") - 1, len(EXPOSURE_S) - 2)
    low = (fraction > 0.6).astype(np.intp)
    a = (v - EXPOSURE_MS[i]) / (EXPOSURE_MS[i + 1] - EXPOSURE_MS[i])
    b = (t - EXPOSURE_S[j]) / (EXPOSURE_S[j + 1] - EXPOSURE_S[j])
    slower = U_EXPOSURE[low, i, j] * (1 - b) + U_EXPOSURE[low, i, j + 1] * b
    faster = U_EXPOSURE[low, i + 1, j] * (1 - b) + U_EXPOSURE[low, i + 1, j + 1] * b
    return np.asarray(slower * (1 - a) + faster * a, dtype=np.float64)


def agency_values(
    depth_m: Floats, method: Indices, *, under_ice: Bools, seconds: Floats
) -> tuple[str, ...]:
    """Name the cases of a gauging in which the standard's tables say nothing."""
    used = set(method.tolist())
    cases = (
        (SHALLOW, (depth_m < SHALLOW_M).any()),
        (THREE, Method.THREE_POINTS in used),
        (SIX, Method.SIX_POINTS in used),
        (GIVEN, Method.GIVEN in used),
        (ICE, under_ice.any()),
        (EXPOSURE, np.isnan(seconds).any()),
    )
    return tuple(name for name, holds in cases if holds)
