"""Load the demo's ratings: versions drafted, approved and put in force, shifts, moved zeros."""

from collections.abc import Iterator
from datetime import datetime, timedelta
from functools import partial

import numpy as np

from network.formats.demo_record_rows import Curve as CurveRow
from network.formats.demo_record_rows import RatingPeriod as PeriodRow
from network.formats.demo_rows import Station as StationRow
from network.models import Curve, Gauging, RatingPeriod
from network.numerics.ratings.curves import Segment
from network.services import ratings, station_zeros
from network.services.demo_cast import Cast, Due
from network.services.demo_registry import moves_of
from network.services.demo_world import curve_of

DRAFTED_AFTER = timedelta(days=60)  # a few gaugings come first
APPROVED_AFTER = timedelta(days=6)


def ratings_due(cast: Cast, row: StationRow) -> Iterator[Due]:
    """Yield when each rating of a station comes into the books.

    Those in force before the books were begun at once, later ones when gaugings bear them out; one
    for a moved zero on the day of the move, since without it nothing could be rated.
    """
    for period in row.rating_periods:
        at = max(cast.opening, period.effective_from)
        if at > cast.opening and at not in moves_of(row):
            at = min(at + DRAFTED_AFTER, cast.present - APPROVED_AFTER)
        yield at, partial(_load_period, cast, row, period, at)


def _load_period(cast: Cast, row: StationRow, period: PeriodRow, drafted: datetime) -> None:
    told = next(curve for curve in row.curves if curve.label == period.curve)
    curve = _approved(cast, row, told, since=period.effective_from, at=drafted)
    approver, at = cast.people[told.approver], drafted + APPROVED_AFTER
    if period.effective_from in moves_of(row):
        _move_zero(cast, row, curve, effective_from=period.effective_from, at=at)
    else:
        ratings.put_in_force(
            station=cast.stations[row.station.code],
            curve=curve,
            effective_from=period.effective_from,
            by=approver,
            at=at,
            reason=period.reason,
        )
    _load_shifts(cast, row, period)


def _approved(
    cast: Cast, row: StationRow, told: CurveRow, *, since: datetime, at: datetime
) -> Curve:
    """Return the version of a curve, drafted and approved when its first period needs it."""
    station = cast.stations[row.station.code]
    number = told.label.rpartition("/")[2]
    there = Curve.objects.filter(station=station, number=number).first()
    if there is not None:
        return there
    curve = ratings.draft(
        station=station,
        number=number,
        relation=ratings.Relation(
            segments=[Segment(*segment) for segment in told.segments],
            points=told.table,
            form=told.rule or "segments",
            h0_m=told.h0_m if told.table else None,
        ),
        use=ratings.Use(
            lowest_use_m=told.lowest_use_m,
            highest_use_m=told.highest_use_m,
            extrapolate_high_m=told.extrapolate_to_high_m,
            gauged_lowest_m=min(told.gauged_m, default=None),
            gauged_highest_m=max(told.gauged_m, default=None),
            scatter_percent=told.scatter_percent,
        ),
        band=told.band,
        reason=told.reason,
        by=cast.people[told.author],
        at=at,
        gaugings=_gaugings(cast, row, told, since=since, until=at),
    )
    return ratings.approve(curve=curve, by=cast.people[told.approver], at=at + APPROVED_AFTER)


def _gaugings(
    cast: Cast, row: StationRow, told: CurveRow, *, since: datetime, until: datetime
) -> list[ratings.GaugingChoice]:
    """Return the signed gaugings a new curve rests on, each with its deviation from it."""
    signed = Gauging.objects.filter(
        station=cast.stations[row.station.code],
        started_at__gte=since,
        ended_at__lt=until,
        signed_stage_m__isnull=False,
    )
    chosen = list(signed.order_by("started_at"))
    rated = curve_of(told).flow_at(np.array([gauging.signed_stage_m for gauging in chosen]))
    return [
        ratings.GaugingChoice(
            gauging=gauging, deviation_percent=100 * (gauging.discharge_m3s / flow - 1)
        )
        for gauging, flow in zip(chosen, rated.tolist(), strict=True)
    ]


def _load_shifts(cast: Cast, row: StationRow, told: PeriodRow) -> None:
    period = RatingPeriod.objects.standing().get(
        station=cast.stations[row.station.code], effective_from=told.effective_from
    )
    for shift in told.shifts:
        ratings.add_shift_table(
            period=period,
            effective_from=shift.at,
            points=shift.points,
            joins=shift.to_next,
            by=cast.keeper(row.station.code),
            at=cast.entered(shift.at),
            reason=shift.reason,
        )


def _move_zero(
    cast: Cast, row: StationRow, curve: Curve, *, effective_from: datetime, at: datetime
) -> None:
    """Move the station zero and, in the same act, everything whose heights it bears."""
    code = row.station.code
    station = cast.stations[code]
    zero = next(each for each in row.zeros if each.effective_from == effective_from)
    station_zeros.set_station_zero(
        station=station,
        elevation_m=zero.elevation_m,
        datum_name=zero.datum_name,
        effective_from=effective_from,
        kind=zero.kind,
        reason=zero.reason,
        plate_zeros=[
            station_zeros.NewPlateZero(plate=station.plates.get(label=p.label), zero_m=z.zero_m)
            for p in row.plates
            for z in p.zeros[1:]
            if z.effective_from == effective_from
        ],
        gauge_zeros=[
            station_zeros.NewGaugeZero(
                gauge=station.other_gauges.get(label=g.label), zero_m=z.zero_m
            )
            for g in row.other_gauges
            for z in g.zeros[1:]
            if z.effective_from == effective_from
        ],
        settings=[
            station_zeros.NewSetting(
                series=cast.series[code, s.label], offset_m=setting.offset_m, scale=setting.scale
            )
            for s in row.series
            for d in s.deployments
            for setting in d.settings[1:]
            if setting.effective_from == effective_from
        ],
        rating=station_zeros.NewRating(curve=curve),
        by=cast.keeper(code),
        at=at,
    )
