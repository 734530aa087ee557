"""Makes the demo network's visits and gaugings from the invented truth and the scenario's rules."""

from dataclasses import dataclass
from datetime import datetime, timedelta

import numpy as np

from network.formats.demo_field_rows import (
    Calibration,
    Gauging,
    GaugingRule,
    Instruments,
    OtherGauging,
    VisitStory,
)
from network.formats.demo_rows import Plate
from network.numerics.gaugings.gauging_input import Channel
from network.numerics.meters.meter_rating import Piece
from network.numerics.synthetic.basin import stream
from network.numerics.synthetic.field import Section, TowRun, make_channel, make_tow_runs
from network.services.demo_world import Truth, primary, recorded_error, seconds

READ_TO_M = 0.005
FLOW_SCATTER = 0.03
ICE_DEPTH_FACTOR = 1.5  # under a rough lid the same flow takes more depth (common practice)


@dataclass(frozen=True)
class PlateReading:
    """A reading (m) of one plate at an instant, and the wave about it (m)."""

    at: datetime
    plate: str
    reading_m: float
    wave_m: float


@dataclass(frozen=True)
class RecorderCheck:
    """Stage by the recorder as found and as left beside the staff's (m above station zero).

    All three are for the instant `at`; the staff's is missing where no plate could be read.
    """

    at: datetime
    series: str
    found_m: float
    left_m: float
    staff_m: float | None
    clock_error_s: int
    battery_v: float


@dataclass(frozen=True)
class MadeVisit:
    """A visit: what the rule says, what was read, and its story."""

    arrived: datetime
    departed: datetime
    party: tuple[str, ...]
    readings: tuple[PlateReading, ...]
    check: RecorderCheck
    story: VisitStory


@dataclass(frozen=True)
class MadeGauging:
    """A gauging by current meter: its plan, start and end, stages (m) and its one channel."""

    plan: Gauging
    ended: datetime
    stages_m: tuple[tuple[datetime, float], ...]
    calibration: Calibration
    channel: Channel
    spin_test_s: float | None


@dataclass(frozen=True)
class MadeResult:
    """The result (m³/s) of another method; transects alternate between the banks."""

    plan: OtherGauging
    ended: datetime
    stages_m: tuple[tuple[datetime, float], ...]
    flow_m3s: float
    transects_m3s: tuple[float, ...]


def make_visits(truth: Truth) -> tuple[MadeVisit, ...]:
    """Return the visits of a station in order of time, with readings and recorder checks."""
    rule = truth.station.visits
    stories = {story.at: story for story in rule.stories}
    return tuple(
        _visit(truth, arrived=at, story=stories.get(at, VisitStory(at=at))) for at in rule.at
    )


def _visit(truth: Truth, *, arrived: datetime, story: VisitStory) -> MadeVisit:
    departed = arrived + timedelta(minutes=truth.station.visits.minutes)
    rng = stream(truth.seed, f"{truth.station.station.code} visit {seconds(arrived)}")
    times = (arrived + timedelta(minutes=5), departed - timedelta(minutes=5))
    read = () if story.frozen or story.dry else times
    readings = tuple(row for at in read for row in _readings(truth, at=at, rng=rng))
    return MadeVisit(
        arrived=arrived,
        departed=departed,
        party=truth.station.visits.party,
        readings=readings,
        check=_check(truth, times=times, readings=readings, rng=rng),
        story=story,
    )


def _readings(truth: Truth, *, at: datetime, rng: np.random.Generator) -> list[PlateReading]:
    """Read every plate that the water stands on, two where they overlap."""
    stage_m = truth.stage_at(at)
    rows = []
    for plate in (plate for plate in truth.station.plates if stands(plate, at)):
        reading_m = stage_m - plate_zero_m(plate, at) + float(rng.normal(0.0, 0.002))
        reading_m = round(round(reading_m / READ_TO_M) * READ_TO_M, 3)
        if plate.lowest_m <= reading_m <= plate.highest_m:
            rows.append(PlateReading(at, plate.label, reading_m, wave_m=0.005))
    return rows


def stands(plate: Plate, at: datetime) -> bool:
    """Return whether a plate was in service at an instant."""
    return plate.installed_at <= at and (plate.removed_at is None or at < plate.removed_at)


def plate_zero_m(plate: Plate, at: datetime) -> float:
    """Return the plate zero in force (m above station zero); the plate stands at that instant."""
    return [row.zero_m for row in plate.zeros if row.effective_from <= at][-1]


def _check(
    truth: Truth,
    *,
    times: tuple[datetime, datetime],
    readings: tuple[PlateReading, ...],
    rng: np.random.Generator,
) -> RecorderCheck:
    """Compare the recorder with the first plate read; what stood wrong is mended by the end."""
    series = primary(truth.station)
    times_s = np.array([seconds(at) for at in times], dtype=np.int64)
    noise_m = rng.normal(0.0, truth.station.flow.noise_m, 2)
    shown_m = truth.stage_at(times[0]) + noise_m + recorded_error(truth, series, time_s=times_s)
    zeros_m = {
        p.label: plate_zero_m(p, times[0]) for p in truth.station.plates if stands(p, times[0])
    }
    staff_m = [row.reading_m + zeros_m[row.plate] for row in readings[:1]]
    return RecorderCheck(
        at=times[0],
        series=series.label,
        found_m=round(float(shown_m[0]), 3),
        left_m=round(float(shown_m[1]), 3),
        staff_m=round(staff_m[0], 3) if staff_m else None,
        clock_error_s=int(rng.integers(-40, 75)),
        battery_v=round(float(rng.normal(12.5, 0.25)), 1),
    )


