"""What stands beside the daily values: gauges, recorders, ratings, field work of the year."""

from collections.abc import Iterable
from datetime import date, datetime
from typing import Any

import numpy as np
from django.utils.translation import gettext as _
from django.utils.translation import pgettext

from network.models import (
    Correction,
    Curve,
    Deployment,
    PlateZero,
    RatingPeriod,
    StaffPlate,
    StationZero,
    Visit,
)
from network.queries import blocks, gauges, in_force
from reports import particulars as p
from reports.content.printer import Printer
from reports.content.year_data import YearData

PURPOSES = ("is_routine", "is_for_gauging", "is_for_levels", "is_for_repair", "is_for_flood")


def agency(data: YearData) -> p.Agency:
    """Return who publishes."""
    own = data.agency
    return p.Agency(
        name=own.name,
        address=own.address,
        licence=own.licence_line,
        decimal_sign=own.decimal_sign,
        record_clock=data.clock,
        record_clock_text=str(data.clock),
        day_starts_at=own.day_starts_at_hour,
        every_day_needed=own.months_need_every_day,
    )


def station(data: YearData) -> p.Station:
    """Return the station as the first page describes it."""
    own = data.station
    return p.Station(
        code=own.code,
        name=own.name,
        river=own.river,
        basin=own.basin,
        latitude=own.latitude_deg,
        longitude=own.longitude_deg,
        coordinates=_coordinates(own.latitude_deg, own.longitude_deg, data.printer),
        catchment_km2=data.printer.flow(own.catchment_km2),
        stage_only=data.stage_only,
        open_periods=tuple(
            (period.opened_on, period.closed_on) for period in own.operation_periods.all()
        ),
        office=own.office.name,
        control=own.control,
        description=own.description,
    )


def _coordinates(latitude: float, longitude: float, printer: Printer) -> str:
    north = pgettext("compass", "N") if latitude >= 0 else pgettext("compass", "S")
    east = pgettext("compass", "E") if longitude >= 0 else pgettext("compass", "W")
    return (
        f"{printer.fixed(abs(latitude), 4).text}° {north}, "
        f"{printer.fixed(abs(longitude), 4).text}° {east}"
    )


def local_day(data: YearData, instant: datetime) -> date:
    """Return the date of an instant on the record clock."""
    return instant.astimezone(data.clock).date()


def zeros(data: YearData) -> tuple[p.Zero, ...]:
    """Return the station zeros in force during the year."""
    chain = StationZero.objects.filter(station=data.station)
    return tuple(
        p.Zero(
            since=local_day(data, row.effective_from),
            elevation_m=data.printer.stage(row.elevation_m),
            datum=row.datum_name,
            reason=row.reason or row.get_kind_display(),
        )
        for row in in_force.between(chain, data.start, data.end)
    )


def plates_of_year(data: YearData) -> list[tuple[StaffPlate, PlateZero]]:
    """Return the plates in service during the year, each with every zero then in force."""
    rows = StaffPlate.objects.filter(station=data.station, installed_at__lt=data.end)
    rows = rows.exclude(removed_at__lte=data.start).order_by("lowest_m", "label")
    return [
        (plate, zero)
        for plate in rows
        for zero in in_force.between(plate.zeros.all(), data.start, data.end)
    ]


def plates(data: YearData) -> tuple[p.Plate, ...]:
    """Return the plates of the year with their zeros."""
    return tuple(
        p.Plate(
            label=plate.label,
            lowest_m=data.printer.fixed(plate.lowest_m, 2),
            highest_m=data.printer.fixed(plate.highest_m, 2),
            zero_m=data.printer.stage(zero.zero_m),
            since=local_day(data, max(zero.effective_from, plate.installed_at)),
            until=local_day(data, plate.removed_at) if plate.removed_at else None,
        )
        for plate, zero in plates_of_year(data)
    )


def recorders(data: YearData) -> tuple[p.Recorder, ...]:
    """Return the recorders of the year with the setting last in force."""
    rows = Deployment.objects.filter(series__station=data.station, installed_at__lt=data.end)
    rows = rows.exclude(removed_at__lte=data.start).select_related("instrument", "series")
    return tuple(_recorder(data, row) for row in rows.order_by("installed_at"))


def _recorder(data: YearData, row: Deployment) -> p.Recorder:
    tool = row.instrument
    settings = in_force.between(row.series.settings, data.start, data.end)
    return p.Recorder(
        instrument=" ".join(filter(None, (tool.maker, tool.model, tool.serial))),
        kind=tool.get_kind_display(),
        series=row.series.label,
        since=local_day(data, row.installed_at),
        until=local_day(data, row.removed_at) if row.removed_at else None,
        interval=_interval(data, row),
        setting=_setting(data, settings[-1]) if settings else "",
    )


