"""The demo network's files say nothing that contradicts itself, and mistakes are named."""

import shutil
from datetime import UTC, datetime
from itertools import pairwise
from pathlib import Path

import pytest

from network.formats.demo_scenario import read_scenario
from network.formats.typed_toml import ScenarioError

FOLDER = Path(__file__).resolve().parents[2] / "fixtures_demo"


@pytest.fixture(scope="module")
def scenario():
    return read_scenario(FOLDER)


@pytest.fixture
def folder(tmp_path):
    """A copy of the demo network to spoil."""
    return Path(shutil.copytree(FOLDER, tmp_path / "demo"))


def spoil(folder, name, old, new):
    path = folder / name
    text = path.read_text(encoding="utf-8")
    assert old in text
    path.write_text(text.replace(old, new, 1), encoding="utf-8")


def test_the_network_is_as_large_as_promised(scenario):
    assert len(scenario.stations) >= 7
    assert len({s.station.river for s in scenario.stations}) == 3
    assert {s.station.basin for s in scenario.stations} == {scenario.basin.name}
    assert len(scenario.offices) == 2
    assert len(scenario.people) == 8
    assert {p.role for p in scenario.people} == {"field", "record_keeper", "manager", "publisher"}
    assert {s.station.kind for s in scenario.stations} == {"discharge", "stage", "weir"}
    assert max(len(s.plates) for s in scenario.stations) >= 4


def test_a_time_without_an_offset_is_on_the_record_clock(scenario):
    moved = scenario.station("TO-020").zeros[1]
    assert moved.effective_from == datetime(2023, 4, 18, 11, 0, tzinfo=UTC)


def test_stations_stand_upstream_first(scenario):
    codes = [s.station.code for s in scenario.stations]
    for station in scenario.stations:
        for reach in station.flow.upstream:
            assert codes.index(reach.station) < codes.index(station.station.code)


def test_two_ratings_stand_in_one_water_year(scenario):
    start, end = datetime(2022, 11, 1, tzinfo=UTC), datetime(2023, 11, 1, tzinfo=UTC)
    changed = [
        s.station.code
        for s in scenario.stations
        if any(start < p.effective_from < end for p in s.rating_periods[1:])
    ]
    assert "VE-030" in changed


def test_segments_of_a_curve_meet_within_half_a_percent(scenario):
    for station in scenario.stations:
        for curve in station.curves:
            for (_, c1, h1, b1), (joint, c2, h2, b2) in pairwise(curve.segments):
                lower, upper = c1 * (joint - h1) ** b1, c2 * (joint - h2) ** b2
                assert lower == pytest.approx(upper, rel=0.005), curve.label


def test_neighbouring_plates_overlap_by_a_tenth_of_a_metre(scenario):
    at = datetime(2024, 10, 1, tzinfo=UTC)
    for station in scenario.stations:
        spans = sorted(
            (plate.zeros[-1].zero_m + plate.lowest_m, plate.zeros[-1].zero_m + plate.highest_m)
            for plate in station.plates
            if plate.removed_at is None or plate.removed_at > at
        )
        for (_, top), (bottom, _) in pairwise(spans):
            assert top - bottom >= 0.1 - 1e-9, station.station.code


def test_the_level_books_close_as_stated(scenario):
    """Plain arithmetic: ΣBS − ΣFS is the misclosure, since each book returns to its benchmark."""
    for check in scenario.level_checks:
        assert check.lines[0].point == check.lines[-1].point == check.start_benchmark
        sum_bs = sum(line.bs for line in check.lines if line.bs is not None)
        sum_fs = sum(line.fs for line in check.lines if line.fs is not None)
        assert 1000 * (sum_bs - sum_fs) == pytest.approx(check.misclosure_mm, abs=1e-6)
        assert sum(line.bs is not None for line in check.lines) == check.set_ups
        assert abs(check.misclosure_mm) <= 0.9 * check.set_ups**0.5  # USGS TM 3-A19 in SI


def reduced_levels(check):
    """Height of collimation, line by line; (set-up, level) of each plate's sights."""
    collimation, set_up, levels = check.start_elevation_m, 0, {}
    for line in check.lines:
        if line.plate:
            levels.setdefault(line.plate, []).append((set_up, line, collimation - line.i))
        if line.fs is not None:
            collimation -= line.fs  # the level of the point
        if line.bs is not None:
            collimation += line.bs
            set_up += 1
    return levels


def test_the_level_books_find_what_they_say_they_find(scenario):
    for check in scenario.level_checks:
        station = scenario.station(check.station)
        zero_m = station.zeros[-1].elevation_m
        for finding in check.findings:
            sights = reduced_levels(check)[finding.plate]
            assert len({set_up for set_up, _, _ in sights}) == 2, "sighted from two set-ups"
            for _, line, level_m in sights:
                found_m = level_m - line.graduation_m - zero_m
                # readings are to 1 mm, and 1 mm of misclosure is not spread here
                assert found_m == pytest.approx(finding.zero_found_m, abs=0.0015)


def test_one_level_check_moves_one_plate_and_the_chain_takes_it_over(scenario):
    moved = [(c, f) for c in scenario.level_checks for f in c.findings if abs(f.error_m) > 0.003]
    [(check, finding)] = moved
    [plate] = [p for p in scenario.station(check.station).plates if p.label == finding.plate]
    before, after = plate.zeros
    assert after.zero_m - before.zero_m == pytest.approx(finding.error_m)
    assert after.effective_from == check.adopted_from
    assert after.level_check == check.label


