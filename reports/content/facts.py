"""The facts from which the data-quality notes are written."""

from collections.abc import Iterator
from datetime import date, timedelta

import numpy as np

from network.models import Infill, Note, StationZero, TypedFlow
from network.numerics.arrays import Bools
from network.numerics.marks import Mark
from network.queries.uncertainty import daily_u95
from reports import notes
from reports import yearbook as y
from reports.content.field_work import Gauged, gauged
from reports.content.particulars import corrections, local_day, rating_label, rating_rows
from reports.content.year_data import YearData
from reports.printed import NO_NUMBER, RECORDED, Number

WITHHELD = Mark.WITHHELD
STATED = Mark.ESTIMATED | Mark.TYPED


def facts(data: YearData) -> notes.Facts:
    """Gather what the notes say about a year."""
    marks = data.days.marks
    missing = (marks & Mark.MISSING) > 0
    withheld = missing & ((marks & WITHHELD) > 0)
    own = gauged(data, data.start, data.end)
    deviations = _open_water_deviations(data, own)
    fixed = data.printer.fixed
    return notes.Facts(
        days=len(marks),
        stage_only=data.stage_only,
        missing=tuple(_spells(data, missing & ~withheld)),
        withheld=tuple(_spells(data, withheld)),
        estimated=tuple(_spells(data, (marks & STATED) > 0)),
        partial_days=int(np.count_nonzero(marks & Mark.PARTIAL)),
        extrapolated_days=int(np.count_nonzero(marks & Mark.EXTRAPOLATED)),
        extrapolated_volume_percent=_extrapolated_share(data),
        ratings=tuple(_rating_uses(data)),
        highest_stage_m=data.printer.stage(_highest_stage(data)),
        highest_gauged_m=data.printer.stage(_highest_gauged(data)),
        gaugings=len(own.rows),
        lowest_deviation_percent=fixed(min(deviations, default=None), 1, plus=True),
        highest_deviation_percent=fixed(max(deviations, default=None), 1, plus=True),
        zero_changes=tuple(_zero_changes(data)),
        corrections=len(corrections(data)),
        printed_notes=tuple(_printed_notes(data)),
    )


def _open_water_deviations(data: YearData, own: Gauged) -> list[float]:
    """Return the known deviations of gaugings on days without ice or backwater."""
    barred = {
        day.astype(date) for day in data.days.days[(data.days.marks & Mark.ICE_OR_BACKWATER) > 0]
    }
    return [
        float(deviation)
        for at, deviation in zip(own.at, own.deviation_percent, strict=True)
        if not np.isnan(deviation) and local_day(data, at) not in barred
    ]


def completeness(data: YearData) -> tuple[y.CompletenessRow, ...]:
    """Count the days of each mark by month, recorded days without one first."""
    months = data.days.days.astype("datetime64[M]")
    rows = []
    for mark in (RECORDED, *Mark):
        bears = (data.days.marks == 0) if mark == RECORDED else (data.days.marks & mark) > 0
        days = tuple(int(bears[months == month].sum()) for month in np.unique(months))
        if any(days):
            rows.append(y.CompletenessRow(mark=mark, days=days, year=sum(days)))
    return tuple(rows)


def uncertainty(data: YearData) -> tuple[tuple[y.UncertaintyRow, ...], float]:
    """Sort days and volume by the uncertainty of the day; also return the share not stated, %."""
    if data.stage_only:
        return (), 0.0
    flow = data.values
    there = flow > 0
    percent = np.full(len(flow), np.nan)
    percent[there] = 100 * daily_u95(data.station, data.days)[there] / flow[there]
    volume = float(flow[there].sum())
    if not volume or np.isnan(percent[there]).all():
        return (), 100.0
    bounds = [(0.0, 5.0, 5), (5.0, 10.0, 10), (10.0, 20.0, 20), (20.0, np.inf, None)]
    rows = tuple(
        _class(data, there & (percent > low) & (percent <= high), within, volume)
        for low, high, within in bounds
    )
    unknown = float(flow[there & np.isnan(percent)].sum())
    return rows, 100 * unknown / volume


def _class(data: YearData, inside: Bools, within: int | None, volume: float) -> y.UncertaintyRow:
    share = 100 * float(data.values[inside].sum()) / volume
    return y.UncertaintyRow(
        within_percent=within,
        days=int(inside.sum()),
        volume_percent=data.printer.fixed(share, 1),
    )


