"""A made-up network of any size for the benchmark and for tests of growth: rows without acts."""

import random
from collections.abc import Callable, Iterator
from dataclasses import dataclass
from datetime import UTC, date, datetime, timedelta
from typing import Any

from django.db import transaction
from django.utils.translation import gettext as _

from network.models import (
    Block,
    Calibration,
    Gauging,
    Inspection,
    Instrument,
    LevelCheck,
    MeterPair,
    Office,
    OperationPeriod,
    Person,
    RecordReview,
    SafetyItem,
    Series,
    Station,
    Visit,
    WorkLeft,
)
from network.services.acts import Refusal

DAY = timedelta(days=1)
BATCH = 2_000


@dataclass(frozen=True)
class Size:
    """How many of each; gaugings and visits are spread over the stations."""

    stations: int = 2_000
    instruments: int = 6_000
    visits: int = 100_000
    gaugings: int = 50_000
    offices: int = 8


@dataclass(frozen=True)
class _Making:
    """What every row needs: size, chance, who and when."""

    size: Size
    chance: random.Random
    by: Person
    at: datetime
    first: int

    def ago(self, days: float) -> datetime:
        """Return the instant some days before the present."""
        return self.at - days * DAY

    def recorded(self, at: datetime) -> dict[str, Any]:
        """Return who recorded a row and when."""
        return {"recorded_at": at, "recorded_by": self.by}


@transaction.atomic
def make(*, size: Size, by: Person, at: datetime, seed: int = 1, first: int = 0) -> None:
    """Fill a database with a network; about every seventh item of work is due.

    first: number of the first station and instrument, for a network that grows. Refuses a database
    that holds more stations than that.
    """
    if Station.objects.count() > first:
        raise Refusal(_("This database holds stations; generate into an empty one."))
    making = _Making(size, random.Random(seed), by, at.astimezone(UTC), first)
    offices = _keep(
        Office, (Office(name=f"Office {first:04d}-{n:02d}") for n in range(size.offices))
    )
    stations = _stations(making, offices)
    _instruments(making, offices)
    _visits(making, stations)
    _gaugings(making, stations)
    _records(making, stations)
    _safety(making, stations)


def _keep(model: Any, rows: Iterator[Any]) -> list[Any]:
    return model.objects.bulk_create(rows, batch_size=BATCH)


def _stations(making: _Making, offices: list[Office]) -> list[Station]:
    stations = _keep(
        Station,
        (
            Station(
                code=f"G-{making.first + n:04d}",
                name=f"Ford {n}",
                river=f"River {n % 97}",
                latitude_deg=47 + making.chance.random(),
                longitude_deg=11 + 3 * making.chance.random(),
                office=offices[n % len(offices)],
                visit_interval_days=making.chance.choice([None, 28, 42, 90]),
            )
            for n in range(making.size.stations)
        ),
    )
    opened = date(2000, 1, 1)
    _keep(OperationPeriod, (OperationPeriod(station=s, opened_on=opened) for s in stations))
    return stations


