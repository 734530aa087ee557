"""People for tests: one of each role, and what they work on."""

from datetime import date

from django.contrib.auth.models import Group

from network.models import Agency, OperationPeriod, Person, Station, WorkingRules
from network.services.roles import TABLE


def make_agency(**fields):
    """Make the agency with a record clock one hour ahead of UTC, and its working rules."""
    WorkingRules.objects.create(pk=1)
    defaults = {
        "name": "Wasseramt Beispielland",
        "record_utc_offset_minutes": 60,
        "civil_zone": "Europe/Vienna",
    }
    return Agency.objects.create(pk=1, **{**defaults, **fields})


def make_person(role, *, office=None, **fields):
    """Make a person with a role; the login is the role's name without blanks."""
    login = fields.pop("username", role.replace(" ", "-"))
    person = Person.objects.create_user(
        username=login, password="over the river", is_staff=True, office=office, **fields
    )
    if role in TABLE:
        person.groups.add(Group.objects.get(name=role))
    return person


def make_station(office, **fields):
    """Make a station that has run since 2019."""
    defaults = {
        "code": "TE-010",
        "name": "Mühlsteg",
        "river": "Tessel",
        "latitude_deg": 47.5,
        "longitude_deg": 13.25,
        "catchment_km2": 312.0,
    }
    station = Station.objects.create(office=office, **{**defaults, **fields})
    OperationPeriod.objects.create(station=station, opened_on=date(2019, 1, 1))
    return station
