"""Screening finds what looks wrong in a stage series, is silent on the rest and edits nothing."""

from dataclasses import replace

import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st

from network.numerics.records.screening import Series, screen
from network.numerics.records.screening_rules import ScreeningSettings

QUARTER_S = 900
START_S = 1_600_000_000  # some instant
TIMES_S = START_S + QUARTER_S * np.arange(400, dtype=np.int64)
HOURS = (TIMES_S - START_S) / 3600
# Amplitude 0.4 m over a day: at most 0.105 m/h and 0.026 m between two readings.
SMOOTH_M = 1.5 + 0.4 * np.sin(2 * np.pi * HOURS / 24)


def kinds(found):
    return [finding.kind for finding in found]


def only(found, kind):
    [finding] = found
    assert finding.kind == kind
    return finding


@given(
    amplitude_m=st.floats(0.01, 0.8),
    period_h=st.floats(12, 100),
    phase=st.floats(0, 6.3),
    level_m=st.floats(-5, 50),
)
def test_a_smooth_wave_is_silent(amplitude_m, period_h, phase, level_m):
    stage_m = level_m + amplitude_m * np.sin(2 * np.pi * HOURS / period_h + phase)
    found = screen(TIMES_S, stage_m, plates_m=(-6, 51), sensor_m=(-6, 51))
    assert found == ()


def test_a_flood_with_a_sharp_peak_is_no_spike():
    rise = np.concatenate((np.arange(0, 20), np.arange(20, -1, -1))) * 0.08
    found = screen(TIMES_S[:41], 1 + rise, settings=ScreeningSettings(rate_m_h=1.0))
    assert kinds(found) == []


def test_no_readings_give_no_findings():
    nothing = np.array([], dtype=np.int64), np.array([])
    series = Series(*nothing)
    assert screen(*nothing, plates_m=(0, 1), staff=series, second=series) == ()
    assert screen(TIMES_S[:1], SMOOTH_M[:1], second=series) == ()


def test_nothing_is_edited():
    stage_m = SMOOTH_M.copy()
    stage_m[50], stage_m[70] = 9.0, np.nan
    times_s, kept_s, kept_m = TIMES_S[::-1].copy(), TIMES_S[::-1].copy(), stage_m.copy()
    screen(times_s, stage_m, plates_m=(0, 3))
    np.testing.assert_array_equal(times_s, kept_s)
    np.testing.assert_array_equal(stage_m, kept_m)


def test_times_and_stages_of_different_number_are_refused():
    with pytest.raises(ValueError, match="one length"):
        screen(TIMES_S, SMOOTH_M[1:])


def test_a_gap_is_longer_than_the_limit():
    keep = np.ones(400, dtype=bool)
    keep[100:107] = False  # 8 intervals of 15 minutes: 2 hours, at the limit
    keep[200:208] = False  # 9 intervals: 2 h 15 min
    finding = only(screen(TIMES_S[keep], SMOOTH_M[keep]), "gap")
    assert (finding.start_s, finding.end_s) == (TIMES_S[199], TIMES_S[208])
    assert (finding.figure, finding.limit) == (8100, 7200)
    assert str(finding.sentence) == "No reading for 2.2 hours; the gap limit is 2.0 hours."


def test_an_event_loggers_silence_is_not_a_gap():
    keep = np.ones(400, dtype=bool)
    keep[100:150] = False
    stage_m = np.where(np.arange(400) < 150, SMOOTH_M[99], SMOOTH_M[99] + 0.01 * (HOURS - 37))
    logger = ScreeningSettings(event_logger=True, flat_s=10**6)
    assert kinds(screen(TIMES_S[keep], stage_m[keep], settings=logger)) == []
    assert "gap" in kinds(screen(TIMES_S[keep], stage_m[keep]))


def test_a_reading_that_is_no_number_counts_as_no_reading():
    stage_m = SMOOTH_M.copy()
    stage_m[200:208] = np.nan
    assert kinds(screen(TIMES_S, stage_m)) == ["gap"]


def test_a_time_that_comes_twice_is_found():
    times_s = TIMES_S.copy()
    times_s[51] = times_s[50]
    finding = only(screen(times_s, SMOOTH_M), "duplicate_time")
    assert finding.start_s == finding.end_s == TIMES_S[50]


def test_a_clock_set_back_is_found_once_as_backward_with_its_length():
    times_s = np.concatenate((TIMES_S[:100], TIMES_S[100:] - 3600 + 60))
    found = screen(times_s, np.full(400, 1.0), settings=ScreeningSettings(flat_s=10**6))
    finding = only(found, "backward_time")
    # the 101st reading lies 3600 − 60 − 900 s before the 100th
    assert (finding.figure, finding.end_s) == (2640, TIMES_S[99])
    assert str(finding.sentence) == "The time runs backward by 44 minutes."


@given(
    at=st.integers(0, 397),
    width=st.integers(1, 3),
    size_m=st.floats(0.25, 3),
    sign=st.sampled_from([-1, 1]),
)
def test_a_spike_is_found_wherever_it_stands(at, width, size_m, sign):
    stage_m = SMOOTH_M.copy()
    stage_m[at : at + width] += sign * size_m
    found = screen(TIMES_S, stage_m)
    if 1 <= at <= 399 - width:
        finding = only(found, "spike")
        assert (finding.start_s, finding.end_s) == (TIMES_S[at], TIMES_S[at + width - 1])
        assert finding.figure == pytest.approx(sign * size_m, abs=0.08)  # the wave moves 0.026
        assert finding.limit == 0.10
    else:  # at an end it may look like a step, but never goes unseen
        assert set(kinds(found)) <= {"spike", "step", "rate_of_rise"}
        assert found


