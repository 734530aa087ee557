"""The raw readings of a series: read from its packed months, or counted without unpacking them."""

from collections.abc import Iterator
from dataclasses import dataclass
from datetime import UTC, date, datetime, timedelta
from itertools import pairwise

import numpy as np
from django.db.models import Count, Max, Min, Sum

from network.models import Block, Series, Station
from network.numerics.records.blocks import decode, decode_many
from network.numerics.records.readings import Readings
from network.queries import clock


@dataclass(frozen=True)
class Extent:
    """How far a series reaches: readings, months, first and last reading (none in an empty one)."""

    count: int
    months: int
    first_at: datetime | None
    last_at: datetime | None


@dataclass(frozen=True)
class Month:
    """What one packed month holds, known without unpacking it."""

    month: date
    count: int
    first_at: datetime
    last_at: datetime


@dataclass(frozen=True)
class Silence:
    """A time without readings between two packed months, from the last reading to the next."""

    start_at: datetime
    end_at: datetime


def read(series_pk: int, start_s: int, end_s: int) -> Readings:
    """Return the raw readings of a series from start to end (epoch seconds UTC), both included.

    One query, and only the months touched are unpacked. times_s int64[n] epoch seconds UTC,
    values_m float64[n] raw metres. Raises BlockError for damaged bytes.
    """
    first, last = (month_of(datetime.fromtimestamp(at_s, UTC)) for at_s in (start_s, end_s))
    rows = Block.objects.filter(series=series_pk, month__gte=first, month__lte=last)
    readings = decode_many(rows.order_by("month").values_list("data", flat=True))
    begin = np.searchsorted(readings.times_s, start_s, side="left")
    stop = np.searchsorted(readings.times_s, end_s, side="right")
    return readings.part(int(begin), int(stop))


def read_months(series: Series, *, months: list[date]) -> dict[date, Readings]:
    """Return {first day of the month: its raw readings} for those of the months that have any."""
    rows = Block.objects.filter(series=series, month__in=months).values_list("month", "data")
    return {month: decode(data) for month, data in rows}


def extent(series: Series) -> Extent:
    """Return how far a series reaches, without unpacking anything."""
    found = Block.objects.filter(series=series).aggregate(
        count=Sum("count", default=0),
        months=Count("pk"),
        first_at=Min("first_at"),
        last_at=Max("last_at"),
    )
    return Extent(**found)


def days_spanned(station: Station) -> tuple[date, date] | None:
    """Return the first and last record day on which any series of a station has a reading."""
    ends = Block.objects.filter(series__station=station).aggregate(Min("first_at"), Max("last_at"))
    first_at, last_at = ends.values()
    if first_at is None:
        return None
    of = clock.agency()
    return clock.record_day(first_at, of=of), clock.record_day(last_at, of=of)


def month_list(series: Series) -> list[Month]:
    """Return the packed months of a series in order, without unpacking them."""
    rows = Block.objects.filter(series=series).order_by("month")
    return [Month(*row) for row in rows.values_list("month", "count", "first_at", "last_at")]


def silences(series: Series) -> list[Silence]:
    """Return the times between packed months that are longer than the series' gap limit.

    Gaps inside a month are not seen without unpacking it. An event logger's silence is none.
    """
    if series.is_event_logger:
        return []
    limit = timedelta(minutes=series.gap_limit_minutes)
    return [
        Silence(before.last_at, after.first_at)
        for before, after in pairwise(month_list(series))
        if after.first_at - before.last_at > limit
    ]


def month_of(instant: datetime) -> date:
    """Return the first day of the UTC month an instant lies in."""
    return instant.astimezone(UTC).date().replace(day=1)


def months_between(start: datetime, end: datetime) -> Iterator[date]:
    """Yield the first days of the UTC months from start to end, both touched."""
    month, last = month_of(start), month_of(end)
    while month <= last:
        yield month
        month = (month + timedelta(days=32)).replace(day=1)
