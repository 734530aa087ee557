"""Months, years, extremes and duration against the published archive of one station.

Contains information licensed under the Open Government Licence – Canada.
"""

import csv
from datetime import date

import numpy as np
import pytest

from network.numerics.years.duration import duration_curve, standard_percentiles
from network.numerics.years.water_year import (
    WaterYear,
    month_figures,
    number_text,
    period_figures,
    rounded,
    year_figures,
)
from tests.reference import reference_file

CALENDAR = WaterYear()
AREA_KM2 = 403.0
ODD_MONTH = (1991, 5)  # published 23.1, the mean of its days is 23.159


def rows(name):
    with reference_file(f"data/{name}").open() as stream:
        yield from csv.DictReader(stream)


def number(text):
    return float(text) if text else None


@pytest.fixture(scope="module")
def record():
    lines = [line for line in rows("hydat_daily_flow.csv") if line["station"] == "05AA008"]
    days = np.array([line["date"] for line in lines], dtype="datetime64[D]")
    return days, np.array([float(line["flow_m3s"] or "nan") for line in lines])


def of_year(record, year):
    days, flows = record
    inside = days.astype("datetime64[Y]").astype(int) + 1970 == year
    return days[inside], flows[inside]


def test_every_published_month_is_reproduced(record):
    checked, of_years = 0, {}
    for line in rows("hydat_monthly_flow.csv"):
        year, month = int(line["year"]), int(line["month"])
        if year not in of_years:
            of_years[year] = month_figures(*of_year(record, year), year=year, calendar=CALENDAR)
        ours = of_years[year][month - 1]
        published = number(line["published_monthly_mean"])
        assert (ours.mean is None) == (published is None), (year, month)
        if line["max"]:  # some incomplete months are published without theirs
            assert ours.maximum == number(line["max"])
            assert ours.maximum_day.day == float(line["first_day_max"])
        if published is None:
            continue
        checked += 1
        if (year, month) != ODD_MONTH:
            assert float(rounded(ours.mean)) == published, (year, month)
        assert ours.minimum == number(line["min"])
        assert ours.minimum_day.day == float(line["first_day_min"])
        # the archive keeps totals in single precision, 7 figures
        assert ours.total == pytest.approx(number(line["monthly_total"]), rel=1e-6)
    assert checked > 850


def test_the_known_odd_month_is_odd(record):
    ours = month_figures(*of_year(record, 1991), year=1991, calendar=CALENDAR)[4]
    assert number_text(ours.mean) == "23.2"


def test_every_published_year_is_reproduced_and_an_incomplete_one_keeps_its_maximum_only(record):
    for line in rows("hydat_annual_statistics.csv"):
        if line["STATION_NUMBER"] != "05AA008" or line["DATA_TYPE"] != "Q":
            continue
        if not line["MAX"]:  # complete, but its extremes were left out of the archive
            assert int(line["YEAR"]) == 2019
            continue
        year = int(line["YEAR"])
        ours = year_figures(*of_year(record, year), year=year, calendar=CALENDAR)
        assert ours.maximum == number(line["MAX"])
        assert ours.maximum_day == date(year, int(line["MAX_MONTH"]), int(line["MAX_DAY"]))
        published = number(line["MEAN"])
        assert (ours.mean is None) == (published is None), year
        assert ours.maximum_in_doubt == (published is None)
        if published is not None:
            assert float(rounded(ours.mean)) == published, year
            assert ours.minimum == number(line["MIN"])
            assert ours.minimum_day == date(year, int(line["MIN_MONTH"]), int(line["MIN_DAY"]))


def test_no_instantaneous_peak_lies_below_the_highest_daily_mean(record):
    peaks = [
        (int(line["YEAR"]), float(line["PEAK"]))
        for line in rows("hydat_annual_instant_peaks.csv")
        if line["DATA_TYPE"] == "Q" and line["PEAK_CODE"] == "H" and line["PEAK"]
    ]
    assert len(peaks) > 40
    for year, peak in peaks:
        ours = year_figures(*of_year(record, year), year=year, calendar=CALENDAR)
        assert ours.maximum <= peak, year


def test_the_year_2020_figure_by_figure(record):
    days, flows = of_year(record, 2020)
    months = month_figures(days, flows, year=2020, calendar=CALENDAR)
    published = [
        "1.48",
        "1.47",
        "1.26",
        "4.07",
        "15.2",
        "15.2",
        "6.40",
        "2.96",
        "1.98",
        "1.81",
        "2.03",
        "1.44",
    ]
    assert [number_text(month.mean) for month in months] == published
    year = year_figures(days, flows, year=2020, calendar=CALENDAR)
    assert number_text(year.mean) == "4.61"
    assert (year.minimum, year.minimum_day) == (0.944, date(2020, 11, 30))
    assert (year.maximum, year.maximum_day) == (28.6, date(2020, 6, 1))
    # second-implementation values of the reference README, to the digits given there
    assert year.runoff_mm(AREA_KM2) == pytest.approx(361.87, abs=5e-3)
    assert year.specific_l_s_km2(AREA_KM2) == pytest.approx(11.444, abs=1e-3)
    assert year.volume_hm3 == pytest.approx(145.835, abs=5e-4)
    assert year.lowest_7_day_mean == pytest.approx(1.17143, abs=5e-6)
    assert year.lowest_7_day_last_day == date(2020, 1, 19)


def test_the_duration_of_2020(record):
    found = standard_percentiles(duration_curve(of_year(record, 2020)[1]))
    expected = {5: 17.0, 10: 13.43, 50: 1.915, 90: 1.27, 95: 1.21}
    assert {k: found[k] for k in expected} == pytest.approx(expected, abs=5e-7)


def test_the_nile_at_aswan():
    # statsmodels data set: yearly volumes 1871–1970; taken here as a run of daily values
    lines = list(rows("nile_annual_1871_1970.csv"))
    volumes = np.array([float(line["volume"]) for line in lines])
    years = [int(float(line["year"])) for line in lines]
    figures = period_figures(volumes, first_day=date(1871, 1, 1))
    assert (figures.days_present, figures.minimum, figures.maximum) == (100, 456, 1370)
    assert figures.mean == pytest.approx(919.35, abs=1e-9)
    assert years[(figures.minimum_day - date(1871, 1, 1)).days] == 1913
    assert years[(figures.maximum_day - date(1871, 1, 1)).days] == 1879
