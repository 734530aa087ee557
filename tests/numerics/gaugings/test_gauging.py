"""Whole gaugings worked by hand, and what must hold for any gauging."""

from dataclasses import replace

import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from network.numerics.gaugings.gauging import compute, preview
from network.numerics.gaugings.gauging_faults import BadSheet
from network.numerics.gaugings.gauging_input import (
    Bank,
    Channel,
    DischargeMethod,
    GaugingSettings,
    Point,
    Sheet,
    StageReading,
    Vertical,
)
from tests.numerics.sheets import METER, channel, counted, plain_sheet

# Quick, and no clock on a shared machine.
few = settings(max_examples=30, deadline=None)


def test_three_verticals_by_hand():
    result = compute(plain_sheet())
    # Mid-section: 0.4·0.5·2 + 0.8·1.0·2 + 0.4·0.5·2 = 2.4; area 2·(0.25·2) + 2·(0.75·2) = 4.
    assert result.mid_section_m3s == pytest.approx(2.4, abs=1e-12)
    # Mean-section: edges 0.7·0.4·0.5 = 0.14 each, between (0.6·0.75·2) = 0.9 each: 2.08.
    assert result.mean_section_m3s == pytest.approx(2.08, abs=1e-12)
    assert result.section.area_m2 == pytest.approx(4.0, abs=1e-12)
    assert result.section.width_m == 8
    assert result.section.greatest_depth_m == 1
    assert result.mean_velocity_ms == pytest.approx(0.6, abs=1e-12)
    # P = 4·√(2² + 0.5²) = 8.2462; R = 4/P; Fr = 0.6/√(9.80665·0.5) = 0.27096.
    assert result.section.hydraulic_radius_m == pytest.approx(4 / 8.246211, abs=1e-6)
    assert result.froude == pytest.approx(0.27096, abs=1e-5)
    assert [p.share for p in result.panels] == pytest.approx([1 / 6, 2 / 3, 1 / 6])
    assert result.verticals[1].wading_product_m2s == pytest.approx(0.8)


def test_the_agency_chooses_the_method_that_is_the_result():
    result = compute(plain_sheet(), GaugingSettings(method=DischargeMethod.MEAN_SECTION))
    assert result.discharge_m3s == result.mean_section_m3s
    assert len(result.panels) == 4


def test_a_gauging_under_ice_by_hand():
    # Effective depths 0.8, 1.6, 0.8; one point × 0.92 and two points as they are.
    # n = 96/60 = 1.6 → 0.40 m/s · 0.92 = 0.368; (0.5 + 0.3)/2 = 0.4 m/s.
    one = (counted(96.0),)
    two = (Point(0.2, velocity_ms=0.5), Point(0.8, velocity_ms=0.3))
    verticals = (
        Vertical(2.0, 1.0, one, ice_underside_m=0.2),
        Vertical(4.0, 2.0, two, ice_underside_m=0.4),
        Vertical(6.0, 1.0, one, ice_underside_m=0.2),
    )
    result = compute(Sheet((Channel(Bank(0.0), Bank(8.0), verticals),), METER))
    # Q = 2·(0.368·0.8·2) + 0.4·1.6·2 = 2.4576 m³/s; area = 0.8 + 2.4 + 2.4 + 0.8 = 6.4 m².
    assert result.discharge_m3s == pytest.approx(2.4576, abs=1e-12)
    assert result.section.area_m2 == pytest.approx(6.4, abs=1e-12)
    assert result.section.greatest_depth_m == pytest.approx(1.6)
    # The water touches bed and ice: bed 2·√(4+1) + 2·√(4+1), ice 4·√(4+0.04).
    assert result.section.wetted_perimeter_m == pytest.approx(4 * 5**0.5 + 4 * 4.04**0.5)
    assert "points under ice" in result.uncertainty.agency_values


def test_two_channels_with_an_island_are_summed():
    left = channel([2, 4, 6], [0.5, 1.0, 0.5], [0.4, 0.8, 0.4], banks=(0, 8))
    # Right of the island, between piers: walls with depth, measured velocities there.
    pier = {"depth_m": 1.0, "velocity_ms": 0.5}
    right = channel([11, 12, 13], [1.0, 1.0, 1.0], [0.5, 0.5, 0.5], banks=(10, 14), **pier)
    both = compute(Sheet((left, right)))
    # Left 2.4 m³/s on 4 m² (above); right 4 m · 1 m · 0.5 m/s = 2 m³/s.
    assert both.mid_section_m3s == pytest.approx(4.4, abs=1e-12)
    assert both.mean_section_m3s == pytest.approx(2.08 + 2.0, abs=1e-12)
    assert both.section.area_m2 == pytest.approx(8.0)
    assert both.section.width_m == pytest.approx(12.0)
    assert [(p.channel, p.vertical) for p in both.mid_panels] == [
        *[(0, 0), (0, 1), (0, 2)],
        *[(1, 0), (1, 1), (1, 2)],
    ]
    # Six verticals decide u_m: between 5 (7.5 %) and 10 (4.5 %).
    assert both.uncertainty.verticals_percent == pytest.approx(6.9)


