"""A logger's file is read whole, or in part with each odd row named, or refused with a sentence."""

import datetime as dt
import hashlib
import io
import subprocess
import sys
from pathlib import Path

import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st

from network.formats import logger_rows
from network.formats.faults import FileFault
from network.formats.logger_csv import LoggerFile, read
from network.formats.logger_profile import Profile

ROOT = Path(__file__).resolve().parents[2]
HEAD = "time,level\n"
# 2018-11-04 00:00 UTC, by `date -u -d 2018-11-04 +%s`
DAY_S = 1_541_289_600


def read_text(text: str | bytes, **profile: object) -> LoggerFile:
    data = text if isinstance(text, bytes) else text.encode()
    return read(io.BytesIO(data), Profile(**profile))


def rows_of(file: LoggerFile) -> list[tuple[int, float]]:
    return list(zip((file.times_s - DAY_S).tolist(), file.values_m.tolist(), strict=True))


TWO = [(0, 1.234), (900, 1.235)]


@pytest.mark.parametrize(
    ("data", "profile"),
    [
        pytest.param(HEAD + "2018-11-04 00:00,1.234\n2018-11-04 00:15,1.235\n", {}, id="plain"),
        pytest.param(HEAD + "2018-11-04T00:00Z,1.234\n2018-11-04T00:15Z,1.235", {"clock": 60},
                     id="own offset overrules the clock; no line feed at the end"),
        pytest.param(HEAD + "2018-11-04T01:00+01:00,1.234\n2018-11-04T00:15Z,1.235", {},
                     id="mixed offsets"),
        pytest.param(HEAD + "2018-11-04 01:00,1.234\n2018-11-04 01:15,1.235\n", {"clock": 60},
                     id="fixed offset"),
        pytest.param(HEAD + "2018-11-04 00:00,1.234\r\n2018-11-04 00:15,1.235\r\n\r\n\r\n", {},
                     id="CRLF and blank lines at the end"),
        pytest.param('"time","level"\n"2018-11-04 00:00","1.234"\n2018-11-04 00:15,"1.235"\n',
                     {"time_columns": ("time",), "value_column": "level"}, id="quotes"),
        pytest.param("﻿Zeit;Wasserstand\n04.11.2018 00:00;123,4\n04.11.2018 00:15;123,5\n",
                     {"time_columns": ("Zeit",), "value_column": "Wasserstand", "decimal": ",",
                      "unit": "cm", "time_format": "%d.%m.%Y %H:%M"},
                     id="UTF-8 mark, decimal comma, cm"),
        pytest.param("Wasserstände;é\n2018-11-04 00:00;1234\n2018-11-04 00:15;1235\n".encode(
                     "latin-1"), {"time_columns": ("Wasserstände",), "value_column": "é",
                                  "unit": "mm"}, id="Latin-1 header, mm"),
        pytest.param("zeit\thöhe\n2018-11-04 00:00\t1.234\n2018-11-04 00:15\t1.235\n".encode(
                     "utf-16"), {"value_column": "höhe"}, id="UTF-16 with mark, tab"),
        pytest.param(b"\xfe\xff" + "a;b\n2018-11-04;1.234\n2018-11-04 00:15;1.235".encode(
                     "utf-16-be"), {}, id="UTF-16 big end first"),
        pytest.param("no\ndate hour x m\n2018-11-04 00:00  9 1.234\n 2018-11-04 00:15 9 1.235\n",
                     {"header_lines": 2, "time_columns": ("date", "hour"),
                      "value_column": "m"}, id="date and hour between white space"),
        pytest.param("1.234;7;2018-11-04 00:00\n1.235;;2018-11-04 00:15\n",
                     {"header_lines": 0, "time_columns": (3,), "value_column": 1},
                     id="value before time, no header"),
        pytest.param(HEAD + "2018-11-04 00:15,1.235\n2018-11-04 00:00,1.234\n", {},
                     id="newest first"),
        pytest.param(HEAD + "2018-11-04,1.234\n2018-11-04 00:05,-9999.0\n2018-11-04 00:06,---\n"
                     "2018-11-04 00:15,1.235\n", {"missing": ("-9999", "---")}, id="missing"),
        pytest.param(HEAD + "2018-11-04,1.234\n2018-11-04,1.234\n2018-11-04 00:15,1.235\n", {},
                     id="the same row twice"),
    ],
)  # fmt: skip
def test_the_same_two_readings_come_out_of_every_way_of_writing_them(data, profile):
    file = read_text(data, **profile)
    assert rows_of(file) == TWO
    assert file.faults == ()


GOOD = "".join(f"2018-11-04 00:{minute:02},1.5\n" for minute in range(10))


