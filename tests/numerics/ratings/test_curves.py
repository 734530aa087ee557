"""One curve: segments and tables, forward and back, and where it may be used."""

import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st

from network.numerics.marks import Mark
from network.numerics.ratings.curves import (
    Segment,
    SegmentCurve,
    TableCurve,
    flow,
    joint_gaps,
    stage_for,
    zero_from_three_points,
)
from network.numerics.sentences import Refused

LOW = Segment(lower_stage_m=0.2, c=4.0, h0_m=0.2, b=2.0)
HIGH = Segment(lower_stage_m=1.2, c=4.0, h0_m=0.2, b=1.5)  # both give 4 m³/s at 1.2 m


def segments(*rows, **use):
    use = {"lowest_use_m": 0.0, "highest_use_m": 5.0} | use
    return SegmentCurve(segments=rows or (LOW, HIGH), **use)


def table(points, **use):
    stages_m, flows_m3s = np.array(points, float).T
    use = {"lowest_use_m": stages_m[0], "highest_use_m": stages_m[-1]} | use
    return TableCurve(stages_m=stages_m, flows_m3s=flows_m3s, **use)


def flows(curve, *stages_m):
    return flow(curve, np.array(stages_m, float))[0].tolist()


def test_a_stage_is_rated_by_the_segment_it_lies_in():
    # by hand: 4 · 0.5² = 1; 4 · 1^1.5 = 4 at the joint; 4 · 2.25^1.5 = 13.5
    assert flows(segments(), 0.7, 1.2, 2.45) == pytest.approx([1.0, 4.0, 13.5], rel=1e-14)


def test_at_and_below_the_stage_of_zero_flow_the_flow_is_exactly_zero():
    assert flows(segments(), 0.0, 0.1, 0.2) == [0.0, 0.0, 0.0]


def test_the_rounding_of_a_sum_makes_no_flow_of_none_and_loses_no_end_of_a_range():
    assert 0.1 + 0.2 > 0.3
    at_03 = Segment(lower_stage_m=0.3, c=4.0, h0_m=0.3, b=2.0)
    assert flows(segments(at_03), 0.1 + 0.2) == [0.0]
    assert flows(segments(highest_use_m=0.3), 0.1 + 0.2) == pytest.approx([0.04])


def test_outside_the_range_of_use_there_is_no_flow_and_no_mark():
    flow_m3s, marks = flow(segments(lowest_use_m=0.3), np.array([0.1, 0.29, 0.3, 5.0, 5.01]))
    assert np.isnan(flow_m3s).tolist() == [True, True, False, False, True]
    assert marks.tolist() == [0, 0, 0, 0, 0]


def test_inside_an_allowed_extrapolation_the_flow_is_marked():
    curve = segments(lowest_use_m=0.5, extrapolate_to_low_m=0.4, extrapolate_to_high_m=6.0)
    flow_m3s, marks = flow(curve, np.array([0.39, 0.4, 0.5, 5.0, 5.5, 6.0, 6.1]))
    assert np.isnan(flow_m3s).tolist() == [True, False, False, False, False, False, True]
    sign = Mark.EXTRAPOLATED
    assert marks.tolist() == [0, sign, 0, 0, sign, sign, 0]


def test_beyond_the_gauged_range_the_flow_is_marked_too():
    curve = segments(gauged_lowest_m=0.4, gauged_highest_m=2.0)
    marks = flow(curve, np.array([0.3, 0.4, 2.0, 2.1]))[1]
    assert marks.tolist() == [Mark.EXTRAPOLATED, 0, 0, Mark.EXTRAPOLATED]


def test_a_missing_stage_stays_missing_and_spoils_no_other():
    flow_m3s, marks = flow(segments(), np.array([np.nan, 0.7, 2.45, np.nan]))
    np.testing.assert_allclose(flow_m3s, [np.nan, 1.0, 13.5, np.nan], rtol=1e-14)
    assert not marks.any()


def test_no_stages_give_no_flows():
    assert flows(segments()) == []
    assert stage_for(segments(), np.array([])).tolist() == []


def test_a_long_record_is_rated_like_its_parts():
    stage_m = np.linspace(0.0, 5.0, 30_001)
    whole = flow(segments(), stage_m)[0]
    assert (whole[::7] == flow(segments(), stage_m[::7])[0]).all()


def test_segments_that_join_have_no_gap_and_others_say_how_large():
    wider = Segment(lower_stage_m=1.2, c=4.4, h0_m=0.2, b=1.5)
    assert joint_gaps(segments()) == pytest.approx([0.0], abs=1e-14)
    assert joint_gaps(segments(LOW, wider)) == pytest.approx([0.1], abs=1e-14)


