"""The arrays of the figures; times on the record clock."""

from datetime import datetime

import numpy as np
import numpy.typing as npt

from network.models import Curve, Station, VisitReading
from network.numerics.marks import Mark
from network.numerics.years.duration import duration_curve
from network.numerics.years.earlier_years import day_bands
from network.queries import curves, gauges
from reports.content.daily_table import earlier_label
from reports.content.field_work import Gauged, gauged
from reports.content.particulars import plates_of_year, rating_label, rating_rows
from reports.content.year_data import YearData
from reports.figures import inputs
from reports.yearbook import Figures

NOT_AS_RECORDED = Mark.ESTIMATED | Mark.TYPED
POINTS_OF_A_CURVE = 160
NEIGHBOURS = 8


def figures(data: YearData) -> Figures:
    """Return what is drawn of a year."""
    before = gauged(data, None, data.end)
    return Figures(
        stage=_stage_year(data),
        duration=_duration(data),
        sketch=location_sketch(data.station),
        plates=_plates(data),
        flow=None if data.stage_only else _flow_year(data),
        rating=None if data.stage_only else _rating_sheet(data, before),
    )


def _estimated(data: YearData) -> npt.NDArray[np.bool_]:
    return (data.days.marks & NOT_AS_RECORDED) > 0


def _local(data: YearData, instants: list[datetime]) -> npt.NDArray[np.datetime64]:
    naive = [instant.astimezone(data.clock).replace(tzinfo=None) for instant in instants]
    return np.array(naive, dtype="datetime64[s]")


def _earlier(data: YearData) -> inputs.EarlierRange | None:
    if not data.earlier:
        return None
    bands = day_bands(data.all_days, data.all_values, year=data.year, calendar=data.calendar)
    return inputs.EarlierRange(
        years=earlier_label(data),
        count=len(data.earlier),
        lowest=bands.minimum,
        lower_quartile=bands.lower_quartile,
        median=bands.median,
        upper_quartile=bands.upper_quartile,
        highest=bands.maximum,
    )


def _flow_year(data: YearData) -> inputs.FlowYear:
    own = gauged(data, data.start, data.end)
    return inputs.FlowYear(
        days=data.days.days,
        flow_m3s=data.values,
        estimated=_estimated(data),
        earlier=_earlier(data),
        gauged_at=_local(data, own.at),
        gauged_m3s=np.array([row.discharge_m3s for row in own.rows], np.float64),
    )


def _stage_year(data: YearData) -> inputs.StageYear:
    instants, stages = _staff_readings(data)
    return inputs.StageYear(
        days=data.days.days,
        mean_m=data.days.stage_m,
        lowest_m=data.days.stage.lowest,
        highest_m=data.days.stage.highest,
        estimated=_estimated(data) & data.stage_only,
        earlier=_earlier(data) if data.stage_only else None,
        read_at=_local(data, instants),
        read_m=np.array(stages, np.float64),
    )


def _staff_readings(data: YearData) -> tuple[list[datetime], list[float]]:
    """Return the staff readings of the year's visits as stages, by the plate zeros then."""
    rows = VisitReading.objects.filter(
        visit__station=data.station,
        plate__isnull=False,
        reading_m__isnull=False,
        read_at__gte=data.start,
        read_at__lt=data.end,
    )
    readings = list(rows.select_related("plate").order_by("read_at"))
    known = [
        (reading.read_at, stage)
        for reading, stage in zip(readings, gauges.stages_m(readings), strict=True)
        if stage is not None
    ]
    return [instant for instant, _stage in known], [stage for _instant, stage in known]


def _duration(data: YearData) -> inputs.DurationCurves | None:
    if np.isnan(data.values).all():
        return None
    own = duration_curve(data.values)
    before = duration_curve(
        np.concatenate([np.empty(0), *(data.published(part) for part in data.earlier)])
    )
    return inputs.DurationCurves(
        percent=100 * own.exceedance,
        value=own.values,
        earlier_percent=100 * before.exceedance,
        earlier_value=before.values,
        earlier_years=earlier_label(data),
        of_stage=data.stage_only,
    )


