"""The invented weather, rivers, records and field measurements are repeatable and plausible."""

from datetime import UTC, datetime

import numpy as np
import pytest

from network.numerics.gaugings.gauging import compute
from network.numerics.gaugings.gauging_input import Meter, Sheet
from network.numerics.levels.levelling import adjust, reduce_book
from network.numerics.meters.meter_rating import Piece, velocity
from network.numerics.meters.tow_runs import fit_tow_runs
from network.numerics.ratings.curves import Segment, SegmentCurve
from network.numerics.ratings.rating import RatingPeriod, ShiftTable, rate
from network.numerics.synthetic.basin import (
    SPIN_UP_S,
    STEP_S,
    Catchment,
    Spell,
    Storm,
    make_runoff,
    make_weather,
    route,
    stream,
)
from network.numerics.synthetic.field import (
    POINTS,
    Section,
    make_channel,
    make_level_book,
    make_tow_runs,
    revolutions,
)
from network.numerics.synthetic.record import (
    Fault,
    IceSpell,
    ice_backwater,
    kept,
    raw_values,
    recorder_error,
    stage_of_flow,
)
from network.numerics.synthetic.station import make_station

START_S = int(datetime(2021, 11, 1, tzinfo=UTC).timestamp())
YEAR_S = 365 * 86_400
HILLS = Catchment(area_km2=80, lowest_m=500, highest_m=1200)
PIECES = (Piece(0.02, 0.25, 0.0, 2.0), Piece(0.01, 0.255, 2.0, 12.0))


@pytest.fixture(scope="module")
def weather():
    return make_weather(seed=3, start_s=START_S, end_s=START_S + 2 * YEAR_S)


@pytest.fixture(scope="module")
def flow(weather):
    return make_runoff(weather, catchment=HILLS, seed=3, station="A")


def test_the_same_seed_and_station_make_the_same_flow(weather, flow):
    again = make_weather(seed=3, start_s=START_S, end_s=START_S + 2 * YEAR_S)
    assert np.array_equal(again.rain_mm, weather.rain_mm)
    assert np.array_equal(make_runoff(again, catchment=HILLS, seed=3, station="A"), flow)


def test_another_station_or_seed_makes_another_flow(weather, flow):
    other_seed = make_weather(seed=4, start_s=START_S, end_s=START_S + 2 * YEAR_S)
    assert not np.allclose(make_runoff(weather, catchment=HILLS, seed=3, station="B"), flow)
    assert not np.allclose(other_seed.rain_mm, weather.rain_mm)


def test_weather_is_that_of_a_temperate_upland(weather):
    years = weather.time_s.size * STEP_S / (365.25 * 86_400)
    assert 900 < weather.rain_mm.sum() / years < 1700  # mm a year, upland
    assert weather.rain_mm.min() >= 0
    month = weather.time_s.astype("datetime64[s]").astype("datetime64[M]").astype(int) % 12
    january, july = (weather.temperature_c[month == m].mean() for m in (0, 6))
    assert -6 < january < 2 < 12 < july < 20


def test_flow_is_positive_and_less_than_the_rain_of_the_hills(weather, flow):
    assert flow[weather.time_s >= START_S].min() > 0
    runoff_mm = flow.sum() * STEP_S / (HILLS.area_km2 * 1000)
    # the hills, 350 m above the reference on average, get 14 % more rain
    assert 0.4 < runoff_mm / (1.14 * weather.rain_mm.sum()) < 0.9


def test_a_peak_rises_faster_than_it_falls(flow):
    peak = int(flow.argmax())
    half = flow[peak] / 2
    rise = peak - np.flatnonzero(flow[:peak] < half)[-1]
    fall = np.flatnonzero(flow[peak:] < half)[0]
    assert fall > rise


def test_snow_lies_in_winter_and_melts_in_spring(weather):
    high = Catchment(area_km2=80, lowest_m=1200, highest_m=1800)
    flow = make_runoff(weather, catchment=high, seed=3, station="A")
    month = weather.time_s.astype("datetime64[s]").astype("datetime64[M]").astype(int) % 12
    inside = weather.time_s >= START_S
    assert flow[inside & (month == 4)].mean() > 3 * flow[inside & (month == 1)].mean()


