"""The duration curve against a published example with ties and against scipy."""

import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st
from scipy.stats import rankdata

from network.numerics.years.duration import duration_curve, exceeded, standard_percentiles

NAN = np.nan


def test_ties_take_the_mean_rank_and_missing_days_are_left_out():
    # published example (reference README, section 8): 10, 5, 0, 15, 8, –, 0, 20
    flows = np.array([10, 5, 0, 15, 8, NAN, 0, 20.0])
    curve = duration_curve(flows)
    assert curve.values.tolist() == [20, 15, 10, 8, 5, 0, 0]
    assert curve.exceedance.tolist() == [0.125, 0.25, 0.375, 0.5, 0.625, 0.8125, 0.8125]


@given(st.lists(st.integers(0, 20), min_size=1, max_size=60))
def test_the_ranks_are_those_of_scipy(values):
    flows = np.array(values, dtype=float)
    curve = duration_curve(flows)
    expected = np.sort(rankdata(-flows, method="average") / (len(flows) + 1))
    np.testing.assert_array_equal(curve.exceedance, expected)


def test_between_ranks_the_flow_is_linear_and_beyond_them_unknown():
    curve = duration_curve(np.array([4.0, 3.0, 2.0, 1.0]))  # P = 0.2, 0.4, 0.6, 0.8
    found = exceeded(curve, np.array([10.0, 20, 30, 80, 90]))
    np.testing.assert_allclose(found, [NAN, 4, 3.5, 1, NAN], rtol=1e-12)


@given(st.lists(st.floats(0, 1e4), min_size=120, max_size=400))
def test_the_percentiles_are_numpys_weibull_quantiles(values):
    flows = np.array(values)
    found = standard_percentiles(duration_curve(flows))
    for percent, value in found.items():
        expected = np.quantile(flows, 1 - percent / 100, method="weibull")
        # both interpolate the same two neighbours; the positions differ by rounding
        assert value == pytest.approx(expected, rel=1e-9, abs=1e-9)


def test_a_record_without_a_day_has_no_percentiles():
    assert np.isnan(list(standard_percentiles(duration_curve(np.array([NAN]))).values())).all()
