"""Gaugings, the calibrations they rest on, and level checks of the year."""

from collections import Counter
from dataclasses import dataclass
from datetime import datetime

import numpy as np
from django.utils.translation import gettext as _

from network.models import Calibration, Gauging, LevelCheck
from network.numerics.arrays import Floats
from network.numerics.ratings.rating import rate
from network.queries import in_force, levels
from network.queries.gaugings import stages_of
from network.queries.station_inputs import rating_periods
from reports import particulars as p
from reports.content.particulars import local_day, people, rating_rows
from reports.content.year_data import YearData


@dataclass(frozen=True, eq=False)
class Gauged:
    """Signed gaugings with mid-time, stage and the flow of the rating in force then."""

    rows: list[Gauging]
    numbers: list[int]  # counted through all the station's signed gaugings
    at: list[datetime]
    stage_m: Floats
    rated_m3s: Floats

    @property
    def deviation_percent(self) -> Floats:
        """How far the measured flow lies above the rating, %."""
        # (Q − Q_rating) / Q_rating · 100
        measured = np.array([row.discharge_m3s for row in self.rows], np.float64)
        known = self.rated_m3s > 0
        out = np.full(len(measured), np.nan)
        out[known] = 100 * (measured[known] / self.rated_m3s[known] - 1)
        return out


def gauged(data: YearData, start: datetime | None, end: datetime) -> Gauged:
    """Read the signed gaugings between two instants and rate their stages."""
    rows = Gauging.objects.filter(
        station=data.station, discharge_m3s__isnull=False, started_at__lt=end
    )
    before = 0 if start is None else rows.filter(started_at__lt=start).count()
    if start is not None:
        rows = rows.filter(started_at__gte=start)
    rows = rows.select_related("pair__body", "pair__rotor", "calibration")
    found = list(rows.prefetch_related("party").order_by("started_at"))
    middle = [row.started_at + (row.ended_at - row.started_at) / 2 for row in found]
    stages = stages_of(found)  # as the plate zeros in force today have them
    stage = np.array([stages[row.pk] for row in found], np.float64)
    numbers = list(range(before + 1, before + 1 + len(found)))
    return Gauged(found, numbers, middle, stage, _rated(data, middle, stage))


def _rated(data: YearData, at: list[datetime], stage_m: Floats) -> Floats:
    if not at or data.stage_only:
        return np.full(len(at), np.nan)
    times_s = np.array([in_force.seconds(instant) for instant in at], np.int64)
    flows = np.full(len(at), np.nan)
    periods = rating_periods(data.station, min(at), data.end)
    for index in range(len(at)):
        one = slice(index, index + 1)
        flows[index] = rate(times_s[one], stage_m[one], periods=periods, gap_limit_s=0).flow_m3s[-1]
    return flows


def gaugings(data: YearData) -> tuple[p.Gauging, ...]:
    """Return the gaugings of the year beside the rating in force."""
    found = gauged(data, data.start, data.end)
    fixed, flow = data.printer.fixed, data.printer.flow
    return tuple(
        p.Gauging(
            number=str(number),
            at=at,
            method=_how(row),
            party=people(row.party.all()),
            stage_m=data.printer.stage(stage),
            area_m2=flow(row.area_m2),
            velocity_ms=fixed(row.mean_velocity_ms, 3),
            flow_m3s=flow(row.discharge_m3s),
            u95_percent=fixed(row.u95_percent, 1),
            rating=_rating_at(data, at),
            deviation_percent=fixed(deviation, 1, plus=True),
            remark=row.remarks,
        )
        for row, number, at, stage, deviation in zip(
            found.rows, found.numbers, found.at, found.stage_m, found.deviation_percent, strict=True
        )
    )


def _how(row: Gauging) -> str:
    """Name the way of working of a current-meter gauging, else the method."""
    by_meter = row.method == Gauging.Method.VELOCITY_AREA
    return str(row.get_way_display() if by_meter else row.get_method_display())


def _rating_at(data: YearData, at: datetime) -> str:
    begun = [row for row in rating_rows(data) if row.effective_from <= at]
    curve = begun[-1].curve if begun else None
    return curve.number if curve else ""


def calibrations(data: YearData) -> tuple[p.Calibration, ...]:
    """Return the calibrations the gaugings of the year rest on."""
    rows = gauged(data, data.start, data.end).rows
    used = Counter(row.calibration for row in rows if row.calibration is not None)
    return tuple(
        _calibration(data, calibration, count)
        for calibration, count in sorted(used.items(), key=lambda item: item[0].effective_from)
    )


def _calibration(data: YearData, row: Calibration, count: int) -> p.Calibration:
    ends = (row.lowest_velocity_ms, row.highest_velocity_ms)
    valid = "–".join(data.printer.fixed(end, 2).text for end in ends if end is not None)
    error = data.printer.fixed(row.standard_error_ms, 4)
    return p.Calibration(
        instrument=str(row.pair or row.group or row.instrument),
        on=local_day(data, row.effective_from),
        laboratory=row.laboratory,
        certificate=row.certificate_number,
        valid_ms=valid,
        standard_error=f"{error.text} m/s" if error.value is not None else "",
        gaugings=count,
    )


def level_check_rows(data: YearData) -> list[LevelCheck]:
    """Return the level checks of the year."""
    rows = LevelCheck.objects.filter(
        station=data.station, levelled_at__gte=data.start, levelled_at__lt=data.end
    )
    return list(rows.prefetch_related("party", "sights").order_by("levelled_at"))


def level_checks(data: YearData) -> tuple[p.LevelCheck, ...]:
    """Return the level checks of the year with what they closed to."""
    return tuple(_level_check(data, row) for row in level_check_rows(data))


def _level_check(data: YearData, row: LevelCheck) -> p.LevelCheck:
    book = levels.reduction_of(row).book
    fixed = data.printer.fixed
    if row.adopted_at:
        outcome = _("closes; new plate zeros adopted")
    else:
        outcome = _("closes") if book.closes else _("does not close")
    return p.LevelCheck(
        on=local_day(data, row.levelled_at),
        party=people(row.party.all()),
        setups=book.set_ups,
        misclosure_mm=fixed(book.misclosure_mm, 1, plus=True),
        allowed_mm=fixed(book.limit_mm, 1),
        outcome=outcome,
    )
