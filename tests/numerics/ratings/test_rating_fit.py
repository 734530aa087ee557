"""The rating fit: against scipy and statsmodels, on known curves, and what it refuses."""

import numpy as np
import pytest
import statsmodels.api as sm
from scipy.optimize import curve_fit

from network.numerics.ratings.rating_fit import deviations_percent, fit_rating
from network.numerics.ratings.rating_parts import FitChoice, FitRefused
from tests.numerics.synthetic_gaugings import (
    JOINT_M,
    LOWER,
    STAGES_M,
    UPPER,
    ZEROS_M,
    drawn_flow,
    true_flow,
)

TEN = np.full(len(STAGES_M), 10.0)  # U₉₅ of every gauging, %
LOW = STAGES_M < JOINT_M


def uneven(n, seed=7):
    return np.random.default_rng(seed).uniform(3, 12, n)


def fit_two(choice, *, seed=1, u95=TEN, **options):
    return fit_rating(STAGES_M, drawn_flow(STAGES_M, seed=seed), u95, choice=choice, **options)


def test_a_given_zero_agrees_with_curve_fit_under_the_same_weights():
    stage_m, u95 = STAGES_M[LOW], uneven(20)
    flow = drawn_flow(stage_m, seed=3)
    fit = fit_rating(stage_m, flow, u95, choice=FitChoice((0.2,)))
    values, covariance = curve_fit(
        lambda h, ln_c, b: ln_c + b * np.log(h - 0.2),
        stage_m,
        np.log(flow),
        p0=[1, 1.5],
        sigma=1 / np.sqrt(fit.weights),
    )
    (segment,) = fit.segments
    # curve_fit stops at 1e-8
    assert (np.log(segment.c), segment.b) == pytest.approx(tuple(values), rel=1e-6)
    # half the interval is t at N − 2 times curve_fit's standard deviation
    half = (segment.b_95[1] - segment.b_95[0]) / 2
    assert half == pytest.approx(2.1009 * np.sqrt(covariance[1, 1]), rel=1e-4)


def test_a_searched_zero_agrees_with_curve_fit_under_the_same_weights():
    stage_m, u95 = STAGES_M[LOW], uneven(20)
    flow = drawn_flow(stage_m, seed=3)
    fit = fit_rating(stage_m, flow, u95, choice=FitChoice((None,)))
    values, _ = curve_fit(
        lambda h, ln_c, b, h0: ln_c + b * np.log(h - h0),
        stage_m,
        np.log(flow),
        p0=[1, 1.5, 0.2],
        sigma=1 / np.sqrt(fit.weights),
        bounds=([-np.inf, 0, -2], [np.inf, 9, 0.4199]),
    )
    (segment,) = fit.segments
    # the residual sum is flat at its least: both stop within about 1e-5 of h₀
    assert (np.log(segment.c), segment.b, segment.h0_m) == pytest.approx(tuple(values), rel=2e-4)


def test_the_band_agrees_with_statsmodels():
    stage_m, u95 = STAGES_M[LOW], uneven(20)
    flow = drawn_flow(stage_m, seed=4)
    fit = fit_rating(stage_m, flow, u95, choice=FitChoice((0.2,)))
    model = sm.WLS(np.log(flow), sm.add_constant(np.log(stage_m - 0.2)), weights=fit.weights).fit()
    at = np.array([0.3, 0.5, 0.9, 1.1, 2.0])
    frame = model.get_prediction(sm.add_constant(np.log(at - 0.2))).summary_frame(alpha=0.05)
    lower, upper = fit.band_at(at)
    # the same closed form twice
    np.testing.assert_allclose(np.log(lower), frame["mean_ci_lower"], rtol=1e-9, atol=1e-12)
    np.testing.assert_allclose(np.log(upper), frame["mean_ci_upper"], rtol=1e-9, atol=1e-12)
    (segment,) = fit.segments
    c_95, b_95 = model.conf_int(0.05)
    assert segment.b_95 == pytest.approx(tuple(b_95), rel=1e-9)
    assert tuple(np.log(segment.c_95)) == pytest.approx(tuple(c_95), rel=1e-9)


