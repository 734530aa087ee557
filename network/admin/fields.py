"""Form fields for the river bank: decimals, times on the record clock, times of the day."""

import re
from datetime import datetime, time, timedelta
from decimal import Decimal
from typing import Any, ClassVar
from zoneinfo import ZoneInfo

from django import forms
from django.core.exceptions import ValidationError
from django.db import models
from django.utils import timezone
from django.utils.formats import get_format
from django.utils.text import capfirst
from django.utils.translation import gettext_lazy as _

from network.queries import clock

# One sign at most, one decimal point or comma at most; keypads give a hyphen, papers a minus.
NUMBER = re.compile(r"([+−-]?)([0-9]+(?:[.,][0-9]*)?|[.,][0-9]+)")
TIME_FORMATS = ["%H:%M", "%H%M", "%H.%M", "%H:%M:%S"]
DAY = timedelta(days=1)

# Names of figures that may lie below zero; beside them stands the sign button.
BELOW_ZERO = re.compile(
    r"(latitude|longitude|elevation|zero|reading|offset|stage|lowest|highest|found|left|shift|h0"
    r"|graduation|sight|intermediate|deviation|angle|error|extrapolate|velocity)(_|$)|^a_ms$"
)


def may_be_negative(field: models.Field) -> bool:
    """Tell whether a number may lie below zero, by its kind and its name."""
    if isinstance(field, models.FloatField):
        size = "uncertainty" in field.name or "standard" in field.name
        return BELOW_ZERO.search(field.name) is not None and not size
    return not type(field).__name__.startswith("Positive")


class NumberInput(forms.TextInput):
    """A text box with the keypad of a phone, and a button for the sign that keypads lack."""

    template_name = "network/widgets/number.html"

    def __init__(self, *, signed: bool = True, keypad: str = "decimal") -> None:
        super().__init__(attrs={"inputmode": keypad, "autocomplete": "off", "class": "number"})
        self.signed = signed

    def get_context(self, name: str, value: Any, attrs: dict[str, Any] | None) -> dict[str, Any]:
        """Add whether the sign button is shown."""
        context = super().get_context(name, value, attrs)
        context["widget"]["signed"] = self.signed
        return context


class DecimalTextField(forms.FloatField):
    """A decimal number typed with a comma or a point."""

    def __init__(self, *, signed: bool = True, **options: Any) -> None:
        options["widget"] = NumberInput(signed=signed)
        super().__init__(**options)

    def to_python(self, value: Any) -> float | None:
        """Read "1,23", "1.23" or "−0.4"; refuse anything else by the field's name."""
        if value in self.empty_values:
            return None
        if isinstance(value, float):
            return value
        found = NUMBER.fullmatch(str(value).strip())
        if found is None:
            raise ValidationError(
                _("%(label)s: “%(value)s” is not a number. Write it like 1.23 or 1,23."),
                code="invalid",
                params={"label": capfirst(self.label or _("this field")), "value": value},
            )
        sign, digits = found.groups()
        size = float(digits.replace(",", "."))
        return -size if sign in {"-", "−"} else size

    def prepare_value(self, value: Any) -> Any:
        """Write a stored number without exponent, with the decimal sign of the language."""
        if not isinstance(value, float):
            return value
        plain = format(Decimal(repr(value)), "f").removesuffix(".0")
        return plain.replace(".", get_format("DECIMAL_SEPARATOR"))


class WholeNumberField(forms.IntegerField):
    """A whole number typed on a keypad."""

    def __init__(self, *, signed: bool = True, **options: Any) -> None:
        options["widget"] = NumberInput(signed=signed, keypad="numeric")
        super().__init__(**options)

    def to_python(self, value: Any) -> int | None:
        """Read a whole number; a printed minus counts as a minus."""
        return super().to_python(value.replace("−", "-") if isinstance(value, str) else value)


class DayInput(forms.DateInput):
    """The phone's own calendar."""

    input_type = "date"

    def __init__(self, attrs: dict[str, Any] | None = None) -> None:
        super().__init__(attrs=attrs, format="%Y-%m-%d")


class ClockInput(forms.TextInput):
    """A time of the day as HH:MM; 1405 does as well, since keypads lack the colon."""

    def __init__(self, attrs: dict[str, Any] | None = None) -> None:
        hints = {"inputmode": "numeric", "placeholder": "HH:MM", "autocomplete": "off"}
        super().__init__(attrs={**hints, "class": "clock", **(attrs or {})})

    def format_value(self, value: Any) -> str | None:
        """Write the seconds only where there are some, so that none are lost."""
        if isinstance(value, time):
            return value.strftime("%H:%M:%S" if value.second else "%H:%M")
        return super().format_value(value)


