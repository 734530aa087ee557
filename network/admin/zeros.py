"""Chains of zeros and elevations: begun, looked at and withdrawn, never edited."""

from typing import Any

from django.contrib import admin
from django.db import models

from network.admin.acting import Filled, ReadOnlyAdmin
from network.admin.statements import Stated, own_station, withdrawal
from network.admin.trying import Tried
from network.models import (
    BenchmarkElevation,
    OtherGaugeZero,
    PlateZero,
    Station,
    StationZero,
)
from network.services import benchmarks, gauges, station_zeros


class OfOwner(Tried, Stated):
    """Rows that name a plate, gauge or benchmark, each offered with its station."""

    owner = ""

    def station_of(self, filled: Filled) -> Station:
        """Return the station of the owner."""
        station: Station = filled.values[self.owner].station
        return station

    def formfield_for_foreignkey(self, db_field: Any, request: Any, **options: Any) -> Any:
        """Name each owner with its station; offer those of the station the address names."""
        field = super().formfield_for_foreignkey(db_field, request, **options)
        field.queryset = field.queryset.select_related("station").order_by("station__code")
        asked = request.GET.get("station", "")
        if asked.isdecimal():
            field.queryset = field.queryset.filter(station=asked)
        field.label_from_instance = _with_station
        return field


def _with_station(owner: models.Model) -> str:
    return f"{owner.station}: {owner}"


@admin.register(PlateZero)
class PlateZeroAdmin(OfOwner):
    """Plate zeros."""

    owner = "plate"
    add = gauges.set_plate_zero
    fields = ("plate", "zero_m", "effective_from", "reason")
    list_display = ("plate", "zero_m", "effective_from", "level_check", "withdrawn_at")
    list_filter = ("plate__station",)
    list_select_related = ("plate__station", "level_check__station")
    verbs = (
        withdrawal(
            PlateZero,
            gauges.withdraw_plate_zero,
            row_as="zero",
            station_of=lambda row: row.plate.station,
        ),
    )


@admin.register(OtherGaugeZero)
class OtherGaugeZeroAdmin(OfOwner):
    """Zeros of other gauges."""

    owner = "gauge"
    add = gauges.set_gauge_zero
    fields = ("gauge", "zero_m", "effective_from", "reason")
    list_display = ("gauge", "zero_m", "effective_from", "withdrawn_at")
    list_filter = ("gauge__station",)
    list_select_related = ("gauge__station",)
    verbs = (
        withdrawal(
            OtherGaugeZero,
            gauges.withdraw_gauge_zero,
            row_as="zero",
            station_of=lambda row: row.gauge.station,
        ),
    )


@admin.register(BenchmarkElevation)
class BenchmarkElevationAdmin(OfOwner):
    """Elevations of benchmarks; no figure rests on them."""

    owner = "benchmark"
    add = benchmarks.set_elevation
    fields = ("benchmark", "elevation_m", "effective_from", "reason")
    list_display = ("benchmark", "elevation_m", "effective_from", "withdrawn_at")
    list_filter = ("benchmark__station",)
    list_select_related = ("benchmark__station",)
    verbs = (withdrawal(BenchmarkElevation, benchmarks.withdraw_elevation, row_as="elevation"),)


@admin.register(StationZero)
class StationZeroAdmin(ReadOnlyAdmin):
    """Station zeros; they are set from the station's file."""

    fields = ("station", "kind", "elevation_m", "datum_name", "effective_from", "reason")
    list_display = ("station", "elevation_m", "datum_name", "kind", "effective_from",
                    "withdrawn_at")  # fmt: skip
    list_filter = ("station", "kind")
    list_select_related = ("station",)
    verbs = (
        withdrawal(
            StationZero,
            station_zeros.withdraw_station_zero,
            row_as="zero",
            station_of=own_station,
        ),
    )
