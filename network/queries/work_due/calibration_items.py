"""Current meters due for calibration by months or hours of use, and other instruments by months."""

from collections import defaultdict
from collections.abc import Iterator
from datetime import date
from typing import Any, NamedTuple

from django.db.models import CharField, F, OuterRef, Q, QuerySet, Subquery, Sum, Value
from django.db.models.functions import Coalesce

from network.models import Gauging, Instrument, KindInterval, MeterPair
from network.numerics.due_dates import SHORTEST_MONTH_DAYS, months_after
from network.queries import calibrations, clock
from network.queries.instruments import METER_KINDS
from network.queries.record_days import AsFound, HoursBetween, RecordDay, day
from network.queries.work_due.items import Asked, Item, Kind

IN_USE = [Instrument.Status.IN_SERVICE, Instrument.Status.SPARE]
USED = HoursBetween("started_at", "ended_at")
Use = list[tuple[date, float]]  # day and hours of each gauging, in order


class CalibratedRow(NamedTuple):
    """A current meter or another instrument, its intervals and its last calibration.

    Months and hours are its own, else its kind's, else those of the agency, which has them for
    current meters alone (ISO 2537 practice).
    """

    kind: Kind
    pk: int
    kind_of_instrument: str
    name: str
    office: int
    months: int | None
    hours: int | None
    calibrated_on: date | None


def items(asked: Asked) -> Iterator[Item]:
    """Yield what is to be calibrated, in two queries; instruments in the laboratory are not due."""
    by_hours = []
    for row in calibrated_rows(asked):
        found = _by_months(asked, row)
        if found is not None:
            yield found
        elif row.hours and row.calibrated_on and row.kind == Kind.CALIBRATION:
            by_hours.append(row)
    use = hours_of_use(asked, by_hours)
    for row in by_hours:
        if row.pk in use:
            yield from _by_hours(asked, row, use[row.pk])


def calibrated_rows(asked: Asked) -> list[CalibratedRow]:
    """Return all meters in use, and the other instruments that may be due, in one query."""
    pairs = MeterPair.objects.filter(body__status__in=IN_USE, rotor__status__in=IN_USE)
    others = Instrument.objects.filter(status__in=IN_USE).exclude(kind__in=METER_KINDS)
    if asked.instrument is not None:
        pairs = pairs.filter(Q(body=asked.instrument) | Q(rotor=asked.instrument))
        others = others.filter(pk=asked.instrument)
    others = others.exclude(pk__in=_calibrated_lately(asked))
    own = Coalesce(_latest(pair=OuterRef("pk")), _latest(group=OuterRef("group")))
    meters = _columns(asked, pairs, Kind.CALIBRATION, of="body__", rotor=F("rotor__serial"), at=own)
    at = _latest(instrument=OuterRef("pk"))
    rest = _columns(asked, others, Kind.INSTRUMENT, of="", rotor=Value("", CharField()), at=at)
    return [_row(asked, *row) for row in meters.union(rest, all=True)]


def _calibrated_lately(asked: Asked) -> QuerySet[Any]:
    """Return the instruments calibrated so lately that even the shortest months have not passed.

    For the few others the exact day is found.
    """
    of_kind = KindInterval.objects.filter(kind=OuterRef("instrument__kind")).values("months")[:1]
    own = F("instrument__interval_months")
    days = SHORTEST_MONTH_DAYS * Coalesce(own, Subquery(of_kind), 0, output_field=AsFound())
    rows = calibrations.that_count().filter(instrument__isnull=False)
    rows = rows.alias(day=RecordDay("effective_from", of=asked.agency), days=days)
    return rows.filter(day__gt=asked.until.toordinal() - F("days")).values("instrument")


def hours_of_use(asked: Asked, rows: list[CalibratedRow]) -> dict[int, Use]:
    """Return the use of those meters that may have reached their hours since the calibration.

    The database sums from the earliest calibration on, so that few gaugings need to be read.
    """
    since = {row.pk: row.calibrated_on for row in rows if row.calibrated_on}
    if not since:
        return {}
    start = clock.day_start(min(since.values()), of=asked.agency)
    made = Gauging.objects.filter(pair__isnull=False, started_at__gte=start)
    if asked.instrument is not None:
        made = made.filter(pair__in=since)
    sums = made.order_by().values("pair").annotate(used=Sum(USED))
    least = min(row.hours for row in rows if row.hours)
    much_used = Gauging.objects.filter(pair__in=sums.filter(used__gte=least).values("pair"))
    found: dict[int, Use] = defaultdict(list)
    days = much_used.order_by("started_at").values_list(
        "pair", RecordDay("started_at", of=asked.agency), USED
    )
    for pair, number, hours in days:
        used_on = date.fromordinal(number)
        if pair in since and used_on >= since[pair]:
            found[pair].append((used_on, hours))
    return found


def _columns(
    asked: Asked, rows: QuerySet[Any], kind: Kind, *, of: str, rotor: Any, at: Any
) -> QuerySet[Any]:
    intervals = KindInterval.objects.filter(kind=OuterRef(f"{of}kind"))

    def interval(unit: str) -> Coalesce:
        of_kind = Subquery(intervals.values(unit)[:1])
        return Coalesce(F(f"{of}interval_{unit}"), of_kind, output_field=AsFound())

    return (
        rows.order_by()
        .annotate(
            months=interval("months"),
            hours=interval("hours"),
            calibrated=RecordDay(at, of=asked.agency),
        )
        .values_list(
            Value(kind.value, CharField()),
            "pk",
            f"{of}kind",
            f"{of}serial",
            rotor,
            f"{of}office",
            "months",
            "hours",
            "calibrated",
        )
    )


def _latest(**owner: OuterRef) -> Subquery:
    rows = calibrations.that_count().filter(**owner).order_by("-effective_from")
    return Subquery(rows.values("effective_from")[:1])


def _row(
    asked: Asked, kind: str, pk: int, what: str, serial: str, rotor: str, office: int,
    months: int | None, hours: int | None, number: int | None,
) -> CalibratedRow:  # fmt: skip
    calibrated_on = day(number)
    if kind == Kind.INSTRUMENT:
        return CalibratedRow(
            Kind.INSTRUMENT, pk, what, serial, office, months, hours, calibrated_on
        )
    months = months or asked.rules.calibration_months
    hours = hours or asked.rules.calibration_hours
    name = f"{serial} / {rotor}"
    return CalibratedRow(Kind.CALIBRATION, pk, what, name, office, months, hours, calibrated_on)


def _by_months(asked: Asked, row: CalibratedRow) -> Item | None:
    """Find a meter or instrument never calibrated, or not for as many months as it may be."""
    since, facts = row.calibrated_on, (row.kind_of_instrument, row.name)
    if since is None:
        if not (row.months or row.hours):
            return None
        return Item(row.kind, row.pk, None, row.office, None, asked.today, row.months, facts)
    if not row.months:
        return None
    due_on = months_after(since, row.months)
    if due_on > asked.until:
        return None
    return Item(row.kind, row.pk, None, row.office, since, due_on, row.months, facts)


def _by_hours(asked: Asked, row: CalibratedRow, use: Use) -> Iterator[Item]:
    """Find a meter used for as many hours as it may be; due since the gauging that made them."""
    total, due_on = 0.0, None
    for used_on, hours in use:
        total += hours
        if due_on is None and row.hours and total >= row.hours:
            due_on = used_on
    if due_on is not None:
        facts = (row.kind_of_instrument, row.name, total)
        since = row.calibrated_on
        yield Item(row.kind, row.pk, None, row.office, since, due_on, row.hours, facts)
