"""From rows to paper: what the content says stands in the PDF, the same bytes every time."""

import io
from datetime import UTC, datetime

import pikepdf
import pytest

from network.formats import daily_csv
from reports import editions, particulars, services
from reports.content import book
from tests.people import make_agency
from tests.records import make_person
from tests.reports import world
from tests.reports.test_page_text import numbers_in, text_of

pytestmark = pytest.mark.django_db
WHEN = {"at": datetime(2024, 2, 1, 10, tzinfo=UTC)}
EDITION = particulars.Edition(number=1, compiled_on=datetime(2024, 2, 1).date())
GAP = {
    "missing_from": datetime(2023, 9, 10, tzinfo=UTC),
    "missing_to": datetime(2023, 9, 14, tzinfo=UTC),
}


@pytest.fixture(params=["flow", "stage"])
def station(request, db):
    make_agency(decimal_sign=",")
    keeper = make_person("keeper")
    if request.param == "flow":
        return world.make_flow_station(keeper, make_person("approver"), **GAP)
    return world.make_stage_station(keeper)


def test_a_compiled_edition_prints_its_content_and_carries_its_data(station):
    given = {"station": station, "year": world.YEAR, "by": make_person("publisher")}
    edition = services.compile_edition(**given, language="de", **WHEN)
    content, values = book.compile_book(station, world.YEAR, edition=EDITION, language="de")
    pdf = edition.pdf.open("rb").read()
    edition.pdf.close()
    printed = set(text_of(pdf).replace("≥ ", "").split())
    texts = {word for n in numbers_in(content.daily) for word in n.text.replace("≥ ", "").split()}
    assert {text for text in texts if not any(text in word for word in printed)} == set()
    again = services.compile_edition(**given, language="de", **WHEN)
    assert again.pdf.name == edition.pdf.name  # the same bytes, since files bear their hash
    with pikepdf.open(io.BytesIO(pdf)) as document:
        (kept,) = document.attachments.values()
        assert kept.obj.EF.F.read_bytes() == values
        assert str(document.Root.Lang) == "de"
        assert "/StructTreeRoot" in document.Root
        assert document.check_pdf_syntax() == []
    rows = editions.issued_rows(edition)
    assert rows == daily_csv.read(values).rows
    assert edition.days_given == sum(row.value is not None for row in rows)