@given(st.lists(st.floats(0.0, 5.0), min_size=2, max_size=30))
def test_flow_never_falls_as_stage_rises(stages_m):
    rising = np.sort(stages_m)
    for curve in (segments(), table([(0, 0), (0.5, 1), (2, 9), (5, 40)], h0_m=-0.1)):
        # neighbouring stages may differ by less than the rounding of exp(b·ln h)
        given_m3s = np.array(flows(curve, *rising))
        assert (np.diff(given_m3s) >= -1e-13 * given_m3s[1:]).all()


@given(st.floats(0.01, 42.0))
def test_the_stage_of_a_flow_has_that_flow(flow_m3s):
    points = [(0, 0), (0.5, 1), (0.6, 1), (2, 9), (5, 50)]
    curves = (segments(), table(points, h0_m=-0.1), table(points, rule="linear"))
    for curve in curves:
        stage_m = stage_for(curve, np.array([flow_m3s]))
        assert flow(curve, stage_m)[0] == pytest.approx([flow_m3s], rel=1e-9)


def test_no_stage_is_given_for_flows_the_curve_does_not_reach():
    assert np.isnan(stage_for(segments(), np.array([-1.0, 1000.0, np.nan]))).all()


def test_the_stage_of_zero_flow_is_that_of_cease_to_flow():
    assert stage_for(segments(), np.array([0.0])) == pytest.approx([0.2])


def test_a_logarithmic_table_is_a_power_law_between_its_points():
    # through (0.5, 1) and (2, 8) with h0 = 0: b = ln 8 / ln 4 = 1.5, at 1 m 2^1.5
    assert flows(table([(0.5, 1), (2, 8)]), 0.5, 1.0, 2.0) == pytest.approx([1, 2**1.5, 8])


def test_a_first_point_of_zero_flow_is_joined_linearly():
    assert flows(table([(0.5, 0), (1.5, 2), (3, 8)]), 0.5, 0.75, 1.0) == pytest.approx([0, 0.5, 1])


def test_a_linear_table_is_straight_between_points_and_prolonged_where_allowed():
    curve = table([(1, 2), (2, 4), (3, 8)], rule="linear", extrapolate_to_high_m=4)
    assert flows(curve, 1, 1.5, 2.5, 3, 4) == [2, 3, 6, 8, 12]


def test_a_table_with_many_points_finds_the_same_piece_as_one_with_few():
    points = [(h / 10, (h / 10) ** 1.5) for h in range(1, 40)]
    stages_m = np.array([0.1, 0.55, 1.0, 3.85])
    assert flows(table(points), *stages_m) == pytest.approx((stages_m**1.5).tolist(), rel=1e-14)


@pytest.mark.parametrize(("h0_m", "c", "b"), [(0.3, 5.0, 1.7), (-0.4, 11.0, 2.5), (0.0, 1.0, 1.1)])
def test_three_points_give_the_zero_of_any_power_law_exactly(h0_m, c, b):
    # Reference README, section 6: h₀ = (h₁h₃ − h₂²)/(h₁ + h₃ − 2h₂) with Q₂ = √(Q₁Q₃)
    curve = segments(Segment(h0_m, c, h0_m, b), highest_use_m=50.0)
    q1, q3 = flows(curve, 1.0, 4.0)
    h2_m = float(stage_for(curve, np.array([np.sqrt(q1 * q3)]))[0])
    assert zero_from_three_points(1.0, h2_m, 4.0) == pytest.approx(h0_m, abs=1e-9)


def test_three_points_on_a_straight_line_give_no_zero():
    with pytest.raises(Refused, match="no stage of zero flow"):
        zero_from_three_points(1.0, 2.0, 3.0)


@pytest.mark.parametrize(
    ("make", "sentence"),
    [
        (lambda: segments(HIGH, LOW), "do not rise in stage"),
        (lambda: segments(Segment(0.2, -4.0, 0.2, 2.0)), "must be above zero"),
        (lambda: segments(Segment(0.2, 4.0, 0.2, 0.0)), "must be above zero"),
        (lambda: segments(LOW, Segment(1.2, 4.0, 1.2, 1.5)), "at or below its stage of zero"),
        (lambda: segments(Segment(0.2, np.nan, 0.2, 2.0)), "not a number"),
        (lambda: SegmentCurve(segments=(), lowest_use_m=0, highest_use_m=1), "at least one"),
        (lambda: segments(lowest_use_m=5.0), "range of use is empty"),
        (lambda: segments(extrapolate_to_high_m=4.0), "inside the range of use"),
        (lambda: table([(1, 2), (1, 4)], highest_use_m=9), "must rise"),
        (lambda: table([(1, 4), (2, 2)]), "must not fall"),
        (lambda: table([(1, 2)], highest_use_m=9), "at least two"),
        (lambda: table([(1, -1), (2, 2)]), "zero or above"),
        (lambda: table([(1, 2), (2, 3)], h0_m=1.0), "lies at or below h0"),
        (lambda: table([(1, 2), (2, 3)], rule="cubic"), "log or linear"),
    ],
)
def test_a_curve_that_is_none_is_refused_with_a_sentence(make, sentence):
    with pytest.raises(Refused, match=sentence):
        make()
