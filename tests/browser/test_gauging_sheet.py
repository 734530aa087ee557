"""A gauging typed and pasted in a real browser, on a phone and at a desk, answered and signed."""

import pytest
from django.urls import reverse

from network.models import Gauging
from tests import field_world as world
from tests.browser.conftest import DESK, PHONE

ADD = reverse("admin:network_gauging_add")
pytestmark = [pytest.mark.browser, pytest.mark.django_db(transaction=True)]


@pytest.fixture
def where(agency, station):
    world.rate(station)
    station.hazards = "Steep bank below the weir."
    station.save()
    return station


@pytest.fixture
def pair(where):
    return world.rated_meter()


@pytest.fixture(params=[PHONE, DESK], ids=["phone", "desk"])
def page(request, open_page, field_person, where, pair):
    found = open_page(field_person, request.param)
    found.device = request.node.callspec.id
    return found


def open_sheet(page, where, pair):
    page.goto(ADD)
    page.select_option("#id_station", str(where.pk))
    page.select_option("#id_pair", str(pair.pk))
    page.fill("#id_spin_test_seconds", "90")
    for name, time in (("started_at", "13:00"), ("ended_at", "14:00")):
        page.fill(f"#id_{name}_0", "2024-05-14")
        page.fill(f"#id_{name}_1", time)
    for row, time in enumerate(("13:00", "14:00")):
        page.fill(f"#id_stages-{row}-read_at_0", "2024-05-14")
        page.fill(f"#id_stages-{row}-read_at_1", time)
        page.fill(f"#id_stages-{row}-reading_m", "1,50")


def cell(page, row, name):
    return page.locator(f"[name='rows-{row}-{name}']")


def depth(row):
    """A plain bed: half a metre at the edges of 21 m, 1.5 m in the middle."""
    return 0.5 + row * (21 - row) / 110.25


def edge(page, row, distance):
    cell(page, row, "distance_m").fill(distance)
    cell(page, row, "depth_m").fill("0,5")


def type_vertical(page, row):
    cell(page, row, "points").select_option("0.2 0.8")
    cell(page, row, "distance_m").fill(str(row))
    cell(page, row, "depth_m").fill(f"{depth(row):.2f}".replace(".", ","))
    for point, turns in ((0, 140), (1, 100)):
        cell(page, row, f"p{point}-revolutions").fill(str(turns))
        cell(page, row, f"p{point}-seconds").fill("60")


def paste(page, row, text):
    target = cell(page, row, "distance_m")
    target.focus()
    target.evaluate(
        """(field, text) => {
            const data = new DataTransfer();
            data.setData("text/plain", text);
            field.dispatchEvent(new ClipboardEvent(
                "paste", {clipboardData: data, bubbles: true, cancelable: true}));
        }""",
        text,
    )


def discharge(page):
    return page.locator("[data-figure=discharge]")


def answered(page):
    """Wait until the server has answered a sheet without faults."""
    page.wait_for_selector("svg.section rect.panel")
    page.wait_for_selector(".faults", state="detached")


def rows_of(page):
    return page.locator("#rows-group .line")


def test_twenty_verticals_are_typed_answered_and_signed(page, where, pair, picture, fits_a_phone):
    open_sheet(page, where, pair)
    edge(page, 0, "0")
    for row in range(1, 21):
        if row >= rows_of(page).count() - 1:
            page.click("#rows-group .add-row a")
        type_vertical(page, row)
    edge(page, rows_of(page).count() - 1, "21")
    answered(page)
    assert discharge(page).inner_text().endswith("%")
    picture(page, f"gauging-typed-{page.device}")
    if page.device == "phone":
        fits_a_phone(page)
    shown = discharge(page).inner_text().split(" m³/s")[0]
    page.click("[name=_sign]")
    page.wait_for_url("**/gauging/")
    row = Gauging.objects.get()
    assert row.state == "signed"
    assert f"{row.discharge_m3s:.3g}" == shown
    page.goto(reverse("admin:network_gauging_change", args=[row.pk]))
    picture(page, f"gauging-signed-{page.device}")
    if page.device == "phone":
        fits_a_phone(page)


def test_twenty_verticals_are_pasted_from_a_spreadsheet_and_signed(page, where, pair, picture):
    open_sheet(page, where, pair)
    edge(page, 0, "0")
    cell(page, 1, "points").select_option("0.6")
    table = "\n".join(
        f"{row}\t{depth(row):.2f}\t{100 + row}\t60".replace(".", ",") for row in range(1, 21)
    )
    paste(page, 1, table + "\n")
    assert rows_of(page).count() == 22
    edge(page, 21, "21")
    page.wait_for_selector("svg.section rect.panel")
    cell(page, 12, "distance_m").fill("125")
    page.wait_for_selector(".faults li")
    assert "Is 12.5 m meant?" in page.locator(".faults").inner_text()
    picture(page, f"gauging-asked-{page.device}")
    page.click("[name=_sign]")
    page.wait_for_selector(".errornote, .errorlist")
    assert cell(page, 12, "distance_m").input_value() == "125"
    assert cell(page, 20, "p0-revolutions").input_value() == "120"
    picture(page, f"gauging-refused-{page.device}")
    cell(page, 12, "distance_m").fill("12")
    page.click("[name=_sign]")
    page.wait_for_url("**/gauging/")
    assert Gauging.objects.get().channels.get().verticals.count() == 20


def test_an_unfinished_sheet_comes_back_on_the_same_device(page, where, pair):
    open_sheet(page, where, pair)
    edge(page, 0, "0")
    for row in range(1, 12):
        if row >= rows_of(page).count() - 1:
            page.click("#rows-group .add-row a")
        type_vertical(page, row)
    page.wait_for_timeout(500)
    page.goto(reverse("admin:index"))
    page.goto(ADD)
    page.wait_for_selector(".draft-notice.restored")
    assert cell(page, 11, "p1-seconds").input_value() == "60"
    assert cell(page, 11, "depth_m").input_value() == f"{depth(11):.2f}".replace(".", ",")


def test_the_pages_around_the_sheet(page, where, pair, picture, fits_a_phone):
    for name, address in (
        ("workbook", reverse("admin:network_gauging_workbook")),
        ("acoustic", f"{ADD}?method=acoustic"),
        ("new", ADD),
    ):
        page.goto(address)
        picture(page, f"gauging-{name}-{page.device}")
        if page.device == "phone":
            fits_a_phone(page)
