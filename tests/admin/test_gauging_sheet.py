"""The gauging sheet in the staff site: computed, refused by cell, saved, signed, loaded."""

import io
import re
import uuid

import pytest
from django.urls import reverse
from openpyxl import load_workbook

from network.formats import gauging_sheet_layout as layout
from network.models import Gauging
from network.queries import gaugings as answers
from network.services import gaugings
from tests import field_world as world

pytestmark = pytest.mark.django_db
ADD = reverse("admin:network_gauging_add")


@pytest.fixture
def where(agency, station):
    world.rate(station)
    return station


@pytest.fixture
def pair():
    return world.rated_meter()


@pytest.fixture
def client(client, agency, field_person):
    client.force_login(field_person)
    return client


def heading(where, pair=None, **changes):
    return {
        "form_id": str(uuid.uuid4()),
        "station": where.pk,
        "method": "meter",
        "way": "wading",
        "sounding": "rod",
        "starting_bank": "left",
        "pair": pair.pk if pair else "",
        "spin_test_seconds": "90",
        "started_at_0": "2024-05-14",
        "started_at_1": "13:00",
        "ended_at_0": "2024-05-14",
        "ended_at_1": "14:00",
        "stages-TOTAL_FORMS": "2",
        "stages-INITIAL_FORMS": "0",
        "stages-0-read_at_0": "2024-05-14",
        "stages-0-read_at_1": "13:00",
        "stages-0-reading_m": "1,50",
        "stages-1-read_at_0": "2024-05-14",
        "stages-1-read_at_1": "14:00",
        "stages-1-reading_m": "1.50",
    } | changes


def lines(count=20, **cells):
    """A rectangle of depth 1 m as a browser sends it; cells replace single ones by their name."""
    sent = {"rows-TOTAL_FORMS": str(count + 2)}
    for number in range(count + 2):
        edge = number in (0, count + 1)
        sent |= {
            f"rows-{number}-kind": "edge" if edge else "vertical",
            f"rows-{number}-edge": "sloping",
            f"rows-{number}-distance_m": str(number),
            f"rows-{number}-depth_m": "1,0",
            f"rows-{number}-points": "0.2 0.8",
        }
        if not edge:
            for point in (0, 1):
                sent[f"rows-{number}-p{point}-revolutions"] = "120"
                sent[f"rows-{number}-p{point}-seconds"] = "60"
    return sent | cells


def cell_errors(response):
    table = response.context["table"]
    return {line.name(cell): said for line in table.lines for cell, said in line.errors.items()}


def test_a_sheet_is_saved_and_signed_in_one_go(client, where, pair):
    sent = heading(where, pair) | lines() | {"_sign": "1"}
    assert client.post(ADD, sent).status_code == 302
    row = Gauging.objects.get()
    assert (row.state, row.discharge_m3s) == ("signed", pytest.approx(10.2))
    page = client.get(reverse("admin:network_gauging_change", args=[row.pk]))
    assert "10.2 m³/s" in page.content.decode()


def test_a_double_tap_lands_on_the_same_gauging(client, where, pair):
    sent = heading(where, pair) | lines()
    first, second = (client.post(ADD, sent) for _tap in range(2))
    assert first.url == second.url or second.url.endswith(f"{Gauging.objects.get().pk}/change/")
    assert Gauging.objects.count() == 1


def test_compute_works_without_script_and_saves_nothing(client, where, pair):
    page = client.post(ADD, heading(where, pair) | lines() | {"_compute": "1"})
    assert page.status_code == 200
    assert "10.2 m³/s" in page.content.decode()
    assert not Gauging.objects.exists()
    assert page.context["table"].lines[3].cells["depth_m"] == "1,0"


def test_forty_verticals_of_six_points_pass_the_field_limit(client, where, pair):
    many = lines(40)
    for number in range(1, 41):
        many[f"rows-{number}-points"] = "0 0.2 0.4 0.6 0.8 1"
        for point in range(6):
            many[f"rows-{number}-p{point}-revolutions"] = "120"
            many[f"rows-{number}-p{point}-seconds"] = "60"
            many[f"rows-{number}-p{point}-velocity_ms"] = ""
    assert len(many) > 1000 - 100
    assert client.post(ADD, heading(where, pair) | many | {"_sign": "1"}).status_code == 302
    assert Gauging.objects.get().state == "signed"


