"""Lays the months of the daily table out in rows, ready for the template to print."""

from dataclasses import dataclass

from reports.printed import Number
from reports.yearbook import Month

LONGEST_MONTH = 31


@dataclass(frozen=True, slots=True)
class Cell:
    """What one cell prints: the number, its footnote signs, and the classes of its style."""

    text: str = ""
    signs: str = ""
    style: str = ""


@dataclass(frozen=True, slots=True)
class Row:
    """One day of all months; every fifth is followed by a gap to lead the eye."""

    day: int
    cells: tuple[Cell, ...]

    @property
    def style(self) -> str:
        """Return the class of the row."""
        return "fifth" if self.day % 5 == 0 and self.day < 30 else ""


@dataclass(frozen=True, slots=True)
class Layout:
    """The rows of days and, below them by name, the rows of monthly figures."""

    days: tuple[Row, ...]
    below: dict[str, tuple[Cell, ...]]


NO_SUCH_DAY = Cell()


def lay_out(months: tuple[Month, ...], *, decimal_sign: str) -> Layout:
    """Return the table's rows; the decimal signs of a month's column stand in line."""
    most = [_most_decimals(month, decimal_sign) for month in months]

    def cell(number: Number, column: int, extra: str = "") -> Cell:
        gap = most[column] - _decimals(number, decimal_sign)
        style = " ".join(filter(None, (f"pad{gap}" if gap else "", extra)))
        return Cell(number.text, number.signs, style)

    def day_cell(day: int, column: int) -> Cell:
        month = months[column]
        if day > len(month.cells):
            return NO_SUCH_DAY
        extremes = {"lowest": month.lowest.when, "highest": month.highest.when}
        names = [name for name, when in extremes.items() if when and when.day == day]
        return cell(month.cells[day - 1], column, " ".join(names))

    days = tuple(
        Row(day, tuple(day_cell(day, column) for column in range(len(months))))
        for day in range(1, LONGEST_MONTH + 1)
    )
    below = {
        name: tuple(cell(number, column) for column, number in enumerate(numbers))
        for name, numbers in _figures(months).items()
    }
    return Layout(days, below)


def _figures(months: tuple[Month, ...]) -> dict[str, list[Number]]:
    """Return the monthly figures that share the unit of the days."""
    return {
        "mean": [month.mean for month in months],
        "highest": [month.highest.number for month in months],
        "lowest": [month.lowest.number for month in months],
        "earlier_mean": [month.earlier_mean for month in months],
        "earlier_highest": [month.earlier_highest.number for month in months],
        "earlier_lowest": [month.earlier_lowest.number for month in months],
    }


def _most_decimals(month: Month, decimal_sign: str) -> int:
    """Return the most decimals of any number in a month's column."""
    below = (numbers[0] for numbers in _figures((month,)).values())
    return max(_decimals(number, decimal_sign) for number in (*month.cells, *below))


def _decimals(number: Number, decimal_sign: str) -> int:
    """Return how many digits stand behind the decimal sign."""
    return len(number.text.partition(decimal_sign)[2])
