"""Rating versions and shift tables from their rows to the kernel."""

from collections.abc import Iterable
from datetime import datetime

import numpy as np

from network.models import (
    Curve,
    CurvePoint,
    CurveSegment,
    RatingPeriod,
    ShiftPoint,
    ShiftTable,
    Station,
)
from network.numerics.ratings import curves, rating
from network.queries import in_force


def kernel_curve(row: Curve) -> curves.Curve:
    """Build the kernel's curve of a rating version; raises sentences.Refused when it is none."""
    return curve_of(row, row.segments.all(), row.points.all())


def curve_of(
    row: Curve, segments: Iterable[CurveSegment], points: Iterable[CurvePoint]
) -> curves.Curve:
    """Build the kernel's curve of a version from its rows, however they were read."""
    use = {
        "lowest_use_m": row.lowest_use_m,
        "highest_use_m": row.highest_use_m,
        "extrapolate_to_low_m": row.extrapolate_low_m,
        "extrapolate_to_high_m": row.extrapolate_high_m,
        "gauged_lowest_m": row.gauged_lowest_m,
        "gauged_highest_m": row.gauged_highest_m,
    }
    if row.form == Curve.Form.SEGMENTS:
        segments = sorted(segments, key=lambda s: s.lower_stage_m)
        return curves.SegmentCurve(
            segments=[curves.Segment(s.lower_stage_m, s.c, s.h0_m, s.b) for s in segments], **use
        )
    points = sorted(points, key=lambda point: point.stage_m)
    return curves.TableCurve(
        stages_m=np.array([point.stage_m for point in points]),
        flows_m3s=np.array([point.flow_m3s for point in points]),
        rule="log" if row.form == Curve.Form.TABLE_LOG else "linear",
        h0_m=row.h0_m or 0.0,
        **use,
    )


def period_rows(station: Station, start: datetime, end: datetime) -> list[RatingPeriod]:
    """Return the rating periods in force between two instants, with all they need."""
    chain = RatingPeriod.objects.filter(station=station).select_related("curve")
    chain = chain.prefetch_related("curve__segments", "curve__points", "shift_tables__points")
    return in_force.between(chain, start, end)


def kernel_periods(rows: Iterable[RatingPeriod]) -> tuple[rating.RatingPeriod, ...]:
    """Build the kernel's rating periods with their shift tables."""
    return tuple(
        rating.RatingPeriod(
            in_force.seconds(row.effective_from),
            kernel_curve(row.curve) if row.curve else None,
            [shift_table(table, table.points.all()) for table in _standing_tables(row)],
        )
        for row in rows
    )


def _standing_tables(row: RatingPeriod) -> list[ShiftTable]:
    tables = [table for table in row.shift_tables.all() if table.stands]
    return sorted(tables, key=lambda table: table.effective_from)


def shift_table(row: ShiftTable, points: Iterable[ShiftPoint]) -> rating.ShiftTable:
    """Build the kernel's shift table from its rows, however they were read."""
    points = sorted(points, key=lambda point: point.stage_m)
    return rating.ShiftTable(
        in_force.seconds(row.effective_from),
        np.array([point.stage_m for point in points]),
        np.array([point.shift_m for point in points]),
        linear_to_next=row.joins == ShiftTable.Joins.LINEAR,
    )
