"""The one cache: fresh rows are used, stale ones never, computing again gives the same bytes."""

from datetime import UTC, date, datetime, timedelta

import pytest
from django.core.management import CommandError, call_command

from network.models import Note, StationYear
from network.queries import station_years as answers
from network.services import notes, ratings, station_years
from tests.records import AT, make_person, make_profile, make_series, make_station, take

pytestmark = pytest.mark.django_db


@pytest.fixture
def keeper():
    return make_person("keeper")


@pytest.fixture
def station(keeper):
    station = make_station()
    recorder, profile = make_series(keeper, station), make_profile(keeper)
    start = datetime(2023, 12, 30, tzinfo=UTC)
    rows = "".join(
        f"{start + n * timedelta(hours=1):%Y-%m-%d %H:%M},{1 + n % 24 / 100:.3f}\n"
        for n in range(24 * 5)
    )
    take("time,level\n" + rows, series=recorder, profile=profile, by=keeper)
    version = ratings.draft(
        station=station, number="1",
        relation=ratings.Relation(points=[(0.0, 0.0), (10.0, 30.0)], form="linear"),
        use=ratings.Use(lowest_use_m=0.0, highest_use_m=10.0), reason="test", by=keeper, at=AT,
    )  # fmt: skip
    ratings.approve(curve=version, by=make_person("approver"), at=AT)
    ratings.put_in_force(
        station=station, curve=version, effective_from=start, reason="test", by=keeper, at=AT
    )
    return station


def test_every_year_on_record_is_kept_once(station):
    assert station_years.refresh(station) == 2
    assert station_years.refresh(station) == 0
    assert StationYear.objects.count() == 2


def test_a_fresh_year_is_read_and_equals_what_computing_gives(station, django_assert_num_queries):
    computed = answers.year_of_station(station, 2024)
    station_years.refresh(station)
    read = answers.year_of_station(station, 2024)
    assert answers.pack(read) == answers.pack(computed)
    with django_assert_num_queries(3):  # the agency, the record version, the row
        answers.year_of_station(station, 2024)


def test_an_act_on_an_input_makes_the_year_stale(station, keeper):
    station_years.refresh(station)
    notes.add_note(
        station=station, start_at=datetime(2024, 1, 1, tzinfo=UTC),
        end_at=datetime(2024, 1, 2, tzinfo=UTC), cause=Note.Cause.ICE,
        flows=Note.Flows.WITHHELD, by=keeper, at=AT,
    )  # fmt: skip
    days = answers.year_of_station(station, 2024)
    assert str(days.flow_m3s[0]) == "nan"
    assert station_years.refresh(station) == 2


def test_verifying_finds_a_cached_year_that_was_tampered_with(station):
    station_years.refresh(station)
    call_command("recompute_years", station.code, check=True)
    row = StationYear.objects.get(first_day=date(2024, 1, 1))
    other = StationYear.objects.get(first_day=date(2023, 1, 1))
    StationYear.objects.filter(pk=row.pk).update(data=bytes(other.data))
    assert [one.same for one in station_years.verify(station)] == [True, False]
    with pytest.raises(CommandError, match="1 cached years differ"):
        call_command("recompute_years", station.code, check=True)


def test_a_damaged_or_later_row_is_refused_in_words():
    with pytest.raises(ValueError, match="not the days of a year"):
        answers.unpack(b"\x09nonsense", first_day=date(2024, 1, 1))


def test_an_unknown_station_is_named(station):
    with pytest.raises(CommandError, match="There is no station ZZ-1"):
        call_command("recompute_years", "ZZ-1")
