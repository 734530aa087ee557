"""From a station's frozen inputs and readings to its daily figures: the one way there is."""

from collections.abc import Callable, Mapping
from dataclasses import dataclass, replace
from datetime import date

import numpy as np
import numpy.typing as npt

from network.models import Note, Station
from network.numerics.arrays import Bools, Floats, MarkBits, Seconds
from network.numerics.marks import Mark
from network.numerics.ratings.rating import Rated, rate
from network.numerics.records.readings import Readings, no_readings
from network.numerics.records.stage import to_stage
from network.numerics.years.daily import DailyExtremes, Days, daily_extremes, daily_means
from network.queries import blocks, infills
from network.queries.station_inputs import SeriesInputs, StationInputs, load

ICE_OR_BACKWATER = {Note.Cause.ICE, Note.Cause.BACKWATER}


@dataclass(frozen=True, eq=False)
class StationDays:
    """Daily figures of a station, one row a day; NaN and MISSING where there is none.

    days datetime64[D]; flow_m3s daily mean flow (all NaN at a stage-only station); stage_m daily
    mean stage; marks uint8 of the published value (flow, or stage where there is no flow);
    covered_s int64; estimated_percent the ± % stated for estimated and typed days, else NaN;
    stage and flow extremes of the readings with their times.
    """

    days: npt.NDArray[np.datetime64]
    flow_m3s: Floats
    stage_m: Floats
    marks: MarkBits
    covered_s: Seconds
    estimated_percent: Floats
    stage: DailyExtremes
    flow: DailyExtremes

    def part(self, first_day: date, last_day: date) -> "StationDays":
        """Return the days from first to last, both included and inside."""
        start = int((np.datetime64(first_day, "D") - self.days[0]).astype(int))
        stop = start + (last_day - first_day).days + 1
        cut = slice(start, stop)
        return StationDays(
            days=self.days[cut],
            flow_m3s=self.flow_m3s[cut],
            stage_m=self.stage_m[cut],
            marks=self.marks[cut],
            covered_s=self.covered_s[cut],
            estimated_percent=self.estimated_percent[cut],
            stage=extremes_part(self.stage, cut),
            flow=extremes_part(self.flow, cut),
        )


def extremes_part(extremes: DailyExtremes, cut: slice) -> DailyExtremes:
    """Return some days of daily extremes."""
    return DailyExtremes(*(column[cut] for column in vars(extremes).values()))


def calendar_days(first_day: date, n_days: int) -> npt.NDArray[np.datetime64]:
    """Return consecutive days: datetime64[D][n_days]."""
    return np.datetime64(first_day, "D") + np.arange(n_days)


def days_of(station: Station, first_day: date, last_day: date) -> StationDays:
    """Read inputs and readings of a station and compute its days, first and last included."""
    inputs = load(station, first_day, last_day)
    return compute(inputs, readings_of(inputs)).part(first_day, last_day)


def readings_of(inputs: StationInputs) -> Mapping[int, Readings]:
    """Read the raw readings the inputs need, by series; one step beyond either end."""
    wanted = [inputs.series, *(span.series for span in inputs.infills)]
    edges = inputs.edges_s
    return {
        series.pk: blocks.read(
            series.pk, int(edges[0]) - series.gap_limit_s, int(edges[-1]) + series.gap_limit_s
        )
        for series in wanted
        if series is not None
    }


def rated_record(
    inputs: StationInputs, series: SeriesInputs | None, raw: Mapping[int, Readings]
) -> Rated:
    """Turn a series into a record of stage and flow, as if the water were open throughout."""
    readings = no_readings() if series is None else raw.get(series.pk, no_readings())
    if series is None or not len(readings):
        nothing = np.empty(0)
        return Rated(np.empty(0, np.int64), nothing, nothing, np.empty(0, np.uint8))
    stage_m = stage_of(series, readings)
    return rate(readings.times_s, stage_m, periods=inputs.periods, gap_limit_s=series.gap_limit_s)


