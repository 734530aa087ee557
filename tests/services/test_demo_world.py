"""The demo network's invented truth agrees with its story, and measurements with the truth."""

from datetime import UTC, datetime, timedelta
from pathlib import Path

import numpy as np
import pytest

from network.formats.demo_scenario import read_scenario
from network.numerics.gaugings.gauging import compute
from network.numerics.gaugings.gauging_input import Meter, Sheet
from network.numerics.ratings.rating import rate
from network.services.demo_field import (
    calibration_at,
    make_gaugings,
    make_results,
    make_visits,
    pieces_of,
    plate_zero_m,
    tow_runs_of,
)
from network.services.demo_world import make_records, make_truths, primary, rating_periods, seconds

FOLDER = Path(__file__).resolve().parents[2] / "fixtures_demo"
SCENARIO = read_scenario(FOLDER)
RATED = [s.station.code for s in SCENARIO.stations if s.rating_periods]


@pytest.fixture(scope="module")
def truths():
    return make_truths(SCENARIO)


@pytest.fixture(scope="module")
def gaugings(truths):
    return {c: make_gaugings(truth, SCENARIO.instruments) for c, truth in truths.items()}


def between(truth, start, end):
    return (truth.time_s >= seconds(start)) & (truth.time_s < seconds(end))


def open_water(truth):
    ice = np.zeros(truth.time_s.size, bool)
    for spell in truth.station.ice:
        ice |= between(truth, spell.start, spell.end)
    return ~ice


def stages_of(record):
    """Stage from raw values by the settings in force."""
    settings = record.deployment.settings
    which = np.searchsorted([seconds(s.effective_from) for s in settings], record.time_s, "right")
    scale, offset = (
        np.array([getattr(s, name) for s in settings])[which - 1] for name in ("scale", "offset_m")
    )
    return scale * record.raw_m + offset


def test_the_truth_is_the_same_every_time(truths):
    again = make_truths(SCENARIO)
    for code, truth in truths.items():
        assert np.array_equal(again[code].flow_m3s, truth.flow_m3s)
        assert np.array_equal(again[code].stage_m, truth.stage_m)


def test_three_water_years_at_fifteen_minutes(truths):
    for truth in truths.values():
        assert truth.time_s.size == (3 * 365 + 1) * 96 + 1  # 2024 has a leap day
        assert truth.time_s[0] == seconds(datetime(2021, 10, 31, 23, tzinfo=UTC))
        assert (truth.flow_m3s > 0).all()
        assert np.isfinite(truth.stage_m).all()


def test_volumes_agree_downstream(truths):
    for truth in truths.values():
        above = sum(truths[r.station].flow_m3s.sum() for r in truth.station.flow.upstream)
        rule = truth.station.flow
        runoff_mm = (truth.flow_m3s.sum() - above) * 0.9 / rule.own_km2
        # upland hills get 350 to 1400 mm a year; what is on its way in reaches is far smaller
        assert 350 < runoff_mm / 3 < 1400, truth.station.station.code


def test_the_drought_is_the_lowest_summer(truths):
    truth = truths["VE-040"]
    means = [
        truth.flow_m3s[
            between(truth, datetime(y, 8, 1, tzinfo=UTC), datetime(y, 9, 20, tzinfo=UTC))
        ].mean()
        for y in (2022, 2023, 2024)
    ]
    assert means[0] < 0.4 * min(means[1:])


def test_the_flood_that_scours_is_the_highest_of_its_season_upstream(truths):
    truth = truths["VE-010"]
    peak = datetime.fromtimestamp(truth.time_s[truth.flow_m3s.argmax()], UTC)
    assert datetime(2023, 7, 29, tzinfo=UTC) < peak < datetime(2023, 7, 31, tzinfo=UTC)


def test_ice_stands_in_the_cold_months_and_makes_open_water_rating_too_high(truths):
    for code in ("VE-010", "IS-020", "VE-040"):
        truth = truths[code]
        for spell in truth.station.ice:
            assert {spell.start.month, spell.end.month} <= {12, 1, 2}
            middle = spell.start + (spell.end - spell.start) / 2
            rated = rate(
                np.array([seconds(middle)]),
                np.array([truth.stage_at(middle)]),
                periods=rating_periods(truth.station),
                gap_limit_s=0,
            )
            assert rated.flow_m3s[0] > 1.4 * truth.flow_at(middle)


@pytest.mark.parametrize("code", RATED)
def test_the_true_stage_rates_back_to_the_true_flow(truths, code):
    truth = truths[code]
    periods = rating_periods(truth.station)
    rated = rate(truth.time_s, truth.stage_m, periods=periods, gap_limit_s=0)
    sound = open_water(truth) & np.isfinite(rated.flow_m3s)
    assert sound.mean() > 0.9
    assert np.allclose(rated.flow_m3s[sound], truth.flow_m3s[sound], rtol=5e-3)  # segments' joints


