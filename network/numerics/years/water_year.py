"""The year's calendar, its monthly and annual figures, and rounding."""

import math
from dataclasses import dataclass
from datetime import date, timedelta
from decimal import ROUND_HALF_EVEN, ROUND_HALF_UP, Decimal
from typing import Literal

import numpy as np
import numpy.typing as npt

from network.numerics.arrays import Floats

Days = npt.NDArray[np.datetime64]  # datetime64[D], a day carrying the date on which it starts

SECONDS_PER_DAY = 86_400
ROUNDING = {"half_up": ROUND_HALF_UP, "half_even": ROUND_HALF_EVEN}


@dataclass(frozen=True)
class WaterYear:
    """Say in which month the year starts and whether it is named by the year it starts or ends in.

    A year that starts in January is the calendar year, whichever way it is named.
    Raises ValueError for a month outside 1–12.
    """

    start_month: int = 1
    named_by: Literal["start", "end"] = "start"

    def __post_init__(self) -> None:
        if not 1 <= self.start_month <= 12:
            raise ValueError(f"The year starts in month 1 to 12, not {self.start_month}.")
        if self.named_by not in ("start", "end"):
            raise ValueError(f"A year is named by its start or its end, not by {self.named_by!r}.")

    @property
    def _named_later(self) -> int:
        return int(self.named_by == "end" and self.start_month > 1)

    def first_day(self, year: int) -> date:
        """Return the first day of a year."""
        return date(year - self._named_later, self.start_month, 1)

    def last_day(self, year: int) -> date:
        """Return the last day of a year."""
        return self.first_day(year + 1) - timedelta(days=1)

    def year_of(self, day: date) -> int:
        """Return the name of the year a day lies in."""
        return day.year - int(day.month < self.start_month) + self._named_later

    def years_of(self, days: Days) -> npt.NDArray[np.int64]:
        """Return the names of the years the days lie in: datetime64[D][n] → int64[n]."""
        months = days.astype("datetime64[M]").astype(np.int64)
        return (months - (self.start_month - 1)) // 12 + 1970 + self._named_later

    def label(self, year: int) -> str:
        """Return both years in print, "2019/20" or "1999/2000"; of a calendar year its number."""
        first, last = self.first_day(year).year, self.last_day(year).year
        if first == last:
            return str(first)
        return f"{first}/{last if last % 100 == 0 else f'{last % 100:02d}'}"

    def months(self, year: int) -> tuple[date, ...]:
        """Return the first days of the twelve months of a year, in order."""
        first = self.first_day(year)
        return tuple(
            date(first.year + (first.month - 1 + k) // 12, (first.month - 1 + k) % 12 + 1, 1)
            for k in range(12)
        )


@dataclass(frozen=True)
class PeriodFigures:
    """Hold the figures of a month or a year, in the unit of the daily values (m³/s or m).

    mean, total and minimum are None when too many days are missing. The maximum is given as soon
    as there is one day; `maximum_in_doubt` then says that a day is missing and it may have been
    higher. Dates are the first of a tie. `total` sums the daily values of the days present.
    """

    first_day: date
    days: int
    days_present: int
    mean: float | None
    total: float | None
    minimum: float | None
    minimum_day: date | None
    maximum: float | None
    maximum_day: date | None

    @property
    def complete(self) -> bool:
        """Say whether every day is there."""
        return self.days_present == self.days

    @property
    def maximum_in_doubt(self) -> bool:
        """Say whether the maximum is to be marked because a day is missing."""
        return self.maximum is not None and not self.complete

    @property
    def volume_m3(self) -> float | None:
        """Return the volume of the daily mean flows of the days present."""
        # V = Σ Q̄ · 86 400
        return None if self.total is None else self.total * SECONDS_PER_DAY

    @property
    def volume_hm3(self) -> float | None:
        """Return the volume in millions of cubic metres."""
        return None if self.volume_m3 is None else self.volume_m3 / 1e6

    def runoff_mm(self, area_km2: float) -> float | None:
        """Return the depth of runoff over the catchment, mm."""
        # 1 m³ over 1 km² = 0.001 mm
        return None if self.volume_m3 is None else self.volume_m3 / area_km2 / 1000

    def specific_l_s_km2(self, area_km2: float) -> float | None:
        """Return the specific discharge, l/s for each km²."""
        return None if self.mean is None else self.mean * 1000 / area_km2


@dataclass(frozen=True)
class YearFigures(PeriodFigures):
    """Hold the figures of a year and the lowest mean of 7 consecutive days wholly inside it."""

    lowest_7_day_mean: float | None
    lowest_7_day_last_day: date | None


def on_calendar(days: Days, values: Floats, *, first: date, last: date) -> Floats:
    """Lay daily values on a whole calendar: float64, one each from first to last, NaN = missing.

    days datetime64[D][n] in any order, values float64[n]. Raises ValueError when a day is twice.
    """
    if len(days) != len(values):
        raise ValueError(f"{len(days)} days but {len(values)} values.")
    if len(np.unique(days)) != len(days):
        raise ValueError("A day occurs twice.")
    laid = np.full((last - first).days + 1, np.nan)
    at = (days - np.datetime64(first, "D")).astype(np.int64)
    inside = (at >= 0) & (at < len(laid))
    laid[at[inside]] = values[inside]
    return laid


def period_figures(values: Floats, *, first_day: date, missing_allowed: int = 0) -> PeriodFigures:
    """Compute the figures of consecutive days, float64[days] with NaN for a missing day.

    missing_allowed is the number of missing days up to which mean, total and minimum are still
    given, from the days present. Source: common practice; unrounded daily values go in.
    """
    present = values[~np.isnan(values)].tolist()
    enough = bool(present) and len(values) - len(present) <= missing_allowed
    # fsum: a sum rounded once, so that a tie in the third figure is not decided by summing order
    total = math.fsum(present) if enough else None
    lowest = int(np.nanargmin(values)) if enough else None
    highest = int(np.nanargmax(values)) if present else None
    return PeriodFigures(
        first_day=first_day,
        days=len(values),
        days_present=len(present),
        mean=None if total is None else total / len(present),
        total=total,
        minimum=None if lowest is None else float(values[lowest]),
        minimum_day=None if lowest is None else first_day + timedelta(days=lowest),
        maximum=None if highest is None else float(values[highest]),
        maximum_day=None if highest is None else first_day + timedelta(days=highest),
    )


def month_figures(
    days: Days, values: Floats, *, year: int, calendar: WaterYear, missing_allowed: int = 0
) -> tuple[PeriodFigures, ...]:
    """Compute the figures of the twelve months of a year, in the order of the year.

    days datetime64[D][n], values float64[n] unrounded daily means, NaN or absent = missing.
    """
    starts = calendar.months(year)
    ends = (*starts[1:], calendar.first_day(year + 1))
    laid = on_calendar(days, values, first=starts[0], last=calendar.last_day(year))
    return tuple(
        period_figures(
            laid[(start - starts[0]).days : (end - starts[0]).days],
            first_day=start,
            missing_allowed=missing_allowed,
        )
        for start, end in zip(starts, ends, strict=True)
    )


def year_figures(
    days: Days, values: Floats, *, year: int, calendar: WaterYear, missing_allowed: int = 0
) -> YearFigures:
    """Compute the figures of a year; arguments as for the months.

    The 7-day minimum, like the minimum, is given only when enough days are there, and only of
    windows without a missing day.
    """
    first = calendar.first_day(year)
    laid = on_calendar(days, values, first=first, last=calendar.last_day(year))
    whole = period_figures(laid, first_day=first, missing_allowed=missing_allowed)
    sums = [math.fsum(window) for window in np.lib.stride_tricks.sliding_window_view(laid, 7)]
    low = None
    if whole.mean is not None and not np.isnan(sums).all():
        low = int(np.nanargmin(sums))
    return YearFigures(
        **vars(whole),
        lowest_7_day_mean=None if low is None else sums[low] / 7,
        lowest_7_day_last_day=None if low is None else first + timedelta(days=low + 6),
    )


def rounded(
    value: float,
    *,
    figures: int = 3,
    max_decimals: int = 3,
    rule: Literal["half_up", "half_even"] = "half_up",
) -> Decimal:
    """Round to significant figures and at most so many decimals, keeping the zeros that count.

    Rounds the decimal number the value stands for (its 15 significant digits, all that a double
    holds for certain), so 2.675 becomes 2.68 although the double lies below, and a sum that came
    out as 4.064999999999999 is a tie like 4.065. Raises ValueError when not finite.
    """
    if not math.isfinite(value):
        raise ValueError(f"{value} cannot be rounded.")
    exact = Decimal(f"{value:.15g}")
    if exact == 0:
        return Decimal(0)
    decimals = min(figures - 1 - exact.adjusted(), max_decimals)
    result = exact.quantize(Decimal(1).scaleb(-decimals), rounding=ROUNDING[rule])
    if result.adjusted() > exact.adjusted() and decimals > figures - 1 - result.adjusted():
        # 9.996 rounded up to 10.00: one figure too many
        result = result.quantize(Decimal(1).scaleb(1 - figures + result.adjusted()))
    return result


def number_text(
    value: float,
    *,
    figures: int = 3,
    max_decimals: int = 3,
    rule: Literal["half_up", "half_even"] = "half_up",
) -> str:
    """Write a number as everything printed writes it, with a point; the caller puts its own sign.

    Zero is "0"; what is not zero but would round to it is "<0.001" (or ">-0.001").
    """
    result = rounded(value, figures=figures, max_decimals=max_decimals, rule=rule)
    if result != 0:
        return f"{result:f}"
    least = f"{Decimal(1).scaleb(-max_decimals):f}"
    if value == 0:
        return "0"
    return f"<{least}" if value > 0 else f">-{least}"