BAD_CELLS = [
    ("rows-12-distance_m", "125", "Is 12.5 m meant?", {}),
    ("rows-3-p1-seconds", "", "revolutions without seconds", {}),
    ("rows-4-depth_m", "-1", "the depth is negative", {}),
    ("rows-21-distance_m", "5", "lies inside the section", {}),
    ("rows-5-depth_m", "deep", "is not a number", {}),
]


@pytest.mark.parametrize(("cell", "typed", "said", "more"), BAD_CELLS)
def test_bad_input_is_asked_about_at_its_cell_and_the_rest_is_kept(
    client, where, pair, cell, typed, said, more
):
    sent = heading(where, pair) | lines(**{cell: typed}) | {"_sign": "1"} | more
    if cell == "rows-12-distance_m":
        sent |= {"rows-12-distance_m": "125"}
    page = client.post(ADD, sent)
    assert page.status_code == 200
    assert any(said in sentence for sentence in cell_errors(page)[cell])
    assert f'name="{cell}" value="{typed}"' in page.content.decode()
    assert page.context["table"].lines[9].points[0]["revolutions"] == "120"
    assert not Gauging.objects.exists()


def test_all_verticals_at_one_place_are_refused(client, where, pair):
    same = {f"rows-{number}-distance_m": "7" for number in range(22)}
    page = client.post(ADD, heading(where, pair) | lines(**same) | {"_sign": "1"})
    assert "all verticals stand at one place" in page.content.decode()
    assert not Gauging.objects.exists()


def live(client, sent):
    return client.post(reverse("admin:network_gauging_live"), sent)


def test_the_live_answer_costs_three_queries_beyond_the_login(
    client, where, pair, django_assert_num_queries
):
    sent = heading(where, pair) | lines()
    live(client, sent)
    # session, person, the person's and the groups' permissions, agency; then the answer's three
    with django_assert_num_queries(5 + 3):
        found = live(client, sent).json()
    assert "10.2 m³/s" in found["answer"]
    assert found["lines"].count("data-for") == 20


def test_the_live_answer_survives_an_unfinished_sheet(client, where, pair):
    sent = heading(where, pair) | lines(**{"rows-3-depth_m": "x", "rows-4-p0-seconds": ""})
    assert "revolutions without seconds" in live(client, sent).json()["answer"]
    assert live(client, {}).status_code == 200


def test_a_sentinel_of_the_kernel_appears_on_screen_in_the_row_and_in_the_workbook(
    client, where, pair, monkeypatch
):
    whole = answers.kernel.preview
    sentinel = 123.456

    def bent(sheet, settings):
        found = whole(sheet, settings)
        result = found.result and type(found.result)(
            **vars(found.result) | {"mid_section_m3s": sentinel}
        )
        return type(found)(result, found.section, found.faults)

    monkeypatch.setattr(answers.kernel, "preview", bent)
    sent = heading(where, pair) | lines()
    assert "123 m³/s" in live(client, sent).json()["answer"]
    client.post(ADD, sent | {"_sign": "1"})
    row = Gauging.objects.get()
    assert row.discharge_m3s == row.mid_section_m3s == sentinel
    page = client.get(reverse("admin:network_gauging_change", args=[row.pk]))
    assert "123 m³/s" in page.content.decode()
    book = client.get(reverse("admin:network_gauging_download", args=[row.pk]))
    shown = load_workbook(io.BytesIO(book.content))[layout.HEAD]
    assert shown[layout.SIGNED_RESULT].value == sentinel


def test_a_second_person_is_told_and_loses_nothing(client, where, pair):
    sent = heading(where, pair) | lines()
    client.post(ADD, sent)
    row = Gauging.objects.get()
    page = reverse("admin:network_gauging_change", args=[row.pk])
    stages = re.findall(r'name="stages-(\d)-id" value="(\d+)"', client.get(page).content.decode())
    sent |= {"version": "1", "stages-INITIAL_FORMS": "2"}
    sent |= {f"stages-{number}-id": key for number, key in stages}
    gaugings.save(
        sheet=world.sheet(where, pair, remarks="first"), form_id=row.form_id, version=1,
        by=world.person(), at=world.NOON,
    )  # fmt: skip
    answer = client.post(page, sent | {"remarks": "second"})
    assert answer.status_code == 200
    assert "Someone else saved this meanwhile" in answer.content.decode()
    assert "second" in answer.content.decode()


