"""Numbers and times in templates: the agency's decimal sign, the record clock, the language."""

from datetime import UTC, date, datetime, timedelta, timezone
from types import SimpleNamespace

import pytest
from django.template import Context, Template
from django.utils import timezone as clock
from django.utils import translation

from network.templatetags.readings import period

AGENCY = SimpleNamespace(decimal_sign=",", significant_figures=3, max_decimals=2)


def shown(source: str, value: object, agency: object = AGENCY) -> str:
    """Return what a template prints of a value."""
    context = Context({"value": value, "agency": agency})
    return Template("{% load readings %}" + source).render(context)


@pytest.mark.parametrize(
    ("source", "value", "text"),
    [
        ("{% flow value %}", 12.345, "12,3"),
        ("{% flow value %}", 0.0123, "0,01"),
        ("{% flow value %}", None, "–"),
        ("{% stage value %}", 1.2345, "1,235"),
        ("{% stage value %}", -0.05, "−0,050"),
        ("{% fixed value 1 %}", 2.25, "2,3"),
        ("{% change value 1 %}", 2.25, "+2,3"),
        ("{% change value 1 %}", -0.04, "0,0"),
    ],
)
def test_number_is_written_as_the_agency_writes(source, value, text):
    assert shown(source, value) == text


def test_a_point_is_written_before_the_agency_is_set_up():
    assert shown("{% stage value %}", 1.2, agency=None) == "1.200"


def test_an_instant_is_written_in_the_record_clock():
    with clock.override(timezone(timedelta(hours=1))):
        instant = datetime(2020, 3, 1, 23, 30, tzinfo=UTC)
        assert shown("{{ value|moment }}", instant) == "2 Mar 2020 00:30"


def test_a_day_is_written_in_the_language_of_the_reader():
    assert shown("{{ value|day }}", date(2020, 3, 2)) == "2 March 2020"
    with translation.override("de"):
        assert shown("{{ value|day }}", date(2020, 3, 2)) == "2. März 2020"


def test_no_day_is_a_dash():
    assert shown("{{ value|short_day }}", None) == "–"


@pytest.mark.parametrize(
    ("last", "text"),
    [
        (date(2020, 3, 2), "2 March 2020"),
        (date(2020, 3, 9), "2 to 9 March 2020"),
        (date(2020, 4, 9), "2 March to 9 April 2020"),
        (date(2021, 3, 9), "2 March 2020 to 9 March 2021"),
    ],
)
def test_a_period_names_no_month_or_year_twice(last, text):
    assert period(date(2020, 3, 2), last) == text
