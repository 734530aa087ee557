"""A meter's rating turns revolutions into velocities and is compared with the one before."""

import math

import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st

from network.numerics.meters.meter_rating import (
    COMPARISON_SPEEDS_MS,
    Piece,
    check_pieces,
    compare,
    crossing,
    joint_gaps,
    velocity,
)
from network.numerics.sentences import Refused

LOWER, UPPER = Piece(0.02, 0.24, 0.1, 1.0), Piece(0.01, 0.25, 1.0, 12.0)  # meet at n = 1, v = 0.26
RATING = (LOWER, UPPER)


@given(seconds=st.floats(1, 600))
def test_a_still_rotor_gives_no_flow_and_no_flag(seconds):
    found = velocity(0, seconds, RATING)
    assert found.velocity_ms.tolist() == [0.0]
    assert found.outside.tolist() == [False]


def test_revolutions_and_seconds_become_velocities_of_the_piece_that_holds_n():
    found = velocity([25, 50, 100], [50, 50, 50], RATING)
    assert found.n_per_s.tolist() == [0.5, 1.0, 2.0]
    # 0.02 + 0.24·0.5; at the joint both pieces; 0.01 + 0.25·2
    assert found.velocity_ms == pytest.approx([0.14, 0.26, 0.51])
    assert not found.outside.any()


def test_outside_the_calibrated_range_the_velocity_is_still_given_with_a_flag():
    found = velocity([2, 700], [50, 50], RATING)
    assert found.velocity_ms == pytest.approx([0.02 + 0.24 * 0.04, 0.01 + 0.25 * 14])
    assert found.outside.tolist() == [True, True]


def test_the_velocity_range_of_a_certificate_raises_the_flag_too():
    found = velocity([5, 50, 500], [50, 50, 50], RATING, valid_ms=(0.05, 2.0))
    assert found.outside.tolist() == [True, False, True]  # 0.044, 0.26 and 2.51 m/s


def test_a_joint_belongs_to_the_lower_piece_and_a_hole_between_ranges_to_the_upper():
    stepped = (Piece(0.02, 0.24, 0.1, 1.0), Piece(0.03, 0.25, 1.1, 12.0))
    found = velocity([1.0, 1.05], 1, stepped)
    assert found.velocity_ms == pytest.approx([0.26, 0.03 + 0.25 * 1.05])
    assert not found.outside.any()


@pytest.mark.parametrize(
    ("revolutions", "seconds", "row", "field_name"),
    [
        ([10, -1], [50, 50], 2, "revolutions"),
        ([10, math.nan], [50, 50], 2, "revolutions"),
        ([10, 10], [50, math.nan], 2, "seconds"),
        ([10, 10], [0, 50], 1, "seconds"),
    ],
)
def test_a_bad_count_is_refused_by_row_and_field(revolutions, seconds, row, field_name):
    with pytest.raises(Refused, match=f"Row {row}") as refused:
        velocity(revolutions, seconds, RATING)
    assert (refused.value.row, refused.value.field_name) == (row, field_name)


@pytest.mark.parametrize(
    ("pieces", "row", "field_name"),
    [
        ([], None, None),
        ([Piece(0.02, -0.24, 0.1, 1.0)], 1, "b_m"),
        ([Piece(math.nan, 0.24, 0.1, 1.0)], 1, "a_ms"),
        ([Piece(0.02, 0.24, 1.0, 1.0)], 1, "n_to"),
        ([Piece(0.02, 0.24, -0.1, 1.0)], 1, "n_to"),
        ([LOWER, Piece(0.01, 0.25, 0.9, 12.0)], 2, "n_from"),
    ],
)
def test_pieces_that_are_no_rating_are_refused(pieces, row, field_name):
    with pytest.raises(Refused) as refused:
        check_pieces(pieces)
    assert (refused.value.row, refused.value.field_name) == (row, field_name)


@given(n=st.lists(st.floats(0.11, 11.9), min_size=2, max_size=20))
def test_a_faster_rotor_never_means_slower_water(n):
    rising = np.sort(n)
    assert (np.diff(velocity(rising * 40, 40, RATING).velocity_ms) >= -1e-12).all()


def test_a_rating_compared_with_itself_has_not_changed():
    found = compare(RATING, RATING)
    assert found.older_ms.tolist() == list(COMPARISON_SPEEDS_MS)
    assert found.change_percent == pytest.approx([0] * 5, abs=1e-9)
    assert not found.outside.any()


@given(factor=st.floats(0.8, 1.2))
def test_a_rating_scaled_changes_by_the_same_share_at_every_speed(factor):
    scaled = [Piece(factor * p.a_ms, factor * p.b_m, p.n_from, p.n_to) for p in RATING]
    found = compare(RATING, scaled)
    assert found.change_percent == pytest.approx([100 * (factor - 1)] * 5, abs=1e-9)


def test_the_change_is_that_of_the_same_revolutions():
    # at 0.51 m/s the older gives n = 2; the newer 0.02 + 0.25·2 = 0.52: +1.96 %
    found = compare(RATING, [Piece(0.02, 0.25, 0.5, 12.0)], [0.51])
    assert found.newer_ms == pytest.approx([0.52])
    assert found.change_percent == pytest.approx([100 * 0.01 / 0.51])


def test_speeds_beyond_either_calibration_are_flagged_and_a_still_rotor_has_no_change():
    found = compare(RATING, [Piece(0.02, 0.25, 0.5, 4.0)], [0.01, 0.1, 0.5, 1.5])
    assert found.outside.tolist() == [True, True, False, True]  # n: none, 0.33, 1.96, 5.96
    assert math.isnan(found.change_percent[0])
    assert np.isfinite(found.change_percent[1:]).all()


def test_pieces_that_meet_have_no_gap():
    [gap] = joint_gaps(RATING)
    assert gap.gap_ms == pytest.approx(0, abs=1e-12)
    assert gap.crossing_per_s == pytest.approx(1.0)


def test_parallel_pieces_do_not_cross():
    assert crossing(LOWER, Piece(0.03, 0.24, 1.0, 2.0)) is None
