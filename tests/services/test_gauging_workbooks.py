"""A workbook holds the sheet, its formulas give the kernel's figures, it comes back once."""

import io
import uuid
import zipfile
from dataclasses import replace

import pytest
from openpyxl import load_workbook

from network.formats import gauging_sheet_layout as layout
from network.models import Agency, Gauging, StaffPlate
from network.numerics.gaugings.gauging_input import Bank, Channel, Edge, Point, Vertical
from network.numerics.meters.meter_rating import Piece
from network.numerics.printing import fixed_text
from network.queries import field_sheets
from network.queries import gaugings as answers
from network.services import calibrations, gauging_workbooks, gaugings
from network.services.acts import Overtaken, Refusal
from tests import field_world as world
from tests.formats.spreadsheet import Sheets

pytestmark = pytest.mark.django_db


def mixed_channels():
    """Two channels with every point method, soundings, ice, slant, line angles and edges."""
    count = [Point(f, revolutions=40.0 + 9 * k, seconds=50.0) for k, f in enumerate(
        (0.0, 0.2, 0.4, 0.6, 0.8, 1.0))]  # fmt: skip
    at = {point.fraction: point for point in count}
    half = Point(0.5, revolutions=70.0, seconds=60.0)
    still = Point(0.6, revolutions=0.0, seconds=60.0)
    near = (
        Vertical(1.0, 0.6, (at[0.6],)),
        Vertical(2.0, 0.9, (half,), angle_deg=20.0),
        Vertical(2.6, 1.4),
        Vertical(3.0, 1.2, (at[0.2], at[0.8])),
        Vertical(4.0, 1.3, (at[0.2], at[0.6], at[0.8]), line_angle_deg=13.0, air_line_m=4.0),
        Vertical(5.0, 1.1, tuple(at[f] for f in (0.0, 0.2, 0.6, 0.8, 1.0))),
        Vertical(6.0, 1.0, tuple(count)),
        Vertical(7.0, 0.7, (at[0.0],)),
        Vertical(8.0, 0.5, mean_velocity_ms=0.31),
    )
    ice = tuple(
        Vertical(x, 1.0, points, ice_underside_m=0.25)
        for x, points in ((12.0, (at[0.6],)), (13.0, (half,)), (14.0, (still,)))
    )
    return (
        Channel(Bank(0.0, 0.4, Edge.ROUGH), Bank(9.0, 0.0, Edge.DEAD), near),
        Channel(Bank(11.0, 0.0), Bank(15.0, 0.8, Edge.SMOOTH, velocity_ms=0.05), ice),
    )


@pytest.fixture
def where():
    found = world.station()
    world.rate(found)
    return found


@pytest.fixture
def pair():
    found = world.meter()
    calibrations.from_certificate(
        owner=found, effective_from=world.EARLY, by=world.person(), at=world.EARLY,
        pieces=[Piece(0.019, 0.233, 0.0, 1.2), Piece(0.006, 0.252, 1.2, 1.6),
                Piece(0.002, 0.254, 1.6, 20.0)],
    )  # fmt: skip
    return found


def workbook_of(sheet, form_id, version=0):
    stream = io.BytesIO()
    gauging_workbooks.write(sheet, stream, form_id=form_id, version=version)
    stream.seek(0)
    return load_workbook(stream)


def sent(book):
    stream = io.BytesIO()
    book.save(stream)
    stream.seek(0)
    return gauging_workbooks.load(stream, by=world.person(), at=world.NOON)


def test_a_workbook_brings_back_the_sheet_it_was_made_from(where, pair):
    StaffPlate.objects.create(
        station=where, label="0-2", lowest_m=0, highest_m=2, installed_at=world.EARLY
    )
    sheet = world.sheet(where, pair, channels=mixed_channels(), remarks="=not a formula")
    row = sent(workbook_of(sheet, uuid.uuid4()))
    assert field_sheets.of_gauging(row) == sheet


@pytest.mark.parametrize("method", ["mid", "mean"])
def test_its_own_formulas_give_the_kernels_figures_to_the_printed_digit(where, pair, method):
    Agency.objects.update(result_method=method)
    sheet = world.sheet(where, pair, channels=mixed_channels())
    result = answers.answer(sheet).result
    sheets = Sheets(workbook_of(sheet, uuid.uuid4()))
    shown = {name: sheets.value(layout.HEAD, cell) for name, cell in layout.RESULTS.items()}
    expected = {
        "area": result.section.area_m2,
        "mid": result.mid_section_m3s,
        "mean": result.mean_section_m3s,
        "velocity": result.mean_velocity_ms,
    }
    assert _printed(shown, 6) == _printed(expected, 6)
    column = layout.SHARE_COLUMN
    shares = [sheets.value(layout.VERTICALS, f"{column}{row}") for row in layout.TABLE_ROWS]
    shares = [share for share in shares if share != ""]
    assert _list(shares) == _list([100 * panel.share for panel in result.mid_panels])


