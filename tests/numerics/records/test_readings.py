"""Records in time order: refused when they are none, joined, and cut at the months."""

import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st

from network.numerics.records.readings import (
    Readings,
    ReadingsError,
    merge,
    no_readings,
    split_by_month,
)


def record(times_s, values_m=None, flags=None):
    n = len(times_s)
    return Readings(
        np.array(times_s, np.int64),
        np.array(range(n) if values_m is None else values_m, np.float64),
        np.zeros(n, np.uint8) if flags is None else np.array(flags, np.uint8),
    )


def rows(readings):
    columns = (readings.times_s, readings.values_m, readings.flags)
    return list(zip(*(column.tolist() for column in columns), strict=True))


records = st.lists(
    st.tuples(st.integers(-(10**9), 4 * 10**9), st.integers(-99_999, 99_999), st.integers(0, 255)),
    unique_by=lambda row: row[0],
    max_size=40,
).map(
    lambda found: record(
        sorted(t for t, _, _ in found),
        [v / 1000 for _, v, _ in found],
        [f for _, _, f in found],
    )
)


@pytest.mark.parametrize(
    ("times_s", "values_m", "sentence"),
    [
        ([0, 20, 10], [1, 2, 3], "Reading 2 is earlier"),
        ([0, 10, 10], [1, 2, 3], "Reading 2 has the same time"),
        ([0, 10, 20], [1, np.nan, 3], "value of reading 1 is not a number"),
        ([0, 10, 20], [1, 2, np.inf], "value of reading 2 is not a number"),
        ([0, 10], [1, 2, 3], "differ in number"),
    ],
)
def test_what_is_no_record_is_refused_and_the_reading_named(times_s, values_m, sentence):
    with pytest.raises(ReadingsError, match=sentence):
        Readings(np.array(times_s), np.array(values_m, float), np.zeros(len(values_m), np.uint8))


def test_where_two_records_have_one_time_the_newer_reading_stays():
    merged = merge(record([0, 60, 120], [1, 2, 3]), record([60, 90], [9, 8], [4, 0]))
    assert rows(merged) == [(0, 1.0, 0), (60, 9.0, 4), (90, 8.0, 0), (120, 3.0, 0)]


@given(records, records)
def test_merging_the_same_again_changes_nothing(older, newer):
    once = merge(older, newer)
    assert rows(merge(once, newer)) == rows(once)
    assert rows(merge(once, no_readings())) == rows(merge(no_readings(), once)) == rows(once)


def test_months_are_those_of_utc():
    # 1709251199 is 2024-02-29 23:59:59 UTC, one second before March of a leap year
    months = split_by_month(record([1704067200, 1709251199, 1709251200]))
    assert {month: part.times_s.tolist() for month, part in months.items()} == {
        (2024, 1): [1704067200],
        (2024, 2): [1709251199],
        (2024, 3): [1709251200],
    }


def test_the_month_before_the_epoch_is_december():
    assert list(split_by_month(record([-1, 0]))) == [(1969, 12), (1970, 1)]


def test_nothing_has_no_months():
    assert split_by_month(no_readings()) == {}


@given(records)
def test_the_months_together_are_the_record(readings):
    joined = no_readings()
    for part in split_by_month(readings).values():
        joined = merge(joined, part)
    assert rows(joined) == rows(readings)
