"""Keep the cache of station years, and prove it: recompute and compare."""

from collections.abc import Callable
from dataclasses import dataclass

import numpy as np
from django.db import transaction

from network.models import Station, StationYear
from network.numerics.marks import Mark
from network.queries import flows, station_years


@dataclass(frozen=True)
class Comparison:
    """A cached year and whether computing it again gave the same bytes."""

    station: Station
    year: int
    same: bool


def refresh(station: Station, *, progress: Callable[[int, int], None] | None = None) -> int:
    """Compute and keep every year of a station that is not fresh; return how many were made."""
    calendar = station_years.calendar()
    years = station_years.years_on_record(station)
    version = Station.objects.values_list("record_version", flat=True).get(pk=station.pk)
    rows = StationYear.objects.filter(station=station, record_version=version)
    fresh = set(rows.values_list("first_day", flat=True))
    stale = [year for year in years if calendar.first_day(year) not in fresh]
    for done, year in enumerate(stale, start=1):
        _keep(station, year, version=version)
        if progress:
            progress(done, len(stale))
    return len(stale)


def verify(station: Station) -> list[Comparison]:
    """Compute every fresh cached year again and compare the bytes."""
    calendar = station_years.calendar()
    version = Station.objects.values_list("record_version", flat=True).get(pk=station.pk)
    rows = StationYear.objects.filter(station=station, record_version=version)
    compared = []
    for row in rows.order_by("first_day"):
        year = calendar.year_of(row.first_day)
        days = flows.days_of(station, row.first_day, calendar.last_day(year))
        compared.append(Comparison(station, year, station_years.pack(days) == bytes(row.data)))
    return compared


def _keep(station: Station, year: int, *, version: int) -> None:
    """Store one year under the version it was computed from, if that still holds."""
    calendar = station_years.calendar()
    first, last = calendar.first_day(year), calendar.last_day(year)
    days = flows.days_of(station, first, last)
    missing = int(np.count_nonzero(days.marks & Mark.MISSING))
    with transaction.atomic():
        locked = Station.objects.select_for_update(no_key=True).get(pk=station.pk)
        if locked.record_version != version:
            return  # an act came between; the next refresh computes it anew
        StationYear.objects.update_or_create(
            station=station,
            first_day=first,
            defaults={
                "record_version": version,
                "data": station_years.pack(days),
                "days_present": len(days.days) - missing,
                "days_in_year": len(days.days),
            },
        )
