"""Instruments, and current meters as pairs of body and rotor."""

from typing import Any

from django.contrib import admin
from django.http import HttpRequest

from network.admin.acting import RegistryAdmin
from network.models import Instrument, MeterGroup, MeterPair


@admin.register(Instrument)
class InstrumentAdmin(RegistryAdmin):
    """Instruments with a serial number."""

    list_display = ("serial", "kind", "maker", "model", "status", "office")
    list_filter = ("kind", "status", "office")
    list_select_related = ("office",)
    search_fields = ("serial", "maker", "model")


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
