"""Acts upon ratings: versions drafted and approved, periods in force, shift tables."""

from collections.abc import Sequence
from dataclasses import dataclass
from datetime import datetime

from django.utils.translation import gettext as _

from network.models import (
    Curve,
    CurveBand,
    CurveGauging,
    CurvePoint,
    CurveSegment,
    Gauging,
    Person,
    RatingPeriod,
    ShiftPoint,
    ShiftTable,
    Station,
)
from network.numerics.curves import Segment, SegmentCurve, joint_gaps
from network.numerics.sentences import Refused
from network.queries import clock, curves, in_force
from network.services import acts
from network.services.acts import Refusal, open_act

JOINT_LIMIT = 0.005  # neighbouring segments meet within 0.5 %, unless told so


@dataclass(frozen=True, kw_only=True)
class Use:
    """The range of use of a rating version, and what its gaugings cover."""

    lowest_use_m: float
    highest_use_m: float
    extrapolate_low_m: float | None = None
    extrapolate_high_m: float | None = None
    gauged_lowest_m: float | None = None
    gauged_highest_m: float | None = None
    scatter_percent: float | None = None


@dataclass(frozen=True, kw_only=True)
class Relation:
    """The relation itself: segments, or a table with its rule and its stage of zero flow."""

    segments: Sequence[Segment] = ()
    points: Sequence[tuple[float, float]] = ()  # stage m, flow m³/s
    form: str = Curve.Form.SEGMENTS
    h0_m: float | None = None


@dataclass(frozen=True, kw_only=True)
class GaugingChoice:
    """A gauging a version looked at; left out when a reason is given."""

    gauging: Gauging
    left_out_because: str = ""
    deviation_percent: float | None = None


def draft(
    *,
    station: Station,
    number: str,
    relation: Relation,
    use: Use,
    reason: str,
    by: Person,
    at: datetime,
    gaugings: Sequence[GaugingChoice] = (),
    band: Sequence[tuple[float, float]] = (),
    joints_may_gap: bool = False,
) -> Curve:
    """Write a rating version as a draft; band is stage m and U₉₅ %. Refuses what is no curve."""
    if not station.is_rated:
        raise Refusal(_("This station is not rated here."))
    verb = _("drafted rating version %(number)s") % {"number": number}
    with open_act(verb, by=by, at=at, reason=reason, station=station):
        curve = Curve.objects.create(
            station=station,
            number=number.strip(),
            form=relation.form,
            h0_m=relation.h0_m,
            reason=acts.required_reason(reason),
            recorded_by=by,
            recorded_at=at,
            **vars(use),
        )
        _write_relation(curve, relation)
        CurveBand.objects.bulk_create(
            CurveBand(curve=curve, stage_m=stage, u95_percent=percent) for stage, percent in band
        )
        for choice in gaugings:
            CurveGauging.objects.create(
                curve=curve,
                gauging=choice.gauging,
                is_used=not choice.left_out_because,
                left_out_because=choice.left_out_because,
                deviation_percent=choice.deviation_percent,
            )
        _refuse_what_is_no_curve(curve, joints_may_gap=joints_may_gap)
    return curve


def approve(*, curve: Curve, by: Person, at: datetime) -> Curve:
    """Approve a draft: from then on it never changes."""
    if curve.state == Curve.State.APPROVED:
        raise Refusal(_("This version is already approved."))
    if not curve.stands:
        raise Refusal(_("A withdrawn version cannot be approved."))
    if clock.agency().approver_differs and curve.recorded_by_id == by.pk:
        raise Refusal(_("A version is approved by someone else than its author."))
    verb = _("approved rating version %(number)s") % {"number": curve.number}
    with open_act(verb, by=by, at=at, station=curve.station):
        curve.state, curve.approved_by, curve.approved_at = Curve.State.APPROVED, by, at
        curve.save()
    return curve


def withdraw_version(*, curve: Curve, by: Person, at: datetime, reason: str) -> None:
    """Withdraw a version that no standing period uses."""
    if curve.periods.standing().exists():
        raise Refusal(_("A period in force uses this version; withdraw the period first."))
    verb = _("withdrew rating version %(number)s") % {"number": curve.number}
    with open_act(verb, by=by, at=at, reason=reason, station=curve.station):
        acts.withdraw(curve, by=by, at=at, reason=reason)