def test_a_gauging_with_rising_stage_is_weighted_by_flow():
    times = (600, 1800, 3000)
    (only,) = plain_sheet().channels
    rows = tuple(replace(v, time_s=t) for v, t in zip(only.verticals, times, strict=True))
    stages = (StageReading(0, 1.00), StageReading(1800, 1.10), StageReading(3600, 1.30))
    sheet = Sheet((replace(only, verticals=rows),), stages=stages, started_s=0, ended_s=3600)
    result = compute(sheet)
    # h at 600, 1800, 3000 s: 1.0333, 1.1, 1.2333; flows 0.4, 1.6, 0.4 of 2.4:
    # (0.4·1.03333 + 1.6·1.1 + 0.4·1.23333)/2.4 = 1.11111; the plain mean would be 1.15.
    assert result.stage.stage_m == pytest.approx(1.111111, abs=1e-6)
    assert result.stage.weighted_by_flow
    assert [f.kind for f in result.findings if f.field == "stages"] == ["stage_change"]


def test_a_velocity_at_the_bank_overrides_the_factor():
    (only,) = plain_sheet().channels
    wall = Bank(0.0, depth_m=0.5, velocity_ms=0.2)
    result = compute(Sheet((replace(only, first_bank=wall),)))
    # The bank's half panel: 0.2·0.5·1 m more than before; edge zone (0.2 + 0.4)/2·(0.5·2).
    assert result.mid_section_m3s == pytest.approx(2.4 + 0.1, abs=1e-12)
    assert result.mean_section_m3s == pytest.approx(2.08 - 0.14 + 0.3, abs=1e-12)


def test_a_steep_edge_with_depth_takes_its_velocity_from_the_factor():
    (only,) = plain_sheet().channels
    wall = Bank(0.0, depth_m=0.5, factor=0.9)
    result = compute(Sheet((replace(only, first_bank=wall),)))
    # Bank velocity (2·0.9 − 1)·0.4 = 0.32 on 0.5 m²; edge zone 0.9·0.4·1.0 m².
    assert result.mid_section_m3s == pytest.approx(2.4 + 0.32 * 0.5, abs=1e-12)
    assert result.mean_section_m3s == pytest.approx(2.08 - 0.14 + 0.36, abs=1e-12)


def test_equal_distances_are_a_wall():
    # A step in the bed at 4 m from 0.5 to 1 m, then a wall at 8 m.
    rows = channel(
        [2, 4, 4, 6, 8], [0.5, 0.5, 1.0, 1.0, 1.0], [0.5, None, None, 0.5, 0.5], banks=(0, 8)
    )
    result = compute(Sheet((rows,)))
    assert result.section.area_m2 == pytest.approx(0.5 + 1.0 + 2.0 + 2.0)
    assert result.section.wetted_perimeter_m == pytest.approx(4.25**0.5 + 2 + 0.5 + 2 + 2 + 1)


def test_upstream_flow_counts_against_the_rest():
    result = compute(plain_sheet(points=(Point(0.6, velocity_ms=-0.8),)))
    assert result.mid_section_m3s == pytest.approx(0.8 - 1.6, abs=1e-12)
    assert result.uncertainty.u95_m3s > 0


def test_a_still_rotor_gives_no_flow():
    rows = tuple(Vertical(float(x), 1.0, (counted(0.0),)) for x in (2, 4, 6))
    result = compute(Sheet((Channel(Bank(0.0), Bank(8.0), rows),), METER))
    assert result.mid_section_m3s == result.mean_section_m3s == 0
    assert result.uncertainty.u95_percent is None
    assert result.froude == 0


def test_the_unfinished_sheet_gives_what_it_can():
    sheet = plain_sheet(points=(Point(0.6),))
    so_far = preview(sheet)
    assert (so_far.faults[0].vertical, so_far.faults[0].field) == (1, "velocity_ms")
    # The middle vertical is a sounding for the time being: area stands, flow from the two others.
    assert so_far.section.area_m2 == pytest.approx(4.0)
    assert so_far.result.mean_section_m3s == pytest.approx(0.14 * 2 + 0.4 * 3)


