"""Daily means by trapezoid from day start to day end: by hand, by SciPy, and part by part."""

from datetime import date
from itertools import pairwise

import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st
from scipy.integrate import trapezoid

from network.numerics.marks import Mark
from network.numerics.ratings.curves import Segment, SegmentCurve
from network.numerics.ratings.rating import RatingPeriod, rate
from network.numerics.years.daily import NO_TIME_S, daily_extremes, daily_means, day_starts

HOUR_S = 3600
DAY_S = 86_400


def days_of(record, *, n_days=1, gap_h=24, marks=None, least_covered=0.8):
    """Daily means of {hour: value} from the epoch on."""
    times_s = np.array([round(hour * HOUR_S) for hour in record], np.int64)
    values = np.array(list(record.values()), float)
    return daily_means(
        times_s,
        values,
        marks=np.zeros(len(values), np.uint8) if marks is None else np.array(marks, np.uint8),
        edges_s=np.arange(n_days + 1, dtype=np.int64) * DAY_S,
        gap_limit_s=round(gap_h * HOUR_S),
        least_covered=least_covered,
    )


def test_a_day_is_integrated_by_trapezoid():
    # (0+12)/2 · 12 h + (12+6)/2 · 12 h = 72 + 108 = 180; over 24 h: 7.5
    days = days_of({0: 0, 12: 12, 24: 6})
    assert days.mean.tolist() == [7.5]
    assert days.covered_s.tolist() == [DAY_S]
    assert days.marks.tolist() == [0]


def test_values_are_interpolated_at_both_ends_of_the_day():
    # from 4 at −2 h to 8 at 2 h: 6 at day start; from 8 at 22 h to 4 at 26 h: 6 at day end
    # (6+8)/2 · 2 + 8 · 20 + (8+6)/2 · 2 = 14 + 160 + 14 = 188; over 24 h
    days = days_of({-2: 4, 2: 8, 22: 8, 26: 4})
    assert days.mean == pytest.approx([188 / 24], rel=1e-15)


def test_a_day_inside_one_long_step_is_the_mean_of_its_ends():
    # from 0 at 12 h to 48 at 60 h, one a hour: day 1 runs from 12 to 36
    days = days_of({0: 0, 12: 0, 60: 48, 72: 48}, n_days=3, gap_h=48)
    assert days.mean.tolist() == [(0 + 12) / 2 * 12 / 24, 24.0, (36 + 48) / 2 / 2 + 48 / 2]


def test_a_rating_change_inside_a_day_is_not_smeared_over_the_step():
    # Stage 1 m all day, readings every hour, Q = 10·h until 09:12 and Q = 20·h from then on:
    # (10 · 9.2 + 20 · 14.8) / 24 = 388/24. Rating the readings alone would smear the change over
    # the hour: (10 · 9 + 15 · 1 + 20 · 14) / 24 = 385/24.
    curves = [
        SegmentCurve(segments=[Segment(0, c, 0, 1)], lowest_use_m=0, highest_use_m=9)
        for c in (10, 20)
    ]
    periods = [RatingPeriod(0, curves[0]), RatingPeriod(9 * HOUR_S + 720, curves[1])]
    times_s = np.arange(25, dtype=np.int64) * HOUR_S
    rated = rate(times_s, np.ones(25), periods=periods, gap_limit_s=HOUR_S)
    days = daily_means(
        rated.times_s,
        rated.flow_m3s,
        marks=rated.marks,
        edges_s=np.array([0, DAY_S]),
        gap_limit_s=HOUR_S,
    )
    assert days.mean == pytest.approx([388 / 24], rel=1e-14)


def test_a_rating_change_at_midnight_ends_the_old_day_under_the_old_rating():
    # hourly 10 until midnight and 20 from then on, the instant twice
    record_s = [*range(25), *range(24, 49)]
    days = daily_means(
        np.array(record_s, np.int64) * HOUR_S,
        np.repeat([10.0, 20.0], 25),
        marks=np.zeros(50, np.uint8),
        edges_s=np.array([0, DAY_S, 2 * DAY_S]),
        gap_limit_s=HOUR_S,
    )
    assert days.mean.tolist() == [10.0, 20.0]


