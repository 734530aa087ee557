"""What stands on the pages: every number and sentence of the content, within the margins."""

import ctypes
import dataclasses
import re

import pypdfium2
import pypdfium2.raw as pdfium
import pytest
from django.utils import translation

from reports import daily_layout, rendering
from reports.printed import Number
from tests.reports import sample

MM = 72 / 25.4
LEFT, RIGHT = 18 * MM, 192 * MM  # the measure of print/page.css
BOTTOM, TOP = 10 * MM, 283 * MM  # foot and running head included
LEAST_POINTS = 6.5
FACE_HEIGHT = 1.3  # ascent and descent of the report's face in its own units: 1.025 + 0.275


def text_of(pdf: bytes) -> str:
    """Return the text of all pages with single blanks."""
    document = pypdfium2.PdfDocument(pdf)
    return " ".join(
        re.sub(r"\s+", " ", page.get_textpage().get_text_bounded()) for page in document
    )


def numbers_in(content: object):
    """Yield every printed number anywhere in the content."""
    if isinstance(content, Number):
        yield content
    elif dataclasses.is_dataclass(content):
        for field in dataclasses.fields(content):
            yield from numbers_in(getattr(content, field.name))
    elif isinstance(content, tuple):
        for part in content:
            yield from numbers_in(part)


def characters(pdf: bytes):
    """Yield page number, sign, box (left, bottom, right, top) and size of every printed sign."""
    for number, page in enumerate(pypdfium2.PdfDocument(pdf), start=1):
        text = page.get_textpage()
        for index in range(text.count_chars()):
            sign = chr(pdfium.FPDFText_GetUnicode(text, index))
            if sign.isspace() or pdfium.FPDFText_IsGenerated(text, index):
                continue
            box = text.get_charbox(index)
            loose = pdfium.FS_RECTF()
            pdfium.FPDFText_GetLooseCharBox(text, index, ctypes.byref(loose))
            upright = abs(pdfium.FPDFText_GetCharAngle(text, index) % 3.14159) < 0.1
            reach = loose.top - loose.bottom if upright else loose.right - loose.left
            yield number, sign, box, abs(reach) / FACE_HEIGHT


def test_every_number_of_the_content_is_printed(case):
    book, pdf = case
    text = text_of(pdf)
    missing = {n.text for n in numbers_in(book) if n.text not in text}
    assert missing == set()


def test_each_row_of_the_daily_table_is_printed_as_it_stands_in_the_content(case):
    book, pdf = case
    text = text_of(pdf)
    table = daily_layout.lay_out(book.daily.months, decimal_sign=book.agency.decimal_sign)
    for row in table.days:
        cells = [cell.text + cell.signs for cell in row.cells if cell.text]
        assert " ".join([str(row.day), *cells]) in text


def test_notes_highlights_and_open_points_are_printed_in_full(case):
    book, pdf = case
    text = text_of(pdf)
    points = [point.text for point in book.edition.open_points]
    for sentence in (*book.notes, *book.highlights, *points):
        assert sentence in text


def test_the_caution_stands_in_every_yearbook(case):
    book, pdf = case
    with translation.override(book.language):
        caution = translation.gettext(
            "The figures of this yearbook are not for design, flood warning or navigation without "
            "qualified judgement. They may be revised; the latest edition holds."
        )
    assert caution in text_of(pdf)


def test_a_year_not_issued_says_so_on_every_page(pdfs):
    document = pypdfium2.PdfDocument(pdfs["stage"])
    for page in document:
        assert "not issued: figures may change" in page.get_textpage().get_text_bounded()


def test_german_pages_bear_german_words_dates_and_decimal_commas(pdfs):
    text = text_of(pdfs["flow"])
    for words in (
        "Tagesmittel des Abflusses, m³/s",
        "1. Oktober 2019 bis 30. September 2020",
        "8. bis 12. Juni 2020",
        "Okt Nov Dez Jan Feb Mär Apr Mai Jun Jul Aug Sep",
    ):
        assert words in text
    assert not re.search(r"\b\d\.\d\d\b", text.split("Tagesmittel des Abflusses, m³/s")[1])


@pytest.mark.parametrize("name", ["flow", "stage"])
def test_no_sign_leaves_the_margins_or_is_smaller_than_six_and_a_half_points(pdfs, name):
    outside, small = [], []
    for page, sign, (left, bottom, right, top), size in characters(pdfs[name]):
        if left < LEFT - 0.5 or right > RIGHT + 0.5:
            outside.append((page, sign, left / MM, right / MM))
        if bottom < BOTTOM or top > TOP:
            outside.append((page, sign, bottom / MM, top / MM))
        if size < LEAST_POINTS - 0.05:
            small.append((page, sign, size))
    assert outside == []
    assert small == []


@pytest.mark.parametrize("name", ["flow", "stage"])
def test_no_heading_stands_last_on_its_page(pdfs, name):
    """Below the lowest line of a heading's size (9 pt and more) more text follows."""
    for page in pypdfium2.PdfDocument(pdfs[name]):
        text = page.get_textpage()
        body = [
            (text.get_charbox(i)[1], pdfium.FPDFText_GetFontWeight(text, i))
            for i in range(text.count_chars())
            if text.get_charbox(i)[1] > 17 * MM and not pdfium.FPDFText_IsGenerated(text, i)
        ]
        lowest = min(bottom for bottom, _weight in body)
        assert any(weight < 600 for bottom, weight in body if bottom < lowest + 6)


def test_a_year_with_nothing_beside_its_readings_prints_sentences_instead_of_empty_tables():
    book = dataclasses.replace(
        sample.flow_station(),
        plates=(),
        recorders=(),
        ratings=(),
        gaugings=(),
        visits=(),
        level_checks=(),
        calibrations=(),
        corrections=(),
        uncertainty=(),
        highlights=(),
    )
    html = rendering.finished_page(book).html
    for sentence in (
        "No recorder stood at the station; the stage was read by an observer.",
        "No rating was in force during the year.",
        "No gauging was made during the year.",
        "No visit is on record for the year.",
        "No level check was made during the year.",
        "No gauging of the year rests on a meter calibration.",
        "The recorded stage needed no correction.",
    ):
        assert sentence in html
    assert "<tbody></tbody>" not in html
    assert "The year in brief" not in html


def test_what_people_typed_is_never_taken_for_markup():
    book = dataclasses.replace(sample.stage_station(), highlights=("h < 2 m & <b>rising</b>",))
    assert "h &lt; 2 m &amp; &lt;b&gt;rising&lt;/b&gt;" in rendering.finished_page(book).html
