"""A logger on civil time: what its zone leaves open is named, all else becomes UTC."""

import io
import json

import numpy as np
import pytest

from network.formats.logger_csv import LoggerFile, read
from network.formats.logger_profile import Profile
from tests.reference import reference_file

NEW_YORK = {"clock": "America/New_York", "header_lines": 0}


def read_rows(rows: list[str], **profile: object) -> LoggerFile:
    return read(io.BytesIO("\n".join(rows).encode()), Profile(**profile))


def published(name: str) -> list[tuple[str, str]]:
    """Give time (with its own offset) and value of a public-domain 15-minute series of 2018."""
    data = json.loads(reference_file(f"data/{name}.json").read_text())
    values = data["value"]["timeSeries"][0]["values"][0]["value"]
    return [(row["dateTime"], row["value"]) for row in values]


def days_of(file: LoggerFile, offset_s: int) -> list[int]:
    return np.unique((file.times_s + offset_s) // 86_400, return_counts=True)[1].tolist()


@pytest.mark.parametrize("name", ["usgs_json_startDST", "usgs_json_endDST"])
def test_standard_days_have_96_values_over_both_clock_changes(name):
    rows = [f"{time},{value}" for time, value in published(name)]
    file = read_rows(rows, header_lines=0)
    assert file.faults == ()
    # Civil days of 92 or 100 values; the first and last standard day are cut by one hour.
    whole = days_of(file, -5 * 3600)[1:-1]
    assert whole
    assert set(whole) == {96}
    assert set(np.diff(file.times_s).tolist()) == {900}


def test_in_spring_civil_time_loses_no_value():
    series = published("usgs_json_startDST")
    civil = read_rows([f"{time[:19]},{value}" for time, value in series], **NEW_YORK)
    absolute = read_rows([f"{time},{value}" for time, value in series], header_lines=0)
    assert civil.faults == ()
    np.testing.assert_array_equal(civil.times_s, absolute.times_s)


def test_in_autumn_the_hour_that_happens_twice_is_refused_by_row():
    series = published("usgs_json_endDST")
    civil = read_rows([f"{time[:19]},{value}" for time, value in series], **NEW_YORK)
    assert len(civil.faults) == 8  # four values before and four after the clock goes back
    assert len(civil.times_s) == 292 - 8
    line = next(n for n, (time, _) in enumerate(series, 1) if time[:16] == "2018-11-04T01:30")
    assert str(civil.faults[2]) == (
        f"line {line}: 01:30 on 4 November 2018 happens twice in this zone"
    )


@pytest.mark.parametrize("time_format", ["ISO", "%Y-%m-%d %H:%M"])
def test_the_hour_that_does_not_exist_is_refused_by_row(time_format):
    rows = [f"2018-03-11 {clock},1" for clock in ("01:45", "02:30", "03:00")]
    file = read_rows(rows, **NEW_YORK, time_format=time_format)
    assert [str(f) for f in file.faults] == [
        "line 2: 02:30 on 11 March 2018 does not exist in this zone"
    ]
    assert np.diff(file.times_s).tolist() == [900]


def test_a_format_with_an_offset_needs_no_clock():
    rows = ["04.11.18 01:30 -0400,1", "04.11.18 01:30 -0500,1"]
    file = read_rows(rows, header_lines=0, time_format="%d.%m.%y %H:%M %z")
    # 2018-11-04 05:30 UTC, by `date -u -d '2018-11-04 05:30' +%s`
    assert file.times_s.tolist() == [1_541_309_400, 1_541_313_000]


def test_a_dash_before_the_minutes_is_no_offset():
    rows = ["04.11.2018 01-15,1", "04.11.2018 01-30,1", "04.11.2018 01-45,1", "x,1"]
    file = read_rows(rows, header_lines=0, time_format="%d.%m.%Y %H-%M", clock=60)
    # 2018-11-04 00:15 UTC, by `date -u -d '2018-11-04 00:15' +%s`
    assert file.times_s.tolist() == [1_541_290_500, 1_541_291_400, 1_541_292_300]


def test_fractions_of_a_second_are_dropped():
    file = read_rows(["1969-12-31 23:59:59.75,1", "1970-01-01 00:00:00.25,1"], header_lines=0)
    assert file.times_s.tolist() == [-1, 0]
