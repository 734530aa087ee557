"""The calendar of a year, the figures of its months and of the whole, and rounding."""

from datetime import date
from decimal import Decimal

import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st

from network.numerics.years.water_year import (
    WaterYear,
    month_figures,
    number_text,
    on_calendar,
    period_figures,
    rounded,
    year_figures,
)

OCTOBER = WaterYear(start_month=10, named_by="start")
OCTOBER_BY_END = WaterYear(start_month=10, named_by="end")


def days_of(first, last):
    return np.arange(np.datetime64(first), np.datetime64(last) + 1)


def test_a_year_named_by_its_start_and_one_named_by_its_end_cover_the_same_days():
    assert OCTOBER.first_day(2019) == OCTOBER_BY_END.first_day(2020) == date(2019, 10, 1)
    assert OCTOBER.last_day(2019) == OCTOBER_BY_END.last_day(2020) == date(2020, 9, 30)
    assert OCTOBER.year_of(date(2020, 9, 30)) == 2019
    assert OCTOBER_BY_END.year_of(date(2019, 10, 1)) == 2020


@pytest.mark.parametrize(
    ("calendar", "year", "label"),
    [
        (OCTOBER, 2019, "2019/20"),
        (OCTOBER_BY_END, 2020, "2019/20"),
        (OCTOBER, 1999, "1999/2000"),
        (OCTOBER, 2008, "2008/09"),
        (WaterYear(), 2020, "2020"),
        (WaterYear(named_by="end"), 2020, "2020"),
    ],
)
def test_the_label_shows_both_years_unless_it_is_the_calendar_year(calendar, year, label):
    assert calendar.label(year) == label


def test_the_months_run_over_the_new_year():
    months = OCTOBER.months(2019)
    assert months[0] == date(2019, 10, 1)
    assert months[3] == date(2020, 1, 1)
    assert months[11] == date(2020, 9, 1)


@given(
    st.dates(date(1700, 1, 1), date(2200, 12, 31)),
    st.integers(1, 12),
    st.sampled_from(["start", "end"]),
)
def test_every_day_lies_in_the_year_that_claims_it(day, month, named_by):
    calendar = WaterYear(month, named_by)
    year = calendar.year_of(day)
    assert calendar.first_day(year) <= day <= calendar.last_day(year)
    assert calendar.years_of(np.array([day], dtype="datetime64[D]")).tolist() == [year]


@pytest.mark.parametrize("month", [0, 13])
def test_a_year_cannot_start_in_a_month_that_is_none(month):
    with pytest.raises(ValueError, match="month 1 to 12"):
        WaterYear(month)


def test_a_missing_day_blanks_the_month_but_not_its_maximum():
    values = np.array([3.0, np.nan, 7.0, 5.0])
    figures = period_figures(values, first_day=date(2020, 3, 1))
    assert (figures.mean, figures.total, figures.minimum, figures.minimum_day) == (None,) * 4
    assert (figures.maximum, figures.maximum_day) == (7.0, date(2020, 3, 3))
    assert figures.maximum_in_doubt
    assert figures.volume_m3 is None
    assert figures.runoff_mm(403) is None
    assert figures.specific_l_s_km2(403) is None


def test_the_setting_lets_a_mean_stand_on_the_days_that_are_there():
    values = np.array([3.0, np.nan, 7.0, 5.0])
    figures = period_figures(values, first_day=date(2020, 3, 1), missing_allowed=1)
    assert figures.mean == 5.0
    assert figures.minimum_day == date(2020, 3, 1)
    assert figures.maximum_in_doubt


def test_a_period_without_a_day_has_no_figures_even_when_days_may_be_missing():
    figures = period_figures(np.full(31, np.nan), first_day=date(2020, 3, 1), missing_allowed=31)
    assert figures.mean is None
    assert figures.maximum is None
    assert not figures.maximum_in_doubt


def test_of_equal_extremes_the_first_date_is_kept():
    figures = period_figures(np.array([2.0, 1.0, 1.0, 4.0, 4.0]), first_day=date(2020, 1, 1))
    assert figures.minimum_day == date(2020, 1, 2)
    assert figures.maximum_day == date(2020, 1, 4)