@pytest.mark.parametrize(
    "choice",
    [
        FitChoice(ZEROS_M, (JOINT_M,)),
        FitChoice(ZEROS_M, (None,)),
        FitChoice((None, None), (JOINT_M,)),
        FitChoice((None, None), (None,)),
    ],
    ids=["all given", "break searched", "zeros searched", "all searched"],
)
def test_gaugings_exactly_on_a_curve_give_that_curve_back(choice):
    fit = fit_rating(STAGES_M, true_flow(STAGES_M), TEN, choice=choice, draws=20)
    lower, upper = fit.segments
    # a flat minimum of the residual sum leaves h₀ good to about 1e-4 where it is searched
    assert (lower.c, lower.h0_m, lower.b) == pytest.approx((LOWER.c, 0.2, 1.6), rel=1e-3)
    assert (upper.c, upper.h0_m, upper.b) == pytest.approx((UPPER.c, 0.6, 2.4), rel=1e-3)
    assert upper.lower_stage_m == pytest.approx(JOINT_M, abs=1e-3)
    assert np.abs(fit.deviations_percent).max() < 0.01
    assert np.abs(fit.joint_gaps).max() < 1e-6


def test_the_order_of_the_gaugings_does_not_matter():
    flow, order = drawn_flow(STAGES_M, seed=1), np.random.default_rng(2).permutation(40)
    choice = FitChoice(ZEROS_M, (JOINT_M,))
    straight = fit_rating(STAGES_M, flow, TEN, choice=choice)
    mixed = fit_rating(STAGES_M[order], flow[order], TEN, choice=choice)
    assert mixed.segments == straight.segments
    np.testing.assert_array_equal(mixed.deviations_percent, straight.deviations_percent[order])
    np.testing.assert_array_equal(mixed.segment_of, straight.segment_of[order])


def test_one_very_good_gauging_does_not_rule():
    stage_m = STAGES_M[LOW]
    flow, u95 = drawn_flow(stage_m, seed=3), np.full(20, 10.0)
    flow[0] *= 1.15
    u95[0] = 0.01
    fit = fit_rating(stage_m, flow, u95, choice=FitChoice((0.2,)))
    scatter = fit.segments[0].scatter
    # bare weights 1/u² would give it a million times the weight of the others
    assert fit.weights[0] / fit.weights[1] == pytest.approx(1 + (0.05 / scatter) ** 2, rel=1e-3)
    assert abs(fit.deviations_percent[0]) > 5


def test_the_scatter_is_the_one_its_own_weights_give():
    stage_m, u95 = STAGES_M[LOW], uneven(20)
    flow = drawn_flow(stage_m, seed=5)
    fit = fit_rating(stage_m, flow, u95, choice=FitChoice((0.2,)))
    (segment,) = fit.segments
    np.testing.assert_allclose(fit.weights, 1 / ((u95 / 200) ** 2 + segment.scatter**2), rtol=1e-6)
    residual = np.log(flow / fit.flow_at(stage_m))
    mean_square = (fit.weights @ residual**2) / fit.weights.sum() * 20 / 18
    assert segment.scatter == pytest.approx(np.sqrt(mean_square), rel=1e-6)


def test_gaugings_of_zero_flow_are_left_out_and_counted():
    stage_m = np.append(STAGES_M[LOW], [0.15, 0.1])
    flow = np.append(drawn_flow(STAGES_M[LOW], seed=3), [0, 0])
    fit = fit_rating(stage_m, flow, np.full(22, 10.0), choice=FitChoice((0.2,)))
    without = fit_rating(stage_m[:20], flow[:20], np.full(20, 10.0), choice=FitChoice((0.2,)))
    assert fit.zero_flows_left_out == 2
    assert fit.segments == without.segments
    assert np.isnan(fit.deviations_percent[20:]).all()
    assert fit.weights[20:].tolist() == [0, 0]
    assert fit.segment_of[20:].tolist() == [-1, -1]
    assert fit.flow_at(np.array([0.15, 0.2])).tolist() == [0, 0]
    assert (fit.gauged_lowest_m, fit.gauged_highest_m) == (0.42, 1.17)


def test_two_segments_are_joined_where_their_curves_cross():
    fit = fit_two(FitChoice(ZEROS_M, (JOINT_M,)))
    lower, upper = fit.segments
    at = upper.lower_stage_m
    below = lower.c * (at - lower.h0_m) ** lower.b
    assert below == pytest.approx(upper.c * (at - upper.h0_m) ** upper.b, rel=1e-9)
    ((low, high),) = fit.joints_95_m
    assert low < at < high
    assert low < JOINT_M < high
    rated = fit.curve(lowest_use_m=0.3, highest_use_m=4.0)
    np.testing.assert_allclose(rated.flow_at(STAGES_M), fit.flow_at(STAGES_M), rtol=1e-12)
    assert (rated.gauged_lowest_m, rated.gauged_highest_m) == (STAGES_M[0], STAGES_M[-1])


