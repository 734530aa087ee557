"""Station years from the cache where it is fresh, else computed; the codec of a cached year."""

import zlib
from collections.abc import Iterator
from datetime import date

import numpy as np

from network.models import Station, StationYear
from network.numerics.years.daily import DailyExtremes
from network.numerics.years.water_year import WaterYear
from network.queries import blocks, clock, flows
from network.queries.flows import StationDays

VERSION = b"\x01"
EXTREMES = [
    ("lowest", "<f8"),
    ("lowest_time_s", "<i8"),
    ("highest", "<f8"),
    ("highest_time_s", "<i8"),
]
ROW = np.dtype(
    [
        ("flow_m3s", "<f8"),
        ("stage_m", "<f8"),
        ("marks", "u1"),
        ("covered_s", "<i8"),
        ("estimated_percent", "<f8"),
        ("stage", EXTREMES),
        ("flow", EXTREMES),
    ]
)


def calendar() -> WaterYear:
    """Return the agency's water year."""
    own = clock.agency()
    return WaterYear(own.water_year_start_month, "end" if own.water_year_named_by_end else "start")


def years_on_record(station: Station) -> list[int]:
    """Return the water years in which a station has readings or typed flows, in order."""
    year_of = calendar().year_of
    spans = [blocks.days_spanned(station)]
    typed = station.typed_flows.standing().order_by("day").values_list("day", flat=True)
    if typed:
        spans.append((typed.first(), typed.last()))
    return sorted(
        {
            year
            for span in spans
            if span is not None
            for year in range(year_of(span[0]), year_of(span[1]) + 1)
        }
    )


def year_of_station(station: Station, year: int) -> StationDays:
    """Return the days of one water year."""
    return next(iter(years_of_station(station, [year])))


def years_of_station(station: Station, years: list[int]) -> Iterator[StationDays]:
    """Return the days of several water years, fresh rows of the cache before any computing."""
    cal = calendar()
    fresh = _fresh_rows(station)
    for year in years:
        first, last = cal.first_day(year), cal.last_day(year)
        row = fresh.get(first)
        if row is None:
            yield flows.days_of(station, first, last)
        else:
            yield unpack(bytes(row.data), first_day=first)


def _fresh_rows(station: Station) -> dict[date, StationYear]:
    """Return the cached years that no act has overtaken."""
    version = Station.objects.values_list("record_version", flat=True).get(pk=station.pk)
    rows = StationYear.objects.filter(station=station, record_version=version)
    return {row.first_day: row for row in rows}


def pack(days: StationDays) -> bytes:
    """Pack the days of a year; equal days give equal bytes."""
    table = np.zeros(len(days.days), ROW)
    for name in ("flow_m3s", "stage_m", "marks", "covered_s", "estimated_percent"):
        table[name] = getattr(days, name)
    for name in ("stage", "flow"):
        for column, _kind in EXTREMES:
            table[name][column] = getattr(getattr(days, name), column)
    return VERSION + zlib.compress(table.tobytes(), 1)


def unpack(data: bytes, *, first_day: date) -> StationDays:
    """Unpack the days of a year; raises ValueError for bytes of another version."""
    if data[:1] != VERSION:
        raise ValueError("These are not the days of a year, or of a later version.")
    table = np.frombuffer(zlib.decompress(data[1:]), ROW)
    return StationDays(
        days=flows.calendar_days(first_day, len(table)),
        **{
            name: table[name].copy()
            for name in ("flow_m3s", "stage_m", "marks", "covered_s", "estimated_percent")
        },
        stage=_extremes(table["stage"]),
        flow=_extremes(table["flow"]),
    )


def _extremes(table: np.ndarray) -> DailyExtremes:
    return DailyExtremes(*(table[name].copy() for name, _kind in EXTREMES))
