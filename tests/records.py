"""Rows and logger files that tests of the record share: a station, a series, a plain profile."""

import io
from datetime import UTC, date, datetime, timedelta

from django.apps import apps

from network.models import MappingProfile, Office, OperationPeriod, Person, Station
from network.services import imports, profiles
from network.services.series import open_series

AT = datetime(2024, 3, 1, 12, tzinfo=UTC)
START = datetime(2024, 1, 30, tzinfo=UTC)


def make_person(username="keeper"):
    return Person.objects.create(username=username, first_name="Kim", last_name=username.title())


def make_station(code="QA-010"):
    office, _made = Office.objects.get_or_create(name="Upper office")
    station = Station.objects.create(
        code=code, name="Oakford", river="Quill", latitude_deg=47, longitude_deg=11, office=office
    )
    OperationPeriod.objects.create(station=station, opened_on=date(2010, 1, 1))
    return station


def make_series(by, station=None, label="Recorder"):
    return open_series(
        station=station or make_station(), label=label, is_primary=True, by=by, at=AT
    )


def make_profile(by, **values):
    return profiles.record_profile(
        profile=MappingProfile(name="plain"), values={"unit": "m"} | values, by=by, at=AT
    )


def logger_text(values_m, *, start=START, step=timedelta(hours=6)):
    """Write readings as a logger would: ISO times in UTC, metres."""
    rows = [f"{start + n * step:%Y-%m-%d %H:%M},{v:.3f}\n" for n, v in enumerate(values_m)]
    return "time,level\n" + "".join(rows)


def take(text, *, series, profile, by, at=AT, skip_faulty=False, name="file.csv"):
    """Import a text or bytes."""
    data = text.encode() if isinstance(text, str) else text
    return imports.import_file(
        series=series,
        profile=profile,
        file=io.BytesIO(data),
        original_name=name,
        skip_faulty=skip_faulty,
        by=by,
        at=at,
    )


def count_of_every_table():
    """Return {model: rows}; the same before and after where nothing was written."""
    return {model.__name__: model._default_manager.count() for model in apps.get_models()}
