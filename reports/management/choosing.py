"""What the commands of this app share: whom they act as, which stations and year are meant."""

from collections.abc import Sequence

from django.core.management.base import CommandError

from network.models import Person, Station
from network.queries import station_years


def person(username: str) -> Person:
    """Return the person an act is done by; raise CommandError for one unknown or not active."""
    found = Person.objects.filter(username=username, is_active=True).first()
    if found is None:
        raise CommandError(f"There is no active person with the login “{username}”.")
    return found


def stations(codes: Sequence[str]) -> list[Station]:
    """Return the stations of the codes, all where none is given; raise CommandError for others."""
    rows = Station.objects.order_by("code")
    found = list(rows.filter(code__in=codes) if codes else rows)
    unknown = set(codes) - {station.code for station in found}
    if unknown:
        raise CommandError(f"There is no station {', '.join(sorted(unknown))}.")
    return found


def on_record(codes: Sequence[str], year: int) -> list[Station]:
    """Return those of the stations that have a record in a water year."""
    found = [each for each in stations(codes) if year in station_years.years_on_record(each)]
    if not found:
        raise CommandError(
            f"No such station has a record in {station_years.calendar().label(year)}."
        )
    return found
