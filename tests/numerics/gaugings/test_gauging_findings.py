"""What is asked about a gauging, with limit and source."""

import dataclasses

import pytest

from network.numerics.gaugings.gauging import compute
from network.numerics.gaugings.gauging_findings import rating_deviation
from network.numerics.gaugings.gauging_input import (
    Bank,
    Channel,
    Meter,
    Point,
    Sheet,
    StageReading,
    Vertical,
)
from network.numerics.meters.meter_rating import Piece
from tests.numerics.sheets import METER, channel, counted, plain_sheet


def findings(sheet, kind):
    found = [f for f in compute(sheet).findings if f.kind == kind]
    assert all(f.source and str(f.sentence) for f in found)
    return found


def even(count, *, depth_m=1.0, velocity_ms=0.5, step_m=1.0, **changes):
    """Give a sheet of equal verticals; changes: {row: (depth, velocity)}."""
    depths, velocities = [depth_m] * count, [velocity_ms] * count
    for row, (depth, velocity) in changes.get("rows", {}).items():
        depths[row], velocities[row] = depth, velocity
    distances = [step_m * (i + 1) for i in range(count)]
    return Sheet((channel(distances, depths, velocities, banks=(0.0, step_m * (count + 1))),))


def test_a_good_gauging_raises_no_question():
    stages = (StageReading(0, 1.0), StageReading(3600, 1.04))
    points = (
        Point(0.2, revolutions=140.0, seconds=60.0),
        Point(0.8, revolutions=100.0, seconds=60.0),
    )
    rows = tuple(Vertical(float(i), 1.0, points) for i in range(1, 26))
    sheet = Sheet((Channel(Bank(0.0), Bank(26.0), rows),), METER, stages)
    assert compute(sheet).findings == ()


def test_a_panel_over_the_limit():
    first, *_ = findings(even(5), "panel_share")
    assert (first.limit, first.source) == (10.0, "USGS practice; Swiss rule")
    assert (first.channel, first.vertical) == (0, 0)
    # The middle three of five equal verticals carry 1/6 each, the outer two with their edges too.
    assert str(first.sentence).startswith("The panel from 0.0 m to 1.5 m carries 20.0 %")


def test_panels_over_5_percent_are_advice_only():
    (advice,) = findings(even(15), "panel_advice")
    assert advice.advice
    assert str(advice.sentence).startswith("15 more panels carry over 5.0 %")
    assert findings(even(25), "panel_advice") == []


@pytest.mark.parametrize(
    ("width_m", "wanted"), [(0.4, 5), (0.8, 6), (2.0, 7), (4.0, 13), (6.0, 22)]
)
def test_verticals_wanted_by_width(width_m, wanted):
    # ISO 748:2007, from memory.
    def of(count):
        return findings(even(count, step_m=width_m / (count + 1)), "few_verticals")

    (finding,) = of(wanted - 1)
    assert finding.limit == wanted
    assert of(wanted) == []


def test_a_short_exposure_names_vertical_and_point():
    points = (Point(0.2, velocity_ms=0.5, seconds=29.0), Point(0.8, velocity_ms=0.4, seconds=30.0))
    (finding,) = findings(plain_sheet(points=points), "exposure")
    assert (finding.vertical, finding.point, finding.limit) == (1, 0, 30.0)


def test_a_velocity_outside_the_calibrated_range():
    rows = tuple(Vertical(x, 1.0, (counted(n),)) for x, n in ((1.0, 24.0), (2.0, 60.0), (3.0, 0.0)))
    # n 0.4 → 0.10 m/s, below 0.15 where the calibration states no range; 1.0 → 0.25; still: none.
    sheet = Sheet((Channel(Bank(0.0), Bank(4.0), rows),), METER)
    (finding,) = findings(sheet, "calibrated_range")
    assert (finding.vertical, finding.limit) == (0, 0.15)
    slow = dataclasses.replace(METER, lowest_ms=0.05)
    assert findings(dataclasses.replace(sheet, meter=slow), "calibrated_range") == []


