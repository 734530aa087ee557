"""The yearbook desk: everybody of the agency looks, publishers act, refusals have sentences."""

from datetime import UTC, datetime

import pytest
from django.urls import reverse

from network.models import Act
from network.services import typed_flows
from network.services.roles import FIELD, MANAGER, RECORD_KEEPER
from reports import desk, rendering, services
from reports.models import Edition, Volume
from tests.people import make_person
from tests.records import AT
from tests.records import make_person as make_keeper
from tests.reports import world

pytestmark = pytest.mark.django_db
WHEN = {"at": datetime(2024, 2, 1, 10, tzinfo=UTC)}
DESK = "admin:reports_edition_changelist"


@pytest.fixture
def keeper(agency):
    return make_keeper("keeper")


@pytest.fixture
def rated(monkeypatch, keeper):
    monkeypatch.setattr(rendering, "render", world.small_pdf)
    return world.make_flow_station(keeper, make_keeper("approver"))


@pytest.fixture
def compiled(rated, publisher):
    return services.compile_edition(station=rated, year=world.YEAR, by=publisher, **WHEN)


@pytest.fixture
def issued(compiled, publisher):
    return services.issue(edition=compiled, by=publisher, reason="the review follows", **WHEN)


def page_of(client, person, name, *args, **query):
    client.force_login(person)
    response = client.get(reverse(name, args=args, query=query))
    return response, response.content.decode()


def test_the_desk_says_what_is_open_and_what_is_ready(client, rated, publisher):
    _response, page = page_of(client, publisher, DESK, year=world.YEAR)
    assert "to be compiled" in page
    assert "The record has never been reviewed." in page


def test_the_desk_names_the_days_changed_since_issue(client, issued, keeper, publisher):
    _response, page = page_of(client, publisher, DESK, year=world.YEAR)
    assert "unchanged" in page
    typed_flows.type_flow(
        station=issued.station, day=datetime(2023, 3, 3).date(), flow_m3s=9.99, method="by eye",
        reason="test", by=keeper, at=AT,
    )  # fmt: skip
    _response, page = page_of(client, publisher, DESK, year=world.YEAR)
    assert "1 day changed" in page
    assert "3 Mar 2023" in page
    (line,) = desk.lines([issued.station], world.YEAR)
    assert line.largest.now == 9.99


def test_a_year_nobody_has_shows_the_latest_one(client, rated, publisher):
    response, page = page_of(client, publisher, DESK, year="1066")
    assert response.status_code == 200
    assert "2023" in page


@pytest.mark.parametrize("role", [FIELD, RECORD_KEEPER, MANAGER])
def test_others_look_and_cannot_act(client, compiled, office, role):
    person = make_person(role, office=office)
    response, page = page_of(client, person, DESK, year=world.YEAR)
    assert response.status_code == 200
    assert "Compile the ticked" not in page
    response, page = page_of(client, person, "admin:reports_edition_change", compiled.pk)
    assert response.status_code == 200
    file = client.get(reverse("admin:reports_edition_pdf", args=[compiled.pk]))
    assert b"".join(file.streaming_content).startswith(b"%PDF")
    for name, args in (
        ("admin:reports_edition_compile", []),
        ("admin:reports_edition_issue", [compiled.pk]),
        ("admin:reports_volume_bind", [world.YEAR]),
    ):
        address = reverse(name, args=args)
        assert client.post(address, {"reason": "x"}).status_code == 403
        assert client.get(address).status_code == 403
    assert Edition.objects.get().state == Edition.State.COMPILED


def test_nobody_enters_the_desk_without_logging_in(client, compiled):
    for name, args in (
        (DESK, []),
        ("admin:reports_edition_change", [compiled.pk]),
        ("admin:reports_edition_pdf", [compiled.pk]),
        ("admin:reports_edition_csv", [compiled.pk]),
        ("admin:reports_edition_issue", [compiled.pk]),
        ("admin:reports_volume_bind", [world.YEAR]),
    ):
        response = client.get(reverse(name, args=args))
        assert response.status_code == 302
        assert reverse("admin:login") in response.url