def _instruments(making: _Making, offices: list[Office]) -> None:
    """Make a third of the instruments bodies and rotors in pairs, the rest recorders."""
    count, kinds = making.size.instruments, Instrument.Kind

    def one(n: int, kind: str, **more: Any) -> Instrument:
        return Instrument(
            kind=kind,
            serial=f"{making.first:04d}-{n:05d}",
            office=offices[n % len(offices)],
            **more,
        )

    bodies = _keep(Instrument, (one(n, kinds.METER_BODY) for n in range(count // 6)))
    rotors = _keep(Instrument, (one(n, kinds.METER_ROTOR) for n in range(count // 6)))
    rest = range(count - len(bodies) - len(rotors))
    others = _keep(Instrument, (one(n, kinds.PRESSURE, interval_months=36) for n in rest))
    both = zip(bodies, rotors, strict=True)
    pairs = _keep(MeterPair, (MeterPair(body=body, rotor=rotor) for body, rotor in both))

    def calibrated(days: int, **owner: Any) -> Calibration:
        at = making.ago(days)
        return Calibration(effective_from=at, **making.recorded(at), **owner)

    _keep(Calibration, (calibrated(making.chance.randrange(420), pair=pair) for pair in pairs))
    _keep(Calibration, (calibrated(500 + making.chance.randrange(300), pair=p) for p in pairs))
    ages = (making.chance.randrange(1_250) for _other in others)
    _keep(Calibration, (calibrated(a, instrument=i) for a, i in zip(ages, others, strict=True)))


def _visits(making: _Making, stations: list[Station]) -> None:
    each = max(making.size.visits // len(stations), 1)

    def visits() -> Iterator[Visit]:
        for station in stations:
            latest = making.chance.randrange(1, 50)
            for n in range(each):
                at = making.ago(latest + 42 * n)
                state = Visit.State.CHECKED if n or latest % 9 else Visit.State.DRAFT
                yield Visit(station=station, arrived_at=at, departed_at=at + DAY / 12, state=state,
                            **_checked(making, state, at), **making.recorded(at))  # fmt: skip

    made = _keep(Visit, visits())
    _keep(WorkLeft, (WorkLeft(visit=v, text="Paint the plates.") for v in made[:: 40 * each]))


def _gaugings(making: _Making, stations: list[Station]) -> None:
    each = max(making.size.gaugings // len(stations), 1)
    pairs = list(MeterPair.objects.all())

    def gaugings() -> Iterator[Gauging]:
        for number, station in enumerate(stations):
            latest = making.chance.randrange(1, 70)
            for n in range(each):
                at = making.ago(latest + 61 * n)
                apart = making.chance.gauss(0, 4)
                yield Gauging(
                    station=station, started_at=at, ended_at=at + DAY / 12, state="checked",
                    pair=pairs[(number + n) % len(pairs)] if pairs else None,
                    signed_at=at, signed_by=making.by, checked_at=at, checked_by=making.by,
                    discharge_m3s=1.0, signed_stage_m=0.5, u95_percent=6.0,
                    signed_deviation_percent=apart, **making.recorded(at),
                )  # fmt: skip

    _keep(Gauging, gaugings())


def _records(making: _Making, stations: list[Station]) -> None:
    """Give every station a primary series of two blocks, level checks and a review."""
    series = _keep(Series, (Series(station=s, label="Recorder", is_primary=True) for s in stations))

    def blocks() -> Iterator[Block]:
        for one in series:
            last = making.ago(making.chance.randrange(1, 50))
            for back in (400, 0):
                at = last - back * DAY
                yield Block(series=one, month=at.date().replace(day=1), data=b"", count=1,
                            first_at=at, last_at=at)  # fmt: skip

    _keep(Block, blocks())
    _of_each(making, stations, lambda s, at: LevelCheck(
        station=s, levelled_at=at, state="checked", checked_at=at, checked_by=making.by,
        **making.recorded(at)), within=1_250, repeats=5)  # fmt: skip
    _of_each(making, stations, lambda s, at: RecordReview(
        station=s, reviewed_through=at.date(), **making.recorded(at)),
        within=140, repeats=2)  # fmt: skip


def _of_each(
    making: _Making,
    stations: list[Station],
    row: Callable[[Station, datetime], Any],
    *,
    within: int,
    repeats: int,
) -> None:
    rows = [
        row(station, making.ago(days + within * n))
        for station in stations
        for days in [making.chance.randrange(1, within)]
        for n in range(repeats)
    ]
    _keep(type(rows[0]), iter(rows))


def _safety(making: _Making, stations: list[Station]) -> None:
    kind = SafetyItem.Kind.CABLEWAY
    items = _keep(SafetyItem, (SafetyItem(station=s, kind=kind, label="1") for s in stations[::2]))
    ages = [making.chance.randrange(1, 420) for _item in items]
    _keep(
        Inspection,
        (
            Inspection(item=item, inspected_on=at.date(), is_safe=True, **making.recorded(at))
            for item, age in zip(items, ages, strict=True)
            for at in (making.ago(age), making.ago(age + 365))
        ),
    )


def _checked(making: _Making, state: str, at: datetime) -> dict[str, Any]:
    if state != Visit.State.CHECKED:
        return {}
    return {"checked_at": at, "checked_by": making.by}
