"""Readings come out of their packed months as they went in, and lists never unpack."""

from datetime import UTC, date, datetime, timedelta

import pytest

from network.models import Block
from network.queries import blocks
from tests.records import (
    START,
    logger_text,
    make_person,
    make_profile,
    make_series,
    make_station,
    take,
)

pytestmark = pytest.mark.django_db


@pytest.fixture
def series():
    by = make_person()
    series = make_series(by)
    profile = make_profile(by)
    # 30 January 00:00 to 2 February 06:00 UTC, every six hours, and one reading in May 2023.
    take(logger_text([n / 1000 for n in range(14)]), series=series, profile=profile, by=by)
    may = logger_text([9.0], start=datetime(2023, 5, 5, tzinfo=UTC))
    take(may, series=series, profile=profile, by=by)
    return series


def seconds(*moment):
    return int(datetime(*moment, tzinfo=UTC).timestamp())


def test_readings_from_a_to_b_with_both_ends(series, django_assert_num_queries):
    with django_assert_num_queries(1):
        readings = blocks.read(series.pk, seconds(2024, 1, 31, 18), seconds(2024, 2, 1, 6))
    assert readings.values_m.tolist() == [0.007, 0.008, 0.009]
    assert readings.times_s[0] == seconds(2024, 1, 31, 18)


def test_only_the_months_touched_are_unpacked(series):
    Block.objects.filter(month=date(2024, 2, 1)).update(data=b"damaged")
    readings = blocks.read(series.pk, seconds(2023, 1, 1), seconds(2024, 1, 31, 23))
    assert len(readings) == 9


def test_a_time_without_readings_gives_none(series):
    assert len(blocks.read(series.pk, seconds(2023, 7, 1), seconds(2023, 8, 1))) == 0


def test_lists_and_silences_never_unpack(series):
    Block.objects.update(data=b"damaged")
    assert blocks.extent(series) == blocks.Extent(
        15, 3, datetime(2023, 5, 5, tzinfo=UTC), START + timedelta(hours=78)
    )
    assert [month.count for month in blocks.month_list(series)] == [1, 8, 6]
    # From the last reading of January to the first of February it is 6 hours, over the limit of 3.
    assert blocks.silences(series) == [
        blocks.Silence(datetime(2023, 5, 5, tzinfo=UTC), START),
        blocks.Silence(START + timedelta(hours=42), START + timedelta(hours=48)),
    ]
    assert blocks.days_spanned(series.station) == (date(2023, 5, 5), date(2024, 2, 2))


def test_an_event_logger_is_never_silent_and_an_empty_series_has_no_extent(series):
    series.is_event_logger = True
    assert blocks.silences(series) == []
    empty = make_series(series.imports.first().recorded_by, make_station("QA-020"))
    assert blocks.extent(empty) == blocks.Extent(0, 0, None, None)
    assert blocks.days_spanned(empty.station) is None


def test_months_between_are_all_months_touched():
    months = list(blocks.months_between(START, START + timedelta(days=31)))
    assert months == [date(2024, 1, 1), date(2024, 2, 1), date(2024, 3, 1)]
