"""Acts upon instruments: add, pair, group, change, and where a recorder stands."""

from datetime import datetime
from typing import Any

from django.utils.translation import gettext as _

from network.models import (
    Deployment,
    Instrument,
    MeterGroup,
    MeterPair,
    Office,
    Person,
    Series,
)
from network.services import series as series_acts
from network.services.acts import Refusal, open_act, required_reason

RECORDERS = {
    Instrument.Kind.FLOAT,
    Instrument.Kind.BUBBLER,
    Instrument.Kind.PRESSURE,
    Instrument.Kind.RADAR,
}


def add(
    *, kind: str, serial: str, office: Office, by: Person, at: datetime, **particulars: Any
) -> Instrument:
    """Add an instrument; particulars are other fields: maker, model, status, intervals, remarks."""
    with open_act(_("added an instrument"), by=by, at=at):
        row = Instrument(kind=kind, serial=serial.strip(), office=office, **particulars)
        row.full_clean()
        row.save()
    return row


def change(*, instrument: Instrument, by: Person, at: datetime, **particulars: Any) -> Instrument:
    """Change the particulars of an instrument; its status has an act of its own."""
    with open_act(_("changed an instrument"), by=by, at=at):
        for name, value in particulars.items():
            setattr(instrument, name, value)
        instrument.full_clean()
        instrument.save()
    return instrument


def change_status(
    *, instrument: Instrument, status: str, by: Person, at: datetime, reason: str = ""
) -> Instrument:
    """Change the status; withdrawing needs a reason, and a recorder is taken down before."""
    if status == Instrument.Status.WITHDRAWN:
        required_reason(reason)
        if instrument.deployments.filter(removed_at__isnull=True).exists():
            raise Refusal(_("This recorder still stands at a station: remove it first."))
    with open_act(_("changed the status of an instrument"), by=by, at=at, reason=reason.strip()):
        instrument.status = status
        instrument.full_clean()
        instrument.save()
    return instrument


def pair(
    *,
    body: Instrument,
    rotor: Instrument,
    by: Person,
    at: datetime,
    group: MeterGroup | None = None,
    is_cup_meter: bool = False,
) -> MeterPair:
    """Join a body and a rotor to a current meter: a rating belongs to the two together."""
    for part, kind, field in (
        (body, Instrument.Kind.METER_BODY, "body"),
        (rotor, Instrument.Kind.METER_ROTOR, "rotor"),
    ):
        if part.kind != kind:
            raise Refusal(_("%(part)s is not a %(kind)s.") % _names(part, kind), field=field)
    with open_act(_("joined a body and a rotor"), by=by, at=at):
        row = MeterPair(body=body, rotor=rotor, group=group, is_cup_meter=is_cup_meter)
        row.full_clean()
        row.save()
    return row


def group(*, name: str, by: Person, at: datetime) -> MeterGroup:
    """Open a group of meters that share a rating."""
    with open_act(_("opened a group of meters"), by=by, at=at):
        row = MeterGroup(name=name.strip())
        row.full_clean()
        row.save()
    return row


def put_in_group(
    *, pair: MeterPair, group: MeterGroup | None, by: Person, at: datetime
) -> MeterPair:
    """Let a meter share a group's rating, or none; signed gaugings keep their calibration."""
    with open_act(_("changed the group of a meter"), by=by, at=at):
        pair.group = group
        pair.save()
    return pair


def deploy(
    *,
    instrument: Instrument,
    series: Series,
    installed_at: datetime,
    scale: float,
    offset_m: float,
    reason: str,
    by: Person,
    at: datetime,
) -> Deployment:
    """Set a recorder up at a series with its first sensor setting: stage = scale × raw + offset."""
    if instrument.kind not in RECORDERS:
        raise Refusal(_("Only a recorder feeds a series."), field="instrument")
    if instrument.status == Instrument.Status.WITHDRAWN:
        raise Refusal(_("This instrument is withdrawn."), field="instrument")
    _refuse_overlap(instrument, series, installed_at)
    with open_act(_("set up a recorder"), by=by, at=at, reason=reason, station=series.station):
        row = Deployment.objects.create(
            series=series,
            instrument=instrument,
            installed_at=installed_at,
            recorded_at=at,
            recorded_by=by,
        )
        series_acts.set_sensor(
            series=series,
            deployment=row,
            effective_from=installed_at,
            scale=scale,
            offset_m=offset_m,
            reason=reason,
            by=by,
            at=at,
        )
    return row


def remove(
    *, deployment: Deployment, removed_at: datetime, reason: str, by: Person, at: datetime
) -> Deployment:
    """Take a recorder down; its readings and settings stay."""
    if deployment.removed_at is not None:
        raise Refusal(_("This recorder is already removed."))
    station = deployment.series.station
    with open_act(_("removed a recorder"), by=by, at=at, reason=reason, station=station):
        required_reason(reason)
        deployment.removed_at = removed_at
        deployment.save()
    return deployment


def _refuse_overlap(instrument: Instrument, series: Series, installed_at: datetime) -> None:
    """Refuse a second recorder at a series, and a recorder that then stood elsewhere."""
    for rows, sentence in (
        (series.deployments, _("Another recorder feeds this series then: remove it first.")),
        (instrument.deployments, _("This instrument then stood at another series.")),
    ):
        still = rows.filter(removed_at__isnull=True) | rows.filter(removed_at__gt=installed_at)
        if still.exists():
            raise Refusal(sentence, field="installed_at")


def _names(part: Instrument, kind: Instrument.Kind) -> dict[str, str]:
    return {"part": str(part), "kind": str(kind.label)}
