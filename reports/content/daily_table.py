"""The table of daily values: months, the year, the years before, extremes, duration."""

from calendar import isleap
from collections.abc import Sequence
from datetime import UTC, datetime, timedelta

import numpy as np

from network.numerics.marks import Mark
from network.numerics.years.daily import DAY_S, NO_TIME_S, DailyExtremes
from network.numerics.years.duration import duration_curve, standard_percentiles
from network.numerics.years.earlier_years import EarlierFigures, over_years
from network.numerics.years.hidden_peak import may_hide_peak
from network.numerics.years.water_year import PeriodFigures, month_figures, year_figures
from network.numerics.years.water_year import YearFigures as KernelYear
from network.queries import blocks, flows
from network.queries.flows import StationDays
from network.queries.station_inputs import series_inputs
from reports import yearbook as y
from reports.content.year_data import YearData
from reports.printed import NO_EVENT, RECORDED, Event, Number


def daily_table(data: YearData) -> y.DailyTable:
    """Compute the whole table of a year."""
    months = _months(data, data.year, data.days.days, data.values)
    earlier = _earlier_months(data)
    return y.DailyTable(
        months=tuple(
            _month(data, figures, before) for figures, before in zip(months, earlier, strict=True)
        ),
        year=_year(data, year_of(data, data.year, data.days)),
        earlier=_earlier_year(data),
        earlier_years=earlier_label(data),
        earlier_count=len(data.earlier),
        leap_years=sum(_has_leap_day(data, year) for year in data.earlier_years),
        extremes=_extremes(data),
        duration=_duration(data),
    )


def earlier_label(data: YearData) -> str:
    """Return "1999–2018" of the years before, by their names, or nothing."""
    if not data.earlier_years:
        return ""
    first, last = (data.calendar.label(data.earlier_years[at]) for at in (0, -1))
    return first if first == last else f"{first}–{last}"


def year_of(data: YearData, year: int, days: StationDays) -> KernelYear:
    """Compute the figures of one of the years."""
    return year_figures(
        days.days,
        data.published(days),
        year=year,
        calendar=data.calendar,
        missing_allowed=data.missing_allowed,
    )


def _months(
    data: YearData, year: int, days: np.ndarray, values: np.ndarray
) -> tuple[PeriodFigures, ...]:
    return month_figures(
        days, values, year=year, calendar=data.calendar, missing_allowed=data.missing_allowed
    )


def _earlier_months(data: YearData) -> list[EarlierFigures]:
    """Sum up each month over the years before."""
    tables = [
        _months(data, year, part.days, data.published(part))
        for year, part in zip(data.earlier_years, data.earlier, strict=True)
    ]
    return [over_years([table[at] for table in tables]) for at in range(12)]


def _month(data: YearData, figures: PeriodFigures, before: EarlierFigures) -> y.Month:
    number = _number(data)
    at = (figures.first_day - data.first).days
    return y.Month(
        first=figures.first_day,
        cells=tuple(_cell(data, day) for day in range(at, at + figures.days)),
        mean=number(figures.mean),
        highest=Event(number(figures.maximum, _doubt(figures)), figures.maximum_day),
        lowest=Event(number(figures.minimum), figures.minimum_day),
        volume_hm3=_volume(data, figures),
        runoff_mm=_runoff(data, figures),
        earlier_mean=number(before.mean),
        earlier_highest=Event(number(before.maximum), before.maximum_day),
        earlier_lowest=Event(number(before.minimum), before.minimum_day),
    )


def _cell(data: YearData, at: int) -> Number:
    """Print a day; a missing one carries only the mark that says why."""
    return _number(data)(data.values[at], Mark(int(data.days.marks[at])))


def _doubt(figures: PeriodFigures) -> Mark:
    return Mark.PARTIAL if figures.maximum_in_doubt else RECORDED


def _number(data: YearData):
    return data.printer.stage if data.stage_only else data.printer.flow


def _volume(data: YearData, figures: PeriodFigures) -> Number:
    return data.printer.flow(None if data.stage_only else figures.volume_hm3)


def _runoff(data: YearData, figures: PeriodFigures) -> Number:
    area = data.station.catchment_km2
    return data.printer.flow(figures.runoff_mm(area) if area and not data.stage_only else None)


def _year(data: YearData, figures: KernelYear) -> y.YearFigures:
    number, area = _number(data), data.station.catchment_km2
    specific = figures.specific_l_s_km2(area) if area and not data.stage_only else None
    return y.YearFigures(
        mean=number(figures.mean),
        highest_day=Event(number(figures.maximum, _doubt(figures)), figures.maximum_day),
        lowest_day=Event(number(figures.minimum), figures.minimum_day),
        lowest_seven_days=_seven_days(data, figures),
        volume_hm3=_volume(data, figures),
        runoff_mm=_runoff(data, figures),
        specific_ls_km2=data.printer.flow(specific),
    )


def _seven_days(data: YearData, figures: KernelYear | None) -> Event:
    """Print the lowest mean flow of seven days; of stage nobody asks for it."""
    if data.stage_only or figures is None:
        return NO_EVENT
    mean = data.printer.flow(figures.lowest_7_day_mean)
    return Event(mean, figures.lowest_7_day_last_day)


