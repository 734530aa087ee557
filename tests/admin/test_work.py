"""The staff home and its acts: seen by all, pressed by those who may; its queries do not grow."""

from datetime import date, timedelta

import pytest
from django.db import connection
from django.test.utils import CaptureQueriesContext
from django.urls import reverse
from django.utils import timezone

from network.models import FeedLink, Inspection, Postponement, Round, Station, WorkLeft
from network.services import bulk_network, rounds
from network.services.roles import FIELD, PUBLISHER
from tests.people import make_person
from tests.work_rows import cableway, levelled, visited

pytestmark = pytest.mark.django_db
MOST_QUERIES = 15


@pytest.fixture
def busy(agency, station, record_keeper):
    """A station with a cableway never inspected, a late visit and work left at it."""
    cableway(station)
    visit = visited(station, timezone.localdate() - timedelta(days=60), record_keeper)
    levelled(station, timezone.localdate(), record_keeper)
    WorkLeft.objects.create(visit=visit, text="Paint the plates.")
    return station


def home(client, person, **filters):
    client.force_login(person)
    return client.get(reverse("admin:index"), filters)


def text_of(response):
    return response.content.decode()


def test_everyone_sees_the_items_and_only_their_own_ways_to_act(client, busy, manager, publisher):
    inspect = reverse("admin:network_inspection_add")
    done = reverse("admin:work_left_done", args=[WorkLeft.objects.get().pk])
    for person, ways in ((manager, [inspect]), (publisher, [])):
        page = text_of(home(client, person))
        assert "never inspected" in page
        assert "Paint the plates." in page
        assert [way for way in (inspect, done) if way in page] == ways


def test_the_address_of_an_act_refuses_who_has_no_right_to_it(client, busy, publisher):
    client.force_login(publisher)
    done = reverse("admin:work_left_done", args=[WorkLeft.objects.get().pk])
    assert client.post(done).status_code == 403
    assert client.get(reverse("admin:network_inspection_add")).status_code == 403
    assert WorkLeft.objects.get().done_at is None


def test_who_may_not_see_stations_sees_no_list(client, busy, office):
    assert "never inspected" not in text_of(home(client, make_person("guest", office=office)))


def test_work_left_is_marked_as_done(client, busy, field_person):
    client.force_login(field_person)
    work = WorkLeft.objects.get()
    address = reverse("admin:work_left_done", args=[work.pk])
    assert "Paint the plates." in text_of(client.get(address))
    assert client.post(address).url == reverse("admin:index")
    work.refresh_from_db()
    assert work.done_by == field_person


def test_an_item_is_put_off_from_its_line_and_shown_on_request(client, busy, field_person):
    client.force_login(field_person)
    told = {"kind": "visit", "key": busy.pk, "station": busy.pk}
    address = reverse("admin:work_postpone", query=told)
    assert "last routine visit 60 days ago" in text_of(client.get(address))
    until = timezone.localdate() + timedelta(days=9)
    assert client.post(address, {"until": until, "reason": "ice"}).status_code == 302
    assert "last routine visit" not in text_of(home(client, field_person))
    assert "ice" in text_of(home(client, field_person, postponed="1"))
    assert Postponement.objects.get().station == busy


def test_a_refused_postponement_keeps_what_was_typed(client, busy, field_person):
    client.force_login(field_person)
    told = {"kind": "visit", "key": busy.pk, "station": busy.pk}
    address = reverse("admin:work_postpone", query=told)
    page = client.post(address, {"until": timezone.localdate(), "reason": "flooded road"})
    assert "still to come" in text_of(page)
    assert "flooded road" in text_of(page)
    assert not Postponement.objects.exists()


@pytest.mark.parametrize("told", [{"kind": "nothing", "key": 1}, {"kind": "visit"}, {}])
def test_a_made_up_item_cannot_be_put_off(client, busy, field_person, told):
    client.force_login(field_person)
    assert client.get(reverse("admin:work_postpone", query=told)).status_code == 404


def test_filters_that_cannot_be_are_left_out(client, busy, manager):
    page = home(client, manager, office="x", kind="nothing", within="-3", page="9999999999")
    assert page.status_code == 200
    assert "never inspected" in text_of(page)


def test_an_inspection_is_recorded_from_its_line(client, busy, field_person):
    client.force_login(field_person)
    item = busy.safety_items.get()
    client.post(
        reverse("admin:network_inspection_add"),
        {"item": item.pk, "inspected_on": timezone.localdate(), "is_safe": "on", "remarks": ""},
    )
    assert Inspection.objects.get().recorded_by == field_person


def test_the_station_and_the_instrument_show_their_own_items(client, busy, manager):
    client.force_login(manager)
    page = text_of(client.get(reverse("admin:network_station_change", args=[busy.pk])))
    assert "never inspected" in page


def test_intervals_show_what_they_make_due_before_they_change(client, busy, manager):
    client.force_login(manager)
    address = reverse("admin:network_station_intervals", args=[busy.pk])
    told = {"visit_interval_days": 90, "reason": "quiet river"}
    assert "(−1)" in text_of(client.post(address, {**told, "_show": "1"}))
    assert Station.objects.get().visit_interval_days is None
    client.post(address, told)
    assert Station.objects.get().visit_interval_days == 90


