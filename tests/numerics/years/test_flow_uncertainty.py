"""The uncertainty of a flow, a day and a year, worked by hand."""

import numpy as np
import pytest

from network.numerics.years.flow_uncertainty import (
    daily_u95_m3s,
    estimated_u95_m3s,
    flow_u95_m3s,
    u95_percent,
    volume_classes,
)

NAN = np.nan
DAY_S = 86_400
EDGES_S = np.array([0, DAY_S, 2 * DAY_S], dtype=np.int64)


def squared(stage_m):
    """Rate by Q = 10·h², 0 below 0."""
    return 10 * np.maximum(stage_m, 0.0) ** 2


def combined(stage_m, *, scatter=0.03, u_stage_m=0.005):
    flow = squared(stage_m)
    return flow_u95_m3s(
        stage_m,
        flow_at=squared,
        band_m3s=(0.96 * flow, 1.04 * flow),
        scatter=scatter,
        u_stage_m=u_stage_m,
    )


def test_one_flow_by_hand():
    # h = 1 m, Q = 10 m³/s. Band ±4 %: 0.4. Gaugings: 2·0.03·10 = 0.6.
    # Stage: Q(1.005) − Q(0.995) = 10.10025 − 9.90025 = 0.2, half of it twice: 0.2.
    # U = √(0.16 + 0.36 + 0.04) = √0.56 = 0.748331 m³/s
    assert combined(np.array([1.0]))[0] == pytest.approx(0.748331, abs=5e-7)


def test_a_day_by_hand():
    # The stage stands at 1 m to noon, is 2 m from one second later on (as good as a step):
    # U(2 m): Q = 40; band 1.6, gaugings 2.4, stage Q(2.005) − Q(1.995) = 0.4
    #   → √(2.56 + 5.76 + 0.16) = √8.48 = 2.912044
    # U_day = (0.748331 + 2.912044)/2 = 1.830188 m³/s; Q̄ = 25 → 7.32 %
    times_s = np.array([0, DAY_S // 2 - 1, DAY_S // 2, DAY_S], dtype=np.int64)
    u95 = combined(np.array([1.0, 1.0, 2.0, 2.0]))
    day = daily_u95_m3s(times_s, u95, edges_s=EDGES_S[:2], gap_limit_s=DAY_S)
    assert day[0] == pytest.approx(1.830188, abs=2e-5)  # half a second of a step of 2.2 m³/s
    # weighted by flow: (10·7.48331 % + 40·7.28011 %)/50 = 7.32075 %
    assert u95_percent(np.array([25.0]), day)[0] == pytest.approx(7.32075, abs=1e-4)


def test_at_zero_flow_there_is_an_amount_but_no_percentage():
    u95 = combined(np.array([0.0, -0.5]))
    # Q(0.005) − Q(−0.005) = 0.00025
    assert u95.tolist() == pytest.approx([0.00025, 0.0])
    assert np.isnan(u95_percent(np.array([0.0]), u95[:1]))[0]


def test_a_day_without_a_record_has_no_uncertainty_and_part_of_a_day_has_its_own():
    times_s = np.array([0, 3600], dtype=np.int64)
    day = daily_u95_m3s(times_s, np.array([1.0, 1.0]), edges_s=EDGES_S, gap_limit_s=7200)
    np.testing.assert_allclose(day, [1.0, NAN])


def test_unknown_flow_gives_unknown_uncertainty():
    assert np.isnan(combined(np.array([NAN])))[0]


def test_estimated_days_take_the_percentage_of_their_note():
    found = estimated_u95_m3s(np.array([4.0, 0.0]), np.array([25.0, 25.0]))
    assert found.tolist() == [1.0, 0.0]


def test_the_volume_is_sorted_by_class_with_the_limits_inside():
    flow = np.array([10.0, 20, 30, 20, 10, 10, 0, NAN])
    u95 = np.array([0.5, 2.0, 3.1, 4.0, 3.0, NAN, 0.1, 1.0])
    # 5 % | 10 % | 10.3 % | 20 % | 30 % | not stated | no volume | no figure
    classes = volume_classes(flow, u95)
    assert classes.within_5 == pytest.approx(0.10)
    assert classes.within_10 == pytest.approx(0.20)
    assert classes.within_20 == pytest.approx(0.50)
    assert classes.wider == pytest.approx(0.10)
    assert classes.not_stated == pytest.approx(0.10)


def test_a_percentage_meant_as_ten_stays_within_ten():
    assert volume_classes(np.array([0.7]), np.array([0.7 * 0.1])).within_10 == 1


def test_a_dry_year_has_no_volume_to_sort():
    classes = volume_classes(np.zeros(3), np.zeros(3))
    assert set(vars(classes).values()) == {0.0}
