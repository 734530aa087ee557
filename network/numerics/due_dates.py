"""When something done every so often is due again: calendar months, and parts of a year."""

from calendar import isleap
from datetime import date

DAYS_PER_YEAR = 365.25
SHORTEST_MONTH_DAYS = 28
MONTH_DAYS = (31, 28, 31, 30, 31, 30, 31, 31, 30, 31, 30, 31)


def months_after(day: date, months: int) -> date:
    """Return the same day some months on, the last day of a shorter month.

    31 January and one month is 28 February, or 29 in a leap year (common practice).
    """
    year, month = divmod(day.year * 12 + day.month - 1 + months, 12)
    last = 29 if month == 1 and isleap(year) else MONTH_DAYS[month]
    return date(year, month + 1, min(day.day, last))


def whole_months(start: date, end: date) -> int:
    """Return the whole months from one day to a later one, 0 where it is not later."""
    months = (end.year - start.year) * 12 + end.month - start.month
    if months > 0 and months_after(start, months) > end:
        months -= 1
    return max(months, 0)


def days_between(times_a_year: int) -> int:
    """Return the days from one to the next of several evenly spread times a year."""
    if times_a_year < 1:
        raise ValueError("Something done in a year is done at least once.")
    return round(DAYS_PER_YEAR / times_a_year)
