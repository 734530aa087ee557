"""Reads the demo network's folder of TOML files into one checked, frozen scenario."""

from collections import Counter
from collections.abc import Collection, Iterable, Iterator
from dataclasses import dataclass, fields, is_dataclass
from datetime import timedelta, timezone
from pathlib import Path
from typing import Any, TypeVar

from network.formats.demo_field_rows import Instruments, LevelCheck, LoggerFile, Plans
from network.formats.demo_rows import Agency, Basin, Office, Person, Station
from network.formats.typed_toml import ScenarioError, below, read_row, read_toml

Row = TypeVar("Row")

CHOICES = {
    "role": {"field", "record_keeper", "manager", "publisher"},
    "to_next": {"step", "linear"},
    "flows": {"estimated", "withheld", "kept"},
    "how": {"wading", "bridge", "cableway", "boat", "ice", ""},
    "state": {"draft", "signed", "checked"},
}
CATCHMENT_TOLERANCE_KM2 = 0.005


@dataclass(frozen=True)
class People:
    """Everything agency.toml says."""

    agency: Agency
    offices: tuple[Office, ...]
    people: tuple[Person, ...]


@dataclass(frozen=True)
class LevelBooks:
    """Everything levels.toml says."""

    level_checks: tuple[LevelCheck, ...]


@dataclass(frozen=True)
class LoggerFiles:
    """Everything logger_files.toml says."""

    files: tuple[LoggerFile, ...]


@dataclass(frozen=True)
class Scenario:
    """The whole demo network; stations stand in the order of their flow, upstream first."""

    agency: Agency
    offices: tuple[Office, ...]
    people: tuple[Person, ...]
    basin: Basin
    stations: tuple[Station, ...]
    instruments: Instruments
    level_checks: tuple[LevelCheck, ...]
    plans: Plans
    logger_files: tuple[LoggerFile, ...]

    @property
    def clock(self) -> timezone:
        """The record clock."""
        return timezone(timedelta(minutes=self.agency.record_utc_offset_minutes))

    def station(self, code: str) -> Station:
        """Return the station of that code; KeyError where there is none."""
        for station in self.stations:
            if station.station.code == code:
                return station
        raise KeyError(code)


def read_scenario(folder: Path) -> Scenario:
    """Read and check the demo network in `folder`.

    Raises ScenarioError naming file and key where something is missing, unknown, of another type,
    named twice, or points to what does not exist.
    """
    agency = read_toml(folder / "agency.toml")
    try:
        clock = timezone(timedelta(minutes=agency["agency"]["record_utc_offset_minutes"]))
    except (KeyError, TypeError) as error:
        raise ScenarioError("agency.toml: agency.record_utc_offset_minutes: missing") from error

    def read(kind: type[Row], path: Path) -> Row:
        return read_row(kind, read_toml(path), where=f"{path.name}:", clock=clock)

    who = read(People, folder / "agency.toml")
    stations = [read(Station, path) for path in sorted((folder / "stations").glob("*.toml"))]
    scenario = Scenario(
        agency=who.agency,
        offices=who.offices,
        people=who.people,
        basin=read(Basin, folder / "basin.toml"),
        stations=tuple(_upstream_first(stations)),
        instruments=read(Instruments, folder / "instruments.toml"),
        level_checks=read(LevelBooks, folder / "levels.toml").level_checks,
        plans=read(Plans, folder / "plans.toml"),
        logger_files=read(LoggerFiles, folder / "logger_files.toml").files,
    )
    _check(scenario)
    return scenario


def _upstream_first(stations: Iterable[Station]) -> list[Station]:
    waiting = {station.station.code: station for station in stations}
    ready: list[Station] = []
    while waiting:
        free = [
            code
            for code, station in waiting.items()
            if not any(up.station in waiting for up in station.flow.upstream)
        ]
        if not free:
            raise ScenarioError(f"{min(waiting)}.toml: flow.upstream runs in a circle")
        ready += [waiting.pop(code) for code in free]
    return ready


def _check(scenario: Scenario) -> None:
    names = _names(scenario)
    for station in scenario.stations:
        _check_station(station, names=names)
    _check_catchments(scenario.stations)
    for where, part in (
        ("agency.toml: people", scenario.people),
        ("instruments.toml:", scenario.instruments),
        ("levels.toml: level_checks", scenario.level_checks),
        ("plans.toml:", scenario.plans),
        ("logger_files.toml: files", scenario.logger_files),
        ("basin.toml:", scenario.basin),
    ):
        _check_part(part, where=where, names=names)
    for check in scenario.level_checks:
        plates = {plate.label for plate in scenario.station(check.station).plates}
        _check_part(check, where=f"levels.toml: {check.label}", names={"plate": plates})
    for file_row in scenario.logger_files:
        series = {row.label for row in scenario.station(file_row.station).series}
        _check_part(
            file_row, where=f"logger_files.toml: {file_row.file_name}", names={"series": series}
        )


