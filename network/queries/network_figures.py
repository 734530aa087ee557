"""Figures of the network for a period: work made against planned, completeness, what waits."""

from collections import Counter, defaultdict
from collections.abc import Mapping
from dataclasses import dataclass
from datetime import date, datetime, timedelta

import numpy as np
from django.db.models import Count, F, Q

from network.models import (
    Curve,
    Gauging,
    OperationPeriod,
    RatingPeriod,
    Station,
    StationYear,
    Stop,
    Visit,
)
from network.numerics.due_dates import DAYS_PER_YEAR
from network.queries import clock, station_years
from network.queries.work_due import work_list
from network.queries.work_due.items import Asked
from network.queries.work_due.station_items import StationRow, station_rows

BANDS = 3  # low, middle and high thirds of the stages the rating in force may be used at


@dataclass(frozen=True)
class Period:
    """Whole days, both ends included."""

    first_day: date
    last_day: date

    @property
    def days(self) -> int:
        """The number of days."""
        return (self.last_day - self.first_day).days + 1


@dataclass(frozen=True)
class StationFigures:
    """One station in a period.

    planned_visits and wanted_gaugings by its intervals over the days it ran; stops: of rounds that
    began in the period, not left out; gaugings_by_band: low, middle, high, and those without a
    stage or rating; days_present None where no daily figures are computed; unreviewed_days: the
    age of the oldest record awaiting review, None where there is none.
    """

    station: StationRow
    days_run: int
    visits: int
    planned_visits: float
    stops: int
    gaugings: int
    wanted_gaugings: float
    gaugings_by_band: tuple[int, int, int, int]
    days_known: int | None
    days_present: int | None
    unreviewed_days: int | None

    @property
    def completeness_percent(self) -> float | None:
        """Days with a value among the days for which daily figures are computed."""
        if not self.days_known or self.days_present is None:
            return None
        return 100 * self.days_present / self.days_known


@dataclass(frozen=True)
class OfficeFigures:
    """The sums of an office, and what is overdue there now."""

    name: str
    stations: int
    visits: int
    planned_visits: float
    stops: int
    gaugings: int
    wanted_gaugings: float
    completeness_percent: float | None
    overdue: int
    oldest_unreviewed_days: int | None


@dataclass(frozen=True)
class NetworkFigures:
    """The figures of a period; what is overdue and unreviewed is of the day asked for."""

    period: Period
    today: date
    stations: tuple[StationFigures, ...]
    offices: tuple[OfficeFigures, ...]
    overdue_by_kind: Mapping[str, int]


def figures(period: Period, *, at: datetime) -> NetworkFigures:
    """Return the figures of a period in a fixed number of queries."""
    asked = work_list.ask(at)
    due = work_list.work_list(at, per_page=None)
    run = _days_run(period)
    visits, gaugings = _visits(period, asked), _gaugings_by_band(period, asked)
    stops, present = _stops(period), _days_present(period)
    stations = []
    for row in station_rows(asked):
        days = run.get(row.pk, 0)
        bands = gaugings.get(row.pk, Counter())
        known = present.get(row.pk)
        stations.append(
            StationFigures(
                station=row,
                days_run=days,
                visits=visits.get(row.pk, 0),
                planned_visits=days / (row.visit_days or asked.rules.visit_days),
                stops=stops.get(row.pk, 0),
                gaugings=sum(bands.values()),
                wanted_gaugings=days / DAYS_PER_YEAR * _wanted(row, asked),
                gaugings_by_band=(bands[0], bands[1], bands[2], bands[None]),
                days_known=known[0] if known else None,
                days_present=known[1] if known else None,
                unreviewed_days=_unreviewed(row, asked),
            )
        )
    overdue = Counter(line.office for line in due.lines)
    kinds = {str(kind.label): count for kind, count in due.counts.items()}
    offices = _offices(stations, overdue)
    return NetworkFigures(period, asked.today, tuple(stations), offices, kinds)


def _wanted(row: StationRow, asked: Asked) -> int:
    if row.gaugings_a_year is not None:
        return row.gaugings_a_year
    rated = row.kind != Station.Kind.STAGE_ONLY and not row.unrated
    return asked.rules.gaugings_per_year if rated else 0


def _unreviewed(row: StationRow, asked: Asked) -> int | None:
    begun = row.unreviewed_since
    return None if begun is None else asked.today.toordinal() - begun


def _days_run(period: Period) -> dict[int, int]:
    """Return the days of the period on which each station ran; without periods, all of them."""
    run: dict[int, int] = defaultdict(int)
    rows = OperationPeriod.objects.values_list("station", "opened_on", "closed_on")
    for station, opened_on, closed_on in rows:
        start = max(opened_on, period.first_day)
        end = min(closed_on or period.last_day, period.last_day)
        run[station] += max((end - start).days + 1, 0)
    for station in Station.objects.filter(operation_periods=None).values_list("pk", flat=True):
        run[station] = period.days
    return run


