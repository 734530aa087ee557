"""Numbers as this agency prints them."""

import math
from dataclasses import dataclass, replace

from network.models import Agency
from network.numerics.marks import Mark
from reports.printed import RECORDED, Number, to_decimals, to_figures


@dataclass(frozen=True)
class Printer:
    """The agency's rounding and decimal sign."""

    decimal_sign: str
    figures: int
    max_decimals: int

    @classmethod
    def of(cls, agency: Agency) -> "Printer":
        """Return the printer of an agency."""
        return cls(agency.decimal_sign, agency.significant_figures, agency.max_decimals)

    def flow(
        self, value: float | None, marks: Mark = RECORDED, *, at_least: bool = False
    ) -> Number:
        """Print a flow, volume or runoff."""
        return to_figures(
            _known(value),
            decimal_sign=self.decimal_sign,
            marks=marks,
            figures=self.figures,
            max_decimals=self.max_decimals,
            at_least=at_least,
        )

    def fixed(
        self, value: float | None, decimals: int, marks: Mark = RECORDED, *, plus: bool = False
    ) -> Number:
        """Print a number with so many decimals."""
        return to_decimals(
            _known(value), decimals, decimal_sign=self.decimal_sign, marks=marks, plus=plus
        )

    def stage(
        self, value: float | None, marks: Mark = RECORDED, *, at_least: bool = False
    ) -> Number:
        """Print a stage or elevation to the millimetre."""
        number = self.fixed(value, 3, marks)
        return replace(number, text=f"≥ {number.text}") if at_least else number


def _known(value: float | None) -> float | None:
    return None if value is None or math.isnan(value) else float(value)
