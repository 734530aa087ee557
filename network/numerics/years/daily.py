"""Flows or stages at readings to daily means and extremes, with what each day covers."""

from dataclasses import dataclass
from datetime import date

import numpy as np

from network.numerics.arrays import Floats, Indices, MarkBits, Seconds
from network.numerics.marks import Mark

DAYS_AT_ONCE = 192  # so that the arrays between stay in the cache
DAY_S = 86_400
NO_TIME_S = int(np.iinfo(np.int64).min)  # numpy's NaT when seen as datetime64[s]


@dataclass(frozen=True, eq=False)
class Days:
    """Daily means, one row a day: mean float64 in the unit of the readings, NaN where missing;
    covered_s and missing_s int64, together the day; marks uint8."""

    mean: Floats
    covered_s: Seconds
    missing_s: Seconds
    marks: MarkBits


@dataclass(frozen=True, eq=False)
class DailyExtremes:
    """The lowest and highest reading of each day and the time of the first of equals.

    NaN and NO_TIME_S on a day without a reading.
    """

    lowest: Floats
    lowest_time_s: Seconds
    highest: Floats
    highest_time_s: Seconds


def day_starts(
    first_date: date, n_days: int, *, utc_offset_minutes: int, day_starts_at_hour: int = 0
) -> Seconds:
    """Give the n_days + 1 instants between days on the record clock: int64 epoch seconds UTC.

    A day carries the date on which it starts; the clock is a fixed offset, so all days are equal.
    """
    first_day = (first_date - date(1970, 1, 1)).days
    first_s = first_day * DAY_S + day_starts_at_hour * 3600 - utc_offset_minutes * 60
    return first_s + DAY_S * np.arange(n_days + 1, dtype=np.int64)


def daily_means(
    times_s: Seconds,
    values: Floats,
    *,
    marks: MarkBits,
    edges_s: Seconds,
    gap_limit_s: int,
    least_covered: float = 0.8,
) -> Days:
    """Integrate a record by trapezoid from day start to day end.

    times_s int64[n], never falling (an instant may stand twice, as in rating.Rated); values
    float64[n]; marks uint8[n]; edges_s int64[days + 1] from day_starts(). Values are interpolated
    at both ends of the day. A step longer than gap_limit_s or with NaN at an end is not bridged.
    The mean is that of the time covered. A day counts when least_covered of it is covered, else it
    is NaN and MISSING; it is PARTIAL when more than gap_limit_s of it is missing. It carries the
    marks of the readings inside it. A day depends only on the readings in it and the one on either
    side, and is equal to the last bit however long the record is.
    Source: common practice; checked against published unit values and daily means (USGS).
    """
    lengths_s = np.diff(edges_s)
    day_areas, covered_s = np.zeros(len(lengths_s)), np.zeros(len(lengths_s), np.int64)
    if len(times_s):
        after = np.searchsorted(times_s, edges_s)  # the first reading at or after each edge
        at_edge = _values_at(edges_s, times_s, values, after=after, gap_limit_s=gap_limit_s)
        between, broken = _between(times_s, values, after=after, gap_limit_s=gap_limit_s)
        day_areas = _with_ends(
            times_s, values, edges_s, after=after, at_edge=at_edge, between=between
        )
        covered_s = _covered(times_s, broken, edges_s)
    missing_s = lengths_s - covered_s
    counts = (covered_s >= least_covered * lengths_s) & (covered_s > 0)
    mean = np.full(len(lengths_s), np.nan)
    # mean = ∫ value dt / covered time; the areas are doubled
    np.divide(day_areas, 2 * covered_s, out=mean, where=counts)
    bits = _marks_of_days(times_s, marks, edges_s)
    bits[~counts] |= np.uint8(Mark.MISSING)
    bits[counts & (missing_s > gap_limit_s)] |= np.uint8(Mark.PARTIAL)
    return Days(mean, covered_s, missing_s, bits)


def daily_extremes(times_s: Seconds, values: Floats, *, edges_s: Seconds) -> DailyExtremes:
    """Find the lowest and highest reading of each day, day start included, day end not.

    times_s int64[n], values float64[n], NaN passed over; edges_s int64[days + 1].
    """
    after = np.searchsorted(times_s, edges_s)
    lowest = _first_extreme(np.fmin, times_s, values, after=after)
    highest = _first_extreme(np.fmax, times_s, values, after=after)
    return DailyExtremes(*lowest, *highest)


def _values_at(
    edges_s: Seconds, times_s: Seconds, values: Floats, *, after: Indices, gap_limit_s: int
) -> Floats:
    """Interpolate the record at each edge; NaN where the step there is not bridged."""
    at_edge = np.full(len(edges_s), np.nan)
    inside = np.flatnonzero((after > 0) & (after < len(times_s)))
    end = after[inside]
    step_s = times_s[end] - times_s[end - 1]
    passed = (edges_s[inside] - times_s[end - 1]) / step_s
    passed[step_s > gap_limit_s] = np.nan
    at_edge[inside] = values[end - 1] + (values[end] - values[end - 1]) * passed
    return at_edge


