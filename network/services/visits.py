"""Acts upon visits: saved as written, checked, reopened; work that was left is done."""

from collections.abc import Sequence
from datetime import datetime
from typing import Any
from uuid import UUID

from django.utils.translation import gettext as _

from network.models import (
    Person,
    RecorderCheck,
    SpinTest,
    Visit,
    VisitReading,
    WorkLeft,
)
from network.queries.visit_sheet import COLUMNS, VisitSheet, columns_of
from network.services import field_books
from network.services.acts import (
    Refusal,
    claim_version,
    lock_station,
    open_act,
    required_reason,
)


def save_visit(
    *,
    form_id: UUID,
    sheet: VisitSheet,
    by: Person,
    at: datetime,
    version: int | None = None,
    work_done: Sequence[WorkLeft] = (),
) -> Visit:
    """Save a visit as written, finished or not; a form sent twice is saved once.

    version: the one the form was opened with, None for a form opened empty. work_done: what
    earlier visits had left and this one did. Refuses, at the field, a date ahead of the clock, a
    departure before the arrival, and rows that cannot be.
    """
    _refuse_times(sheet, at=at)
    with open_act(_("saved a visit"), by=by, at=at, station=sheet.station):
        lock_station(sheet.station)
        visit = field_books.open_book(
            Visit(form_id=form_id, station=sheet.station), version=version, by=by, at=at
        )
        for name in COLUMNS:
            setattr(visit, name, getattr(sheet, name))
        field_books.save_row(visit)
        visit.party.set(sheet.party)
        visit.instruments.set(sheet.instruments)
        _write_rows(visit, sheet)
        for work in work_done:
            finish_work(work=work, by=by, at=at)
    return visit


def check_visit(*, visit: Visit, by: Person, at: datetime) -> Visit:
    """Check a visit: it then changes only after it is reopened with a reason."""
    with open_act(_("checked a visit"), by=by, at=at, station=visit.station):
        row = Visit.objects.get(pk=visit.pk)
        field_books.refuse_unless_draft(row)
        if row.departed_at is None:
            raise Refusal(_("Give the time of departure first."), field="departed_at")
        claim_version(row, version=row.version)
        row.state, row.checked_at, row.checked_by = Visit.State.CHECKED, at, by
        row.save()
    return row


def reopen_visit(*, visit: Visit, by: Person, at: datetime, reason: str) -> Visit:
    """Make a checked visit a draft again."""
    why = required_reason(reason)
    with open_act(_("reopened a visit"), by=by, at=at, reason=why, station=visit.station):
        row = Visit.objects.get(pk=visit.pk)
        if row.state != Visit.State.CHECKED:
            raise Refusal(_("This is a draft already."))
        claim_version(row, version=row.version)
        row.state, row.checked_at, row.checked_by = Visit.State.DRAFT, None, None
        row.save()
    return row


def finish_work(*, work: WorkLeft, by: Person, at: datetime) -> WorkLeft:
    """Say that work a visit left is done."""
    station = work.visit.station
    with open_act(_("did work that was left"), by=by, at=at, station=station):
        row = WorkLeft.objects.get(pk=work.pk)
        if row.done_at is not None:
            raise Refusal(_("This is already done."))
        row.done_at, row.done_by = at, by
        row.save()
    return row


def _write_rows(visit: Visit, sheet: VisitSheet) -> None:
    called: tuple[tuple[str, type, Sequence[Any]], ...] = (
        ("readings", VisitReading, sheet.readings),
        ("recorder_checks", RecorderCheck, sheet.recorder_checks),
        ("spin_tests", SpinTest, sheet.spin_tests),
        ("work_left", WorkLeft, sheet.work_left),
    )
    for name, model, rows in called:
        typed = [(row.key, columns_of(row)) for row in rows]
        field_books.keep_in_step(model, {"visit": visit}, typed, called=name)


def _refuse_times(sheet: VisitSheet, *, at: datetime) -> None:
    field_books.refuse_future(sheet.arrived_at, at=at, field="arrived_at")
    if sheet.departed_at is not None:
        field_books.refuse_future(sheet.departed_at, at=at, field="departed_at")
        if sheet.departed_at < sheet.arrived_at:
            raise Refusal(_("The party departs before it arrived."), field="departed_at")
    rows: list[tuple[str, str, Sequence[Any]]] = [("readings", "read_at", sheet.readings)]
    rows += [("recorder_checks", "checked_at", sheet.recorder_checks)]
    for called, name, typed in rows:
        for number, row in enumerate(typed):
            field = f"{called}-{number}-{name}"
            field_books.refuse_future(getattr(row, name), at=at, field=field)
