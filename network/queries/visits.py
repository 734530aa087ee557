"""Visits: what a new one starts with, what the readings mean, what looks wrong with a sheet."""

from collections.abc import Iterator
from dataclasses import dataclass
from datetime import datetime, timedelta
from itertools import combinations

from django.utils.translation import gettext as _

from network.models import Deployment, Instrument, Person, Series, Station, Visit, WorkLeft
from network.numerics.levels import plates as kernel
from network.queries import gauges
from network.queries.sentences import said
from network.queries.visit_sheet import CheckRow, ReadingRow, VisitSheet
from network.queries.working_rules import rules

TOGETHER = timedelta(minutes=5)  # plates read within it were read together
LONG = timedelta(hours=14)
WEAK_BATTERY_V = 11.5  # a 12 V battery below it is nearly flat (common practice)
FAST_CLOCK_S = 60


@dataclass(frozen=True)
class Finding:
    """What looks wrong: the field meant, as `readings-1-reading_m` (rows from 0), and why."""

    field: str
    sentence: str


@dataclass(frozen=True)
class ReadStage:
    """A reading of a sheet and the stage it gives, m above the station zero."""

    reading: ReadingRow
    stage_m: float | None


def start_sheet(station: Station, *, by: Person, at: datetime) -> VisitSheet:
    """Start a visit with what is usual there: plate, recorder, instruments, the person asking."""
    usual = [then.plate for then in gauges.plates_in_service(station, at) if then.plate.is_usual]
    series = Series.objects.filter(station=station).exclude(kind=Series.Kind.OBSERVER)
    return VisitSheet(
        station=station,
        arrived_at=at,
        party=(by,),
        instruments=tuple(usual_instruments(station)),
        readings=tuple(ReadingRow(read_at=at, plate=plate) for plate in usual),
        recorder_checks=tuple(
            CheckRow(series=row, checked_at=at) for row in series.filter(is_primary=True)
        ),
    )


def usual_instruments(station: Station) -> list[Instrument]:
    """Return the instruments of the last visit that are still in service."""
    last = Visit.objects.filter(station=station).order_by("-arrived_at").first()
    if last is None:
        return []
    return list(last.instruments.filter(status=Instrument.Status.IN_SERVICE))


def work_left(station: Station) -> list[WorkLeft]:
    """Return the work earlier visits left that nobody has done yet, the oldest first."""
    rows = WorkLeft.objects.filter(visit__station=station, done_at__isnull=True)
    return list(rows.select_related("visit").order_by("visit__arrived_at", "pk"))


def recorders_standing(station: Station, instant: datetime) -> list[Deployment]:
    """Return which recorder feeds which series at an instant."""
    rows = Deployment.objects.filter(series__station=station, installed_at__lte=instant)
    rows = rows.exclude(removed_at__lte=instant)
    return list(rows.select_related("series", "instrument").order_by("series__label"))


def stages(sheet: VisitSheet) -> list[ReadStage]:
    """Return the readings of a sheet with their stages."""
    found = gauges.stages_m(sheet.readings)
    return [ReadStage(row, stage_m) for row, stage_m in zip(sheet.readings, found, strict=True)]


def findings(sheet: VisitSheet, *, at: datetime) -> list[Finding]:
    """Find what looks wrong with a visit, finished or not; nothing here forbids saving it."""
    return [
        *_of_times(sheet, at=at),
        *_of_readings(sheet),
        *_of_plates_together(sheet),
        *_of_checks(sheet),
    ]


def _of_times(sheet: VisitSheet, *, at: datetime) -> Iterator[Finding]:
    if sheet.arrived_at > at:
        yield Finding("arrived_at", _("The visit lies in the future; is the date right?"))
    if sheet.departed_at and sheet.departed_at < sheet.arrived_at:
        yield Finding("departed_at", _("The party departs before it arrived."))
    elif sheet.departed_at and sheet.departed_at - sheet.arrived_at > LONG:
        hours = (sheet.departed_at - sheet.arrived_at).total_seconds() / 3600
        text = _("The visit lasts %(hours).0f hours; are day and time of departure right?")
        yield Finding("departed_at", text % {"hours": hours})
    times = [("readings", "read_at", [row.read_at for row in sheet.readings])]
    times += [("recorder_checks", "checked_at", [c.checked_at for c in sheet.recorder_checks])]
    for rows, name, instants in times:
        for number, instant in enumerate(instants):
            if instant < sheet.arrived_at - TOGETHER or (
                sheet.departed_at and instant > sheet.departed_at + TOGETHER
            ):
                yield Finding(
                    f"{rows}-{number}-{name}",
                    _("Row %(row)d: this time lies outside the visit.") % {"row": number + 1},
                )


def _of_readings(sheet: VisitSheet) -> Iterator[Finding]:
    for number, found in enumerate(stages(sheet)):
        row, field = found.reading, f"readings-{number}-reading_m"
        if row.reading_m is None:
            continue
        off = _off_plate(row)
        if off:
            yield Finding(field, off)
        if found.stage_m is None:
            text = _("Row %(row)d: this gauge has no zero in force, so no stage follows.")
            yield Finding(f"readings-{number}-plate", text % {"row": number + 1})
        elif found.stage_m < 0:
            text = _("Row %(row)d: the stage %(stage).3f m is negative; is the reading right?")
            yield Finding(field, text % {"row": number + 1, "stage": found.stage_m})


def _off_plate(row: ReadingRow) -> str:
    if row.plate is None or row.reading_m is None:
        return ""
    plate = kernel.Plate(row.plate.label, row.plate.lowest_m, row.plate.highest_m, 0.0)
    found = kernel.reading_finding(plate, row.reading_m)
    return said(found.sentence) if found else ""


def _of_plates_together(sheet: VisitSheet) -> Iterator[Finding]:
    limit_m = rules().plates_agree_mm / 1000
    read = [
        (number, found)
        for number, found in enumerate(stages(sheet))
        if found.reading.plate is not None and found.stage_m is not None
    ]
    for (_n, one), (number, other) in combinations(read, 2):
        same = one.reading.plate == other.reading.plate
        if same or abs(one.reading.read_at - other.reading.read_at) > TOGETHER:
            continue
        finding = kernel.pair_finding(_placed(one), _placed(other), limit_m=limit_m)
        if finding:
            yield Finding(f"readings-{number}-reading_m", said(finding.sentence))


def _placed(found: ReadStage) -> tuple[kernel.Plate, float]:
    plate, reading_m = found.reading.plate, found.reading.reading_m
    assert plate is not None
    assert reading_m is not None
    assert found.stage_m is not None
    zero_m = found.stage_m - reading_m
    return kernel.Plate(plate.label, plate.lowest_m, plate.highest_m, zero_m), reading_m


def _of_checks(sheet: VisitSheet) -> Iterator[Finding]:
    for number, row in enumerate(sheet.recorder_checks):
        if row.battery_v is not None and row.battery_v < WEAK_BATTERY_V:
            text = _("Row %(row)d: the battery stands at %(volts).1f V; it is nearly flat.")
            yield Finding(
                f"recorder_checks-{number}-battery_v",
                text % {"row": number + 1, "volts": row.battery_v},
            )
        if row.clock_error_s is not None and abs(row.clock_error_s) > FAST_CLOCK_S:
            text = _("Row %(row)d: the recorder's clock is %(seconds)d s off; was it set?")
            yield Finding(
                f"recorder_checks-{number}-clock_error_s",
                text % {"row": number + 1, "seconds": row.clock_error_s},
            )
