"""Acts upon level checks: saved as booked, checked, reopened, adopted as new zeros."""

from collections.abc import Mapping, Sequence
from datetime import datetime
from typing import Any
from uuid import UUID

from django.db.models import Q
from django.utils.translation import gettext as _

from network.models import (
    Benchmark,
    BenchmarkElevation,
    LevelCheck,
    PegTest,
    Person,
    PlateZero,
    Sight,
    StaffPlate,
)
from network.queries import levels
from network.queries.level_sheet import LevelSheet
from network.services import benchmarks as marks
from network.services import field_books, gauges
from network.services.acts import (
    Refusal,
    claim_version,
    lock_station,
    open_act,
    required_reason,
)


def save_level_check(
    *, form_id: UUID, sheet: LevelSheet, by: Person, at: datetime, version: int | None = None
) -> LevelCheck:
    """Save a level check as booked, finished or not; a form sent twice is saved once.

    version: the one the form was opened with, None for a form opened empty.
    """
    field_books.refuse_future(sheet.levelled_at, at=at, field="levelled_at")
    with open_act(_("saved a level check"), by=by, at=at, station=sheet.station):
        lock_station(sheet.station)
        check = field_books.open_book(
            LevelCheck(form_id=form_id, station=sheet.station), version=version, by=by, at=at
        )
        check.levelled_at, check.remarks = sheet.levelled_at, sheet.remarks
        check.instrument = sheet.instrument
        field_books.save_row(check)
        check.party.set(sheet.party)
        _write_peg_test(check, sheet)
        _write_sights(check, sheet)
    return check


def check_level_check(*, level_check: LevelCheck, by: Person, at: datetime) -> LevelCheck:
    """Check a level book; refused with the figure when it does not close."""
    with open_act(_("checked a level check"), by=by, at=at, station=level_check.station):
        row = LevelCheck.objects.get(pk=level_check.pk)
        field_books.refuse_unless_draft(row)
        claim_version(row, version=row.version)
        reduction = levels.reduction_of(row)
        if reduction.refusal:
            raise Refusal(reduction.refusal, field=_field_of(reduction))
        row.state, row.checked_at, row.checked_by = LevelCheck.State.CHECKED, at, by
        row.save()
    return row


def reopen_level_check(
    *, level_check: LevelCheck, by: Person, at: datetime, reason: str
) -> LevelCheck:
    """Make a checked level book a draft again; refused while zeros rest on it."""
    station = level_check.station
    with open_act(
        _("reopened a level check"), by=by, at=at, reason=required_reason(reason), station=station
    ):
        row = LevelCheck.objects.get(pk=level_check.pk)
        if row.state != LevelCheck.State.CHECKED:
            raise Refusal(_("This is a draft already."))
        if row.plate_zeros.standing().exists():
            raise Refusal(_("Plate zeros in force rest on this book; withdraw them first."))
        claim_version(row, version=row.version)
        row.state, row.checked_at, row.checked_by = LevelCheck.State.DRAFT, None, None
        row.adopted_at = row.adopted_by = None
        row.save()
    return row


def adopt(
    *,
    level_check: LevelCheck,
    effective_from: datetime,
    by: Person,
    at: datetime,
    reason: str,
    plates: Sequence[StaffPlate] | None = None,
    benchmarks: Sequence[Benchmark] = (),
) -> list[PlateZero]:
    """Let the zeros found hold from an instant on, and elevations found where asked.

    plates: None takes those whose error reaches the tolerance. Refused while the book is a draft,
    does not close, or a later row would take the new zero out of force before the levels were run.
    """
    station = level_check.station
    with open_act(
        _("adopted a level check"), by=by, at=at, reason=required_reason(reason), station=station
    ):
        lock_station(station)
        row = LevelCheck.objects.get(pk=level_check.pk)
        if row.state != LevelCheck.State.CHECKED:
            raise Refusal(_("Check the level book first."))
        reduction = levels.reduction_of(row)
        if reduction.refusal:
            raise Refusal(reduction.refusal)
        signed: dict[str, Any] = {"by": by, "at": at, "reason": reason}
        signed["effective_from"] = effective_from
        zeros = [_adopt_plate(found, row, signed) for found in _chosen_plates(reduction, plates)]
        found_marks = {found.benchmark: found for found in reduction.benchmarks}
        for mark in benchmarks:
            _adopt_benchmark(mark, found_marks.get(mark), row, signed)
        if not zeros and not benchmarks:
            raise Refusal(_("There is nothing to adopt: no plate is off by the tolerance."))
        row.adopted_at, row.adopted_by = at, by
        row.save()
    return zeros


def _chosen_plates(
    reduction: levels.Reduction, plates: Sequence[StaffPlate] | None
) -> list[levels.PlateFound]:
    found = reduction.plates
    if plates is None:
        return [row for row in found if row.error_mm]
    unseen = set(plates) - {row.plate for row in found}
    if unseen:
        raise Refusal(
            _("Plate %(label)s was not sighted.") % {"label": sorted(map(str, unseen))[0]},
            field="plates",
        )
    return [row for row in found if row.plate in plates]


def _adopt_plate(
    found: levels.PlateFound, check: LevelCheck, signed: Mapping[str, Any]
) -> PlateZero:
    later = found.plate.zeros.standing().filter(_between(signed["effective_from"], check))
    if later.exists():
        raise Refusal(
            _("Plate %(label)s has a zero of its own after that instant; withdraw it first.")
            % {"label": found.plate.label},
            field="effective_from",
        )
    # Levels come to a tenth of a millimetre; a zero is no better than its millimetre's tenth.
    zero_m = round(found.found_m, 4)
    return gauges.set_plate_zero(plate=found.plate, zero_m=zero_m, level_check=check, **signed)


def _adopt_benchmark(
    mark: Benchmark,
    found: levels.BenchmarkFound | None,
    check: LevelCheck,
    signed: Mapping[str, Any],
) -> BenchmarkElevation:
    if found is None:
        raise Refusal(
            _("Benchmark %(label)s was not sighted.") % {"label": mark.label}, field="benchmarks"
        )
    if mark.elevations.standing().filter(_between(signed["effective_from"], check)).exists():
        raise Refusal(
            _("Benchmark %(label)s has an elevation of its own after that; withdraw it first.")
            % {"label": mark.label},
            field="effective_from",
        )
    return marks.set_elevation(benchmark=mark, elevation_m=round(found.found_m, 4), **signed)


def _between(effective_from: datetime, check: LevelCheck) -> Q:
    return Q(effective_from__gt=effective_from, effective_from__lte=check.levelled_at)


def _write_peg_test(check: LevelCheck, sheet: LevelSheet) -> None:
    stored = PegTest.objects.filter(level_check=check).first()
    rows = [] if sheet.peg is None else [(stored.pk if stored else None, vars(sheet.peg))]
    field_books.keep_in_step(PegTest, {"level_check": check}, rows, called="peg_test")


def _write_sights(check: LevelCheck, sheet: LevelSheet) -> None:
    """Write the lines over the stored ones in order, so that history shows what changed."""
    stored = list(Sight.objects.filter(level_check=check).values_list("pk", flat=True))
    keys = [*stored, *[None] * len(sheet.sights)]
    rows = [
        (keys[place], {"position": place + 1, **vars(sight)})
        for place, sight in enumerate(sheet.sights)
    ]
    field_books.keep_in_step(Sight, {"level_check": check}, rows, called="sights")


def _field_of(reduction: levels.Reduction) -> str:
    fault = reduction.faults[0] if reduction.faults else None
    return f"sights-{fault.row - 1}-{fault.field}" if fault and fault.row else ""
