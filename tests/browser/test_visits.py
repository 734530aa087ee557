"""A visit logged in a real browser: on a phone in the rain, without a network, and at a desk."""

import io

import pytest
from django.urls import reverse
from PIL import Image

from network.models import Photograph, Visit, VisitReading
from tests import gauge_world as world
from tests.browser.conftest import DESK, PHONE
from tests.gauge_world import plate

ADD = reverse("admin:network_visit_add")
DAY = "2024-05-14"
pytestmark = [pytest.mark.browser, pytest.mark.django_db(transaction=True)]


@pytest.fixture
def where(agency, station):
    station.hazards = "Steep bank below the weir; traffic on the bridge."
    station.save()
    return world.gauged(station)


@pytest.fixture(params=[PHONE, DESK], ids=["phone", "desk"])
def page(request, open_page, field_person, where):
    found = open_page(field_person, request.param)
    found.device = request.node.callspec.id
    return found


@pytest.fixture
def photograph(tmp_path):
    """A picture of a bank, as a phone takes it."""
    data = io.BytesIO()
    Image.effect_noise((1200, 900), 60).convert("RGB").save(data, "JPEG")
    path = tmp_path / "bank.jpg"
    path.write_bytes(data.getvalue())
    return path


def press(page, selector):
    """Tap on a phone, click at a desk."""
    found = page.locator(selector)
    if page.device == "phone":
        found.tap()
    else:
        found.click()


def at(page, name, time, day=DAY):
    page.fill(f"#id_{name}_0", day)
    page.fill(f"#id_{name}_1", time)


def type_heading(page):
    at(page, "arrived_at", "1000")
    at(page, "departed_at", "1110")
    page.fill("#id_weather", "rain since dawn")
    page.select_option("#id_control_condition", "weed")


def type_readings(page, where):
    for number, (time, label, value) in enumerate(
        [("10:05", "P1", "1,12"), ("10:07", "P2", "0,12"), ("11:00", "P2", "0,14")]
    ):
        at(page, f"readings-{number}-read_at", time)
        page.select_option(f"#id_readings-{number}-gauge", f"plate:{plate(where, label).pk}")
        page.fill(f"#id_readings-{number}-reading_m", value)


def type_check(page):
    at(page, "recorder_checks-0-checked_at", "10:10")
    for name, value in (
        ("found_m", "1,15"), ("left_m", "1,12"), ("clock_error_s", "20"), ("battery_v", "12,4"),
        ("gas_kpa", "140"),
    ):  # fmt: skip
        page.fill(f"#id_recorder_checks-0-{name}", value)
    press(page, "#id_recorder_checks-0-clock_error_s + .sign")
    page.check("#id_recorder_checks-0-was_downloaded")


def stage_at(page, number):
    cell = page.locator(f"#readings-{number} .field-reading_m .beside.stage")
    cell.wait_for()
    return cell.inner_text()


def open_visit(page, where):
    page.goto(f"{ADD}?station={where.code}")
    page.wait_for_timeout(200)  # drafts are kept from 50 ms after the page has loaded


def type_visit(page, where, photograph):
    type_heading(page)
    type_readings(page, where)
    type_check(page)
    page.fill("#id_work_left-0-text", "paint the upper plate")
    page.set_input_files("#id_photographs", photograph)
    page.fill("#id_caption", "left bank")


def saved(page):
    page.wait_for_url("**/change/**")
    visit = Visit.objects.get()
    check = visit.recorder_checks.get()
    assert [row.reading_m for row in visit.readings.all()] == [1.12, 0.12, 0.14]
    assert (check.found_m, check.left_m, check.clock_error_s) == (1.15, 1.12, -20)
    assert Photograph.objects.get().caption == "left bank"
    return visit


def test_a_visit_is_logged_and_checked(page, where, photograph, picture, fits_a_phone):
    open_visit(page, where)
    picture(page, f"visit-new-{page.device}")
    type_visit(page, where, photograph)
    assert stage_at(page, 1) == "= 1.120 m"
    picture(page, f"visit-typed-{page.device}")
    if page.device == "phone":
        fits_a_phone(page)
    press(page, "[name=_continue]")
    visit = saved(page)
    page.wait_for_selector(".photographs img")
    picture(page, f"visit-saved-{page.device}")
    if page.device == "phone":
        fits_a_phone(page)
    page.goto(reverse("admin:network_visit_check", args=[visit.pk]))
    picture(page, f"visit-check-{page.device}")
    press(page, "form .default, form [type=submit].default")
    page.wait_for_url("**/change/**")
    visit.refresh_from_db()
    assert visit.state == "checked"
    picture(page, f"visit-checked-{page.device}")
    if page.device == "phone":
        fits_a_phone(page)


def test_the_network_is_cut_in_the_middle_and_a_double_tap_saves_once(
    page, where, photograph, picture
):
    open_visit(page, where)
    type_heading(page)
    type_readings(page, where)
    assert stage_at(page, 0) == "= 1.120 m"
    page.context.set_offline(True)
    type_check(page)
    page.fill("#id_work_left-0-text", "paint the upper plate")
    page.set_input_files("#id_photographs", photograph)
    page.fill("#id_caption", "left bank")
    press(page, "[name=_continue]")
    page.wait_for_selector(".draft-notice.offline")
    picture(page, f"visit-offline-{page.device}")
    assert page.input_value("#id_readings-2-reading_m") == "0,14"
    page.context.set_offline(False)
    page.evaluate("for (const tap of [1, 2]) document.querySelector('[name=_continue]').click()")
    saved(page)
    assert VisitReading.objects.count() == 3


def test_an_unfinished_visit_comes_back_after_a_reload(page, where):
    open_visit(page, where)
    type_heading(page)
    type_readings(page, where)
    first = page.input_value("input[name=form_id]")
    page.wait_for_timeout(500)
    page.reload()
    page.wait_for_selector(".draft-notice.restored")
    assert page.input_value("input[name=form_id]") == first
    assert page.input_value("#id_readings-2-reading_m") == "0,14"
    assert stage_at(page, 2) == "= 1.140 m"


def test_a_reading_above_its_plate_is_asked_about_and_a_refusal_keeps_the_rest(
    page, where, photograph, picture
):
    open_visit(page, where)
    type_visit(page, where, photograph)
    page.fill("#id_readings-0-reading_m", "1,75")
    page.wait_for_selector("#readings-0 .beside.finding")
    at(page, "departed_at", "09:00", "2024-05-13")
    press(page, "[name=_continue]")
    page.wait_for_selector(".field-departed_at .errorlist")
    picture(page, f"visit-refused-{page.device}")
    assert page.input_value("#id_readings-0-reading_m") == "1,75"
    at(page, "departed_at", "11:10")
    page.fill("#id_readings-0-reading_m", "1,12")
    press(page, "[name=_continue]")
    saved(page)


def test_the_pages_around_a_visit(page, where, picture, fits_a_phone):
    for name, address in (("station", ADD), ("log", reverse("admin:network_visit_changelist"))):
        page.goto(address)
        picture(page, f"visit-{name}-{page.device}")
        if page.device == "phone":
            fits_a_phone(page)
