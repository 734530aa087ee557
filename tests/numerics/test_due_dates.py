"""Days on which things fall due, against a second implementation of the calendar."""

from datetime import date, timedelta

import pytest
from dateutil.relativedelta import relativedelta
from hypothesis import given
from hypothesis import strategies as st

from network.numerics.due_dates import days_between, months_after, whole_months

DAYS = st.dates(min_value=date(1900, 1, 1), max_value=date(2200, 12, 31))


@pytest.mark.parametrize(
    ("day", "months", "due"),
    [
        (date(2024, 2, 29), 12, date(2025, 2, 28)),
        (date(2023, 2, 28), 12, date(2024, 2, 28)),
        (date(2024, 1, 31), 1, date(2024, 2, 29)),
        (date(2100, 1, 31), 1, date(2100, 2, 28)),  # 2100 is no leap year
        (date(2024, 8, 31), 6, date(2025, 2, 28)),
        (date(2024, 12, 15), 1, date(2025, 1, 15)),
        (date(2024, 5, 31), 36, date(2027, 5, 31)),
    ],
)
def test_a_month_later_is_the_same_day_or_the_last_of_a_shorter_month(day, months, due):
    assert months_after(day, months) == due


@given(day=DAYS, months=st.integers(0, 600))
def test_months_agree_with_dateutil(day, months):
    assert months_after(day, months) == day + relativedelta(months=months)


@given(start=DAYS, days=st.integers(0, 20_000))
def test_whole_months_are_the_most_that_have_passed(start, days):
    end = start + timedelta(days=days)
    months = whole_months(start, end)
    assert months_after(start, months) <= end < months_after(start, months + 1)


def test_no_month_has_passed_before_the_start():
    assert whole_months(date(2024, 3, 5), date(2024, 2, 1)) == 0


def test_six_a_year_are_two_months_apart():
    # 365.25 / 6 = 60.875, to the next whole day 61
    assert days_between(6) == 61


def test_something_done_no_times_a_year_never_falls_due():
    with pytest.raises(ValueError, match="at least once"):
        days_between(0)
