"""The station file: what a station is, when it ran, how its site was judged, its papers."""

from typing import Any

from django.contrib import admin
from django.contrib.admin.utils import quote
from django.db import models
from django.http import HttpRequest, HttpResponse
from django.urls import reverse
from django.utils.html import format_html
from django.utils.text import capfirst
from django.utils.translation import gettext_lazy as _

from network.admin.acting import RegistryAdmin
from network.admin.children import ChildRows
from network.admin.intervals import IntervalPages, interval_verb
from network.admin.station_file import ZERO_VERB, StationFilePage
from network.admin.work import panel_context
from network.models import Document, OperationPeriod, SiteCriterion, SiteSurvey, Station


class OperationPeriodRows(ChildRows):
    """When the station ran."""

    model = OperationPeriod


@admin.register(Station)
class StationAdmin(StationFilePage, IntervalPages, RegistryAdmin):
    """Stations."""

    list_display = ("code", "name", "river", "kind", "office", "file")
    list_display_links = ("code", "name")
    list_filter = ("office", "kind")
    list_select_related = ("office",)
    search_fields = ("code", "name", "river", "basin")
    inlines = (OperationPeriodRows,)
    figure_fields = frozenset({"kind", "unrated_because", "catchment_km2"})
    change_form_template = "admin/network/station/change_form.html"
    verbs = (ZERO_VERB, interval_verb(Station))
    fieldsets = (
        (None, {"fields": ("code", "name", "river", "basin", "office")}),
        (_("Before you go"), {"fields": ("hazards", "safety_notes", "access_notes")}),
        (
            _("Place and kind"),
            {
                "fields": (
                    "latitude_deg",
                    "longitude_deg",
                    "catchment_km2",
                    "kind",
                    "unrated_because",
                    "control",
                )
            },
        ),
        (_("In print"), {"fields": ("description", "highlights")}),
        (
            _("How often"),
            {
                "fields": (
                    "visit_interval_days",
                    "level_check_interval_months",
                    "gaugings_wanted_per_year",
                ),
                "description": _("Left empty, the agency's working rules hold."),
            },
        ),
    )

    @admin.display(description=_("file"))
    def file(self, station: Station) -> str:
        """Lead to the station's file."""
        address = reverse("admin:network_station_file", args=[station.pk])
        return format_html('<a href="{}">{}</a>', address, _("open"))

    def render_change_form(
        self, request: HttpRequest, context: dict[str, Any], **options: Any
    ) -> HttpResponse:
        """Add the ways from the station to everything that belongs to it."""
        station = options.get("obj")
        context["belongings"] = self.belongings(request, station) if station else []
        if station:
            context.update(panel_context(request, station=station.pk))
        return super().render_change_form(request, context, **options)

    def belongings(self, request: HttpRequest, station: Station) -> list[dict[str, str]]:
        """Return, for every registered model that names a station, its list and its add page."""
        found = []
        for model, model_admin in self.admin_site._registry.items():
            if not _names_a_station(model) or not model_admin.has_view_permission(request):
                continue
            prefix = f"admin:{model._meta.app_label}_{model._meta.model_name}"
            may_add = model_admin.has_add_permission(request)
            add = reverse(f"{prefix}_add") + f"?station={station.pk}" if may_add else ""
            found.append(
                {
                    "label": capfirst(str(model._meta.verbose_name_plural)),
                    "url": reverse(f"{prefix}_changelist")
                    + f"?station__id__exact={quote(station.pk)}",
                    "add": add,
                }
            )
        return sorted(found, key=lambda link: link["label"])


def _names_a_station(model: type[models.Model]) -> bool:
    return any(
        field.name == "station" and field.related_model is Station for field in model._meta.fields
    )


class CriterionRows(ChildRows):
    """The criteria of a survey, one line each."""

    model = SiteCriterion
    max_num = len(SiteCriterion.Criterion)

    def get_extra(self, request: HttpRequest, obj: Any = None, **options: Any) -> int:
        """Offer a line for each criterion of a new survey."""
        return 0 if obj is not None and obj.pk else self.max_num

    def get_formset(self, request: HttpRequest, obj: Any = None, **options: Any) -> Any:
        """Fill the criteria in: only the verdicts are left to choose."""
        formset = super().get_formset(request, obj, **options)
        criteria = [{"criterion": value} for value in SiteCriterion.Criterion.values]

        class Filled(formset):  # type: ignore[misc, valid-type]
            def __init__(self, *args: Any, **more: Any) -> None:
                new = obj is None or obj.pk is None
                super().__init__(*args, **{"initial": criteria if new else None, **more})

        return Filled


@admin.register(SiteSurvey)
class SiteSurveyAdmin(RegistryAdmin):
    """Site surveys."""

    list_display = ("station", "surveyed_on", "recorded_by")
    list_filter = ("station",)
    list_select_related = ("station", "recorded_by")
    inlines = (CriterionRows,)


@admin.register(Document)
class DocumentAdmin(RegistryAdmin):
    """Documents and photographs of stations."""

    list_display = ("title", "station", "dated", "caption")
    list_filter = ("station",)
    list_select_related = ("station",)
    search_fields = ("title", "caption", "station__code", "station__name")
