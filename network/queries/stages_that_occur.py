"""The stages that occur at a station: daily means of its last years."""

from collections.abc import Iterable

import numpy as np
from django.db.models import F

from network.models import Station, StationYear
from network.numerics.arrays import Floats
from network.queries import station_years

YEARS = 10


def of_station(station: Station, *, years: int = YEARS) -> Floats:
    """Return the daily mean stages of a station's last years on record: float64[n], m."""
    recent = station_years.years_on_record(station)[-years:]
    columns = [days.stage_m for days in station_years.years_of_station(station, recent)]
    stages: Floats = np.concatenate(columns) if columns else np.empty(0)
    return stages[~np.isnan(stages)]


def cached(stations: Iterable[Station], *, years: int = 3) -> dict[int, Floats]:
    """Return the same of many stations in two queries, as far as their latest years are kept.

    Nothing is computed: a station whose cache is stale, or empty, is not in the answer.
    """
    fresh = StationYear.objects.filter(
        station__in=list(stations), record_version=F("station__record_version")
    ).order_by("first_day")
    latest: dict[int, list[int]] = {}
    for key, station_key in fresh.values_list("pk", "station"):
        latest.setdefault(station_key, []).append(key)
    wanted = [key for keys in latest.values() for key in keys[-years:]]
    found: dict[int, list[Floats]] = {}
    for row in StationYear.objects.filter(pk__in=wanted).order_by("first_day"):
        days = station_years.unpack(bytes(row.data), first_day=row.first_day)
        found.setdefault(row.station_id, []).append(days.stage_m[~np.isnan(days.stage_m)])
    return {pk: np.concatenate(columns) for pk, columns in found.items()}
