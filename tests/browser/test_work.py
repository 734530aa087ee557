"""Work due, a round and its pages in a real browser: a phone in one hand, and a desk."""

from datetime import timedelta

import pypdfium2
import pytest
import zxingcpp
from django.urls import reverse
from django.utils import timezone

from network.models import Postponement, Round, Station, Visit
from network.services import rounds
from reports.field_sheets import content, page
from tests.browser.conftest import DESK, PHONE
from tests.people import make_station
from tests.work_rows import cableway, gauged, levelled, visited

pytestmark = [pytest.mark.browser, pytest.mark.django_db(transaction=True)]


@pytest.fixture
def busy(agency, station, office, manager):
    """Three stations with all sorts of work due."""
    today = timezone.localdate()
    office.latitude_deg, office.longitude_deg = 47.45, 13.2
    office.save()
    cableway(station)
    for n, days in ((0, 60), (2, 50), (3, 10)):
        row = station if not n else make_station(
            office, code=f"TE-0{n}0", name=f"Furt {n}", latitude_deg=47.5 + n / 20,
            longitude_deg=13.25 + n / 15, hazards="Deep water at the quay.",
        )  # fmt: skip
        visited(row, today - timedelta(days=days), manager)
        levelled(row, today - timedelta(days=900), manager)
        gauged(row, today - timedelta(days=80), manager)
    return station


def test_work_is_put_off_on_a_phone(busy, open_page, field_person, picture, fits_a_phone):
    page = open_page(field_person, PHONE)
    page.goto(reverse("admin:index"))
    page.get_by_text("last routine visit 60 days ago; every 42").wait_for()
    fits_a_phone(page)
    picture(page, "work_phone")
    page.locator(".work-lines li", has_text="60 days ago").get_by_text("Put off").click()
    fits_a_phone(page)
    page.fill("#id_until", (timezone.localdate() + timedelta(days=20)).isoformat())
    page.fill("#id_reason", "Ice on the track.")
    picture(page, "postpone_phone")
    page.locator("input[type=submit].default").click()
    page.wait_for_url(f"**{reverse('admin:index')}")
    assert page.get_by_text("60 days ago").count() == 0
    assert Postponement.objects.get().reason == "Ice on the track."


def test_a_round_is_planned_at_the_desk_and_seen_on_a_phone(
    busy, open_page, manager, field_person, picture, fits_a_phone
):
    desk = open_page(manager, DESK)
    desk.goto(reverse("admin:index"))
    picture(desk, "work_desk")
    desk.goto(reverse("admin:network_round_add"))
    desk.fill("#id_name", "March round")
    desk.select_option("#id_office", label=busy.office.name)
    day = timezone.localdate().isoformat()
    desk.fill("#id_first_day", day)
    desk.fill("#id_last_day", day)
    desk.locator("input[name=_save]").click()
    desk.wait_for_url("**/plan/")
    plan = Round.objects.get()
    for box in desk.locator("input[name=station]").all()[:2]:
        box.check()
    desk.get_by_text("Add the chosen stations").click()
    desk.locator(".stops > li >> nth=1").wait_for()
    first = desk.locator(".stops h3 a").all_text_contents()
    desk.locator("button[value^='down:']").first.click()
    desk.wait_for_load_state()
    assert desk.locator(".stops h3 a").all_text_contents() == first[::-1]
    assert desk.evaluate("document.documentElement.scrollWidth") <= 1440
    picture(desk, "round_desk")
    phone = open_page(field_person, PHONE)
    phone.goto(reverse("admin:network_round_plan", args=[plan.pk]))
    fits_a_phone(phone)
    picture(phone, "round_phone")
    manager_phone = open_page(manager, PHONE)
    manager_phone.goto(reverse("admin:network_round_plan", args=[plan.pk]))
    fits_a_phone(manager_phone)
    picture(manager_phone, "round_manager_phone")


def test_calendar_and_figures_fit_a_phone(busy, open_page, manager, picture, fits_a_phone):
    page = open_page(manager, PHONE)
    page.goto(reverse("admin:calendar_links"))
    page.get_by_text("Make a new link").click()
    page.locator(".secret-link").wait_for()
    fits_a_phone(page)
    picture(page, "calendar_phone")
    page.goto(reverse("reports:network_figures"))
    fits_a_phone(page)
    picture(page, "figures_phone")
    page.goto(reverse("admin:network_station_change", args=[busy.pk]))
    picture(page, "station_phone")


def test_the_code_on_a_printed_sheet_opens_the_form_of_its_stop_on_a_phone(
    busy, open_page, manager, field_person, live_server, settings, picture, fits_a_phone
):
    settings.SITE_URL = live_server.url
    now, today = timezone.now(), timezone.localdate()
    plan = rounds.save_round(
        name="March", office=busy.office, first_day=today, last_day=today, by=manager, at=now
    )
    other = Station.objects.exclude(pk=busy.pk).first()
    for row in (busy, other):
        rounds.add_stop(round=plan, station=row, tasks=["oil the sheaves"], by=manager, at=now)
    with pypdfium2.PdfDocument(page.pdf_of(content.sheets_of(plan, at=now))) as pdf:
        (code,) = zxingcpp.read_barcodes(pdf[1].render(scale=2).to_pil())
    phone = open_page(field_person, PHONE)
    phone.goto(code.text)
    assert phone.locator("#id_station").input_value() == str(other.pk)
    assert phone.get_by_text("Deep water at the quay.").is_visible()
    fits_a_phone(phone)
    picture(phone, "stop_phone")
    phone.fill("#id_arrived_at_0", today.isoformat())
    phone.fill("#id_arrived_at_1", "00:01")
    phone.locator("[name=_continue]").tap()
    phone.wait_for_url("**/change/**")
    visit = Visit.objects.get(recorded_by=field_person)
    assert visit.form_id == plan.stops.get(station=other).form_id
    phone.goto(code.text)  # the second phone of the party finds the visit, no other form
    assert f"/visit/{visit.pk}/" in phone.url
