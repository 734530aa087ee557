"""The uncertainty of daily flows, as far as the ratings in force state their own."""

from datetime import date

import numpy as np

from network.models import RatingPeriod, Station
from network.numerics.arrays import Floats, Seconds
from network.numerics.marks import Mark
from network.numerics.ratings.rating import Rated
from network.numerics.years.flow_uncertainty import daily_u95_m3s, estimated_u95_m3s, flow_u95_m3s
from network.queries import clock, curves, flows, in_force
from network.queries.flows import StationDays
from network.queries.station_inputs import ONE_DAY, load
from network.queries.working_rules import rules

STATED = Mark.ESTIMATED | Mark.TYPED


def daily_u95(station: Station, days: StationDays) -> Floats:
    """Return U₉₅ of each daily mean flow in m³/s: float64[days], NaN where nothing states it.

    Rated days: band and scatter of the rating in force and the agency's uncertainty of stage.
    Estimated and typed days: the ± % of their note, infill or entry.
    """
    first, last = (day.astype(date) for day in (days.days[0], days.days[-1]))
    inputs = load(station, first, last, with_infills=False)
    record = flows.without_unrated_periods(
        flows.rated_record(inputs, inputs.series, flows.readings_of(inputs)), inputs
    )
    u95 = np.full(len(days.days), np.nan)
    if len(record.times_s) and inputs.series:
        u95 = daily_u95_m3s(
            record.times_s,
            _at_readings(station, record, first, last),
            edges_s=inputs.edges_s,
            gap_limit_s=inputs.series.gap_limit_s,
        )
    stated = (days.marks & STATED) > 0
    u95[stated] = estimated_u95_m3s(days.flow_m3s[stated], days.estimated_percent[stated])
    return u95


def _at_readings(station: Station, record: Rated, first: date, last: date) -> Floats:
    """Return U₉₅ of the flow at each reading, NaN under a rating that states no band."""
    own = clock.agency()
    start, end = clock.day_start(first, of=own), clock.day_start(last + ONE_DAY, of=own)
    rows = RatingPeriod.objects.filter(station=station).select_related("curve")
    rows = rows.prefetch_related("curve__segments", "curve__points", "curve__band")
    u95 = np.full(len(record.times_s), np.nan)
    periods = in_force.between(rows, start, end)
    bounds: Seconds = np.append(in_force.starts(periods), record.times_s[-1] + 1)
    for at, period in enumerate(periods):
        part = (record.times_s >= bounds[at]) & (record.times_s < bounds[at + 1])
        if period.curve is not None and period.curve.band.all():
            u95[part] = _under(period, record.stage_m[part])
    u95[np.isnan(record.flow_m3s)] = np.nan
    return u95


def _under(period: RatingPeriod, stage_m: Floats) -> Floats:
    """Combine band, scatter and stage under one rating; shifts move the stage little and not U."""
    curve = curves.kernel_curve(period.curve)
    band = sorted((point.stage_m, point.u95_percent) for point in period.curve.band.all())
    percent = np.interp(stage_m, *np.array(band).T)
    flow = curve.flow_at(stage_m)
    half = flow * percent / 100
    return flow_u95_m3s(
        stage_m,
        flow_at=curve.flow_at,
        band_m3s=(flow - half, flow + half),
        scatter=(period.curve.scatter_percent or 0.0) / 100,
        u_stage_m=rules().stage_uncertainty_mm / 1000,
    )