def test_a_dry_spell_lowers_the_flow_and_a_storm_raises_it(weather, flow):
    june, august = START_S + 220 * 86_400, START_S + 300 * 86_400
    dry = make_weather(
        seed=3,
        start_s=START_S,
        end_s=START_S + 2 * YEAR_S,
        spells=[Spell(june, august, rain_factor=0.1)],
        storms=[Storm(august + 86_400, 60.0, 12.0)],
    )
    changed = make_runoff(dry, catchment=HILLS, seed=3, station="A")
    end, after = np.searchsorted(weather.time_s, (august, august + 3 * 86_400))
    assert changed[end] < 0.7 * flow[end]
    assert changed[end:after].max() > 5 * changed[end]
    # the storm's 60 mm are all there: rain above what fell without it
    extra = dry.rain_mm[end:after].sum() - weather.rain_mm[end:after].sum()
    assert extra == pytest.approx(60.0, abs=1e-6)


def test_a_reach_keeps_the_volume_and_lowers_the_peak(flow):
    down = route(flow, travel_h=3.0, storage_h=4.0)
    assert down.sum() == pytest.approx(flow.sum(), rel=2e-3)  # but for what is on its way
    assert down.max() < flow.max()
    assert down.argmax() > flow.argmax()


def test_weather_off_the_quarter_hours_is_refused():
    with pytest.raises(ValueError, match="15-minute grid"):
        make_weather(seed=1, start_s=START_S + 1, end_s=START_S + YEAR_S)


def test_weather_begins_before_the_start_so_that_the_stores_are_filled(weather):
    assert weather.time_s[0] == START_S - SPIN_UP_S


CURVE = SegmentCurve(
    lowest_use_m=0.1,
    highest_use_m=5.0,
    segments=[Segment(0.1, 12.0, 0.1, 2.0), Segment(0.6, 10.04, 0.1, 1.742)],
)


def test_stage_of_flow_is_the_rating_turned_round(weather, flow):
    low, high = (
        ShiftTable(START_S + k * 86_400, np.array([0.2, 1.0]), np.array([s, 0.0]), k == 20)
        for k, s in ((20, 0.0), (120, -0.05))
    )
    time_s = weather.time_s[weather.time_s >= START_S]
    true = flow[weather.time_s >= START_S]
    later = RatingPeriod(START_S + 200 * 86_400, CURVE)
    periods = [RatingPeriod(0, CURVE, [low, high]), later]
    stage_m = stage_of_flow(time_s, true, periods=periods)
    rated = rate(time_s, stage_m, periods=periods, gap_limit_s=0)
    # 0.02 mm of stage at the smallest head here, about 0.1 m, is 0.04 % of the flow; the
    # segments of the curve meet within 0.1 %
    assert np.allclose(rated.flow_m3s, true, rtol=1.5e-3)


def test_ice_raises_the_stage_inside_its_spell_only():
    time_s = np.arange(START_S, START_S + 60 * 86_400, STEP_S)
    spell = IceSpell(START_S + 10 * 86_400, START_S + 40 * 86_400, 0.4)
    rise_m = ice_backwater(time_s, spells=[spell], seed=1, station="A")
    inside = (time_s >= spell.start_s) & (time_s < spell.end_s)
    assert rise_m[~inside].max() == 0
    assert (rise_m[inside] >= 0).all()
    assert 0.2 < rise_m.max() < 0.5
    assert np.abs(np.diff(rise_m)).max() < 0.02  # no jump from one reading to the next


def test_a_fault_grows_from_start_to_end_and_is_nil_outside():
    time_s = np.array([0, 100, 150, 199, 200])
    error_m = recorder_error(time_s, faults=[Fault(100, 200, 0.0, 0.04)])
    assert error_m == pytest.approx([0, 0, 0.02, 0.0396, 0])


def test_gaps_take_readings_out_from_start_up_to_end():
    assert kept(np.array([0, 1, 2, 3]), gaps=[(1, 3)]).tolist() == [True, False, False, True]


