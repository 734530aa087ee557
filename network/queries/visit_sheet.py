"""A visit as written on the form: while it is typed, from its stored rows, or newly started."""

from dataclasses import dataclass
from datetime import datetime, timedelta
from typing import Any

from network.models import (
    Instrument,
    MeterPair,
    OtherGauge,
    Person,
    RecorderCheck,
    Series,
    SpinTest,
    StaffPlate,
    Station,
    Visit,
    VisitReading,
    WorkLeft,
)

ONE_DAY, HALF_DAY = timedelta(days=1), timedelta(hours=12)


@dataclass(frozen=True, kw_only=True)
class ReadingRow:
    """One reading of a plate or other gauge; key: that of the stored row it changes."""

    read_at: datetime
    plate: StaffPlate | None = None
    other_gauge: OtherGauge | None = None
    observation: str = str(VisitReading.Observation.READ)
    reading_m: float | None = None
    wave_m: float | None = None
    key: int | None = None


@dataclass(frozen=True, kw_only=True)
class CheckRow:
    """The recorder against the staff; without a staff stage the plate read nearest counts."""

    series: Series
    checked_at: datetime
    found_m: float | None = None
    left_m: float | None = None
    staff_stage_m: float | None = None
    wave_m: float | None = None
    clock_error_s: int | None = None
    battery_v: float | None = None
    gas_kpa: float | None = None
    was_purged: bool = False
    was_downloaded: bool = False
    key: int | None = None


@dataclass(frozen=True, kw_only=True)
class SpinRow:
    """How long a rotor turned freely."""

    pair: MeterPair
    seconds: float
    is_good: bool = True
    key: int | None = None


@dataclass(frozen=True, kw_only=True)
class WorkRow:
    """Work left to do."""

    text: str
    key: int | None = None


@dataclass(frozen=True, kw_only=True)
class VisitSheet:
    """Everything a visit is written down with, but its photographs."""

    station: Station
    arrived_at: datetime
    departed_at: datetime | None = None
    party: tuple[Person, ...] = ()
    is_routine: bool = True
    is_for_gauging: bool = False
    is_for_levels: bool = False
    is_for_repair: bool = False
    is_for_flood: bool = False
    weather: str = ""
    river: str = ""
    control_condition: str = str(Visit.Control.CLEAR)
    instruments: tuple[Instrument, ...] = ()
    work_done: str = ""
    remarks: str = ""
    readings: tuple[ReadingRow, ...] = ()
    recorder_checks: tuple[CheckRow, ...] = ()
    spin_tests: tuple[SpinRow, ...] = ()
    work_left: tuple[WorkRow, ...] = ()


# What of a sheet is columns of the visit itself.
COLUMNS = (
    "arrived_at", "departed_at", "is_routine", "is_for_gauging", "is_for_levels", "is_for_repair",
    "is_for_flood", "weather", "river", "control_condition", "work_done", "remarks",
)  # fmt: skip


def sheet_of(visit: Visit) -> VisitSheet:
    """Return a stored visit as a sheet."""
    readings = VisitReading.objects.filter(visit=visit).select_related("plate", "other_gauge")
    checks = RecorderCheck.objects.filter(visit=visit).select_related("series")
    spins = SpinTest.objects.filter(visit=visit).select_related("pair__body", "pair__rotor")
    return VisitSheet(
        station=visit.station,
        **{name: getattr(visit, name) for name in COLUMNS},
        party=tuple(visit.party.all()),
        instruments=tuple(visit.instruments.all()),
        readings=tuple(_row(ReadingRow, row) for row in readings),
        recorder_checks=tuple(_row(CheckRow, row) for row in checks),
        spin_tests=tuple(_row(SpinRow, row) for row in spins),
        work_left=tuple(_row(WorkRow, row) for row in WorkLeft.objects.filter(visit=visit)),
    )


def across_midnight(instant: datetime, *, arrived_at: datetime) -> datetime:
    """Return the instant meant by a time typed on the day of arrival: after midnight, the next day.

    Only where that still makes a visit of less than half a day; else the time stays as typed.
    """
    later = instant + ONE_DAY
    return later if instant < arrived_at and later - arrived_at < HALF_DAY else instant


def columns_of(row: object) -> dict[str, object]:
    """Return the values of a sheet's row without its key."""
    return {name: value for name, value in vars(row).items() if name != "key"}


def _row(kind: Any, stored: Any) -> Any:
    names = [name for name in kind.__annotations__ if name != "key"]
    return kind(key=stored.pk, **{name: getattr(stored, name) for name in names})