def _interval(data: YearData, row: Deployment) -> str:
    """Return the usual step of the readings in the year's last month with any."""
    if row.series.is_event_logger:
        return _("every change")
    months = [m for m in blocks.month_list(row.series) if m.first_at < data.end and m.count > 1]
    if not months:
        return ""
    readings = blocks.read_months(row.series, months=[months[-1].month])
    step_s = float(np.median(np.diff(readings[months[-1].month].times_s)))
    return _("{minutes} min").format(minutes=data.printer.fixed(step_s / 60, 0).text)


def _setting(data: YearData, row: Any) -> str:
    if row.scale is None:
        return _("no setting in force")
    return _("stage = {scale} × raw {offset} m").format(
        scale=data.printer.fixed(row.scale, 4).text,
        offset=data.printer.fixed(row.offset_m, 3, plus=True).text,
    )


def rating_rows(data: YearData) -> list[RatingPeriod]:
    """Return the rating periods of the year."""
    if data.stage_only:
        return []
    chain = RatingPeriod.objects.filter(station=data.station).select_related("curve")
    chain = chain.prefetch_related(
        "curve__segments", "curve__points", "curve__band", "curve__gaugings", "shift_tables"
    )
    return in_force.between(chain, data.start, data.end)


def rating_label(curve: Curve) -> str:
    """Return how a rating version is called in print."""
    return _("Rating {number}").format(number=curve.number)


def ratings(data: YearData) -> tuple[p.Rating, ...]:
    """Return the ratings of the year."""
    rows = rating_rows(data)
    ends = [*(row.effective_from for row in rows[1:]), None]
    return tuple(
        _rating(data, row, row.curve, until)
        for row, until in zip(rows, ends, strict=False)
        if row.curve is not None
    )


def _rating(data: YearData, row: RatingPeriod, curve: Curve, until: datetime | None) -> p.Rating:
    fixed = data.printer.fixed
    return p.Rating(
        label=rating_label(curve),
        since=row.effective_from,
        until=until,
        use_lowest_m=fixed(curve.lowest_use_m, 2),
        use_highest_m=fixed(curve.highest_use_m, 2),
        gauged_lowest_m=fixed(curve.gauged_lowest_m, 2),
        gauged_highest_m=fixed(curve.gauged_highest_m, 2),
        gaugings=sum(choice.is_used for choice in curve.gaugings.all()),
        standard_error_percent=fixed(curve.scatter_percent, 1),
        segments=tuple(
            p.Segment(
                from_stage_m=fixed(segment.lower_stage_m, 3),
                coefficient=data.printer.flow(segment.c),
                zero_flow_m=fixed(segment.h0_m, 3),
                exponent=fixed(segment.b, 3),
            )
            for segment in curve.segments.all()
        ),
        reason=row.reason or curve.reason,
        shifts=_shifts(data, row),
    )


def _shifts(data: YearData, row: RatingPeriod) -> str:
    starts = sorted(t.effective_from for t in row.shift_tables.all() if t.stands)
    inside = [local_day(data, at) for at in starts if at < data.end]
    if not inside:
        return ""
    days = ", ".join(day.isoformat() for day in inside)
    return _("Shifts by stage from {days}.").format(days=days)


def visits(data: YearData) -> tuple[p.Visit, ...]:
    """Return the visits of the year."""
    rows = Visit.objects.filter(
        station=data.station, arrived_at__gte=data.start, arrived_at__lt=data.end
    )
    rows = rows.prefetch_related("party", "readings__plate").order_by("arrived_at")
    return tuple(
        p.Visit(
            arrived=row.arrived_at,
            party=people(row.party.all()),
            purposes=", ".join(
                str(Visit._meta.get_field(name).verbose_name)
                for name in PURPOSES
                if getattr(row, name)
            ),
            stage_m=data.printer.stage(_stage_of_visit(row)),
            control=row.get_control_condition_display(),
            remark=row.work_done,
        )
        for row in rows
    )


def people(rows: Iterable[Any]) -> str:
    """Return the names of a party."""
    return ", ".join(str(person) for person in rows)


def _stage_of_visit(row: Visit) -> float | None:
    """Return the stage of the first plate reading, by the plate zero then in force."""
    stages = gauges.stages_m([r for r in row.readings.all() if r.plate is not None])
    return next((stage for stage in stages if stage is not None), None)


def corrections(data: YearData) -> tuple[p.Correction, ...]:
    """Return the accepted corrections to the year's stage."""
    rows = Correction.objects.filter(series__station=data.station, series__is_primary=True)
    rows = rows.standing().filter(
        state=Correction.State.ACCEPTED, start_at__lt=data.end, end_at__gt=data.start
    )
    return tuple(
        p.Correction(
            since=row.start_at,
            until=row.end_at,
            start_mm=data.printer.fixed(1000 * row.start_offset_m, 0, plus=True),
            end_mm=data.printer.fixed(1000 * row.end_offset_m, 0, plus=True),
            reason=row.reason,
        )
        for row in rows.order_by("start_at")
    )