def test_the_code_on_a_sheet_leads_to_one_visit_of_that_stop(client, busy, field_person, manager):
    march = rounds.save_round(
        name="March", office=busy.office, first_day=date(2024, 3, 1), last_day=date(2024, 3, 2),
        by=manager, at=timezone.now(),
    )  # fmt: skip
    stop = rounds.add_stop(round=march, station=busy, by=manager, at=timezone.now())
    client.force_login(field_person)
    address = reverse("admin:stop_visit", args=[stop.form_id])
    first = client.get(address)
    assert f"station={busy.pk}" in first.url
    assert str(stop.form_id) in first.url
    visit = visited(busy, date(2024, 3, 1), field_person, form_id=stop.form_id)
    assert client.get(address).url == reverse("admin:network_visit_change", args=[visit.pk])


# --- the planner ---------------------------------------------------------------------------------


@pytest.fixture
def march(busy, manager):
    return rounds.save_round(
        name="March", office=busy.office, first_day=timezone.localdate(),
        last_day=timezone.localdate(), by=manager, at=timezone.now(),
    )  # fmt: skip


def test_a_round_is_planned_without_script(client, busy, march, manager):
    client.force_login(manager)
    plan = reverse("admin:network_round_plan", args=[march.pk])
    assert "<svg" in text_of(client.get(plan))
    client.post(plan, {"press": "add", "station": [busy.pk]})
    stop = march.stops.get()
    assert "safety inspection: cableway Main: never inspected; every 12 months" in [
        task.text for task in stop.tasks.all()
    ]
    page = client.post(
        reverse("admin:network_stop_edit", args=[march.pk, stop.pk]),
        {"hours": "1,5", "by_cableway": "on", "tasks": "visit"},
    )
    assert "never inspected" in text_of(page)  # the cableway blocks the stop; what was typed stays
    assert "1,5" in text_of(page)
    client.post(plan, {"press": f"remove:{stop.pk}"})
    assert not march.stops.exists()


def test_the_heading_of_a_round_comes_back_as_typed_when_a_meter_is_refused(client, busy, manager):
    client.force_login(manager)
    told = {"name": "April", "office": busy.office_id, "first_day": "2024-04-03"}
    page = client.post(reverse("admin:network_round_add"), {**told, "last_day": "2024-04-01"})
    assert "not before the first" in text_of(page)
    assert "April" in text_of(page)
    saved = client.post(reverse("admin:network_round_add"), {**told, "last_day": "2024-04-04"})
    made = Round.objects.get(name="April")
    assert saved.url == reverse("admin:network_round_plan", args=[made.pk])


def test_field_people_see_the_round_and_cannot_change_it(client, busy, march, field_person):
    client.force_login(field_person)
    plan = reverse("admin:network_round_plan", args=[march.pk])
    page = text_of(client.get(plan))
    assert busy.name in page
    assert 'name="press"' not in page
    assert client.post(plan, {"press": "add", "station": [busy.pk]}).status_code == 403
    add = reverse("admin:network_stop_add", args=[march.pk, busy.pk])
    assert client.get(add).status_code == 403


# --- calendar links ------------------------------------------------------------------------------


def test_a_calendar_link_is_shown_once(client, busy, field_person):
    client.force_login(field_person)
    address = reverse("admin:calendar_links")
    made = text_of(client.post(address))
    assert "/calendar/" in made
    assert ".ics" in made
    assert ".ics" not in text_of(client.get(address))
    link = FeedLink.objects.get()
    assert (link.person, link.office) == (field_person, None)


def test_only_a_manager_makes_an_offices_link(client, busy, office, field_person, manager):
    for person, expected in ((field_person, None), (manager, office)):
        client.force_login(person)
        client.post(reverse("admin:calendar_links"), {"office": office.pk})
        assert FeedLink.objects.get(recorded_by=person).office == expected


def test_nobody_withdraws_anothers_link(client, busy, field_person, manager):
    client.force_login(manager)
    client.post(reverse("admin:calendar_links"))
    link = FeedLink.objects.get()
    client.force_login(field_person)
    assert client.post(reverse("admin:calendar_withdraw", args=[link.pk])).status_code == 404
    client.force_login(manager)
    client.post(reverse("admin:calendar_withdraw", args=[link.pk]))
    link.refresh_from_db()
    assert not link.stands


# --- growth --------------------------------------------------------------------------------------


@pytest.mark.parametrize("role", [FIELD, PUBLISHER])
def test_the_queries_of_the_page_do_not_grow_with_the_network(client, agency, office, role):
    person = make_person(role, office=office)
    counts = []
    for stations in (10, 60):
        size = bulk_network.Size(
            stations=stations, instruments=6 * stations, visits=6 * stations, gaugings=4 * stations
        )
        bulk_network.make(size=size, by=person, at=timezone.now(), first=Station.objects.count())
        home(client, person)
        with CaptureQueriesContext(connection) as made:
            page = client.get(reverse("admin:index"))
        assert page.status_code == 200
        counts.append(len(made))
    assert counts[0] == counts[1]
    assert counts[1] <= MOST_QUERIES
