"""Rounding and units as the published figures have them."""

from decimal import ROUND_HALF_UP, Decimal

FOOT_M = 0.3048
FT3S_M3S = FOOT_M**3


def last_digit(value: float, figures: int = 3) -> Decimal:
    """Give one unit of the last of the figures printed."""
    return Decimal(1).scaleb(Decimal(repr(float(value))).adjusted() - figures + 1)


def rounded(value: float, figures: int = 3) -> float:
    """Round to so many figures, halves up."""
    exact = Decimal(repr(float(value)))
    return float(exact.quantize(last_digit(value, figures), rounding=ROUND_HALF_UP))
