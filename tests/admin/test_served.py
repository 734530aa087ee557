"""Rows saved by a service: children, double posts, refusals with nothing lost, act pages."""

import uuid

import pytest
from django.urls import reverse

from network.models import Act, StaffPlate, Visit
from tests.admin.sample_site import VisitAdmin
from tests.rows import a_row

pytestmark = [pytest.mark.django_db, pytest.mark.urls("tests.admin.sample_site")]
ADD = "admin:network_visit_add"


@pytest.fixture
def client(client, agency, field_person):
    client.force_login(field_person)
    return client


@pytest.fixture
def plate(station):
    return a_row(StaffPlate, station=station)


def sheet(station, plate, **changes):
    """Return what a phone sends for a visit with one reading."""
    sent = {
        "form_id": str(uuid.uuid4()),
        "station": station.pk,
        "arrived_at_0": "2024-07-01",
        "arrived_at_1": "1305",
        "remarks": "",
        "readings-TOTAL_FORMS": 1,
        "readings-INITIAL_FORMS": 0,
        "readings-0-read_at_0": "2024-07-01",
        "readings-0-read_at_1": "13:10",
        "readings-0-plate": plate.pk,
        "readings-0-other_gauge": "",
        "readings-0-observation": "read",
        "readings-0-reading_m": "1,234",
    }
    return {**sent, **changes}


def test_the_service_gets_cleaned_values_and_children(client, station, plate):
    sent = sheet(station, plate)
    assert client.post(reverse(ADD), sent).status_code == 302
    visit = Visit.objects.get()
    assert str(visit.form_id) == sent["form_id"]
    # 13:05 on the record clock, one hour ahead of UTC, also in summer.
    assert visit.arrived_at.isoformat() == "2024-07-01T12:05:00+00:00"
    assert visit.readings.get().reading_m == 1.234
    assert {record.act for record in visit.history.all()} == {Act.objects.get()}


def test_the_same_form_sent_twice_lands_on_the_row_it_made(client, station, plate):
    sent = sheet(station, plate)
    first = client.post(reverse(ADD), sent)
    second = client.post(reverse(ADD), sent)
    visit = Visit.objects.get()
    assert first.status_code == 302
    assert second.url == reverse("admin:network_visit_change", args=[visit.pk])
    assert Act.objects.count() == 1


def test_the_slower_of_two_taps_lands_there_too(client, station, plate, monkeypatch):
    """Both taps looked before either had saved; the unique column refuses the second."""
    sent = sheet(station, plate)
    client.post(reverse(ADD), sent)
    look = VisitAdmin._saved_before
    looks = iter([lambda *_anything: None])  # the first look comes too early
    monkeypatch.setattr(VisitAdmin, "_saved_before", lambda *asked: next(looks, look)(*asked))
    second = client.post(reverse(ADD), sent)
    assert second.url == reverse("admin:network_visit_change", args=[Visit.objects.get().pk])
    assert Act.objects.count() == 1


def test_the_browser_is_told_which_draft_has_served(client, station, plate):
    sent = sheet(station, plate)
    response = client.post(reverse(ADD), sent)
    assert response.cookies["saved_form"].value == sent["form_id"]


def test_a_refusal_rolls_back_and_keeps_everything_typed(client, station, plate):
    sent = sheet(station, plate, remarks="too high")
    page = client.post(reverse(ADD), sent)
    assert page.status_code == 200
    formset = page.context["inline_admin_formsets"][0].formset
    assert formset.forms[0].errors == {"reading_m": ["Above its plate."]}
    html = page.content.decode()
    for typed in ("too high", "1,234", 'value="1305"', sent["form_id"]):
        assert typed in html
    assert not Visit.objects.exists()
    assert not Act.objects.exists()
    again = client.post(reverse(ADD), {**sent, "remarks": "read again"})
    assert again.status_code == 302
    assert Visit.objects.get().remarks == "read again"


def test_a_newer_save_is_told_and_the_form_kept(client, station, plate):
    client.post(reverse(ADD), sheet(station, plate))
    visit = Visit.objects.get()
    address = reverse("admin:network_visit_change", args=[visit.pk])
    sent = sheet(
        station,
        plate,
        version=visit.version,
        **{"readings-INITIAL_FORMS": 1, "readings-0-id": visit.readings.get().pk},
    )
    assert client.post(address, {**sent, "remarks": "theirs"}).status_code == 302
    page = client.post(address, {**sent, "remarks": "mine"})
    assert "Someone else saved this meanwhile" in page.content.decode()
    assert ">mine</textarea>" in page.content.decode().replace("\n", "")
    visit.refresh_from_db()
    assert (visit.remarks, visit.version) == ("theirs", 2)
    assert visit.readings.count() == 1


@pytest.fixture
def visit(station, field_person):
    return a_row(Visit, station=station, recorded_by=field_person)


def act_page(visit):
    return reverse("admin:network_visit_check", args=[visit.pk])


def test_an_act_page_shows_the_preview_and_does_nothing_on_get(client, visit):
    page = client.get(act_page(visit))
    assert "before and after False" in page.content.decode()
    shown = client.post(act_page(visit), {"reason": "well", "_show": "1"})
    assert "before and after True" in shown.content.decode()
    visit.refresh_from_db()
    assert visit.state == "draft"


def test_an_act_page_does_it_on_post_and_leads_back(client, visit):
    done = client.post(act_page(visit), {"reason": "well"})
    assert done.url == reverse("admin:network_visit_change", args=[visit.pk])
    visit.refresh_from_db()
    assert visit.state == "checked"
    assert Act.objects.get().reason == "well"
    twice = client.post(act_page(visit), {"reason": "well"})
    assert twice.status_code == 302
    assert Act.objects.count() == 1


def test_an_act_page_keeps_a_refused_reason(client, visit):
    page = client.post(act_page(visit), {"reason": "no"})
    assert page.context["form"].errors == {"reason": ["Not with that reason."]}
    assert ">no</textarea>" in page.content.decode().replace("\n", "")
    assert not Act.objects.exists()


def test_the_change_page_offers_the_acts_that_apply(client, visit):
    address = reverse("admin:network_visit_change", args=[visit.pk])
    assert act_page(visit) in client.get(address).content.decode()
    client.post(act_page(visit), {"reason": "well"})
    assert act_page(visit) not in client.get(address).content.decode()


def test_an_act_needs_its_permission(client, visit, publisher):
    client.force_login(publisher)
    assert client.get(act_page(visit)).status_code == 403
    assert client.post(act_page(visit), {"reason": "well"}).status_code == 403
