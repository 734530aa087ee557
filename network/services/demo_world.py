"""Works out the demo network's invented truth: flow, stage, and what the recorders made of it."""

from dataclasses import dataclass
from datetime import date, datetime, time, timedelta

import numpy as np

from network.formats.demo_record_rows import Curve as CurveRow
from network.formats.demo_record_rows import Deployment, Series
from network.formats.demo_record_rows import ShiftTable as ShiftRow
from network.formats.demo_rows import Station
from network.formats.demo_scenario import Scenario
from network.numerics.arrays import Floats, Seconds
from network.numerics.ratings.curves import Curve, Segment, SegmentCurve, TableCurve
from network.numerics.ratings.rating import RatingPeriod, ShiftTable
from network.numerics.synthetic.basin import (
    DAY_S,
    Catchment,
    Spell,
    Storm,
    Weather,
    make_runoff,
    make_weather,
    route,
    stream,
)
from network.numerics.synthetic.record import (
    Fault,
    IceSpell,
    ice_backwater,
    kept,
    raw_values,
    recorder_error,
    recorder_noise,
    stage_of_flow,
)

OBSERVER_HOUR = 7  # on the record clock


@dataclass(frozen=True, eq=False)
class Truth:
    """Flow (m³/s) and stage (m above the zero in force) of one station every 15 minutes."""

    station: Station
    seed: int
    clock_s: int  # record clock ahead of UTC
    time_s: Seconds
    flow_m3s: Floats
    stage_m: Floats

    def flow_at(self, instant: datetime) -> float:
        """Return the flow (m³/s) at an instant."""
        return float(np.interp(instant.timestamp(), self.time_s, self.flow_m3s))

    def stage_at(self, instant: datetime) -> float:
        """Return the stage (m) at an instant, that of the last 15 minutes where a zero moves."""
        return float(np.interp(instant.timestamp(), self.time_s, self.stage_m))


@dataclass(frozen=True, eq=False)
class Record:
    """What one recorder left in one deployment: epoch seconds UTC and raw values (m)."""

    deployment: Deployment | None
    time_s: Seconds
    raw_m: Floats


def seconds(instant: datetime) -> int:
    """Return an instant as epoch seconds."""
    return round(instant.timestamp())


def make_truths(scenario: Scenario) -> dict[str, Truth]:
    """Make flow and stage of all stations over the scenario's span, by station code.

    Same scenario, same arrays. Flow passes from station to station, so volumes add up downstream.
    """
    weather = _weather(scenario)
    start_s, _ = _span(scenario)
    inside = slice(int(np.searchsorted(weather.time_s, start_s)), None)
    flows: dict[str, Floats] = {}
    truths: dict[str, Truth] = {}
    for station in scenario.stations:
        code = station.station.code
        flows[code] = _flow(station, weather=weather, seed=scenario.basin.seed, flows=flows)
        truths[code] = _truth(
            scenario, station, time_s=weather.time_s[inside], flow_m3s=flows[code][inside]
        )
    return truths


def _weather(scenario: Scenario) -> Weather:
    basin = scenario.basin
    start_s, end_s = _span(scenario)
    return make_weather(
        seed=basin.seed,
        start_s=start_s,
        end_s=end_s,
        storms=[Storm(seconds(row.at), row.rain_mm, row.hours) for row in basin.storms],
        spells=[
            Spell(seconds(row.start), seconds(row.end), row.rain_factor, row.warmer_c)
            for row in basin.spells
        ],
    )


def _span(scenario: Scenario) -> tuple[int, int]:
    def midnight(day: date) -> int:
        return seconds(datetime.combine(day, time(0), tzinfo=scenario.clock))

    return (
        midnight(scenario.basin.first_day),
        midnight(scenario.basin.last_day + timedelta(days=1)),
    )


def _flow(station: Station, *, weather: Weather, seed: int, flows: dict[str, Floats]) -> Floats:
    rule = station.flow
    catchment = Catchment(
        area_km2=rule.own_km2,
        lowest_m=rule.lowest_m,
        highest_m=rule.highest_m,
        quick_h=rule.quick_h,
        slow_days=rule.slow_days,
        base_days=rule.base_days,
        rain_factor=rule.rain_factor,
    )
    flow = make_runoff(weather, catchment=catchment, seed=seed, station=station.station.code)
    for reach in rule.upstream:
        flow = flow + route(
            flows[reach.station], travel_h=reach.travel_h, storage_h=reach.storage_h
        )
    return route(flow, travel_h=0.0, storage_h=rule.lake_storage_h)


