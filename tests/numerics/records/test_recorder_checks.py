"""Corrections and time shifts proposed from recorder checks, worked by hand."""

import pytest
from hypothesis import given
from hypothesis import strategies as st

from network.numerics.records.recorder_checks import (
    RecorderCheck,
    propose_corrections,
    propose_time_shifts,
)
from network.numerics.sentences import Refused

DAY_S = 86_400


def offsets(proposals):
    return [(p.start_s, p.end_s, p.start_offset_m, p.end_offset_m) for p in proposals]


def test_the_correction_runs_from_the_error_left_to_the_error_found():
    checks = [
        # found 12 mm high, set to 6 mm high
        RecorderCheck(0, found_m=1.512, staff_stage_m=1.500, left_m=1.506),
        # found 20 mm high, set right
        RecorderCheck(30 * DAY_S, found_m=1.320, staff_stage_m=1.300, left_m=1.300),
        # found 8 mm low
        RecorderCheck(60 * DAY_S, found_m=1.092, staff_stage_m=1.100),
    ]
    assert offsets(propose_corrections(checks)) == [
        (0, 30 * DAY_S, pytest.approx(-0.006), pytest.approx(-0.020)),
        (30 * DAY_S, 60 * DAY_S, 0.0, pytest.approx(0.008)),
    ]


def test_the_sentence_names_both_errors():
    checks = [RecorderCheck(0, 1.0, 1.0), RecorderCheck(DAY_S, 1.02, 1.0)]
    [proposal] = propose_corrections(checks)
    assert str(proposal.sentence) == (
        "The recorder stood +0.000 m off the staff when left at the last check and +0.020 m off "
        "when found at this one."
    )


def test_an_error_below_the_tolerance_counts_as_none():
    within = [RecorderCheck(0, 1.004, 1.000), RecorderCheck(DAY_S, 1.0049, 1.000)]
    assert propose_corrections(within) == ()
    at_it = [RecorderCheck(0, 1.004, 1.000), RecorderCheck(DAY_S, 1.005, 1.000)]
    assert offsets(propose_corrections(at_it)) == [(0, DAY_S, 0.0, pytest.approx(-0.005))]
    assert len(propose_corrections(within, tolerance_m=0.002)) == 1


def test_the_wave_widens_the_tolerance():
    checks = [RecorderCheck(0, 1.0, 1.0), RecorderCheck(DAY_S, 1.03, 1.0, wave_m=0.04)]
    assert propose_corrections(checks) == ()


def test_before_the_first_check_nothing_is_proposed():
    assert propose_corrections([RecorderCheck(0, 1.5, 1.0)]) == ()
    assert propose_corrections([]) == ()


def test_a_check_without_a_staff_reading_is_passed_over():
    checks = [
        RecorderCheck(0, 1.0, 1.0),
        RecorderCheck(DAY_S, 1.2, None),
        RecorderCheck(2 * DAY_S, 1.01, 1.0),
    ]
    assert offsets(propose_corrections(checks)) == [(0, 2 * DAY_S, 0.0, pytest.approx(-0.01))]


def test_a_recorder_set_without_a_staff_reading_is_left_to_people():
    checks = [
        RecorderCheck(0, 1.0, 1.0),
        RecorderCheck(DAY_S, 1.2, None, left_m=1.1),
        RecorderCheck(2 * DAY_S, 1.01, 1.0),
        RecorderCheck(3 * DAY_S, 1.01, 1.0),
    ]
    assert offsets(propose_corrections(checks)) == [
        (2 * DAY_S, 3 * DAY_S, pytest.approx(-0.01), pytest.approx(-0.01))
    ]


def test_a_dead_recorder_set_going_again_starts_a_new_span():
    checks = [
        RecorderCheck(0, 1.0, 1.0),
        RecorderCheck(DAY_S, None, 1.3, left_m=1.31),
        RecorderCheck(2 * DAY_S, 1.02, 1.0),
    ]
    assert offsets(propose_corrections(checks)) == [
        (DAY_S, 2 * DAY_S, pytest.approx(-0.01), pytest.approx(-0.02))
    ]


@given(
    errors_mm=st.lists(
        st.integers(-200, 200).filter(lambda mm: abs(mm) > 5), min_size=2, max_size=8
    ),
    staff_m=st.floats(-2, 10),
)
def test_the_corrected_recorder_agrees_with_the_staff_at_every_check(errors_mm, staff_m):
    checks = [
        RecorderCheck(i * DAY_S, staff_m + mm / 1000, staff_m) for i, mm in enumerate(errors_mm)
    ]
    proposals = propose_corrections(checks)
    assert len(proposals) == len(checks) - 1
    for proposal, last, this in zip(proposals, checks, checks[1:], strict=False):
        assert last.found_m + proposal.start_offset_m == pytest.approx(staff_m, abs=1e-9)
        assert this.found_m + proposal.end_offset_m == pytest.approx(staff_m, abs=1e-9)


def test_a_fast_clock_becomes_a_shift_back_in_time():
    checks = [
        RecorderCheck(0, 1.0, 1.0),
        RecorderCheck(30 * DAY_S, 1.0, 1.0, clock_error_s=240, clock_left_s=-30),
        RecorderCheck(60 * DAY_S, None, None, clock_error_s=-90),
        RecorderCheck(90 * DAY_S, 1.0, 1.0, clock_error_s=59),
    ]
    shifts = propose_time_shifts(checks)
    assert [(s.start_s, s.end_s, s.start_shift_s, s.end_shift_s) for s in shifts] == [
        (0, 30 * DAY_S, 0, -240),
        (30 * DAY_S, 60 * DAY_S, 30, 90),
    ]
    assert "240 s fast" in str(shifts[0].sentence)
    assert "90 s slow" in str(shifts[1].sentence)


@pytest.mark.parametrize("propose", [propose_corrections, propose_time_shifts])
def test_checks_out_of_order_are_refused_by_row(propose):
    checks = [RecorderCheck(DAY_S, 1.0, 1.0), RecorderCheck(DAY_S, 1.0, 1.0)]
    with pytest.raises(Refused, match="Recorder check 2") as refused:
        propose(checks)
    assert refused.value.row == 2
