"""Structures people trust their lives to: inspections due, and those found unsafe."""

from collections.abc import Iterator
from datetime import date
from typing import NamedTuple

from django.db.models import Case, OuterRef, Subquery, When

from network.models import Inspection, SafetyItem
from network.numerics.due_dates import months_after
from network.queries.record_days import DayNumber, Negative, day
from network.queries.work_due.items import Asked, Item, Kind


class SafetyRow(NamedTuple):
    """A safety item in use and its last inspection."""

    pk: int
    station: int
    kind: str
    label: str
    office: int
    months: int | None
    inspected_on: date | None
    is_safe: bool | None


def safety_rows(asked: Asked) -> list[SafetyRow]:
    """Return the safety items in use with their last inspection, in one query."""
    last = Inspection.objects.standing().filter(item=OuterRef("pk"))
    last = last.order_by("-inspected_on", "-pk")
    rows = SafetyItem.objects.filter(removed_on__isnull=True)
    if asked.station is not None:
        rows = rows.filter(station=asked.station)
    on = DayNumber("inspected_on")
    safe_on = last.annotate(safe_on=Case(When(is_safe=True, then=on), default=Negative(on)))
    found = rows.annotate(safe_on=Subquery(safe_on.values("safe_on")[:1])).values_list(
        "pk", "station", "kind", "label", "station__office", "interval_months", "safe_on"
    )
    return [
        SafetyRow(*row, *((day(abs(safe_on)), safe_on > 0) if safe_on else (None, None)))
        for *row, safe_on in found
    ]


def items(asked: Asked) -> Iterator[Item]:
    """Yield inspections due; one never inspected is due at once, one found unsafe since then."""
    for row in safety_rows(asked):
        due_on = usable_until(row, asked)
        if due_on <= asked.until:
            months = row.months or asked.rules.inspection_months
            kind = SafetyItem.Kind(row.kind)
            facts = (kind, row.label, row.is_safe)
            since = row.inspected_on
            yield Item(Kind.SAFETY, row.pk, row.station, row.office, since, due_on, months, facts)


def usable_until(row: SafetyRow, asked: Asked) -> date:
    """Return the day from which an item must not be used until it is inspected."""
    if row.inspected_on is None:
        return asked.today
    if not row.is_safe:
        return row.inspected_on
    return months_after(row.inspected_on, row.months or asked.rules.inspection_months)