def location_sketch(station: Station) -> inputs.LocationSketch:
    """Place the station among those next to it."""
    others = list(Station.objects.filter(basin=station.basin).exclude(pk=station.pk))
    others.sort(
        key=lambda other: np.hypot(
            other.latitude_deg - station.latitude_deg,
            (other.longitude_deg - station.longitude_deg)
            * np.cos(np.radians(station.latitude_deg)),
        )
    )
    return inputs.LocationSketch(
        station=_place(station), neighbours=tuple(_place(other) for other in others[:NEIGHBOURS])
    )


def _place(station: Station) -> inputs.Place:
    return inputs.Place(
        name=station.name, latitude=station.latitude_deg, longitude=station.longitude_deg
    )


def _plates(data: YearData) -> inputs.PlateStack | None:
    latest = {plate.pk: (plate, zero) for plate, zero in plates_of_year(data)}
    bars = tuple(
        inputs.PlateBar(
            label=plate.label,
            lowest_m=plate.lowest_m + zero.zero_m,
            highest_m=plate.highest_m + zero.zero_m,
        )
        for plate, zero in latest.values()
        if zero.zero_m is not None
    )
    low, high = data.days.stage.lowest, data.days.stage.highest
    if not bars or np.isnan(low).all():
        return None
    return inputs.PlateStack(
        plates=bars,
        year_lowest_m=float(np.nanmin(low)),
        year_highest_m=float(np.nanmax(high)),
        cease_to_flow_m=_cease_to_flow(data),
    )


def _cease_to_flow(data: YearData) -> float:
    rows = [row.curve for row in rating_rows(data) if row.curve is not None]
    if not rows:
        return np.nan
    segments = list(rows[-1].segments.all())
    zero = segments[0].h0_m if segments else rows[-1].h0_m
    return np.nan if zero is None else zero


def _rating_sheet(data: YearData, before: Gauged) -> inputs.RatingSheet | None:
    rows = {row.curve.pk: row.curve for row in rating_rows(data) if row.curve is not None}
    if not rows:
        return None
    in_year = np.array([instant >= data.start for instant in before.at], dtype=np.bool_)
    on_sheet = in_year | np.array([_rests_on(rows, row.pk) for row in before.rows], dtype=np.bool_)
    known = on_sheet & ~np.isnan(before.stage_m)
    return inputs.RatingSheet(
        curves=tuple(_curve(curve) for curve in rows.values()),
        gauged_stage_m=before.stage_m[known],
        gauged_m3s=np.array([r.discharge_m3s for r in before.rows], np.float64)[known],
        gauged_u95_percent=np.array(
            [np.nan if r.u95_percent is None else r.u95_percent for r in before.rows], np.float64
        )[known],
        in_year=in_year[known],
        numbers=tuple(
            str(number) for number, there in zip(before.numbers, known, strict=True) if there
        ),
    )


def _rests_on(rows: dict[int, Curve], gauging_pk: int) -> bool:
    return any(
        choice.is_used and choice.gauging_id == gauging_pk
        for curve in rows.values()
        for choice in curve.gaugings.all()
    )


def _curve(row: Curve) -> inputs.RatingCurve:
    """Draw a rating over the stages it may be used at, evenly in the logarithm of the head."""
    kernel = curves.kernel_curve(row)
    low, high = kernel.allowed_m
    segments = list(row.segments.all())
    zero = segments[0].h0_m if segments else (row.h0_m or low)
    heads = np.geomspace(max(low - zero, 0.01), high - zero, POINTS_OF_A_CURVE)
    stage = zero + heads
    flow = kernel.flow_at(stage)
    sure_low, sure_high = kernel.unmarked_m
    band = sorted((point.stage_m, point.u95_percent) for point in row.band.all())
    half = flow * np.interp(stage, *np.array(band).T) / 100 if band else np.empty(0)
    return inputs.RatingCurve(
        label=rating_label(row),
        stage_m=stage,
        flow_m3s=flow,
        lower_m3s=flow - half if band else half,
        upper_m3s=flow + half if band else half,
        extrapolated=(stage < sure_low) | (stage > sure_high),
    )
