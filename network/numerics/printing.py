"""Numbers as screens and print write them: the agency's decimal sign, a dash for none."""

from decimal import Decimal
from typing import Literal

from network.numerics.years.water_year import ROUNDING, number_text

ABSENT = "–"


def figures_text(
    value: float | None,
    *,
    decimal_sign: str,
    figures: int = 3,
    max_decimals: int = 3,
    rule: Literal["half_up", "half_even"] = "half_up",
) -> str:
    """Write a number with so many significant figures, or a dash where there is none.

    Flow, volume and runoff are written so. Raises ValueError when not finite.
    """
    if value is None:
        return ABSENT
    text = number_text(value, figures=figures, max_decimals=max_decimals, rule=rule)
    return _set(text, decimal_sign)


def fixed_text(value: float | None, *, decimals: int, decimal_sign: str, plus: bool = False) -> str:
    """Write a number with so many decimals, halves up, or a dash where there is none.

    Stage, elevations, offsets and percentages are written so; ``plus`` writes the sign of a
    positive number too. What rounds to zero has no sign. Raises ValueError when not finite.
    """
    if value is None:
        return ABSENT
    if value in (float("inf"), float("-inf")) or value != value:
        raise ValueError(f"{value} cannot be written.")
    # 15 significant digits are all that a double holds for certain: 2.675 is meant as a tie.
    step = Decimal(1).scaleb(-decimals)
    result = Decimal(f"{value:.15g}").quantize(step, rounding=ROUNDING["half_up"])
    sign = "+" if plus and result > 0 else ""
    return _set(f"{sign}{abs(result) if result == 0 else result:f}", decimal_sign)


def _set(text: str, decimal_sign: str) -> str:
    """Return the text with the agency's decimal sign and a minus as wide as a digit."""
    return text.replace("-", "−").replace(".", decimal_sign)
