"""The rows of a gauging sheet turned into depths and mean velocities."""

from dataclasses import dataclass

import numpy as np

from network.numerics.arrays import Bools, Floats
from network.numerics.gaugings.gauging_columns import Columns
from network.numerics.gaugings.gauging_input import GaugingSettings, Meter, Sheet
from network.numerics.gaugings.sounding_lines import corrected_depth_m
from network.numerics.gaugings.verticals import (
    Method,
    effective_depth_m,
    mean_velocity_ms,
    method_factors,
)
from network.numerics.meters.meter_rating import velocity


@dataclass(frozen=True, eq=False)
class Measured:
    """What was computed for all verticals [n] and all points [m] of the columns.

    depth_m: effective; velocity_ms: mean, not a number in a sounding; outside: point velocities
    from a rotor beyond the range of its calibration.
    """

    columns: Columns
    depth_m: Floats
    velocity_ms: Floats
    point_velocity_ms: Floats
    outside: Bools


def velocity_range_ms(meter: Meter, settings: GaugingSettings) -> tuple[float, float]:
    """Give the range in m/s in which a meter is trusted, the agency's where none is stated."""
    low, high = meter.lowest_ms, meter.highest_ms
    return (
        settings.lowest_velocity_ms if low is None else low,
        settings.highest_velocity_ms if high is None else high,
    )


def flowing_depth_m(c: Columns) -> Floats:
    """Give the depth of flowing water at every vertical, float64[n] in m, line corrected."""
    depth_m = corrected_depth_m(c.depth_m, angle_deg=c.line_angle_deg, air_line_m=c.air_line_m)
    return effective_depth_m(depth_m, c.ice_m)


def measure(sheet: Sheet, c: Columns, settings: GaugingSettings) -> Measured:
    """Turn counts into point velocities, and those into mean velocities of the verticals.

    sheet: for its meter; c: its columns without faults. Source: see meter_rating and verticals.
    """
    point_ms = c.point_velocity_ms.copy()
    outside = np.zeros(len(point_ms), dtype=np.bool_)
    counted = np.isfinite(c.revolutions)
    if sheet.meter is not None and counted.any():
        rated = velocity(
            c.revolutions[counted],
            c.seconds[counted],
            sheet.meter.pieces,
            valid_ms=velocity_range_ms(sheet.meter, settings),
        )
        point_ms[counted], outside[counted] = rated.velocity_ms, rated.outside
    has_velocity = c.method >= 0
    method = np.where(has_velocity, c.method, Method.GIVEN)
    factor = method_factors(method, under_ice=c.ice_m > 0, surface_factor=settings.surface_factor)
    mean_ms = mean_velocity_ms(
        point_ms, weight=c.weight, vertical=c.point_vertical, factor=factor, angle_deg=c.angle_deg
    )
    return Measured(
        c, flowing_depth_m(c), np.where(has_velocity, mean_ms, np.nan), point_ms, outside
    )