def test_a_gap_is_not_bridged_and_the_mean_is_that_of_the_time_covered():
    # 5 until 06:00, nothing until 10:00, 20 until midnight: (5·6 + 20·14)/20 h = 15.5
    hourly = {hour: 5 if hour <= 6 else 20 for hour in range(25) if not 6 < hour < 10}
    days = days_of(hourly, gap_h=2)
    assert days.mean == pytest.approx([15.5], rel=1e-15)
    assert days.covered_s.tolist() == [20 * HOUR_S]
    assert days.missing_s.tolist() == [4 * HOUR_S]
    assert days.marks.tolist() == [Mark.PARTIAL]


def test_a_day_counts_from_the_share_asked_for_on():
    # readings 00:00 to 19:12 are exactly 80 % of the day
    record = {hour / 5: 3 for hour in range(97)}
    assert days_of(record, gap_h=1).mean.tolist() == [3.0]
    short = days_of(record, gap_h=1, least_covered=0.81)
    assert np.isnan(short.mean).all()
    assert short.marks.tolist() == [Mark.MISSING]


def test_a_day_is_partial_only_when_more_than_one_gap_limit_is_missing():
    until_22, until_21 = (dict.fromkeys(range(last + 1), 1) for last in (22, 21))
    assert days_of(until_22, gap_h=2).marks.tolist() == [0]
    assert days_of(until_21, gap_h=2).marks.tolist() == [Mark.PARTIAL]


