"""Tow runs are fitted by one to three straight pieces."""

import numpy as np
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from network.numerics.meters.meter_rating import Piece, velocity
from network.numerics.meters.tow_runs import fit_tow_runs
from network.numerics.sentences import Refused

N = np.array([0.15, 0.2, 0.3, 0.4, 0.5, 0.6, 0.8, 1.0, 1.5, 2.0, 3.0, 4.0, 5.0, 6.0, 7.0, 8.0])
TWO = (Piece(0.019, 0.2330, 0.15, 0.684), Piece(0.006, 0.2520, 0.684, 8.0))
THREE = (Piece(0.03, 0.21, 0, 0.55), Piece(0.0135, 0.24, 0.55, 3.5), Piece(-0.0565, 0.26, 3.5, 8))


def runs(pieces, n=N, seconds=60.0):
    timed = np.full(len(n), seconds)
    return velocity(n * seconds, timed, pieces).velocity_ms, n * seconds, timed


def test_one_piece_gives_back_its_line():
    fit = fit_tow_runs(*runs([Piece(0.01, 0.25, 0.1, 10.0)]))
    [piece] = fit.pieces
    assert (piece.a_ms, piece.b_m) == pytest.approx((0.01, 0.25))
    assert (piece.n_from, piece.n_to) == pytest.approx((0.15, 8.0))
    assert fit.standard_error_ms == pytest.approx(0, abs=1e-12)


def test_two_pieces_are_found_and_joined_where_they_cross():
    fit = fit_tow_runs(*runs(TWO), pieces=2)
    lower, upper = fit.pieces
    assert (lower.a_ms, lower.b_m) == pytest.approx((0.019, 0.2330))
    assert (upper.a_ms, upper.b_m) == pytest.approx((0.006, 0.2520))
    assert lower.n_to == upper.n_from == pytest.approx(0.013 / 0.019)
    assert lower.velocity_ms(lower.n_to) == pytest.approx(upper.velocity_ms(lower.n_to))
    assert fit.piece_of_run.tolist() == [0] * 6 + [1] * 10


def test_three_pieces_are_found():
    fit = fit_tow_runs(*runs(THREE), pieces=3)
    assert [piece.b_m for piece in fit.pieces] == pytest.approx([0.21, 0.24, 0.26])
    assert [piece.n_to for piece in fit.pieces] == pytest.approx([0.55, 3.5, 8.0])


def test_residuals_and_standard_errors_are_those_of_the_runs():
    # y = x with +1, −1, 0, −1, +1 mm/s on x = 1…5: the line stays, Σr² = 4e-6, s = √(4e-6/3)
    n = np.arange(1.0, 6.0)
    speeds = n + 0.001 * np.array([1, -1, 0, -1, 1])
    fit = fit_tow_runs(speeds, n, np.ones(5))
    assert fit.residual_ms == pytest.approx([0.001, -0.001, 0, -0.001, 0.001], abs=1e-12)
    assert fit.residual_percent == pytest.approx(100 * fit.residual_ms / speeds)
    assert fit.standard_error_ms == pytest.approx(np.sqrt(4e-6 / 3))


def test_standard_errors_of_two_pieces_come_from_their_own_runs():
    speeds, turns, timed = runs(TWO)
    off = 0.0005 * np.array([1, -1, 1, -1, 1, -1] + [2, -2] * 5)
    fit = fit_tow_runs(speeds + off, turns, timed, pieces=2)
    held = fit.piece_of_run
    sums = [float((fit.residual_ms[held == piece] ** 2).sum()) for piece in (0, 1)]
    counts = [int((held == piece).sum()) for piece in (0, 1)]
    assert fit.piece_standard_errors_ms == pytest.approx(
        [np.sqrt(sums[0] / (counts[0] - 2)), np.sqrt(sums[1] / (counts[1] - 2))]
    )
    assert fit.standard_error_ms == pytest.approx(np.sqrt(sum(sums) / (16 - 4)))


def test_the_fitted_pieces_rate_the_runs_as_the_fit_says():
    speeds, turns, timed = runs(TWO)
    fit = fit_tow_runs(speeds * 1.001, turns, timed, pieces=2)
    rated = velocity(turns, timed, fit.pieces)
    assert rated.velocity_ms == pytest.approx(fit.fitted_ms)
    assert not rated.outside.any()


@settings(max_examples=25)
@given(order=st.permutations(range(len(N))), seed=st.integers(0, 1000))
def test_the_order_of_the_runs_does_not_matter(order, seed):
    speeds, turns, timed = runs(TWO)
    speeds = speeds + np.random.default_rng(seed).normal(0, 0.0002, len(speeds))
    straight = fit_tow_runs(speeds, turns, timed, pieces=2)
    shuffled = fit_tow_runs(speeds[order], turns[order], timed[order], pieces=2)
    assert shuffled.residual_ms == pytest.approx(straight.residual_ms[order], abs=1e-12)


@settings(max_examples=25)
@given(seed=st.integers(0, 1000))
def test_every_piece_keeps_five_runs_and_meets_its_neighbour(seed):
    speeds, turns, timed = runs(THREE)
    speeds = speeds + np.random.default_rng(seed).normal(0, 0.0003, len(speeds))
    fit = fit_tow_runs(speeds, turns, timed, pieces=2)
    lower, upper = fit.pieces
    assert np.bincount(fit.piece_of_run).min() >= 5
    assert lower.velocity_ms(lower.n_to) == pytest.approx(upper.velocity_ms(upper.n_from))


@pytest.mark.parametrize(("count", "pieces"), [(4, 1), (9, 2), (14, 3)])
def test_fewer_than_five_runs_in_a_piece_are_refused_with_a_sentence(count, pieces):
    speeds, turns, timed = runs(TWO, N[:count])
    with pytest.raises(Refused, match=f"{count} tow runs; every piece needs at least 5"):
        fit_tow_runs(speeds, turns, timed, pieces=pieces)


def test_runs_that_leave_no_room_for_a_break_are_refused():
    n = np.array([1.0] * 5 + [2.0] * 5)
    with pytest.raises(Refused, match="No break among the runs gives 2 pieces"):
        fit_tow_runs(0.01 + 0.25 * n, n, np.ones(10), pieces=2)


@pytest.mark.parametrize("speeds", [[0.5] * 5, [0.5, 0.4, 0.3, 0.2, 0.1]])
def test_runs_without_a_rising_line_are_refused(speeds):
    with pytest.raises(Refused, match="no line that rises"):
        fit_tow_runs(speeds, [1, 2, 3, 4, 5], [1] * 5)


@pytest.mark.parametrize("field_name", ["speeds_ms", "revolutions", "seconds"])
@pytest.mark.parametrize("bad", [0.0, -1.0, np.nan])
def test_a_bad_run_is_refused_by_row_and_field(field_name, bad):
    values = dict(zip(("speeds_ms", "revolutions", "seconds"), runs(TWO), strict=True))
    values[field_name][2] = bad
    with pytest.raises(Refused, match="Run 3") as refused:
        fit_tow_runs(**values)
    assert (refused.value.row, refused.value.field_name) == (3, field_name)


def test_columns_of_different_length_are_refused():
    with pytest.raises(ValueError, match="one length"):
        fit_tow_runs([0.1] * 6, [1] * 5, [1] * 6)
