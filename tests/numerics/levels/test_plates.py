"""Plate readings become stages; holes, overlaps and disagreements are found."""

import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st

from network.numerics.levels.plates import (
    Plate,
    cover_findings,
    pair_finding,
    plates_that_hold,
    reading_finding,
    stage_m,
)

LOW = Plate("I", lowest_m=0.0, highest_m=1.0, zero_m=-0.20)  # stage −0.20 to 0.80
MIDDLE = Plate("II", lowest_m=0.9, highest_m=2.0, zero_m=-0.20)  # 0.70 to 1.80
HIGH = Plate("III", lowest_m=0.0, highest_m=2.0, zero_m=1.70)  # 1.70 to 3.70, numbered from 0


def kinds(findings):
    return [(finding.kind, finding.labels) for finding in findings]


def test_stage_is_the_reading_plus_the_plate_zero():
    assert stage_m(0.35, -0.20) == pytest.approx(0.15)
    stages = stage_m(np.array([0.35, 1.10]), np.array([-0.20, 1.70]))
    assert stages == pytest.approx([0.15, 2.80])


def test_a_reading_can_belong_to_every_plate_that_shows_it():
    plates = (LOW, MIDDLE, HIGH)
    assert plates_that_hold(plates, 0.95) == (LOW, MIDDLE, HIGH)
    assert plates_that_hold(plates, 1.5) == (MIDDLE, HIGH)
    assert plates_that_hold(plates, 2.0) == (MIDDLE, HIGH)
    assert plates_that_hold(plates, 2.01) == ()


def test_a_reading_off_its_plate_is_found():
    assert reading_finding(LOW, 1.0) is None
    above, below = reading_finding(LOW, 1.04), reading_finding(MIDDLE, 0.5)
    assert str(above.sentence) == "The reading 1.040 m lies above plate I, which ends at 1.00 m."
    assert str(below.sentence) == "The reading 0.500 m lies below plate II, which starts at 0.90 m."
    assert (below.kind, below.figure_m, below.limit_m) == ("off_plate", 0.5, 0.9)


def test_plates_that_overlap_by_a_decimetre_give_no_finding():
    assert cover_findings([HIGH, LOW, MIDDLE], range_m=(-0.20, 3.70)) == ()


def test_a_hole_is_found_with_its_length_and_stages():
    [finding] = cover_findings([LOW, HIGH])
    assert kinds([finding]) == [("hole", ("I", "III"))]
    assert finding.figure_m == pytest.approx(0.90)
    assert "hole of 0.900 m, from stage 0.800 to 1.700 m" in str(finding.sentence)


def test_a_short_overlap_is_found():
    [finding] = cover_findings([LOW, Plate("II", 0.95, 2.0, -0.20)])
    assert kinds([finding]) == [("short_overlap", ("I", "II"))]
    assert finding.figure_m == pytest.approx(0.05)
    assert cover_findings([LOW, Plate("II", 0.95, 2.0, -0.20)], overlap_m=0.05) == ()


def test_plates_that_just_touch_overlap_by_nothing_and_are_no_hole():
    [finding] = cover_findings([LOW, Plate("II", 1.0, 2.0, -0.20)])
    assert (finding.kind, finding.figure_m) == ("short_overlap", pytest.approx(0, abs=1e-9))


def test_a_short_plate_beside_a_long_one_hides_no_hole_and_makes_none():
    long_plate, short_plate = Plate("long", 0.0, 3.0, 0.0), Plate("short", 0.2, 0.5, 0.0)
    upper = Plate("upper", 2.9, 4.0, 0.0)
    assert cover_findings([long_plate, short_plate, upper]) == ()


def test_ends_of_the_range_without_a_plate_are_found():
    found = cover_findings([LOW, MIDDLE], range_m=(-0.30, 2.5))
    assert kinds(found) == [("not_covered", ("I",)), ("not_covered", ("II",))]
    assert [finding.limit_m for finding in found] == [-0.30, 2.5]


def test_no_plates_give_no_finding():
    assert cover_findings([], range_m=(0, 1)) == ()


def test_two_plates_read_together_must_agree():
    assert pair_finding((LOW, 0.95), (MIDDLE, 0.96)) is None  # 0.75 and 0.76: at the limit
    finding = pair_finding((LOW, 0.95), (MIDDLE, 0.98))
    assert finding.figure_m == pytest.approx(0.03)
    assert "0.750 and 0.780 m, 0.030 m apart; allowed 0.010 m" in str(finding.sentence)


@pytest.mark.parametrize("values", [(1.0, 1.0, 0.0), (2.0, 1.0, 0.0), (0.0, 1.0, float("nan"))])
def test_a_plate_that_cannot_be_is_refused(values):
    with pytest.raises(ValueError, match="plate X"):
        Plate("X", *values)


@given(
    cuts=st.lists(st.integers(20, 200), min_size=1, max_size=6),
    overlaps=st.lists(st.integers(10, 15), min_size=6, max_size=6),
    order=st.randoms(),
)
def test_a_gauge_built_with_overlaps_is_sound_in_any_order_of_its_plates(cuts, overlaps, order):
    plates, bottom = [], 0
    for number, (length, overlap) in enumerate(zip(cuts, overlaps, strict=False)):
        plates.append(Plate(str(number), 0.0, (length + overlap) / 100, bottom / 100))
        bottom += length
    order.shuffle(plates)
    assert cover_findings(plates) == ()
