"""Turns an invented flow into the record a real recorder would have left: ice, faults, gaps."""

from collections.abc import Sequence
from dataclasses import dataclass

import numpy as np

from network.numerics.arrays import Bools, Floats, Seconds
from network.numerics.ratings.rating import RatingPeriod, ShiftTable
from network.numerics.synthetic.basin import stream


@dataclass(frozen=True)
class Fault:
    """An error of the recorder, straight from its start to its end and nil outside (m).

    A drift starts at 0; a step has the same error at both ends.
    """

    start_s: int
    end_s: int
    start_m: float
    end_m: float


@dataclass(frozen=True)
class IceSpell:
    """A period of ice cover and the most backwater (m) it causes."""

    start_s: int
    end_s: int
    greatest_m: float


def stage_of_flow(time_s: Seconds, flow_m3s: Floats, *, periods: Sequence[RatingPeriod]) -> Floats:
    """Return the stage (m) that the rating in force turns into each flow: the inverse of rating.

    The curve holds beyond its range of use. Stages before the first period, or where none is in
    force, are not a number. Shifts are found by three rounds, exact to some hundredths of a
    millimetre for the gentle shifts of practice. Source: numerics.ratings.rating, turned round.
    """
    stage_m = np.full(time_s.size, np.nan)
    starts = [*(period.start_s for period in periods), time_s[-1] + 1]
    for period, end_s in zip(periods, starts[1:], strict=True):
        here = slice(*np.searchsorted(time_s, (period.start_s, end_s)))
        if period.curve is None or here.start == here.stop:
            continue
        unshifted_m = period.curve.stage_at(flow_m3s[here])
        part_m = unshifted_m
        for _ in range(3 if period.shifts else 0):
            part_m = unshifted_m - _shift(time_s[here], part_m, tables=period.shifts)
        stage_m[here] = part_m
    return stage_m


def _shift(time_s: Seconds, stage_m: Floats, *, tables: Sequence[ShiftTable]) -> Floats:
    shift_m = np.zeros(time_s.size)
    for table, following in zip(tables, [*tables[1:], None], strict=True):
        end_s = following.start_s if following else time_s[-1] + 1
        here = slice(*np.searchsorted(time_s, (table.start_s, end_s)))
        shift_m[here] = table.at(stage_m[here])
        if following and table.linear_to_next:
            passed = (time_s[here] - table.start_s) / (end_s - table.start_s)
            shift_m[here] += passed * (following.at(stage_m[here]) - shift_m[here])
    return shift_m


def ice_backwater(
    time_s: Seconds, *, spells: Sequence[IceSpell], seed: int, station: str
) -> Floats:
    """Return the rise of stage (m) under ice: growth, a restless cover, a jam, the break-up.

    Nil outside the spells. Source: own shape after what ice records commonly show.
    """
    backwater_m = np.zeros(time_s.size)
    for spell in spells:
        here = slice(*np.searchsorted(time_s, (spell.start_s, spell.end_s)))
        at = (time_s[here] - spell.start_s) / (spell.end_s - spell.start_s)
        # slow waves of slush and frazil on the cover, two per tenth of the spell at most
        knots = stream(seed, f"{station} ice {spell.start_s}").normal(0.0, 0.07, 20)
        cover = 0.62 * (1 - np.exp(-at / 0.18)) * (1 + np.interp(at, np.linspace(0, 1, 20), knots))
        jam = 0.38 * np.exp(-(((at - 0.94) / 0.018) ** 2))
        gone = np.clip((1 - at) / 0.04, 0.0, 1.0)
        backwater_m[here] += spell.greatest_m * (cover + jam) * gone
    return backwater_m


def recorder_error(time_s: Seconds, *, faults: Sequence[Fault]) -> Floats:
    """Return the recorder's error (m) at each time: the faults in force, added."""
    error_m = np.zeros(time_s.size)
    for fault in faults:
        inside = (time_s >= fault.start_s) & (time_s < fault.end_s)
        share = (time_s[inside] - fault.start_s) / (fault.end_s - fault.start_s)
        error_m[inside] += fault.start_m + share * (fault.end_m - fault.start_m)
    return error_m


def recorder_noise(size: int, *, sd_m: float, seed: int, name: str) -> Floats:
    """Return the sensor's noise (m), independent from reading to reading."""
    return stream(seed, f"{name} noise").normal(0.0, sd_m, size)


def kept(time_s: Seconds, *, gaps: Sequence[tuple[int, int]]) -> Bools:
    """Return which readings were kept: those outside every gap [start, end)."""
    keep = np.ones(time_s.size, dtype=np.bool_)
    for start_s, end_s in gaps:
        keep &= (time_s < start_s) | (time_s >= end_s)
    return keep


def raw_values(stage_m: Floats, *, scale: float, offset_m: float, resolution: float) -> Floats:
    """Return what the recorder writes for a stage: stage = scale × raw + offset, rounded."""
    if not scale:
        raise ValueError("scale must not be nil")
    raw: Floats = np.rint((stage_m - offset_m) / scale / resolution) * resolution
    return raw
