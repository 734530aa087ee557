"""A volume: pages in order, contents that lead to them, bookmarks and data of every station."""

from datetime import UTC, datetime
from pathlib import Path

import pikepdf
import pypdfium2
import pytest

from network.services.acts import Refusal
from reports import rendering, services
from reports.models import Edition
from tests.people import make_agency
from tests.records import make_person
from tests.reports import world

pytestmark = pytest.mark.django_db
WHEN = {"at": datetime(2024, 2, 1, 10, tzinfo=UTC)}


@pytest.fixture
def publisher(db):
    make_agency()
    return make_person("publisher")


@pytest.fixture
def bound(monkeypatch, publisher):
    """Two issued editions of one year."""
    monkeypatch.setattr(rendering, "render", world.small_pdf)
    keeper, approver = make_person("keeper"), make_person("approver")
    stations = [world.make_stage_station(keeper), world.make_flow_station(keeper, approver)]
    return [
        services.compile_and_issue(
            station=each, year=world.YEAR, by=publisher, reason="the review follows", **WHEN
        )
        for each in stations
    ]


@pytest.fixture
def volume(bound, publisher):
    return services.bind(bound=bound, title="Quill basin 2023", by=publisher, **WHEN)


def text_of(path, number):
    return pypdfium2.PdfDocument(path)[number].get_textpage().get_text_bounded()


def test_front_matter_comes_first_and_names_every_station_with_its_page(volume):
    with pikepdf.open(volume.pdf.path) as pdf:
        assert len(pdf.pages) == 4 + 2 + 2  # title, contents, map, summary; two pages a station
    assert "Quill basin 2023" in text_of(volume.pdf.path, 0)
    contents = text_of(volume.pdf.path, 1)
    assert contents.index("QA-010") < contents.index("QA-020")
    assert {"5", "7"} <= set(contents.split())


def test_the_summary_prints_what_the_editions_print(volume, bound):
    summary = text_of(volume.pdf.path, 3)
    for edition in bound:
        for text in (edition.mean_text, edition.highest_text, edition.lowest_text, "365"):
            assert text in summary


def test_links_of_the_contents_lead_to_the_stations(volume):
    with pikepdf.open(volume.pdf.path) as pdf:
        pages = [page.objgen for page in pdf.pages]
        targets = [
            pages.index(link.Dest[0].objgen) for link in pdf.pages[1].obj.Annots if "/Dest" in link
        ]
        assert targets == [4, 6]


def test_bookmarks_are_copied_below_their_station(volume):
    with pikepdf.open(volume.pdf.path) as pdf, pdf.open_outline() as outline:
        pages = [page.objgen for page in pdf.pages]
        first, second = outline.root[-2:]
        assert (first.title[:6], second.title[:6]) == ("QA-010", "QA-020")
        (daily,) = second.children
        assert daily.title == "Daily values"
        assert pages.index(daily.destination[0].objgen) == 7


def test_the_data_of_every_station_are_attached(volume, bound):
    with pikepdf.open(volume.pdf.path) as pdf:
        kept = {name: each.obj.EF.F.read_bytes() for name, each in pdf.attachments.items()}
    assert kept == {f"{e.station.code}_daily.csv": Path(e.csv.path).read_bytes() for e in bound}


def test_it_claims_no_tags_that_it_has_not(volume):
    with pikepdf.open(volume.pdf.path) as pdf:
        assert "/StructTreeRoot" not in pdf.Root
        assert not any("/StructParents" in page.obj for page in pdf.pages)
        with pdf.open_metadata() as metadata:
            assert "pdfuaid:part" not in metadata
        assert pdf.check_pdf_syntax() == []


def test_binding_again_gives_the_same_bytes(volume, bound, publisher):
    again = services.bind(bound=bound[::-1], title="Quill basin 2023", by=publisher, **WHEN)
    assert again.pdf.name == volume.pdf.name


def test_every_page_but_the_title_bears_its_number(volume):
    drawn = []
    with pikepdf.open(volume.pdf.path) as pdf:
        for page in pdf.pages:
            page.contents_coalesce()
            words = page.obj.Contents.read_bytes().split()
            drawn.append("".join(w[-1:].decode() for w in words if w.startswith(b"/Digit")))
    assert drawn == ["", "2", "3", "4", "5", "6", "7", "8"]


def test_only_issued_editions_of_one_year_are_bound(bound, publisher):
    with pytest.raises(Refusal, match="no issued edition"):
        services.bind(bound=[], title="x", by=publisher, **WHEN)
    Edition.objects.filter(pk=bound[0].pk).update(state=Edition.State.SUPERSEDED)
    bound[0].refresh_from_db()
    with pytest.raises(Refusal, match="Only issued"):
        services.bind(bound=bound, title="x", by=publisher, **WHEN)
