"""Infills: whole days without a flow estimated by a stated method, always marked estimated."""

from datetime import date, datetime

from django.utils.translation import gettext as _

from network.models import Infill, Person, Series, Station
from network.services.acts import (
    Refusal,
    lock_station,
    open_act,
    raise_record_version,
    required_reason,
    withdraw,
)


def add_infill(
    *,
    station: Station,
    first_day: date,
    last_day: date,
    method: str,
    reason: str,
    by: Person,
    at: datetime,
    neighbour: Station | None = None,
    series: Series | None = None,
    uncertainty_percent: float | None = None,
) -> Infill:
    """Fill the days from first to last, both included, where the record has none.

    Refuses days another infill already fills, a station as its own neighbour, and a series that
    is not a second one of this station.
    """
    _check_source(station, neighbour=neighbour, series=series)
    with open_act(_("add infill"), by=by, at=at, reason=reason.strip(), station=station):
        lock_station(station)
        row = Infill(
            station=station,
            first_day=first_day,
            last_day=last_day,
            method=method,
            neighbour=neighbour,
            series=series,
            reason=required_reason(reason),
            uncertainty_percent=uncertainty_percent,
            recorded_at=at,
            recorded_by=by,
        )
        row.full_clean()
        _refuse_overlap(row)
        row.save()
        raise_record_version(station)
    return row


def withdraw_infill(*, infill: Infill, by: Person, at: datetime, reason: str) -> None:
    """Withdraw an infill; its days are missing again."""
    station = infill.station
    with open_act(_("withdraw infill"), by=by, at=at, reason=reason.strip(), station=station):
        lock_station(station)
        row = Infill.objects.get(pk=infill.pk)
        withdraw(row, by=by, at=at, reason=reason)
        raise_record_version(station)


def _check_source(station: Station, *, neighbour: Station | None, series: Series | None) -> None:
    if neighbour == station:
        raise Refusal(_("A station is not its own neighbour."), field="neighbour")
    if series is not None and series.station_id != station.pk:
        raise Refusal(_("This series belongs to another station."), field="series")
    if series is not None and series.is_primary:
        raise Refusal(_("The primary series cannot fill its own gaps."), field="series")


def _refuse_overlap(infill: Infill) -> None:
    other = (
        Infill.objects.standing()
        .filter(
            station=infill.station,
            first_day__lte=infill.last_day,
            last_day__gte=infill.first_day,
        )
        .first()
    )
    if other is not None:
        raise Refusal(
            _("The days %(first)s – %(last)s already have an infill; withdraw it first.")
            % {"first": other.first_day, "last": other.last_day},
            field="first_day",
        )