@pytest.mark.parametrize("code", sorted(s.station.code for s in SCENARIO.stations))
def test_records_hold_the_stage_but_for_noise_faults_and_gaps(truths, code):
    truth = truths[code]
    for series in truth.station.series:
        for record in make_records(truth, series):
            if record.deployment is None:
                continue
            error_m = stages_of(record) - np.interp(record.time_s, truth.time_s, truth.stage_m)
            sound = np.ones(record.time_s.size, bool)
            for fault in truth.station.faults:
                if fault.series == series.label:
                    hit = (record.time_s >= seconds(fault.start)) & (
                        record.time_s < seconds(fault.end)
                    )
                    sound &= ~hit
                    if not hit.any():
                        continue  # another deployment's time
                    largest = max(abs(fault.start_m), abs(fault.end_m))
                    assert np.abs(error_m[hit]).max() == pytest.approx(largest, abs=0.006)
            # noise of 1 mm (2 mm on the lake) and the rounding: six standard errors
            assert np.abs(error_m[sound]).max() < 7 * truth.station.flow.noise_m
            for gap in truth.station.gaps:
                if gap.series == series.label:
                    held = (record.time_s >= seconds(gap.start)) & (
                        record.time_s < seconds(gap.end)
                    )
                    assert not held.any()


def test_an_observer_reads_once_a_day(truths):
    truth = truths["VE-020"]
    [record] = make_records(truth, truth.station.series[1])
    assert set(np.diff(record.time_s)) == {86_400}
    assert record.deployment is None


def test_stage_passes_from_one_zero_to_the_next_by_the_move(truths):
    truth = truths["TO-020"]
    moved = truth.station.zeros[1].effective_from
    step = truth.stage_at(moved) - truth.stage_at(moved - timedelta(minutes=15))
    assert step == pytest.approx(0.5, abs=0.005)


def test_plate_readings_and_plate_zeros_give_the_stage(truths):
    for truth in truths.values():
        plates = {p.label: p for p in truth.station.plates}
        for visit in make_visits(truth):
            assert bool(visit.readings) is not visit.story.frozen
            for row in visit.readings:
                plate = plates[row.plate]
                assert plate.lowest_m <= row.reading_m <= plate.highest_m
                stage_m = row.reading_m + plate_zero_m(plate, row.at)
                # read to 5 mm with 2 mm of error
                assert stage_m == pytest.approx(truth.stage_at(row.at), abs=0.011)


def test_recorder_checks_find_the_fault_and_leave_it_mended(truths):
    visits = {v.arrived.date().isoformat(): v for v in make_visits(truths["VE-030"])}
    check = visits["2024-07-09"].check
    # the staff is read to 5 mm with 2 mm of error, the recorder shows 1 mm of noise
    assert check.found_m - check.staff_m == pytest.approx(0.034, abs=0.009)
    assert check.left_m == pytest.approx(check.staff_m, abs=0.009)
    assert check.found_m - check.left_m == pytest.approx(0.034, abs=0.004)


@pytest.mark.parametrize("code", [c for c in RATED if c != "TO-010"])
def test_gaugings_compute_to_the_true_flow_within_their_scatter(truths, gaugings, code):
    deviations = []
    for made in gaugings[code]:
        sheet = Sheet((made.channel,), Meter(pieces_of(made.calibration)))
        middle = made.plan.at + (made.ended - made.plan.at) / 2
        flow = compute(sheet).discharge_m3s
        deviations.append(np.log(flow / truths[code].flow_at(middle)))
    assert len(deviations) >= 12
    assert np.abs(deviations).max() < 0.12  # four times the 3 % scatter
    assert 0.015 < np.std(deviations) < 0.05


def test_wading_stays_within_depth_times_velocity_of_the_caution(gaugings):
    for rows in gaugings.values():
        for made in rows:
            if made.plan.how == "wading":
                flow = compute(Sheet((made.channel,), Meter(pieces_of(made.calibration))))
                mean_depth_m = np.mean([v.depth_m for v in made.channel.verticals])
                area_m2 = mean_depth_m * made.channel.last_bank.distance_m
                assert mean_depth_m * flow.discharge_m3s / area_m2 < 0.9


def test_gaugings_reach_from_drought_to_flood(truths, gaugings):
    stages_m = [made.stages_m[0][1] for made in gaugings["VE-040"]]
    truth = truths["VE-040"]
    assert min(stages_m) < np.quantile(truth.stage_m, 0.1)
    assert max(stages_m) > np.quantile(truth.stage_m, 0.998)


def test_other_methods_give_the_flow_within_their_stated_uncertainty(truths):
    count = 0
    for truth in truths.values():
        for made in make_results(truth):
            count += 1
            true = truth.flow_at(made.plan.at + (made.ended - made.plan.at) / 2)
            limit = 1.5 * made.plan.uncertainty_percent / 100  # stated at 95 %, so once in a while
            assert made.flow_m3s == pytest.approx(true, rel=limit)
            assert len(made.transects_m3s) == made.plan.transects
    assert count >= 8


def test_every_gauging_has_a_meter_calibrated_before_it():
    with pytest.raises(ValueError, match="CM-4 had no calibration on 01 January 2022"):
        calibration_at(SCENARIO.instruments, pair="CM-4", at=datetime(2022, 1, 1, tzinfo=UTC))


def test_a_calibration_with_speeds_gets_its_tow_runs():
    with_runs = [c for c in SCENARIO.instruments.calibrations if c.tow_speeds_ms]
    assert {c.pair for c in with_runs} == {"CM-1", "CM-3"}
    for calibration in with_runs:
        runs = tow_runs_of(calibration, seed=SCENARIO.basin.seed)
        assert [run.speed_ms for run in runs] == list(calibration.tow_speeds_ms)
        assert all(run.revolutions > 0 for run in runs)


def test_each_station_has_one_primary_series():
    for station in SCENARIO.stations:
        assert primary(station).is_primary