def test_a_searched_break_is_the_best_of_all_breaks():
    flow = drawn_flow(STAGES_M, seed=8)
    searched = fit_rating(STAGES_M, flow, TEN, choice=FitChoice(ZEROS_M, (None,)))

    def residual_sum(first):
        total = 0.0
        for part, h0 in ((slice(first), 0.2), (slice(first, None), 0.6)):
            x, y = np.log(STAGES_M[part] - h0), np.log(flow[part])
            total += np.polyfit(x, y, 1, full=True)[1][0]
        return total

    # equal U, so the weights are even; polyfit on every admissible break
    best = min((k for k in range(5, 36) if STAGES_M[k] > 0.6), key=residual_sum)
    assert (searched.segment_of == 1).argmax() == best


def test_three_segments_with_two_searched_breaks_are_found():
    stage_m = np.linspace(0.3, 4.0, 60)
    flow = np.where(stage_m < 1, 2 * stage_m**1.2, 2 * stage_m**2.2)
    flow = np.where(stage_m < 2.5, flow, 2 * 2.5**2.2 * (stage_m / 2.5) ** 1.4)
    noise = np.exp(np.random.default_rng(5).normal(0, 0.01, 60))
    choice = FitChoice((0.0, 0.0, 0.0), (None, None))
    fit = fit_rating(stage_m, flow * noise, np.full(60, 5.0), choice=choice, draws=100)
    # 1 % noise leaves the joints good to some centimetres, the exponents to some hundredths
    assert [s.b for s in fit.segments] == pytest.approx([1.2, 2.2, 1.4], abs=0.06)
    assert [s.lower_stage_m for s in fit.segments[1:]] == pytest.approx([1, 2.5], abs=0.06)
    # whether the intervals keep their promise takes many draws: tests/numerics/reference
    for (low, high), segment in zip(fit.joints_95_m, fit.segments[1:], strict=True):
        assert low < segment.lower_stage_m < high
        assert high - low < 0.2


def test_the_bootstrap_repeats_itself_and_depends_on_its_seed():
    flow, choice = drawn_flow(STAGES_M, seed=1), FitChoice((None, None), (None,))
    first, again, other = (
        fit_rating(STAGES_M, flow, TEN, choice=choice, draws=100, seed=seed) for seed in (1, 1, 2)
    )
    assert first.segments == again.segments
    np.testing.assert_array_equal(first.band_at(STAGES_M), again.band_at(STAGES_M))
    np.testing.assert_array_equal(first.flow_at(STAGES_M), other.flow_at(STAGES_M))
    assert (first.band_at(STAGES_M)[0] != other.band_at(STAGES_M)[0]).any()


def test_without_a_search_the_redrawn_band_would_be_that_of_students_t():
    # a break searched where the gaugings leave no doubt hardly moves: nearly the linear case
    stage_m = np.concatenate([np.linspace(0.42, 0.8, 15), np.linspace(2.5, 3.5, 15)])
    flow, u95 = drawn_flow(stage_m, seed=2, noise=0.02), np.full(30, 10.0)
    given = fit_rating(stage_m, flow, u95, choice=FitChoice(ZEROS_M, (JOINT_M,)))
    searched = fit_rating(
        stage_m, flow, u95, choice=FitChoice(ZEROS_M, (None,)), draws=4000, seed=3
    )
    at = np.array([0.5, 0.7, 2.7, 3.2])
    widths = [np.log(fit.band_at(at)[1] / fit.band_at(at)[0]) for fit in (given, searched)]
    # 2 × 2.5 % of 4,000 draws: the percentiles are good to about 3 %; the break costs the upper
    # segment one of 13 degrees of freedom, some 4 % of its width
    np.testing.assert_allclose(widths[1], widths[0], rtol=0.1)


def test_covariance_between_stages_is_the_band_on_its_diagonal():
    fit = fit_two(FitChoice(ZEROS_M, (JOINT_M,)))
    at = np.array([0.5, 0.9, 2.0, 3.0])
    covariance = fit.ln_covariance(at)
    half = np.log(fit.band_at(at)[1] / fit.flow_at(at))
    np.testing.assert_allclose(2.1009 * np.sqrt(np.diag(covariance)), half, rtol=1e-4)
    assert (covariance[:2, 2:] == 0).all()  # given breaks: the segments know nothing of each other
    drawn = fit_two(FitChoice((None, None), (JOINT_M,)), draws=100).ln_covariance(at)
    np.testing.assert_allclose(drawn, drawn.T)
    assert (np.linalg.eigvalsh(drawn) > -1e-12).all()


