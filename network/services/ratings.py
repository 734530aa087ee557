"""Acts upon ratings: versions drafted and approved, periods in force, shift tables."""

from collections.abc import Sequence
from datetime import datetime
from typing import Any

from django.utils.translation import gettext as _

from network.models import Curve, Person, RatingPeriod, ShiftPoint, ShiftTable, Station
from network.queries import clock, in_force
from network.services import acts
from network.services.acts import Refusal, lock_station, open_act
from network.services.rating_drafts import (
    Content,
    GaugingChoice,
    Relation,
    Use,
    content_of,
    draft,
    redraft,
)

__all__ = [
    "Content",
    "GaugingChoice",
    "Relation",
    "Use",
    "add_shift_table",
    "approve",
    "content_of",
    "draft",
    "put_in_force",
    "redraft",
    "withdraw_period",
    "withdraw_shift_table",
    "withdraw_version",
]


def approve(*, curve: Curve, by: Person, at: datetime) -> Curve:
    """Approve a draft: from then on it never changes.

    Where the agency asks for two pairs of eyes, none of those who drafted it may approve it.
    """
    if curve.state == Curve.State.APPROVED:
        raise Refusal(_("This version is already approved."))
    if not curve.stands:
        raise Refusal(_("A withdrawn version cannot be approved."))
    if clock.agency().approver_differs and by.pk in _authors(curve):
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
    until: datetime | None = None,
    replaces: bool = False,
) -> RatingPeriod:
    """Put an approved version in force from an instant, or say that from then on none is.

    With `until` it holds for a season: from then on what was in force before it returns.
    With `replaces` the period that starts at the same instant is withdrawn in the same act, and
    with it its shift tables, which were made for another version.
    """
    if curve is not None:
        _refuse_version_for(station, curve)
    verb = (
        _("put rating version %(number)s in force") % {"number": curve.number}
        if curve
        else _("ended the rating in force")
    )
    signed: dict[str, Any] = {"by": by, "at": at, "reason": reason}
    with open_act(verb, by=by, at=at, reason=reason.strip(), station=station):
        lock_station(station)
        if replaces:
            withdraw_period(period=_starting(station, effective_from), **signed)
        if until is not None:
            before = _returning(station, effective_from, until)
            _begin(station, before.curve, until, **signed)
        period = _begin(station, curve, effective_from, **signed)
        acts.raise_record_version(station)
    return period


def withdraw_period(*, period: RatingPeriod, by: Person, at: datetime, reason: str) -> None:
    """Withdraw a period and its shift tables; the version before then holds on."""
    station = period.station
    verb = _("withdrew a period of a rating")
    with open_act(verb, by=by, at=at, reason=reason.strip(), station=station):
        lock_station(station)
        row = RatingPeriod.objects.get(pk=period.pk)
        for table in row.shift_tables.standing():
            acts.withdraw(table, by=by, at=at, reason=reason)
        acts.withdraw(row, by=by, at=at, reason=reason)
        acts.raise_record_version(station)


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
    verb = _("added a shift table")
    with open_act(verb, by=by, at=at, reason=reason.strip(), station=period.station):
        lock_station(period.station)
        table = ShiftTable(
            period=period,
            effective_from=effective_from,
            joins=joins,
            reason=acts.required_reason(reason),
            recorded_by=by,
            recorded_at=at,
        )
        table.full_clean()
        table.save()
        for stage_m, shift_m in points:
            ShiftPoint.objects.create(table=table, stage_m=stage_m, shift_m=shift_m)
        acts.raise_record_version(period.station)
    return table


def withdraw_shift_table(*, table: ShiftTable, by: Person, at: datetime, reason: str) -> None:
    """Withdraw a shift table; the one before it then holds on."""
    station = table.period.station
    verb = _("withdrew a shift table")
    with open_act(verb, by=by, at=at, reason=reason.strip(), station=station):
        lock_station(station)
        row = ShiftTable.objects.get(pk=table.pk)
        acts.withdraw(row, by=by, at=at, reason=reason)
        acts.raise_record_version(station)


def _authors(curve: Curve) -> set[int]:
    """Return the keys of all who wrote a draft of this version."""
    return {curve.recorded_by_id, *curve.history.values_list("recorded_by", flat=True)}


def _begin(
    station: Station,
    curve: Curve | None,
    effective_from: datetime,
    *,
    by: Person,
    at: datetime,
    reason: str,
) -> RatingPeriod:
    row = RatingPeriod(
        station=station,
        curve=curve,
        effective_from=effective_from,
        reason=acts.required_reason(reason),
        recorded_by=by,
        recorded_at=at,
    )
    row.full_clean()
    row.save()
    return row


def _starting(station: Station, effective_from: datetime) -> RatingPeriod:
    """Return the standing period that starts at an instant; refuse where none does."""
    rows = RatingPeriod.objects.standing().filter(station=station)
    row = rows.filter(effective_from=effective_from).first()
    if row is None:
        raise Refusal(
            _("No version starts at that instant; there is nothing to replace."), field="replaces"
        )
    return row


def _returning(station: Station, effective_from: datetime, until: datetime) -> RatingPeriod:
    """Return the period in force before a season; refuse where none is, or another starts in it."""
    if until <= effective_from:
        raise Refusal(_("The season ends after it starts."), field="until")
    chain = RatingPeriod.objects.filter(station=station)
    before: RatingPeriod | None = in_force.at(chain, effective_from)
    if before is None:
        raise Refusal(_("Before the season no rating is in force that could return."))
    within = chain.standing().filter(effective_from__gt=effective_from, effective_from__lte=until)
    if within.exists():
        raise Refusal(_("Another period starts within the season."), field="until")
    return before


def _refuse_version_for(station: Station, curve: Curve) -> None:
    if curve.station_id != station.pk:
        raise Refusal(_("This version belongs to another station."), field="curve")
    if curve.state != Curve.State.APPROVED or not curve.stands:
        raise Refusal(_("Only an approved version can be put in force."), field="curve")


def _refuse_start_outside(period: RatingPeriod, effective_from: datetime) -> None:
    in_force_then = in_force.at(RatingPeriod.objects.filter(station=period.station), effective_from)
    if in_force_then != period or period.curve is None:
        raise Refusal(_("The rating is not in force at that instant."), field="effective_from")