def test_a_signed_gauging_is_looked_at_checked_and_reopened(client, where, pair):
    client.post(ADD, heading(where, pair) | lines() | {"_sign": "1"})
    row = Gauging.objects.get()
    page = client.get(reverse("admin:network_gauging_change", args=[row.pk])).content.decode()
    assert "rows-TOTAL_FORMS" not in page
    assert client.post(reverse("admin:network_gauging_check", args=[row.pk])).status_code == 302
    assert client.post(
        reverse("admin:network_gauging_reopen", args=[row.pk]), {"reason": "slip"}
    ).status_code == 302  # fmt: skip
    row.refresh_from_db()
    assert row.state == "draft"


@pytest.mark.parametrize("method", ["acoustic", "float", "dilution", "volume", "weir"])
def test_every_method_has_its_page(client, where, method):
    page = client.get(f"{ADD}?method={method}")
    assert page.status_code == 200
    assert not page.context["by_meter"]


def test_floats_are_read_line_by_line_and_a_bad_line_is_named(client, where):
    sent = heading(where, method="float", way="bank") | {
        "float_reach-TOTAL_FORMS": "1",
        "float_reach-INITIAL_FORMS": "0",
        "float_reach-0-length_m": "10",
        "floats": "1\t2,0\t20\n2\t2,0\t20\n3\t2,0\t20",
        "_sign": "1",
    }
    bad = client.post(f"{ADD}?method=float", sent | {"floats": "1\t2,0\n"})
    assert "Line 1" in bad.content.decode()
    assert client.post(f"{ADD}?method=float", sent).status_code == 302
    assert Gauging.objects.get().discharge_m3s == pytest.approx(0.86 * 3 * 2 * 0.5)


def test_transects_and_their_test_are_signed(client, where):
    sent = heading(where, method="acoustic", way="boat") | {
        "transects-TOTAL_FORMS": "2",
        "transects-INITIAL_FORMS": "0",
        "boat_track-TOTAL_FORMS": "1",
        "boat_track-INITIAL_FORMS": "0",
        "boat_track-0-tracks_the_bed": "on",
        "boat_track-0-bed_velocity_ms": "0,02",
        "boat_track-0-water_velocity_ms": "1",
        "_sign": "1",
    }
    for number, (bank, flow) in enumerate((("left", "20"), ("right", "21"))):
        sent |= {
            f"transects-{number}-starting_bank": bank,
            f"transects-{number}-discharge_m3s": flow,
            f"transects-{number}-seconds": "400",
            f"transects-{number}-is_used": "on",
        }
    assert client.post(f"{ADD}?method=acoustic", sent).status_code == 302
    # Raised by the moving bed's 2 %: 20.5 · 1.02.
    assert Gauging.objects.get().discharge_m3s == pytest.approx(20.91)


def test_a_workbook_goes_out_and_comes_back(client, where, pair):
    page = reverse("admin:network_gauging_workbook")
    book = client.get(page, {"station": where.pk, "pair": pair.pk})
    blank = load_workbook(io.BytesIO(book.content))
    assert blank[layout.HEAD][layout.STATION_CODE].value == where.code
    rows = blank[layout.VERTICALS]
    for number in range(22):
        row = layout.FIRST_ROW + number
        edge = number in (0, 21)
        values = ("edge", number, 1.0) if edge else ("vertical", number, 1.0)
        for column, value in zip("ABC", values, strict=True):
            rows[f"{column}{row}"] = value
        for column, value in zip("KLQR", (120, 60, 120, 60), strict=True):
            rows[f"{column}{row}"] = None if edge else value
    stream = io.BytesIO()
    blank.save(stream)
    for _time in range(2):
        stream.seek(0)
        stream.name = "sheet.xlsx"
        assert client.post(page, {"workbook": stream}).status_code == 302
    assert Gauging.objects.count() == 1
    stream = io.BytesIO(b"no workbook")
    stream.name = "sheet.xlsx"
    assert "no workbook" in client.post(page, {"workbook": stream}).content.decode()


def test_the_list_writes_figures_as_the_agency_does(client, where, pair, agency):
    client.post(ADD, heading(where, pair) | lines() | {"_sign": "1"})
    type(agency).objects.update(decimal_sign=",")
    text = client.get(reverse("admin:network_gauging_changelist")).content.decode()
    assert ">10,2<" in text
    assert ">1,500<" in text
    assert ">−54,7<" in text
