"""Children on the page of a visit: readings, recorder checks, spin tests, work left."""

from collections.abc import Sequence
from typing import Any, ClassVar

from django import forms
from django.contrib import admin
from django.http import HttpRequest
from django.utils import timezone
from django.utils.translation import gettext as _t
from django.utils.translation import gettext_lazy as _

from network.admin.children import ChildCards, ChildRows
from network.models import (
    OtherGauge,
    RecorderCheck,
    Series,
    SpinTest,
    StaffPlate,
    Station,
    VisitReading,
    WorkLeft,
)
from network.queries.visits import start_sheet

Choices = list[tuple[str, Any]]


class ReadingForm(forms.ModelForm):
    """One reading; plates and other gauges stand in one list."""

    gauge_choices: ClassVar[Choices] = []
    gauge = forms.ChoiceField(label=_("gauge"))

    def __init__(self, *args: Any, **options: Any) -> None:
        super().__init__(*args, **options)
        self.fields["gauge"].choices = self.gauge_choices
        row = self.instance
        if row.pk:
            self.fields["gauge"].initial = gauge_value(row.plate, row.other_gauge)
        elif not self.initial.get("gauge"):
            self.fields["gauge"].initial = self.gauge_choices[0][0] if self.gauge_choices else ""

    def has_changed(self) -> bool:
        """Take a new row for empty while only its time and gauge are filled in."""
        typed = {"reading_m", "wave_m", "observation"} & set(self.changed_data)
        return bool(typed if not self.instance.pk else self.changed_data)

    def clean(self) -> dict[str, Any]:
        """Read which plate or gauge is meant."""
        cleaned = super().clean() or self.cleaned_data
        kind, _mark, key = str(cleaned.get("gauge", "")).partition(":")
        model: Any = {"plate": StaffPlate, "other_gauge": OtherGauge}.get(kind)
        cleaned |= {"plate": None, "other_gauge": None}
        if model is not None:
            cleaned[kind] = model.objects.filter(pk=key).first()
        return cleaned


def gauge_value(plate: StaffPlate | None, other: OtherGauge | None) -> str:
    """Name a plate or another gauge as the list does."""
    if plate is not None:
        return f"plate:{plate.pk}"
    return f"other_gauge:{other.pk}" if other is not None else ""


def gauge_choices(station: Station) -> Choices:
    """List the plates of a station, the usual one first, then its other gauges."""
    plates = sorted(
        station.plates.all(),
        key=lambda plate: (plate.removed_at is not None, not plate.is_usual, plate.label),
    )
    return [
        *((gauge_value(plate, None), _plate_label(plate)) for plate in plates),
        *(
            (gauge_value(None, gauge), f"{gauge.label} ({gauge.get_kind_display()})")
            for gauge in station.other_gauges.all()
        ),
    ]


def _plate_label(plate: StaffPlate) -> str:
    if plate.removed_at is None:
        return plate.label
    told = {"plate": plate.label, "day": f"{timezone.localtime(plate.removed_at):%Y-%m-%d}"}
    return _t("%(plate)s, removed %(day)s") % told


class Started:
    """Children that a new visit starts with filled in."""

    def initial_rows(self, request: HttpRequest, station: Station) -> Sequence[dict[str, Any]]:
        """Return what a new visit starts with."""
        raise NotImplementedError

    def get_formset(self, request: HttpRequest, obj: Any = None, **options: Any) -> Any:
        """Start the rows of a new visit; the rest of the formset is Django's."""
        made = super().get_formset(request, obj, **options)  # type: ignore[misc]
        new = obj is None or not obj.pk
        station = station_of(request, obj)
        rows = list(self.initial_rows(request, station)) if new and station else []

        class WithStart(made):  # type: ignore[misc, valid-type]
            def __init__(self, *args: Any, **more: Any) -> None:
                super().__init__(*args, **{"initial": rows or None, **more})

        return WithStart


def station_of(request: HttpRequest, obj: Any) -> Station | None:
    """Return the station of the visit that is written."""
    if obj is not None and obj.pk:
        return obj.station
    return getattr(request, "station_asked", None)


class Readings(Started, ChildRows):
    """Readings of plates and other gauges."""

    model = VisitReading
    form = ReadingForm
    fields = ("read_at", "gauge", "reading_m", "wave_m", "observation")
    can_delete = True

    def get_extra(self, request: HttpRequest, obj: Any = None, **options: Any) -> int:
        """Offer three lines to a new visit."""
        return 1 if obj is not None and obj.pk else 3

    @admin.display(description=_("gauge"))
    def gauge(self, row: VisitReading) -> str:
        """Name the gauge where the reading is only looked at."""
        return str(row.plate or row.other_gauge)

    def initial_rows(self, request: HttpRequest, station: Station) -> Sequence[dict[str, Any]]:
        """Start with the usual plate, now."""
        sheet = start_sheet(station, by=request.user, at=request.opened_at)
        return [
            {"read_at": row.read_at, "gauge": gauge_value(row.plate, None)}
            for row in sheet.readings
        ]

    def get_formset(self, request: HttpRequest, obj: Any = None, **options: Any) -> Any:
        """Offer the gauges of this station."""
        made = super().get_formset(request, obj, **options)
        station = station_of(request, obj)
        made.form = type(
            made.form.__name__,
            (made.form,),
            {"gauge_choices": gauge_choices(station) if station else []},
        )
        return made


class CheckForm(forms.ModelForm):
    """The recorder beside the staff."""

    def has_changed(self) -> bool:
        """Take a new card for empty while only its series and time are filled in."""
        typed = set(self.changed_data) - {"series", "checked_at"}
        return bool(typed if not self.instance.pk else self.changed_data)


class RecorderChecks(Started, ChildCards):
    """Recorder checks."""

    model = RecorderCheck
    form = CheckForm
    fields = (
        "series", "checked_at", "found_m", "left_m", "staff_stage_m", "wave_m", "clock_error_s",
        "battery_v", "gas_kpa", "was_purged", "was_downloaded",
    )  # fmt: skip
    can_delete = True

    def get_extra(self, request: HttpRequest, obj: Any = None, **options: Any) -> int:
        """Offer a card to a visit that has none."""
        stored = obj is not None and obj.pk and obj.recorder_checks.exists()
        return 0 if stored else 1

    def initial_rows(self, request: HttpRequest, station: Station) -> Sequence[dict[str, Any]]:
        """Start with the primary recorder, now."""
        primary = station.series.filter(is_primary=True)
        return [{"series": row.pk, "checked_at": request.opened_at} for row in primary]

    def formfield_for_foreignkey(self, db_field: Any, request: Any, **options: Any) -> Any:
        """Offer the series of this station."""
        if db_field.name == "series":
            station = station_of(request, getattr(request, "visit", None))
            rows = Series.objects.filter(station=station).exclude(kind=Series.Kind.OBSERVER)
            options["queryset"] = rows
        return super().formfield_for_foreignkey(db_field, request, **options)


class SpinTests(ChildRows):
    """Spin tests."""

    model = SpinTest
    fields = ("pair", "seconds", "is_good")
    can_delete = True
    classes = ("collapse",)

    def get_extra(self, request: HttpRequest, obj: Any = None, **options: Any) -> int:
        """Offer one line to a new visit."""
        return 0 if obj is not None and obj.pk else 1


class WorkLeftRows(ChildRows):
    """Work left to do."""

    model = WorkLeft
    fields = ("text",)
    can_delete = True
    extra = 1
