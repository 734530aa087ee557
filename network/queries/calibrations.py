"""The calibration in force of a meter, as the kernel wants it, and what a new one changed."""

from dataclasses import dataclass, replace
from datetime import datetime, timedelta

from django.db.models import (
    DurationField,
    ExpressionWrapper,
    F,
    OuterRef,
    Q,
    QuerySet,
    Subquery,
    Sum,
    Value,
)
from django.db.models.functions import Coalesce

from network.models import Calibration, CalibrationPiece, Gauging, MeterPair
from network.numerics.gaugings.gauging_input import Meter
from network.numerics.meters.meter_rating import Piece

HOUR = timedelta(hours=1)
DURATION = ExpressionWrapper(F("ended_at") - F("started_at"), output_field=DurationField())
WITHOUT_END = 1e6  # revolutions a second: a piece whose range has no upper end


@dataclass(frozen=True)
class MeterThen:
    """A meter at an instant: the calibration in force, or none, and what the kernel needs of it."""

    calibration: Calibration | None
    meter: Meter


def that_count() -> "QuerySet[Calibration]":
    """Return the standing calibrations but the failed, which leave a meter as it was before."""
    return Calibration.objects.standing().exclude(outcome=Calibration.Outcome.FAILED)


def in_force_rows(pair_id: int, instant: datetime) -> "QuerySet[Calibration]":
    """Return the standing calibrations of a pair by then: its own first, then its group's."""
    owned = Q(pair=pair_id) | Q(group__pairs=pair_id)
    rows = that_count().filter(owned, effective_from__lte=instant)
    return rows.order_by(F("pair").asc(nulls_last=True), "-effective_from")


def in_force(pair: MeterPair, instant: datetime) -> Calibration | None:
    """Return the calibration of a meter at an instant: the latest of its own, else its group's."""
    return in_force_rows(pair.pk, instant).first()


def kernel_pieces(calibration: Calibration) -> tuple[Piece, ...]:
    """Return the pieces of a meter rating in rising n for the kernel."""
    rows = sorted(calibration.pieces.all(), key=lambda row: row.lowest_n)
    return _pieces(rows)


def meter_then(
    pair_id: int, instant: datetime, *, spin_test_s: float | None, leave_out: int | None = None
) -> MeterThen:
    """Return a meter at an instant in one query; the hours of use leave out one gauging.

    A meter without a calibration has no pieces: revolutions of it give no velocity.
    """
    chosen = in_force_rows(pair_id, instant).values("pk")[:1]
    rows = (
        CalibrationPiece.objects.filter(calibration=Subquery(chosen))
        .select_related("calibration")
        .annotate(used=_use(pair_id, OuterRef("calibration__effective_from"), instant, leave_out))
        .order_by("lowest_n")
    )
    found = list(rows)
    if not found:
        return MeterThen(None, Meter(spin_test_s=spin_test_s))
    row = found[0].calibration
    return MeterThen(
        row,
        Meter(
            pieces=_pieces(found),
            lowest_ms=row.lowest_velocity_ms,
            highest_ms=row.highest_velocity_ms,
            calibrated_singly=row.pair_id is not None,
            standard_uncertainty_percent=row.uncertainty_percent,
            days_since_calibration=(instant - row.effective_from) / timedelta(days=1),
            hours_since_calibration=found[0].used / HOUR,
            spin_test_s=spin_test_s,
        ),
    )


def hours_of_use(pair: MeterPair, since: datetime, until: datetime) -> float:
    """Return the hours of the gaugings made with a meter between two instants."""
    found = Gauging.objects.filter(pair=pair, started_at__gte=since, started_at__lt=until)
    return (found.aggregate(used=Sum(DURATION))["used"] or timedelta()) / HOUR


def _use(pair_id: int, since: OuterRef, until: datetime, leave_out: int | None) -> Coalesce:
    """Sum the durations of a meter's gaugings between two instants, within a query."""
    rows = Gauging.objects.filter(pair=pair_id, started_at__gte=since, started_at__lt=until)
    total = rows.exclude(pk=leave_out).order_by().values("pair").annotate(used=Sum(DURATION))
    return Coalesce(
        Subquery(total.values("used")), Value(timedelta()), output_field=DurationField()
    )


def before(calibration: Calibration) -> Calibration | None:
    """Return the standing calibration of the same owner that this one followed."""
    rows = Calibration.objects.standing().filter(
        pair=calibration.pair_id,
        group=calibration.group_id,
        instrument=calibration.instrument_id,
        effective_from__lt=calibration.effective_from,
    )
    return rows.prefetch_related("pieces").order_by("effective_from").last()


def made_between(older: Calibration, newer: Calibration) -> "QuerySet[Gauging]":
    """Return the signed gaugings that rest on the older calibration, up to the newer one."""
    rows = Gauging.objects.filter(calibration=older, discharge_m3s__isnull=False)
    return rows.filter(started_at__lt=newer.effective_from).order_by("started_at")


def with_rating(meter: Meter, calibration: Calibration) -> Meter:
    """Return a meter with the pieces and range of another calibration."""
    return replace(
        meter,
        pieces=kernel_pieces(calibration),
        lowest_ms=calibration.lowest_velocity_ms,
        highest_ms=calibration.highest_velocity_ms,
        standard_uncertainty_percent=calibration.uncertainty_percent,
    )


def _pieces(rows: "list[CalibrationPiece]") -> tuple[Piece, ...]:
    ends = [*(row.lowest_n for row in rows[1:]), WITHOUT_END][: len(rows)]
    return tuple(
        Piece(row.a_ms, row.b_m, row.lowest_n, end if row.highest_n is None else row.highest_n)
        for row, end in zip(rows, ends, strict=True)
    )
