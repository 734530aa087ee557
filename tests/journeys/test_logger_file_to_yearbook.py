"""The whole way once: a logger file, a rating table, daily means, a yearbook as PDF.

Data: U.S. Geological Survey, station 01589330, June 2018 (public domain): five-minute gage heights,
the agency's own daily means and the stage-to-flow pairs, read as a rating table.
"""

import csv
import gzip
import io
from datetime import UTC, date, datetime, timedelta

import numpy as np
import pypdfium2
import pytest

from network.models import Agency, Block
from network.queries import flows
from network.services import ratings, series
from reports import particulars
from reports.content import book
from reports.rendering import render
from tests.records import make_person, make_profile, make_series, make_station, take
from tests.reference import reference_file

FOOT_M = 0.3048
CUBIC_FOOT_M3 = FOOT_M**3
AT = datetime(2018, 8, 1, tzinfo=UTC)
FIRST, LAST = date(2018, 6, 1), date(2018, 6, 30)

pytestmark = pytest.mark.django_db


def rows_of(name):
    """Read a reference file with a line of column names."""
    return csv.DictReader(io.StringIO(reference_file(name).read_text()))


@pytest.fixture
def published():
    """The agency's own daily means in ft³/s, by day."""
    rows = rows_of("data/usgs_01589330_2018-06_dv.csv")
    return {date.fromisoformat(r["date"]): float(r["daily_mean_discharge_ft3s"]) for r in rows}


@pytest.fixture
def unit_values():
    """Instants and gage heights in metres, rounded to 0.1 mm as the blocks keep them."""
    packed = reference_file("data/usgs_01589330_2018-06_uv_5min.csv.gz").read_bytes()
    rows = csv.DictReader(io.StringIO(gzip.decompress(packed).decode()))
    return [(r["datetime_utc"], round(float(r["gage_height_ft"]) * FOOT_M, 4)) for r in rows]


@pytest.fixture
def rated_station(unit_values):
    """The station with its file imported and its table in force, on the standard-time clock."""
    Agency.objects.create(pk=1, name="Test agency", record_utc_offset_minutes=-300)
    keeper, approver = make_person("keeper"), make_person("approver")
    station = make_station()
    recorder = make_series(keeper, station)
    series.change_series(series=recorder, gap_limit_minutes=60, by=keeper, at=AT)
    text = "time,level\n" + "".join(f"{at},{stage}\n" for at, stage in unit_values)
    take(text, series=recorder, profile=make_profile(keeper), by=keeper, at=AT)
    put_table_in_force(station, author=keeper, approver=approver)
    return station


def put_table_in_force(station, *, author, approver):
    """Draft, approve and start the published stage-to-flow pairs."""
    rows = rows_of("data/usgs_01589330_2018-06_stage_discharge_pairs.csv")
    points = [
        (round(float(r["gage_height_ft"]) * FOOT_M, 4), float(r["discharge_ft3s"]) * CUBIC_FOOT_M3)
        for r in rows
    ]
    version = ratings.draft(
        station=station, number="1",
        relation=ratings.Relation(points=points, form="linear"),
        use=ratings.Use(lowest_use_m=points[0][0], highest_use_m=points[-1][0]),
        reason="published pairs", by=author, at=AT,
    )  # fmt: skip
    ratings.approve(curve=version, by=approver, at=AT)
    ratings.put_in_force(
        station=station, curve=version, effective_from=datetime(2018, 1, 1, tzinfo=UTC),
        reason="published pairs", by=author, at=AT,
    )  # fmt: skip


def coarser_last_digit_m3s(flow_ft3s):
    """One unit of the third figure of a value in ft³/s, or of its third decimal in m³/s."""
    digit_ft3s = 10.0 ** (np.floor(np.log10(flow_ft3s)) - 2)
    return max(digit_ft3s * CUBIC_FOOT_M3, 0.001)


def test_published_daily_means_are_reproduced(rated_station, published):
    days = flows.days_of(rated_station, FIRST, LAST)
    equal = within = 0
    for at, mean in enumerate(days.flow_m3s):
        flow_ft3s = published[FIRST + timedelta(days=at)]
        equal += float(f"{mean / CUBIC_FOOT_M3:.3g}") == flow_ft3s
        within += abs(mean - flow_ft3s * CUBIC_FOOT_M3) <= coarser_last_digit_m3s(flow_ft3s)
    assert equal >= 27  # of 30 at three figures
    assert within == 30  # within one unit of the coarser last digit


def test_the_civil_day_does_not_reproduce_them(rated_station, published):
    Agency.objects.update(record_utc_offset_minutes=-240)  # daylight saving time
    days = flows.days_of(rated_station, FIRST, LAST)
    equal = [
        float(f"{mean / CUBIC_FOOT_M3:.3g}") == published[FIRST + timedelta(days=at)]
        for at, mean in enumerate(days.flow_m3s)
    ]
    assert sum(equal) < 10


def test_the_printed_page_shows_the_daily_means_of_the_content(rated_station):
    content, values = book.compile_book(
        rated_station, 2018,
        edition=particulars.Edition(number=1, compiled_on=date(2018, 8, 1)),
    )  # fmt: skip
    pdf = pypdfium2.PdfDocument(render(content, csv=values))
    text = "\n".join(page.get_textpage().get_text_range() for page in pdf)
    june = content.daily.months[5]
    assert june.first == FIRST
    for cell in june.cells:
        assert cell.text in text
    assert june.mean.text in text
    assert Block.objects.count() == 2  # June, and the first hours of July in UTC
