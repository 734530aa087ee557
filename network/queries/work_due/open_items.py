"""What was begun and not finished: sheets nobody checked, and work left at a visit."""

from collections.abc import Iterator
from datetime import timedelta
from typing import Any

from django.db.models import CharField, F, IntegerField, QuerySet, Value
from django.db.models.functions import Cast

from network.models import Gauging, LevelCheck, Visit, WorkLeft
from network.queries.record_days import RecordDay
from network.queries.work_due.items import Asked, Item, Kind

NO_TEXT = Value("")


def items(asked: Asked) -> Iterator[Item]:
    """Yield unchecked visits, gaugings and level checks, and work left, in one query."""
    days = asked.rules.check_days
    visits, gaugings, levels, left = _found(asked, asked.until - timedelta(days=days))
    for kind, key, station, office, since, text in visits.union(gaugings, levels, left, all=True):
        every = None if kind == Kind.LEFT else days
        due_on = since + timedelta(days=every or 0)
        yield Item(Kind(kind), key, station, office, since, due_on, every, (text,))


def _found(asked: Asked, last_day: Any) -> tuple[QuerySet[Any], ...]:
    """Return the rows of each kind alike, so that one union reads them; last_day: of the work."""
    before = asked.end_of(last_day)
    # By who checked it, not by state: that column has an index, and few rows have none there.
    visits = Visit.objects.filter(checked_by=None, arrived_at__lt=before)
    gaugings = Gauging.objects.filter(checked_by=None, ended_at__lt=before)
    levels = LevelCheck.objects.filter(checked_by=None, levelled_at__lt=before)
    left = WorkLeft.objects.filter(done_by=None, visit__arrived_at__lt=asked.end_of(asked.until))
    return (
        _alike(asked, visits, Kind.VISIT_OPEN, at="arrived_at"),
        _alike(asked, gaugings, Kind.GAUGING_OPEN, at="ended_at", text=F("state")),
        _alike(asked, levels, Kind.LEVELS_OPEN, at="levelled_at"),
        _alike(asked, left, Kind.LEFT, at="visit__arrived_at", text=F("text"), of="visit__station"),
    )


def _alike(
    asked: Asked,
    rows: QuerySet[Any],
    kind: Kind,
    *,
    at: str,
    text: Any = NO_TEXT,
    of: str = "station",
) -> QuerySet[Any]:
    if asked.station is not None:
        rows = rows.filter(**{of: asked.station})
    return rows.order_by().values_list(
        Value(kind.value, CharField()),
        Cast("pk", IntegerField()),
        F(of),
        F(f"{of}__office"),
        RecordDay(F(at), of=asked.agency),
        Cast(text, CharField()),
    )