def test_one_meter_is_overdue_and_one_has_drifted(scenario):
    by_pair = {}
    for row in scenario.instruments.calibrations:
        by_pair.setdefault(row.pair, []).append(row)
    latest = {pair: max(rows, key=lambda row: row.on) for pair, rows in by_pair.items()}
    last_day = scenario.basin.last_day
    assert [p for p, row in latest.items() if (last_day - row.on).days > 400] == ["CM-4"]

    def at_one_turn(row):  # velocity at 1 revolution a second, first piece
        return row.pieces[0][1] + row.pieces[0][2]

    older, newer = sorted(by_pair["CM-3"], key=lambda row: row.on)[-2:]
    assert at_one_turn(newer) / at_one_turn(older) > 1.03
    steady = sorted(by_pair["CM-1"], key=lambda row: row.on)[-2:]
    assert at_one_turn(steady[1]) / at_one_turn(steady[0]) == pytest.approx(1, abs=0.01)


def test_pieces_of_a_meter_meet_where_they_join(scenario):
    for row in scenario.instruments.calibrations:
        for (_, a1, b1), (n, a2, b2) in pairwise(row.pieces):
            assert a1 + b1 * n == pytest.approx(a2 + b2 * n, rel=0.005), row.certificate


def test_every_way_of_working_and_every_method_is_there(scenario):
    stations = scenario.stations
    rules = [s.gauging_rule for s in stations if s.gauging_rule]
    hows = {g.how for s in stations for g in (*s.gaugings, *s.other_gaugings)}
    hows |= {rule.above for rule in rules} | {"wading" for rule in rules if rule.wade_below_m3s}
    assert hows >= {"wading", "bridge", "cableway", "boat", "ice"}
    points = {g.points for s in stations for g in s.gaugings}
    assert points >= {"one", "half", "two", "three", "five", "six", "surface"}
    methods = {g.method for s in stations for g in s.other_gaugings}
    assert methods == {"acoustic", "dilution", "float", "volumetric", "weir"}


def test_a_cableway_is_overdue_and_not_used_since(scenario):
    [item] = [i for i in scenario.plans.safety_items if i.kind == "cableway"]
    last = max(row.on for row in item.inspections)
    assert (scenario.basin.last_day - last).days > item.interval_months * 31
    station = scenario.station(item.station)
    used = [g.at for g in station.gaugings if g.how == "cableway"] + list(station.gauging_rule.at)
    assert (max(used).date() - last).days <= 366


def test_about_eight_visits_in_the_last_year_at_every_station(scenario):
    for station in scenario.stations:
        assert 8 <= len(station.visits.at) <= 9
        assert all(at.year in (2023, 2024) for at in station.visits.at)
        assert list(station.visits.at) == sorted(set(station.visits.at))


def test_faults_end_at_a_visit_or_with_a_new_sensor(scenario):
    for station in scenario.stations:
        starts = {row.start for s in station.series for row in s.deployments}
        for fault in station.faults:
            at_visit = any(
                0 <= (fault.end - at).total_seconds() <= 3600 for at in station.visits.at
            )
            assert at_visit or fault.end in starts


@pytest.mark.parametrize(
    ("name", "old", "new", "sentence"),
    [
        ("agency.toml", 'decimal_sign = "."', "", r"agency.toml: agency.decimal_sign: missing"),
        ("agency.toml", "day_starts_at_hour = 0", 'day_starts_at_hour = "0"', "should be a int"),
        ("basin.toml", "seed = 7", "seed = 7\nsead = 8", r"basin.toml: sead: no such key"),
        (
            "agency.toml",
            'role = "manager"',
            'role = "boss"',
            r"agency.toml: people\[0\].role: 'boss'",
        ),
        (
            "stations/VE-010.toml",
            'meter = "CM-2"',
            'meter = "CM-9"',
            r"VE-010.toml: gauging_rule.meter: 'CM-9' does not exist",
        ),
        (
            "stations/VE-010.toml",
            "catchment_km2 = 86",
            "catchment_km2 = 87",
            "VE-010.toml: station.catchment_km2",
        ),
        ("stations/TO-010.toml", 'label = "Head"', 'label = "Head"\n}', "TO-010.toml: "),
        ("agency.toml", 'username = "odo.brask"', 'username = "ines.tallow"', "stands twice"),
        (
            "stations/IS-010.toml",
            "end = 2023-05-30T10:30:00\nstart_m",
            "end = 2023-05-01T10:30:00\nstart_m",
            r"IS-010.toml: faults\[0\].start: starts after its end",
        ),
        (
            "logger_files.toml",
            'series = "Recorder"',
            'series = "Radar"',
            "series: 'Radar' does not",
        ),
        ("levels.toml", 'plate = "P1"', 'plate = "P9"', "'P9' does not exist"),
    ],
)
def test_a_mistake_is_told_with_file_and_key(folder, name, old, new, sentence):
    spoil(folder, name, old, new)
    with pytest.raises(ScenarioError, match=sentence):
        read_scenario(folder)


def test_a_missing_file_is_told_by_name(folder):
    (folder / "plans.toml").unlink()
    with pytest.raises(ScenarioError, match=r"plans\.toml"):
        read_scenario(folder)


def test_rivers_that_run_in_a_circle_are_refused(folder):
    spoil(
        folder,
        "stations/IS-010.toml",
        "[flow]",
        '[flow]\nupstream = [{ station = "IS-020", travel_h = 1, storage_h = 1 }]',
    )
    with pytest.raises(ScenarioError, match="circle"):
        read_scenario(folder)
