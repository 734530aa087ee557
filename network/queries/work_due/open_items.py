"""What was begun and not finished: sheets nobody checked, and work left at a visit."""

from collections.abc import Iterator, Mapping
from datetime import date, timedelta
from typing import Any, NamedTuple

from django.db.models import CharField, F, IntegerField, QuerySet, Value
from django.db.models.functions import Cast

from network.models import Gauging, LevelCheck, Visit, WorkLeft
from network.queries.record_days import RecordDay
from network.queries.work_due.items import Asked, Item, Kind


class OpenRow(NamedTuple):
    """A sheet that nobody checked, with its state, or work left, with its text."""

    kind: Kind
    key: int
    station: int
    since: date
    text: str
    recorded_by: int

    @property
    def is_draft(self) -> bool:
        """Whether it is a sheet its author has not finished."""
        return self.kind != Kind.LEFT and self.text == "draft"


def open_rows(asked: Asked) -> list[OpenRow]:
    """Return unchecked visits, gaugings and level checks, and work left, in one query.

    Chosen by who checked or did it: that column has an index, and few rows have none there.
    """
    levels = LevelCheck.objects.filter(checked_by=None)
    rows = [
        _alike(asked, Visit.objects.filter(checked_by=None), Kind.VISIT_OPEN, at="arrived_at"),
        _alike(asked, Gauging.objects.filter(checked_by=None), Kind.GAUGING_OPEN, at="ended_at"),
        _alike(asked, levels, Kind.LEVELS_OPEN, at="levelled_at"),
        _alike(asked, WorkLeft.objects.filter(done_by=None), Kind.LEFT,
               at="visit__arrived_at", text="text", of="visit__"),
    ]  # fmt: skip
    found = rows[0].union(*rows[1:], all=True)
    return [
        OpenRow(Kind(kind), key, station, date.fromordinal(since), *more)
        for kind, key, station, since, *more in found
    ]


def items(asked: Asked, rows: list[OpenRow], offices: Mapping[int, int]) -> Iterator[Item]:
    """Yield what has waited for longer than a sheet may, and all work left.

    offices: of the stations, by key; joined here they would cost a walk through all visits.
    """
    for row in rows:
        every = None if row.kind == Kind.LEFT else asked.rules.check_days
        due_on = row.since + timedelta(days=every or 0)
        if due_on <= asked.until:
            facts = (row.text,)
            office = offices[row.station]
            yield Item(row.kind, row.key, row.station, office, row.since, due_on, every, facts)


def _alike(
    asked: Asked, rows: QuerySet[Any], kind: Kind, *, at: str, text: str = "state", of: str = ""
) -> QuerySet[Any]:
    if asked.station is not None:
        rows = rows.filter(**{f"{of}station": asked.station})
    return rows.order_by().values_list(
        Value(kind.value, CharField()),
        Cast("pk", IntegerField()),
        F(f"{of}station"),
        RecordDay(at, of=asked.agency),
        Cast(text, CharField()),
        F(f"{of}recorded_by"),
    )