class TimeOfDayField(forms.TimeField):
    """A time of the day; see `rolled` for the day it falls on."""

    widget = ClockInput
    input_formats = TIME_FORMATS


def rolled(typed: time, *, after: datetime) -> datetime:
    """Return the first instant from `after` on at which the record clock shows the typed time.

    A visit that arrives at 23:10 and reads the staff at 00:20 reads it on the next day.
    """
    start = timezone.localtime(after)
    instant = start.replace(
        hour=typed.hour, minute=typed.minute, second=typed.second, microsecond=0
    )
    return instant if instant >= start.replace(second=0, microsecond=0) else instant + DAY


class RecordClockInput(forms.SplitDateTimeWidget):
    """Day and time on the record clock, with what watches show beside them."""

    template_name = "network/widgets/record_clock.html"

    def __init__(self, attrs: dict[str, Any] | None = None) -> None:
        widgets = (
            DayInput({"aria-label": _("day")}),
            ClockInput({"aria-label": _("time on the record clock")}),
        )
        forms.MultiWidget.__init__(self, widgets, attrs)
        self.civil_zone = ""

    def id_for_label(self, id_: str) -> str:
        """Let the label lead to the day."""
        return f"{id_}_0" if id_ else id_

    def get_context(self, name: str, value: Any, attrs: dict[str, Any] | None) -> dict[str, Any]:
        """Add the civil clock: its zone for the script, and its time for the first sight."""
        context = super().get_context(name, value, attrs)
        zone = self.civil_zone or clock.agency().civil_zone
        offset = timezone.get_current_timezone().utcoffset(None) or timedelta()
        context["widget"]["civil_zone"] = zone
        context["widget"]["offset_minutes"] = int(offset.total_seconds() // 60)
        context["widget"]["civil"] = civil_text(_typed_instant(value), zone=zone)
        return context


def civil_text(instant: datetime | None, *, zone: str) -> str:
    """Write what a watch shows at an instant, with the day where it is another one."""
    if instant is None:
        return ""
    record, civil = timezone.localtime(instant), instant.astimezone(ZoneInfo(zone))
    return civil.strftime("%H:%M" if civil.date() == record.date() else "%Y-%m-%d %H:%M")


def _typed_instant(value: Any) -> datetime | None:
    """Return the instant a widget holds: stored, or typed as day and time."""
    if isinstance(value, datetime):
        return value if timezone.is_aware(value) else timezone.make_aware(value)
    if not isinstance(value, list | tuple) or len(value) != 2:
        return None
    try:
        return RecordClockField(required=False).clean(list(value))
    except ValidationError:
        return None


class RecordClockField(forms.SplitDateTimeField):
    """An instant typed as day and time on the record clock."""

    widget = RecordClockInput

    def __init__(self, **options: Any) -> None:
        super().__init__(input_time_formats=TIME_FORMATS, **options)


class FieldParts:
    """Give every form of the staff site these fields; for ModelAdmin and inlines alike."""

    formfield_overrides: ClassVar[dict[Any, dict[str, Any]]] = {
        models.FloatField: {"form_class": DecimalTextField},
        models.IntegerField: {"form_class": WholeNumberField},
        models.DateTimeField: {"form_class": RecordClockField, "widget": RecordClockInput},
        models.DateField: {"widget": DayInput},
    }

    def formfield_for_dbfield(self, db_field: Any, request: Any, **options: Any) -> Any:
        """Tell numbers whether they may be negative; leave out the pop-up links beside choices."""
        number = isinstance(db_field, models.FloatField | models.IntegerField)
        if number and not db_field.choices:
            options["signed"] = may_be_negative(db_field)
        field = super().formfield_for_dbfield(db_field, request, **options)  # type: ignore[misc]
        widget: Any = getattr(field, "widget", None)
        if isinstance(widget, RecordClockInput):
            widget.civil_zone = _civil_zone(request)
        elif field is not None and hasattr(widget, "can_add_related"):
            field.widget = widget.widget
        return field


def _civil_zone(request: Any) -> str:
    """Return the zone of the watches, asked once a request."""
    if not hasattr(request, "civil_zone"):
        request.civil_zone = clock.agency().civil_zone
    return str(request.civil_zone)
