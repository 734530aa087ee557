"""Load the demo's recorders, logger files, corrections, notes, infills and typed daily flows."""

from collections.abc import Iterator
from dataclasses import replace
from datetime import date, datetime, timedelta
from itertools import pairwise
from pathlib import Path
from typing import Any

import numpy as np

from network.formats.demo_field_rows import LoggerFile
from network.formats.demo_logger_files import write_logger_file
from network.formats.demo_record_rows import Deployment as DeploymentRow
from network.formats.demo_record_rows import Series as SeriesRow
from network.formats.demo_rows import Station as StationRow
from network.models import MappingProfile, Series
from network.queries import clock, station_years
from network.services import (
    corrections,
    imports,
    infills,
    instruments,
    notes,
    profiles,
    series,
    typed_flows,
)
from network.services.demo_cast import Cast
from network.services.demo_registry import moves_of
from network.services.demo_world import make_records

KINDS = {"second recorder": "second"}
CAUSES = {"instrument fault": "fault", "datum doubt": "datum"}
METHODS = {
    "log-log regression": "neighbour",
    "other series": "series",
    "winter ratio": "winter",
    "straight line": "line",
}
DELIMITERS = {"\t": "tab"}
ENCODINGS = {"cp1252": "latin-1"}
# What one bridges between readings of each kind, in steps of the series (a common choice).
STEPS_BRIDGED = {"observer": 1.5}
RECORDER_STEPS_BRIDGED = 12.0
PLAIN = LoggerFile(
    file_name="",
    station="",
    series="",
    start=datetime.min,
    end=datetime.max,
    encoding="utf-8",
    delimiter=",",
    decimal_sign=".",
    unit="m",
    decimals=4,
    columns=("time", "raw"),
    heading=("time_utc,raw_m",),
    time_format="ISO",
)


def load_series(cast: Cast, row: StationRow) -> None:
    """Open the series of a station, set its recorders up, and say how raw becomes stage."""
    code = row.station.code
    for each in row.series:
        bridged = STEPS_BRIDGED.get(each.kind, RECORDER_STEPS_BRIDGED)
        opened = series.open_series(
            station=cast.stations[code],
            label=each.label,
            kind=KINDS.get(each.kind, each.kind),
            is_primary=each.is_primary,
            gap_limit_minutes=round(bridged * each.step_s / 60),
            by=cast.manager,
            at=cast.opening,
        )
        cast.series[code, each.label] = opened
        for deployment in each.deployments:
            _deploy(cast, row, opened, deployment)


def _deploy(cast: Cast, row: StationRow, to: Series, deployment: DeploymentRow) -> None:
    first, *later = deployment.settings
    keeper = cast.keeper(row.station.code)
    recorder = cast.instruments[deployment.instrument]
    stands = instruments.deploy(
        instrument=recorder,
        series=to,
        installed_at=deployment.start,
        scale=first.scale,
        offset_m=first.offset_m,
        reason=first.reason,
        by=cast.manager,
        at=cast.entered(deployment.start),
    )
    for setting in later:
        if setting.effective_from not in moves_of(row):
            series.set_sensor(
                series=to,
                deployment=stands,
                **vars(setting),
                by=keeper,
                at=cast.entered(setting.effective_from),
            )
    if deployment.end:
        gone: dict[str, Any] = {"by": cast.manager, "at": cast.entered(deployment.end)}
        instruments.remove(
            deployment=stands, removed_at=deployment.end, reason="Taken down.", **gone
        )
        told = _remarks_of(cast, deployment.instrument) or "No longer used."
        instruments.change_status(instrument=recorder, status="withdrawn", reason=told, **gone)


def _remarks_of(cast: Cast, label: str) -> str:
    return next(i.remarks for i in cast.scenario.instruments.instruments if i.label == label)


def files_of(cast: Cast, row: StationRow) -> list[LoggerFile]:
    """Return a station's logger files: those the scenario describes, plain yearly ones between."""
    return [file for each in row.series for file in _files_of_series(cast, row, each)]


def _files_of_series(cast: Cast, row: StationRow, each: SeriesRow) -> Iterator[LoggerFile]:
    code = row.station.code
    told = [f for f in cast.scenario.logger_files if (f.station, f.series) == (code, each.label)]
    edges = {
        *_year_edges(cast),
        *(deployment.start for deployment in each.deployments),
        *(edge for file in told for edge in (file.start, file.end)),
    }
    for start, end in pairwise(sorted(edges)):
        file = next((f for f in told if f.start <= start and end <= f.end), None)
        if file is None:
            name = f"{code}_{each.label}_{start:%Y-%m-%d}.csv".lower().replace(" ", "-")
            yield replace(
                PLAIN, file_name=name, station=code, series=each.label, start=start, end=end
            )
        elif file.start == start:
            yield file


