"""Structures people trust their lives to: inspections due, and those found unsafe."""

from collections.abc import Iterator
from datetime import date
from typing import NamedTuple

from django.db.models import OuterRef, Subquery

from network.models import Inspection, SafetyItem
from network.numerics.due_dates import months_after
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
    found = rows.annotate(
        inspected=Subquery(last.values("inspected_on")[:1]),
        safe=Subquery(last.values("is_safe")[:1]),
    ).values_list(
        "pk", "station", "kind", "label", "station__office", "interval_months", "inspected", "safe"
    )
    return [SafetyRow(*row) for row in found]


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
