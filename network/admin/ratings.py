"""Ratings: versions with their sheets, periods in force, shift tables, and how a rating holds."""

from typing import Any

from django import forms
from django.contrib import admin
from django.contrib.admin.utils import unquote
from django.core.exceptions import PermissionDenied
from django.db import models
from django.http import HttpRequest, HttpResponse
from django.template.response import TemplateResponse
from django.urls import URLPattern, path, reverse
from django.utils import timezone
from django.utils.translation import gettext_lazy as _

from network.admin.acting import Filled, ReadOnlyAdmin
from network.admin.children import ChildRows
from network.admin.fields import RecordClockField
from network.admin.forms import StaffForm
from network.admin.rating_sheets import RatingSheetPages, shown
from network.admin.records import stands
from network.admin.statements import Stated, own_station, withdrawal
from network.admin.trying import Tried
from network.admin.verbs import NoReasonForm, ReasonForm, Verb
from network.models import Curve, RatingPeriod, ShiftPoint, ShiftTable, Station
from network.queries import (
    clock,
    held_gaugings,
    next_gaugings,
    rating_charts,
    rating_health,
    rating_sheet,
)
from network.services import rating_tables, ratings


class InForceForm(forms.Form):
    """Ask from when a version is in force, and whether for a season only."""

    effective_from = RecordClockField(label=_("in force from"))
    until = RecordClockField(
        label=_("until"),
        required=False,
        help_text=_("For a season: from then on the version in force before it returns."),
    )
    replaces = forms.BooleanField(
        label=_("replaces the version that starts at the same instant"), required=False
    )
    reason = ReasonForm.base_fields["reason"]


def is_draft(row: Any) -> bool:
    """Tell whether a version may still be changed."""
    return stands(row) and row.state == Curve.State.DRAFT


def is_approved(row: Any) -> bool:
    """Tell whether a version may be put in force."""
    return stands(row) and row.state == Curve.State.APPROVED


@admin.register(Curve)
class CurveAdmin(RatingSheetPages, ReadOnlyAdmin):
    """Rating versions; a new one is made on the rating sheet."""

    list_display = ("station", "number", "form", "state", "lowest_use_m", "highest_use_m",
                    "recorded_by", "approved_by", "withdrawn_at")  # fmt: skip
    list_display_links = ("station", "number")
    list_filter = ("station", "state")
    list_select_related = ("station", "recorded_by", "approved_by")
    change_form_template = "admin/network/curve/change_form.html"
    fields = ("station", "number", "state", "reason", "recorded_by", "recorded_at", "approved_by",
              "approved_at", "withdrawn_reason")  # fmt: skip
    readonly_fields = fields
    verbs = (
        Verb(
            name="approve",
            label=_("approve"),
            permission="network.change_curve",
            form=NoReasonForm,
            applies=is_draft,
            run=lambda row, **who: ratings.approve(curve=row, **who),
        ),
        Verb(
            name="put-in-force",
            label=_("put in force"),
            permission="network.add_ratingperiod",
            form=InForceForm,
            applies=is_approved,
            run=lambda row, **told: ratings.put_in_force(station=row.station, curve=row, **told),
            station_of=own_station,
        ),
        withdrawal(Curve, ratings.withdraw_version, row_as="curve"),
    )

    def get_urls(self) -> list[URLPattern]:
        """Add the table of a version as a file, and the page on how a station's rating holds."""
        view = self.admin_site.admin_view
        own = [
            path("<path:object_id>/table.csv", view(self.csv_view), name="network_curve_csv"),
            path("health/<int:station>/", view(self.health_view), name="network_curve_health"),
        ]
        return own + super().get_urls()

    def verb_links(self, request: HttpRequest, row: models.Model) -> list[dict[str, Any]]:
        """Add the way to draft a draft anew, and to how the station's rating holds."""
        links = super().verb_links(request, row)
        if is_draft(row) and self.has_add_permission(request):
            url = reverse("admin:network_curve_redraft", args=[row.pk])
            links.insert(0, {"label": _("draft anew"), "url": url})
        health = reverse("admin:network_curve_health", args=[row.station_id])
        return [*links, {"label": _("how the rating holds"), "url": health}]

    def render_change_form(
        self, request: HttpRequest, context: dict[str, Any], **options: Any
    ) -> HttpResponse:
        """Show the stored version as a sheet."""
        row = options.get("obj")
        if row is not None:
            context["subtitle"] = f"{row.station} · {row.number}"
            try:
                context.update(shown(rating_sheet.stored(row), row.station, leave_out=row))
            except ValueError as error:
                context["no_curve"] = rating_sheet.sentence_of(error)
            context["periods"] = row.periods.standing()
        return super().render_change_form(request, context, **options)

    def csv_view(self, request: HttpRequest, object_id: str) -> HttpResponse:
        """Return the table of a version as CSV."""
        row = self.get_object(request, unquote(object_id))
        if row is None or not self.has_view_permission(request, row):
            raise PermissionDenied
        name = rating_tables.file_name(row, ".csv")
        return HttpResponse(
            rating_tables.csv(row),
            content_type="text/csv; charset=utf-8",
            headers={"Content-Disposition": f'attachment; filename="{name}"'},
        )

    def health_view(self, request: HttpRequest, station: int) -> HttpResponse:
        """Show the gaugings made since, residuals in time, and where to gauge next."""
        row = Station.objects.filter(pk=station).first()
        if row is None or not self.has_view_permission(request):
            raise PermissionDenied
        at = timezone.now()
        held = [one for one in held_gaugings.of_station(row) if one.deviation_percent is not None]
        context = {
            **self.admin_site.each_context(request),
            "opts": self.opts,
            "title": _("How the rating holds"),
            "subtitle": str(row),
            "station": row,
            "health": rating_health.of_station(row, at=at),
            "next_gauging": next_gaugings.of_station(row, at=at),
            "chart": rating_charts.in_time(held, decimal_sign=clock.agency().decimal_sign),
        }
        return TemplateResponse(request, "admin/network/curve/health.html", context)