def _earlier_year(data: YearData) -> y.YearFigures | None:
    """Sum up the years before: mean of the means, extremes with their days."""
    if not data.earlier:
        return None
    years = [
        year_of(data, year, part)
        for year, part in zip(data.earlier_years, data.earlier, strict=True)
    ]
    figures, number = over_years(years), _number(data)
    sevens = [f for f in years if f.lowest_7_day_mean is not None]
    seven = min(sevens, key=lambda f: f.lowest_7_day_mean or 0.0, default=None)
    complete = [f for f in years if f.mean is not None]
    return y.YearFigures(
        mean=number(figures.mean),
        highest_day=Event(number(figures.maximum), figures.maximum_day),
        lowest_day=Event(number(figures.minimum), figures.minimum_day),
        lowest_seven_days=_seven_days(data, seven),
        volume_hm3=_mean(data, [f.volume_hm3 for f in complete]),
        runoff_mm=_mean(data, [_runoff_value(data, f) for f in complete]),
        specific_ls_km2=_mean(data, [_specific_value(data, f) for f in complete]),
    )


def _mean(data: YearData, values: Sequence[float | None]) -> Number:
    known = [value for value in values if value is not None]
    return data.printer.flow(None if data.stage_only or not known else float(np.mean(known)))


def _runoff_value(data: YearData, figures: PeriodFigures) -> float | None:
    area = data.station.catchment_km2
    return figures.runoff_mm(area) if area else None


def _specific_value(data: YearData, figures: PeriodFigures) -> float | None:
    area = data.station.catchment_km2
    return figures.specific_l_s_km2(area) if area else None


def _has_leap_day(data: YearData, year: int) -> bool:
    first, last = data.calendar.first_day(year), data.calendar.last_day(year)
    leap = next((each for each in (first.year, last.year) if isleap(each)), None)
    return leap is not None and first <= first.replace(year=leap, month=2, day=29) <= last


def _duration(data: YearData) -> tuple[y.DurationRow, ...]:
    number = _number(data)
    own = standard_percentiles(duration_curve(data.values))
    before = (
        standard_percentiles(
            duration_curve(np.concatenate([data.published(part) for part in data.earlier]))
        )
        if data.earlier
        else {}
    )
    return tuple(
        y.DurationRow(percent=percent, value=number(value), earlier=number(before.get(percent)))
        for percent, value in own.items()
    )


def _extremes(data: YearData) -> y.Extremes:
    """Find the instants of highest and lowest value in the year and in the record so far."""
    parts = (*data.earlier, data.days)
    since = data.calendar.label((*data.earlier_years, data.year)[0])
    return y.Extremes(
        year_highest=_extreme(data, [data.days], highest=True),
        year_lowest=_extreme(data, [data.days], highest=False),
        record_highest=_extreme(data, parts, highest=True),
        record_lowest=_extreme(data, parts, highest=False),
        record_since=since,
    )


def _extreme(data: YearData, parts: Sequence[StationDays], *, highest: bool) -> y.Extreme:
    """Find the highest or lowest reading; a daily value beyond all readings stands in for it.

    The peak of a day is at least its mean, and more may have fallen where no reading is.
    """
    kind = "highest" if highest else "lowest"
    extremes: list[DailyExtremes] = [p.stage if data.stage_only else p.flow for p in parts]
    values = np.concatenate([getattr(each, kind) for each in extremes])
    times = np.concatenate([getattr(each, f"{kind}_time_s") for each in extremes])
    daily = np.concatenate([data.published(part) for part in parts])
    if np.isnan(values).all() and np.isnan(daily).all():
        return y.Extreme(stage_m=NO_EVENT.number)
    sign = 1 if highest else -1
    read = np.where(np.isnan(values), -np.inf, sign * values)
    typed = np.where(np.isnan(daily), -np.inf, sign * daily)
    if typed.max() > read.max():
        at = int(np.argmax(typed))
        day = np.concatenate([part.days for part in parts])[at].astype(object)
        return _told(data, float(daily[at]), None, day, at_least=highest)
    at = int(np.argmax(read))
    instant = datetime.fromtimestamp(int(times[at]), UTC) if times[at] != NO_TIME_S else None
    marks = np.concatenate([part.marks for part in parts])
    doubt = highest and may_hide_peak(daily, values, marks)
    return _told(data, float(values[at]), instant, None, at_least=doubt)


def _told(data, value, instant, day, *, at_least: bool) -> y.Extreme:
    if data.stage_only:
        return y.Extreme(stage_m=data.printer.stage(value, at_least=at_least), at=instant or day)
    return y.Extreme(
        stage_m=data.printer.stage(_stage_at(data, instant) if instant else None),
        flow_m3s=data.printer.flow(value, at_least=at_least),
        at=instant or day,
    )


def _stage_at(data: YearData, instant: datetime) -> float | None:
    """Return the stage of the record at the instant of an extreme flow."""
    series = data.station.series.filter(is_primary=True).first()
    at_s, day = int(instant.timestamp()), timedelta(seconds=DAY_S)
    if series is None:
        return None
    raw = blocks.read(series.pk, at_s - DAY_S, at_s + DAY_S)
    if not len(raw):
        return None
    stage_m = flows.stage_of(series_inputs(series, instant - day, instant + day), raw)
    return float(np.interp(at_s, raw.times_s, stage_m))