def test_a_gap_over_many_days_leaves_each_its_own_share():
    record = dict.fromkeys([*range(23), *range(97, 121)], 2)
    days = days_of(record, n_days=5, gap_h=1)
    assert (days.covered_s // HOUR_S).tolist() == [22, 0, 0, 0, 23]
    assert np.isnan(days.mean).tolist() == [False, True, True, True, False]


def test_a_missing_value_breaks_the_curve_on_both_sides():
    record = {hour: np.nan if hour == 12 else 7 for hour in range(25)}
    days = days_of(record, gap_h=1)
    assert days.mean.tolist() == [7.0]
    assert days.missing_s.tolist() == [2 * HOUR_S]


def test_zero_flow_is_a_figure_and_not_a_gap():
    days = days_of(dict.fromkeys(range(25), 0))
    assert days.mean.tolist() == [0.0]
    assert days.marks.tolist() == [0]


def test_no_readings_make_a_missing_day():
    days = days_of({}, n_days=2)
    assert np.isnan(days.mean).all()
    assert days.missing_s.tolist() == [DAY_S, DAY_S]
    assert days.marks.tolist() == [Mark.MISSING] * 2


def test_one_reading_covers_nothing():
    assert days_of({12: 5}).marks.tolist() == [Mark.MISSING]


def test_a_day_carries_the_marks_of_the_readings_inside_it():
    marks = [Mark.TYPED, 0, Mark.ESTIMATED, Mark.EXTRAPOLATED, Mark.ICE_OR_BACKWATER]
    days = days_of({-1: 1, 0: 1, 12: 1, 23: 1, 24: 1}, marks=marks)
    assert days.marks.tolist() == [Mark.ESTIMATED | Mark.EXTRAPOLATED]


def test_days_start_on_the_record_clock_and_carry_that_date():
    # 09:00 at UTC−5 is 14:00 UTC; 2018-06-01 00:00 UTC is 1527811200
    starts = day_starts(date(2018, 6, 1), 2, utc_offset_minutes=-300, day_starts_at_hour=9)
    assert starts.tolist() == [1527811200 + 14 * HOUR_S + k * DAY_S for k in range(3)]


def test_february_of_a_leap_year_has_its_29th():
    # 2024-03-01 00:00 UTC is 1709251200
    starts = day_starts(date(2024, 2, 1), 29, utc_offset_minutes=0)
    assert len(starts) == 30
    assert starts[-1] == day_starts(date(2024, 3, 1), 0, utc_offset_minutes=0)[0] == 1709251200


def test_extremes_are_readings_with_the_first_time_of_equals():
    times_s = np.array([0, 6, 12, 18, 24, 30], np.int64) * HOUR_S
    values = np.array([3.0, 9.0, np.nan, 9.0, 1.0, 1.0])
    found = daily_extremes(times_s, values, edges_s=np.arange(4, dtype=np.int64) * DAY_S)
    np.testing.assert_array_equal(found.highest, [9, 1, np.nan])
    np.testing.assert_array_equal(found.lowest, [3, 1, np.nan])
    assert found.highest_time_s.tolist() == [6 * HOUR_S, 24 * HOUR_S, NO_TIME_S]
    assert found.lowest_time_s.tolist() == [0, 24 * HOUR_S, NO_TIME_S]


def test_days_without_readings_have_no_extremes():
    nothing = np.empty(0, np.int64)
    found = daily_extremes(nothing, np.empty(0), edges_s=np.array([0, DAY_S]))
    assert np.isnan(found.highest).all()
    assert found.lowest_time_s.tolist() == [NO_TIME_S]


def uneven_record(seed, n=6000):
    """Readings some minutes apart over a month or two, a few missing."""
    random = np.random.default_rng(seed)
    times_s = np.cumsum(random.integers(60, 1200, n))
    values = np.exp(np.cumsum(random.normal(0, 0.02, n)))
    values[random.integers(0, n, 5)] = np.nan
    return times_s, values


def means(times_s, values, edges_s, gap_limit_s=1100):
    marks = np.zeros(len(values), np.uint8)
    return daily_means(times_s, values, marks=marks, edges_s=edges_s, gap_limit_s=gap_limit_s)


def test_scipy_integrates_every_whole_day_to_the_same():
    times_s, values = uneven_record(1)
    values = np.nan_to_num(values, nan=1.0)
    edges_s = np.arange(1, times_s[-1] // DAY_S + 1) * DAY_S
    days = means(times_s, values, edges_s, gap_limit_s=DAY_S)
    for day, (start_s, end_s) in enumerate(pairwise(edges_s)):
        inside = (times_s > start_s) & (times_s < end_s)
        x = np.concatenate(([start_s], times_s[inside], [end_s]))
        expected = trapezoid(np.interp(x, times_s, values), x) / DAY_S
        assert days.mean[day] == pytest.approx(expected, rel=1e-12)  # order of summation


@pytest.mark.parametrize("first_day", [0, 1, 7, 29])
def test_a_month_recomputed_alone_is_equal_to_the_last_bit(first_day):
    times_s, values = uneven_record(2, n=60_000)
    edges_s = np.arange(0, times_s[-1] // DAY_S + 3) * DAY_S
    whole = means(times_s, values, edges_s)
    part_edges_s = edges_s[first_day : first_day + 32]
    # the readings of the month and the one on either side
    start, stop = np.searchsorted(times_s, part_edges_s[[0, -1]])
    part = slice(max(start - 1, 0), stop + 1)
    alone = means(times_s[part], values[part], part_edges_s)
    for name in ("mean", "covered_s", "missing_s", "marks"):
        expected = getattr(whole, name)[first_day : first_day + 31]
        assert getattr(alone, name).tobytes() == expected.tobytes()


@given(st.integers(0, 400), st.integers(0, 2**32 - 1))
def test_splitting_the_record_at_any_reading_does_not_change_the_means(at, seed):
    times_s, values = uneven_record(seed, n=401)
    edges_s = np.arange(times_s[-1] // DAY_S + 2) * DAY_S
    twice = np.sort(np.append(np.arange(401), at))
    whole, split = means(times_s, values, edges_s), means(times_s[twice], values[twice], edges_s)
    np.testing.assert_allclose(split.mean, whole.mean, rtol=1e-13)  # order of summation
    assert split.covered_s.tolist() == whole.covered_s.tolist()
    first = means(times_s[: at + 1], values[: at + 1], edges_s)
    second = means(times_s[at:], values[at:], edges_s)
    assert (first.covered_s + second.covered_s).tolist() == whole.covered_s.tolist()
