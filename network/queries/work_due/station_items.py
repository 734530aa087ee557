"""Stations with the latest of everything done there, in one query, and what is due from it."""

from collections.abc import Iterator
from datetime import date
from typing import Any, NamedTuple

from django.db.models import (
    Exists,
    ExpressionWrapper,
    F,
    FilteredRelation,
    Model,
    OuterRef,
    Q,
    QuerySet,
    Subquery,
)
from django.db.models.functions import Coalesce

from network.models import (
    Block,
    Gauging,
    LevelCheck,
    OperationPeriod,
    RecordReview,
    Station,
    Visit,
)
from network.numerics.due_dates import SHORTEST_MONTH_DAYS, days_between, months_after
from network.queries.record_days import AsFound, DayNumber, Negative, RecordDay
from network.queries.work_due.items import Asked, Item, Kind


class StationRow(NamedTuple):
    """A station, its own intervals, and the days on which all was done there last, as numbers.

    A day below zero is the one since which a thing never done has waited: the station's first, for
    a review that of the first reading.
    """

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
    series: int | None
    records_changes: bool | None
    visited: int | None
    levelled: int | None
    gauged: int | None
    read: int | None
    reviewed: int | None

    @property
    def place(self) -> str:
        """Code and name."""
        return f"{self.code} {self.name}"

    @property
    def unreviewed_since(self) -> int | None:
        """The day from which readings wait for a review, None where none do."""
        if self.reviewed is None or self.read is None or self.read <= self.reviewed:
            return None
        return abs(self.reviewed)


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
    first_reading = Subquery(blocks.order_by("month").values("first_at")[:1])
    opened = Negative(DayNumber(_top(periods, "opened_on")))

    def done(latest: Subquery) -> Coalesce:
        return Coalesce(RecordDay(latest, of=own), opened)

    found = (
        rows.annotate(
            feed=FilteredRelation("series", condition=Q(series__is_primary=True)),
            runs=ExpressionWrapper(~Exists(periods) | Exists(periods.exclude(past)), AsFound()),
            records_changes=ExpressionWrapper(F("feed__is_event_logger"), AsFound()),
            visited=done(_latest(Visit, "arrived_at", is_routine=True)),
            levelled=done(_latest(LevelCheck, "levelled_at")),
            gauged=done(_latest(Gauging, "started_at")),
            read=done(Subquery(blocks.order_by("-month").values("last_at")[:1])),
            reviewed=Coalesce(
                DayNumber(_latest(RecordReview, "reviewed_through", withdrawn_at=None)),
                Negative(RecordDay(first_reading, of=own)),
            ),
        )
        .order_by("code")
        .values_list(
            "pk", "code", "name", "river", "kind", "unrated_because", "office", "office__name",
            "visit_interval_days", "level_check_interval_months", "gaugings_wanted_per_year",
            "runs", "feed__pk", "records_changes",
            "visited", "levelled", "gauged", "read", "reviewed",
        )
    )  # fmt: skip
    return [StationRow(*row) for row in found]


def items(asked: Asked, rows: list[StationRow]) -> Iterator[Item]:
    """Yield what is due at the stations that run: visits, levels, gaugings, data, review."""
    running = [row for row in rows if row.runs]
    for rule in (_visits, _levels, _gaugings, _silence, _reviews):
        yield from rule(asked, running)


# An interval counts from today where no day is known at all.
def _visits(asked: Asked, rows: list[StationRow]) -> Iterator[Item]:
    today, until = asked.today.toordinal(), asked.until.toordinal()
    for row in rows:
        days = row.visit_days or asked.rules.visit_days
        due = abs(row.visited or today) + days
        if due <= until:
            yield _item(row, Kind.VISIT, row.visited, due, days)


def _levels(asked: Asked, rows: list[StationRow]) -> Iterator[Item]:
    today, until = asked.today.toordinal(), asked.until.toordinal()
    for row in rows:
        months = row.level_months or asked.rules.level_check_months
        begun = abs(row.levelled or today)
        if begun + SHORTEST_MONTH_DAYS * months <= until:  # few; the exact day takes longer
            due = months_after(date.fromordinal(begun), months).toordinal()
            if due <= until:
                yield _item(row, Kind.LEVELS, row.levelled, due, months)


def _gaugings(asked: Asked, rows: list[StationRow]) -> Iterator[Item]:
    """Want gaugings evenly spread over the year, where there is a rating or a number was given."""
    today, until = asked.today.toordinal(), asked.until.toordinal()
    for row in rows:
        wanted = row.gaugings_a_year
        if wanted is None and row.kind != Station.Kind.STAGE_ONLY and not row.unrated:
            wanted = asked.rules.gaugings_per_year
        if wanted:
            due = abs(row.gauged or today) + days_between(wanted)
            if due <= until:
                yield _item(row, Kind.GAUGING, row.gauged, due, wanted)


def _silence(asked: Asked, rows: list[StationRow]) -> Iterator[Item]:
    """Miss the readings of the primary series; the silence of an event logger says nothing."""
    today, until = asked.today.toordinal(), asked.until.toordinal()
    days = asked.rules.silence_days
    for row in rows:
        due = abs(row.read or today) + days
        if due <= until and row.series is not None and not row.records_changes:
            yield _item(row, Kind.SILENCE, row.read, due, days)._replace(key=row.series)


def _reviews(asked: Asked, rows: list[StationRow]) -> Iterator[Item]:
    """Want the record reviewed where there are readings later than the last review."""
    until, days = asked.until.toordinal(), asked.rules.review_days
    for row in rows:
        begun = row.unreviewed_since
        if begun is not None and begun + days <= until:
            yield _item(row, Kind.REVIEW, row.reviewed, begun + days, days)


def _item(row: StationRow, kind: Kind, since: int | None, due: int, every: int) -> Item:
    done_on = date.fromordinal(since) if since is not None and since > 0 else None
    return Item(kind, row.pk, row.pk, row.office, done_on, date.fromordinal(due), every)


def _latest(model: type[Model], name: str, **which: Any) -> Subquery:
    return _top(model._default_manager.filter(station=OuterRef("pk"), **which), name)


def _top(rows: QuerySet[Any], name: str) -> Subquery:
    return Subquery(rows.order_by(f"-{name}").values(name)[:1])
