"""A record rated by the curve and shift in force, and split where they change."""

import numpy as np
import pytest

from network.numerics.ratings.curves import Segment, SegmentCurve
from network.numerics.ratings.rating import RatingPeriod, ShiftTable, rate
from network.numerics.sentences import Refused

HOUR_S = 3600


def straight(slope):
    """A curve that any hand can follow: Q = slope · h."""
    return SegmentCurve(
        segments=[Segment(0.0, slope, 0.0, 1.0)], lowest_use_m=-1.0, highest_use_m=100.0
    )


def shift(start_h, *points, linear_to_next=False):
    stages_m, shifts_m = np.array(points, float).T
    return ShiftTable(int(start_h * HOUR_S), stages_m, shifts_m, linear_to_next)


def period(start_h, slope, *shifts):
    curve = None if slope is None else straight(slope)
    return RatingPeriod(int(start_h * HOUR_S), curve, shifts)


def rated_rows(stages, *periods, gap_h=3):
    """Rate {hour: stage} and give (hour, flow) rows."""
    times_s = np.array([int(hour * HOUR_S) for hour in stages], np.int64)
    stage_m = np.array(list(stages.values()), float)
    rated = rate(times_s, stage_m, periods=periods, gap_limit_s=gap_h * HOUR_S)
    # logarithms leave the last bits; twelve digits are plenty to tell the rows apart
    return [
        (time_s / HOUR_S, round(flow_m3s, 12))
        for time_s, flow_m3s in zip(rated.times_s.tolist(), rated.flow_m3s.tolist(), strict=True)
    ]


def test_a_change_inside_a_step_stands_twice_with_the_stage_interpolated():
    # at 1.5 h the stage is 1.5 m: 15 under the old rating, 30 under the new
    rows = rated_rows({0: 0, 1: 1, 2: 2, 3: 3}, period(0, 10), period(1.5, 20))
    assert rows == [(0, 0), (1, 10), (1.5, 15), (1.5, 30), (2, 40), (3, 60)]


def test_at_a_reading_of_that_very_time_the_old_rating_is_added():
    rows = rated_rows({0: 1, 1: 1, 2: 1}, period(0, 10), period(1, 20))
    assert rows == [(0, 10), (1, 10), (1, 20), (2, 20)]


def test_a_step_longer_than_the_gap_limit_is_not_split():
    rows = rated_rows({0: 1, 4: 1}, period(0, 10), period(1, 20))
    assert rows == [(0, 10), (4, 20)]


def test_two_changes_in_one_step_leave_a_span_between_them():
    rows = rated_rows({0: 1, 1: 1}, period(0, 10), period(0.25, 20), period(0.5, 30))
    assert rows == [(0, 10), (0.25, 10), (0.25, 20), (0.5, 20), (0.5, 30), (1, 30)]


def test_changes_before_and_after_the_record_leave_it_whole():
    rows = rated_rows({5: 1, 6: 1}, period(0, 10), period(5, 20), period(7, 30))
    assert rows == [(5, 20), (6, 20)]


def test_without_a_rating_in_force_there_is_no_flow():
    rows = rated_rows({0: 1, 1: 1, 2: 1, 3: 1}, period(1, 10), period(2, None))
    np.testing.assert_array_equal(
        rows, [(0, np.nan), (1, np.nan), (1, 10), (2, 10), (2, np.nan), (3, np.nan)]
    )
    assert np.isnan([flow for _, flow in rated_rows({0: 1, 1: 1})]).all()


def test_no_readings_give_no_flows():
    assert rated_rows({}, period(0, 10), period(1, 20)) == []


def test_a_shift_is_zero_before_the_first_table_and_held_after_the_last():
    rows = rated_rows({0: 1, 1: 1, 2: 1, 3: 1}, period(0, 10, shift(1.5, (0, 0.5))), gap_h=2)
    assert rows == [(0, 10), (1, 10), (1.5, 10), (1.5, 15), (2, 15), (3, 15)]


def test_a_shift_table_steps_to_the_next_unless_it_says_linear():
    tables = shift(0, (0, 0.5)), shift(2, (0, 0.1))
    rows = rated_rows({0: 1, 1: 1, 2: 1, 3: 1}, period(0, 10, *tables))
    assert rows == [(0, 15), (1, 15), (2, 15), (2, 11), (3, 11)]


def test_a_linear_shift_takes_both_tables_at_the_stage_and_then_the_time():
    # WMO-No. 1044, volume II, 6.11. At 1 h, a quarter of the way, stage 2 m: the first table gives
    # 0.4 (half way from 0.2 to 0.6), the second 0.8; 0.75 · 0.4 + 0.25 · 0.8 = 0.5
    tables = shift(0, (1, 0.2), (3, 0.6), linear_to_next=True), shift(4, (0, 0.8))
    rows = rated_rows({0: 2, 1: 2, 4: 2, 5: 2}, period(0, 10, *tables))
    assert rows == [(0, 24), (1, 25), (4, 28), (4, 28), (5, 28)]


def test_beyond_its_points_a_shift_table_holds_the_end():
    rows = rated_rows({0: 0.5, 1: 9}, period(0, 10, shift(0, (1, 0.2), (3, 0.6))))
    assert rows == [(0, 7), (1, 96)]


def test_no_shift_passes_into_the_next_period():
    tables = shift(0, (0, 0.5), linear_to_next=True), shift(4, (0, 0.9))
    rows = rated_rows({0: 1, 1: 1, 2: 1}, period(0, 10, *tables), period(1, 20))
    assert rows == [(0, 15), (1, 16), (1, 20), (2, 20)]


def test_the_range_of_use_is_that_of_the_shifted_stage():
    curve = SegmentCurve(segments=[Segment(0, 10, 0, 1)], lowest_use_m=0, highest_use_m=2)
    lifted = RatingPeriod(0, curve, (shift(0, (0, 0.5)),))
    rated = rate(np.array([0]), np.array([1.6]), periods=[lifted], gap_limit_s=60)
    assert np.isnan(rated.flow_m3s).all()


def test_a_part_of_the_record_is_rated_alike_to_the_last_bit():
    times_s = np.arange(0, 40 * HOUR_S, 900, dtype=np.int64)
    stage_m = 1 + np.sin(times_s / 9000)
    periods = [period(0, 10, shift(3.1, (0, 0.05), (1, 0.1))), period(20.2, 21)]
    whole = rate(times_s, stage_m, periods=periods, gap_limit_s=HOUR_S)
    part = rate(times_s[60:], stage_m[60:], periods=periods, gap_limit_s=HOUR_S)
    assert (part.flow_m3s == whole.flow_m3s[whole.times_s >= times_s[60]]).all()


@pytest.mark.parametrize(
    ("make", "sentence"),
    [
        (lambda: rated_rows({0: 1}, period(1, 10), period(1, 20)), "periods do not follow"),
        (lambda: period(0, 10, shift(2, (0, 0)), shift(1, (0, 0))), "tables do not follow"),
        (lambda: period(3, 10, shift(2, (0, 0))), "before its rating is in force"),
        (lambda: shift(0, (1, 0), (1, 0)), "stages of a shift table do not rise"),
        (lambda: ShiftTable(0, np.array([]), np.array([])), "one at least"),
    ],
)
def test_chains_out_of_order_are_refused(make, sentence):
    with pytest.raises(Refused, match=sentence):
        make()
