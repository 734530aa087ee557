"""The stage that a gauging belongs to."""

import numpy as np
import pytest

from network.numerics.gaugings.mean_stage import mean_stage


def of(readings, *, vertical_s, flow_m3s, period_s=None):
    times, stages = np.array(readings, dtype=np.float64).T
    return mean_stage(
        times,
        stages,
        vertical_s=np.array(vertical_s, dtype=np.float64),
        flow_m3s=np.array(flow_m3s, dtype=np.float64),
        period_s=period_s,
        limit_m=0.05,
    )


def test_a_small_change_takes_the_mean_of_start_and_end():
    stage = of([(0, 1.00), (3600, 1.05)], vertical_s=[0, 3600], flow_m3s=[1, 9])
    assert (stage.stage_m, stage.weighted_by_flow) == (pytest.approx(1.025), False)


def test_a_larger_change_is_weighted_by_flow():
    # (1·1.00 + 9·1.06)/10
    stage = of([(0, 1.00), (3600, 1.06)], vertical_s=[0, 3600], flow_m3s=[1, 9])
    assert (stage.stage_m, stage.weighted_by_flow) == (pytest.approx(1.054), True)


def test_a_crest_within_the_gauging_counts_as_change():
    stage = of([(0, 1.0), (1800, 1.2), (3600, 1.0)], vertical_s=[1800, 3600], flow_m3s=[3, 1])
    assert stage.change_m == pytest.approx(0.2)
    assert stage.stage_m == pytest.approx(1.15)


def test_readings_before_and_after_are_interpolated_to_the_gauging():
    readings = [(0, 1.0), (7200, 1.04)]
    stage = of(readings, vertical_s=[2400], flow_m3s=[1], period_s=(1800, 3600))
    assert stage.stage_m == pytest.approx(1.015)
    assert stage.change_m == pytest.approx(0.01)


def test_a_time_not_noted_lies_between_its_neighbours():
    nan = float("nan")
    stage = of([(0, 1.0), (4000, 2.0)], vertical_s=[1000, nan, 3000], flow_m3s=[0, 1, 0])
    assert (stage.stage_m, stage.times_assumed) == (pytest.approx(1.5), True)


def test_flow_upstream_keeps_the_stage_between_the_readings():
    stage = of([(0, 1.0), (3600, 2.0)], vertical_s=[0, 3600], flow_m3s=[10, -9])
    assert 1.0 <= stage.stage_m <= 2.0


def test_readings_may_be_typed_in_any_order():
    mixed = of([(3600, 1.06), (0, 1.00)], vertical_s=[0, 3600], flow_m3s=[1, 9])
    assert mixed.stage_m == pytest.approx(1.054)
