"""The collimation error of a level from the two-peg test."""

import math

import pytest

from network.numerics.levels.peg_test import PegSetUp, peg_test
from network.numerics.sentences import Refused

# Hand-worked: pegs 40 m apart, true difference 0.1000 m, line of sight rising 0.1 mm in 1 m.
# Midway both readings are 2 mm high; near A they are 0.2 mm and 3.8 mm high.
MIDWAY = PegSetUp(1.5020, 1.4020, 20.0, 20.0)
NEAR_A = PegSetUp(1.6202, 1.5238, 2.0, 38.0)


def test_the_error_shows_in_mm_per_m_and_in_seconds_of_arc():
    found = peg_test(MIDWAY, NEAR_A)
    assert found.first_difference_m == pytest.approx(0.1000)
    assert found.second_difference_m == pytest.approx(0.0964)
    assert found.imbalance_m == -36.0
    assert found.collimation_mm_per_m == pytest.approx(0.1, abs=1e-9)
    assert found.collimation_arcsec == pytest.approx(20.6265, abs=1e-4)  # 206265″ · 0.0001


@pytest.mark.parametrize(("limit_mm_per_m", "passes"), [(0.03, False), (0.1, True), (0.2, True)])
def test_the_verdict_follows_the_limit(limit_mm_per_m, passes):
    assert peg_test(MIDWAY, NEAR_A, limit_mm_per_m=limit_mm_per_m).passes is passes


def test_the_order_of_the_set_ups_and_the_names_of_the_pegs_do_not_matter():
    def swapped(one):
        return PegSetUp(one.reading_b_m, one.reading_a_m, one.distance_b_m, one.distance_a_m)

    straight = peg_test(MIDWAY, NEAR_A).collimation_mm_per_m
    assert peg_test(NEAR_A, MIDWAY).collimation_mm_per_m == pytest.approx(straight)
    mirrored = peg_test(swapped(MIDWAY), swapped(NEAR_A))
    assert mirrored.collimation_mm_per_m == pytest.approx(straight)


def test_a_true_level_has_no_error():
    found = peg_test(PegSetUp(1.5, 1.4, 20.0, 20.0), PegSetUp(1.3, 1.2, 2.0, 38.0))
    assert found.collimation_mm_per_m == pytest.approx(0, abs=1e-9)
    assert found.passes


def test_set_ups_balanced_alike_are_refused():
    with pytest.raises(Refused, match="balanced alike") as refused:
        peg_test(MIDWAY, MIDWAY)
    assert (refused.value.row, refused.value.field_name) == (2, "distance_a_m")


@pytest.mark.parametrize(
    ("set_up", "field_name", "sentence"),
    [
        (PegSetUp(1.5, math.nan, 20.0, 20.0), "reading_b_m", "Set-up 1: .* not a number"),
        (PegSetUp(1.5, 1.4, -20.0, 20.0), "distance_a_m", "Set-up 1: .* negative"),
    ],
)
def test_a_bad_value_is_refused_by_set_up_and_field(set_up, field_name, sentence):
    with pytest.raises(Refused, match=sentence) as refused:
        peg_test(set_up, NEAR_A)
    assert (refused.value.row, refused.value.field_name) == (1, field_name)
