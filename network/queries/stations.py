"""Stations, found by their codes."""

from django.utils.translation import gettext as _

from network.models import Station
from network.queries.series import Unknown


def stations_named(codes: list[str]) -> list[Station]:
    """Return the stations of these codes, all of them where none is given. Raises Unknown."""
    stations = list(Station.objects.filter(code__in=codes) if codes else Station.objects.all())
    missing = sorted(set(codes) - {station.code for station in stations})
    if missing:
        raise Unknown(_("There is no station %(codes)s.") % {"codes": ", ".join(missing)})
    return stations
