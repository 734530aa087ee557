"""Depth under a weight that the current carries downstream: air-line and wet-line corrections."""

import numpy as np

from network.numerics.arrays import Floats

# Angle from the vertical in degrees and wet-line correction in % of the wet length: the usual
# table of stream gauging (Coon & Futrell 1986, USGS WRI 85-4329, discuss it); from memory.
WET_LINE_ANGLES_DEG = np.array([0, 4, 6, 8, 10, 12, 14, 16, 18, 20, 22, 24, 26, 28, 30], float)
WET_LINE_PERCENT = np.array(
    [0, 0.06, 0.16, 0.32, 0.50, 0.72, 0.98, 1.28, 1.64, 2.04, 2.48, 2.96, 3.50, 4.08, 4.72]
)
LARGEST_ANGLE_DEG = 30.0


def air_line_correction_m(air_line_m: Floats, angle_deg: Floats) -> Floats:
    """Give how much longer the inclined line above the water is than the vertical one.

    air_line_m float64[n]: vertical height of the guide point above the water; angle_deg float64[n]
    from the vertical. Result in metres. Source: geometry (secant of the angle).
    """
    # K = L·(sec θ − 1)
    return air_line_m * (1 / np.cos(np.radians(angle_deg)) - 1)


def wet_line_percent(angle_deg: Floats) -> Floats:
    """Give the wet-line correction in % of the wet length.

    angle_deg float64[n], 0 to 30, from the vertical at the water surface. Linear between the
    entries. Source: the usual table, from memory; it holds for a sounding weight in a current
    whose drag at the bed is small.
    """
    table = np.interp(angle_deg, WET_LINE_ANGLES_DEG, WET_LINE_PERCENT)
    return np.asarray(table, dtype=np.float64)


def corrected_depth_m(sounded_m: Floats, *, angle_deg: Floats, air_line_m: Floats) -> Floats:
    """Give the depth from the length of line paid out below the water surface.

    sounded_m float64[n]: reading of a counter set to zero with the weight at the water surface
    straight below the guide point; angle_deg float64[n] of the line, air_line_m float64[n] height
    of the guide point. Result in metres; with an angle of 0 it is the reading itself.
    Source: common practice of sounding from bridges and cableways.
    """
    # wet length = reading − K;  depth = wet length · (1 − k/100)
    wet_m = sounded_m - air_line_correction_m(air_line_m, angle_deg)
    return wet_m * (1 - wet_line_percent(angle_deg) / 100)
