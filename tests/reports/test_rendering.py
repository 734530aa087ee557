"""The PDF as a document: tagged, named, bookmarked, complete in itself, the same every time."""

import io

import pikepdf
import pytest
from weasyprint.urls import FatalURLFetchingError

from reports import rendering
from tests.reports.conftest import CSV


@pytest.fixture
def opened(case):
    """One content and its PDF opened."""
    book, pdf = case
    with pikepdf.open(io.BytesIO(pdf)) as document:
        yield book, document


def tags(document: pikepdf.Pdf):
    """Yield every element of the structure tree."""
    queue = [document.Root.StructTreeRoot]
    while queue:
        element = queue.pop()
        if "/S" in element:
            yield element
        kids = element.get("/K", [])
        kids = list(kids) if isinstance(kids, pikepdf.Array) else [kids]
        queue += [kid for kid in kids if isinstance(kid, pikepdf.Dictionary)]


def test_document_states_language_title_author_and_that_it_is_tagged(opened):
    book, document = opened
    assert str(document.Root.Lang) == book.language
    assert str(document.docinfo.Title) == f"{book.title}, {book.year.label}"
    assert str(document.docinfo.Author) == book.agency.name
    assert document.Root.MarkInfo.Marked
    with document.open_metadata() as metadata:
        assert metadata["pdfuaid:part"] == "1"


def test_every_figure_says_what_it_shows(opened):
    book, document = opened
    alternatives = [str(tag.Alt) for tag in tags(document) if tag.S == "/Figure"]
    drawn = [f for f in vars(book.figures).values() if f is not None]
    assert len(alternatives) == len(drawn)
    assert all(len(text) > 20 for text in alternatives)


def test_every_header_cell_has_its_scope(opened):
    _book, document = opened
    scopes = [str(tag.A.get("/Scope")) for tag in tags(document) if tag.S == "/TH"]
    assert set(scopes) == {"/Row", "/Column"}
    assert scopes.count("/Row") >= 31


def test_headings_descend_without_a_jump(opened):
    _book, document = opened
    names = [str(tag.S) for tag in tags(document)]
    assert names.count("/H1") == 1
    assert {"/H2", "/H3"} <= set(names)


def test_bookmarks_lead_to_every_part(opened):
    _book, document = opened
    with document.open_outline() as outline:
        assert len(outline.root) >= 6


def test_no_reader_finds_an_error(opened):
    assert opened[1].check_pdf_syntax() == []


def test_one_family_from_one_whole_file_per_weight(opened):
    """Subsets by unicode-range print wrong letters; they would show as several fonts a weight."""
    _book, document = opened
    fonts = {
        str(font.BaseFont).split("+")[-1]
        for page in document.pages
        for font in page.Resources.Font.values()
    }
    assert len(fonts) == 2
    assert all("Plex" in font for font in fonts)


def test_daily_values_are_attached_unchanged(opened):
    book, document = opened
    assert list(document.attachments) == [rendering.attachment_name(book)]
    attached = document.attachments[rendering.attachment_name(book)].get_file()
    assert attached.read_bytes() == CSV


def test_same_content_gives_the_same_bytes(books, pdfs):
    assert rendering.render(books["stage"], csv=CSV) == pdfs["stage"]


def test_another_edition_has_another_identifier(pdfs):
    identifiers = set()
    for pdf in pdfs.values():
        with pikepdf.open(io.BytesIO(pdf)) as document:
            identifiers.add(bytes(document.trailer.ID[0]))
    assert len(identifiers) == len(pdfs)


def test_nothing_is_fetched_from_outside(books):
    page = rendering.Page('<html lang="en"><img src="https://example.org/a.png" alt="a">', {})
    with pytest.raises(FatalURLFetchingError, match="fetches nothing from outside"):
        rendering.to_pdf(page, book=books["stage"], csv=CSV)


def test_the_renderer_has_nothing_to_complain_of(pdfs, complaints):
    assert complaints.texts == []