class VersionChoice(forms.ModelChoiceField):
    """A rating version, named with its station."""

    def label_from_instance(self, obj: Any) -> str:
        """Write station and number."""
        return f"{obj.station} · {obj.number}"


class PeriodForm(StaffForm):
    """Ask for a version, or none, and from when it is in force."""

    curve = VersionChoice(
        label=_("rating version"),
        queryset=Curve.objects.standing()
        .filter(state=Curve.State.APPROVED)
        .select_related("station"),
        required=False,
        empty_label=_("none in force from then on"),
    )
    until = InForceForm.base_fields["until"]
    replaces = InForceForm.base_fields["replaces"]


@admin.register(RatingPeriod)
class RatingPeriodAdmin(Tried, Stated):
    """From when which version is in force."""

    add = ratings.put_in_force
    form = PeriodForm
    list_display = ("station", "effective_from", "curve", "reason", "withdrawn_at")
    list_display_links = ("station", "effective_from")
    list_filter = ("station",)
    list_select_related = ("station", "curve")
    verbs = (
        withdrawal(RatingPeriod, ratings.withdraw_period, row_as="period", station_of=own_station),
    )

    def get_fields(self, request: HttpRequest, obj: Any = None) -> Any:
        """Ask for the season only when a period is added."""
        asked = ("station", "curve", "effective_from", "until", "replaces", "reason")
        return asked if obj is None else ("station", "curve", "effective_from", "reason")

    def verb_links(self, request: HttpRequest, row: models.Model) -> list[dict[str, Any]]:
        """Add the way to a shift table."""
        links = super().verb_links(request, row)
        if request.user.has_perm("network.add_shifttable") and stands(row):
            url = reverse("admin:network_shifttable_add") + f"?period={row.pk}"
            links.insert(0, {"label": _("add a shift table"), "url": url})
        return links


class PeriodChoice(forms.ModelChoiceField):
    """A period in force, named with its station and version."""

    def label_from_instance(self, obj: Any) -> str:
        """Write station, version and start on the record clock."""
        start = timezone.localtime(obj.effective_from)
        return f"{obj.station} · {obj.curve} · {start:%Y-%m-%d %H:%M}"


class ShiftTableForm(StaffForm):
    """Ask for the period a table belongs to and from when it holds."""

    period = PeriodChoice(
        label=_("period of the rating"),
        queryset=RatingPeriod.objects.standing()
        .filter(curve__isnull=False)
        .select_related("station", "curve"),
    )


class ShiftPointRows(ChildRows):
    """The shifts by stage."""

    model = ShiftPoint
    extra = 3


class ShiftTables(Stated):
    """Shift tables, added with their points."""

    def serve(self, request: HttpRequest, filled: Filled) -> ShiftTable:
        """Add the table."""
        points = [(row["stage_m"], row["shift_m"]) for row in filled.children["points"]]
        return ratings.add_shift_table(
            **filled.values, points=points, by=request.user, at=timezone.now()
        )


@admin.register(ShiftTable)
class ShiftTableAdmin(Tried, ShiftTables):
    """Shift tables, tried before they are added."""

    form = ShiftTableForm
    list_display = ("period", "effective_from", "joins", "reason", "withdrawn_at")
    list_filter = ("period__station",)
    list_select_related = ("period__station", "period__curve")
    inlines = (ShiftPointRows,)
    verbs = (
        withdrawal(
            ShiftTable,
            ratings.withdraw_shift_table,
            row_as="table",
            station_of=lambda row: row.period.station,
        ),
    )

    def station_of(self, filled: Filled) -> Station:
        """Return the station of the table's period."""
        station: Station = filled.values["period"].station
        return station
