"""Ratios of the record: kernel, database, rows, bytes and import."""

import contextlib
import io
import time
from collections.abc import Iterator
from dataclasses import dataclass
from datetime import date
from pathlib import Path

import numpy as np
import pandas as pd
from django.core.management import call_command

from network.models import Block, CurveSegment, Series, Station
from network.numerics.arrays import Floats
from network.numerics.ratings.rating import rate
from network.numerics.records.readings import Readings
from network.numerics.records.stage import to_stage
from network.numerics.years.daily import daily_means
from network.queries import blocks, flows
from network.queries.station_inputs import StationInputs, load
from reports.management.benchmark import place, rows
from reports.management.benchmark.timing import Ratio, medians, milliseconds

LAST_YEAR = 2024  # of the generated record


@dataclass(frozen=True)
class Record:
    """A generated station, its inputs and its readings over some years."""

    station: Station
    segment: CurveSegment
    inputs: StationInputs
    readings: Readings
    years: int

    @property
    def first(self) -> date:
        """First day."""
        return date(LAST_YEAR + 1 - self.years, 1, 1)

    def bare_power(self) -> Floats:
        """The floor: one power law on the same array."""
        head_m = self.readings.values_m - (self.readings.values_m.min() - 0.1)
        return self.segment.c * np.power(head_m, self.segment.b)

    def kernel(self) -> Floats:
        """Stage to daily means, from arrays to arrays."""
        return _daily(self.inputs, self.readings)

    def from_database(self) -> Floats:
        """The same from packed months: inputs and readings are read each time."""
        inputs = load(self.station, self.first, date(LAST_YEAR, 12, 31))
        assert inputs.series is not None
        return _daily(inputs, flows.readings_of(inputs)[inputs.series.pk])

    def read(self) -> Readings:
        """The readings alone."""
        return blocks.read(1, int(self.readings.times_s[0]), int(self.readings.times_s[-1]))


def record(station: Station, years: int) -> Record:
    """Load a record of so many years, the last of them included."""
    inputs = load(station, date(LAST_YEAR + 1 - years, 1, 1), date(LAST_YEAR, 12, 31))
    readings = next(iter(flows.readings_of(inputs).values()))
    segment = CurveSegment.objects.filter(curve__station=station).order_by("-lower_stage_m")[0]
    return Record(station, segment, inputs, readings, years)


def _daily(inputs: StationInputs, raw: Readings) -> Floats:
    series = inputs.series
    assert series is not None
    stage_m = to_stage(
        raw.times_s, raw.values_m, settings=series.settings, corrections=series.corrections
    )
    rated = rate(raw.times_s, stage_m, periods=inputs.periods, gap_limit_s=series.gap_limit_s)
    return daily_means(
        rated.times_s,
        rated.flow_m3s,
        marks=rated.marks,
        edges_s=inputs.edges_s,
        gap_limit_s=series.gap_limit_s,
        least_covered=inputs.clock.least_covered,
    ).mean


def ratios(folder: Path, *, years: int, runs: int) -> Iterator[Ratio]:
    """Measure everything about records on one generated station."""
    with contextlib.redirect_stdout(io.StringIO()):
        call_command("generate", stations=1, years=years, verbosity=0)
    station = Station.objects.get()
    yield from _kernel(record(station, 1), runs=runs, hold=2.8)
    whole = record(station, years)
    yield from _kernel(whole, runs=runs, hold=2.2)
    rows.fill(whole.readings)
    yield from _against_rows(whole, runs=runs)
    yield from _bytes(whole)
    rows.drop()
    yield _import(folder, station, years=years, runs=runs)


def _kernel(one: Record, *, runs: int, hold: float) -> Iterator[Ratio]:
    works = {"bare": one.bare_power, "kernel": one.kernel}
    taken = medians(works, runs=runs, clock=time.process_time)  # no other process in between
    told = f"{one.years} years" if one.years > 1 else "1 year"
    yield Ratio(
        f"kernel, stage to daily means, {told}, CPU, to bare power",
        taken.ratio("kernel", "bare"),
        hold,
        remark=milliseconds(**taken),
    )
    if one.years > 1:
        taken = medians({"bare": one.bare_power, "all": one.from_database}, runs=runs)
        yield Ratio(
            f"the same from the database, {told}, to bare power",
            taken.ratio("all", "bare"),
            5,
            remark=milliseconds(**taken),
        )


def _against_rows(one: Record, *, runs: int) -> Iterator[Ratio]:
    segment = one.segment
    taken = medians(
        {
            "database": one.from_database,
            "pandas": lambda: rows.daily_means(
                c=segment.c, h0_m=segment.h0_m, b=segment.b, first=one.first, days=one.inputs.n_days
            ),
            "blocks": one.read,
            "rows": rows.read,
        },
        runs=runs,
    )
    yield Ratio(
        f"rows by ORM + pandas, to the same from the database, {one.years} years",
        taken.ratio("pandas", "database"),
        15,
        at_least=True,
        remark=milliseconds(pandas=taken["pandas"], database=taken["database"]),
    )
    yield Ratio(
        f"reading rows by ORM, to reading packed months, {one.years} years",
        taken.ratio("rows", "blocks"),
        200,
        at_least=True,
        remark=milliseconds(rows=taken["rows"], months=taken["blocks"]),
    )


def _bytes(one: Record) -> Iterator[Ratio]:
    count = len(one.readings)
    steps = np.diff(np.rint(one.readings.values_m * 1000).astype(np.int64))
    share = np.unique(steps, return_counts=True)[1] / len(steps)
    # H = −Σ p · log2 p, in bits a reading
    entropy = float(-(share * np.log2(share)).sum()) / 8
    packed = rows.bytes_of(Block._meta.db_table)
    yield Ratio(
        "bytes a reading in the database, to the entropy of the mm differences",
        packed / count / entropy,
        1.7,
        remark=f"{packed / count:.2f} to {entropy:.2f} bytes",
    )
    yield Ratio(
        "bytes of rows in the database, to those of packed months",
        rows.table_bytes() / packed,
        100,
        at_least=True,
    )


def _import(folder: Path, station: Station, *, years: int, runs: int) -> Ratio:
    """Import files of some years into an empty series; each file differs, or it would be known."""
    label = Series.objects.get(station=station).label
    names = [_logger_file(folder, years, seed=turn) for turn in range(runs + 1)]
    files = iter(names)

    def take() -> None:
        call_command(
            "import_file", station.code, label, place.PROFILE, str(next(files)),
            by=place.PERSON, stdout=io.StringIO(), stderr=io.StringIO(),
        )  # fmt: skip

    def pandas() -> None:
        pd.read_csv(names[0], parse_dates=["time"], dtype={"stage": np.float64})

    taken = medians(
        {"import": take, "pandas": pandas}, runs=runs, prepare=Block.objects.all().delete
    )
    return Ratio(
        "import of a file, all in, to pandas.read_csv with the same types",
        taken.ratio("import", "pandas"),
        2.0,
        remark=milliseconds(all=taken["import"], pandas=taken["pandas"]),
    )


def _logger_file(folder: Path, years: int, *, seed: int) -> Path:
    start, end = f"{LAST_YEAR + 1 - years}-01-01", f"{LAST_YEAR + 1}-01-01"
    times = pd.date_range(start, end, freq="15min", inclusive="left")
    steps = np.random.default_rng(seed).normal(0, 0.002, len(times))
    stage = 2 + np.abs(np.cumsum(steps)).round(3)
    path = folder / f"file-{seed}.csv"
    pd.DataFrame({"time": times, "stage": stage}).to_csv(path, index=False, float_format="%.3f")
    return path