def _between(
    times_s: Seconds, values: Floats, *, after: Indices, gap_limit_s: int
) -> tuple[Floats, Indices]:
    """Give twice the area from each day's first reading to its last, and the steps not bridged."""
    between, broken = np.empty(len(after) - 1), [np.empty(0, np.intp)]
    start = max(int(after[0]) - 1, 0)
    for day in range(0, len(between), DAYS_AT_ONCE):
        firsts = after[day : day + DAYS_AT_ONCE + 1]
        stop = int(firsts[-1])
        areas, bad = _double_areas(times_s[start : stop + 1], values[start : stop + 1], gap_limit_s)
        broken.append(start + bad)
        between[day : day + DAYS_AT_ONCE] = _sums(
            areas, firsts[:-1] - start, firsts[1:] - 1 - start
        )
        start = max(start, stop)
    return between, np.concatenate(broken)


def _double_areas(times_s: Seconds, values: Floats, gap_limit_s: int) -> tuple[Floats, Indices]:
    """Give twice the area of every step, 0 where it is not bridged, and the steps not bridged."""
    step_s = times_s[1:] - times_s[:-1]
    longest_s = int(step_s.max(initial=0))
    # 2 · area = (v₁ + v₂) · Δt
    areas = values[:-1] + values[1:]
    areas *= longest_s if longest_s == step_s.min(initial=longest_s) else step_s
    if longest_s <= gap_limit_s and not np.isnan(areas).any():
        return areas, np.empty(0, np.intp)
    bad = np.flatnonzero((step_s > gap_limit_s) | np.isnan(areas))
    areas[bad] = 0.0
    return areas, bad


def _sums(areas: Floats, starts: Indices, stops: Indices) -> Floats:
    """Sum areas[start:stop] for each pair; 0 where there is nothing between."""
    sums = np.zeros(len(starts))
    some = stops > starts
    if some.any():
        # reduceat also sums what lies from one pair to the next; the last pair ends the array
        pairs = np.column_stack((starts[some], stops[some])).ravel()
        sums[some] = np.add.reduceat(areas[: pairs[-1]], pairs[:-1])[::2]
    return sums


def _with_ends(
    times_s: Seconds,
    values: Floats,
    edges_s: Seconds,
    *,
    after: Indices,
    at_edge: Floats,
    between: Floats,
) -> Floats:
    """Add to each day's area what lies before its first reading and after its last."""
    first = np.minimum(after[:-1], len(times_s) - 1)
    last = np.maximum(after[1:] - 1, 0)
    start_s, end_s = edges_s[:-1], edges_s[1:]
    head = (at_edge[:-1] + values[first]) * (times_s[first] - start_s)
    tail = (values[last] + at_edge[1:]) * (end_s - times_s[last])
    bridged = (at_edge[:-1] + at_edge[1:]) * (end_s - start_s)
    empty = after[1:] == after[:-1]
    return np.where(empty, _or_0(bridged), _or_0(head) + between + _or_0(tail))


def _covered(times_s: Seconds, broken: Indices, edges_s: Seconds) -> Seconds:
    """Count the seconds of each day that lie in bridged steps."""
    before_s: Seconds = np.clip(edges_s, times_s[0], times_s[-1])
    if len(broken):
        start_s, end_s = times_s[broken], times_s[broken + 1]
        begun = np.searchsorted(start_s, edges_s)
        lost_s = np.append(0, np.cumsum(end_s - start_s))[begun]
        # the last step begun may end after the edge
        beyond_s = np.maximum(end_s[np.maximum(begun - 1, 0)] - edges_s, 0)
        before_s -= lost_s - np.where(begun > 0, beyond_s, 0)
    return np.diff(before_s)


def _marks_of_days(times_s: Seconds, marks: MarkBits, edges_s: Seconds) -> MarkBits:
    bits = np.zeros(len(edges_s) - 1, np.uint8)
    marked = np.flatnonzero(marks)
    day = np.searchsorted(edges_s, times_s[marked], side="right") - 1
    inside = (day >= 0) & (day < len(bits))
    np.bitwise_or.at(bits, day[inside], marks[marked[inside]])
    return bits


def _first_extreme(
    ufunc: np.ufunc, times_s: Seconds, values: Floats, *, after: Indices
) -> tuple[Floats, Seconds]:
    """Reduce each day that has readings by fmin or fmax and find the first reading equal to it."""
    counts = np.diff(after)
    extreme = np.full(len(counts), np.nan)
    time_s = np.full(len(counts), NO_TIME_S)
    days, starts = np.flatnonzero(counts), after[:-1][counts > 0]
    if len(days):
        values = values[: after[-1]]
        extreme[days] = ufunc.reduceat(values, starts)
        hits = starts[0] + np.flatnonzero(values[starts[0] :] == np.repeat(extreme, counts))
        found = days[~np.isnan(extreme[days])]
        time_s[found] = times_s[hits[np.searchsorted(hits, after[found])]]
    return extreme, time_s


def _or_0(values: Floats) -> Floats:
    return np.where(np.isnan(values), 0.0, values)
