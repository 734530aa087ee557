"""What a gauging sheet is refused for, by row and field."""

import dataclasses

import pytest

from network.numerics.gaugings.gauging import compute, preview
from network.numerics.gaugings.gauging_faults import BadSheet
from network.numerics.gaugings.gauging_input import Bank, Channel, Point, Sheet, StageReading
from network.numerics.meters.meter_rating import Piece
from tests.numerics.sheets import METER, channel, plain_sheet


def faults_of(sheet):
    with pytest.raises(BadSheet) as refused:
        compute(sheet)
    assert preview(sheet).faults == refused.value.faults
    return refused.value.faults


@pytest.mark.parametrize(
    ("changes", "field", "words"),
    [
        ({"distance_m": None}, "distance_m", "the distance is missing"),
        ({"depth_m": None}, "depth_m", "the depth is missing"),
        ({"depth_m": -1.0}, "depth_m", "negative"),
        ({"angle_deg": 95.0}, "angle_deg", "±90°"),
        ({"ice_underside_m": 1.5}, "ice_underside_m", "between the surface and the bed"),
        ({"ice_underside_m": -0.1}, "ice_underside_m", "between the surface and the bed"),
        ({"line_angle_deg": 35.0}, "line_angle_deg", "0° to 30°"),
        ({"air_line_m": -1.0}, "air_line_m", "0 or more"),
        ({"air_line_m": 20.0, "line_angle_deg": 30.0}, "air_line_m", "leave no depth"),
        ({"points": (Point(1.2, velocity_ms=0.5),)}, "fraction", "between 0 and 1"),
        ({"points": (Point(None, velocity_ms=0.5),)}, "fraction", "between 0 and 1"),
        ({"points": (Point(0.6, revolutions=5.0),)}, "seconds", "revolutions without seconds"),
        ({"points": (Point(0.6, revolutions=5.0, seconds=0.0),)}, "seconds", "more than 0"),
        ({"points": (Point(0.6, revolutions=-5.0, seconds=9.0),)}, "revolutions", "negative"),
        ({"points": (Point(0.6, 0.5, 5.0, 60.0),)}, "velocity_ms", "both revolutions and"),
        ({"points": (Point(0.6),)}, "velocity_ms", "neither revolutions nor"),
        ({"points": (Point(0.3, 0.5), Point(0.7, 0.4))}, "points", "no known set"),
        ({"points": (Point(0.6, 0.5), Point(0.6, 0.4))}, "points", "no known set"),
        ({"points": (Point(0.0, 0.5),), "ice_underside_m": 0.2}, "points", "under ice"),
        ({"mean_velocity_ms": 0.5}, "mean_velocity_ms", "both points and a mean velocity"),
    ],
)
def test_a_row_is_refused_by_its_field(changes, field, words):
    sheet = dataclasses.replace(plain_sheet(**changes), meter=METER)
    (fault,) = faults_of(sheet)
    assert (fault.channel, fault.vertical, fault.field) == (0, 1, field)
    assert "Vertical 2" in str(fault.sentence)
    assert words in str(fault.sentence)


def test_revolutions_need_a_meter():
    sheet = plain_sheet(points=(Point(0.6, revolutions=5.0, seconds=60.0),))
    assert "a meter with a rating" in str(faults_of(sheet)[0].sentence)


def test_a_meter_that_is_no_rating_is_refused():
    falling = dataclasses.replace(METER, pieces=(Piece(0.0, -0.25, 0.0, 10.0),))
    sheet = dataclasses.replace(plain_sheet(), meter=falling)
    assert [f.field for f in faults_of(sheet)] == ["meter"]


def across(distances, banks=(0.0, 40.0)):
    depths, velocities = [1.0] * len(distances), [0.5] * len(distances)
    return Sheet((channel(distances, depths, velocities, banks=banks),))


def test_a_slipped_comma_in_a_distance_is_asked_by_its_row():
    # 125 typed for 12.5.
    (fault,) = faults_of(across([5.0, 10.0, 125.0, 15.0, 20.0]))
    assert (fault.vertical, fault.field) == (2, "distance_m")
    assert "Is 12.5 m meant?" in str(fault.sentence)


def test_distances_that_neither_rise_nor_fall_are_refused():
    (fault,) = faults_of(across([35.0, 20.0, 30.0, 15.0, 10.0], banks=(40.0, 0.0)))
    assert (fault.vertical, fault.field) == (1, "distance_m")
    assert "neither rises nor falls" in str(fault.sentence)


def test_distances_may_descend():
    down = compute(across([30.0, 20.0, 10.0], banks=(40.0, 0.0)))
    up = compute(across([10.0, 20.0, 30.0]))
    assert down.discharge_m3s == pytest.approx(up.discharge_m3s)


@pytest.mark.parametrize(
    ("banks", "field"),
    [((12.0, 40.0), "first_bank.distance_m"), ((0.0, 18.0), "last_bank.distance_m")],
)
def test_a_bank_inside_the_section_is_refused(banks, field):
    (fault,) = faults_of(across([10.0, 15.0, 20.0], banks=banks))
    assert fault.field == field
    assert "lies inside the section" in str(fault.sentence)


def test_all_verticals_at_one_place_are_refused():
    (fault,) = faults_of(across([5.0, 5.0, 5.0], banks=(5.0, 5.0)))
    assert "at one place" in str(fault.sentence)


def test_two_verticals_are_no_gauging():
    (fault,) = faults_of(across([10.0, 20.0]))
    assert str(fault.sentence) == "2 verticals with a velocity; a gauging needs at least 3."


def test_a_channel_without_a_velocity_is_named():
    (good,) = across([10.0, 20.0, 30.0]).channels
    dry = channel([51.0, 52.0], [1.0, 1.0], [None, None], banks=(50.0, 53.0))
    (fault,) = faults_of(Sheet((good, dry)))
    assert (fault.channel, fault.field) == (1, "verticals")
    assert (
        preview(Sheet((good, dry))).result.mid_section_m3s
        == compute(Sheet((good,))).mid_section_m3s
    )


@pytest.mark.parametrize(
    ("bank", "field"),
    [
        (Bank(None), "distance_m"),
        (Bank(0.0, depth_m=-1.0), "depth_m"),
        (Bank(0.0, factor=7.0), "factor"),
        (Bank(0.0, velocity_ms=float("inf")), "velocity_ms"),
    ],
)
def test_a_bank_is_refused_by_its_field(bank, field):
    (only,) = plain_sheet().channels
    sheet = Sheet((Channel(bank, only.last_bank, only.verticals),))
    (fault,) = faults_of(sheet)
    assert fault.field == f"first_bank.{field}"
    assert preview(sheet).result.discharge_m3s > 0


def test_the_times_of_a_gauging_run_forward():
    sheet = dataclasses.replace(plain_sheet(), started_s=100, ended_s=50)
    assert [f.field for f in faults_of(sheet)] == ["ended_s"]


def test_a_stage_that_is_no_number_is_refused():
    sheet = dataclasses.replace(plain_sheet(), stages=(StageReading(0, float("nan")),))
    assert [f.field for f in faults_of(sheet)] == ["stages"]


def test_the_rows_without_fault_are_kept():
    sheet = across([5.0, 10.0, 125.0, 15.0, 20.0])
    kept = preview(sheet).result
    assert kept.discharge_m3s == compute(across([5.0, 10.0, 15.0, 20.0])).discharge_m3s
    assert [v.vertical for v in kept.verticals] == [0, 1, 3, 4]
