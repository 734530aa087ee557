"""All dated inputs of a station and period, frozen: two sides can be compared at leisure."""

from collections.abc import Sequence
from dataclasses import dataclass
from datetime import date, datetime, timedelta
from typing import Any

import numpy as np

from network.models import Correction, Gauging, Infill, Note, Series, Station, TypedFlow
from network.numerics.arrays import Floats, Seconds
from network.numerics.ratings.rating import RatingPeriod
from network.numerics.records.stage import SensorSettings, StageCorrection
from network.numerics.years.daily import day_starts
from network.queries import clock, curves, in_force

ONE_DAY = timedelta(days=1)


@dataclass(frozen=True)
class DayClock:
    """How instants fall into days: the record clock, the hour a day starts, its least coverage."""

    utc_offset_minutes: int
    day_starts_at_hour: int
    least_covered: float

    def edges_s(self, first_day: date, n_days: int) -> Seconds:
        """Return the n_days + 1 instants between days: int64 epoch seconds UTC."""
        return day_starts(
            first_day,
            n_days,
            utc_offset_minutes=self.utc_offset_minutes,
            day_starts_at_hour=self.day_starts_at_hour,
        )


@dataclass(frozen=True, eq=False)
class SeriesInputs:
    """What turns a series' raw readings into stage."""

    pk: int
    settings: SensorSettings
    corrections: Sequence[StageCorrection]
    gap_limit_s: int


@dataclass(frozen=True, eq=False)
class NoteSpan:
    """A period in which the rating does not hold; kind as in Note, ± % where stated."""

    start_s: int
    end_s: int
    cause: str
    flows: str
    uncertainty_percent: float


@dataclass(frozen=True, eq=False)
class InfillSpan:
    """Days to be estimated and how; the other record's key where the method needs one."""

    first_day: date
    last_day: date
    method: str
    neighbour: Station | None
    series: SeriesInputs | None
    uncertainty_percent: float


@dataclass(frozen=True, eq=False)
class StationInputs:
    """Everything the daily figures of a station and period are made of, but the readings."""

    station: Station
    record_version: int
    clock: DayClock
    first_day: date
    last_day: date
    series: SeriesInputs | None
    periods: Sequence[RatingPeriod]
    notes: Sequence[NoteSpan] = ()
    infills: Sequence[InfillSpan] = ()
    typed: Sequence[tuple[date, float, float]] = ()  # day, m³/s, ± % or NaN
    gauged_s: Seconds | None = None  # mid-times of signed gaugings
    gauged_m3s: Floats | None = None

    @property
    def n_days(self) -> int:
        """Number of days of the period."""
        return (self.last_day - self.first_day).days + 1

    @property
    def edges_s(self) -> Seconds:
        """The instants between the days."""
        return self.clock.edges_s(self.first_day, self.n_days)


def load(
    station: Station, first_day: date, last_day: date, *, with_infills: bool = True
) -> StationInputs:
    """Read the inputs of a station for whole record days, first and last included.

    The period is widened to whole infills and the day on either side, which they start from.
    """
    infills = _infill_rows(station, first_day, last_day) if with_infills else []
    first_day = min([first_day, *(row.first_day - ONE_DAY for row in infills)])
    last_day = max([last_day, *(row.last_day + ONE_DAY for row in infills)])
    own = clock.agency()
    start, end = clock.day_start(first_day, of=own), clock.day_start(last_day + ONE_DAY, of=own)
    primary = Series.objects.filter(station=station, is_primary=True).first()
    fresh = Station.objects.only("record_version").get(pk=station.pk)
    gauged = _gauged(station, start, end)
    return StationInputs(
        station=station,
        record_version=fresh.record_version,
        clock=day_clock(),
        first_day=first_day,
        last_day=last_day,
        series=series_inputs(primary, start, end) if primary else None,
        periods=rating_periods(station, start, end),
        notes=[_note_span(row) for row in _overlapping(Note, station, start, end)],
        infills=[_infill_span(row, start, end) for row in infills],
        typed=_typed(station, first_day, last_day),
        gauged_s=gauged[0],
        gauged_m3s=gauged[1],
    )


def day_clock() -> DayClock:
    """Return how the agency's instants fall into days."""
    own = clock.agency()
    return DayClock(
        own.record_utc_offset_minutes, own.day_starts_at_hour, own.day_coverage_percent / 100
    )


def series_inputs(series: Series, start: datetime, end: datetime) -> SeriesInputs:
    """Read what turns a series into stage between two instants; accepted corrections only."""
    settings = in_force.between(series.settings, start, end)
    accepted = series.corrections.standing().filter(
        state=Correction.State.ACCEPTED, start_at__lt=end, end_at__gt=start
    )
    return SeriesInputs(
        series.pk,
        SensorSettings(
            in_force.starts(settings),
            in_force.column(settings, "scale"),
            in_force.column(settings, "offset_m"),
        ),
        [
            StageCorrection(
                in_force.seconds(row.start_at),
                in_force.seconds(row.end_at),
                row.start_offset_m,
                row.end_offset_m,
            )
            for row in accepted.order_by("start_at", "pk")
        ],
        series.gap_limit_minutes * 60,
    )


def rating_periods(station: Station, start: datetime, end: datetime) -> Sequence[RatingPeriod]:
    """Return the kernel's rating periods of a rated station, none of one that is not rated."""
    if not station.is_rated:
        return ()
    return curves.kernel_periods(curves.period_rows(station, start, end))


def _overlapping(model: type[Note], station: Station, start: datetime, end: datetime) -> Any:
    rows = model.objects.filter(station=station).standing()
    return rows.filter(start_at__lt=end, end_at__gt=start).order_by("start_at", "pk")


def _note_span(row: Note) -> NoteSpan:
    return NoteSpan(
        in_force.seconds(row.start_at),
        in_force.seconds(row.end_at),
        row.cause,
        row.flows,
        _or_nan(row.uncertainty_percent),
    )


def _infill_rows(station: Station, first_day: date, last_day: date) -> list[Infill]:
    rows = Infill.objects.filter(station=station).standing()
    rows = rows.filter(first_day__lte=last_day, last_day__gte=first_day)
    return list(rows.select_related("neighbour", "series").order_by("first_day", "pk"))


def _infill_span(row: Infill, start: datetime, end: datetime) -> InfillSpan:
    return InfillSpan(
        row.first_day,
        row.last_day,
        row.method,
        row.neighbour,
        series_inputs(row.series, start, end) if row.series else None,
        _or_nan(row.uncertainty_percent),
    )


def _typed(station: Station, first_day: date, last_day: date) -> list[tuple[date, float, float]]:
    rows = TypedFlow.objects.filter(station=station, day__range=(first_day, last_day)).standing()
    return [(row.day, row.flow_m3s, _or_nan(row.uncertainty_percent)) for row in rows]


def _gauged(station: Station, start: datetime, end: datetime) -> tuple[Seconds, Floats]:
    """Return mid-time and discharge of the signed gaugings of a period."""
    rows = Gauging.objects.filter(station=station, discharge_m3s__isnull=False)
    rows = rows.filter(started_at__lt=end, ended_at__gte=start).order_by("started_at")
    found = list(rows.values_list("started_at", "ended_at", "discharge_m3s"))
    middle = [in_force.seconds(begun + (ended - begun) / 2) for begun, ended, _flow in found]
    return np.array(middle, np.int64), np.array([flow for *_times, flow in found], np.float64)


def _or_nan(value: float | None) -> float:
    return np.nan if value is None else value
