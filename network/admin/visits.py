"""The visit log: written at the river, checked in the office, reopened with a reason."""

from typing import Any

from django import forms
from django.contrib import admin
from django.db import models
from django.http import HttpRequest, HttpResponse
from django.template.loader import render_to_string
from django.utils import timezone
from django.utils.translation import gettext_lazy as _

from network.admin.acting import Filled, ServedAdmin
from network.admin.at_station import AtStation
from network.admin.live import LivePages, Typed
from network.admin.verbs import NoReasonForm, Verb
from network.admin.visit_answer import shown_answer
from network.admin.visit_children import Readings, RecorderChecks, SpinTests, WorkLeftRows
from network.admin.visit_form import VisitForm, earlier_work, is_row, sheet_of
from network.models import Visit
from network.queries import recorder_checks
from network.queries import visits as answers
from network.queries.visit_sheet import sheet_of as stored_sheet
from network.services import photographs, visits
from network.services.recorder_checks import propose_from_visit

MAY_CHANGE = "network.change_visit"


def _proposals(request: HttpRequest, row: Any, _form: forms.Form) -> str:
    context = {"proposals": recorder_checks.open_proposals_of_visit(row)}
    return render_to_string("admin/network/visit/_proposals.html", context, request)


@admin.register(Visit)
class VisitAdmin(AtStation, LivePages, ServedAdmin):
    """Visits."""

    form = VisitForm
    change_form_template = "admin/network/visit/change_form.html"
    answer_template = "admin/network/visit/_answer.html"
    list_display = ("station", "arrived_at", "control_condition", "state", "recorded_by")
    list_filter = ("state", "control_condition", "station")
    list_select_related = ("station", "recorded_by")
    date_hierarchy = "arrived_at"
    inlines = (Readings, RecorderChecks, WorkLeftRows, SpinTests)
    fieldsets = (
        (None, {"fields": ("station", "arrived_at", "departed_at", "party")}),
        (
            _("At the river"),
            {
                "fields": (
                    *("control_condition", "weather", "river"),
                    *("is_routine", "is_for_gauging", "is_for_levels"),
                    *("is_for_repair", "is_for_flood"),
                )
            },
        ),
        (_("Work"), {"fields": ("work_finished", "work_done", "instruments", "remarks")}),
        (_("Photographs"), {"fields": ("photographs", "caption")}),
    )
    verbs = (
        Verb(
            name="check",
            label=_("check"),
            permission=MAY_CHANGE,
            form=NoReasonForm,
            applies=lambda row: row.state == Visit.State.DRAFT,
            run=lambda row, **who: visits.check_visit(visit=row, **who),
        ),
        Verb(
            name="reopen",
            label=_("reopen"),
            permission=MAY_CHANGE,
            applies=lambda row: row.state == Visit.State.CHECKED,
            run=lambda row, **who: visits.reopen_visit(visit=row, **who),
        ),
        Verb(
            name="propose",
            label=_("propose corrections"),
            permission="network.add_correction",
            form=NoReasonForm,
            applies=lambda row: bool(recorder_checks.open_proposals_of_visit(row)),
            run=lambda row, **who: propose_from_visit(visit=row, **who),
            preview=_proposals,
        ),
    )

    def has_change_permission(self, request: HttpRequest, obj: Any = None) -> bool:
        """Edit drafts only: a checked visit is reopened with a reason."""
        may = super().has_change_permission(request, obj)
        return may and (obj is None or obj.state == Visit.State.DRAFT)

    def get_form(self, request: HttpRequest, obj: Any = None, **options: Any) -> Any:
        """Tell the form its station."""
        form = super().get_form(request, obj, **options)
        station = self.station_of_page(request, obj)
        return type(form.__name__, (form,), {"station_of_page": station})

    def get_fieldsets(self, request: HttpRequest, obj: Any = None) -> Any:
        """Leave out what only a form that can be saved asks."""
        left = earlier_work(self.station_of_page(request, obj), obj)
        gone = set() if left else {"work_finished"}
        if not self._may_write(request, obj):
            gone = {"photographs", "caption", "work_finished"}
        found = []
        for heading, options in self.fieldsets:
            names = tuple(name for name in options["fields"] if name not in gone)
            if names:
                found.append((heading, {**options, "fields": names}))
        return found

    def get_changeform_initial_data(self, request: HttpRequest) -> dict[str, Any]:
        """Start a visit with what is usual at its station."""
        asked = super().get_changeform_initial_data(request)
        station = self.station_of_page(request)
        if station is None:
            return asked
        sheet = answers.start_sheet(station, by=request.user, at=self._opened_at(request))
        return {
            "arrived_at": sheet.arrived_at,
            "party": [person.pk for person in sheet.party],
            "instruments": [row.pk for row in sheet.instruments],
            **asked,
        }

    def get_inline_instances(self, request: HttpRequest, obj: Any = None) -> Any:
        """Let the children know the visit and when the form was opened."""
        self._opened_at(request)
        self.station_of_page(request, obj)
        request.visit = obj
        return super().get_inline_instances(request, obj)

    def serve(self, request: HttpRequest, filled: Filled) -> models.Model:
        """Save the visit and its photographs."""
        who: dict[str, Any] = {"by": request.user, "at": timezone.now()}
        sheet = sheet_of(filled.values, filled.children)
        assert sheet is not None  # both are required fields
        visit = visits.save_visit(
            form_id=filled.row.form_id if filled.row is not None else filled.form_id,
            sheet=sheet,
            version=filled.version if filled.row is not None else None,
            work_done=tuple(filled.values.get("work_finished") or ()),
            **who,
        )
        names = [*request.POST.getlist("kept"), *(filled.values.get("photographs") or ())]
        for name in dict.fromkeys(names):
            caption = filled.values.get("caption", "")
            photographs.add_photograph(visit=visit, name=name, caption=caption, **who)
        return visit

    def answer(self, request: HttpRequest, typed: Typed) -> dict[str, Any]:
        """Give stages and findings of what is typed so far, each at its field."""
        sheet = sheet_of(typed.values, typed.children)
        if sheet is None:
            return {}
        places = {
            name: [
                place
                for place, row in zip(typed.places.get(name, ()), typed.children[name], strict=True)
                if is_row(name, row)
            ]
            for name in typed.children
        }
        return shown_answer(sheet, at=timezone.now(), places=places)

    def answer_to_stored(self, request: HttpRequest, row: Any) -> dict[str, Any]:
        """Give stages and findings of a stored visit."""
        return shown_answer(stored_sheet(row), at=timezone.now())

    def render_change_form(
        self, request: HttpRequest, context: dict[str, Any], **options: Any
    ) -> HttpResponse:
        """Add the photographs, and the corrections the visit's recorder checks propose."""
        row = options.get("obj")
        if row is not None and row.pk:
            context["photographs"] = row.photographs.all()
            context["proposals"] = recorder_checks.open_proposals_of_visit(row)
            context["corrections"] = recorder_checks.corrections_of_visit(row)
        return super().render_change_form(request, context, **options)

    def _may_write(self, request: HttpRequest, obj: Any) -> bool:
        if obj is None or not obj.pk:
            return self.has_add_permission(request)
        return self.has_change_permission(request, obj)

    @staticmethod
    def _opened_at(request: HttpRequest) -> Any:
        if not hasattr(request, "opened_at"):
            request.opened_at = timezone.now().replace(second=0, microsecond=0)
        return request.opened_at