@pytest.mark.parametrize(
    ("row", "reason"),
    [
        ("2018-11-04 00:30,", "the value is empty"),
        ("2018-11-04 00:30,NaN", "the value “NaN” is not a number"),
        ("2018-11-04 00:30,inf", "the value “inf” is not a number"),
        ("2018-11-04 00:30,1e400", "the value “1e400” is too large to be a stage"),
        ("2018-11-04 00:30,1_0", "the value “1_0” cannot be read as a number"),
        ("2018-11-04 00:30,ERR", "the value “ERR” cannot be read as a number"),
        ("2018-11-04 00:30,1,25", "the row has 3 columns, the first one 2"),
        ("2018-11-04 00:3", "too few columns in the row: 1"),
        ("2018-11-31 00:30,1.5", "“2018-11-31 00:30” is no time in the format ISO"),
        ("04/11/2018 00:30,1.5", "“04/11/2018 00:30” is no time in the format ISO"),
        ("now,1.5", "“now” is no time in the format ISO"),
        (",1.5", "the time is empty"),
        ("NaT,1.5", "“NaT” is no time in the format ISO"),
        ("3024-01-01,1.5", "the time “3024-01-01” does not lie between 1800-01-01 and 2200-01-01"),
        ('"2018-11-04 00:30,1.5', "the quotes in the row do not close"),
    ],
)
def test_a_row_that_cannot_be_read_is_named_and_the_others_kept(row, reason):
    file = read_text(HEAD + GOOD + row + "\n2018-11-04 01:00,2.5\n")
    assert [(f.line, f.text, str(f.reason), f.kept) for f in file.faults] == [
        (12, row, reason, False)
    ]
    assert len(file.times_s) == 11
    assert file.values_m[-1] == 2.5
    assert file.rows_read == 12


def test_a_bad_row_deep_in_a_file_has_its_own_line_number():
    rows = [f"2018-11-{day:02} {hour:02}:{minute:02},1" for day in range(1, 15)
            for hour in range(24) for minute in range(60)]  # fmt: skip
    rows[12_345] += "x"
    file = read_text(HEAD + "\n".join(rows))
    assert [(fault.line, fault.text) for fault in file.faults] == [(12_347, rows[12_345])]
    assert len(file.times_s) == len(rows) - 1
    assert set(np.diff(file.times_s).tolist()) == {60, 120}


def test_a_reason_can_be_translated():
    (fault,) = read_text(HEAD + GOOD + "2018-11-04 00:30,ERR\n").faults
    assert fault.reason.template % fault.reason.values == fault.reason
    assert fault.reason.values == {"text": "ERR"}
    assert str(fault) == "line 12: the value “ERR” cannot be read as a number"


def test_a_format_is_never_guessed():
    with pytest.raises(FileFault, match="no time in the format ISO"):
        read_text(HEAD + "01/02/2018 00:00,1\n01/02/2018 00:15,1\n")


def test_of_two_rows_of_one_time_the_later_counts_and_the_earlier_is_named():
    file = read_text(HEAD + "2018-11-04 00:00,1\n2018-11-04 00:05,2\n2018-11-04 00:05,3\n")
    assert rows_of(file) == [(0, 1.0), (300, 3.0)]
    (fault,) = file.faults
    assert str(fault) == "line 3: the same time stands again in line 4, which counts"
    assert fault.text == "2018-11-04T00:05:00Z 2 m"


def test_a_time_that_goes_backwards_is_sorted_in_and_reported():
    file = read_text(HEAD + "2018-11-04 00:00,1\n2018-11-04 00:10,3\n2018-11-04 00:05,2\n")
    assert rows_of(file) == [(0, 1.0), (300, 2.0), (600, 3.0)]
    assert [(f.line, f.kept) for f in file.faults] == [(4, True)]


def test_thousands_of_faults_are_all_listed():
    rows = "".join(f"2018-11-04 {i // 60:02}:{i % 60:02},{'x' * (i % 2)}1\n" for i in range(1440))
    file = read_text(HEAD + rows * 5)
    dropped = [fault.line for fault in file.faults if not fault.kept]
    assert len(dropped) == 3600
    assert dropped[:2] == [3, 5]


