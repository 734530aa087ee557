"""Field sheets: a page a stop, with what the party must know, and a code that opens its form."""

from datetime import date, timedelta

import pypdfium2
import pytest
from django.urls import reverse

from network.models import PlateZero, StaffPlate
from network.services import plans, rounds
from reports import services
from reports.field_sheets import content, page
from tests.people import make_station
from tests.work_rows import cableway, gauged, noon, visited

pytestmark = pytest.mark.django_db
DAY = date(2024, 3, 1)
AT = noon(DAY)


@pytest.fixture
def march(agency, station, office, manager):
    """A round of two stops; the first has hazards, a plate, a reading, a gauging and a cableway."""
    station.hazards, station.access_notes = "Undercut left bank.", "Key at the mill."
    station.save()
    plate = StaffPlate.objects.create(
        station=station, label="P2", lowest_m=0, highest_m=1.5, installed_at=noon(date(2019, 1, 1))
    )
    PlateZero.objects.create(
        plate=plate, zero_m=1.25, effective_from=noon(date(2019, 1, 1)),
        recorded_at=AT, recorded_by=manager,
    )  # fmt: skip
    visit = visited(station, DAY - timedelta(days=20), manager)
    visit.readings.create(read_at=visit.arrived_at, plate=plate, reading_m=0.4)
    gauged(station, DAY - timedelta(days=20), manager, deviation=-3.5)
    item = cableway(station, DAY, manager)
    plan = rounds.save_round(
        name="March", office=office, first_day=DAY, last_day=DAY, by=manager, at=AT
    )
    second = make_station(office, code="TE-020", name="Au")
    for row, told in ((station, {"by_cableway": True, "tasks": ["oil the sheaves"]}), (second, {})):
        rounds.add_stop(round=plan, station=row, by=manager, at=AT, **told)
    plans.record_inspection(
        item=item, inspected_on=DAY, is_safe=False, remarks="rope", by=manager, at=AT
    )
    return plan


def texts(plan):
    pdf = pypdfium2.PdfDocument(page.pdf_of(content.sheets_of(plan, at=AT)))
    try:
        return [one.get_textpage().get_text_range() for one in pdf]
    finally:
        pdf.close()


def test_every_stop_has_its_page_with_what_the_party_must_know(march):
    first, second = texts(march)
    for said in (
        "1 · TE-010 Mühlsteg", "Undercut left bank.", "never alone", "Key at the mill.",
        "Oil the sheaves", "P2", "1.250", "1.650", "−3.5", "found unsafe on 2024-03-01",
        "UTC+01:00",
    ):  # fmt: skip
        assert said in first, said
    assert "2 · TE-020 Au" in second
    assert "stop 2 of 2" in second


def test_a_reading_made_after_the_print_is_not_on_it(march, station, manager):
    sheets = content.sheets_of(march, at=AT - timedelta(days=60))
    assert sheets.stops[0].readings == ()
    assert sheets.stops[0].gaugings == ()


def test_the_code_holds_the_address_of_the_stops_own_form(march, settings):
    settings.SITE_URL = "https://books.example.org"
    stop = march.stops.first()
    expected = f"https://books.example.org/staff/stop/{stop.form_id}/"
    assert page.address_of(stop) == expected
    assert page.code_of(stop).startswith("<svg")


def test_a_round_without_stops_prints_a_page_that_says_so(agency, office, manager):
    plan = rounds.save_round(
        name="Empty", office=office, first_day=DAY, last_day=DAY, by=manager, at=AT
    )
    (only,) = texts(plan)
    assert "no stop" in only


def test_staff_print_a_round_and_nobody_else(client, march, field_person):
    address = reverse("reports:field_sheets", args=[march.pk])
    assert client.get(address).url.startswith(reverse("admin:login"))
    client.force_login(field_person)
    response = client.get(address)
    assert response["Content-Type"] == "application/pdf"
    assert response.content.startswith(b"%PDF")


def test_where_nothing_can_be_printed_the_page_says_what_to_install(
    client, march, field_person, monkeypatch
):
    def lacking(_name):
        raise OSError("cannot load library 'libpango-1.0-0'")

    monkeypatch.setattr(services, "import_module", lacking)
    client.force_login(field_person)
    response = client.get(reverse("reports:field_sheets", args=[march.pk]))
    assert response.status_code == 503
    assert "libpango" in response.text