@pytest.mark.django_db(transaction=True)
def test_ticked_stations_are_compiled_as_long_work(client, rated, publisher):
    client.force_login(publisher)
    data = {"year": world.YEAR, "stations": [rated.pk], "language": "en"}
    response = client.post(reverse("admin:reports_edition_compile"), data, follow=True)
    assert "Edition 1 compiled" in response.content.decode()
    assert Edition.objects.get().compiled_by == publisher


def test_without_a_tick_the_desk_asks_for_one(client, rated, publisher):
    client.force_login(publisher)
    data = {"year": world.YEAR, "language": "en"}
    response = client.post(reverse("admin:reports_edition_compile"), data, follow=True)
    assert "Tick the stations" in response.content.decode()


def test_the_issue_page_lists_what_is_open_and_asks_why(client, compiled, publisher):
    _response, page = page_of(client, publisher, "admin:reports_edition_issue", compiled.pk)
    assert "The record has never been reviewed." in page
    address = reverse("admin:reports_edition_issue", args=[compiled.pk])
    response = client.post(address, {"reason": " "})
    assert response.status_code == 200
    assert Edition.objects.get().state == Edition.State.COMPILED
    response = client.post(address, {"reason": "the review follows"}, follow=True)
    edition = Edition.objects.get()
    assert edition.state == Edition.State.ISSUED
    assert edition.issued_by == publisher
    assert "the review follows" in response.content.decode()
    assert Act.objects.get(verb__startswith="issued").reason == "the review follows"


def test_a_record_that_moved_meanwhile_is_told_and_nothing_typed_is_lost(
    client, compiled, keeper, publisher
):
    typed_flows.type_flow(
        station=compiled.station, day=datetime(2023, 3, 3).date(), flow_m3s=9.99, method="by eye",
        reason="test", by=keeper, at=AT,
    )  # fmt: skip
    client.force_login(publisher)
    address = reverse("admin:reports_edition_issue", args=[compiled.pk])
    page = client.post(address, {"reason": "the review follows"}).content.decode()
    assert "changed since this was compiled" in page
    assert "the review follows" in page


def test_superseding_asks_for_a_reason_of_its_own(client, issued, publisher):
    later = services.compile_edition(station=issued.station, year=world.YEAR, by=publisher, **WHEN)
    _response, page = page_of(client, publisher, "admin:reports_edition_issue", later.pk)
    assert "replaces the earlier one because" in page
    address = reverse("admin:reports_edition_issue", args=[later.pk])
    client.post(address, {"reason": "the review follows", "superseding": "a gauge was moved"})
    states = dict(Edition.objects.values_list("number", "state"))
    assert states == {1: Edition.State.SUPERSEDED, 2: Edition.State.ISSUED}


def test_an_issued_edition_sends_back_from_the_issue_page(client, issued, publisher):
    response, _page = page_of(client, publisher, "admin:reports_edition_issue", issued.pk)
    assert response.status_code == 302


def test_an_edition_whose_data_are_lost_says_so(client, issued, publisher):
    issued.csv.storage.delete(issued.csv.name)
    _response, page = page_of(client, publisher, "admin:reports_edition_change", issued.pk)
    assert "cannot be read" in page


def test_a_volume_is_bound_from_the_desk(client, issued, publisher):
    client.force_login(publisher)
    address = reverse("admin:reports_volume_bind", args=[world.YEAR])
    assert "1 issued edition" in client.get(address).content.decode()
    response = client.post(address, {"title": "Quill basin"}, follow=True)
    assert response.status_code == 200
    assert Volume.objects.get().title == "Quill basin"


def test_binding_nothing_is_refused_on_the_page(client, compiled, publisher):
    client.force_login(publisher)
    address = reverse("admin:reports_volume_bind", args=[world.YEAR])
    page = client.post(address, {"title": "Quill basin"}).content.decode()
    assert "no issued edition" in page


def test_the_history_of_an_edition_names_its_acts(client, issued, publisher):
    _response, page = page_of(client, publisher, "admin:reports_edition_history", issued.pk)
    assert "compiled the yearbook" in page
    assert "issued the yearbook" in page
