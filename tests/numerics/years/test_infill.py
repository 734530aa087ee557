"""Estimates for missing days: what they give, what they say and what they refuse."""

import numpy as np
import pytest
from scipy.stats import linregress

from network.numerics.years.infill import (
    InfillRefused,
    from_neighbour,
    neighbour_regression,
    recession,
    straight_line,
    winter_ratio,
)

NAN = np.nan
DAYS = np.array([1.0, 2.0, 3.0])


def test_a_straight_line_by_hand():
    filled = straight_line(DAYS, before=(0.0, 8.0), after=(4.0, 4.0))
    assert filled.flow_m3s.tolist() == [7.0, 6.0, 5.0]
    assert str(filled.method) == "Straight line from 8 to 4 m³/s."


def test_a_recession_halves_in_equal_times():
    filled = recession(DAYS, before=(0.0, 16.0), after=(4.0, 1.0))
    assert filled.flow_m3s.tolist() == pytest.approx([8.0, 4.0, 2.0], rel=1e-12)
    # k = 4/ln 16 = 1.4427 days
    assert str(filled.method) == "Exponential recession from 16 to 1 m³/s, k = 1.44 days."


@pytest.mark.parametrize("flows", [(4.0, 4.0), (4.0, 5.0), (4.0, 0.0)])
def test_a_recession_that_does_not_fall_or_ends_dry_is_refused(flows):
    with pytest.raises(InfillRefused, match="falls and stays above zero"):
        recession(DAYS, before=(0.0, flows[0]), after=(4.0, flows[1]))


@pytest.mark.parametrize("method", [straight_line, recession])
@pytest.mark.parametrize(
    ("before", "after"),
    [((1.0, 8.0), (4.0, 4.0)), ((0.0, 8.0), (3.0, 4.0)), ((0.0, NAN), (4.0, 1.0))],
)
def test_points_that_do_not_enclose_the_gap_are_refused(method, before, after):
    with pytest.raises(InfillRefused, match="enclose"):
        method(DAYS, before=before, after=after)


def pair(n=60):
    random = np.random.default_rng(6)
    neighbour = np.exp(random.normal(1, 0.8, n))
    return 0.7 * neighbour**1.1 * np.exp(random.normal(0, 0.2, n)), neighbour


def test_the_regression_is_scipys_in_logarithms_with_the_bias_made_up_for():
    flow, neighbour = pair()
    found = neighbour_regression(flow, neighbour)
    expected = linregress(np.log(neighbour), np.log(flow))
    assert (found.slope, found.intercept) == pytest.approx((expected.slope, expected.intercept))
    assert found.r2 == pytest.approx(expected.rvalue**2)
    residual = np.log(flow) - expected.intercept - expected.slope * np.log(neighbour)
    assert found.s_e == pytest.approx(np.sqrt(residual @ residual / 58))
    filled = from_neighbour(np.array([2.0]), found, neighbour="Lower Mill")
    plain = np.exp(found.intercept) * 2.0**found.slope
    assert filled.flow_m3s[0] == pytest.approx(plain * np.exp(found.s_e**2 / 2))


def test_the_bias_factor_brings_the_mean_back():
    flow, neighbour = pair(20_000)
    found = neighbour_regression(flow, neighbour)
    filled = from_neighbour(neighbour, found, neighbour="Lower Mill").flow_m3s
    # 20,000 days with 20 % scatter: the mean is known to about 0.3 %; uncorrected it is 2 % low
    assert filled.mean() == pytest.approx(flow.mean(), rel=0.006)
    assert filled.mean() / found.bias_factor < 0.99 * flow.mean()


def test_the_regression_says_what_it_rests_on():
    neighbour = np.geomspace(1, 100, 12)
    found = neighbour_regression(2 * neighbour, neighbour)
    filled = from_neighbour(np.array([10.0, 200.0, 0.0, NAN]), found, neighbour="Lower Mill")
    np.testing.assert_allclose(filled.flow_m3s, [20, 400, 0, NAN], rtol=1e-12)
    assert str(filled.method) == (
        "Log-log regression on Lower Mill: n = 12, r² = 1.000, s_e = 0.0 %, bias factor 1.0000 "
        "applied, slope 1.000; 2 days outside its range."
    )


def test_missing_and_dry_days_are_left_out_and_ten_common_days_are_needed():
    flow, neighbour = pair(12)
    flow[0], neighbour[1] = NAN, 0.0
    assert neighbour_regression(flow, neighbour).n == 10
    flow[2] = 0.0
    with pytest.raises(InfillRefused, match="9 common days"):
        neighbour_regression(flow, neighbour)
    with pytest.raises(InfillRefused, match="at one flow"):
        neighbour_regression(np.arange(1, 21.0), np.full(20, 3.0))


def test_the_winter_ratio_is_linear_between_gaugings_and_silent_beyond_them():
    days = np.arange(6.0)
    filled = winter_ratio(
        days,
        np.full(6, 10.0),
        gauged_times=np.array([1.0, 3.0, 4.0]),
        ratios=np.array([1.0, 0.6, 0.5]),
    )
    np.testing.assert_allclose(filled.flow_m3s, [NAN, 10, 8, 6, 5, NAN])
    assert str(filled.method) == (
        "Winter ratio, measured over open-water flow, 0.500 to 1.000, linear between 3 points."
    )


@pytest.mark.parametrize(
    ("times", "ratios"), [([1.0], [0.5]), ([2.0, 1.0], [0.5, 0.5]), ([1.0, 2.0], [0.5, -0.5])]
)
def test_a_winter_ratio_without_proper_gaugings_is_refused(times, ratios):
    with pytest.raises(InfillRefused, match="two or more"):
        winter_ratio(DAYS, np.ones(3), gauged_times=np.array(times), ratios=np.array(ratios))
