"""The yearbook desk: for each station and year, how far its yearbook is and what is open."""

from collections.abc import Sequence
from dataclasses import dataclass, field
from functools import cached_property

import numpy as np
from django.db.models import Max, Min

from network.models import Block, Job, Station, TypedFlow
from network.queries import clock, readiness, station_years
from network.queries.flows import StationDays
from reports import editions
from reports.editions import DayChange, EditionLost
from reports.models import Edition

JOBS_SHOWN = 12


@dataclass(frozen=True)
class Line:
    """One station and year: what is open, what is compiled or issued, what changed since."""

    station: Station
    on_record: bool
    points: Sequence[str] = ()
    compiled: Edition | None = None
    issued: Edition | None = None
    changes: Sequence[DayChange] = field(default=())
    lost: str = ""

    @cached_property
    def largest(self) -> DayChange | None:
        """The largest change since issue."""
        return editions.largest(self.changes)

    @property
    def unit(self) -> str:
        """The unit of the published values."""
        return "m³/s" if self.station.is_rated else "m"


def years() -> list[int]:
    """Return the water years in which any station has a record, the latest first."""
    own, calendar = clock.agency(), station_years.calendar()
    read = Block.objects.aggregate(first=Min("first_at"), last=Max("last_at"))
    typed = TypedFlow.objects.standing().aggregate(first=Min("day"), last=Max("day"))
    days = [clock.record_day(at, of=own) for at in read.values() if at is not None]
    days += [day for day in typed.values() if day is not None]
    if not days:
        return []
    first, last = calendar.year_of(min(days)), calendar.year_of(max(days))
    return list(range(last, first - 1, -1))


def lines(stations: Sequence[Station], year: int) -> list[Line]:
    """Return a line for each of the stations."""
    first = station_years.calendar().first_day(year)
    rows = Edition.objects.filter(station__in=stations, first_day=first)
    rows = rows.select_related("station").order_by("number")
    found = {(row.station_id, row.state): row for row in rows}
    return [
        _line(
            station,
            station_years.year_of_station(station, year),
            compiled=found.get((station.pk, Edition.State.COMPILED)),
            issued=found.get((station.pk, Edition.State.ISSUED)),
        )
        for station in stations
    ]


def _line(
    station: Station, days: StationDays, *, compiled: Edition | None, issued: Edition | None
) -> Line:
    published = days.flow_m3s if station.is_rated else days.stage_m
    if np.isnan(published).all() and issued is None:
        return Line(station, on_record=False, compiled=compiled)
    changes: Sequence[DayChange] = ()
    lost = ""
    if issued is not None:
        try:
            changes = editions.changed_since(issued)
        except EditionLost as error:
            lost = str(error)
    points = readiness.open_points(station, days)
    return Line(station, True, points, compiled, issued, changes, lost)


def latest_jobs(kind: str) -> Sequence[Job]:
    """Return the latest pieces of long work of a kind."""
    return Job.objects.filter(kind=kind).order_by("-asked_at", "-pk")[:JOBS_SHOWN]
