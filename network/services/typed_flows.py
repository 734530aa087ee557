"""Daily flows typed by a person: always marked, and standing before any other."""

from datetime import date, datetime
from math import isfinite

from django.utils.translation import gettext as _

from network.models import Person, Station, TypedFlow
from network.queries import clock
from network.services.acts import (
    Refusal,
    lock_station,
    open_act,
    raise_record_version,
    required_reason,
    withdraw,
)


def type_flow(
    *,
    station: Station,
    day: date,
    flow_m3s: float,
    method: str,
    reason: str,
    by: Person,
    at: datetime,
    uncertainty_percent: float | None = None,
) -> TypedFlow:
    """Type the mean flow of a record day; one standing value a day."""
    if not isfinite(flow_m3s):
        raise Refusal(_("A typed daily flow is a number."), field="flow_m3s")
    if day > clock.record_day(at, of=clock.agency()):
        raise Refusal(_("This day has not begun yet."), field="day")
    with open_act(_("type daily flow"), by=by, at=at, reason=reason.strip(), station=station):
        row = TypedFlow(
            station=station,
            day=day,
            flow_m3s=flow_m3s,
            method=method.strip(),
            reason=required_reason(reason),
            uncertainty_percent=uncertainty_percent,
            recorded_at=at,
            recorded_by=by,
        )
        row.full_clean()
        row.save()
        raise_record_version(station)
    return row


def withdraw_typed_flow(*, typed_flow: TypedFlow, by: Person, at: datetime, reason: str) -> None:
    """Withdraw a typed daily flow."""
    station = typed_flow.station
    with open_act(
        _("withdraw typed daily flow"), by=by, at=at, reason=reason.strip(), station=station
    ):
        lock_station(station)
        row = TypedFlow.objects.get(pk=typed_flow.pk)
        withdraw(row, by=by, at=at, reason=reason)
        raise_record_version(station)