def _spells(data: YearData, inside: Bools) -> Iterator[notes.Spell]:
    """Yield the runs of days alike, with cause, method and ± %; a change of those cuts a run."""
    causes, methods = _causes(data), _methods(data)
    start: int | None = None
    for at in range(len(inside) + 1):
        running = at < len(inside) and bool(inside[at])
        if start is not None and (not running or _reason(start, at, causes, methods)):
            yield _spell(data, start, at - 1, causes[start], methods[start])
            start = None
        if running and start is None:
            start = at


def _reason(
    start: int, at: int, causes: list[str], methods: list[tuple[str, float | None]]
) -> bool:
    return (causes[start], methods[start]) != (causes[at], methods[at])


def _spell(
    data: YearData, start: int, stop: int, cause: str, method: tuple[str, float | None]
) -> notes.Spell:
    return notes.Spell(
        first=data.first + timedelta(days=start),
        last=data.first + timedelta(days=stop),
        cause=cause,
        method=method[0],
        percent=data.printer.fixed(method[1], 0),
    )


def _causes(data: YearData) -> list[str]:
    """Return, for each day, the cause of the note that touches it."""
    causes = [""] * len(data.days.days)
    rows = Note.objects.filter(station=data.station).standing()
    for row in rows.filter(start_at__lt=data.end, end_at__gt=data.start).order_by("-start_at"):
        first = local_day(data, row.start_at)
        last = local_day(data, row.end_at - timedelta(seconds=1))
        _set(causes, data, first, last, str(row.get_cause_display()))
    return causes


def _methods(data: YearData) -> list[tuple[str, float | None]]:
    """Return, for each day, the method and ± % of its infill or of the flow typed before it."""
    methods: list[tuple[str, float | None]] = [("", None)] * len(data.days.days)
    rows = Infill.objects.filter(station=data.station).standing()
    for row in rows.filter(first_day__lte=data.last, last_day__gte=data.first):
        told = str(row.get_method_display())
        if row.neighbour is not None:
            told = f"{told} ({row.neighbour.name})"
        _set(methods, data, row.first_day, row.last_day, (told, row.uncertainty_percent))
    typed = TypedFlow.objects.filter(station=data.station).standing()
    for row in typed.filter(day__range=(data.first, data.last)):
        _set(methods, data, row.day, row.day, (row.method, row.uncertainty_percent))
    return methods


def _set(column: list, data: YearData, first: date, last: date, value: object) -> None:
    start = max((first - data.first).days, 0)
    stop = min((last - data.first).days, len(column) - 1)
    column[start : stop + 1] = [value] * max(stop + 1 - start, 0)


def _extrapolated_share(data: YearData) -> Number:
    """Return the share of the year's volume on days with extrapolated flow."""
    if data.stage_only or not np.nansum(data.values):
        return NO_NUMBER
    bears = (data.days.marks & Mark.EXTRAPOLATED) > 0
    share = 100 * float(np.nansum(data.values[bears])) / float(np.nansum(data.values))
    return data.printer.fixed(share, 1) if bears.any() else NO_NUMBER


def _rating_uses(data: YearData) -> Iterator[notes.RatingUse]:
    rows = rating_rows(data)
    ends = [row.effective_from for row in rows[1:]] + [data.end]
    for row, until in zip(rows, ends, strict=False):
        if row.curve is not None:
            yield notes.RatingUse(
                label=rating_label(row.curve),
                first=max(local_day(data, row.effective_from), data.first),
                last=min(local_day(data, until - timedelta(seconds=1)), data.last),
            )


def _highest_stage(data: YearData) -> float | None:
    highest = data.days.stage.highest
    return None if np.isnan(highest).all() else float(np.nanmax(highest))


def _highest_gauged(data: YearData) -> float | None:
    tops = [row.curve.gauged_highest_m for row in rating_rows(data) if row.curve is not None]
    return max((top for top in tops if top is not None), default=None)


def _zero_changes(data: YearData) -> Iterator[notes.ZeroChange]:
    rows = StationZero.objects.filter(station=data.station).standing()
    for row in rows.filter(effective_from__gt=data.start, effective_from__lt=data.end):
        yield notes.ZeroChange(
            on=local_day(data, row.effective_from),
            moved=row.kind == StationZero.Kind.MOVED,
            reason=row.reason.rstrip("."),
        )


def _printed_notes(data: YearData) -> Iterator[str]:
    rows = Note.objects.filter(station=data.station, is_printed=True).standing().exclude(text="")
    for row in rows.filter(start_at__lt=data.end, end_at__gt=data.start).order_by("start_at"):
        yield row.text
