"""Discharge by float and by volume, each with its stated uncertainty."""

import math

import numpy as np
import pytest

from network.numerics.gaugings.gauging_faults import BadSheet
from network.numerics.gaugings.other_methods import (
    Fill,
    FloatPanel,
    by_float,
    repeats_percent,
    volumetric,
)


def kinds(result):
    return [finding.kind for finding in result.findings]


def test_four_repeats_or_more_carry_students_factor():
    # s of 9, 10, 11, 10 is 0.8165 = 8.165 %; t(0.975, 3) = 3.182 (table): 3.182/2·8.165/2.
    assert repeats_percent([9, 10, 11, 10], 1.0) == pytest.approx(6.496, abs=0.002)


def test_few_repeats_lean_on_the_agencys_value():
    assert repeats_percent([10.0], 3.0) == 3.0
    assert repeats_percent([10.0, 10.0], 3.0) == pytest.approx(3 / math.sqrt(2))
    # s = 14.14 % is more than the agency's 3 %.
    assert repeats_percent([9.0, 11.0], 3.0) == pytest.approx(10.0)


def test_floats_by_hand():
    # 20 m in 40 s: 0.5 m/s; in 50 s: 0.4 m/s. 0.86·(0.5·2 + 0.4·3 + 0.5·1) = 2.322 m³/s.
    panels = [FloatPanel(2.0, (40.0,)), FloatPanel(3.0, (50.0,)), FloatPanel(1.0, (40.0,))]
    result = by_float(20.0, panels)
    assert result.discharge_m3s == pytest.approx(2.322)
    assert result.findings == ()
    # Scatter: one float a panel, 15 % each: 0.86·15·√(1 + 1.2² + 0.5²)/2.322 = 9.11 %;
    # with 7.5, 1.0 and 3.0 %: u = 12.21 %.
    assert result.u95_percent == pytest.approx(2 * math.sqrt(9.112**2 + 7.5**2 + 1 + 9), abs=0.01)
    assert "float factor" in result.agency_values


def test_floats_too_fast_and_too_few():
    result = by_float(5.0, [FloatPanel(2.0, (10.0, 30.0))])
    assert kinds(result) == ["exposure", "few_panels"]
    assert result.findings[0].row == 0


def test_every_fault_of_the_floats_is_told():
    with pytest.raises(BadSheet) as refused:
        by_float(0.0, [FloatPanel(None, (10.0,)), FloatPanel(2.0, ()), FloatPanel(1.0, (-4.0,))])
    told = [(f.row, f.field) for f in refused.value.faults]
    assert told == [(0, "length_m"), (0, "area_m2"), (1, "seconds"), (2, "seconds")]
    with pytest.raises(BadSheet, match="at least one panel"):
        by_float(10.0, [])


def test_a_vessel_filled_three_times():
    # 0.02 m³ in 10, 10.1 and 9.9 s.
    result = volumetric([Fill(0.02, 10.0), Fill(0.02, 10.1), Fill(0.02, 9.9)])
    assert result.discharge_m3s == pytest.approx(0.02 * np.mean([1 / 10, 1 / 10.1, 1 / 9.9]))
    assert result.findings == ()
    # Volume 1 %, watch 100·0.2/30 = 0.667 %, scatter 2/√3 = 1.155 % (agency): u = 1.667 %.
    assert result.u95_percent == pytest.approx(2 * 1.6667, abs=0.001)
    assert result.u95_m3s == pytest.approx(result.discharge_m3s * 0.033333, rel=1e-3)


def test_one_quick_fill_is_asked():
    assert kinds(volumetric([Fill(0.01, 2.0)])) == ["few_fills", "exposure"]


def test_a_fill_without_time_is_refused_by_row():
    with pytest.raises(BadSheet) as refused:
        volumetric([Fill(0.02, 10.0), Fill(0.02, None), Fill(-1.0, 5.0)])
    assert {(f.row, f.field) for f in refused.value.faults} == {(1, "seconds"), (2, "volume_m3")}
    with pytest.raises(BadSheet, match="No fill"):
        volumetric([])