class Endless(io.RawIOBase):
    """A stream of given size that never holds more than what is asked for."""

    def __init__(self, size: int, row: bytes, seekable: bool = False) -> None:
        self.left, self.row, self.most, self._seekable = size, row, 0, seekable

    def readable(self) -> bool:
        return True

    def seekable(self) -> bool:
        return self._seekable

    def tell(self) -> int:
        return 0

    def seek(self, offset: int, whence: int = 0) -> int:
        return self.left if whence == 2 else 0

    def read(self, size: int = -1) -> bytes:
        take = min(self.left, size)
        self.left -= take
        self.most = max(self.most, take)
        return (self.row * (take // len(self.row) + 1))[:take]


@pytest.mark.parametrize(
    ("data", "profile", "sentence"),
    [
        (b"", {}, "The file is empty."),
        (b"\xef\xbb\xbf", {}, "The file has a header but no rows."),
        (HEAD, {}, "The file has a header but no rows."),
        (HEAD + "\n \n", {}, "The file has a header but no rows."),
        (b"\x89PNG\r\n\x1a\n\x00\x00", {}, "The file is binary, or UTF-16 without"),
        (b"PK\x03\x04abc\n", {}, "The file is binary"),
        ("a;b\n1;2\n".encode("utf-16-le"), {}, "The file is binary, or UTF-16 without"),
        ("a;b\n".encode("utf-16") + b"\x00\xd8a\x00", {}, "it is not UTF-16"),
        (b"a;b\n\xe9;1\n", {"encoding": "utf-8"}, "Near line 1 the file is not UTF-8"),
        (HEAD + GOOD, {"value_column": "stage"}, "no column “stage”; the header has: time, level"),
        ("a,a\n" + GOOD, {"value_column": "a"}, "The column “a” stands there twice"),
        (HEAD + GOOD, {"value_column": 4}, "The first row has 2 columns, the profile wants col"),
        (HEAD + GOOD, {"time_columns": (2,), "value_column": 1},
         "No row can be read; line 2: the value “2018-11-04 00:00” cannot be read as a number."),
        (HEAD + GOOD + "x,1\n" * 11, {}, "11 of 21 rows cannot be read, more than half; line 12"),
        (HEAD + "2018-11-04,-\n", {"missing": ("-",)}, "Every row of the file is marked as mis"),
        (HEAD + "," * 300 + "\n", {}, "The file has 301 columns; at most 200 are read."),
        (HEAD + GOOD + "9" * 10_001 + "\n", {}, "Line 12 is longer than 10000 characters"),
        (HEAD + GOOD * 9000 + "9" * 10_001 + "\n", {}, "Line 90002 is longer than 10000 char"),
    ],
)  # fmt: skip
def test_a_file_that_is_no_logger_file_is_refused_with_a_sentence(data, profile, sentence):
    with pytest.raises(FileFault) as refusal:
        read_text(data, **profile)
    assert sentence in str(refusal.value)


@pytest.mark.parametrize(
    ("profile", "sentence"),
    [
        ({"time_columns": ()}, "Name one column for the time"),
        ({"delimiter": ",", "decimal": ","}, "cannot separate the columns"),
        ({"unit": "ft"}, "the unit m, cm or mm"),
        ({"encoding": "ebcdic"}, "The encoding “ebcdic” is not known"),
        ({"value_column": 0}, "Columns count from 1"),
        ({"header_lines": 0, "value_column": "x"}, "only where there is a header line"),
        ({"value_column": 1}, "Time and value cannot stand in the same column"),
        ({"clock": "Nowhere/Town"}, "The civil zone “Nowhere/Town” is not known"),
        ({"clock": 900}, "within 14 hours"),
        ({"time_format": "%H:%M"}, "“%H:%M” is no format of a date and time"),
        ({"time_format": "%d.%m.%Y %Q"}, "is no format of a date and time"),
    ],
)
def test_a_profile_that_contradicts_itself_is_refused(profile, sentence):
    with pytest.raises(FileFault, match=sentence):
        Profile(**profile)


def test_a_line_of_100_mb_is_refused_without_being_loaded():
    stream = Endless(100_000_000, b"9")
    with pytest.raises(FileFault, match="Line 1 is longer than 10000 characters"):
        read(stream, Profile())
    assert stream.left > 95_000_000


@pytest.mark.parametrize("seekable", [True, False])
def test_a_file_of_201_mb_is_refused(seekable):
    stream = Endless(201_000_000, b"2018-11-04,1.5\n", seekable)
    sentence = "larger than 200 MB" if seekable else "larger than 1 MB"
    with pytest.raises(FileFault, match=sentence):
        read(stream, Profile(), max_bytes=200_000_000 if seekable else 1_500_000)


def test_progress_and_hash_cover_every_byte():
    data = (HEAD + GOOD * 20_000).encode()
    seen = []
    file = read(io.BytesIO(data), Profile(), progress=lambda *done: seen.append(done))
    assert seen[-1] == (len(data), len(data))
    assert len(seen) > 1
    assert file.sha256 == hashlib.sha256(data).hexdigest()
    assert (file.size_bytes, file.encoding, file.delimiter) == (len(data), "utf-8", ",")


def test_letters_outside_utf_8_may_first_appear_far_down():
    data = (HEAD + GOOD * 20_000).encode() + "2018-11-04 00:20,2 # Böe\n".encode("latin-1")
    file = read_text(data)
    assert file.encoding == "cp1252"
    assert [fault.text for fault in file.faults if not fault.kept] == ["2018-11-04 00:20,2 # Böe"]


times = st.integers(-2_000_000_000, 4_000_000_000)
series = st.dictionaries(times, st.integers(-99_999_999, 99_999_999), min_size=1, max_size=40)


@given(series, st.sampled_from(["m", "cm", "mm"]), st.sampled_from(",."), st.integers(-840, 840))
def test_any_series_written_is_read_back_equal(series, unit, decimal, clock):
    """Whole units and two decimals: exact on both sides, since both round once."""
    written = dict(sorted(series.items()))
    lines = []
    for time_s, hundredths in written.items():
        local = dt.datetime(1970, 1, 1) + dt.timedelta(seconds=time_s, minutes=clock)
        value = f"{'-' * (hundredths < 0)}{abs(hundredths) // 100}.{abs(hundredths) % 100:02}"
        lines.append(f"{local};{value.replace('.', decimal)}")
    text = "\n".join(["time;level", *lines])
    if unit == "m":  # beyond 100 km no stage is read
        written = {t: v for t, v in written.items() if abs(v) < 10_000_000}
    profile = Profile(unit=unit, decimal=decimal, clock=clock)
    if 2 * len(written) < len(lines):
        with pytest.raises(FileFault):
            read(io.BytesIO(text.encode()), profile)
        return
    file = read(io.BytesIO(text.encode()), profile)
    assert file.times_s.tolist() == list(written)
    per_m = {"m": 1, "cm": 100, "mm": 1000}[unit]
    assert file.values_m.tolist() == [v / 100 / per_m for v in written.values()]


row_texts = st.sampled_from(
    [
        "2018-11-04 00:00,1.5", "2018-11-04 00:05,-9999", "2018-11-04 00:10:00.5,+2", "",
        "2018-11-04T00:15Z,3", "3024-01-01,1", "2018-11-04 01:30, 4", "2018-3-11 2:30,5", " ",
    ]
)  # fmt: skip


@given(st.lists(row_texts, min_size=1), st.sampled_from([60, "America/New_York"]))
def test_reading_line_by_line_gives_what_reading_at_once_gives(rows, clock):
    text = HEAD + GOOD.replace("11-04", "11-05") * 10 + "\n".join(rows)
    profile = {"clock": clock, "missing": ("-9999",)}
    at_once = read_text(text, **profile)
    with pytest.MonkeyPatch.context() as patch:
        patch.setattr(logger_rows, "_columns", lambda block, layout: None)
        by_line = read_text(text, **profile)
    np.testing.assert_array_equal(at_once.times_s, by_line.times_s)
    np.testing.assert_array_equal(at_once.values_m, by_line.values_m)
    assert at_once.faults == by_line.faults
    assert (at_once.rows_read, at_once.rows_missing) == (by_line.rows_read, by_line.rows_missing)


MEMORY = """
import io, resource
from numpy import arange
from network.formats.logger_csv import read
from network.formats.logger_profile import Profile
class Rows(io.RawIOBase):
    # A million rows a minute apart, made as they are asked for.
    done, rest = 0, b"time,level\\n"
    def readable(self): return True
    def read(self, size=-1):
        while len(self.rest) < size and self.done < 1_000_000:
            times = arange(self.done, self.done + 10_000).astype("datetime64[m]")
            self.rest += ",1.234\\n".join([*times.astype(str), ""]).encode()
            self.done += 10_000
        part, self.rest = self.rest[:size], self.rest[size:]
        return part
read(io.BytesIO(b"t,v\\n2018-01-01,1\\n"), Profile())
before = resource.getrusage(resource.RUSAGE_SELF).ru_maxrss
file = read(Rows(), Profile())
assert len(file.times_s) == 1_000_000, len(file.times_s)
print((resource.getrusage(resource.RUSAGE_SELF).ru_maxrss - before) // 1024)
"""


def test_a_million_rows_grow_the_process_by_less_than_300_mb():
    done = subprocess.run(
        [sys.executable, "-c", MEMORY], cwd=ROOT, capture_output=True, text=True, check=False
    )
    assert done.returncode == 0, done.stderr
    assert int(done.stdout) < 300
