"""The list of work due: every rule asked once, filtered, counted by kind, a page put into words."""

from collections import Counter
from collections.abc import Iterable, Iterator, Mapping
from dataclasses import dataclass, replace
from datetime import date, datetime, timedelta
from itertools import chain

from network.models import Agency, Instrument, Postponement, Station
from network.queries import clock, next_gaugings
from network.queries.work_due import (
    calibration_items,
    doubt_items,
    open_items,
    reasons,
    safety_items,
    station_items,
)
from network.queries.work_due.items import LEAST_URGENT, URGENCY, Asked, Item, Kind
from network.queries.work_due.open_items import OpenRow
from network.queries.work_due.station_items import StationRow
from network.queries.working_rules import rules

PER_PAGE = 50
RANKS = {kind: (URGENCY.get(kind, LEAST_URGENT), str(kind)) for kind in Kind}


@dataclass(frozen=True)
class Filters:
    """What to show of the list; `within_days`: also what falls due in the days to come."""

    office: int | None = None
    river: str = ""
    kind: Kind | None = None
    within_days: int = 0
    with_postponed: bool = False
    station: int | None = None
    instrument: int | None = None


@dataclass(frozen=True)
class Line:
    """One line of the list, ready to be read.

    place: the station or instrument; act_key: the row the act on it names; postponed: the standing
    postponement that hides it until its day.
    """

    kind: Kind
    key: int
    subject: str
    station: int | None
    place: str
    river: str
    office: str
    since: date | None
    due_on: date
    days_late: int
    reason: str
    is_urgent: bool
    postponed: Postponement | None = None
    band: str = ""  # of a gauging wanted: where it would narrow the rating most


@dataclass(frozen=True)
class Unfinished:
    """A draft, so that its author finds it again."""

    kind: Kind
    key: int
    place: str
    since: date
    recorded_by: int


@dataclass(frozen=True)
class WorkList:
    """A page of lines with the counts of the whole list; choices are what filters can name."""

    lines: tuple[Line, ...]
    counts: Mapping[Kind, int]
    total: int
    postponed: int
    page: int
    pages: int
    offices: tuple[tuple[int, str], ...]
    rivers: tuple[str, ...]
    today: date
    unfinished: tuple[Unfinished, ...] = ()


@dataclass(frozen=True)
class Found:
    """What the rules found, before filters: stations, sheets not checked, and all items."""

    stations: list[StationRow]
    open_rows: list[OpenRow]
    items: Iterable[Item]


