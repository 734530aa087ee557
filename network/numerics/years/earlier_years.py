"""What earlier years did: of a month, of a year, and of each calendar date."""

import math
from collections.abc import Sequence
from dataclasses import dataclass
from datetime import date

import numpy as np

from network.numerics.arrays import Floats, Indices
from network.numerics.years.water_year import Days, PeriodFigures, WaterYear


@dataclass(frozen=True)
class EarlierFigures:
    """Hold what the same month, or the whole year, did in earlier years; None where none is known.

    years_with_mean counts the years whose mean is known; the extremes carry their dates.
    """

    years_with_mean: int
    mean: float | None
    minimum: float | None
    minimum_day: date | None
    maximum: float | None
    maximum_day: date | None


def over_years(figures: Sequence[PeriodFigures]) -> EarlierFigures:
    """Sum up the figures of one month, or of the year, over several years given in order of time.

    The mean is the mean of the known means; of equal extremes the first is kept.
    """
    means = [f.mean for f in figures if f.mean is not None]
    lows = [(f.minimum, f.minimum_day) for f in figures if f.minimum is not None]
    highs = [(f.maximum, f.maximum_day) for f in figures if f.maximum is not None]
    low, low_day = min(lows, key=lambda pair: pair[0], default=(None, None))
    high, high_day = max(highs, key=lambda pair: pair[0], default=(None, None))
    mean = math.fsum(means) / len(means) if means else None
    return EarlierFigures(len(means), mean, low, low_day, high, high_day)


@dataclass(frozen=True, eq=False)
class DayBands:
    """Hold the earlier values of each calendar date of a year: arrays of its 365 or 366 days.

    count is the number of earlier values of that date (fewer on 29 February); NaN where 0.
    """

    days: Days
    count: Indices
    minimum: Floats
    lower_quartile: Floats
    median: Floats
    upper_quartile: Floats
    maximum: Floats
    mean: Floats


def day_bands(days: Days, values: Floats, *, year: int, calendar: WaterYear) -> DayBands:
    """Compare a year with all earlier ones by calendar date.

    days datetime64[D][n], values float64[n]; only days of earlier years count. Quartiles are
    linear between ranked values. Source: common practice.
    """
    first, last = (
        np.datetime64(day, "D") for day in (calendar.first_day(year), calendar.last_day(year))
    )
    wanted = np.arange(first, last + 1)
    earlier = (calendar.years_of(days) < year) & ~np.isnan(values)
    rows = np.unique(calendar.years_of(days[earlier]), return_inverse=True)[1]
    table = np.full((int(rows.max(initial=0)) + 1, 12 * 31), np.nan)
    table[rows, _date_number(days[earlier])] = values[earlier]
    count = (~np.isnan(table)).sum(axis=0)
    spread = np.full((6, table.shape[1]), np.nan)
    known = count > 0
    spread[:5, known] = np.nanpercentile(table[:, known], [0, 25, 50, 75, 100], axis=0)
    spread[5, known] = np.nanmean(table[:, known], axis=0)
    at = _date_number(wanted)
    return DayBands(wanted, count[at], *spread[:, at])


def _date_number(days: Days) -> Indices:
    """Number the calendar dates from 0 for 1 January, 31 to each month."""
    months = days.astype("datetime64[M]")
    of_month: Indices = (days - months.astype("datetime64[D]")).astype(np.intp)
    return of_month + months.astype(np.intp) % 12 * 31
