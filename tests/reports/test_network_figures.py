"""Figures of the network for a period: counted by hand, on the screen, as CSV and as PDF."""

import csv
import io
from datetime import date, timedelta

import numpy as np
import pypdfium2
import pytest
from django.urls import reverse

from network.models import OperationPeriod, StationYear
from network.numerics.years.daily import DailyExtremes
from network.queries import station_years
from network.queries.flows import StationDays
from network.queries.network_figures import Period, figures
from network.services import rounds
from reports.network_figures import page, table
from tests.people import make_station
from tests.work_rows import gauged, noon, rated, recorded, reviewed, visited

pytestmark = pytest.mark.django_db
YEAR = Period(date(2024, 1, 1), date(2024, 12, 31))
AT = noon(date(2025, 1, 10))


def year_with_gap(station, missing):
    """Keep the daily figures of 2024 with the first days missing."""
    days = 366
    none, never = np.full(days, np.nan), np.zeros(days, np.int64)
    flow = np.ones(days)
    flow[:missing] = np.nan
    packed = StationDays(
        days=np.arange("2024-01-01", "2025-01-01", dtype="M8[D]"), flow_m3s=flow,
        stage_m=flow.copy(), marks=np.zeros(days, np.uint8), covered_s=never.copy(),
        estimated_percent=none.copy(), stage=DailyExtremes(none, never, none, never),
        flow=DailyExtremes(none, never, none, never),
    )  # fmt: skip
    StationYear.objects.create(
        station=station, first_day=date(2024, 1, 1), record_version=station.record_version,
        data=station_years.pack(packed), days_present=days - missing, days_in_year=days,
    )  # fmt: skip


@pytest.fixture
def network(agency, station, office, manager):
    """Four visits and three gaugings in 2024, a stop, 61 days missing, a review till June."""
    for month in (2, 5, 8, 11):
        visited(station, date(2024, month, 1), manager)
    visited(station, date(2025, 1, 1), manager)
    rated(station, date(2020, 1, 1), manager)
    for month, stage_m in ((3, 0.2), (6, 0.3), (9, 1.9)):
        row = gauged(station, date(2024, month, 1), manager)
        row.signed_stage_m = stage_m
        row.save()
    march = rounds.save_round(
        name="March", office=office, first_day=date(2024, 3, 1), last_day=date(2024, 3, 1),
        by=manager, at=AT,
    )  # fmt: skip
    rounds.add_stop(round=march, station=station, by=manager, at=AT)
    recorded(station, date(2023, 1, 1), date(2024, 12, 31))
    reviewed(station, date(2024, 6, 30), manager)
    year_with_gap(station, 61)
    return station


def test_a_station_is_counted_as_by_hand(network):
    (row,) = figures(YEAR, at=AT).stations
    assert (row.days_run, row.visits, row.stops, row.gaugings) == (366, 4, 1, 3)
    assert row.planned_visits == pytest.approx(366 / 42)
    assert row.wanted_gaugings == pytest.approx(6 * 366 / 365.25)
    assert row.gaugings_by_band == (2, 0, 1, 0)  # thirds of 0 to 2 m
    assert (row.days_known, row.days_present) == (366, 305)
    assert row.completeness_percent == pytest.approx(100 * 305 / 366)
    assert row.unreviewed_days == (AT.date() - date(2024, 6, 30)).days


def test_a_station_that_closed_is_planned_for_the_days_it_ran(network):
    OperationPeriod.objects.update(closed_on=date(2024, 2, 11))
    (row,) = figures(YEAR, at=AT).stations
    assert row.days_run == 42
    assert row.planned_visits == 1


def test_stale_years_are_not_counted(network):
    network.record_version += 1
    network.save()
    (row,) = figures(YEAR, at=AT).stations
    assert row.completeness_percent is None


def test_an_office_sums_its_stations_and_what_is_overdue(network, office):
    make_station(office, code="TE-020", name="Au")
    found = figures(YEAR, at=AT)
    (row,) = found.offices
    assert (row.stations, row.visits, row.gaugings) == (2, 4, 3)
    assert row.overdue == sum(found.overdue_by_kind.values()) > 0
    assert row.completeness_percent == pytest.approx(100 * 305 / 366)


def test_the_csv_has_a_line_a_station_and_no_formula(network):
    network.name = "=1+1"
    network.save()
    rows = list(csv.reader(io.StringIO(table.csv_of(figures(YEAR, at=AT)).decode())))
    assert rows[0] == ["# period", "2024-01-01", "2024-12-31"]
    line = dict(zip(rows[1], rows[2], strict=True))
    assert line["name"] == "'=1+1"
    assert (line["visits"], line["completeness_percent"]) == ("4", "83.3")


def test_the_pdf_has_two_pages_with_the_same_figures(network):
    pdf = pypdfium2.PdfDocument(page.pdf_of(figures(YEAR, at=AT)))
    texts = [one.get_textpage().get_text_range() for one in pdf]
    pdf.close()
    assert len(texts) == 2
    assert "Oberau" in texts[0]
    assert "83.3" in texts[1]


def test_staff_see_them_for_any_period_and_a_wrong_one_is_refused(client, network, field_person):
    address = reverse("reports:network_figures")
    assert client.get(address).url.startswith(reverse("admin:login"))
    client.force_login(field_person)
    shown = client.get(address, {"first": "2024-01-01", "last": "2024-12-31"}).content.decode()
    assert "83.3" in shown
    wrong = client.get(address, {"first": "2024-12-31", "last": "2024-01-01"})
    assert "not before the first" in wrong.content.decode()
    for ending, kind in (("csv", "text/csv; charset=utf-8"), ("pdf", "application/pdf")):
        file = client.get(reverse("reports:network_figures_file", args=[ending]))
        assert file["Content-Type"] == kind


def test_an_empty_network_has_figures_too(agency, manager):
    found = figures(YEAR, at=AT - timedelta(days=1))
    assert (found.stations, found.offices) == ((), ())
    assert page.pdf_of(found).startswith(b"%PDF")
