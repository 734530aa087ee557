"""Numbers with comma or point, times on the record clock, times of the day."""

from datetime import UTC, datetime, time, timedelta, timezone

import pytest
from django import forms
from django.utils import timezone as clock
from django.utils import translation

from network.admin.fields import (
    DecimalTextField,
    RecordClockField,
    TimeOfDayField,
    WholeNumberField,
    civil_text,
    may_be_negative,
    rolled,
)
from network.models import Agency, Station, VisitReading, WorkingRules

RECORD = timezone(timedelta(hours=1))


@pytest.mark.parametrize(
    ("typed", "value"),
    [
        ("1,23", 1.23),
        ("1.23", 1.23),
        (" 12 ", 12.0),
        (",5", 0.5),
        ("3.", 3.0),
        ("-0,4", -0.4),
        ("−0.4", -0.4),
        ("+2", 2.0),
        ("0", 0.0),
    ],
)
def test_a_decimal_is_read_with_comma_or_point(typed, value):
    assert DecimalTextField().clean(typed) == value


@pytest.mark.parametrize("typed", ["1,234.5", "1e5", "nan", "inf", "12a", "--1", ".", "1 2", "٣"])
def test_what_is_no_plain_number_is_refused_by_the_fields_name(typed):
    field = DecimalTextField(label="stage, m")
    with pytest.raises(forms.ValidationError) as refused:
        field.clean(typed)
    assert refused.value.messages[0].startswith(f"Stage, m: “{typed}” is not a number")


def test_an_empty_decimal_is_none():
    assert DecimalTextField(required=False).clean("") is None


@pytest.mark.parametrize(
    ("value", "shown"),
    [(0.00001, "0.00001"), (312.0, "312"), (-0.5, "-0.5"), (1e22, "1" + "0" * 22)],
)
def test_a_stored_number_is_written_plainly_and_comes_back_unchanged(value, shown):
    field = DecimalTextField()
    assert field.prepare_value(value) == shown
    assert field.clean(shown) == value
    assert not field.has_changed(value, shown)


def test_a_stored_number_takes_the_decimal_sign_of_the_language():
    with translation.override("de"):
        assert DecimalTextField().prepare_value(1.5) == "1,5"


def test_a_whole_number_takes_a_printed_minus():
    assert WholeNumberField().clean("−60") == -60


@pytest.mark.parametrize(
    ("model", "name", "signed"),
    [
        (Station, "latitude_deg", True),
        (Station, "catchment_km2", False),
        (Station, "visit_interval_days", False),
        (VisitReading, "reading_m", True),
        (VisitReading, "wave_m", False),
        (WorkingRules, "stage_uncertainty_mm", False),
        (Agency, "record_utc_offset_minutes", True),
    ],
)
def test_the_sign_button_stands_where_a_figure_may_be_negative(model, name, signed):
    assert may_be_negative(model._meta.get_field(name)) is signed


@pytest.mark.parametrize("typed", ["14:05", "1405", "14.05", "14:05:00"])
def test_a_time_of_the_day_needs_no_colon(typed):
    assert TimeOfDayField().clean(typed) == time(14, 5)


def test_a_time_before_the_arrival_is_on_the_next_day():
    arrived = datetime(2024, 7, 1, 22, 10, tzinfo=UTC)  # 23:10 on the record clock
    with clock.override(RECORD):
        assert rolled(time(23, 40), after=arrived) == datetime(2024, 7, 1, 22, 40, tzinfo=UTC)
        assert rolled(time(0, 20), after=arrived) == datetime(2024, 7, 1, 23, 20, tzinfo=UTC)
        assert rolled(time(23, 10), after=arrived) == arrived


def test_a_time_in_the_minute_of_the_arrival_is_on_the_same_day():
    arrived = datetime(2024, 7, 1, 12, 5, 40, tzinfo=UTC)
    with clock.override(RECORD):
        assert rolled(time(13, 5), after=arrived).date() == arrived.date()


def test_an_instant_is_typed_on_the_record_clock():
    with clock.override(RECORD):
        instant = RecordClockField().clean(["2024-07-01", "1305"])
    assert instant == datetime(2024, 7, 1, 12, 5, tzinfo=UTC)


def test_watches_show_the_civil_time_and_the_day_where_it_differs():
    with clock.override(RECORD):
        noon = datetime(2024, 7, 1, 12, 5, tzinfo=UTC)
        late = datetime(2024, 7, 1, 22, 30, tzinfo=UTC)
        assert civil_text(noon, zone="Europe/Vienna") == "14:05"
        assert civil_text(late, zone="Europe/Vienna") == "2024-07-02 00:30"
        assert civil_text(None, zone="Europe/Vienna") == ""


def test_the_other_clock_stands_beside_the_field_without_script():
    field = RecordClockField()
    field.widget.civil_zone = "Europe/Vienna"
    with clock.override(RECORD):
        html = field.widget.render("at", datetime(2024, 7, 1, 12, 5, tzinfo=UTC), {"id": "id_at"})
        typed = field.widget.render("at", ["2024-07-01", "1305"], {"id": "id_at"})
    for shown in (html, typed):
        assert '<span class="civil-time">14:05</span>' in shown
    assert 'data-zone="Europe/Vienna" data-offset-minutes="60"' in html


def test_seconds_of_a_stored_instant_are_not_lost():
    field = RecordClockField()
    field.widget.civil_zone = "UTC"
    with clock.override(RECORD):
        html = field.widget.render("at", datetime(2024, 7, 1, 12, 5, 33, tzinfo=UTC), {})
    assert 'value="13:05:33"' in html