def work_list(
    at: datetime,
    *,
    filters: Filters = Filters(),
    page: int = 1,
    per_page: int | None = PER_PAGE,
    agency: Agency | None = None,
) -> WorkList:
    """Return what is due at an instant, a page of it in words, in a fixed number of queries.

    Counts by kind are those of all kinds under the other filters; per_page None: everything. A list
    of gaugings alone, or of one station, also says in which band of stage each is wanted.
    """
    asked = ask(at, filters, agency=agency)
    found = _found(asked)
    by_station = {row.pk: row for row in found.stations}
    put_off = _postponements(asked)
    kept = list(found.items)
    if filters.office is not None or filters.river:
        kept = [item for item in kept if _passes(item, filters, by_station)]
    still_due = [item for item in kept if not _hidden(item, put_off)] if put_off else kept
    shown = kept if filters.with_postponed else still_due
    counts = Counter(item.kind for item in shown)
    chosen = [item for item in shown if filters.kind in (None, item.kind)]
    chosen.sort(key=_order)
    size = per_page or max(len(chosen), 1)
    pages = max(-(-len(chosen) // size), 1)
    page = min(max(page, 1), pages)
    offices = {row.office: row.office_name for row in found.stations}
    lines = tuple(
        _line(item, asked, by_station, offices, put_off)
        for item in chosen[(page - 1) * size : page * size]
    )
    with_bands = filters.kind == Kind.GAUGING or filters.station is not None
    return WorkList(
        lines=_with_bands(lines, at) if with_bands else lines,
        counts={kind: counts[kind] for kind in Kind if counts[kind]},
        total=len(chosen),
        postponed=len(kept) - len(still_due),
        page=page,
        pages=pages,
        offices=tuple(sorted(offices.items(), key=lambda pair: pair[1])),
        rivers=tuple(sorted({row.river for row in found.stations})),
        today=asked.today,
        unfinished=tuple(_unfinished(found.open_rows, by_station)),
    )


def ask(at: datetime, filters: Filters = Filters(), *, agency: Agency | None = None) -> Asked:
    """Return the question that all rules are asked at an instant."""
    own = agency or clock.agency()
    today = clock.record_day(at, of=own)
    return Asked(
        today=today,
        until=today + timedelta(days=filters.within_days),
        rules=rules(),
        agency=own,
        station=filters.station,
        instrument=filters.instrument,
    )


def number_due(at: datetime, *, filters: Filters = Filters()) -> int:
    """Return how many items are due, those put off too."""
    return sum(1 for _item in _found(ask(at, filters)).items)


def _found(asked: Asked) -> Found:
    """Ask every rule that can say something of what is asked."""
    if asked.instrument is not None:
        return Found([], [], calibration_items.items(asked))
    stations, open_rows = station_items.station_rows(asked), open_items.open_rows(asked)
    of_stations = chain(
        station_items.items(asked, stations),
        safety_items.items(asked),
        open_items.items(asked, open_rows, {row.pk: row.office for row in stations}),
        doubt_items.items(asked),
    )
    if asked.station is not None:
        return Found(stations, open_rows, of_stations)
    return Found(stations, open_rows, chain(of_stations, calibration_items.items(asked)))


def _unfinished(
    rows: Iterable[OpenRow], stations: Mapping[int, StationRow]
) -> Iterator[Unfinished]:
    for row in rows:
        if row.is_draft:
            place = stations[row.station].place
            yield Unfinished(row.kind, row.key, place, row.since, row.recorded_by)


def _postponements(asked: Asked) -> dict[tuple[str, str], Postponement]:
    """Return the standing postponements that still hide something, by rule and subject."""
    rows = Postponement.objects.standing().filter(until__gt=asked.today)
    if asked.station is not None:
        rows = rows.filter(station=asked.station)
    return {(row.rule, row.subject): row for row in rows.order_by("until", "pk")}


def _hidden(item: Item, put_off: Mapping[tuple[str, str], Postponement]) -> bool:
    return (str(item.kind), item.subject) in put_off


def _passes(item: Item, filters: Filters, stations: Mapping[int, StationRow]) -> bool:
    if filters.office is not None and item.office != filters.office:
        return False
    return not filters.river or (
        item.station is not None and stations[item.station].river == filters.river
    )


def _order(item: Item) -> tuple[int, date, str, int]:
    urgency, name = RANKS[item.kind]
    return urgency, item.due_on, name, item.key


def _line(
    item: Item,
    asked: Asked,
    stations: Mapping[int, StationRow],
    offices: Mapping[int, str],
    put_off: Mapping[tuple[str, str], Postponement],
) -> Line:
    row = stations.get(item.station) if item.station is not None else None
    return Line(
        kind=item.kind,
        key=item.key,
        subject=item.subject,
        station=item.station,
        place=row.place if row else _instrument(item),
        river=row.river if row else "",
        office=offices.get(item.office, ""),
        since=item.since,
        due_on=item.due_on,
        days_late=(asked.today - item.due_on).days,
        reason=reasons.reason(item, today=asked.today),
        is_urgent=item.kind in URGENCY,
        postponed=put_off.get((str(item.kind), item.subject)),
    )


def _with_bands(lines: tuple[Line, ...], at: datetime) -> tuple[Line, ...]:
    wanted = [line.station for line in lines if line.kind == Kind.GAUGING]
    found = next_gaugings.of_many(Station.objects.filter(pk__in=wanted), at=at) if wanted else {}
    said = {pk: answer.sentence() for pk, answer in found.items()}
    return tuple(
        replace(line, band=said.get(line.station or 0, "")) if line.kind == Kind.GAUGING else line
        for line in lines
    )


def _instrument(item: Item) -> str:
    kind, name, *_hours = item.facts
    if item.kind == Kind.CALIBRATION:
        return name
    return f"{Instrument.Kind(kind).label} {name}"
