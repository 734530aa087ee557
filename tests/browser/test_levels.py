"""A level book typed in a real browser, reduced live, checked and adopted; the station file."""

from datetime import timedelta

import pytest
from django.urls import reverse

from network.models import LevelCheck, PlateZero
from tests import gauge_world as world
from tests.browser.conftest import DESK, PHONE

ADD = reverse("admin:network_levelcheck_add")
pytestmark = [pytest.mark.browser, pytest.mark.django_db(transaction=True)]


@pytest.fixture
def where(agency, station):
    station.hazards = "Steep bank below the weir."
    station.save()
    return world.gauged(station)


@pytest.fixture(params=[PHONE, DESK], ids=["phone", "desk"])
def page(request, open_page, record_keeper, where):
    found = open_page(record_keeper, request.param)
    found.device = request.node.callspec.id
    return found


def fill(page, name, value):
    if value is not None:
        page.fill(f"#id_{name}", f"{value:.3f}".replace(".", ","))


def type_book(page, where):
    page.goto(f"{ADD}?station={where.pk}")
    page.fill("#id_levelled_at_0", "2024-05-14")
    page.fill("#id_levelled_at_1", "13:00")
    for name, value in vars(world.PEG).items():
        fill(page, f"peg_test-0-{name}", value)
    for number, row in enumerate(world.book(where)):
        owner = row.benchmark or row.plate
        value = f"{row.point}:{owner.pk}" if owner else row.point
        page.select_option(f"#id_sights-{number}-on", value)
        for name in ("graduation_m", "backsight_m", "intermediate_m", "foresight_m"):
            fill(page, f"sights-{number}-{name}", getattr(row, name))


def await_reduction(page):
    """Wait until no answer is on its way, so that none reaches the server after the test."""
    page.wait_for_selector("[data-figure=misclosure]:has-text('−1.0 mm')")
    page.wait_for_selector("#answer:not(.stale)")
    page.wait_for_load_state("networkidle")


def test_a_book_is_typed_reduced_checked_and_adopted(page, where, picture, fits_a_phone):
    world.read_twice(where, world.LEVELLED - timedelta(days=60))
    type_book(page, where)
    await_reduction(page)
    picture(page, f"levels-typed-{page.device}")
    if page.device == "phone":
        fits_a_phone(page)
    page.click("[name=_continue]")
    page.wait_for_url("**/change/**")
    check = LevelCheck.objects.get()
    page.goto(reverse("admin:network_levelcheck_check", args=[check.pk]))
    page.click("[name=_do]")
    page.wait_for_url("**/change/**")
    picture(page, f"levels-checked-{page.device}")
    page.goto(reverse("admin:network_levelcheck_adopt", args=[check.pk]))
    page.fill("#id_reason", "lifted by ice")
    page.fill("#id_effective_from_0", "2024-03-15")
    picture(page, f"levels-adopt-{page.device}")
    if page.device == "phone":
        fits_a_phone(page)
    page.click("[name=_do]")
    page.wait_for_selector("text=Nothing is written yet")
    assert "2 readings at visits give another stage" in page.inner_text(".changes ~ .changes")
    picture(page, f"levels-before-and-after-{page.device}")
    if page.device == "phone":
        fits_a_phone(page)
    page.click("input.default")
    page.wait_for_url("**/change/**")
    assert PlateZero.objects.get(level_check=check).zero_m == 1.0205


def test_an_unfinished_book_comes_back_on_the_same_device(page, where):
    type_book(page, where)
    await_reduction(page)
    page.goto(reverse("admin:index"))
    page.goto(f"{ADD}?station={where.pk}")
    page.wait_for_selector(".draft-notice.restored")
    assert page.input_value("#id_sights-7-foresight_m") == "1,301"
    await_reduction(page)


def test_the_station_file_is_read_before_going_there(page, where, picture, fits_a_phone):
    world.checked_levels(where)
    page.goto(reverse("admin:network_station_file", args=[where.pk]))
    picture(page, f"station-file-{page.device}")
    if page.device == "phone":
        fits_a_phone(page)
    page.goto(ADD)
    picture(page, f"choose-station-{page.device}")
    page.goto(reverse("admin:network_station_zero", args=[where.pk]))
    picture(page, f"station-zero-{page.device}")
    if page.device == "phone":
        fits_a_phone(page)