def _truth(scenario: Scenario, station: Station, *, time_s: Seconds, flow_m3s: Floats) -> Truth:
    spells = [IceSpell(seconds(i.start), seconds(i.end), i.greatest_m) for i in station.ice]
    stage_m = stage_of_flow(time_s, flow_m3s, periods=rating_periods(station)) + ice_backwater(
        time_s, spells=spells, seed=scenario.basin.seed, station=station.station.code
    )
    clock_s = scenario.agency.record_utc_offset_minutes * 60
    return Truth(station, scenario.basin.seed, clock_s, time_s, flow_m3s, stage_m)


def rating_periods(station: Station) -> tuple[RatingPeriod, ...]:
    """Return the ratings in force as the kernel takes them; a lake's outlet curve for a lake."""
    if station.outlet_curve:
        return (RatingPeriod(0, curve_of(station.outlet_curve)),)
    curves = {row.label: curve_of(row) for row in station.curves}
    return tuple(
        RatingPeriod(
            seconds(row.effective_from),
            curves[row.curve],
            [_shift_table(table) for table in row.shifts],
        )
        for row in station.rating_periods
    )


def _shift_table(row: ShiftRow) -> ShiftTable:
    stages_m, shifts_m = np.array(row.points).T
    return ShiftTable(seconds(row.at), stages_m, shifts_m, linear_to_next=row.to_next == "linear")


def curve_of(row: CurveRow) -> Curve:
    """Return a curve of the scenario as the kernel takes it."""
    if row.table:
        stages_m, flows_m3s = np.array(row.table).T
        return TableCurve(
            lowest_use_m=row.lowest_use_m,
            highest_use_m=row.highest_use_m,
            extrapolate_to_high_m=row.extrapolate_to_high_m,
            stages_m=stages_m,
            flows_m3s=flows_m3s,
            rule=row.rule,
            h0_m=row.h0_m,
        )
    return SegmentCurve(
        lowest_use_m=row.lowest_use_m,
        highest_use_m=row.highest_use_m,
        extrapolate_to_high_m=row.extrapolate_to_high_m,
        segments=[Segment(*segment) for segment in row.segments],
    )


def recorded_error(truth: Truth, series: Series, *, time_s: Seconds) -> Floats:
    """Return by how much (m) a series stands wrong at each time, by the story's faults."""
    return recorder_error(
        time_s,
        faults=[
            Fault(seconds(row.start), seconds(row.end), row.start_m, row.end_m)
            for row in truth.station.faults
            if row.series == series.label
        ],
    )


def make_records(truth: Truth, series: Series) -> tuple[Record, ...]:
    """Return what a series holds, one record a deployment: raw values, faults and gaps in.

    An observer's series is one record without a deployment: one reading a day to 5 mm.
    """
    if series.kind == "observer":
        return (_observed(truth, series),)
    return tuple(_recorded(truth, series, row) for row in series.deployments)


def _recorded(truth: Truth, series: Series, deployment: Deployment) -> Record:
    gaps = [
        (seconds(g.start), seconds(g.end)) for g in truth.station.gaps if g.series == series.label
    ]
    end_s = seconds(deployment.end) if deployment.end else int(truth.time_s[-1]) + 1
    stands = (truth.time_s >= seconds(deployment.start)) & (truth.time_s < end_s)
    keep = stands & kept(truth.time_s, gaps=gaps)
    time_s = truth.time_s[keep]
    seen_m = truth.stage_m + recorder_noise(
        truth.time_s.size,
        sd_m=truth.station.flow.noise_m,
        seed=truth.seed,
        name=f"{truth.station.station.code} {series.label}",
    )
    seen_m = seen_m[keep] + recorded_error(truth, series, time_s=time_s)
    raw_m = np.empty(time_s.size)
    starts = [*(seconds(row.effective_from) for row in deployment.settings), end_s]
    for row, start_s, stop_s in zip(deployment.settings, starts, starts[1:], strict=False):
        here = slice(*np.searchsorted(time_s, (start_s, stop_s)))
        raw_m[here] = raw_values(
            seen_m[here],
            scale=row.scale,
            offset_m=row.offset_m,
            resolution=deployment.resolution,
        )
    return Record(deployment, time_s, raw_m)


def _observed(truth: Truth, series: Series) -> Record:
    at = (truth.time_s + truth.clock_s) % DAY_S == OBSERVER_HOUR * 3600
    rng = stream(truth.seed, f"{truth.station.station.code} {series.label}")
    read_m = truth.stage_m[at] + rng.normal(0.0, 0.003, int(at.sum()))
    return Record(None, truth.time_s[at], np.round(read_m / 0.005) * 0.005)


def primary(station: Station) -> Series:
    """Return the primary series of a station."""
    return next(series for series in station.series if series.is_primary)