def test_the_first_cells_typed_give_no_result_and_no_error():
    row = Vertical(2.0, None)
    so_far = preview(Sheet((Channel(Bank(None), Bank(None), (row,)),)))
    assert so_far.result is None
    assert so_far.section.area_m2 == 0
    assert {f.field for f in so_far.faults} >= {"depth_m", "first_bank.distance_m"}
    assert preview(Sheet(())).result is None


@pytest.mark.parametrize("absurd", [float("inf"), 9e307, -9e307])
def test_a_number_no_river_gives_counts_as_a_blank(absurd):
    so_far = preview(plain_sheet(depth_m=absurd))
    assert (so_far.faults[0].vertical, so_far.faults[0].field) == (1, "depth_m")
    assert so_far.section.width_m == 8


def test_a_finished_sheet_previews_as_it_computes():
    assert preview(plain_sheet()).result == compute(plain_sheet())


cell = st.none() | st.floats(allow_nan=True, allow_infinity=True)


@few
@given(
    st.lists(st.tuples(cell, cell, cell, cell, cell), max_size=4),
    st.tuples(cell, cell),
    st.booleans(),
)
def test_no_half_typed_sheet_raises_in_the_preview(rows, banks, with_meter):
    verticals = tuple(
        Vertical(x, d, (Point(0.6, revolutions=n, seconds=s, velocity_ms=v),))
        for x, d, n, s, v in rows
    )
    banks = [Bank(x) for x in banks]
    sheet = Sheet((Channel(*banks, verticals),), METER if with_meter else None)
    so_far = preview(sheet)
    assert so_far.faults or so_far.result is not None


sections = st.lists(
    st.tuples(st.floats(0.5, 5), st.floats(0.1, 4), st.floats(0.05, 2)), min_size=3, max_size=12
)


def from_steps(rows, sounding=None):
    """Give a sheet from (step, depth, velocity) rows; sounding: a part of the second step."""
    x, verticals = 0.0, []
    for i, (step, depth, velocity) in enumerate(rows):
        if i == 1 and sounding is not None:
            before = rows[0][1]
            between = before + sounding * (depth - before)
            verticals.append(Vertical(x + sounding * step, between))
        x += step
        verticals.append(Vertical(x, depth, mean_velocity_ms=velocity))
    return Sheet((Channel(Bank(0.0), Bank(x + 1), tuple(verticals)),))


def discharges(sheet):
    result = compute(sheet)
    return [result.mid_section_m3s, result.mean_section_m3s, result.section.area_m2]


@few
@given(sections)
def test_the_bank_of_start_does_not_matter(rows):
    sheet = from_steps(rows)
    (only,) = sheet.channels
    turned = Channel(only.last_bank, only.first_bank, only.verticals[::-1])
    there, back = compute(sheet), compute(Sheet((turned,)))
    assert discharges(Sheet((turned,))) == pytest.approx(discharges(sheet), rel=1e-12)
    assert back.uncertainty.u95_percent == pytest.approx(there.uncertainty.u95_percent)
    assert len(back.findings) == len(there.findings)


@few
@given(sections)
def test_doubling_velocities_doubles_the_discharge(rows):
    once = discharges(from_steps(rows))
    twice = discharges(from_steps([(x, d, 2 * v) for x, d, v in rows]))
    assert twice == pytest.approx([2 * once[0], 2 * once[1], once[2]], rel=1e-12)


@few
@given(sections, st.floats(0.01, 0.99))
def test_a_sounding_on_the_straight_line_changes_nothing(rows, sounding):
    expected = discharges(from_steps(rows))
    assert discharges(from_steps(rows, sounding)) == pytest.approx(expected, rel=1e-12)


@few
@given(st.integers(5, 44))
def test_uncertainty_falls_as_verticals_increase(count):
    few, more = (
        compute(from_steps([(1.0, 1.0, 0.5)] * n)).uncertainty.u_percent for n in (count, count + 1)
    )
    assert more < few


def test_every_fault_is_told_at_once():
    bad = (
        Vertical(2.0, -0.5, (Point(0.6, velocity_ms=0.4),)),
        Vertical(4.0, 1.0, (Point(0.6, revolutions=30.0),)),
        Vertical(6.0, 0.5, (Point(1.2, velocity_ms=0.4),)),
    )
    with pytest.raises(BadSheet) as refused:
        compute(Sheet((Channel(Bank(0.0), Bank(5.0), bad),), METER))
    told = {(f.vertical, f.field) for f in refused.value.faults}
    assert told >= {(0, "depth_m"), (1, "seconds"), (2, "fraction"), (None, "last_bank.distance_m")}
