"""Level checks: the book typed and reduced live, checked, reopened, adopted as new zeros."""

from typing import Any

from django import forms
from django.contrib import admin
from django.db import models
from django.http import HttpRequest
from django.utils import timezone
from django.utils.translation import gettext_lazy as _

from network.admin.acting import Filled, ServedAdmin
from network.admin.at_station import AtStation
from network.admin.fields import RecordClockField
from network.admin.level_children import PegTests, Sights, sheet_of
from network.admin.live import LiveForm, LivePages, Typed
from network.admin.statements import own_station
from network.admin.verbs import NoReasonForm, ReasonForm, Verb
from network.models import Benchmark, Instrument, LevelCheck, StaffPlate
from network.queries import adoption
from network.queries import levels as answers
from network.queries.level_sheet import LevelSheet
from network.queries.level_sheet import sheet_of as stored_sheet
from network.services import levels

MAY_CHANGE = "network.change_levelcheck"


class Chosen(forms.ModelMultipleChoiceField):
    """Plates or benchmarks with the figure found of each."""

    widget = forms.CheckboxSelectMultiple

    def __init__(self, model: type[models.Model], found: dict[Any, str], **options: Any) -> None:
        rows = model._default_manager.filter(pk__in=[row.pk for row in found])
        super().__init__(queryset=rows, required=False, **options)
        self.said = found

    def label_from_instance(self, obj: Any) -> str:
        """Say what was found."""
        return self.said[obj]


def adoption_form(check: LevelCheck) -> type[forms.Form]:
    """Ask which zeros found hold from when; those in error are chosen."""
    reduction = answers.reduction_of(check)
    plates = {row.plate: _said(row.plate, row) for row in reduction.plates}
    marks = {
        row.benchmark: _said(row.benchmark, row)
        for row in reduction.benchmarks
        if round(row.difference_mm, 1)  # the mark that closes the run agrees by construction
    }
    off = [row.plate.pk for row in reduction.plates if row.error_mm]
    fields: dict[str, forms.Field] = {
        "plates": Chosen(StaffPlate, plates, label=_("new zeros of"), initial=off)
    }
    if marks:
        fields["benchmarks"] = Chosen(Benchmark, marks, label=_("new elevations of"))
    fields["effective_from"] = RecordClockField(
        label=_("in force from"),
        initial=check.levelled_at,
        help_text=_("When the plate moved, where that is known; else when it was found."),
    )
    fields["reason"] = ReasonForm.base_fields["reason"]
    return type("AdoptionForm", (forms.Form,), fields)


def _said(row: models.Model, found: Any) -> str:
    said = f"{found.found_m:.4f} m ({found.difference_mm:+.1f} mm)"
    return f"{row}: {said.replace('-', '−')}"


class LevelCheckForm(LiveForm):
    """The heading of a level check."""

    def __init__(self, *args: Any, **options: Any) -> None:
        super().__init__(*args, **options)
        if "instrument" in self.fields:
            rows = Instrument.objects.filter(kind=Instrument.Kind.LEVEL)
            self.fields["instrument"].queryset = rows


@admin.register(LevelCheck)
class LevelCheckAdmin(AtStation, LivePages, ServedAdmin):
    """Level checks."""

    form = LevelCheckForm
    change_form_template = "admin/network/levelcheck/change_form.html"
    answer_template = "admin/network/levelcheck/_answer.html"
    list_display = ("station", "levelled_at", "state", "adopted_at", "recorded_by")
    list_filter = ("state", "station")
    list_select_related = ("station", "recorded_by")
    date_hierarchy = "levelled_at"
    fields = ("station", "levelled_at", "party", "instrument", "remarks")
    inlines = (PegTests, Sights)
    verbs = (
        Verb(
            name="check",
            label=_("check"),
            permission=MAY_CHANGE,
            form=NoReasonForm,
            applies=lambda row: row.state == LevelCheck.State.DRAFT,
            run=lambda row, **who: levels.check_level_check(level_check=row, **who),
        ),
        Verb(
            name="adopt",
            label=_("adopt"),
            permission="network.add_platezero",
            form_for=adoption_form,
            applies=lambda row: row.state == LevelCheck.State.CHECKED,
            run=lambda row, **filled: levels.adopt(level_check=row, **filled),
            station_of=own_station,
            look=lambda row, *, effective_from, **_filled: adoption.look(
                row.station, since=effective_from
            ),
            compare=adoption.changes,
            shown_by="admin/network/levelcheck/_adoption.html",
        ),
        Verb(
            name="reopen",
            label=_("reopen"),
            permission=MAY_CHANGE,
            applies=lambda row: row.state == LevelCheck.State.CHECKED,
            run=lambda row, **who: levels.reopen_level_check(level_check=row, **who),
        ),
    )

    def has_change_permission(self, request: HttpRequest, obj: Any = None) -> bool:
        """Edit drafts only: a checked book is reopened with a reason."""
        may = super().has_change_permission(request, obj)
        return may and (obj is None or obj.state == LevelCheck.State.DRAFT)

    def get_changeform_initial_data(self, request: HttpRequest) -> dict[str, Any]:
        """Start a book now, by the person asking."""
        now = timezone.now().replace(second=0, microsecond=0)
        asked = super().get_changeform_initial_data(request)
        return {"levelled_at": now, "party": [request.user.pk], **asked}

    def get_inline_instances(self, request: HttpRequest, obj: Any = None) -> Any:
        """Let the children know the station."""
        self.station_of_page(request, obj)
        return super().get_inline_instances(request, obj)

    def serve(self, request: HttpRequest, filled: Filled) -> models.Model:
        """Save the book as it was booked, finished or not."""
        sheet = sheet_of(filled.values, filled.children)
        assert sheet is not None  # both are required fields
        return levels.save_level_check(
            form_id=filled.form_id,
            sheet=sheet,
            version=filled.version if filled.row is not None else None,
            by=request.user,
            at=timezone.now(),
        )

    def answer(self, request: HttpRequest, typed: Typed) -> dict[str, Any]:
        """Reduce the book as far as it is typed."""
        return _answer(sheet_of(typed.values, typed.children))

    def answer_to_stored(self, request: HttpRequest, row: Any) -> dict[str, Any]:
        """Reduce a stored book."""
        return _answer(stored_sheet(row))


def _answer(sheet: LevelSheet | None) -> dict[str, Any]:
    if sheet is None or not (sheet.sights or sheet.peg):
        return {}
    return {"reduction": answers.reduce(sheet), "peg": answers.peg_result(sheet.peg)[0]}