def make_gaugings(truth: Truth, instruments: Instruments) -> tuple[MadeGauging, ...]:
    """Return a station's gaugings by current meter in order of time.

    Those of the rule wade below its flow and measure two points where the water is deep; those of
    the story are as it says. The meter's certificate at the date makes the revolutions.
    """
    rule = truth.station.gauging_rule
    plans = [_plan(truth, rule, at) for at in rule.at] if rule else []
    plans += truth.station.gaugings
    return tuple(
        _gauging(truth, plan=plan, instruments=instruments)
        for plan in sorted(plans, key=lambda plan: plan.at)
    )


def _plan(truth: Truth, rule: GaugingRule, at: datetime) -> Gauging:
    wading = truth.flow_at(at) < rule.wade_below_m3s
    deep = section_at(truth, at).depth_m >= rule.two_points_from_m
    return Gauging(
        at=at,
        how="wading" if wading else rule.above,
        points="two" if deep else "one",
        meter=rule.meter,
        party=rule.party,
        verticals=rule.verticals,
    )


def section_at(truth: Truth, at: datetime) -> Section:
    """Return the gauging section with the water that runs at an instant."""
    flow = truth.station.flow
    form = float(stream(truth.seed, f"{truth.station.station.code} bed").random())
    return Section(flow.width_m, flow.depth_m, form).at(truth.flow_at(at) / flow.at_flow_m3s)


def _gauging(truth: Truth, *, plan: Gauging, instruments: Instruments) -> MadeGauging:
    rng = stream(truth.seed, f"{truth.station.station.code} gauging {seconds(plan.at)}")
    ended = plan.at + timedelta(minutes=round(plan.verticals * 2.5))
    middle = plan.at + (ended - plan.at) / 2
    section = section_at(truth, middle)
    if plan.ice_m:
        section = Section(section.width_m, section.depth_m * ICE_DEPTH_FACTOR, section.form)
    calibration = calibration_at(instruments, pair=plan.meter, at=plan.at)
    channel = make_channel(
        truth.flow_at(middle) * float(np.exp(rng.normal(0.0, FLOW_SCATTER))),
        section=section,
        count=plan.verticals,
        points=plan.points,
        pieces=pieces_of(calibration),
        rng=rng,
        ice_m=plan.ice_m,
    )
    spin_s = round(float(rng.normal(95, 8)), 0) if plan.spin_test else None
    return MadeGauging(plan, ended, _stages(truth, plan.at, ended), calibration, channel, spin_s)


def _stages(truth: Truth, started: datetime, ended: datetime) -> tuple[tuple[datetime, float], ...]:
    """Read the stage at start and end and every half hour between (ISO 748:2021 5.2.3)."""
    times = [started + timedelta(minutes=m) for m in range(0, 600, 30)]
    times = [at for at in times if at < ended - timedelta(minutes=5)]
    return tuple((at, round(truth.stage_at(at), 3)) for at in (*times, ended))


def calibration_at(instruments: Instruments, *, pair: str, at: datetime) -> Calibration:
    """Return a meter pair's latest calibration at an instant; ValueError where there is none."""
    done = [row for row in instruments.calibrations if row.pair == pair and row.on <= at.date()]
    if not done:
        raise ValueError(f"{pair} had no calibration on {at:%d %B %Y}")
    return max(done, key=lambda row: row.on)


def pieces_of(calibration: Calibration) -> tuple[Piece, ...]:
    """Return a calibration's pieces as the kernel takes them, the last up to its highest speed."""
    starts = [n for n, _, _ in calibration.pieces]
    _, a_ms, b_m = calibration.pieces[-1]
    ends = [*starts[1:], (calibration.highest_ms - a_ms) / b_m]
    return tuple(
        Piece(a_ms=a, b_m=b, n_from=n, n_to=end)
        for (n, a, b), end in zip(calibration.pieces, ends, strict=True)
    )


def tow_runs_of(calibration: Calibration, *, seed: int) -> tuple[TowRun, ...]:
    """Return the tow runs of a calibration; none where its speeds are not given."""
    rng = stream(seed, f"tow {calibration.certificate}")
    speeds_ms = calibration.tow_speeds_ms
    return make_tow_runs(pieces=pieces_of(calibration), speeds_ms=speeds_ms, rng=rng)


def make_results(truth: Truth) -> tuple[MadeResult, ...]:
    """Return a station's gaugings by other methods in order of time."""
    plans = sorted(truth.station.other_gaugings, key=lambda plan: plan.at)
    return tuple(_result(truth, plan) for plan in plans)


def _result(truth: Truth, plan: OtherGauging) -> MadeResult:
    rng = stream(truth.seed, f"{truth.station.station.code} {plan.method} {seconds(plan.at)}")
    ended = plan.at + timedelta(minutes=plan.minutes)
    spread = plan.uncertainty_percent / 200
    flow = truth.flow_at(plan.at + (ended - plan.at) / 2) * float(np.exp(rng.normal(0, spread)))
    scatter = rng.normal(0.0, plan.transect_scatter_percent / 100, plan.transects)
    transects = tuple(_figures(flow * (1 + float(s))) for s in scatter)
    result = float(np.mean(transects)) if transects else flow
    return MadeResult(plan, ended, _stages(truth, plan.at, ended), _figures(result), transects)


def _figures(flow_m3s: float) -> float:
    """Round to four figures, as results are written in the field."""
    return float(f"{flow_m3s:.4g}")
