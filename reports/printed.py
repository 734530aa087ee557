"""A value as the yearbook prints it: text, rounded value and footnote marks."""

from dataclasses import dataclass
from datetime import date, datetime

from network.numerics.marks import Mark
from network.numerics.printing import ABSENT, figures_text, fixed_text
from network.numerics.years.water_year import rounded

# Footnote signs; all of them stand in the report's font. A missing value is a dash and needs none.
SIGNS = {
    Mark.ESTIMATED: "*",
    Mark.PARTIAL: "†",
    Mark.EXTRAPOLATED: "‡",
    Mark.ICE_OR_BACKWATER: "§",
    Mark.TYPED: "¶",
    Mark.WITHHELD: "#",
}
RECORDED = Mark(0)


@dataclass(frozen=True, slots=True)
class Number:
    """A value as printed: ``text`` with the agency's decimal sign, ``value`` rounded alike."""

    value: float | None = None
    text: str = ABSENT
    marks: Mark = RECORDED

    @property
    def signs(self) -> str:
        """Return the footnote signs printed behind the number."""
        return "".join(sign for mark, sign in SIGNS.items() if mark in self.marks)

    def __str__(self) -> str:
        return self.text + self.signs


@dataclass(frozen=True, slots=True)
class Event:
    """A number and the day or instant it belongs to; the first one where there is a tie."""

    number: Number
    when: date | datetime | None = None


NO_NUMBER = Number()
NO_EVENT = Event(NO_NUMBER)


def to_figures(
    value: float | None,
    *,
    decimal_sign: str,
    marks: Mark = RECORDED,
    figures: int = 3,
    max_decimals: int = 3,
    at_least: bool = False,
) -> Number:
    """Print a flow, volume or runoff to significant figures; ``at_least`` prints "≥" before it."""
    if value is None:
        return Number(marks=marks)
    text = figures_text(
        value, decimal_sign=decimal_sign, figures=figures, max_decimals=max_decimals
    )
    result = rounded(value, figures=figures, max_decimals=max_decimals)
    return Number(float(result), f"≥ {text}" if at_least else text, marks)


def to_decimals(
    value: float | None,
    decimals: int,
    *,
    decimal_sign: str,
    marks: Mark = RECORDED,
    plus: bool = False,
) -> Number:
    """Print a stage, elevation, offset or percentage to a number of decimals."""
    if value is None:
        return Number(marks=marks)
    text = fixed_text(value, decimals=decimals, decimal_sign=decimal_sign, plus=plus)
    return Number(float(text.replace(decimal_sign, ".").replace("−", "-")), text, marks)