def _span(period: Period, asked: Asked) -> tuple[datetime, datetime]:
    start = clock.day_start(period.first_day, of=asked.agency)
    return start, clock.day_start(period.last_day + timedelta(days=1), of=asked.agency)


def _visits(period: Period, asked: Asked) -> dict[int, int]:
    start, end = _span(period, asked)
    made = Visit.objects.filter(arrived_at__gte=start, arrived_at__lt=end, is_routine=True)
    return dict(made.order_by().values_list("station").annotate(n=Count("pk")))


def _stops(period: Period) -> dict[int, int]:
    first = Q(round__first_day__range=(period.first_day, period.last_day))
    planned = Stop.objects.filter(first, left_out_because="")
    return dict(planned.order_by().values_list("station").annotate(n=Count("pk")))


def _gaugings_by_band(period: Period, asked: Asked) -> dict[int, Counter[int | None]]:
    """Count signed gaugings of each station by thirds of the range of its latest rating."""
    start, end = _span(period, asked)
    made = Gauging.objects.filter(started_at__gte=start, started_at__lt=end)
    rows = made.exclude(state=Gauging.State.DRAFT).values_list("station", "signed_stage_m")
    ranges = _ranges(end)
    found: dict[int, Counter[int | None]] = defaultdict(Counter)
    for station, stage_m in rows.order_by():
        found[station][_band(stage_m, ranges.get(station))] += 1
    return found


def _ranges(before: datetime) -> dict[int, tuple[float, float]]:
    """Return the range of use of the rating last in force at each station before an instant."""
    rows = RatingPeriod.objects.standing().filter(effective_from__lt=before)
    rows = rows.filter(curve__state=Curve.State.APPROVED).order_by("effective_from")
    spans = rows.values_list("station", "curve__lowest_use_m", "curve__highest_use_m")
    return {station: (low, high) for station, low, high in spans}


def _band(stage_m: float | None, span: tuple[float, float] | None) -> int | None:
    if stage_m is None or span is None:
        return None
    share = (stage_m - span[0]) / (span[1] - span[0])
    return min(max(int(share * BANDS), 0), BANDS - 1)


def _days_present(period: Period) -> dict[int, tuple[int, int]]:
    """Return days known and days with a value, from the years whose figures are fresh."""
    fresh = StationYear.objects.filter(
        record_version=F("station__record_version"), first_day__lte=period.last_day,
        first_day__gt=period.first_day - timedelta(days=366),
    )  # fmt: skip
    found: dict[int, tuple[int, int]] = {}
    rows = fresh.values_list("station", "station__kind", "first_day", "data", named=True)
    for row in rows.iterator(chunk_size=200):
        days = station_years.unpack(bytes(row.data), first_day=row.first_day)
        inside = (days.days >= np.datetime64(period.first_day)) & (
            days.days <= np.datetime64(period.last_day)
        )
        stage_only = row.station__kind == Station.Kind.STAGE_ONLY
        values = (days.stage_m if stage_only else days.flow_m3s)[inside]
        known, present = found.get(row.station, (0, 0))
        found[row.station] = known + len(values), present + int((~np.isnan(values)).sum())
    return found


def _offices(
    stations: list[StationFigures], overdue: Mapping[str, int]
) -> tuple[OfficeFigures, ...]:
    by_office: dict[str, list[StationFigures]] = defaultdict(list)
    for row in stations:
        by_office[row.station.office_name].append(row)
    return tuple(
        _office(name, by_office.get(name, []), overdue.get(name, 0))
        for name in sorted({*by_office, *overdue} - {""})
    )


def _office(name: str, rows: list[StationFigures], overdue: int) -> OfficeFigures:
    known = sum(row.days_known or 0 for row in rows)
    present = sum(row.days_present or 0 for row in rows)
    waits = [row.unreviewed_days for row in rows if row.unreviewed_days is not None]
    return OfficeFigures(
        name=name,
        stations=sum(row.days_run > 0 for row in rows),
        visits=sum(row.visits for row in rows),
        planned_visits=sum(row.planned_visits for row in rows),
        stops=sum(row.stops for row in rows),
        gaugings=sum(row.gaugings for row in rows),
        wanted_gaugings=sum(row.wanted_gaugings for row in rows),
        completeness_percent=100 * present / known if known else None,
        overdue=overdue,
        oldest_unreviewed_days=max(waits, default=None),
    )