def put_in_force(
    *,
    station: Station,
    curve: Curve | None,
    effective_from: datetime,
    by: Person,
    at: datetime,
    reason: str,
) -> RatingPeriod:
    """Put an approved version in force from an instant, or say that from then on none is."""
    if curve is not None:
        _refuse_version_for(station, curve)
    verb = (
        _("put rating version %(number)s in force") % {"number": curve.number}
        if curve
        else _("ended the rating in force")
    )
    with open_act(verb, by=by, at=at, reason=reason, station=station):
        period = RatingPeriod.objects.create(
            station=station,
            curve=curve,
            effective_from=effective_from,
            reason=acts.required_reason(reason),
            recorded_by=by,
            recorded_at=at,
        )
        acts.raise_record_version(station)
    return period


def withdraw_period(*, period: RatingPeriod, by: Person, at: datetime, reason: str) -> None:
    """Withdraw a period and its shift tables; the version before then holds on."""
    verb = _("withdrew a period of a rating")
    with open_act(verb, by=by, at=at, reason=reason, station=period.station):
        for table in period.shift_tables.standing():
            acts.withdraw(table, by=by, at=at, reason=reason)
        acts.withdraw(period, by=by, at=at, reason=reason)
        acts.raise_record_version(period.station)


def add_shift_table(
    *,
    period: RatingPeriod,
    effective_from: datetime,
    points: Sequence[tuple[float, float]],
    by: Person,
    at: datetime,
    reason: str,
    joins: str = ShiftTable.Joins.STEP,
) -> ShiftTable:
    """Add shifts by stage (stage m, shift m) from an instant inside a period in force."""
    _refuse_start_outside(period, effective_from)
    if not points:
        raise Refusal(_("A shift table needs at least one stage and shift."), field="points")
    with open_act(_("added a shift table"), by=by, at=at, reason=reason, station=period.station):
        table = ShiftTable.objects.create(
            period=period,
            effective_from=effective_from,
            joins=joins,
            reason=acts.required_reason(reason),
            recorded_by=by,
            recorded_at=at,
        )
        for stage_m, shift_m in points:
            ShiftPoint.objects.create(table=table, stage_m=stage_m, shift_m=shift_m)
        acts.raise_record_version(period.station)
    return table


def withdraw_shift_table(*, table: ShiftTable, by: Person, at: datetime, reason: str) -> None:
    """Withdraw a shift table; the one before it then holds on."""
    station = table.period.station
    with open_act(_("withdrew a shift table"), by=by, at=at, reason=reason, station=station):
        acts.withdraw(table, by=by, at=at, reason=reason)
        acts.raise_record_version(station)


def _write_relation(curve: Curve, relation: Relation) -> None:
    for segment in relation.segments:
        CurveSegment.objects.create(curve=curve, **vars(segment))
    for stage_m, flow_m3s in relation.points:
        CurvePoint.objects.create(curve=curve, stage_m=stage_m, flow_m3s=flow_m3s)


def _refuse_what_is_no_curve(curve: Curve, *, joints_may_gap: bool) -> None:
    try:
        kernel = curves.kernel_curve(curve)
    except Refused as refused:
        raise Refusal(_(refused.sentence.text).format(**refused.sentence.values)) from refused
    if isinstance(kernel, SegmentCurve) and not joints_may_gap:
        gaps = joint_gaps(kernel)
        if len(gaps) and abs(gaps).max() > JOINT_LIMIT:
            raise Refusal(
                _("The segments do not meet: at a joint they differ by %(gap).1f %%.")
                % {"gap": 100 * abs(gaps).max()},
                field="segments",
            )


def _refuse_version_for(station: Station, curve: Curve) -> None:
    if curve.station_id != station.pk:
        raise Refusal(_("This version belongs to another station."), field="curve")
    if curve.state != Curve.State.APPROVED or not curve.stands:
        raise Refusal(_("Only an approved version can be put in force."), field="curve")


def _refuse_start_outside(period: RatingPeriod, effective_from: datetime) -> None:
    in_force_then = in_force.at(RatingPeriod.objects.filter(station=period.station), effective_from)
    if in_force_then != period or period.curve is None:
        raise Refusal(_("The rating is not in force at that instant."), field="effective_from")
