"""Daily means written as CSV are the same bytes every time and read back equal."""

import datetime as dt

import pytest
from hypothesis import given
from hypothesis import strategies as st

from network.formats.daily_csv import DailyHead, DailyRow, DailyTable, read, write
from network.formats.faults import FileFault

HEAD = DailyHead(
    station="A12 Quillbeck at Tarnholt",
    quantity="daily mean flow",
    unit="m³/s",
    clock="UTC+01:00, a day starts at 00:00",
    licence="Free to use with the agency's name",
)
TABLE = DailyTable(
    HEAD,
    (
        DailyRow(dt.date(2020, 2, 28), 12.4),
        DailyRow(dt.date(2020, 2, 29), None, ("missing",)),
        DailyRow(dt.date(2020, 3, 1), 0.1, ("estimated", "ice, by winter ratio")),
    ),
)
TEXT = """\
# station: A12 Quillbeck at Tarnholt
# quantity: daily mean flow
# unit: m³/s
# clock: UTC+01:00, a day starts at 00:00
# licence: Free to use with the agency's name
date,value,marks
2020-02-28,12.4,
2020-02-29,,missing
2020-03-01,0.1,"estimated; ice, by winter ratio"
"""

line = st.text(st.characters(exclude_categories=["C", "Z"]), max_size=20)
mark = line.filter(lambda text: text and "; " not in text)
days = st.builds(
    DailyRow,
    st.dates(),
    st.none() | st.floats(allow_nan=False, allow_infinity=False),
    st.lists(mark, max_size=3).map(tuple),
)
tables = st.builds(
    DailyTable, st.builds(DailyHead, line, line, line, line, line), st.lists(days).map(tuple)
)


def test_a_table_is_written_so():
    assert write(TABLE).decode() == TEXT


@given(tables)
def test_any_table_reads_back_equal(table):
    assert read(write(table)) == table


@pytest.mark.parametrize(
    ("old", "new", "sentence"),
    [
        ("# unit", "unit", "Line 3 must begin with “# unit: ”"),
        ("date,value", "day,value", "Line 6 must be: date,value,marks"),
        ("12.4", "12,4", "Line 7 is no day"),
        ("12.4", "nan", "Line 7 is no day"),
        ("2020-02-29", "2021-02-29", "Line 8 is no day: “2021-02-29,,missing”"),
        (TEXT, "", "Line 1 must begin"),
    ],
)
def test_what_was_changed_by_hand_is_refused_by_line(old, new, sentence):
    with pytest.raises(FileFault, match=sentence):
        read(TEXT.replace(old, new, 1).encode())


def test_bytes_that_are_no_text_are_refused():
    with pytest.raises(FileFault, match="not UTF-8"):
        read(b"\xff\xfe")


@pytest.mark.parametrize(
    "table",
    [
        DailyTable(DailyHead("two\nlines", "", "", "", ""), ()),
        DailyTable(HEAD, (DailyRow(dt.date(2020, 1, 1), float("nan")),)),
        DailyTable(HEAD, (DailyRow(dt.date(2020, 1, 1), 1.0, ("a; b",)),)),
        DailyTable(HEAD, (DailyRow(dt.date(2020, 1, 1), 1.0, ("",)),)),
    ],
)
def test_what_would_not_read_back_is_not_written(table):
    with pytest.raises(ValueError, match=r"must be one line|is not a"):
        write(table)
