"""What stands on a field sheet: the stop, its station's gauges, last readings, gaugings, rating."""

from collections.abc import Iterable
from dataclasses import dataclass
from datetime import date, datetime

import numpy as np

from network.models import (
    Gauging,
    OtherGauge,
    OtherGaugeZero,
    Round,
    Station,
    StationYear,
    Stop,
    VisitReading,
)
from network.numerics.arrays import Floats
from network.numerics.marks import Mark
from network.numerics.ratings import curves as kernel
from network.queries import (
    clock,
    curves,
    gauges,
    in_force,
    next_gaugings,
    rounds,
    station_facts,
    station_years,
)
from network.queries.gauges import PlateThen
from network.queries.next_gaugings import NextGauging
from network.queries.working_rules import rules
from reports.content.drawings import location_sketch
from reports.figures.inputs import LocationSketch

LAST_READINGS, LAST_GAUGINGS, RATING_ROWS, COLUMNS = 5, 5, 24, 4
LIKELY_PERCENT = (5, 95)  # likely stages: what the last year on record held on 90 % of its days


@dataclass(frozen=True)
class OtherThen:
    """Another gauge with its zero above the station zero."""

    gauge: OtherGauge
    zero_m: float | None


@dataclass(frozen=True)
class LastReading:
    """A reading of an earlier visit and its stage."""

    reading: VisitReading
    stage_m: float | None


@dataclass(frozen=True)
class RatedStage:
    """A row of the rating table; likely: within what the last year held most of the time."""

    stage_m: float
    flow_m3s: float | None
    u95_percent: float | None
    is_extrapolated: bool
    is_likely: bool