def test_a_zero_the_gaugings_do_not_tell_is_reported():
    stage_m = np.linspace(1, 2, 12)
    flow = np.exp(3 * stage_m)  # bends the other way than any power law with a zero near by
    (segment,) = fit_rating(
        stage_m, flow, np.full(12, 5.0), choice=FitChoice((None,)), draws=20
    ).segments
    assert segment.h0_at_limit
    assert not fit_two(FitChoice((None, None), (JOINT_M,)), draws=20).segments[0].h0_at_limit


def test_deviation_in_percent_is_gauging_over_curve():
    found = deviations_percent(np.array([11.0, 0.0, 5.0]), np.array([10.0, 1.0, 0.0]))
    np.testing.assert_allclose(found, [10, np.nan, np.nan], rtol=1e-12)


def refused(stage_m, flow, choice):
    with pytest.raises(FitRefused) as caught:
        fit_rating(np.array(stage_m), np.array(flow), np.full(len(flow), 5.0), choice=choice)
    assert str(caught.value) == str(caught.value.sentence)
    return str(caught.value)


def test_refused_with_fewer_than_five_gaugings_with_flow():
    said = refused([1, 2, 3, 4, 5, 0.1], [1, 2, 3, 4, 0, 0.0], FitChoice((0.0,)))
    assert said == "4 gaugings with flow; 5 are needed, 5 to each segment."


def test_refused_when_a_segment_gets_fewer_than_five():
    stage_m = np.arange(1, 13.0)
    said = refused(stage_m, stage_m**2, FitChoice((0.0, 0.0), (10.0,)))
    assert said == "Segment 2 has 3 gaugings with flow; 5 are needed."


def test_refused_when_no_break_leaves_five_on_each_side():
    stage_m = np.repeat([1.0, 2.0, 3.0], [4, 4, 4])
    said = refused(stage_m, stage_m**2, FitChoice((0.0, 0.0), (None,)))
    assert said == "No break leaves each segment 5 gaugings at different stages above h₀."


def test_refused_with_all_gaugings_at_one_stage():
    said = refused([1.25] * 6, np.arange(1, 7.0), FitChoice((0.0,)))
    assert said == "All gaugings of segment 1 are at one stage, 1.250 m."


def test_refused_with_h0_not_below_the_lowest_gauging_with_flow():
    said = refused([0.1, 1, 2, 3, 4, 5], [0.0, 1, 2, 3, 4, 5], FitChoice((1.0,)))
    assert said == ("h₀ of segment 1, 1.000 m, is not below its lowest gauging with flow, 1.000 m.")


def test_refused_when_flow_falls_with_stage():
    said = refused([1, 2, 3, 4, 5], [5, 4, 3, 2, 1.0], FitChoice((0.0,)))
    assert said == "In segment 1 flow does not rise with stage."


def test_refused_when_segments_do_not_meet_unless_told_so():
    stage_m = np.arange(1, 13.0)
    flow = np.where(stage_m < 6.5, stage_m**2, 3 * stage_m**2)
    said = refused(stage_m, flow, FitChoice((0.0, 0.0), (6.5,)))
    assert said.startswith("Segments 1 and 2 do not meet: at 6.500 m the upper gives +200.0 %")
    choice = FitChoice((0.0, 0.0), (6.5,), must_meet=False)
    fit = fit_rating(stage_m, flow, np.full(12, 5.0), choice=choice)
    assert fit.joint_gaps == pytest.approx((2.0,), rel=1e-9)
    assert fit.segments[1].lower_stage_m == 6.5


@pytest.mark.parametrize(
    ("stage_m", "flow", "u95", "said"),
    [
        ([1.0], [1.0, 2.0], [5.0], "differ in number"),
        ([np.nan], [1.0], [5.0], "stage is missing"),
        ([1.0], [np.inf], [5.0], "flow is missing"),
        ([1.0], [1.0], [np.nan], "uncertainty is missing"),
        ([1.0], [-1.0], [5.0], "negative"),
    ],
)
def test_figures_that_are_none_are_named(stage_m, flow, u95, said):
    with pytest.raises(ValueError, match=said):
        fit_rating(np.array(stage_m), np.array(flow), np.array(u95), choice=FitChoice((0.0,)))


def test_a_choice_has_one_break_between_each_two_segments():
    with pytest.raises(ValueError, match="1 to 3 segments"):
        FitChoice((0.0, 0.0), ())
    with pytest.raises(ValueError, match="do not rise"):
        FitChoice((0.0, 0.0, 0.0), (2.0, 1.0))
