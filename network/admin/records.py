"""The stage record: series with their settings, and the imports their readings came from."""

from typing import Any

from django import forms
from django.contrib import admin
from django.db import models
from django.http import HttpRequest
from django.urls import reverse
from django.utils import timezone
from django.utils.translation import gettext_lazy as _

from network.admin.acting import Filled, ReadOnlyAdmin, ServedAdmin
from network.admin.children import ChildRows
from network.admin.fields import DecimalTextField, RecordClockField
from network.admin.importing import ImportPages
from network.admin.verbs import ReasonForm, Verb
from network.models import ImportFault, LoggerImport, SensorSetting, Series
from network.services import imports
from network.services import series as series_acts


def stands(row: Any) -> bool:
    """Tell whether a row is not withdrawn."""
    return bool(row.stands)


class LookedAtRows(ChildRows):
    """Children that only acts change."""

    def has_add_permission(self, request: HttpRequest, obj: Any = None) -> bool:
        """Add none here."""
        return False

    def has_change_permission(self, request: HttpRequest, obj: Any = None) -> bool:
        """Change none here."""
        return False


class SettingRows(LookedAtRows):
    """The chain of a series' sensor settings."""

    model = SensorSetting
    fields = ("effective_from", "scale", "offset_m", "reason", "withdrawn_reason")
    readonly_fields = ("withdrawn_reason",)
    show_change_link = True


class SettingForm(forms.Form):
    """Ask for a setting and from when it holds."""

    effective_from = RecordClockField(label=_("in force from"))
    scale = DecimalTextField(
        label=_("scale"), required=False, help_text=_("Left empty, no setting is in force.")
    )
    offset_m = DecimalTextField(label=_("offset, m"))
    reason = ReasonForm.base_fields["reason"]


@admin.register(Series)
class SeriesAdmin(ServedAdmin):
    """Series of readings."""

    list_display = ("station", "label", "kind", "is_primary", "gap_limit_minutes")
    list_display_links = ("station", "label")
    list_filter = ("station", "kind")
    list_select_related = ("station",)
    inlines = (SettingRows,)
    verbs = (
        Verb(
            name="set-sensor",
            label=_("set the sensor"),
            permission="network.add_sensorsetting",
            form=SettingForm,
            run=lambda row, **filled: series_acts.set_sensor(series=row, **filled),
            station_of=lambda row: row.station,
        ),
    )

    def get_readonly_fields(self, request: HttpRequest, obj: Any = None) -> tuple[str, ...]:
        """Keep a series at its station."""
        return ("station",) if obj else ()

    def get_inlines(self, request: HttpRequest, obj: Any) -> Any:
        """Show settings once there is a series to have them."""
        return self.inlines if obj else ()

    def verb_links(self, request: HttpRequest, row: models.Model) -> list[dict[str, Any]]:
        """Add the way to the import of a file."""
        links = super().verb_links(request, row)
        if request.user.has_perm("network.add_loggerimport"):
            url = reverse("admin:network_loggerimport_add") + f"?series={row.pk}"
            links.insert(0, {"label": _("import a logger file"), "url": url})
        return links

    def serve(self, request: HttpRequest, filled: Filled) -> Series:
        """Open a series, or change its particulars."""
        who = {"by": request.user, "at": timezone.now()}
        if filled.row is None:
            return series_acts.open_series(**filled.values, **who)
        return series_acts.change_series(series=filled.row, **filled.values, **who)


@admin.register(SensorSetting)
class SensorSettingAdmin(ReadOnlyAdmin):
    """Sensor settings; a new one is set at its series."""

    list_display = ("series", "effective_from", "scale", "offset_m", "withdrawn_at")
    list_filter = ("series__station",)
    list_select_related = ("series__station",)
    verbs = (
        Verb(
            name="withdraw",
            label=_("withdraw"),
            permission="network.change_sensorsetting",
            applies=stands,
            run=lambda row, **filled: series_acts.withdraw_setting(setting=row, **filled),
            station_of=lambda row: row.series.station,
        ),
    )


@admin.register(LoggerImport)
class LoggerImportAdmin(ImportPages, ReadOnlyAdmin):
    """Imports: what came in, what was skipped; a new one is uploaded and looked at first."""

    list_display = (
        "original_name",
        "series",
        "recorded_at",
        "first_at",
        "last_at",
        "rows_kept",
        "rows_faulty",
        "withdrawn_at",
    )
    list_filter = ("series__station",)
    list_select_related = ("series__station",)
    search_fields = ("original_name", "sha256")
    ordering = ("-pk",)
    exclude = ("file",)
    verbs = (
        Verb(
            name="withdraw",
            label=_("withdraw"),
            permission="network.change_loggerimport",
            applies=stands,
            caution=_(
                "The months it touched are made anew from the files that stand; this may take "
                "a while."
            ),
            run=lambda row, **filled: imports.withdraw_import(logger_import=row, **filled),
            station_of=lambda row: row.series.station,
            touches_readings=True,
        ),
    )

    def verb_links(self, request: HttpRequest, row: models.Model) -> list[dict[str, Any]]:
        """Add the way to the rows that were skipped: there may be very many."""
        url = reverse("admin:network_importfault_changelist")
        faults = {"label": _("skipped rows"), "url": f"{url}?logger_import__id__exact={row.pk}"}
        return [faults, *super().verb_links(request, row)]


@admin.register(ImportFault)
class ImportFaultAdmin(ReadOnlyAdmin):
    """The rows of files that were skipped or sorted in."""

    list_display = ("logger_import", "line", "text", "reason")
    list_select_related = ("logger_import",)
    search_fields = ("text", "reason")

    def lookup_allowed(self, lookup: str, value: Any, request: HttpRequest | None = None) -> bool:
        """Let the page of an import lead to its own rows."""
        return lookup == "logger_import__id__exact" or super().lookup_allowed(
            lookup, value, request
        )
