"""Numbers as text: decimal sign, true minus, halves up, a dash for none."""

import pytest

from network.numerics.printing import figures_text, fixed_text


@pytest.mark.parametrize(
    ("value", "text"),
    [(None, "–"), (0.0, "0"), (0.0004, "<0,001"), (4.065, "4,07"), (-12.34, "−12,3")],
)
def test_number_of_three_figures_takes_the_decimal_sign(value, text):
    assert figures_text(value, decimal_sign=",") == text


@pytest.mark.parametrize(
    ("value", "decimals", "text"),
    # 2.675 as a double lies below the tie; it is meant as one (halves up)
    [(2.675, 2, "2.68"), (None, 2, "–"), (-0.0004, 3, "0.000"), (-1.5, 0, "−2"), (7, 1, "7.0")],
)
def test_number_of_fixed_decimals_rounds_halves_away_from_zero(value, decimals, text):
    assert fixed_text(value, decimals=decimals, decimal_sign=".") == text


def test_plus_is_written_only_where_something_is_left():
    assert fixed_text(0.04, decimals=1, decimal_sign=".", plus=True) == "0.0"
    assert fixed_text(0.06, decimals=1, decimal_sign=".", plus=True) == "+0.1"


@pytest.mark.parametrize("value", [float("nan"), float("inf")])
def test_what_is_not_finite_is_refused(value):
    with pytest.raises(ValueError, match="cannot be written"):
        fixed_text(value, decimals=1, decimal_sign=".")
