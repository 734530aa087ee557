"""The gauging sheet: typed at the river, answered while typing, signed, checked, reopened."""

from typing import Any

from django import forms
from django.contrib import admin
from django.core.exceptions import PermissionDenied
from django.db import models
from django.http import HttpRequest, HttpResponse, JsonResponse
from django.template.loader import render_to_string
from django.urls import URLPattern, path
from django.utils import timezone
from django.utils.translation import gettext_lazy as _

from network.admin import gauging_form, gauging_lines
from network.admin.acting import Filled, ServedAdmin
from network.admin.figure_columns import column
from network.admin.gauging_children import OF_METHOD, StageReadings
from network.admin.gauging_form import GaugingForm
from network.admin.gauging_pages import shown_answer, stored_answer
from network.admin.gauging_workbook_pages import WorkbookPages
from network.admin.verbs import NoReasonForm, Verb
from network.models import Channel, Gauging
from network.queries import gaugings as answers
from network.queries.printed import fixed_writer, flow_writer
from network.services import gaugings

MAY_CHANGE = "network.change_gauging"


HEADING = ("station", "visit", "started_at", "ended_at", "way", "party")
METER = ("pair", "sounding", "spin_test_seconds", "starting_bank")
OF_THE_FORM = ("starting_bank", "floats", "samples")
STATED = ("stated_discharge_m3s", "stated_u95_percent")


def signed_or_checked(row: Any) -> bool:
    """Tell whether a gauging is no draft."""
    return row.state != Gauging.State.DRAFT


def _preview(request: HttpRequest, row: Any, _form: forms.Form) -> str:
    found = answers.of_stored(row, agency=request.agency)
    context = shown_answer(found)
    return render_to_string("admin/network/gauging/_answer.html", context, request)