def test_volume_depth_and_specific_discharge_are_worked_by_hand():
    # 1 m³/s for one day over 86.4 km²: 86 400 m³, 1 mm; 1000 l/s / 86.4 km² = 11.574 l/s/km²
    figures = period_figures(np.array([1.0]), first_day=date(2020, 1, 1))
    assert figures.volume_m3 == 86_400
    assert figures.volume_hm3 == 0.0864
    assert figures.runoff_mm(86.4) == pytest.approx(1.0, rel=1e-15)
    assert figures.specific_l_s_km2(86.4) == pytest.approx(11.574, abs=5e-4)


def test_months_take_the_days_absent_from_the_record_as_missing():
    days = days_of("2019-10-01", "2019-11-29")
    figures = month_figures(days, np.ones(len(days)), year=2019, calendar=OCTOBER)
    assert [f.first_day.month for f in figures] == [10, 11, 12, *range(1, 10)]
    assert figures[0].complete
    assert (figures[1].days, figures[1].days_present, figures[1].mean) == (30, 29, None)
    assert figures[4].days == 29  # February 2020


def test_the_seven_day_minimum_keeps_to_windows_wholly_inside_the_year():
    days = days_of("2019-12-20", "2021-01-10")
    values = np.full(len(days), 10.0)
    values[days < np.datetime64("2020-01-04")] = 1.0  # three low days of the year, more before it
    values[(days >= np.datetime64("2020-08-01")) & (days < np.datetime64("2020-08-08"))] = 4.0
    figures = year_figures(days, values, year=2020, calendar=WaterYear())
    assert figures.lowest_7_day_mean == 4.0
    assert figures.lowest_7_day_last_day == date(2020, 8, 7)
    values[days == np.datetime64("2020-06-15")] = np.nan
    gappy = year_figures(days, values, year=2020, calendar=WaterYear())
    assert gappy.lowest_7_day_mean is None
    assert gappy.maximum == 10.0


def test_a_day_given_twice_is_refused():
    twice = np.array(["2020-01-01", "2020-01-01"], dtype="datetime64[D]")
    with pytest.raises(ValueError, match="twice"):
        on_calendar(twice, np.ones(2), first=date(2020, 1, 1), last=date(2020, 1, 31))
    with pytest.raises(ValueError, match="2 days but 3 values"):
        on_calendar(twice, np.ones(3), first=date(2020, 1, 1), last=date(2020, 1, 31))


@pytest.mark.parametrize(
    ("value", "text"),
    [
        (12345.0, "12300"),
        (9.996, "10.0"),
        (99.95, "100"),
        (999.5, "1000"),
        (0.99951, "1.00"),
        (1.2, "1.20"),
        (0.0123456, "0.012"),
        (0.0, "0"),
        (0.0005, "0.001"),
        (0.0004, "<0.001"),
        (-0.0004, ">-0.001"),
        (-1.2345, "-1.23"),
        (2.675, "2.68"),  # the double lies below the tie, the number meant does not
        (4.0649999999999995, "4.07"),  # a tie but for the last bit of a sum
    ],
)
def test_numbers_are_written_to_three_figures_with_halves_up(value, text):
    assert number_text(value) == text
    assert number_text(np.float64(value)) == text


def test_halves_can_go_to_the_even_digit_and_the_figures_are_a_setting():
    assert rounded(2.675, rule="half_even") == Decimal("2.68")
    assert rounded(2.665, rule="half_even") == Decimal("2.66")
    assert rounded(2.665) == Decimal("2.67")
    assert number_text(1234.5, figures=4) == "1235"
    assert number_text(0.00012345, max_decimals=5) == "0.00012"


@given(st.floats(1e-6, 1e9))
def test_rounding_is_off_by_half_a_unit_at_most_and_repeats_itself(value):
    result = rounded(value)
    unit = Decimal(1).scaleb(result.as_tuple().exponent)
    assert abs(Decimal(f"{value:.15g}") - result) <= unit / 2
    if result:
        assert rounded(float(result)) == result


@pytest.mark.parametrize("value", [float("nan"), float("inf")])
def test_what_is_no_number_is_not_rounded(value):
    with pytest.raises(ValueError, match="cannot be rounded"):
        rounded(value)