@pytest.mark.parametrize(
    ("fractions", "depth_m", "limit_m"),
    [((0.6,), 0.81, 0.8), ((0.6,), 0.8, None), ((0.2, 0.8), 0.49, 0.5), ((0.2, 0.8), 0.5, None)],
)
def test_depth_and_points_must_fit(fractions, depth_m, limit_m):
    # One point in depth < 0.8 m (FHWA; read), ≤ 0.5 m (Québec protocol; read).
    points = tuple(Point(f, velocity_ms=0.4) for f in fractions)
    found = findings(plain_sheet(points=points, depth_m=depth_m), "depth_for_points")
    assert [f.limit for f in found] == ([] if limit_m is None else [limit_m])


def test_neighbouring_velocities_apart():
    assert findings(even(5, rows={2: (1.0, 0.6)}), "neighbours") == []
    found = findings(even(5, rows={2: (1.0, 0.61)}), "neighbours")
    assert [f.vertical for f in found] == [2, 3]


@pytest.mark.parametrize(
    ("row", "field"), [((12.5, 0.5), "depth_m"), ((1.0, 5.0), "points"), ((0.1, 0.5), "depth_m")]
)
def test_a_value_far_from_its_neighbours_is_asked(row, field):
    sheet = even(7, rows={3: row})
    (finding,) = findings(sheet, "outlier")
    assert (finding.vertical, finding.field) == (3, field)
    assert "Is it right?" in str(finding.sentence)
    # Asked, not sorted away: it still counts.
    assert compute(sheet).verticals[3].depth_m == row[0]


def test_a_distance_far_out_is_asked():
    # The last vertical at 125 m for 12.5 m, the bank likewise.
    rows = channel([2, 4, 6, 8, 125], [1.0] * 5, [0.5] * 5, banks=(0, 130))
    found = findings(Sheet((rows,)), "outlier")
    assert [(f.vertical, f.field) for f in found] == [(4, "distance_m")]


def test_methods_apart():
    # By hand (test_gauging): 2.4 and 2.08 m³/s, 15.4 % of the smaller.
    (finding,) = findings(plain_sheet(), "methods_apart")
    assert "15.4 %" in str(finding.sentence)
    assert findings(even(25), "methods_apart") == []


def test_wading_is_asked_only_of_those_who_wade():
    sheet = plain_sheet(depth_m=1.2)
    assert findings(sheet, "wading") == []
    (finding,) = findings(dataclasses.replace(sheet, wading=True), "wading")
    assert (finding.vertical, finding.limit) == (1, 0.9)
    assert "local rules decide" in finding.source


def test_calibration_overdue_by_days_or_hours():
    def of(**changes):
        meter = dataclasses.replace(METER, **changes)
        return findings(dataclasses.replace(plain_sheet(), meter=meter), "calibration")

    assert of(days_since_calibration=366, hours_since_calibration=300) == []
    assert len(of(days_since_calibration=367, hours_since_calibration=301)) == 2


def test_no_spin_test():
    meter = Meter((Piece(0.0, 0.25, 0.0, 10.0),))
    assert len(findings(dataclasses.replace(plain_sheet(), meter=meter), "spin_test")) == 1
    assert findings(dataclasses.replace(plain_sheet(), meter=METER), "spin_test") == []


def test_stage_not_read_or_read_too_seldom():
    assert len(findings(plain_sheet(), "no_stage")) == 1
    stages = (StageReading(0, 1.0), StageReading(3600, 1.2))
    sheet = dataclasses.replace(plain_sheet(), stages=stages)
    (finding,) = findings(sheet, "stage_interval")
    assert finding.limit == 30
    assert len(findings(sheet, "times_assumed")) == 1


@pytest.mark.parametrize(("flow_m3s", "fires"), [(10.4, False), (9.6, False), (10.6, True)])
def test_deviation_from_the_rating_beyond_both_uncertainties(flow_m3s, fires):
    # √(0.3² + 0.4²) = 0.5 m³/s.
    found = rating_deviation(flow_m3s=flow_m3s, u95_m3s=0.3, rated_m3s=10.0, rated_u95_m3s=0.4)
    assert (found is not None) is fires
    if found:
        assert found.limit == pytest.approx(0.5)
