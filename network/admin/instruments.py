"""Instruments, and current meters as pairs of body and rotor."""

from typing import Any

from django.contrib import admin
from django.http import HttpRequest, HttpResponse

from network.admin.acting import RegistryAdmin
from network.admin.instrument_pages import STATUS_VERB, about
from network.admin.intervals import IntervalPages, interval_verb
from network.admin.work import panel_context
from network.models import Instrument, MeterGroup, MeterPair


@admin.register(Instrument)
class InstrumentAdmin(IntervalPages, RegistryAdmin):
    """Instruments with a serial number."""

    verbs = (interval_verb(Instrument), STATUS_VERB)
    change_form_template = "admin/network/instrument/change_form.html"
    list_display = ("serial", "kind", "maker", "model", "status", "office")
    list_filter = ("kind", "status", "office")
    list_select_related = ("office",)
    search_fields = ("serial", "maker", "model")

    def render_change_form(
        self, request: HttpRequest, context: dict[str, Any], **options: Any
    ) -> HttpResponse:
        """Add the calibrations due."""
        if options.get("obj") is not None:
            context.update(panel_context(request, instrument=options["obj"].pk))
            context.update(about(options["obj"]))
        return super().render_change_form(request, context, **options)


@admin.register(MeterGroup)
class MeterGroupAdmin(RegistryAdmin):
    """Groups of meters of one type."""


@admin.register(MeterPair)
class MeterPairAdmin(RegistryAdmin):
    """Body and rotor."""

    list_display = ("__str__", "group", "is_cup_meter")
    list_select_related = ("body", "rotor", "group")

    def formfield_for_foreignkey(self, db_field: Any, request: HttpRequest, **options: Any) -> Any:
        """Offer bodies as body and rotors as rotor."""
        if db_field.name in {"body", "rotor"}:
            options["queryset"] = Instrument.objects.filter(kind=db_field.name)
        return super().formfield_for_foreignkey(db_field, request, **options)
