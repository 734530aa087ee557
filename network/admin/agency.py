"""The agency, its working rules and its offices."""

from typing import Any

from django import forms
from django.conf import settings
from django.contrib import admin
from django.core.validators import FileExtensionValidator
from django.http import HttpRequest, HttpResponse, HttpResponseRedirect
from django.urls import reverse
from django.utils import timezone
from django.utils.translation import gettext_lazy as _

from network.admin.acting import Filled, RegistryAdmin, ServedAdmin
from network.admin.forms import StaffForm
from network.admin.intervals import IntervalPages, interval_verb
from network.models import Agency, KindInterval, Office, WorkingRules
from network.services import agency as agency_acts


class AgencyForm(StaffForm):
    """The agency, with languages to choose from."""

    language = forms.ChoiceField(label=_("language of print"), choices=settings.LANGUAGES)
    logo = forms.FileField(
        label=_("logo (SVG or PNG)"),
        required=False,
        validators=[FileExtensionValidator(["svg", "png"])],
        widget=forms.ClearableFileInput,
    )


class OnlyRow(ServedAdmin):
    """A table of one row: its list is the row itself."""

    def has_add_permission(self, request: HttpRequest) -> bool:
        """Add none: set-up makes the row."""
        return False

    def changelist_view(self, request: HttpRequest, extra_context: Any = None) -> HttpResponse:
        """Open the one row where it is there."""
        if not self.model.objects.filter(pk=1).exists():
            return super().changelist_view(request, extra_context)
        return HttpResponseRedirect(
            reverse(f"admin:{self.opts.app_label}_{self.opts.model_name}_change", args=[1])
        )


@admin.register(Agency)
class AgencyAdmin(OnlyRow):
    """The agency: who it is, its clock, how it prints."""

    form = AgencyForm
    fieldsets = (
        (None, {"fields": ("name", "address", "licence_line", "logo")}),
        (
            _("Clock"),
            {"fields": ("record_utc_offset_minutes", "civil_zone", "day_starts_at_hour")},
        ),
        (
            _("Water year and figures"),
            {
                "fields": (
                    "water_year_start_month",
                    "water_year_named_by_end",
                    "day_coverage_percent",
                    "months_need_every_day",
                    "result_method",
                )
            },
        ),
        (
            _("Print"),
            {"fields": ("significant_figures", "max_decimals", "decimal_sign", "language")},
        ),
        (_("Approval"), {"fields": ("approver_differs",)}),
    )

    def serve(self, request: HttpRequest, filled: Filled) -> Agency:
        """Change the agency."""
        values = {**filled.values, "logo": filled.values["logo"] or ""}
        return agency_acts.change_agency(
            values=values, version=filled.version, by=request.user, at=timezone.now()
        )


@admin.register(WorkingRules)
class WorkingRulesAdmin(IntervalPages, OnlyRow):
    """Limits and intervals."""

    verbs = (interval_verb(WorkingRules),)
    fieldsets = (
        (
            _("Levels and gauges"),
            {
                "fields": (
                    "level_closure_mm",
                    "level_closure_cap_mm",
                    "level_tolerance_mm",
                    "peg_test_limit_mm",
                    "plates_agree_mm",
                    "plate_overlap_m",
                    "correction_tolerance_mm",
                    "stage_uncertainty_mm",
                )
            },
        ),
        (
            _("Gaugings and calibrations"),
            {
                "fields": (
                    "calibration_months",
                    "calibration_hours",
                    "calibration_change_percent",
                    "one_point_depth_m",
                    "two_point_depth_m",
                    "surface_factor",
                    "systematic_percent",
                    "wading_product_m2s",
                )
            },
        ),
        (
            _("Intervals and work due"),
            {
                "fields": (
                    "visit_days",
                    "level_check_months",
                    "gaugings_per_year",
                    "weigh_bands_by_time",
                    "inspection_months",
                    "silence_days",
                    "review_days",
                    "check_days",
                    "doubt_count",
                )
            },
        ),
    )

    def serve(self, request: HttpRequest, filled: Filled) -> WorkingRules:
        """Change the working rules."""
        return agency_acts.change_rules(values=filled.values, by=request.user, at=timezone.now())


@admin.register(KindInterval)
class KindIntervalAdmin(IntervalPages, RegistryAdmin):
    """How often instruments of a kind are calibrated."""

    verbs = (interval_verb(KindInterval),)

    list_display = ("kind", "months", "hours")


@admin.register(Office)
class OfficeAdmin(RegistryAdmin):
    """Offices."""

    list_display = ("name", "address")
    search_fields = ("name",)
