"""Plates, other gauges and benchmarks as things; their zeros come from acts."""

from django.contrib import admin
from django.utils.translation import gettext_lazy as _

from network.admin.acting import RegistryAdmin
from network.admin.fields import RecordClockField
from network.admin.statements import own_station
from network.admin.verbs import ReasonForm, Verb
from network.models import Benchmark, OtherGauge, StaffPlate
from network.services import gauges


class RemovalForm(ReasonForm):
    """When a plate was taken down, and why."""

    removed_at = RecordClockField(label=_("taken down"))
    field_order = ("removed_at", "reason")


@admin.register(StaffPlate)
class StaffPlateAdmin(RegistryAdmin):
    """Staff plates: one section of a sectional gauge each."""

    list_display = ("label", "station", "lowest_m", "highest_m", "installed_at", "removed_at")
    list_filter = ("station",)
    list_select_related = ("station",)
    # Taking a plate down is an act: it is refused while later readings rest on the plate.
    readonly_fields = ("removed_at",)
    verbs = (
        Verb(
            name="remove",
            label=_("take down"),
            permission="network.change_staffplate",
            form=RemovalForm,
            applies=lambda plate: plate.removed_at is None,
            run=lambda plate, **filled: gauges.remove_plate(plate=plate, **filled),
            station_of=own_station,
        ),
    )


@admin.register(OtherGauge)
class OtherGaugeAdmin(RegistryAdmin):
    """Wire weights, dippers, crest gauges and flood marks."""

    list_display = ("label", "station", "kind", "installed_at", "removed_at")
    list_filter = ("station", "kind")
    list_select_related = ("station",)


@admin.register(Benchmark)
class BenchmarkAdmin(RegistryAdmin):
    """Benchmarks."""

    list_display = ("label", "station", "description", "is_main")
    list_filter = ("station",)
    list_select_related = ("station",)
