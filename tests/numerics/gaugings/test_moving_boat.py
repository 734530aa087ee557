"""Acoustic transects: pairs, scatter, moving bed."""

import pytest

from network.numerics.gaugings.gauging_faults import BadSheet
from network.numerics.gaugings.moving_boat import MovingBedTest, Transect, by_moving_boat

STILL_BED = MovingBedTest(bed_velocity_ms=0.0, water_velocity_ms=1.0)


def transects(*flows, seconds=200.0):
    """Give transects that start at alternate banks, the first at the left."""
    return [Transect(flow, seconds, i % 2 == 0) for i, flow in enumerate(flows)]


def of(rows, *, bed_test=STILL_BED, tracks_the_bed=True):
    return by_moving_boat(rows, bed_test=bed_test, tracks_the_bed=tracks_the_bed)


def test_two_pairs_by_hand():
    result = of(transects(98.0, 102.0, 99.0, 101.0))
    assert result.discharge_m3s == pytest.approx(100.0)
    assert result.findings == ()
    # s = √(10/3) = 1.8257 %; t(0.975, 3) = 3.1824: u = 1.5912·1.8257/2 = 1.4526 %;
    # with 1.5 % systematic u = 2.088 %.
    assert result.u95_percent == pytest.approx(2 * 2.088, abs=0.002)


def test_an_odd_transect_does_not_lean_one_way():
    # Left 110, 110; right 90: the mean of both directions, not of the three.
    result = of(transects(110.0, 90.0, 110.0, seconds=300.0))
    assert result.discharge_m3s == pytest.approx(100.0)
    assert [f.kind for f in result.findings] == ["not_in_pairs", *["departure"] * 3]


def test_scatter_beyond_the_limit_names_the_transect():
    result = of(transects(100.0, 100.0, 100.0, 120.0))
    # Directions 100 and 110: mean 105; the fourth is 14.3 % above, the others 4.8 % below.
    (finding,) = result.findings
    assert (finding.kind, finding.row, finding.limit) == ("departure", 3, 5.0)
    assert "14.3 %" in str(finding.sentence)


def test_a_moving_bed_raises_the_discharge():
    # 0.03/1.5 = 2 %.
    moving = MovingBedTest(bed_velocity_ms=0.03, water_velocity_ms=1.5)
    rows = transects(100.0, 100.0, 100.0, 100.0)
    result = of(rows, bed_test=moving)
    assert result.discharge_m3s == pytest.approx(102.0)
    assert [f.kind for f in result.findings] == ["moving_bed"]
    assert of(rows, bed_test=moving, tracks_the_bed=False).discharge_m3s == pytest.approx(100.0)


def test_a_bed_that_moves_less_than_one_percent_changes_nothing():
    creeping = MovingBedTest(bed_velocity_ms=0.01, water_velocity_ms=1.5)
    assert of(transects(100.0, 100.0), bed_test=creeping).discharge_m3s == pytest.approx(100.0)


def test_no_moving_bed_test_is_asked_and_costs_certainty():
    rows = transects(98.0, 102.0, 99.0, 101.0)
    without = of(rows, bed_test=None)
    assert [f.kind for f in without.findings] == ["no_bed_test"]
    assert without.u95_percent > of(rows).u95_percent
    assert "no moving-bed test" in without.agency_values


def test_one_short_transect_is_asked():
    kinds = [f.kind for f in of(transects(100.0)).findings]
    assert kinds == ["few_transects", "not_in_pairs", "exposure"]


def test_flow_upstream_is_a_discharge_too():
    result = of(transects(-10.0, -10.0, -10.0, -10.0))
    assert result.discharge_m3s == pytest.approx(-10.0)
    assert result.u95_m3s > 0


def test_faults_name_row_and_field():
    rows = [Transect(None, 200.0, True), Transect(100.0, 0.0, False)]
    with pytest.raises(BadSheet) as refused:
        of(rows, bed_test=MovingBedTest(-0.1, 0.0))
    assert [(f.row, f.field) for f in refused.value.faults] == [
        *[(0, "flow_m3s"), (1, "seconds")],
        *[(None, "bed_velocity_ms"), (None, "water_velocity_ms")],
    ]
    with pytest.raises(BadSheet, match="No transect"):
        of([])