def _printed(values, decimals):
    return {
        name: fixed_text(value, decimals=decimals, decimal_sign=".")
        for name, value in values.items()
    }


def _list(values):
    return [fixed_text(value, decimals=4, decimal_sign=".") for value in values]


def test_loading_it_again_updates_instead_of_doubling(where, pair):
    book = workbook_of(world.sheet(where, pair), uuid.uuid4())
    first = sent(book)
    book[layout.VERTICALS]["C6"] = 1.25
    second = sent(book)
    assert (first.pk, Gauging.objects.count()) == (second.pk, 1)
    assert field_sheets.of_gauging(second).channels[0].verticals[1].depth_m == 1.25


def test_a_sheet_saved_meanwhile_is_not_overwritten(where, pair):
    form_id, sheet = uuid.uuid4(), world.sheet(where, pair)
    book = workbook_of(sheet, form_id)
    row = sent(book)
    gaugings.save(
        sheet=world.sheet(where, pair, remarks="at the desk"), form_id=form_id,
        version=row.version, by=world.person(), at=world.NOON,
    )  # fmt: skip
    with pytest.raises(Overtaken):
        sent(book)


def test_formulas_and_words_where_numbers_belong_are_refused_by_cell(where, pair):
    book = workbook_of(world.sheet(where, pair), uuid.uuid4())
    page = book[layout.VERTICALS]
    page["B5"], page["C6"], page["K7"], page["E8"] = "=1+1", "deep", True, "noon"
    with pytest.raises(gauging_workbooks.WorkbookRefused) as refused:
        sent(book)
    named = [sentence.split(",")[0] for sentence in refused.value.sentences]
    assert named == ["Verticals B5", "Verticals C6", "Verticals K7", "Verticals E8"]
    assert "a formula stands here" in refused.value.sentences[0]
    assert not Gauging.objects.exists()


def test_decimal_commas_written_as_text_are_taken(where, pair):
    book = workbook_of(world.sheet(where, pair), uuid.uuid4())
    book[layout.VERTICALS]["C6"] = "1,25"
    verticals = field_sheets.of_gauging(sent(book)).channels[0].verticals
    assert verticals[1].depth_m == 1.25


def test_revolutions_without_seconds_are_refused_and_nothing_is_kept(where, pair):
    book = workbook_of(world.sheet(where, pair), uuid.uuid4())
    book[layout.VERTICALS]["L6"] = None
    with pytest.raises(gaugings.SheetRefused, match="Vertical 2: revolutions without seconds"):
        sent(book)
    assert not Gauging.objects.exists()


@pytest.mark.parametrize("content", [b"", b"PK\x03\x04rubbish", b"a,b\n1,2\n"])
def test_a_file_that_is_no_workbook_is_refused(where, content):
    with pytest.raises(Refusal, match="no workbook"):
        gauging_workbooks.load(io.BytesIO(content), by=world.person(), at=world.NOON)


def test_a_workbook_with_a_damaged_page_is_refused(where, pair):
    whole, damaged = io.BytesIO(), io.BytesIO()
    workbook_of(world.sheet(where, pair), uuid.uuid4()).save(whole)
    with zipfile.ZipFile(whole) as before, zipfile.ZipFile(damaged, "w") as after:
        for name in before.namelist():
            data = before.read(name)
            after.writestr(name, data[: len(data) // 2] if "sheet2" in name else data)
    damaged.seek(0)
    with pytest.raises(Refusal, match="no workbook"):
        gauging_workbooks.load(damaged, by=world.person(), at=world.NOON)


def test_a_workbook_of_something_else_is_refused(where, pair):
    book = workbook_of(world.sheet(where, pair), uuid.uuid4())
    del book[layout.TABLES]
    with pytest.raises(Refusal, match="no page “Tables”"):
        sent(book)


def test_input_cells_are_open_and_formulas_are_locked(where, pair):
    book = workbook_of(world.sheet(where, pair), uuid.uuid4())
    page = book[layout.VERTICALS]
    assert page.protection.sheet
    assert not page["B5"].protection.locked
    assert page[f"{layout.SHARE_COLUMN}5"].protection.locked
    assert {rule.type for rule in page.data_validations.dataValidation} == {"decimal", "list"}


def test_a_gauging_over_midnight_rolls_to_the_next_day(where, pair):
    sheet = world.sheet(where, pair)
    late = sheet.heading.started_at.replace(hour=23, minute=30)
    heading = replace(sheet.heading, started_at=late, ended_at=late + world.HOUR)
    stages = tuple(
        replace(row, read_at=late + k * world.HOUR) for k, row in enumerate(sheet.stages)
    )
    row = sent(workbook_of(replace(sheet, heading=heading, stages=stages), uuid.uuid4()))
    assert row.ended_at - row.started_at == world.HOUR
    assert [stage.read_at for stage in row.stages.all()] == [late, late + world.HOUR]
