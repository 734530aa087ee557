"""Acts upon plans: work put off, inspections of safety items, intervals changed."""

from collections.abc import Mapping
from dataclasses import dataclass
from datetime import date, datetime
from typing import Any

from django.db import models, transaction
from django.utils.translation import gettext as _

from network.models import (
    Inspection,
    Instrument,
    KindInterval,
    Person,
    Postponement,
    SafetyItem,
    Station,
    WorkingRules,
)
from network.queries import clock
from network.queries.work_due import work_list
from network.queries.work_due.items import Kind
from network.queries.work_due.work_list import Filters
from network.services.acts import Refusal, claim_version, open_act, required_reason

INTERVALS: dict[type[models.Model], tuple[str, ...]] = {
    Station: (
        "visit_interval_days",
        "level_check_interval_months",
        "gaugings_wanted_per_year",
    ),
    Instrument: ("interval_months", "interval_hours"),
    KindInterval: ("months", "hours"),
    SafetyItem: ("interval_months",),
    WorkingRules: (
        "visit_days",
        "level_check_months",
        "gaugings_per_year",
        "calibration_months",
        "calibration_hours",
        "inspection_months",
        "silence_days",
        "review_days",
        "check_days",
        "doubt_count",
    ),
}


@dataclass(frozen=True)
class DueChange:
    """How many items of work are due before and after intervals change."""

    before: int
    after: int

    @property
    def made_due(self) -> int:
        """How many more are due; below zero: fewer."""
        return self.after - self.before


def postpone(
    *,
    kind: Kind,
    subject: str,
    until: date,
    reason: str,
    by: Person,
    at: datetime,
    station: Station | None = None,
) -> Postponement:
    """Put an item of work off until a day; it then comes back by itself.

    An item put off already takes the new day. Refuses a day that is not ahead, and no reason.
    """
    why = required_reason(reason)
    if until <= clock.record_day(at, of=clock.agency()):
        raise Refusal(_("Put it off until a day that is still to come."), field="until")
    verb = _("put off: %(what)s") % {"what": kind.label}
    with open_act(verb, by=by, at=at, reason=why, station=station):
        for row in Postponement.objects.standing().filter(rule=kind.value, subject=subject):
            withdraw_postponement(postponement=row, by=by, at=at, reason=_("put off anew"))
        return Postponement.objects.create(
            rule=kind.value, subject=subject, station=station, until=until, reason=why,
            recorded_at=at, recorded_by=by,
        )  # fmt: skip


def withdraw_postponement(
    *, postponement: Postponement, by: Person, at: datetime, reason: str
) -> None:
    """Let an item that was put off be due again."""
    verb = _("withdrew a postponement")
    _withdraw(postponement, verb, station=postponement.station, by=by, at=at, reason=reason)


def record_inspection(
    *,
    item: SafetyItem,
    inspected_on: date,
    is_safe: bool,
    by: Person,
    at: datetime,
    remarks: str = "",
) -> Inspection:
    """Record that a safety item was inspected. Refuses a day ahead and a finding without words."""
    if inspected_on > clock.record_day(at, of=clock.agency()):
        raise Refusal(_("This day is still to come."), field="inspected_on")
    if not is_safe and not remarks.strip():
        raise Refusal(_("Say what makes it unsafe."), field="remarks")
    with open_act(_("recorded an inspection"), by=by, at=at, station=item.station):
        return Inspection.objects.create(
            item=item, inspected_on=inspected_on, is_safe=is_safe, remarks=remarks,
            recorded_at=at, recorded_by=by,
        )  # fmt: skip


def withdraw_inspection(*, inspection: Inspection, by: Person, at: datetime, reason: str) -> None:
    """Withdraw an inspection; the one before it then counts."""
    station = inspection.item.station
    _withdraw(inspection, _("withdrew an inspection"), station=station, by=by, at=at, reason=reason)


def change_intervals(
    *,
    row: models.Model,
    values: Mapping[str, int | None],
    by: Person | None,
    at: datetime,
    reason: str = "",
) -> DueChange:
    """Change intervals of a station, instrument, kind, safety item or of the agency.

    Says how many items were due before and are due after. Refuses at its field an interval of zero.
    """
    for name, value in values.items():
        if name not in INTERVALS[type(row)]:
            raise ValueError(f"{name} is no interval of {row._meta.label}.")
        if value == 0:
            text = _("An interval is at least 1; left empty, the next rule holds.")
            raise Refusal(text, field=name)
    filters = _concerned(row)
    station = row if isinstance(row, Station) else getattr(row, "station", None)
    with open_act(_("changed intervals"), by=by, at=at, reason=reason, station=station):
        before = work_list.number_due(at, filters=filters)
        stored: Any = type(row)._default_manager.select_for_update().get(pk=row.pk)
        if isinstance(stored, Station):
            claim_version(stored, version=stored.version)
        for name, value in values.items():
            setattr(stored, name, value)
        stored.save()
        return DueChange(before, work_list.number_due(at, filters=filters))


def try_intervals(
    *, row: models.Model, values: Mapping[str, int | None], at: datetime
) -> DueChange:
    """Say what a change of intervals would make due, and change nothing."""
    with transaction.atomic():
        change = change_intervals(row=row, values=values, by=None, at=at)
        transaction.set_rollback(True)
    return change


def _concerned(row: models.Model) -> Filters:
    """Return which part of the list an interval speaks of."""
    if isinstance(row, Station):
        return Filters(station=row.pk)
    if isinstance(row, SafetyItem):
        return Filters(station=row.station_id)
    if isinstance(row, Instrument):
        return Filters(instrument=row.pk)
    return Filters()


def _withdraw(
    row: Any, verb: str, *, station: Station | None, by: Person, at: datetime, reason: str
) -> None:
    why = required_reason(reason)
    with open_act(verb, by=by, at=at, reason=why, station=station):
        stored = type(row).objects.select_for_update().get(pk=row.pk)
        if not stored.stands:
            raise Refusal(_("This is withdrawn already."))
        stored.withdrawn_at, stored.withdrawn_by, stored.withdrawn_reason = at, by, why
        stored.save()
