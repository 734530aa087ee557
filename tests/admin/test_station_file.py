"""The station file shows what stands at a station, and from it the zero is set."""

from datetime import timedelta

import pytest
from django.urls import reverse

from network.models import StationZero
from network.services import gauges
from tests import field_world
from tests import gauge_world as world
from tests.gauge_world import LEVELLED, plate, signed

pytestmark = pytest.mark.django_db


@pytest.fixture
def where(agency, station):
    station.hazards = "Slippery ladder."
    station.save()
    return world.gauged(station)


@pytest.fixture
def client(client, record_keeper):
    client.force_login(record_keeper)
    return client


def address(where, view="file"):
    return reverse(f"admin:network_station_{view}", args=[where.pk])


def test_one_page_tells_what_stands_there(client, where):
    world.checked_levels(where)
    page = client.get(address(where)).content.decode()
    for part in ("Slippery ladder.", "Wade only where", "98.000 m NN", "BM", "100.000 m",
                 '<svg class="plates"', ">P2</text>", "14 May 2024", "station zero",
                 "Set the zero of a plate"):  # fmt: skip
        assert part in page
    assert " style=" not in page


def test_a_hole_between_plates_is_said_and_drawn(client, where):
    gauges.set_plate_zero(plate=plate(where, "P2"), zero_m=1.3, effective_from=LEVELLED, **signed())
    page = client.get(address(where)).content.decode()
    assert 'class="hole"' in page
    assert "there is a hole of 0.100 m" in page


def test_the_file_takes_few_queries(client, where, django_assert_max_num_queries):
    world.checked_levels(where)
    client.get(address(where))
    with django_assert_max_num_queries(45):
        client.get(address(where))


def zero(where, **changes):
    return {
        "kind": "redetermined",
        "elevation_m": "98,012",
        "datum_name": "NN",
        "effective_from_0": "2024-05-14",
        "effective_from_1": "13:00",
        "reason": "levelled anew",
    } | changes


def test_an_elevation_determined_anew_is_set_at_once(client, where):
    assert client.post(address(where, "zero"), zero(where)).status_code == 302
    assert StationZero.objects.order_by("effective_from").last().elevation_m == 98.012


def test_a_moved_zero_names_what_is_missing_then_takes_it_all(client, where):
    curve = field_world.rate(where)
    moved = zero(where, kind="moved", elevation_m="97.5")
    page = client.post(address(where, "zero"), moved).content.decode()
    assert "the zero of plate P1" in page
    assert "the rating" in page
    assert 'value="97.5"' in page
    for row in where.plates.all():
        moved[f"move_plate_{row.pk}"] = "0.5" if row.label == "P1" else "1.5"
    moved |= {f"move_offset_{where.series.get().pk}": "0.5", "move_rating": str(curve.pk)}
    page = client.post(address(where, "zero"), moved)
    if page.status_code == 200:
        moved["seen"] = page.context["differences"].fingerprint
        page = client.post(address(where, "zero"), moved)
    assert page.status_code == 302
    assert plate(where, "P2").zeros.standing().last().zero_m == 1.5
    assert where.series.get().settings.last().offset_m == 0.5


def test_a_plate_zero_is_added_and_withdrawn_through_its_page(client, where):
    add = reverse("admin:network_platezero_add")
    sent = {
        "plate": plate(where, "P1").pk,
        "zero_m": "0,01",
        "effective_from_0": "2024-05-14",
        "effective_from_1": "13:00",
        "reason": "screwed on anew",
    }
    assert client.post(add, sent).status_code == 302
    row = plate(where, "P1").zeros.last()
    withdraw = reverse("admin:network_platezero_withdraw", args=[row.pk])
    assert client.post(withdraw, {"reason": "typing error"}).status_code == 302
    assert not plate(where, "P1").zeros.last().stands


def test_a_zero_set_from_the_file_offers_the_plates_of_that_station(client, where):
    add = reverse("admin:network_platezero_add")
    assert "TE-010" in client.get(add, {"station": where.pk}).content.decode()
    assert "P1</option>" not in client.get(add, {"station": where.pk + 1}).content.decode()


def test_a_plate_is_taken_down_as_an_act_but_not_before_it_was_read(client, where, manager):
    client.force_login(manager)
    world.read_twice(where, LEVELLED - timedelta(days=60))
    row = plate(where, "P2")
    remove = reverse("admin:network_staffplate_remove", args=[row.pk])
    sent = {"removed_at_0": "2024-04-01", "removed_at_1": "12:00", "reason": "broken by ice"}
    assert "was still read after that" in client.post(remove, sent).content.decode()
    late = sent | {"removed_at_0": "2024-05-01"}
    answered = client.post(remove, late)
    if answered.status_code == 200:
        late["seen"] = answered.context["differences"].fingerprint
        answered = client.post(remove, late)
    assert answered.status_code == 302
    row.refresh_from_db()
    assert row.removed_at is not None
