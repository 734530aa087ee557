"""Generate a network of any size with records and ratings: from a seed, by the quick path.

No file, no act, no history: rows are created in bulk and readings packed at once. What a network
needs for tests of growth beside its records (visits, gaugings, instruments) is in bulk_network.
"""

from collections.abc import Callable, Sequence
from dataclasses import dataclass
from datetime import UTC, datetime
from typing import Any

import numpy as np
from django.db import transaction
from django.db.models import Model
from django.utils.translation import gettext as _

from network.models import (
    Curve,
    CurveSegment,
    Office,
    OperationPeriod,
    Person,
    RatingPeriod,
    SensorSetting,
    Series,
    Station,
)
from network.numerics.records.readings import Readings
from network.numerics.synthetic.basin import Weather, make_weather
from network.numerics.synthetic.station import SyntheticStation, make_station
from network.services import blocks, setting_up
from network.services.acts import Refusal

LAST_YEAR = 2024
BATCH = 20  # stations in memory at once: a year of one is 0.5 MB
PREFIX = "S-"  # of the codes that make_station gives
OFFICE, MAKER = "Generated network", "generator"

Tell = Callable[[int, int], None]  # stations done, of how many


@dataclass(frozen=True)
class _Signed:
    """Who made the rows and when the network begins."""

    by: Person
    at: datetime
    office: Office

    @property
    def recorded(self) -> dict[str, Any]:
        return {"recorded_by": self.by, "recorded_at": self.at}


def generate(*, stations: int, years: int, seed: int, tell: Tell = lambda _n, _of: None) -> int:
    """Make stations 1 to `stations` with `years` calendar years of 15-minute stage up to 2024.

    Deterministic for (seed, years); stations that are there already are kept, so that a network
    can grow. Returns how many were made. Refuses a database that holds real stations.
    """
    if stations < 1 or years < 1:
        raise Refusal(_("A network has at least one station and one year."))
    if Station.objects.exclude(code__startswith=PREFIX).exists():
        raise Refusal(_("This database holds real stations; generate into an empty one."))
    start, end = (
        datetime(LAST_YEAR + 1 - years, 1, 1, tzinfo=UTC),
        datetime(LAST_YEAR + 1, 1, 1, tzinfo=UTC),
    )
    signed = _signed(start)
    weather = make_weather(seed=seed, start_s=int(start.timestamp()), end_s=int(end.timestamp()))
    first = Station.objects.count() + 1
    for begin in range(first, stations + 1, BATCH):
        numbers = range(begin, min(begin + BATCH, stations + 1))
        _make_batch(numbers, weather=weather, seed=seed, signed=signed)
        tell(numbers[-1], stations)
    return max(stations + 1 - first, 0)


def _signed(at: datetime) -> _Signed:
    """Return office and maker of the rows, made where missing; the maker cannot log in."""
    office = Office.objects.filter(name=OFFICE).first() or setting_up.open_office(
        name=OFFICE, by=None, at=at
    )
    by, _made = Person.objects.get_or_create(username=MAKER, defaults={"is_active": False})
    return _Signed(by, at, office)


@transaction.atomic
def _make_batch(numbers: Sequence[int], *, weather: Weather, seed: int, signed: _Signed) -> None:
    start_s = int(signed.at.timestamp())
    made = [make_station(n, weather=weather, seed=seed, start_s=start_s) for n in numbers]
    stations = _keep(_station(each, signed) for each in made)
    opened = signed.at.date()
    _keep(OperationPeriod(station=station, opened_on=opened) for station in stations)
    series = _keep(Series(station=s, label="Recorder", is_primary=True) for s in stations)
    _keep(
        SensorSetting(series=s, effective_from=signed.at, reason="generated", **signed.recorded)
        for s in series
    )
    _make_ratings(made, stations, signed)
    _keep(
        block
        for one, each in zip(series, made, strict=True)
        for block in blocks.packed(one, blocks.by_month(_readings(each)))
    )


def _station(made: SyntheticStation, signed: _Signed) -> Station:
    return Station(
        code=made.code,
        name=f"Ford {made.code.removeprefix(PREFIX)}",
        river="Generated",
        latitude_deg=made.latitude_deg,
        longitude_deg=made.longitude_deg,
        catchment_km2=made.catchment.area_km2,
        office=signed.office,
    )


def _make_ratings(
    made: Sequence[SyntheticStation], stations: Sequence[Station], signed: _Signed
) -> None:
    curves = _keep(
        Curve(
            station=station,
            number="1",
            lowest_use_m=each.curve.lowest_use_m,
            highest_use_m=each.curve.highest_use_m,
            reason="generated",
            state=Curve.State.APPROVED,
            approved_by=signed.by,
            approved_at=signed.at,
            **signed.recorded,
        )
        for station, each in zip(stations, made, strict=True)
    )
    _keep(
        CurveSegment(curve=curve, **vars(segment))
        for curve, each in zip(curves, made, strict=True)
        for segment in each.curve.segments
    )
    _keep(
        RatingPeriod(
            station=curve.station,
            curve=curve,
            effective_from=signed.at,
            reason="generated",
            **signed.recorded,
        )
        for curve in curves
    )


def _readings(made: SyntheticStation) -> Readings:
    """The last reading is the first of the next year: it stays out."""
    return Readings(made.time_s[:-1], made.stage_m[:-1], np.zeros(len(made.time_s) - 1, np.uint8))


def _keep(rows: Any) -> list[Any]:
    unsaved: list[Model] = list(rows)
    return type(unsaved[0])._default_manager.bulk_create(unsaved, batch_size=2_000)
