"""Corrections of a stage record: proposed, accepted by someone, withdrawn with a reason."""

from datetime import datetime
from math import isfinite

from django.utils.translation import gettext as _

from network.models import Correction, Person, RecorderCheck, Series
from network.services.acts import (
    Refusal,
    lock_station,
    open_act,
    raise_record_version,
    required_reason,
    withdraw,
)

FARTHEST_M = 100.0  # no drift of a recorder is larger: a wrong unit was typed


def propose_correction(
    *,
    series: Series,
    start_at: datetime,
    end_at: datetime,
    start_offset_m: float,
    end_offset_m: float,
    reason: str,
    by: Person,
    at: datetime,
    recorder_check: RecorderCheck | None = None,
) -> Correction:
    """Propose a correction added to stage, linear between its two ends; no figure changes yet.

    Refuses offsets that do nothing, and a period that is already corrected in the same way.
    """
    _check_offsets(start_offset_m, end_offset_m)
    with open_act(
        _("propose correction"), by=by, at=at, reason=reason.strip(), station=series.station
    ):
        lock_station(series.station)
        _refuse_second(series, start_at=start_at, end_at=end_at)
        row = Correction(
            series=series,
            start_at=start_at,
            end_at=end_at,
            start_offset_m=start_offset_m,
            end_offset_m=end_offset_m,
            reason=required_reason(reason),
            recorder_check=recorder_check,
            recorded_at=at,
            recorded_by=by,
        )
        row.full_clean()
        row.save()
    return row


def accept_correction(*, correction: Correction, by: Person, at: datetime) -> Correction:
    """Accept a proposed correction: from now on the stage carries it."""
    station = correction.series.station
    with open_act(_("accept correction"), by=by, at=at, station=station):
        lock_station(station)
        row = Correction.objects.get(pk=correction.pk)
        if not row.stands:
            raise Refusal(_("This correction is withdrawn; propose it anew."))
        if row.state == Correction.State.ACCEPTED:
            raise Refusal(_("This correction is already accepted."))
        row.state, row.accepted_at, row.accepted_by = Correction.State.ACCEPTED, at, by
        row.save()
        raise_record_version(station)
    return row


def withdraw_correction(*, correction: Correction, by: Person, at: datetime, reason: str) -> None:
    """Withdraw a correction, proposed or accepted; the stage no longer carries it."""
    station = correction.series.station
    with open_act(_("withdraw correction"), by=by, at=at, reason=reason.strip(), station=station):
        lock_station(station)
        row = Correction.objects.get(pk=correction.pk)
        withdraw(row, by=by, at=at, reason=reason)
        if row.state == Correction.State.ACCEPTED:
            raise_record_version(station)


def _check_offsets(start_offset_m: float, end_offset_m: float) -> None:
    offsets = (start_offset_m, end_offset_m)
    if not all(isfinite(offset) and abs(offset) <= FARTHEST_M for offset in offsets):
        raise Refusal(_("A correction lies within 100 m; is this metres?"), field="start_offset_m")
    if offsets == (0, 0):
        raise Refusal(_("A correction of zero at both ends changes nothing."), field="end_offset_m")


def _refuse_second(series: Series, *, start_at: datetime, end_at: datetime) -> None:
    """Refuse the same period twice; corrections that merely overlap are meant to add up."""
    same = Correction.objects.standing().filter(series=series, start_at=start_at, end_at=end_at)
    if same.exists():
        raise Refusal(
            _("A correction of exactly this period stands already; withdraw it first."),
            field="start_at",
        )
