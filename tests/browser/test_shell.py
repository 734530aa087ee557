"""The staff site on a phone in the rain, and on a desk."""

import pytest
from django.urls import reverse

from network.models import Act, Station, Visit
from network.services.roles import MANAGER
from tests.browser.conftest import DESK, PHONE
from tests.people import make_person, make_station
from tests.rows import a_row

pytestmark = [pytest.mark.browser, pytest.mark.django_db(transaction=True)]


@pytest.fixture
def network(agency, office, station, field_person):
    """Three stations, a draft of the field person, an act."""
    for code, name, river in [("TE-020", "Obersteg", "Tessel"), ("AM-010", "Ammgrund", "Amm")]:
        make_station(office, code=code, name=name, river=river)
    station.hazards = "Steep bank, traffic on the bridge."
    station.save()
    a_row(Visit, station=station, recorded_by=field_person)
    return station


def address(view, *args):
    return reverse(f"admin:network_{view}", args=args)


@pytest.fixture
def manager_phone(open_page, agency, office):
    return open_page(make_person(MANAGER, office=office, username="m"), PHONE)


def test_home_fits_a_phone(phone, network, fits_a_phone, picture):
    phone.goto(reverse("admin:index"))
    picture(phone, "phone-home")
    fits_a_phone(phone)


def test_the_list_of_stations_fits_a_phone(phone, network, fits_a_phone, picture):
    phone.goto(address("station_changelist"))
    picture(phone, "phone-stations")
    fits_a_phone(phone)


@pytest.mark.parametrize("page", ["station", "staffplate", "agency", "person", "sitesurvey"])
def test_forms_fit_a_phone(manager_phone, network, fits_a_phone, picture, page):
    at = {
        "station": address("station_change", network.pk),
        "staffplate": address("staffplate_add"),
        "agency": address("agency_change", 1),
        "person": address("person_add"),
        "sitesurvey": address("sitesurvey_add"),
    }
    manager_phone.goto(at[page])
    picture(manager_phone, f"phone-{page}")
    fits_a_phone(manager_phone)


def test_the_entrance_fits_a_phone(chromium, live_server, agency, fits_a_phone, picture):
    context = chromium.new_context(base_url=live_server.url, **PHONE)
    page = context.new_page()
    page.goto(reverse("admin:login"))
    picture(page, "phone-login")
    fits_a_phone(page)
    context.close()


def test_a_draft_survives_a_reload_and_can_be_discarded(manager_phone, network, picture):
    manager_phone.goto(address("station_add"))
    manager_phone.fill("#id_name", "Neusteg")
    manager_phone.fill("#id_latitude_deg", "47,5")
    manager_phone.locator("#operation_periods-group .add-row a").tap()
    manager_phone.fill("#id_operation_periods-0-opened_on", "2022-04-01")
    first = manager_phone.input_value("input[name=form_id]")
    manager_phone.reload()
    manager_phone.wait_for_selector(".draft-notice.restored")
    picture(manager_phone, "phone-restored")
    assert manager_phone.input_value("#id_name") == "Neusteg"
    assert manager_phone.input_value("#id_operation_periods-0-opened_on") == "2022-04-01"
    assert manager_phone.input_value("input[name=form_id]") == first
    manager_phone.goto(reverse("admin:index"))
    assert manager_phone.locator("#unfinished li").count() == 1
    manager_phone.goto(address("station_add"))
    manager_phone.locator(".draft-notice button").tap()
    manager_phone.wait_for_function("document.getElementById('id_name').value === ''")
    assert manager_phone.locator(".draft-notice").count() == 0


def fill_station(page, office):
    page.fill("#id_code", "TE-030")
    page.fill("#id_name", "Neusteg")
    page.fill("#id_river", "Tessel")
    page.fill("#id_latitude_deg", "47,5")
    page.fill("#id_longitude_deg", "13.2")
    page.locator("#id_longitude_deg + .sign").tap()
    page.select_option("#id_office", str(office.pk))


def test_a_lost_connection_keeps_the_form_and_a_double_tap_saves_once(
    manager_phone, network, office, picture
):
    page = manager_phone
    page.goto(address("station_add"))
    fill_station(page, office)
    page.context.set_offline(True)
    page.locator("input[name=_save]").tap()
    page.wait_for_selector(".draft-notice.offline")
    picture(page, "phone-offline")
    assert page.input_value("#id_name") == "Neusteg"
    page.context.set_offline(False)
    page.evaluate("for (const tap of [1, 2, 3]) document.querySelector('[name=_save]').click()")
    page.wait_for_url(f"**{address('station_changelist')}")
    page.goto(reverse("admin:index"))
    assert page.locator("#unfinished").is_hidden()
    made = Station.objects.get(code="TE-030")
    assert made.longitude_deg == -13.2
    assert Act.objects.filter(station=made).count() == 1


def test_the_other_clock_follows_what_is_typed(manager_phone, network):
    manager_phone.goto(address("staffplate_add"))
    manager_phone.fill("#id_installed_at_0", "2024-07-01")
    manager_phone.fill("#id_installed_at_1", "1305")
    clock = manager_phone.locator(".field-installed_at .civil-time")
    assert clock.text_content() == "14:05"
    manager_phone.fill("#id_installed_at_0", "2024-01-01")
    assert clock.text_content() == "13:05"
    manager_phone.fill("#id_installed_at_0", "2024-07-01")
    manager_phone.fill("#id_installed_at_1", "23:30")
    assert clock.text_content() == "2024-07-02 00:30"
    manager_phone.locator(".field-installed_at .now").tap()
    assert len(manager_phone.input_value("#id_installed_at_1")) == 5


def test_the_desk_uses_its_width(open_page, network, manager, picture):
    desk = open_page(manager, DESK)
    desk.goto(reverse("admin:index"))
    picture(desk, "desk-home")
    desk.goto(address("station_changelist"))
    picture(desk, "desk-stations")
    desk.goto(address("station_change", network.pk))
    picture(desk, "desk-station")
    desk.fill("#id_river", "Tesslbach")
    desk.locator("input[name=_save]").click()
    desk.wait_for_url(f"**{address('station_changelist')}")
    desk.goto(address("station_history", network.pk))
    picture(desk, "desk-history")
    assert "Tesslbach" in desk.locator(".trail").text_content()
    assert desk.evaluate("document.documentElement.scrollWidth") <= 1440
