"""Meter equations and least squares against published and certified figures."""

import numpy as np
import pytest

from network.numerics.meters.meter_rating import Piece, joint_gaps, velocity
from network.numerics.meters.tow_runs import fit_tow_runs

# NIST Statistical Reference Datasets, Norris (linear least squares, certified values).
NORRIS_X = (
    "0.2 337.4 118.2 884.6 10.1 226.5 666.3 996.3 448.6 777.0 558.2 0.4 0.6 775.5 666.9 338.0 "
    "447.5 11.6 556.0 228.1 995.8 887.6 120.2 0.3 0.3 556.8 339.1 887.2 999.0 779.0 11.1 118.3 "
    "229.2 669.1 448.9 0.5"
)
NORRIS_Y = (
    "0.1 338.8 118.1 888.0 9.2 228.1 668.5 998.5 449.1 778.9 559.2 0.3 0.1 778.1 668.8 339.3 "
    "448.9 10.8 557.7 228.3 998.0 888.8 119.6 0.3 0.6 557.6 339.3 888.0 998.5 778.9 10.2 117.6 "
    "228.9 668.4 449.2 0.2"
)


def test_least_squares_give_the_certified_norris_values():
    x, y = (np.array(text.split(), dtype=float) for text in (NORRIS_X, NORRIS_Y))
    fit = fit_tow_runs(y, x, np.ones(len(x)))
    [piece] = fit.pieces
    # certified to 15 digits; sums of values near 1000 leave about 11 in the small intercept
    assert piece.a_ms == pytest.approx(-0.262323073774029, rel=1e-10)
    assert piece.b_m == pytest.approx(1.00211681802045, rel=1e-13)
    assert fit.standard_error_ms == pytest.approx(0.884796396144373, rel=1e-12)
    assert fit.piece_standard_errors_ms == (fit.standard_error_ms,)


def test_two_tows_give_the_published_equation():
    # 12 rev/50 s → 0.25 m/s, 30 rev/50 s → 0.46 m/s give b 0.5833, a 0.11; three of each, since
    # a piece needs five runs. Tolerances are the printed digits.
    fit = fit_tow_runs([0.25, 0.46] * 3, [12, 30] * 3, [50] * 6)
    [piece] = fit.pieces
    assert piece.b_m == pytest.approx(0.5833, abs=0.00005)
    assert piece.a_ms == pytest.approx(0.11, abs=0.005)
    [found_ms] = velocity(50, 60, fit.pieces).velocity_ms
    assert found_ms == pytest.approx(0.596, abs=0.0005)


# Published research code: n < 0.69 v = 0.2330 n + 0.019; n > 0.69 v = 0.2520 n + 0.006.
TWO_PIECES = (Piece(0.019, 0.2330, 0.05, 0.69), Piece(0.006, 0.2520, 0.69, 5.0))


def test_the_joint_of_two_pieces_is_measured():
    [gap] = joint_gaps(TWO_PIECES)
    assert gap.lower_ms == pytest.approx(0.17977, abs=0.000005)  # as printed
    assert gap.upper_ms == pytest.approx(0.17988, abs=0.000005)
    assert gap.crossing_per_s == pytest.approx(0.684, abs=0.0005)
    assert gap.gap_percent == pytest.approx(0.0612, abs=0.0001)  # 0.00011/0.17977


def test_each_side_of_the_joint_takes_its_own_piece():
    below, above = velocity([0.68 * 50, 0.70 * 50], 50, TWO_PIECES).velocity_ms
    assert below == pytest.approx(0.2330 * 0.68 + 0.019)
    assert above == pytest.approx(0.2520 * 0.70 + 0.006)


def test_the_polymer_rotor_gives_its_published_velocities():
    # USGS SW memo 88.09: V = 2.456 R + 0.020 in ft/s; the line knows no unit.
    rotor = (Piece(0.020, 2.456, 0.1, 10.0),)
    found = velocity([40, 160], [40, 40], rotor)
    assert found.velocity_ms == pytest.approx([2.476, 9.844], abs=1e-9)