@admin.register(Gauging)
class GaugingAdmin(WorkbookPages, ServedAdmin):
    """Gaugings by every method."""

    form = GaugingForm
    change_form_template = "admin/network/gauging/change_form.html"
    change_list_template = "admin/network/gauging/change_list.html"
    list_filter = ("state", "method", "way", "station")
    list_select_related = ("station",)
    date_hierarchy = "started_at"
    verbs = (
        Verb(
            name="sign",
            label=_("sign"),
            permission=MAY_CHANGE,
            form=NoReasonForm,
            applies=lambda row: row.state == Gauging.State.DRAFT,
            run=lambda row, **who: gaugings.sign(gauging=row, version=row.version, **who),
            preview=_preview,
        ),
        Verb(
            name="check",
            label=_("check"),
            permission=MAY_CHANGE,
            form=NoReasonForm,
            applies=lambda row: row.state == Gauging.State.SIGNED,
            run=lambda row, **who: gaugings.check(gauging=row, version=row.version, **who),
            preview=_preview,
        ),
        Verb(
            name="reopen",
            label=_("reopen"),
            permission=MAY_CHANGE,
            applies=signed_or_checked,
            run=lambda row, **who: gaugings.reopen(gauging=row, version=row.version, **who),
            caution=_("The gauging goes back to a draft; what was signed stays in its history."),
        ),
    )

    def has_change_permission(self, request: HttpRequest, obj: Any = None) -> bool:
        """Edit drafts only: a signed gauging is reopened with a reason."""
        may = super().has_change_permission(request, obj)
        return may and (obj is None or obj.state == Gauging.State.DRAFT)

    def get_list_display(self, request: HttpRequest) -> list[Any]:
        """Write the figures as the agency does."""
        own = request.agency
        return [
            *("station", "started_at", "method", "way"),
            column("signed_stage_m", _("stage, m"), fixed_writer(own, 3)),
            column("discharge_m3s", _("discharge, m³/s"), flow_writer(own)),
            column("u95_percent", _("U₉₅, %"), fixed_writer(own, 1)),
            column(
                "signed_deviation_percent", _("from the rating, %"), fixed_writer(own, 1, plus=True)
            ),
            "state",
        ]

    def get_fieldsets(self, request: HttpRequest, obj: Any = None) -> Any:
        """Show what the method of working notes."""
        method = self.method_of(request, obj)
        by_meter = method == Gauging.Method.VELOCITY_AREA
        more = {Gauging.Method.FLOAT: ("floats",), Gauging.Method.DILUTION: ("samples",)}
        middle = METER if by_meter else ("instrument", *more.get(Gauging.Method(method), ()))
        if obj is not None and signed_or_checked(obj):  # what the form alone knows is no column
            middle = tuple(name for name in middle if name not in OF_THE_FORM)
        return [
            (None, {"fields": ("method", *HEADING)}),
            (_("What it was measured with"), {"fields": middle}),
            (
                _("A result stated elsewhere, and remarks"),
                {"fields": (*STATED, "remarks")},
            ),
        ]

    def get_inlines(self, request: HttpRequest, obj: Any = None) -> list[Any]:
        """Show stage readings, and the rows of the method."""
        return [StageReadings, *OF_METHOD.get(self.method_of(request, obj), ())]

    def get_changeform_initial_data(self, request: HttpRequest) -> dict[str, Any]:
        """Start a sheet now, by the method chosen."""
        now = timezone.now().replace(second=0, microsecond=0)
        own = {"party": [request.user.pk], "method": self.method_of(request)}
        asked = super().get_changeform_initial_data(request)
        return {**own, "started_at": now, "ended_at": now, **asked}

    def formfield_for_dbfield(self, db_field: Any, request: Any, **options: Any) -> Any:
        """Keep the method as it was chosen: the page is laid out for it."""
        field = super().formfield_for_dbfield(db_field, request, **options)
        if db_field.name == "method":
            field.widget = forms.HiddenInput()
        return field

    def method_of(self, request: HttpRequest, obj: Any = None) -> str:
        """Return the method of the row, of the form, or the one the address asks for."""
        asked = request.POST.get("method") or request.GET.get("method")
        method = obj.method if obj is not None and obj.pk else asked
        return method if method in Gauging.Method.values else Gauging.Method.VELOCITY_AREA

    def changeform_view(
        self,
        request: HttpRequest,
        object_id: str | None = None,
        form_url: str = "",
        extra_context: Any = None,
    ) -> HttpResponse:
        """Take all rows of the children as typed: a save replaces those that are stored.

        So a form whose rows someone else replaced meanwhile is told so, and not refused for them.
        """
        if request.method == "POST":
            request.POST = gauging_form.without_row_keys(request.POST)
        return super().changeform_view(request, object_id, form_url, extra_context)

    def serve(self, request: HttpRequest, filled: Filled) -> models.Model:
        """Save the sheet; sign it where the button said so."""
        values = dict(filled.values)
        party = values.pop("party", ())
        lines = gauging_lines.of_post(request.POST)
        table = gauging_form.read_lines(lines, values)
        who = {"by": request.user, "at": timezone.now()}
        row = gaugings.save(
            sheet=gauging_form.sheet_of(values, table, filled.children),
            form_id=filled.form_id,
            version=filled.version if filled.row is not None else None,
            party=party,
            **who,
        )
        if "_sign" in request.POST:
            row = gaugings.sign(gauging=row, version=row.version, **who)
        return row

    def render_change_form(
        self, request: HttpRequest, context: dict[str, Any], **options: Any
    ) -> HttpResponse:
        """Add the table and what it gives so far."""
        row, form = options.get("obj"), context["adminform"].form
        context["table"] = getattr(form, "table", None)
        context["by_meter"] = self.method_of(request, row) == Gauging.Method.VELOCITY_AREA
        context["methods"] = Gauging.Method.choices
        context["edges"], context["point_sets"] = Channel.Edge.choices, gauging_lines.POINT_SETS
        new = row is None or row.pk is None
        context["editable"] = (
            self.has_add_permission(request) if new else self.has_change_permission(request, row)
        )
        if not context["editable"] and row is not None:
            context |= stored_answer(row, agency=request.agency)
        elif form.is_bound or row is not None:
            context |= self._answered(request, row, form)
        return super().render_change_form(request, context, **options)

    def get_urls(self) -> list[URLPattern]:
        """Add the address that answers while the sheet is typed."""
        view = self.admin_site.admin_view(self.live_view)
        return [path("live/", view, name="network_gauging_live"), *super().get_urls()]

    def live_view(self, request: HttpRequest) -> HttpResponse:
        """Answer an unfinished sheet: figures, findings, and a result for each line."""
        allowed = request.user.has_perms([MAY_CHANGE]) or request.user.has_perm(
            "network.add_gauging"
        )
        if not allowed or request.method != "POST":
            raise PermissionDenied
        lines = gauging_lines.of_post(request.POST)
        context = self._typed_answer(request, lines)
        answer = render_to_string("admin/network/gauging/_answer.html", context, request)
        results = render_to_string("admin/network/gauging/_line_results.html", context, request)
        return JsonResponse({"answer": answer, "lines": results})

    def _answered(self, request: HttpRequest, row: Any, form: Any) -> dict[str, Any]:
        """Return what the page shows of the sheet as typed, or as stored."""
        if form.is_bound:
            return self._typed_answer(request, form.table, row)
        found = answers.of_stored(row, agency=request.agency)
        return shown_answer(found, gauging_form.read_lines(form.table, vars(row)), form.table)

    def _typed_answer(
        self, request: HttpRequest, lines: gauging_lines.FormTable, row: Any = None
    ) -> dict[str, Any]:
        heading = gauging_form.typed_heading(request.POST)
        if heading is None:
            return {"answer_wants_heading": True}
        table = gauging_form.read_lines(lines, heading)
        sheet = gauging_form.sheet_of(heading, table, gauging_form.typed_children(request.POST))
        leave_out = str(request.POST.get("gauging") or "")
        found = answers.answer(
            sheet,
            agency=request.agency,
            leave_out=int(leave_out) if leave_out.isdecimal() else getattr(row, "pk", None),
        )
        return shown_answer(found, table, lines)
