"""The part of an unfinished gauging sheet that can already be computed."""

from collections.abc import Sequence
from dataclasses import replace

import numpy as np

from network.numerics.gaugings.gauging_columns import Columns
from network.numerics.gaugings.gauging_faults import Fault
from network.numerics.gaugings.gauging_input import EDGE_FACTORS, Edge, Sheet

# A fault in one of these spoils the sounding; any other fault of a row only its velocity.
OF_THE_SOUNDING = {"distance_m", "depth_m", "ice_underside_m", "line_angle_deg", "air_line_m"}


def faultless_part(
    sheet: Sheet, columns: Columns, faults: Sequence[Fault]
) -> tuple[Sheet, Columns]:
    """Leave out what is at fault and keep every other row in its place.

    A bank at fault moves to the nearest vertical. Source: common practice.
    """
    spoilt = np.zeros(len(columns.method), dtype=np.bool_)
    speechless = np.zeros(len(columns.method), dtype=np.bool_)
    for fault in faults:
        if fault.channel is not None and fault.field in OF_THE_SOUNDING:
            spoilt[_rows(columns, fault)] = True
        elif fault.vertical is not None:
            speechless[_rows(columns, fault)] = True
        elif fault.field == "meter":
            speechless[columns.point_vertical[np.isfinite(columns.revolutions)]] = True
        elif fault.field == "stages":
            sheet = replace(sheet, stages=())
        elif fault.field == "ended_s":
            sheet = replace(sheet, ended_s=None)
    columns = columns.without(verticals=spoilt, velocities=speechless)
    return sheet, _with_banks(columns, {(f.channel, f.field) for f in faults})


def _rows(columns: Columns, fault: Fault) -> slice:
    assert fault.channel is not None
    rows = columns.of_channel(fault.channel)
    if fault.vertical is None:
        return rows
    return slice(rows.start + fault.vertical, rows.start + fault.vertical + 1)


def _with_banks(columns: Columns, named: set[tuple[int | None, str]]) -> Columns:
    distance_m = columns.bank_distance_m.copy()
    depth_m = columns.bank_depth_m.copy()
    factor = columns.bank_factor.copy()
    velocity_ms = columns.bank_velocity_ms.copy()
    for channel in range(len(distance_m)):
        rows = columns.of_channel(channel)
        x = columns.distance_m[rows][columns.used[rows]]
        for end, bank in enumerate(("first_bank", "last_bank")):
            if (channel, f"{bank}.distance_m") in named:
                distance_m[channel, end] = x[-end] if len(x) else 0.0
                depth_m[channel, end] = 0.0
            if (channel, f"{bank}.depth_m") in named:
                depth_m[channel, end] = 0.0
            if (channel, f"{bank}.factor") in named:
                factor[channel, end] = EDGE_FACTORS[Edge.SLOPING]
            if (channel, f"{bank}.velocity_ms") in named:
                velocity_ms[channel, end] = np.nan
    return replace(
        columns,
        bank_distance_m=distance_m,
        bank_depth_m=depth_m,
        bank_factor=factor,
        bank_velocity_ms=velocity_ms,
    )
