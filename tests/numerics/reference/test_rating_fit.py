"""The rating fit against a certified power law and against its own promise of 95 %."""

import numpy as np
import pytest
from scipy.optimize import curve_fit

from network.numerics.ratings.rating_fit import fit_rating
from network.numerics.ratings.rating_parts import FitChoice
from tests.numerics.synthetic_gaugings import (
    JOINT_M,
    LOWER,
    STAGES_M,
    UPPER,
    ZEROS_M,
    drawn_flow,
    true_flow,
)
from tests.reference import reference_file

# NIST StRD DanWood, y = b1·x^b2, fitted in y (not in ln y)
B1, B2 = 7.6886226176e-01, 3.8604055871e00
SD_B2 = 5.1726610913e-02
AT_M = np.linspace(0.45, 3.4, 12)


@pytest.fixture(scope="module")
def danwood():
    lines = reference_file("data/nist_DanWood.dat").read_text().splitlines()
    start = max(k for k, line in enumerate(lines) if line.startswith("Data:"))
    y, x = np.array([line.split() for line in lines[start + 1 :] if line.strip()], dtype=float).T
    return x, y


def test_scipys_fit_in_y_gives_the_certified_values(danwood):
    x, y = danwood
    values, _ = curve_fit(lambda x, b1, b2: b1 * x**b2, x, y, p0=[1, 5])
    assert tuple(values) == pytest.approx((B1, B2), rel=1e-6)


def test_the_fit_in_logarithms_agrees_with_scipys_under_the_same_weights(danwood):
    x, y = danwood
    fit = fit_rating(x, y, np.full(6, 5.0), choice=FitChoice((0.0,)))
    (segment,) = fit.segments
    sigma = 1 / np.sqrt(fit.weights)
    values, _ = curve_fit(lambda x, a, b: a + b * np.log(x), x, np.log(y), sigma=sigma)
    assert (np.log(segment.c), segment.b) == pytest.approx(tuple(values), rel=1e-6)
    # another criterion on the same data: the certified values lie well inside the intervals
    assert segment.c_95[0] < B1 < segment.c_95[1]
    assert segment.b_95[0] < B2 < segment.b_95[1]


def test_weights_that_undo_the_logarithm_lead_to_the_certified_values(danwood):
    x, y = danwood
    # u in ln y of 50/y, far above the scatter, makes the weights those of a fit in y
    fit = fit_rating(x, y, 1e4 / y, choice=FitChoice((0.0,)))
    (segment,) = fit.segments
    # the residuals of 1 % leave a difference of second order between ln y and y
    assert (segment.c, segment.b) == pytest.approx((B1, B2), rel=1e-3)
    half = (segment.b_95[1] - segment.b_95[0]) / 2
    assert half == pytest.approx(2.7764 * SD_B2, rel=1e-2)  # t at 4


def covered(interval, truth):
    return interval[0] <= truth <= interval[1]


def coverage(choice, *, at_m, draws, redraws=500):
    """Count how often the intervals and the band hold the truth over seeded draws."""
    hits, band = [], []
    for seed in range(draws):
        flow, u95 = drawn_flow(STAGES_M, seed=seed), np.full(len(STAGES_M), 10.0)
        fit = fit_rating(STAGES_M, flow, u95, choice=choice, draws=redraws)
        row = {"joint": covered(fit.joints_95_m[0], JOINT_M)}
        for name, ours, truth in zip("12", fit.segments, (LOWER, UPPER), strict=True):
            row["c" + name] = covered(ours.c_95, truth.c)
            row["b" + name] = covered(ours.b_95, truth.b)
            if ours.h0_95_m:
                row["h0" + name] = covered(ours.h0_95_m, truth.h0_m)
        hits.append(row)
        low, high = fit.band_at(at_m)
        band.append((low <= true_flow(at_m)) & (true_flow(at_m) <= high))
    shares = {name: float(np.mean([row[name] for row in hits])) for name in hits[0]}
    return shares, np.mean(band, axis=0)


def test_with_breaks_and_zeros_given_95_percent_means_95_percent():
    # 1,000 draws of 40 gaugings with 5 % noise: a share of 95 % is known to ±0.7 % (one standard
    # deviation), so 93–97 % is what an exact interval keeps
    parameters, band = coverage(FitChoice(ZEROS_M, (JOINT_M,)), at_m=AT_M, draws=1000)
    assert set(parameters) == {"c1", "b1", "c2", "b2", "joint"}
    assert all(0.93 <= share <= 0.97 for share in parameters.values()), parameters
    assert all(0.93 <= share <= 0.97 for share in band), band


def test_with_breaks_and_zeros_searched_the_coverage_is_not_below_90_percent():
    # 300 draws keep the time down; a share of 90 % is then known to ±1.7 %, so each is held to 90 %
    # less two of these and the means to 90 %. Found: 92–97 % for the parameters, 90–99 % for
    # the band, 89 % at the joint and up to 5 cm above it, where crossing curves cut the corner.
    at_m, choice = np.append(AT_M, JOINT_M), FitChoice((None, None), (None,))
    parameters, band = coverage(choice, at_m=at_m, draws=300, redraws=300)
    assert set(parameters) == {"c1", "b1", "h01", "c2", "b2", "h02", "joint"}
    assert all(share >= 0.866 for share in parameters.values()), parameters
    assert np.mean(list(parameters.values())) >= 0.90
    assert band.min() >= 0.866, band
    assert band.mean() >= 0.90
