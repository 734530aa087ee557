"""Daily means of a station ↔ CSV text, the same bytes every time."""

import csv
import datetime as dt
import io
import math
from dataclasses import dataclass, fields

from network.formats.faults import FileFault
from network.formats.faults import sentence as _

COLUMNS = ("date", "value", "marks")
# Marks are words, not codes; none of them holds this sign.
BETWEEN_MARKS = "; "


@dataclass(frozen=True)
class DailyHead:
    """What a reader must know beside the numbers; each a line of text."""

    station: str
    quantity: str
    unit: str
    clock: str
    licence: str


@dataclass(frozen=True)
class DailyRow:
    """A day by the date on which it starts, its mean (None if missing) and its marks in words."""

    date: dt.date
    value: float | None
    marks: tuple[str, ...] = ()


@dataclass(frozen=True)
class DailyTable:
    """Head and days of a file."""

    head: DailyHead
    rows: tuple[DailyRow, ...]


def write(table: DailyTable) -> bytes:
    """Write a table as UTF-8: lines "# key: text", a line of column names, one line a day.

    A value is written with the fewest digits that read back as the same float; a missing one is
    empty. Raises ValueError for what would not read back: a line break or blank ends in the head,
    a value that is not finite, an empty mark or one with "; ".
    """
    text = io.StringIO()
    for field in fields(DailyHead):
        line = getattr(table.head, field.name)
        if line != " ".join(line.split()):
            raise ValueError(f"{field.name} must be one line without surplus blanks: {line!r}")
        text.write(f"# {field.name}: {line}\n")
    rows = csv.writer(text, lineterminator="\n")
    rows.writerow(COLUMNS)
    rows.writerows(_cells(row) for row in table.rows)
    return text.getvalue().encode()


def _cells(row: DailyRow) -> tuple[str, str, str]:
    if row.value is not None and not math.isfinite(row.value):
        raise ValueError(f"{row.date}: {row.value} is not a daily mean")
    for mark in row.marks:
        if mark != " ".join(mark.split()) or not mark or BETWEEN_MARKS in mark:
            raise ValueError(f"{row.date}: {mark!r} is not a mark")
    value = "" if row.value is None else repr(float(row.value))
    return row.date.isoformat(), value, BETWEEN_MARKS.join(row.marks)


def read(data: bytes) -> DailyTable:
    """Read what `write` wrote.

    Raises FileFault with the line that is not as it should be.
    """
    try:
        lines = data.decode().split("\n")
    except UnicodeDecodeError:
        raise FileFault(_("The file is not UTF-8.")) from None
    names = [field.name for field in fields(DailyHead)]
    head = DailyHead(*(_head_line(lines, index, name) for index, name in enumerate(names)))
    if lines[len(names) : len(names) + 1] != [",".join(COLUMNS)]:
        raise FileFault(_("Line %(line)d must be: date,value,marks", line=len(names) + 1))
    first = len(names) + 2
    body = [(number, line) for number, line in enumerate(lines[first - 1 :], first) if line]
    return DailyTable(head, tuple(_row(number, line) for number, line in body))


def _head_line(lines: list[str], index: int, name: str) -> str:
    start = f"# {name}: "
    if index >= len(lines) or not lines[index].startswith(start):
        raise FileFault(
            _("Line %(line)d must begin with “%(start)s”.", line=index + 1, start=start)
        )
    return lines[index].removeprefix(start)


def _row(number: int, line: str) -> DailyRow:
    try:
        date, value, marks = next(csv.reader([line], strict=True))
        mean = float(value) if value else None
        if mean is not None and not math.isfinite(mean):
            raise ValueError
        return DailyRow(
            dt.date.fromisoformat(date), mean, tuple(marks.split(BETWEEN_MARKS)) if marks else ()
        )
    except (ValueError, csv.Error):
        raise FileFault(
            _("Line %(line)d is no day: “%(text)s”", line=number, text=line[:100])
        ) from None
