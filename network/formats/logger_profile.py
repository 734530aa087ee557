"""How to read one kind of logger file: columns, clock, unit and signs."""

import csv
import datetime as dt
from contextlib import suppress
from dataclasses import dataclass
from functools import cached_property
from typing import Literal
from zoneinfo import ZoneInfo

from network.formats.faults import FileFault
from network.formats.faults import sentence as _

MAX_COLUMNS = 200
WHITE_SPACE = "white space"
DELIMITERS = ("auto", ",", ";", "\t", WHITE_SPACE)
ENCODINGS = ("auto", "utf-8", "cp1252", "utf-16")
UNITS_PER_M = {"m": 1.0, "cm": 100.0, "mm": 1000.0}
# A fixed offset lies between the last and the first island of the date line.
OFFSET_LIMIT_MINUTES = 14 * 60


@dataclass(frozen=True)
class Profile:
    """Say how the rows of a logger file are to be understood.

    `time_columns` names one column, or a date and a time column; a column is a number from 1 or
    a name standing in the last header line. `time_format` is "ISO" or a strptime format. `clock`
    is an offset from UTC in minutes, or the name of a civil zone; a time that carries its own
    offset overrules it. Values equal to one of `missing` are absent on purpose and no fault.
    `earliest_s` and `latest_s` bound plausible instants, in epoch seconds UTC.

    Raises FileFault for a profile that contradicts itself.
    """

    time_columns: tuple[int | str, ...] = (1,)
    value_column: int | str = 2
    time_format: str = "ISO"
    delimiter: str = "auto"
    header_lines: int = 1
    decimal: Literal[".", ","] = "."
    unit: Literal["m", "cm", "mm"] = "m"
    encoding: str = "auto"
    clock: int | str = 0
    missing: tuple[str, ...] = ()
    earliest_s: int = -5_364_662_400  # 1800-01-01, before the oldest records on paper
    latest_s: int = 7_258_118_400  # 2200-01-01

    def __post_init__(self) -> None:
        """Refuse what cannot be meant."""
        if len(self.time_columns) not in (1, 2):
            raise FileFault(_("Name one column for the time, or two: date and time."))
        if self.delimiter not in DELIMITERS or self.delimiter == self.decimal:
            raise FileFault(_("“%(sign)s” cannot separate the columns.", sign=self.delimiter))
        if self.decimal not in (".", ",") or self.unit not in UNITS_PER_M:
            raise FileFault(_("The decimal sign is . or , and the unit m, cm or mm."))
        if self.encoding not in ENCODINGS:
            raise FileFault(_("The encoding “%(name)s” is not known.", name=self.encoding))
        if self.header_lines < 0 or any(isinstance(c, int) and c < 1 for c in self.columns):
            raise FileFault(_("Columns count from 1, header lines from 0."))
        if not self.header_lines and any(isinstance(c, str) for c in self.columns):
            raise FileFault(_("Columns can be named only where there is a header line."))
        if self.value_column in self.time_columns:
            raise FileFault(_("Time and value cannot stand in the same column."))
        self._check_clock()
        self._check_time_format()

    def _check_time_format(self) -> None:
        if self.time_format == "ISO":
            return
        sample = dt.datetime(2019, 11, 23, tzinfo=dt.UTC)
        try:
            back = dt.datetime.strptime(sample.strftime(self.time_format), self.time_format)
        except ValueError:
            back = dt.datetime.min
        if back.date() != sample.date():
            raise FileFault(
                _("“%(format)s” is no format of a date and time.", format=self.time_format)
            )

    def _check_clock(self) -> None:
        if isinstance(self.clock, str):
            try:
                ZoneInfo(self.clock)
            except (KeyError, ValueError, OSError):
                raise FileFault(
                    _("The civil zone “%(name)s” is not known.", name=self.clock)
                ) from None
        elif abs(self.clock) > OFFSET_LIMIT_MINUTES:
            raise FileFault(_("A clock's offset lies within 14 hours of UTC."))

    @property
    def columns(self) -> tuple[int | str, ...]:
        """Give all columns that are read, the value last."""
        return (*self.time_columns, self.value_column)


@dataclass(frozen=True)
class Layout:
    """A profile met with a file: the delimiter found and the columns as indices from 0."""

    profile: Profile
    delimiter: str
    time_indices: tuple[int, ...]
    value_index: int
    column_count: int

    @cached_property
    def missing_values(self) -> frozenset[float]:
        """Give the numbers among the missing-value texts: -9999.0 is as absent as -9999."""
        numbers = set()
        for text in self.profile.missing:
            with suppress(ValueError):
                numbers.add(float(text))
        return frozenset(numbers)


def split_cells(line: str, delimiter: str) -> list[str]:
    """Split one line into cells, which may stand in quotes.

    Raises csv.Error where quotes do not close.
    """
    if '"' not in line:
        return line.split(None if delimiter == WHITE_SPACE else delimiter)
    if delimiter == WHITE_SPACE:
        line, delimiter = " ".join(line.split()), " "
    return next(csv.reader([line], delimiter=delimiter, strict=True))


def lay_out(profile: Profile, *, names_line: str, first_row: str) -> Layout:
    """Find the columns of a profile in a file.

    `names_line` is the last header line (may be empty), `first_row` the first row of data.
    Raises FileFault: a name is not there, stands there twice, or the row has too few columns.
    """
    delimiter = profile.delimiter
    if delimiter == "auto":
        candidates = [d for d in ("\t", ";", ",") if d in first_row and d != profile.decimal]
        delimiter = candidates[0] if candidates else WHITE_SPACE
    try:
        count = len(split_cells(first_row, delimiter))
        names = [name.strip() for name in split_cells(names_line, delimiter)]
    except csv.Error:
        raise FileFault(_("The quotes in the header or the first row do not close.")) from None
    if count > MAX_COLUMNS:
        raise FileFault(
            _("The file has %(n)d columns; at most %(most)d are read.", n=count, most=MAX_COLUMNS)
        )
    indices = [_index(column, names=names) for column in profile.columns]
    if max(indices) >= count:
        raise FileFault(
            _(
                "The first row has %(n)d columns, the profile wants column %(wanted)d: “%(row)s”",
                n=count,
                wanted=max(indices) + 1,
                row=first_row[:100],
            )
        )
    return Layout(profile, delimiter, tuple(indices[:-1]), indices[-1], count)


def _index(column: int | str, *, names: list[str]) -> int:
    if isinstance(column, int):
        return column - 1
    hits = [i for i, name in enumerate(names) if name == column.strip()]
    if not hits:
        there = ", ".join(names)[:300]
        raise FileFault(
            _("There is no column “%(name)s”; the header has: %(there)s", name=column, there=there)
        )
    if len(hits) > 1:
        raise FileFault(
            _("The column “%(name)s” stands there twice; give its number.", name=column)
        )
    return hits[0]
