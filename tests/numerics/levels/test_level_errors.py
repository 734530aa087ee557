"""Errors of plates and benchmarks found by the closing book of test_levelling."""

from dataclasses import replace

import pytest

from network.numerics.levels.level_errors import (
    PlateMark,
    benchmark_errors,
    plate_errors,
    two_set_up_findings,
)
from network.numerics.levels.levelling import LevelLimits, adjust, reduce_book
from tests.numerics.levels.test_levelling import CLOSING, ELEVATIONS_M

MARKS = {"P1": PlateMark(2.00, zero_m=98.500), "P2": PlateMark(1.00, zero_m=98.512)}


@pytest.fixture(scope="module")
def points():
    return adjust(reduce_book(CLOSING, ELEVATIONS_M))


def test_a_moved_plate_is_found_with_its_error(points):
    sound, moved = plate_errors(points, MARKS)
    assert sound.found_m == pytest.approx(98.5000, abs=1e-9)  # 100.5000 − 2.00
    assert sound.error_mm == 0
    assert moved.found_m == pytest.approx(98.4995, abs=1e-9)  # 99.4995 − 1.00
    assert moved.error_mm == pytest.approx(-12.5, abs=1e-6)  # found minus in force


def test_no_error_is_given_below_the_tolerance(points):
    _, moved = plate_errors(points, MARKS, LevelLimits(plate_tolerance_mm=12.6))
    assert moved.error_mm == 0
    assert moved.difference_mm == pytest.approx(-12.5, abs=1e-6)
    _, moved = plate_errors(points, MARKS, LevelLimits(plate_tolerance_mm=12.5))
    assert moved.error_mm == pytest.approx(-12.5, abs=1e-6)


def test_benchmarks_are_compared_with_their_elevation_in_force(points):
    second, closing = benchmark_errors(points, ELEVATIONS_M)
    assert second.error_mm == pytest.approx(6.5, abs=1e-6)  # 101.9115 − 101.905
    assert closing.point == "BM1"
    assert closing.difference_mm == pytest.approx(0, abs=1e-6)


def test_a_misread_plate_passes_the_sums_and_is_caught_by_its_second_set_up():
    misread = (*CLOSING[:6], replace(CLOSING[6], intermediate_m=1.559), *CLOSING[7:])
    book = reduce_book(misread, ELEVATIONS_M)
    assert book.sums_agree
    assert book.closes
    [finding] = two_set_up_findings(adjust(book), MARKS)
    assert (finding.point, finding.set_ups) == ("P1", 2)
    assert finding.spread_mm == pytest.approx(9.25, abs=1e-6)  # 10 mm − 0.75 mm
    assert "P1: its sights from 2 set-ups differ by 9.2 mm" in str(finding.sentence)


def test_plates_that_agree_give_no_finding(points):
    assert two_set_up_findings(points, MARKS) == ()


def test_a_plate_sighted_once_or_not_at_all_is_a_finding():
    once = (*CLOSING[:6], *CLOSING[7:])
    marks = {"P1": MARKS["P1"], "P9": PlateMark(1.0, 98.0)}
    found = two_set_up_findings(adjust(reduce_book(once, ELEVATIONS_M)), marks)
    assert [str(finding.sentence) for finding in found] == [
        "Plate P1 was sighted from one set-up only.",
        "Plate P9 was not sighted.",
    ]
