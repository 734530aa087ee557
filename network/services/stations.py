"""Stations: opened with what is known of them and their first period of operation."""

from datetime import date, datetime
from typing import Any

from django.utils.translation import gettext as _

from network.models import OperationPeriod, Person, Station
from network.services.acts import open_act


def open_station(
    *, code: str, opened_on: date, by: Person, at: datetime, **particulars: Any
) -> Station:
    """Write a station and the period in which it runs.

    `particulars` are other fields of the station: name, river, kind, office and so on. Refuses a
    code that is taken and whatever else the station's constraints do not allow.
    """
    station = Station(code=code.strip(), **particulars)
    with open_act(_("opened a station"), by=by, at=at) as act:
        station.full_clean()
        station.save()
        OperationPeriod.objects.create(station=station, opened_on=opened_on)
        act.station = station
        act.save(update_fields=["station"])
    return station