def stage_of(series: SeriesInputs, raw: Readings) -> Floats:
    """Turn the raw readings of a series into stage, m: float64 of their length."""
    return to_stage(
        raw.times_s, raw.values_m, settings=series.settings, corrections=series.corrections
    )


def compute(inputs: StationInputs, raw: Mapping[int, Readings]) -> StationDays:
    """Compute the daily figures of the inputs' whole period: a pure function but for neighbours."""
    open_water = rated_record(inputs, inputs.series, raw)
    record = without_unrated_periods(open_water, inputs)
    stage = _means(inputs, record.times_s, record.stage_m)
    flow = _means(inputs, record.times_s, record.flow_m3s, record.marks)
    published = flow if inputs.station.is_rated else stage
    days = StationDays(
        days=calendar_days(inputs.first_day, inputs.n_days),
        flow_m3s=flow.mean,
        stage_m=stage.mean,
        marks=published.marks | _noted(inputs),
        covered_s=published.covered_s,
        estimated_percent=np.full(inputs.n_days, np.nan),
        stage=daily_extremes(record.times_s, record.stage_m, edges_s=inputs.edges_s),
        flow=daily_extremes(record.times_s, record.flow_m3s, edges_s=inputs.edges_s),
    )
    return with_typed(with_infills(days, inputs, raw, open_water), inputs)


def without_unrated_periods(record: Rated, inputs: StationInputs) -> Rated:
    """Blank the flow where a note says that it is estimated or withheld.

    A step of the record is split at either end of the note, so that nothing beside it is lost.
    """
    gap_limit_s = inputs.series.gap_limit_s if inputs.series else 0
    for note in inputs.notes:
        if note.flows != Note.Flows.STAND:
            record = _cut_out(record, note.start_s, note.end_s, gap_limit_s=gap_limit_s)
    return record


def _cut_out(record: Rated, start_s: int, end_s: int, *, gap_limit_s: int) -> Rated:
    """Blank the flow for start_s ≤ t < end_s; the flow at both ends is interpolated."""
    begin, stop = (int(at) for at in np.searchsorted(record.times_s, (start_s, end_s)))
    inside = _part(record, slice(begin, stop))
    before = _at_edge(record, start_s, begin, gap_limit_s=gap_limit_s)
    after = _at_edge(record, end_s, stop, gap_limit_s=gap_limit_s)
    return _joined(
        _part(record, slice(0, begin)),
        before,
        *(_blank(part) for part in (before, inside, after)),
        after,
        _part(record, slice(stop, None)),
    )


def _at_edge(record: Rated, at_s: int, following: int, *, gap_limit_s: int) -> Rated:
    """Interpolate a record inside a step that is bridged; nothing elsewhere."""
    step = slice(following - 1, following + 1)
    times_s = record.times_s[step] if following > 0 else record.times_s[:0]
    if len(times_s) < 2 or times_s[1] - times_s[0] > gap_limit_s:
        return _part(record, slice(0, 0))
    stage_m, flow_m3s = (
        np.interp([at_s], times_s, column[step]) for column in (record.stage_m, record.flow_m3s)
    )
    return Rated(np.array([at_s], np.int64), stage_m, flow_m3s, record.marks[step][:1])


def _part(record: Rated, cut: slice) -> Rated:
    return Rated(*(column[cut] for column in vars(record).values()))


def _blank(record: Rated) -> Rated:
    return replace(record, flow_m3s=np.full(len(record.flow_m3s), np.nan))


def _joined(*parts: Rated) -> Rated:
    return Rated(
        *(
            np.concatenate(columns)
            for columns in zip(*(vars(p).values() for p in parts), strict=True)
        )
    )


