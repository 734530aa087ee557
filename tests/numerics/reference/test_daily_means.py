"""Unit values to daily means against USGS figures (reference README, section 7)."""

import csv
import gzip
import json
from collections import Counter
from datetime import date

import numpy as np
import pytest

from network.numerics.ratings.curves import TableCurve, flow
from network.numerics.ratings.rating import RatingPeriod, rate
from network.numerics.records.blocks import decode_many, encode
from network.numerics.records.readings import Readings, split_by_month
from network.numerics.years.daily import daily_means, day_starts
from tests.numerics.reference.figures import FOOT_M, FT3S_M3S, last_digit, rounded
from tests.reference import reference_file

FILES = "data/usgs_01589330_2018-06_{}"
STANDARD, CIVIL = -300, -240  # minutes from UTC
GAP_LIMIT_S = 7200


def read_rows(name):
    path = reference_file(FILES.format(name))
    packed = path.read_bytes()
    text = (gzip.decompress(packed) if path.suffix == ".gz" else packed).decode()
    return list(csv.DictReader(text.splitlines()))


def stored_m(feet):
    """Store stages as the series does: in metres, to the tenth of a millimetre."""
    return np.round(np.array(feet, float) * FOOT_M, 4)


@pytest.fixture(scope="module")
def readings():
    """The stages of June 2018, once through the codec, as the program keeps them."""
    rows = read_rows("uv_5min.csv.gz")
    times = np.array([row["datetime_utc"].rstrip("Z") for row in rows], "datetime64[s]")
    stage_m = np.array([float(row["gage_height_ft"]) for row in rows]) * FOOT_M
    received = Readings(times.astype(np.int64), stage_m, np.zeros(len(rows), np.uint8))
    return decode_many(encode(month) for month in split_by_month(received).values())


@pytest.fixture(scope="module")
def curve():
    """The agency's own pairs of stage and flow as a rating table."""
    rows = read_rows("stage_discharge_pairs.csv")
    stages_m = stored_m([row["gage_height_ft"] for row in rows])
    return TableCurve(
        stages_m=stages_m,
        flows_m3s=np.array([float(row["discharge_ft3s"]) for row in rows]) * FT3S_M3S,
        lowest_use_m=stages_m[0],
        highest_use_m=stages_m[-1],
    )


@pytest.fixture(scope="module")
def published_ft3s():
    """The agency's daily means of June; 1 July is incomplete and left out."""
    return [float(row["daily_mean_discharge_ft3s"]) for row in read_rows("dv.csv")[:30]]


def june(utc_offset_minutes):
    return day_starts(date(2018, 6, 1), 30, utc_offset_minutes=utc_offset_minutes)


def means_m3s(readings, curve, edges_s):
    rated = rate(
        readings.times_s,
        readings.values_m,
        periods=[RatingPeriod(0, curve)],
        gap_limit_s=GAP_LIMIT_S,
    )
    days = daily_means(
        rated.times_s,
        rated.flow_m3s,
        marks=rated.marks,
        edges_s=edges_s,
        gap_limit_s=GAP_LIMIT_S,
    )
    assert not days.marks.any()
    return days.mean


def by_day(values, readings, edges_s):
    """Average the values of each day, as one should not."""
    bounds = np.searchsorted(readings.times_s, edges_s)
    return np.add.reduceat(values[: bounds[-1]], bounds[:-1]) / np.diff(bounds)


def equal_days(found_m3s, published_ft3s):
    found = [rounded(mean_m3s / FT3S_M3S) for mean_m3s in found_m3s]
    return sum(a == b for a, b in zip(found, published_ft3s, strict=True))


def days_within_one_unit(found_m3s, published_ft3s):
    """Compare in m³/s as printed (3 figures, at most 3 decimals) within the coarser last digit."""
    within = 0
    for mean_m3s, mean_ft3s in zip(found_m3s, published_ft3s, strict=True):
        unit_m3s = max(float(last_digit(mean_m3s)), 0.001)
        printed_m3s = round(rounded(mean_m3s), 3)
        coarser_m3s = max(unit_m3s, float(last_digit(mean_ft3s)) * FT3S_M3S)
        within += abs(printed_m3s - mean_ft3s * FT3S_M3S) <= coarser_m3s
    return within


def test_the_file_is_the_one_described(readings, curve):
    assert len(readings) == 8928
    assert len(curve.stages_m) == 266


def test_june_2018_is_reproduced_on_the_standard_time_day(readings, curve, published_ft3s):
    found_m3s = means_m3s(readings, curve, june(STANDARD))
    assert equal_days(found_m3s, published_ft3s) >= 27
    assert days_within_one_unit(found_m3s, published_ft3s) == 30


def test_the_civil_day_fails(readings, curve, published_ft3s):
    assert equal_days(means_m3s(readings, curve, june(CIVIL)), published_ft3s) == 5


def test_the_plain_mean_of_the_values_fails(readings, curve, published_ft3s):
    flow_m3s, _ = flow(curve, readings.values_m)
    assert equal_days(by_day(flow_m3s, readings, june(STANDARD)), published_ft3s) == 21


def test_rating_the_mean_stage_is_wrong_by_half_on_10_june(readings, curve, published_ft3s):
    mean_stage_m = by_day(readings.values_m, readings, june(STANDARD))
    found_m3s, _ = flow(curve, mean_stage_m)
    errors = np.abs(found_m3s / FT3S_M3S / published_ft3s - 1)
    assert errors.argmax() + 1 == 10
    assert errors.max() == pytest.approx(0.51, abs=0.005)
    assert equal_days(found_m3s, published_ft3s) < 27


@pytest.mark.parametrize(
    ("name", "first_day", "civil_counts", "whole_days"),
    [
        # ends at 23:45 civil = 22:45 standard: the third standard day lacks its last hour
        ("start", date(2018, 3, 10), [96, 92, 96], 2),
        ("end", date(2018, 11, 3), [96, 100, 96], 3),
    ],
)
def test_clock_changes_leave_standard_days_whole(name, first_day, civil_counts, whole_days):
    text = reference_file(f"data/usgs_json_{name}DST.json").read_text()
    values = json.loads(text)["value"]["timeSeries"][0]["values"][0]["value"]
    stamps = [row["dateTime"] for row in values]
    assert list(Counter(stamp[:10] for stamp in stamps).values()) == civil_counts
    times_s = np.array([np.datetime64(stamp[:19]) for stamp in stamps]).astype(np.int64)
    times_s -= np.array([int(stamp[-6:-3]) * 3600 for stamp in stamps])
    edges_s = day_starts(first_day, 3, utc_offset_minutes=STANDARD)
    assert np.diff(np.searchsorted(times_s, edges_s)).tolist()[:whole_days] == [96] * whole_days
