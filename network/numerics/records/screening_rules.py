"""Rules that screen one stage series: time, movement and range."""

from collections.abc import Iterator
from dataclasses import dataclass

import numpy as np

from network.numerics.arrays import Bools, Floats, Seconds
from network.numerics.records.screening_findings import Finding, Kind, finding

Range = tuple[float, float]

# Stages come to a tenth of a millimetre; this keeps binary dust from deciding a verdict.
DUST_M = 1e-8

WIDEST_SPIKE = 3  # readings
JUMP_TO_MOVE = 4  # a jump is so many times what the stage moves beside it


@dataclass(frozen=True)
class ScreeningSettings:
    """Limits of a series; the defaults are common practice for 5 to 60 minute readings."""

    gap_limit_s: int = 7_200
    event_logger: bool = False  # writes only when the stage moves: silence is not a gap
    spike_m: float = 0.10
    step_m: float = 0.20
    flat_s: int = 86_400
    rate_m_h: float = 1.0
    least_change_m: float = 0.10
    staff_m: float = 0.02
    series_m: float = 0.03


USUAL_SETTINGS = ScreeningSettings()


def time_faults(received: Seconds) -> Iterator[Finding]:
    """Find readings not later than the one received before them: duplicate or backward times."""
    steps = np.diff(received)
    for i in np.flatnonzero(steps <= 0):
        kind: Kind = "duplicate_time" if steps[i] == 0 else "backward_time"
        yield finding(kind, start_s=received[i + 1], end_s=received[i], figure=-steps[i], limit=0)


def silences(times_s: Seconds, settings: ScreeningSettings) -> Bools:
    """Tell for each interval whether it is a gap; an event logger's silence is none."""
    return (np.diff(times_s) > settings.gap_limit_s) & (not settings.event_logger)


def gaps(times_s: Seconds, settings: ScreeningSettings) -> Iterator[Finding]:
    """Find intervals longer than the gap limit without a reading."""
    for i in np.flatnonzero(silences(times_s, settings)):
        start_s, end_s = times_s[i], times_s[i + 1]
        limit_s = settings.gap_limit_s
        yield finding("gap", start_s=start_s, end_s=end_s, figure=end_s - start_s, limit=limit_s)


def stretches(mask: Bools) -> Iterator[tuple[int, int]]:
    """Yield the first and last index of every stretch of true values."""
    edges = np.flatnonzero(np.diff(np.concatenate(([False], mask, [False])).astype(np.int8)))
    yield from zip(edges[::2].tolist(), (edges[1::2] - 1).tolist(), strict=True)


def furthest(values: Floats) -> float:
    """Return the value furthest from 0, with its sign."""
    return float(values[np.argmax(np.abs(values))])


def movement_faults(
    times_s: Seconds, stage_m: Floats, settings: ScreeningSettings
) -> Iterator[Finding]:
    """Find flat lines, spikes, steps and fast changes in one stretch without gaps."""
    yield from _flat_lines(times_s, stage_m, settings)
    departure_m, spike = _spikes(stage_m, settings.spike_m)
    for i, j in stretches(spike):
        yield finding(
            "spike",
            start_s=times_s[i],
            end_s=times_s[j],
            figure=furthest(departure_m[i : j + 1]),
            limit=settings.spike_m,
        )
    times_s, stage_m = times_s[~spike], stage_m[~spike]
    moves_m = np.diff(stage_m)
    step = _steps(moves_m, settings.step_m)
    for at in np.flatnonzero(step):
        yield finding(
            "step",
            start_s=times_s[at],
            end_s=times_s[at + 1],
            figure=moves_m[at],
            limit=settings.step_m,
        )
    yield from _fast_changes(times_s, np.where(step, 0.0, moves_m), settings)


def _flat_lines(
    times_s: Seconds, stage_m: Floats, settings: ScreeningSettings
) -> Iterator[Finding]:
    """The very same stage for longer than the limit."""
    for i, j in stretches(np.abs(np.diff(stage_m)) < DUST_M):
        start_s, end_s, limit_s = times_s[i], times_s[j + 1], settings.flat_s
        if end_s - start_s > limit_s:
            lasts_s = end_s - start_s
            yield finding("flat_line", start_s=start_s, end_s=end_s, figure=lasts_s, limit=limit_s)


def _spikes(stage_m: Floats, limit_m: float) -> tuple[Floats, Bools]:
    """Up to three readings beyond both the one before and the one after by more than the limit.

    They must also jump four times as far as the stage moves from one reading to the next around
    them, so that the sharp peak of a flood stays silent.
    """
    count = len(stage_m)
    padded = np.pad(stage_m, 2, mode="edge")
    departure_m, spike = np.zeros(count), np.zeros(count, dtype=np.bool_)
    for width in range(1, min(WIDEST_SPIKE, count) + 1):
        starts = count - width + 1
        inside = np.lib.stride_tricks.sliding_window_view(stage_m, width)
        before, after = padded[1 : 1 + starts], padded[width + 2 : width + 2 + starts]
        above = inside.min(axis=1) - np.maximum(before, after)
        below = np.minimum(before, after) - inside.max(axis=1)
        moves = (
            np.abs(before - padded[:starts]),
            np.abs(after - padded[width + 3 : width + 3 + starts]),
            np.abs(after - before) / (width + 1),
        )
        least_m = np.maximum(limit_m + DUST_M, JUMP_TO_MOVE * np.maximum.reduce(moves))
        for i in np.flatnonzero(np.maximum(above, below) > least_m):
            spike[i : i + width] = True
            departure_m[i : i + width] = inside[i] - (before[i] + after[i]) / 2
    return departure_m, spike


def _steps(moves_m: Floats, limit_m: float) -> Bools:
    """A jump beyond the limit, at least four times what the intervals on either side move."""
    size = np.abs(moves_m)
    beside = np.pad(size, 1)
    quiet = JUMP_TO_MOVE * np.maximum(beside[:-2], beside[2:]) <= size
    jump: Bools = (size > limit_m + DUST_M) & quiet
    return jump


def _fast_changes(
    times_s: Seconds, moves_m: Floats, settings: ScreeningSettings
) -> Iterator[Finding]:
    """Rising or falling faster than the limit, all in all by at least the least change."""
    rates_m_h = 3600 * moves_m / np.diff(times_s)
    for rising in (1, -1):
        for i, j in stretches(rising * rates_m_h > settings.rate_m_h + DUST_M):
            if abs(moves_m[i : j + 1].sum()) >= settings.least_change_m - DUST_M:
                yield finding(
                    "rate_of_rise",
                    start_s=times_s[i],
                    end_s=times_s[j + 1],
                    figure=furthest(rates_m_h[i : j + 1]),
                    limit=settings.rate_m_h,
                )


def range_faults(
    times_s: Seconds, stage_m: Floats, *, kind: Kind, range_m: Range | None
) -> Iterator[Finding]:
    """Find stretches below or above a range; the reading furthest out is the figure."""
    for sign, limit_m in zip((-1, 1), range_m or (), strict=False):
        beyond_m = sign * (stage_m - limit_m)
        for i, j in stretches(beyond_m > DUST_M):
            yield finding(
                kind,
                start_s=times_s[i],
                end_s=times_s[j],
                figure=stage_m[i + np.argmax(beyond_m[i : j + 1])],
                limit=limit_m,
            )
