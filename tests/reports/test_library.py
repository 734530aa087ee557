"""The public library: what is issued and nothing else, without logging in."""

from datetime import UTC, datetime

import pytest
from django.urls import reverse

from reports import rendering, services
from reports.models import Edition
from tests.records import make_person as make_keeper
from tests.reports import world

pytestmark = pytest.mark.django_db
WHEN = {"at": datetime(2024, 2, 1, 10, tzinfo=UTC)}


@pytest.fixture
def compiled(monkeypatch, agency, publisher):
    monkeypatch.setattr(rendering, "render", world.small_pdf)
    station = world.make_flow_station(make_keeper("keeper"), make_keeper("approver"))
    return services.compile_edition(station=station, year=world.YEAR, by=publisher, **WHEN)


@pytest.fixture
def issued(compiled, publisher):
    return services.issue(edition=compiled, by=publisher, reason="the review follows", **WHEN)


def files_of(edition):
    return [reverse(f"reports:{kind}", args=[edition.pk]) for kind in ("pdf", "csv")]


def body(response):
    return b"".join(response.streaming_content)


def test_an_empty_library_says_so(client, agency):
    assert "No yearbook has been issued yet." in client.get("/").content.decode()


def test_before_issue_nothing_is_public(client, compiled):
    assert compiled.station.name not in client.get("/").content.decode()
    assert [client.get(address).status_code for address in files_of(compiled)] == [404, 404]


def test_an_issued_yearbook_is_listed_with_both_files(client, issued):
    page = client.get("/").content.decode()
    assert issued.station.name in page
    for address in files_of(issued):
        assert address in page


def test_the_pdf_is_shown_and_the_data_are_saved_under_names_for_readers(client, issued):
    pdf, csv = (client.get(address) for address in files_of(issued))
    assert pdf["Content-Type"] == "application/pdf"
    assert pdf["Content-Disposition"] == 'inline; filename="QA-010_2023_edition-1.pdf"'
    assert csv["Content-Type"] == "text/csv; charset=utf-8"
    assert csv["Content-Disposition"] == 'attachment; filename="QA-010_2023_edition-1.csv"'
    assert body(pdf).startswith(b"%PDF")
    assert b"2023-01-01" in body(csv)


def test_headers_forbid_what_no_page_needs(client, issued):
    page = client.get("/")
    policy = page["Content-Security-Policy"]
    assert "default-src 'none'" in policy
    assert "unsafe" not in policy
    for response in (page, *(client.get(address) for address in files_of(issued))):
        assert response["X-Content-Type-Options"] == "nosniff"
        assert response["X-Frame-Options"] == "DENY"
        assert "public" in response["Cache-Control"]
        assert not response.cookies
        response.close()


def test_a_superseded_edition_leaves_the_library(client, issued, publisher):
    services.compile_and_issue(
        station=issued.station, year=world.YEAR, by=publisher, reason="the review follows",
        superseding="a gauge was moved", **WHEN,
    )  # fmt: skip
    assert client.get(files_of(issued)[0]).status_code == 404
    later = Edition.objects.get(number=2)
    assert files_of(later)[0] in client.get("/").content.decode()


def test_a_volume_is_public(client, issued, publisher):
    volume = services.bind(bound=[issued], title="Quill basin", by=publisher, **WHEN)
    address = reverse("reports:volume", args=[volume.pk])
    assert address in client.get("/").content.decode()
    response = client.get(address)
    assert response["Content-Disposition"] == f'inline; filename="volume_2023_{volume.pk}.pdf"'
    response.close()


def test_a_lost_file_is_not_found(client, issued):
    issued.pdf.storage.delete(issued.pdf.name)
    assert client.get(files_of(issued)[0]).status_code == 404


def test_other_methods_are_refused(client, issued):
    assert client.post("/").status_code == 405
    assert client.post(files_of(issued)[0]).status_code == 405


def test_the_page_counts_its_queries_not_its_editions(
    client, issued, publisher, django_assert_max_num_queries
):
    with django_assert_max_num_queries(12):
        client.get("/")
