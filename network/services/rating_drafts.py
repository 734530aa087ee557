"""Drafts of rating versions: written whole, replaced whole while they are drafts."""

from collections.abc import Sequence
from dataclasses import dataclass
from datetime import datetime
from math import isnan

from django.utils.translation import gettext as _

from network.models import (
    Curve,
    CurveBand,
    CurveGauging,
    CurvePoint,
    CurveSegment,
    Gauging,
    Person,
    Station,
)
from network.numerics.ratings.curves import Segment, SegmentCurve, TableCurve, joint_gaps
from network.numerics.sentences import Refused
from network.queries import curves
from network.queries.rating_sheet import Sheet
from network.queries.sentences import said
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


@dataclass(frozen=True, kw_only=True)
class Content:
    """All that a draft says; band is stage m and U₉₅ %.

    joints_may_gap: segments that do not meet within 0.5 % are meant so.
    """

    relation: Relation
    use: Use
    gaugings: Sequence[GaugingChoice] = ()
    band: Sequence[tuple[float, float]] = ()
    joints_may_gap: bool = False


def content_of(sheet: Sheet, *, joints_may_gap: bool = False) -> Content:
    """Return what a draft says when it is made from a rating sheet."""
    curve = sheet.curve
    if isinstance(curve, SegmentCurve):
        relation = Relation(segments=curve.segments)
    else:
        assert isinstance(curve, TableCurve)
        rows = zip(curve.stages_m.tolist(), curve.flows_m3s.tolist(), strict=True)
        relation = Relation(points=list(rows), form=curve.rule, h0_m=curve.h0_m)
    use = Use(
        lowest_use_m=curve.lowest_use_m,
        highest_use_m=curve.highest_use_m,
        extrapolate_low_m=curve.extrapolate_to_low_m,
        extrapolate_high_m=curve.extrapolate_to_high_m,
        gauged_lowest_m=curve.gauged_lowest_m,
        gauged_highest_m=curve.gauged_highest_m,
        scatter_percent=sheet.scatter_percent,
    )
    deviations = sheet.deviations_percent.tolist()
    gaugings = [
        GaugingChoice(
            gauging=point.gauging,
            left_out_because=point.left_out_because,
            deviation_percent=None if isnan(deviation) else deviation,
        )
        for point, deviation in zip(sheet.points.rows, deviations, strict=True)
    ]
    return Content(
        relation=relation,
        use=use,
        gaugings=gaugings,
        band=sheet.band.pairs() if sheet.band else (),
        joints_may_gap=joints_may_gap,
    )


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
    content = Content(
        relation=relation, use=use, gaugings=gaugings, band=band, joints_may_gap=joints_may_gap
    )
    if not station.is_rated:
        raise Refusal(_("This station is not rated here."))
    verb = _("drafted rating version %(number)s") % {"number": number}
    with open_act(verb, by=by, at=at, reason=reason.strip(), station=station):
        curve = Curve(station=station, number=_required_number(number))
        _write(curve, content, reason=reason, by=by, at=at)
    return curve


def redraft(*, curve: Curve, content: Content, reason: str, by: Person, at: datetime) -> Curve:
    """Replace a draft by another one of the same number; what is approved never changes."""
    verb = _("drafted rating version %(number)s anew") % {"number": curve.number}
    with open_act(verb, by=by, at=at, reason=reason.strip(), station=curve.station):
        row = Curve.objects.select_for_update(of=("self",)).get(pk=curve.pk)
        if row.state != Curve.State.DRAFT:
            raise Refusal(_("An approved version never changes; draft another one."))
        if not row.stands:
            raise Refusal(_("This draft is withdrawn; draft another one."))
        for children in (row.segments, row.points, row.gaugings):
            for child in children.all():  # one by one: each leaves its trail
                child.delete()
        row.band.all().delete()
        _write(row, content, reason=reason, by=by, at=at)
    return row


def _write(curve: Curve, content: Content, *, reason: str, by: Person, at: datetime) -> None:
    relation = content.relation
    curve.form, curve.h0_m = relation.form, relation.h0_m
    curve.reason = acts.required_reason(reason)
    curve.recorded_by, curve.recorded_at = by, at
    for name, value in vars(content.use).items():
        setattr(curve, name, value)
    curve.save()
    for segment in relation.segments:
        CurveSegment.objects.create(curve=curve, **vars(segment))
    for stage_m, flow_m3s in relation.points:
        CurvePoint.objects.create(curve=curve, stage_m=stage_m, flow_m3s=flow_m3s)
    CurveBand.objects.bulk_create(
        CurveBand(curve=curve, stage_m=stage, u95_percent=percent)
        for stage, percent in content.band
    )
    for choice in content.gaugings:
        _refuse_other_station(curve, choice.gauging)
        CurveGauging.objects.create(
            curve=curve,
            gauging=choice.gauging,
            is_used=not choice.left_out_because,
            left_out_because=choice.left_out_because,
            deviation_percent=choice.deviation_percent,
        )
    _refuse_what_is_no_curve(curve, joints_may_gap=content.joints_may_gap)


def _required_number(number: str) -> str:
    stripped = number.strip()
    if not stripped:
        raise Refusal(_("A rating version has a number or a name."), field="number")
    return stripped


def _refuse_other_station(curve: Curve, gauging: Gauging) -> None:
    if gauging.station_id != curve.station_id:
        raise Refusal(_("A gauging of another station cannot serve here."), field="gaugings")


def _refuse_what_is_no_curve(curve: Curve, *, joints_may_gap: bool) -> None:
    try:
        kernel = curves.kernel_curve(curve)
    except Refused as refused:
        raise Refusal(said(refused.sentence)) from refused
    if isinstance(kernel, SegmentCurve) and not joints_may_gap:
        gaps = joint_gaps(kernel)
        if len(gaps) and abs(gaps).max() > JOINT_LIMIT:
            raise Refusal(
                _("The segments do not meet: at a joint they differ by %(gap).1f %%.")
                % {"gap": 100 * abs(gaps).max()},
                field="segments",
            )
