"""Tests of gaugings against a rating, against scipy's exact binomial and worked by hand."""

import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st
from scipy.stats import binom, binomtest, ttest_1samp

from network.numerics.ratings.rating_tests import bias_test, in_a_row, sign_change_test, sign_test

NAN = np.nan


def test_eleven_of_twelve_below_say_that_the_curve_lies_high():
    deviations = np.array([-3, -2, -1, -4, 2, -3, -2, -1, -5, -2, -3, -1.0])
    result = sign_test(deviations)
    # exact: 2·(1 + 12)/2¹² = 0.00635
    assert result.p_value == pytest.approx(26 / 4096, rel=1e-12)
    assert not result.passed
    assert str(result.verdict) == "11 of 12 gaugings below the curve: the curve lies high."
    assert str(sign_test(-deviations).verdict) == (
        "11 of 12 gaugings above the curve: the curve lies low."
    )


@given(st.integers(0, 30), st.integers(0, 30))
def test_the_sign_test_is_scipys_binomial_test(above, below):
    result = sign_test(np.array([1.0] * above + [-1.0] * below))
    n = above + below
    assert result.p_value == pytest.approx(binomtest(above, n).pvalue if n else 1.0, rel=1e-12)
    assert (result.statistic, result.gaugings) == (above, n)


def test_gaugings_on_the_curve_and_missing_ones_do_not_count():
    result = sign_test(np.array([0.0, NAN, 1.0, -1.0, 2.0]))
    assert (result.statistic, result.gaugings) == (2, 3)
    assert result.passed
    assert str(result.verdict) == "2 of 3 on one side: no sign that the curve lies off."


def test_changes_of_side_are_counted_along_the_stage():
    stage_m = np.array([4.0, 1, 3, 2])
    result = sign_change_test(stage_m, np.array([1.0, 1, -1, 1]))  # by stage: + + − +
    assert (result.statistic, result.gaugings) == (2, 4)


@pytest.mark.parametrize("changes", range(20))
def test_the_sign_change_test_is_the_exact_binomial_of_n_minus_1(changes):
    # 20 gaugings, 19 neighbours; not the Wald-Wolfowitz runs test of the statistics packages
    signs = np.cumprod([1.0] + [-1.0] * changes + [1.0] * (19 - changes))
    result = sign_change_test(np.arange(20.0), signs)
    tail = min(binom.cdf(changes, 19, 0.5), binom.sf(changes - 1, 19, 0.5))
    assert result.statistic == changes
    assert result.p_value == pytest.approx(min(1, 2 * tail), rel=1e-9)


def test_too_few_and_too_many_changes_are_told_apart():
    few = sign_change_test(np.arange(20.0), np.repeat([1.0, -1.0], 10))
    many = sign_change_test(np.arange(20.0), np.tile([1.0, -1.0], 10))
    assert str(few.verdict) == (
        "Only 1 changes of side in 20 gaugings: the curve lies off over stretches."
    )
    assert str(many.verdict) == (
        "19 changes of side in 20 gaugings: more than chance would have it."
    )
    assert not few.passed
    assert not many.passed


def test_one_gauging_or_none_proves_nothing():
    for values in ([], [1.0]):
        assert sign_test(np.array(values)).passed
        assert sign_change_test(np.arange(float(len(values))), np.array(values)).passed
        assert bias_test(np.array(values)).passed


def test_the_bias_test_is_scipys_t_test():
    deviations = np.random.default_rng(4).normal(3, 5, 15)
    result = bias_test(np.append(deviations, NAN))
    assert result.p_value == pytest.approx(ttest_1samp(deviations, 0).pvalue, rel=1e-12)
    assert result.statistic == pytest.approx(deviations.mean(), rel=1e-12)


def test_the_bias_is_said_in_words():
    assert str(bias_test(np.array([4.0, 6, 5, 5])).verdict) == (
        "Mean deviation of 4 gaugings +5.0 %: the curve lies low."
    )
    assert str(bias_test(np.array([-5.0, -5])).verdict) == (
        "Mean deviation of 2 gaugings -5.0 %: the curve lies high."
    )
    assert str(bias_test(np.array([-5.0, 5])).verdict) == (
        "Mean deviation of 2 gaugings +0.0 %: no bias shown."
    )


@pytest.mark.parametrize(
    ("deviations", "count", "side"),
    [
        ([1, -9, 7, 8, 9], 3, "above"),
        ([9, -7, -8], 2, "below"),
        ([7, 8, 9], 3, "above"),
        ([7, 8, 5], 0, None),  # the last is within its limit
        ([7, 5, 8], 1, "above"),
        ([7, NAN, 8], 1, "above"),
        ([7, 8, NAN], 0, None),
        ([], 0, None),
    ],
)
def test_the_last_gaugings_in_a_row_beyond_their_limits(deviations, count, side):
    found = in_a_row(np.array(deviations, dtype=float), np.full(len(deviations), 6.0))
    assert (found.count, found.side) == (count, side)


def test_each_gauging_has_its_own_limit():
    assert in_a_row(np.array([5.0, 5, 5]), np.array([4.0, 6, 4])).count == 1