@given(at=st.integers(5, 395), size_m=st.floats(0.25, 3), sign=st.sampled_from([-1, 1]))
def test_a_step_is_found_and_not_told_again_as_a_fast_change(at, size_m, sign):
    stage_m = SMOOTH_M.copy()
    stage_m[at:] += sign * size_m
    finding = only(screen(TIMES_S, stage_m), "step")
    assert (finding.start_s, finding.end_s) == (TIMES_S[at - 1], TIMES_S[at])
    assert finding.figure == pytest.approx(sign * size_m, abs=0.03)


def test_a_flat_line_lasts_longer_than_the_limit():
    stage_m = SMOOTH_M.copy()
    stage_m[100:197] = stage_m[100]  # 96 intervals: 24 hours, at the limit
    assert kinds(screen(TIMES_S, stage_m)) == []
    stage_m[197] = stage_m[100]
    finding = only(screen(TIMES_S, stage_m), "flat_line")
    assert (finding.start_s, finding.end_s) == (TIMES_S[100], TIMES_S[197])
    assert finding.figure == 97 * QUARTER_S


def test_a_flat_line_does_not_reach_across_a_gap():
    keep = np.ones(400, dtype=bool)
    keep[60:80] = False
    stage_m = np.where(np.arange(400) < 140, SMOOTH_M[140], SMOOTH_M)
    assert kinds(screen(TIMES_S[keep], stage_m[keep])) == ["gap"]


@pytest.mark.parametrize("sign", [-1, 1])
def test_a_fast_rise_or_fall_is_found(sign):
    # 0.30 m in each of four quarters of an hour: 1.2 m/h
    stage_m = 1.5 + sign * 0.3 * np.clip(np.arange(400) - 100, 0, 4)
    settings = ScreeningSettings(flat_s=10**6)
    finding = only(screen(TIMES_S, stage_m, settings=settings), "rate_of_rise")
    assert (finding.start_s, finding.end_s) == (TIMES_S[100], TIMES_S[104])
    assert finding.figure == pytest.approx(sign * 1.2)
    faster = replace(settings, rate_m_h=1.2)
    assert screen(TIMES_S, stage_m, settings=faster) == ()


def test_a_flutter_of_a_centimetre_within_seconds_is_no_fast_change():
    times_s = START_S + np.arange(20, dtype=np.int64)
    stage_m = 1.5 + 0.01 * (np.arange(20) % 2)
    assert screen(times_s, stage_m, settings=ScreeningSettings(event_logger=True)) == ()


def test_stages_beyond_plates_and_sensor_are_found_with_the_end_they_pass():
    found = screen(TIMES_S[:97], SMOOTH_M[:97], plates_m=(1.2, 5.0), sensor_m=(0.0, 1.8))
    by_kind = {finding.kind: finding for finding in found}
    low, high = by_kind["outside_plates"], by_kind["outside_sensor"]
    assert len(found) == 2
    assert (low.figure, low.limit) == (pytest.approx(1.1), 1.2)  # trough at hour 18
    assert (high.figure, high.limit) == (pytest.approx(1.9), 1.8)  # crest at hour 6
    assert low.start_s < START_S + 18 * 3600 < low.end_s
    assert screen(TIMES_S[:97], SMOOTH_M[:97], plates_m=(1.1, 1.9)) == ()


def test_the_recorder_is_compared_with_the_staff_between_its_readings():
    at_s = TIMES_S[[10, 20, 30]] + 450
    recorder_m = np.interp(at_s, TIMES_S, SMOOTH_M)
    staff = Series(at_s, recorder_m - [0.02, 0.03, -0.05])
    found = screen(TIMES_S, SMOOTH_M, staff=staff)
    assert kinds(found) == ["staff", "staff"]
    assert [finding.figure for finding in found] == pytest.approx([0.03, -0.05])
    assert found[0].start_s == found[0].end_s == at_s[1]
    waves = replace(staff, wave_m=np.array([0.0, 0.10, 0.0]))
    assert only(screen(TIMES_S, SMOOTH_M, staff=waves), "staff").figure == pytest.approx(-0.05)


def test_staff_readings_in_a_gap_or_outside_the_record_are_not_compared():
    keep = np.ones(400, dtype=bool)
    keep[100:120] = False
    at_s = np.array([TIMES_S[0] - 10, TIMES_S[110], TIMES_S[-1] + 10])
    staff = Series(at_s, np.array([9.0, 9.0, 9.0]))
    assert kinds(screen(TIMES_S[keep], SMOOTH_M[keep], staff=staff)) == ["gap"]


def test_the_second_series_is_compared_where_both_run():
    hourly = Series(TIMES_S[::4], SMOOTH_M[::4].copy())
    assert screen(TIMES_S, SMOOTH_M, second=hourly) == ()
    hourly.stage_m[50:60] -= 0.20
    finding = only(screen(TIMES_S, SMOOTH_M, second=hourly), "second_series")
    assert finding.figure == pytest.approx(0.20, abs=0.01)
    assert TIMES_S[196] < finding.start_s <= TIMES_S[200]
    assert TIMES_S[236] <= finding.end_s < TIMES_S[240]


def test_findings_come_in_order_of_time():
    stage_m = SMOOTH_M.copy()
    stage_m[300] += 1
    stage_m[50] += 1
    keep = np.ones(400, dtype=bool)
    keep[150:180] = False
    found = screen(TIMES_S[keep], stage_m[keep])
    assert kinds(found) == ["spike", "gap", "spike"]