def _names(scenario: Scenario) -> dict[str, Collection[str]]:
    """Return what exists, by kind; ScenarioError where a name stands twice."""
    tools = scenario.instruments
    return {
        "office": _once((row.name for row in scenario.offices), where="agency.toml: offices"),
        "people": _once((row.username for row in scenario.people), where="agency.toml: people"),
        "station": _once((s.station.code for s in scenario.stations), where="stations: code"),
        "instrument": _once(
            (row.label for row in tools.instruments), where="instruments.toml: instruments"
        ),
        "pair": _once((r.label for r in tools.meter_pairs), where="instruments.toml: meter_pairs"),
        "river": scenario.basin.rivers,
        "level_check": _once((r.label for r in scenario.level_checks), where="levels.toml: label"),
    }


# The key under which a name stands → the kind of thing it names.
POINTS_TO = {
    **{key: key for key in ("office", "station", "instrument", "pair", "river", "series")},
    **{key: key for key in ("curve", "plate", "level_check")},
    **dict.fromkeys(("party", "author", "approver", "accepted_by", "adopted_by", "by"), "people"),
    **dict.fromkeys(("body", "rotor"), "instrument"),
    **dict.fromkeys(("meter", "meters"), "pair"),
    "neighbour": "station",
}


def _check_station(station: Station, *, names: dict[str, Collection[str]]) -> None:
    file = f"{station.station.code}.toml"
    local = {
        "series": _once((row.label for row in station.series), where=f"{file}: series"),
        "curve": _once((row.label for row in station.curves), where=f"{file}: curves"),
        "plate": _once((row.label for row in station.plates), where=f"{file}: plates"),
    }
    _check_part(station, where=f"{file}:", names={**names, **local})
    if sum(series.is_primary for series in station.series) != 1:
        raise ScenarioError(f"{file}: series: one of them is primary")
    for n, story in enumerate(station.visits.stories):
        if story.at not in station.visits.at:
            raise ScenarioError(f"{file}: visits.stories[{n}].at: no visit arrives then")


def _check_catchments(stations: Iterable[Station]) -> None:
    area = {s.station.code: s.station.catchment_km2 for s in stations}
    for station in stations:
        above = sum(area[up.station] for up in station.flow.upstream)
        code = station.station.code
        if abs(above + station.flow.own_km2 - area[code]) > CATCHMENT_TOLERANCE_KM2:
            raise ScenarioError(
                f"{code}.toml: station.catchment_km2: {area[code]} is not the {above} upstream "
                f"and flow.own_km2 {station.flow.own_km2} together"
            )


def _once(names: Iterable[str], *, where: str) -> Collection[str]:
    count = Counter(names)
    if twice := sorted(name for name, n in count.items() if n > 1):
        raise ScenarioError(f"{where}: {twice[0]!r} stands twice")
    return set(count)


def _check_part(part: Any, *, where: str, names: dict[str, Collection[str]]) -> None:
    for path, key, value, owner in _keys(part, where):
        if key == "start" and getattr(owner, "end", None) and not value < owner.end:
            raise ScenarioError(f"{path}: starts after its end")
        if key in CHOICES and value not in CHOICES[key]:
            raise ScenarioError(f"{path}: {value!r} is none of {sorted(CHOICES[key])}")
        if (kind := POINTS_TO.get(key, "")) in names:
            for name in value if isinstance(value, tuple) else (value,):
                if isinstance(name, str) and name and name not in names[kind]:
                    raise ScenarioError(f"{path}: {name!r} does not exist")
        if key in ("zeros", "elevations", "settings", "rating_periods"):
            starts = [row.effective_from for row in value]
            if starts != sorted(set(starts)):
                raise ScenarioError(f"{path}: the instants of a chain must rise")


def _keys(part: Any, where: str) -> Iterator[tuple[str, str, Any, Any]]:
    """Walk all keys below a part: path for messages, key, value and the row it stands in."""
    if isinstance(part, tuple):
        for n, row in enumerate(part):
            yield from _keys(row, f"{where}[{n}]")
    elif is_dataclass(part):
        for field in fields(part):
            value = getattr(part, field.name)
            path = below(where, field.name)
            yield path, field.name, value, part
            yield from _keys(value, path)
