"""Stations with the latest of everything done there, in one query, and what is due from it."""

from collections.abc import Iterator
from datetime import date, timedelta
from typing import Any, NamedTuple

from django.db.models import (
    Exists,
    FilteredRelation,
    Model,
    OuterRef,
    Q,
    QuerySet,
    Subquery,
)

from network.models import (
    Block,
    Gauging,
    LevelCheck,
    OperationPeriod,
    RecordReview,
    Station,
    Visit,
)
from network.numerics.due_dates import months_after, times_a_year
from network.queries.record_days import RecordDay
from network.queries.work_due.items import Asked, Item, Kind


class StationRow(NamedTuple):
    """A station, its own intervals, and when what was done there last."""

    pk: int
    code: str
    name: str
    river: str
    kind: str
    unrated: str
    office: int
    office_name: str
    visit_days: int | None
    level_months: int | None
    gaugings_a_year: int | None
    runs: bool
    opened_on: date | None
    visited_on: date | None
    levelled_on: date | None
    gauged_on: date | None
    reviewed_through: date | None
    series: int | None
    records_changes: bool | None
    first_reading_on: date | None
    last_reading_on: date | None

    @property
    def place(self) -> str:
        """Code and name."""
        return f"{self.code} {self.name}"


def station_rows(asked: Asked) -> list[StationRow]:
    """Return all stations, or the one asked for, in one query.

    A station runs while one of its periods of operation is open, or while none is written down.
    """
    periods = OperationPeriod.objects.filter(station=OuterRef("pk"))
    past = Q(closed_on__lt=asked.today) | Q(opened_on__gt=asked.today)
    own, rows = asked.agency, Station.objects.all()
    if asked.station is not None:
        rows = rows.filter(pk=asked.station)
    blocks = Block.objects.filter(series=OuterRef("feed__pk"))
    found = (
        rows.annotate(
            feed=FilteredRelation("series", condition=Q(series__is_primary=True)),
            runs=~Exists(periods) | Exists(periods.exclude(past)),
            opened=_top(periods, "opened_on"),
            visited=RecordDay(_latest(Visit, "arrived_at", is_routine=True), of=own),
            levelled=RecordDay(_latest(LevelCheck, "levelled_at"), of=own),
            gauged=RecordDay(_latest(Gauging, "started_at"), of=own),
            reviewed=_latest(RecordReview, "reviewed_through", withdrawn_at=None),
            first=RecordDay(Subquery(blocks.order_by("month").values("first_at")[:1]), of=own),
            last=RecordDay(Subquery(blocks.order_by("-month").values("last_at")[:1]), of=own),
        )
        .order_by("code")
        .values_list(
            "pk", "code", "name", "river", "kind", "unrated_because", "office", "office__name",
            "visit_interval_days", "level_check_interval_months", "gaugings_wanted_per_year",
            "runs", "opened", "visited", "levelled", "gauged", "reviewed", "feed__pk",
            "feed__is_event_logger", "first", "last",
        )
    )  # fmt: skip
    return [StationRow(*row) for row in found]


def items(asked: Asked, rows: list[StationRow]) -> Iterator[Item]:
    """Yield what is due at the stations that run: visits, levels, gaugings, data, review."""
    for row in rows:
        if row.runs:
            for rule in (_visit, _levels, _gauging, _silence, _review):
                found = rule(asked, row)
                if found is not None:
                    yield found


def _visit(asked: Asked, row: StationRow) -> Item | None:
    days = row.visit_days or asked.rules.visit_days
    due_on = (row.visited_on or _opened(asked, row)) + timedelta(days=days)
    return _item(asked, row, Kind.VISIT, row.visited_on, due_on, days)


def _levels(asked: Asked, row: StationRow) -> Item | None:
    months = row.level_months or asked.rules.level_check_months
    due_on = months_after(row.levelled_on or _opened(asked, row), months)
    return _item(asked, row, Kind.LEVELS, row.levelled_on, due_on, months)


def _gauging(asked: Asked, row: StationRow) -> Item | None:
    """Want gaugings evenly spread over the year, where there is a rating or a number was given."""
    wanted = row.gaugings_a_year
    if wanted is None and row.kind != Station.Kind.STAGE_ONLY and not row.unrated:
        wanted = asked.rules.gaugings_per_year
    if not wanted:
        return None
    due_on = times_a_year(row.gauged_on or _opened(asked, row), wanted)
    return _item(asked, row, Kind.GAUGING, row.gauged_on, due_on, wanted)


def _silence(asked: Asked, row: StationRow) -> Item | None:
    """Miss the readings of the primary series; the silence of an event logger says nothing."""
    if row.series is None or row.records_changes:
        return None
    days = asked.rules.silence_days
    due_on = (row.last_reading_on or _opened(asked, row)) + timedelta(days=days)
    found = _item(asked, row, Kind.SILENCE, row.last_reading_on, due_on, days)
    return found._replace(key=row.series) if found else None


def _review(asked: Asked, row: StationRow) -> Item | None:
    """Want the record reviewed where there are readings later than the last review."""
    reviewed, last = row.reviewed_through, row.last_reading_on
    begun = reviewed or row.first_reading_on
    if begun is None or last is None or (reviewed is not None and reviewed >= last):
        return None
    days = asked.rules.review_days
    due_on = begun + timedelta(days=days)
    return _item(asked, row, Kind.REVIEW, reviewed, due_on, days)


def _item(
    asked: Asked, row: StationRow, kind: Kind, since: date | None, due_on: date, every: int
) -> Item | None:
    if due_on > asked.until:
        return None
    return Item(kind, row.pk, row.pk, row.office, since, due_on, every)


def _opened(asked: Asked, row: StationRow) -> date:
    return row.opened_on or asked.today


def _latest(model: type[Model], name: str, **which: Any) -> Subquery:
    return _top(model._default_manager.filter(station=OuterRef("pk"), **which), name)


def _top(rows: QuerySet[Any], name: str) -> Subquery:
    return Subquery(rows.order_by(f"-{name}").values(name)[:1])