def test_raw_values_turn_the_sensor_setting_round():
    raw = raw_values(np.array([0.5004]), scale=-1.0, offset_m=6.42, resolution=0.001)
    assert raw == pytest.approx([5.920])


@pytest.mark.parametrize("points", POINTS)
def test_verticals_give_the_flow_back_whatever_the_points(points):
    channel = make_channel(
        14.0, section=Section(18.0, 1.1), count=22, points=points, pieces=PIECES, rng=stream(1, "g")
    )
    found = compute(Sheet((channel,), Meter(PIECES)))
    # 2 % of noise a point over 22 verticals is about 0.5 %; three times that
    assert found.discharge_m3s == pytest.approx(14.0, rel=0.015)


@pytest.mark.parametrize("points", ["one", "half", "two"])
def test_verticals_under_ice_give_the_flow_back(points):
    channel = make_channel(
        2.0,
        section=Section(12.0, 0.8),
        count=14,
        points=points,
        pieces=PIECES,
        rng=stream(1, "ice"),
        ice_m=0.25,
    )
    assert min(v.depth_m for v in channel.verticals) > 0.25
    found = compute(Sheet((channel,), Meter(PIECES)))
    assert found.discharge_m3s == pytest.approx(2.0, rel=0.02)  # 14 verticals


def test_unknown_points_are_refused():
    with pytest.raises(ValueError, match="known set of points"):
        make_channel(
            1, section=Section(5, 0.5), count=9, points="seven", pieces=PIECES, rng=stream(1, "g")
        )


def test_revolutions_come_back_as_the_velocity():
    for speed in (0.05, 0.3, 0.52, 1.7, 2.6):
        count, seconds_s = revolutions(speed, pieces=PIECES)
        assert velocity(count, seconds_s, PIECES).velocity_ms[0] == pytest.approx(speed, rel=0.003)
    assert revolutions(0.01, pieces=PIECES) == (0, 40.0)


def test_tow_runs_give_the_meter_back():
    piece = (Piece(0.02, 0.25, 0.0, 12.0),)
    speeds = [0.06, 0.1, 0.2, 0.3, 0.5, 0.8, 1.2, 1.8, 2.5]
    runs = make_tow_runs(pieces=piece, speeds_ms=speeds, rng=stream(2, "tow"))
    fit = fit_tow_runs(
        [r.speed_ms for r in runs], [r.revolutions for r in runs], [r.seconds for r in runs]
    )
    assert fit.pieces[0].b_m == pytest.approx(0.25, rel=0.005)  # 0.3 % scatter of each run
    assert fit.pieces[0].a_ms == pytest.approx(0.02, abs=0.006)


def test_a_made_level_book_closes_and_finds_a_moved_plate():
    path = [("BM", 104.912), ("T1", 103.4)]
    plates = [("P1", 102.8), ("P2", 103.673)]  # P2 stands in the books at 103.650
    sights = make_level_book(path=path, plates=plates, rng=stream(5, "level"))
    book = reduce_book(sights, {"BM": 104.912})
    assert book.faults == ()
    assert abs(book.misclosure_mm) <= book.limit_mm
    levels = {row.point: row for row in adjust(book)}
    assert levels["P2"].set_ups == 2
    assert levels["P2"].adjusted_m - 103.650 == pytest.approx(0.023, abs=0.0015)
    assert levels["P1"].adjusted_m == pytest.approx(102.8, abs=0.0015)


def test_a_station_of_a_large_network_does_not_depend_on_the_others(weather):
    one, two = (
        make_station(7, weather=weather, seed=3, start_s=START_S),
        make_station(7, weather=weather, seed=3, start_s=START_S),
    )
    assert np.array_equal(one.stage_m, two.stage_m)
    assert one.code == "S-00007"
    assert one.time_s[0] == START_S
    flow_m3s = one.curve.flow_at(one.stage_m)
    assert (flow_m3s > 0).all()
    assert one.curve.lowest_use_m < one.stage_m.min()
    assert one.stage_m.max() < one.curve.highest_use_m
