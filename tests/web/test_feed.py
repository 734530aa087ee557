"""The calendar behind a secret address: every item in it, and nothing without the secret."""

from datetime import timedelta

import pytest
from django.urls import reverse
from django.utils import timezone
from icalendar import Calendar

from network.models import FeedLink, Office
from network.queries.work_due.work_list import Filters, work_list
from network.services import feeds, rounds
from network.services.acts import Refusal
from tests.people import make_station
from tests.work_rows import cableway

pytestmark = pytest.mark.django_db


@pytest.fixture
def now():
    return timezone.now()


@pytest.fixture
def busy(agency, station, office, field_person, now):
    """A station with much due, another office's station, and a round of the field person."""
    cableway(station)
    make_station(Office.objects.create(name="Unterau"), code="UN-010", name="Au")
    day = now.date()
    march = rounds.save_round(
        name="March", office=office, first_day=day, last_day=day + timedelta(days=2),
        party=[field_person], by=field_person, at=now,
    )  # fmt: skip
    rounds.add_stop(round=march, station=station, by=field_person, at=now)
    return station


def read(client, secret):
    response = client.get(reverse("network:calendar", args=[secret]))
    assert response.status_code == 200
    assert response["Content-Type"] == "text/calendar; charset=utf-8"
    assert "no-store" in response["Cache-Control"]
    return Calendar.from_ical(response.content).walk("VEVENT")


def test_every_item_of_the_office_is_in_the_feed_and_the_round_with_its_stops(
    client, busy, field_person, now
):
    _link, secret = feeds.make_link(person=field_person, by=field_person, at=now)
    events = read(client, secret)
    due = work_list(
        now, filters=Filters(office=field_person.office_id, within_days=60), per_page=None
    )
    uids = sorted(str(event["UID"]) for event in events)
    told = [f"{line.kind.value}-{line.subject}@gaugewright" for line in due.lines]
    assert len(told) > 3
    assert uids == sorted([*told, *(uid for uid in uids if uid.startswith("round-"))])
    (march,) = (event for event in events if str(event["UID"]).startswith("round-"))
    assert march.decoded("DTEND") - march.decoded("DTSTART") == timedelta(days=3)
    assert "TE-010 Mühlsteg" in str(march["DESCRIPTION"])


def test_what_is_late_stands_on_today_where_it_is_seen(client, busy, office, manager, now):
    _link, secret = feeds.make_link(office=office, by=manager, at=now)
    cable = next(e for e in read(client, secret) if "Safety" in str(e["SUMMARY"]))
    assert cable.decoded("DTSTART") >= now.date()
    assert int(cable["PRIORITY"]) == 1


def test_another_offices_stations_are_not_in_it(client, busy, office, manager, now):
    _link, secret = feeds.make_link(office=office, by=manager, at=now)
    assert not any("UN-010" in str(event["SUMMARY"]) for event in read(client, secret))


def test_only_the_hash_of_the_secret_is_kept(busy, field_person, now):
    link, secret = feeds.make_link(person=field_person, by=field_person, at=now)
    stored = " ".join(
        str(value) for value in FeedLink.objects.filter(pk=link.pk).values()[0].values()
    )
    past = " ".join(str(row) for row in FeedLink.history.values())
    assert secret not in stored + past
    assert len(secret) >= 43  # 32 bytes of chance


@pytest.mark.parametrize("gone", ["withdrawn", "left", "guessed"])
def test_a_link_that_is_withdrawn_or_guessed_finds_nothing(client, busy, field_person, now, gone):
    link, secret = feeds.make_link(person=field_person, by=field_person, at=now)
    if gone == "withdrawn":
        feeds.withdraw_link(link=link, by=field_person, at=now)
    if gone == "left":
        field_person.is_active = False
        field_person.save()
    address = reverse("network:calendar", args=[secret + ("x" if gone == "guessed" else "")])
    assert client.get(address).status_code == 404


def test_a_link_is_for_one_person_or_one_office(office, manager, now):
    with pytest.raises(Refusal, match="one person or for one office"):
        feeds.make_link(person=manager, office=office, by=manager, at=now)


def test_the_feed_is_read_only(client, busy, field_person, now):
    _link, secret = feeds.make_link(person=field_person, by=field_person, at=now)
    assert client.post(reverse("network:calendar", args=[secret])).status_code == 405
