"""A printed number keeps text and rounded value together."""

import pytest

from network.numerics.marks import Mark
from reports.printed import NO_NUMBER, SIGNS, to_decimals, to_figures


def test_a_flow_is_printed_to_three_figures_with_its_value_rounded_alike():
    number = to_figures(12.345, decimal_sign=",")
    assert (number.text, number.value) == ("12,3", 12.3)


def test_a_peak_that_may_have_been_higher_says_at_least():
    assert to_figures(83.42, decimal_sign=".", at_least=True).text == "≥ 83.4"


def test_a_stage_is_printed_to_its_decimals_with_a_true_minus():
    number = to_decimals(-0.2345, 3, decimal_sign=",")
    assert (number.text, number.value) == ("−0,235", -0.235)


def test_what_is_missing_is_a_dash_without_value():
    assert to_figures(None, decimal_sign=".") == NO_NUMBER
    assert str(to_decimals(None, 2, decimal_sign=".", marks=Mark.WITHHELD)) == "–#"


def test_signs_stand_in_one_order_behind_the_number():
    number = to_figures(2.5, decimal_sign=".", marks=Mark.ICE_OR_BACKWATER | Mark.ESTIMATED)
    assert str(number) == "2.50*§"


@pytest.mark.parametrize("mark", [mark for mark in Mark if mark != Mark.MISSING])
def test_every_mark_has_a_typographic_sign_and_never_a_letter(mark):
    assert len(SIGNS[mark]) == 1
    assert not SIGNS[mark].isalnum()
