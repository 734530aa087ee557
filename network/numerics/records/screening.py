"""Screening of a stage series: what looks wrong is found and named, nothing is edited."""

from collections.abc import Iterator
from dataclasses import dataclass
from itertools import pairwise

import numpy as np

from network.numerics.arrays import Floats, Seconds
from network.numerics.records.screening_findings import Finding, finding
from network.numerics.records.screening_rules import (
    DUST_M,
    USUAL_SETTINGS,
    Range,
    ScreeningSettings,
    furthest,
    gaps,
    movement_faults,
    range_faults,
    silences,
    stretches,
    time_faults,
)


@dataclass(frozen=True, eq=False)
class Series:
    """Instants in epoch seconds, rising, with stages in metres; wave: ± m of staff readings."""

    times_s: Seconds
    stage_m: Floats
    wave_m: Floats | None = None


def screen(
    times_s: Seconds,
    stage_m: Floats,
    *,
    settings: ScreeningSettings = USUAL_SETTINGS,
    plates_m: Range | None = None,
    sensor_m: Range | None = None,
    staff: Series | None = None,
    second: Series | None = None,
) -> tuple[Finding, ...]:
    """Find what looks wrong in a stage series.

    times_s, stage_m: readings as received, one length, epoch seconds and metres above station
    zero; a stage that is not a number counts as no reading. plates_m, sensor_m: lowest and highest
    stage they can show. staff, second: staff readings and the second series to compare with.
    Result: findings in order of their start; the rules stand at their functions. All but the time
    rule see the readings in order of time, of equal times the first received, and none looks
    across a gap. Raises ValueError when times and stages differ in length. Source: common practice.
    """
    if times_s.shape != stage_m.shape:
        raise ValueError("times and stages must be of one length")
    heard = np.isfinite(stage_m)
    times, first = np.unique(times_s[heard], return_index=True)
    recorder = Series(times, stage_m[heard][first])
    found = [*time_faults(times_s[heard]), *gaps(times, settings)]
    breaks = np.flatnonzero(silences(times, settings)) + 1
    for start, stop in pairwise((0, *breaks.tolist(), len(times))):
        if start < stop:
            piece = times[start:stop], recorder.stage_m[start:stop]
            found += movement_faults(*piece, settings)
            found += range_faults(*piece, kind="outside_plates", range_m=plates_m)
            found += range_faults(*piece, kind="outside_sensor", range_m=sensor_m)
    if staff is not None:
        found += _against_staff(recorder, staff, settings)
    if second is not None:
        found += _against_second(recorder, second, settings)
    return tuple(sorted(found, key=lambda one: (one.start_s, one.end_s)))


def _against_staff(
    recorder: Series, staff: Series, settings: ScreeningSettings
) -> Iterator[Finding]:
    """Recorder minus staff at each staff reading, beyond the limit, or the wave where larger."""
    differences = _stage_at(recorder, staff.times_s, settings) - staff.stage_m
    waves_m = np.zeros(len(staff.times_s)) if staff.wave_m is None else staff.wave_m
    limits_m = np.maximum(settings.staff_m, waves_m)
    for i in np.flatnonzero(np.abs(differences) > limits_m + DUST_M):
        at_s = staff.times_s[i]
        yield finding("staff", start_s=at_s, end_s=at_s, figure=differences[i], limit=limits_m[i])


def _against_second(
    recorder: Series, second: Series, settings: ScreeningSettings
) -> Iterator[Finding]:
    """Recorder minus second series at each reading of the recorder, beyond the limit."""
    differences = recorder.stage_m - _stage_at(second, recorder.times_s, settings)
    for i, j in stretches(np.abs(differences) > settings.series_m + DUST_M):
        yield finding(
            "second_series",
            start_s=recorder.times_s[i],
            end_s=recorder.times_s[j],
            figure=furthest(differences[i : j + 1]),
            limit=settings.series_m,
        )


def _stage_at(series: Series, at_s: Seconds, settings: ScreeningSettings) -> Floats:
    """Interpolate a series in time; not a number outside it and in its gaps."""
    if len(series.times_s) == 0:
        return np.full(len(at_s), np.nan)
    left = np.searchsorted(series.times_s, at_s, side="right") - 1
    inside = (at_s >= series.times_s[0]) & (at_s <= series.times_s[-1])
    bridged = np.append(~silences(series.times_s, settings), False)
    known = inside & (bridged[left] | (series.times_s[left] == at_s))
    return np.where(known, np.interp(at_s, series.times_s, series.stage_m), np.nan)
