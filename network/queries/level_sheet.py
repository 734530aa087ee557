"""A level check as written in the book: from a form while it is typed, or from its stored rows."""

from dataclasses import dataclass
from datetime import datetime

from network.models import (
    Benchmark,
    Instrument,
    LevelCheck,
    PegTest,
    Person,
    Sight,
    StaffPlate,
    Station,
)


@dataclass(frozen=True, kw_only=True)
class PegRow:
    """A peg test: midway between the pegs A and B, then close to A; readings in metres."""

    distance_m: float
    middle_a_m: float
    middle_b_m: float
    near_a_m: float
    near_b_m: float


@dataclass(frozen=True, kw_only=True)
class SightRow:
    """One line of the book. On a plate the graduation is that of the mark under the staff,
    0 where the level read the plate itself."""

    point: str  # a Sight.Point
    benchmark: Benchmark | None = None
    plate: StaffPlate | None = None
    graduation_m: float | None = None
    backsight_m: float | None = None
    intermediate_m: float | None = None
    foresight_m: float | None = None
    remark: str = ""


@dataclass(frozen=True, kw_only=True)
class LevelSheet:
    """Everything one run of levels was booked with."""

    station: Station
    levelled_at: datetime
    party: tuple[Person, ...] = ()
    instrument: Instrument | None = None
    remarks: str = ""
    peg: PegRow | None = None
    sights: tuple[SightRow, ...] = ()


def sheet_of(check: LevelCheck) -> LevelSheet:
    """Return a stored level check as a sheet."""
    peg = PegTest.objects.filter(level_check=check).first()
    return LevelSheet(
        station=check.station,
        levelled_at=check.levelled_at,
        party=tuple(check.party.all()),
        instrument=check.instrument,
        remarks=check.remarks,
        peg=PegRow(**{n: getattr(peg, n) for n in PegRow.__annotations__}) if peg else None,
        sights=tuple(
            SightRow(**{name: getattr(row, name) for name in SightRow.__annotations__})
            for row in Sight.objects.filter(level_check=check).select_related("benchmark", "plate")
        ),
    )