@dataclass(frozen=True, eq=False)
class StopSheet:
    """One page."""

    number: int
    of: int
    stop: Stop
    station: Station
    km: float | None
    problem: str
    sketch: LocationSketch
    plates: tuple[PlateThen, ...]
    others: tuple[OtherThen, ...]
    readings: tuple[LastReading, ...]
    gaugings: tuple[Gauging, ...]
    version: str
    rating: tuple[RatedStage, ...]
    band: str

    @property
    def rating_columns(self) -> list[tuple[RatedStage, ...]]:
        """The rating table broken into columns."""
        rows = -(-len(self.rating) // COLUMNS)
        starts = range(0, len(self.rating), rows or 1)
        return [self.rating[start : start + rows] for start in starts]

    @property
    def has_band(self) -> bool:
        """Whether the rating states its uncertainty."""
        return any(row.u95_percent is not None for row in self.rating)


@dataclass(frozen=True, eq=False)
class RoundSheets:
    """All pages of a round."""

    plan: Round
    stops: tuple[StopSheet, ...]
    wading_product_m2s: float
    printed_on: date
    problems: tuple[str, ...]
    left_out: tuple[Stop, ...]


def sheets_of(plan: Round, *, at: datetime) -> RoundSheets:
    """Return the field sheets of a round as things stand at an instant."""
    found = rounds.sheet(plan)
    bands = next_gaugings.of_many([leg.stop.station for leg in found.legs], at=at)
    stops = tuple(
        _stop_sheet(number, leg, of=len(found.legs), at=at, band=bands.get(leg.stop.station_id))
        for number, leg in enumerate(found.legs, 1)
    )
    return RoundSheets(
        plan=plan,
        stops=stops,
        wading_product_m2s=rules().wading_product_m2s,
        printed_on=clock.record_day(at, of=clock.agency()),
        problems=found.problems,
        left_out=found.left_out,
    )


def _stop_sheet(
    number: int, leg: rounds.Leg, *, of: int, at: datetime, band: NextGauging | None
) -> StopSheet:
    station = leg.stop.station
    facts = station_facts.at(station, at)
    gaugings = Gauging.objects.filter(station=station, started_at__lte=at)
    gaugings = gaugings.exclude(state=Gauging.State.DRAFT)
    return StopSheet(
        number=number,
        of=of,
        stop=leg.stop,
        station=station,
        km=leg.km,
        problem=leg.problem,
        sketch=location_sketch(station),
        plates=tuple(gauges.plates_in_service(station, at)),
        others=tuple(_others(station, at)),
        readings=tuple(_last_readings(station, at)),
        gaugings=tuple(gaugings.order_by("-started_at")[:LAST_GAUGINGS]),
        version=facts.version,
        rating=tuple(_rating(station, facts, at)),
        band=band.sentence() if band else "",
    )


def _others(station: Station, at: datetime) -> Iterable[OtherThen]:
    for gauge in gauges.other_gauges_in_service(station, at):
        zero = in_force.at(OtherGaugeZero.objects.filter(gauge=gauge), at)
        yield OtherThen(gauge, zero.zero_m if zero else None)


def _last_readings(station: Station, at: datetime) -> list[LastReading]:
    rows = VisitReading.objects.filter(
        visit__station=station, reading_m__isnull=False, read_at__lte=at
    )
    last = list(rows.select_related("plate", "other_gauge").order_by("-read_at")[:LAST_READINGS])
    stages = gauges.stages_m(last)
    return [LastReading(row, stage_m) for row, stage_m in zip(last, stages, strict=True)]


def _rating(
    station: Station, facts: station_facts.StationFacts, at: datetime
) -> Iterable[RatedStage]:
    """Yield the rating in force with its shift, at even stages over its use."""
    periods = curves.period_rows(station, at, at)
    row = periods[-1].curve if periods else None
    if row is None:
        return
    curve = curves.kernel_curve(row)
    likely = _likely(station)
    for stage_m in _table_stages(curve, likely):
        flow_m3s, marks = kernel.flow(curve, np.array([stage_m]))
        yield RatedStage(
            stage_m=float(stage_m),
            flow_m3s=facts.rated_m3s(float(stage_m)),
            u95_percent=facts.rated_u95_percent(float(stage_m)) if facts.band else None,
            is_extrapolated=bool(marks[0] & Mark.EXTRAPOLATED) and not np.isnan(flow_m3s[0]),
            is_likely=likely is not None and likely[0] <= stage_m <= likely[1],
        )


def _table_stages(curve: kernel.Curve, likely: tuple[float, float] | None) -> Floats:
    """Return round stages, closer together where the water is likely to stand."""
    low, high = curve.allowed_m
    every = _round_step((high - low) / (RATING_ROWS / 2))
    coarse = np.arange(np.ceil(low / every), np.floor(high / every) + 1) * every
    if likely is None:
        return coarse
    from_m, to_m = max(likely[0], low), min(likely[1], high)
    fine = _round_step((to_m - from_m) / (RATING_ROWS / 2)) if to_m > from_m else every
    close = np.arange(np.floor(from_m / fine), np.ceil(to_m / fine) + 1) * fine
    outside = (coarse < from_m - every / 2) | (coarse > to_m + every / 2)
    stages = np.concatenate([coarse[outside], close[(close >= low) & (close <= high)]])
    return np.unique(np.round(stages, 3))


def _round_step(rough_m: float) -> float:
    """Return the next of 1, 2 or 5 cm, dm or m above a rough step."""
    steps = [size * tens for tens in (0.01, 0.1, 1.0, 10.0) for size in (1, 2, 5)]
    return next((step for step in steps if step >= rough_m), steps[-1])


def _likely(station: Station) -> tuple[float, float] | None:
    """Return the stages between which the last year on record mostly stood."""
    newest = StationYear.objects.filter(station=station).order_by("first_day").last()
    if newest is None:
        return None
    stage_m = station_years.unpack(bytes(newest.data), first_day=newest.first_day).stage_m
    known = stage_m[~np.isnan(stage_m)]
    if not len(known):
        return None
    low, high = np.percentile(known, LIKELY_PERCENT)
    return float(low), float(high)