def _year_edges(cast: Cast) -> list[datetime]:
    """Return the instants at which the water years of the record start and its last one ends."""
    basin, calendar, own = cast.scenario.basin, station_years.calendar(), clock.agency()
    years = range(calendar.year_of(basin.first_day), calendar.year_of(basin.last_day) + 1)
    firsts = [calendar.first_day(year) for year in years]
    return [clock.day_start(day, of=own) for day in (*firsts, basin.last_day + timedelta(days=1))]


def write_files(cast: Cast, row: StationRow, folder: Path) -> list[LoggerFile]:
    """Write the logger files of a station into a folder; return those that have readings."""
    folder.mkdir(parents=True, exist_ok=True)
    truth = cast.truths[row.station.code]
    records = {each.label: make_records(truth, each) for each in row.series}
    written = []
    for file in files_of(cast, row):
        times_s = np.concatenate([record.time_s for record in records[file.series]])
        raw_m = np.concatenate([record.raw_m for record in records[file.series]])
        start, end = (np.searchsorted(times_s, at.timestamp()) for at in (file.start, file.end))
        if start < end:
            content = write_logger_file(
                file, times_s=times_s[start:end].tolist(), raw_m=raw_m[start:end].tolist()
            )
            (folder / file.file_name).write_bytes(content)
            written.append(file)
    return written


def import_written(cast: Cast, file: LoggerFile, folder: Path) -> None:
    """Import one logger file; rows that cannot be read are skipped where the story has some."""
    with (folder / file.file_name).open("rb") as stream:
        imports.import_file(
            series=cast.series[file.station, file.series],
            profile=_profile(cast, file),
            file=stream,
            original_name=file.file_name,
            skip_faulty=bool(file.faulty_rows),
            by=cast.keeper(file.station),
            at=cast.entered(file.end),
        )


def _profile(cast: Cast, file: LoggerFile) -> MappingProfile:
    """Return the mapping profile of a file, recorded when it is first met."""
    plain = file.heading == PLAIN.heading
    name = "Plain CSV, metres, UTC" if plain else f"As in {file.file_name}"
    there = MappingProfile.objects.filter(name=name).first()
    if there is not None:
        return there
    return profiles.record_profile(
        profile=MappingProfile(
            name=name,
            time_column=str(file.columns.index("time") + 1),
            value_column=str(file.columns.index("raw") + 1),
            time_format=file.time_format,
            delimiter=DELIMITERS.get(file.delimiter, file.delimiter),
            header_lines=len(file.heading),
            has_column_names=False,
            decimal_sign=file.decimal_sign,
            unit=file.unit,
            encoding=ENCODINGS.get(file.encoding, file.encoding),
            clock=MappingProfile.Clock.CIVIL if file.zone else MappingProfile.Clock.FIXED,
            utc_offset_minutes=file.utc_offset_minutes,
            civil_zone=file.zone,
        ),
        by=cast.manager,
        at=cast.entered(file.end),
    )


def load_remarks(cast: Cast, row: StationRow) -> None:
    """Enter what is said of a station's record: corrections, notes, infills, typed flows."""
    code = row.station.code
    station, keeper = cast.stations[code], cast.keeper(code)
    for fix in row.corrections:
        proposed = corrections.propose_correction(
            series=cast.series[code, fix.series],
            start_at=fix.start,
            end_at=fix.end,
            start_offset_m=fix.start_m,
            end_offset_m=fix.end_m,
            reason=fix.reason,
            by=keeper,
            at=cast.entered(fix.end),
        )
        if fix.accepted_by:
            corrections.accept_correction(
                correction=proposed, by=cast.people[fix.accepted_by], at=cast.entered(fix.end)
            )
    for note in row.notes:
        notes.add_note(
            station=station,
            start_at=note.start,
            end_at=note.end,
            cause=CAUSES.get(note.cause, note.cause),
            flows="stand" if note.flows == "kept" else note.flows,
            uncertainty_percent=note.percent,
            text=note.text,
            is_printed=note.printed,
            by=keeper,
            at=cast.entered(note.end),
        )
    for infill in row.infills:
        first, last = _days_touched(infill.start, infill.end)
        infills.add_infill(
            station=station,
            first_day=first,
            last_day=last,
            method=METHODS.get(infill.method, infill.method),
            neighbour=cast.stations[infill.neighbour] if infill.neighbour else None,
            series=cast.series[code, infill.series] if infill.series else None,
            reason=infill.reason,
            by=keeper,
            at=cast.entered(infill.end),
        )
    for typed in row.typed_flows:
        typed_flows.type_flow(
            station=station,
            day=typed.day,
            flow_m3s=typed.flow_m3s,
            method=typed.method,
            reason=typed.reason,
            by=cast.people[typed.author],
            at=cast.entered(clock.day_start(typed.day, of=clock.agency())),
        )


def _days_touched(start: datetime, end: datetime) -> tuple[date, date]:
    """Return the first and last record day of which a period takes a part."""
    own = clock.agency()
    return clock.record_day(start, of=own), clock.record_day(end - timedelta(seconds=1), of=own)