def with_infills(
    days: StationDays, inputs: StationInputs, raw: Mapping[int, Readings], open_water: Rated
) -> StationDays:
    """Fill missing days by each infill in turn; what is filled is marked estimated."""
    flow_m3s, marks = days.flow_m3s.copy(), days.marks.copy()
    percent = days.estimated_percent.copy()
    for span in inputs.infills:
        estimator = infills.Estimator(
            station=inputs.station,
            span=span,
            days=days.days,
            flow_m3s=flow_m3s,
            open_water_m3s=_later(inputs, open_water),
            other_series_m3s=_later(inputs, rated_record(inputs, span.series, raw)),
            gauged=_gauging_ratios(inputs, open_water),
            neighbour_days=neighbour_days,
        )
        estimate = estimator.estimate()
        filled = np.isnan(flow_m3s) & ~np.isnan(estimate) & ~_withheld(marks)
        flow_m3s[filled] = estimate[filled]
        percent[filled] = span.uncertainty_percent
        marks[filled] = (marks[filled] & Mark.ICE_OR_BACKWATER) | Mark.ESTIMATED
    return replace(days, flow_m3s=flow_m3s, marks=marks, estimated_percent=percent)


def with_typed(days: StationDays, inputs: StationInputs) -> StationDays:
    """Let typed daily flows stand before any other; they are marked typed."""
    flow_m3s, marks = days.flow_m3s.copy(), days.marks.copy()
    percent = days.estimated_percent.copy()
    for day, value, stated_percent in inputs.typed:
        at = (day - inputs.first_day).days
        flow_m3s[at], percent[at] = value, stated_percent
        marks[at] = (marks[at] & Mark.ICE_OR_BACKWATER) | Mark.TYPED
    return replace(days, flow_m3s=flow_m3s, marks=marks, estimated_percent=percent)


def neighbour_days(station: Station, neighbour: Station) -> infills.CommonDays:
    """Return both stations' whole records without their own infills, for a regression."""
    spans = [blocks.days_spanned(each) for each in (station, neighbour)]
    known = [span for span in spans if span is not None]
    if len(known) < 2:
        return infills.CommonDays.none()
    first, last = min(span[0] for span in known), max(span[1] for span in known)
    records = []
    for each in (station, neighbour):
        inputs = load(each, first, last, with_infills=False)
        records.append(compute(inputs, readings_of(inputs)).flow_m3s)
    return infills.CommonDays(first, *records)


def _means(
    inputs: StationInputs, times_s: Seconds, values: Floats, marks: MarkBits | None = None
) -> Days:
    return daily_means(
        times_s,
        values,
        marks=np.zeros(len(times_s), np.uint8) if marks is None else marks,
        edges_s=inputs.edges_s,
        gap_limit_s=inputs.series.gap_limit_s if inputs.series else 0,
        least_covered=inputs.clock.least_covered,
    )


def _later(inputs: StationInputs, record: Rated) -> Callable[[], Floats]:
    """Return the daily means of a record when they are asked for."""
    return lambda: _means(inputs, record.times_s, record.flow_m3s).mean


def _noted(inputs: StationInputs) -> MarkBits:
    """Return the marks that notes put on the days they touch."""
    bits = np.zeros(inputs.n_days, np.uint8)
    if not inputs.station.is_rated:
        return bits
    edges = inputs.edges_s
    for note in inputs.notes:
        touched = (edges[:-1] < note.end_s) & (edges[1:] > note.start_s)
        if note.cause in ICE_OR_BACKWATER:
            bits[touched] |= np.uint8(Mark.ICE_OR_BACKWATER)
        if note.flows == Note.Flows.WITHHELD:
            bits[touched] |= np.uint8(Mark.WITHHELD)
    return bits


def _gauging_ratios(inputs: StationInputs, open_water: Rated) -> tuple[Floats, Floats]:
    """Return each gauging's time in days since the first day, and measured over open-water flow."""
    if inputs.gauged_s is None or inputs.gauged_m3s is None or not len(open_water.times_s):
        return np.empty(0), np.empty(0)
    rated = np.interp(inputs.gauged_s, open_water.times_s, open_water.flow_m3s)
    known = rated > 0
    days = (inputs.gauged_s[known] - inputs.edges_s[0]) / 86_400
    return days, inputs.gauged_m3s[known] / rated[known]


def _withheld(marks: MarkBits) -> Bools:
    return (marks & Mark.WITHHELD) > 0
