"""The days of a year and of all years before it, read once for every part of the content."""

from dataclasses import dataclass, replace
from datetime import date, datetime, timedelta, timezone
from functools import cached_property

import numpy as np
import numpy.typing as npt

from network.models import Agency, Station
from network.numerics.arrays import Floats
from network.numerics.years.water_year import WaterYear
from network.queries import clock, station_years
from network.queries.flows import StationDays
from reports.content.printer import Printer


@dataclass(frozen=True, eq=False)
class YearData:
    """A station, a water year, its days and those of the years before."""

    station: Station
    agency: Agency
    calendar: WaterYear
    year: int
    days: StationDays
    earlier: tuple[StationDays, ...]
    earlier_years: tuple[int, ...]

    @property
    def stage_only(self) -> bool:
        """Whether stage is what is published."""
        return not self.station.is_rated

    @property
    def printer(self) -> Printer:
        """How the agency prints numbers."""
        return Printer.of(self.agency)

    @property
    def clock(self) -> timezone:
        """The record clock."""
        return clock.record_clock(self.agency)

    @property
    def first(self) -> date:
        """First day of the year."""
        return self.calendar.first_day(self.year)

    @property
    def last(self) -> date:
        """Last day of the year."""
        return self.calendar.last_day(self.year)

    @property
    def start(self) -> datetime:
        """Instant at which the year starts."""
        return clock.day_start(self.first, of=self.agency)

    @property
    def end(self) -> datetime:
        """Instant at which the year ends."""
        return clock.day_start(self.last + timedelta(days=1), of=self.agency)

    @property
    def missing_allowed(self) -> int:
        """Missing days up to which a mean is still printed."""
        return 0 if self.agency.months_need_every_day else 366

    @property
    def values(self) -> Floats:
        """The published daily values: m³/s, or m at a stage-only station."""
        return self.published(self.days)

    def published(self, days: StationDays) -> Floats:
        """Return the published values of some days."""
        return days.stage_m if self.stage_only else days.flow_m3s

    @cached_property
    def all_days(self) -> npt.NDArray[np.datetime64]:
        """All days up to the end of this year."""
        return np.concatenate([*(part.days for part in self.earlier), self.days.days])

    @cached_property
    def all_values(self) -> Floats:
        """The published values of all days up to the end of this year."""
        return np.concatenate([*(self.published(part) for part in self.earlier), self.values])


def read_alone(station: Station, year: int) -> YearData:
    """Read the days of a station's water year without those of the years before it."""
    days = station_years.year_of_station(station, year)
    return YearData(station, clock.agency(), station_years.calendar(), year, days, (), ())


def read(station: Station, year: int) -> YearData:
    """Read the days of a station's water year and of the years before it.

    Raises LookupError when the year has neither readings nor typed flows.
    """
    on_record = [each for each in station_years.years_on_record(station) if each <= year]
    calendar = station_years.calendar()
    if year not in on_record:
        raise LookupError(f"{station} has no record in {calendar.label(year)}.")
    *earlier, days = station_years.years_of_station(station, on_record)
    data = YearData(
        station, clock.agency(), calendar, year, days, tuple(earlier), tuple(on_record[:-1])
    )
    kept = [
        (part, each)
        for part, each in zip(data.earlier, data.earlier_years, strict=True)
        if not np.isnan(data.published(part)).all()
    ]
    return replace(
        data,
        earlier=tuple(part for part, _year in kept),
        earlier_years=tuple(each for _part, each in kept),
    )
