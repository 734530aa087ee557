"""Plates, other gauges and benchmarks as things; their zeros come from acts."""

from django.contrib import admin

from network.admin.acting import RegistryAdmin
from network.models import Benchmark, OtherGauge, StaffPlate


@admin.register(StaffPlate)
class StaffPlateAdmin(RegistryAdmin):
    """Staff plates: one section of a sectional gauge each."""

    list_display = ("label", "station", "lowest_m", "highest_m", "installed_at", "removed_at")
    list_filter = ("station",)
    list_select_related = ("station",)


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
