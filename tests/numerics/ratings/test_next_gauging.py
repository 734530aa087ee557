"""Where the next gauging narrows a rating most."""

import numpy as np
import pytest

from network.numerics.ratings.next_gauging import narrowing_bands
from network.numerics.ratings.rating_fit import fit_rating
from network.numerics.ratings.rating_parts import FitChoice

OCCURRED_M = np.random.default_rng(1).uniform(0.3, 3.0, 2000)
GAUGED_M = np.linspace(0.4, 1.5, 12)


def fitted(stage_m=GAUGED_M):
    noise = np.exp(np.random.default_rng(2).normal(0, 0.05, len(stage_m)))
    return fit_rating(
        stage_m, 5 * stage_m**1.8 * noise, np.full(len(stage_m), 8.0), choice=FitChoice((0.0,))
    )


def test_by_volume_the_ungauged_high_flows_come_first():
    best = narrowing_bands(fitted(), OCCURRED_M, gauged_stage_m=GAUGED_M)[0]
    assert best.upper_stage_m == pytest.approx(3.0, abs=0.01)
    assert best.gaugings == 0


def test_by_time_low_flows_count_when_they_are_what_occurs():
    stage_m = np.append(np.full(3000, 0.12), 2.9)
    low = narrowing_bands(fitted(), stage_m, gauged_stage_m=GAUGED_M, weighted_by="time")[0]
    assert low.lower_stage_m == pytest.approx(0.12)
    assert low.share == pytest.approx(3000 / 3001)
    flood = narrowing_bands(
        fitted(), np.append(np.full(300, 0.12), np.full(30, 2.9)), gauged_stage_m=GAUGED_M
    )[0]
    assert flood.upper_stage_m == pytest.approx(2.9)  # most of the volume


def test_the_figure_promised_is_the_one_a_gauging_there_brings():
    fit = fitted()
    bands = narrowing_bands(fit, OCCURRED_M, gauged_stage_m=GAUGED_M)
    best, now = bands[0], bands[0].mean_u95_percent_now
    middle_m = (best.lower_stage_m + best.upper_stage_m) / 2
    # the textbook update: add x·xᵀ/s² to the information matrix and invert again
    segment = fit.segments[0]
    x, stages_m = (
        np.log(GAUGED_M),
        np.array([(b.lower_stage_m + b.upper_stage_m) / 2 for b in bands]),
    )
    design = np.column_stack([np.ones(12), x])
    information = design.T @ (design * fit.weights[:, None]) / segment.sums.variance
    new = np.array([1, np.log(middle_m)])
    covariance = np.linalg.inv(information + np.outer(new, new) / segment.scatter**2)
    at = np.column_stack([np.ones(len(stages_m)), np.log(stages_m)])
    variance = np.einsum("ij,jk,ik->i", at, covariance, at)
    share = np.array([b.share for b in bands])
    assert best.mean_u95_percent_after == pytest.approx(200 * np.sqrt(share @ variance), rel=1e-9)
    assert best.mean_u95_percent_after < now
    assert share.sum() == pytest.approx(1)
    assert sum(b.gaugings for b in bands) == 12


def test_bands_are_ranked_for_a_searched_zero_too():
    noise = np.exp(np.random.default_rng(2).normal(0, 0.05, 12))
    fit = fit_rating(
        GAUGED_M, 5 * GAUGED_M**1.8 * noise, np.full(12, 8.0), choice=FitChoice((None,)), draws=200
    )
    bands = narrowing_bands(fit, OCCURRED_M, gauged_stage_m=GAUGED_M, bands=5)
    after = [band.mean_u95_percent_after for band in bands]
    assert after == sorted(after)
    assert after[-1] <= bands[0].mean_u95_percent_now
    assert bands[0].lower_stage_m > 1.5


def test_stages_without_flow_are_left_out_and_none_at_all_is_refused():
    dry = np.append(OCCURRED_M, [-0.5, np.nan])
    bands = narrowing_bands(fitted(), dry, gauged_stage_m=GAUGED_M)
    assert min(band.lower_stage_m for band in bands) == OCCURRED_M.min()
    with pytest.raises(ValueError, match="No stage"):
        narrowing_bands(fitted(), np.array([-1.0]), gauged_stage_m=GAUGED_M)
