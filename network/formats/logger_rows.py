"""One block of lines → instants and values: fast where all is well, line by line where not."""

import csv
import io
import re
from collections.abc import Iterable, Iterator
from dataclasses import dataclass
from itertools import compress

import numpy as np
import numpy.typing as npt
import pandas as pd

from network.formats.faults import RowFault, Sentence
from network.formats.faults import sentence as _
from network.formats.logger_profile import UNITS_PER_M, WHITE_SPACE, Layout, Profile, split_cells
from network.formats.logger_times import (
    CLOCK_WORDS,
    NO_TIME,
    epoch_seconds,
    pandas_format,
    parse_times,
    why_no_time,
)
from network.formats.text_encoding import TextBlock

# No water stands higher above any zero; tenths of a millimetre up to here fit into 32 bits.
LARGEST_M = 100_000.0
TEXT_KEPT = 200
# So few lines that one bad row costs little, so many that calling the parser does not count.
PIECE_LINES = 1_000
NUMBER = re.compile(r"[+-]?(\d+\.?\d*|\.\d+)([eE][+-]?\d+)?", re.ASCII)
NOT_A_NUMBER = ("nan", "+nan", "-nan", "inf", "+inf", "-inf", "infinity", "+infinity", "-infinity")

Columns = tuple[npt.NDArray[np.int64], npt.NDArray[np.float64]]


@dataclass(frozen=True, slots=True)
class Rows:
    """The good rows of a block in file order, its faults, and how many rows it had."""

    times_s: npt.NDArray[np.int64]
    values_m: npt.NDArray[np.float64]
    lines: npt.NDArray[np.int64] | range
    faults: tuple[RowFault, ...]
    rows_read: int
    rows_missing: int


def read_rows(block: TextBlock, layout: Layout) -> list[Rows]:
    """Read one block by the C parser, smaller pieces where it stumbles, and those line by line."""
    columns = _columns(block, layout)
    if columns is not None:
        return [_checked(columns, block=block, layout=layout)]
    if block.line_count <= PIECE_LINES:
        return [_line_by_line(_lines(block, range(block.line_count)), layout)]
    return [rows for piece in _pieces(block) for rows in read_rows(piece, layout)]


def _pieces(block: TextBlock) -> Iterator[TextBlock]:
    lines = block.data.split(b"\n")[: block.line_count]
    size = -(-block.line_count // 8)
    for start in range(0, block.line_count, size):
        some = lines[start : start + size]
        yield TextBlock(b"\n".join(some) + b"\n", block.first_line + start, len(some))


def _checked(columns: Columns, *, block: TextBlock, layout: Layout) -> Rows:
    """Keep the rows that make sense and read the others again one by one."""
    times_s, values_m = columns
    good = _plausible(times_s, layout) & (np.abs(values_m) < LARGEST_M)
    if good.all():
        # A range, not an array: new memory is what costs most here.
        lines = range(block.first_line, block.first_line + block.line_count)
        return Rows(times_s, values_m, lines, (), block.line_count, 0)
    odd = _line_by_line(_lines(block, np.flatnonzero(~good).tolist()), layout)
    numbers = np.concatenate([block.first_line + np.flatnonzero(good), odd.lines])
    order = np.argsort(numbers)
    return Rows(
        np.concatenate([times_s[good], odd.times_s])[order],
        np.concatenate([values_m[good], odd.values_m])[order],
        numbers[order],
        odd.faults,
        int(np.count_nonzero(good)) + odd.rows_read,
        odd.rows_missing,
    )


def _columns(block: TextBlock, layout: Layout) -> Columns | None:
    """Read times and values of all lines at once; None where the parser stumbles or might err.

    NO_TIME and NaN mark rows to look at again.
    """
    if _has_clock_word(block.data) or _has_odd_columns(block, layout):
        return None
    try:
        frame = _parse(block.data, layout)
        times_s = epoch_seconds(_time_column(frame, layout), layout.profile)
    except ValueError:  # pandas: its ParserError is one too
        return None
    if len(frame) != block.line_count:
        return None
    values_m = frame[str(layout.value_index)].to_numpy(np.float64)
    if layout.profile.unit != "m":
        values_m = values_m / UNITS_PER_M[layout.profile.unit]
    return times_s, values_m


def _plausible(times_s: npt.NDArray[np.int64], layout: Layout) -> npt.NDArray[np.bool_]:
    plausible: npt.NDArray[np.bool_] = times_s >= layout.profile.earliest_s
    plausible &= times_s <= layout.profile.latest_s
    return plausible


def _has_clock_word(data: bytes) -> bool:
    if b"o" not in data and b"O" not in data:  # "now" and "today" both have one: a cheap look
        return False
    lower = data.lower()
    return any(word.encode() in lower for word in CLOCK_WORDS)


def _has_odd_columns(block: TextBlock, layout: Layout) -> bool:
    """Count separators: with surplus columns the parser would silently read the first ones."""
    if layout.delimiter == WHITE_SPACE:
        return False
    separators = np.count_nonzero(np.frombuffer(block.data, np.uint8) == ord(layout.delimiter))
    return bool(separators != (layout.column_count - 1) * block.line_count)


def _parse(data: bytes, layout: Layout) -> pd.DataFrame:
    """Give the columns read, named by their index as text: pandas counts numbers otherwise."""
    profile, value = layout.profile, str(layout.value_index)
    times = [str(index) for index in layout.time_indices]
    one_time = len(times) == 1
    return pd.read_csv(
        io.BytesIO(data),
        sep=r"\s+" if layout.delimiter == WHITE_SPACE else layout.delimiter,
        header=None,
        names=[str(index) for index in range(layout.column_count)],
        index_col=False,
        usecols=[*times, value],
        dtype={value: np.float64} | ({} if one_time else dict.fromkeys(times, object)),
        parse_dates=times if one_time else False,
        date_format=pandas_format(profile) if one_time else None,
        decimal=profile.decimal,
        keep_default_na=False,
        na_filter=bool(profile.missing),
        na_values={value: list(profile.missing)} if profile.missing else None,
        skip_blank_lines=False,
        engine="c",
        low_memory=False,  # the block is small already
    )


def _time_column(frame: pd.DataFrame, layout: Layout) -> pd.Series:
    columns = [frame[str(index)] for index in layout.time_indices]
    if len(columns) == 1:
        # A column with one text that is no time stays text; pandas would later guess its format.
        if not pd.api.types.is_datetime64_any_dtype(columns[0]):
            raise ValueError("not a column of times")
        return columns[0]
    return pd.to_datetime(columns[0] + " " + columns[1], format=pandas_format(layout.profile))


def _line_by_line(numbered: Iterable[tuple[int, str]], layout: Layout) -> Rows:
    rows: list[tuple[int, str, str, float]] = []
    faults: list[RowFault] = []
    rows_read = rows_missing = 0
    for number, line in numbered:
        if not line.strip():
            continue
        rows_read += 1
        time_text, value_m = _time_and_value(line, layout)
        if isinstance(value_m, Sentence):
            faults.append(RowFault(number, line[:TEXT_KEPT], value_m))
        elif value_m is None:
            rows_missing += 1
        else:
            rows.append((number, line, time_text, value_m))
    times_s = parse_times([row[2] for row in rows], layout.profile)
    good = _plausible(times_s, layout)
    for row, time_s in compress(zip(rows, times_s, strict=True), ~good):
        why = _implausible if time_s != NO_TIME else why_no_time
        faults.append(RowFault(row[0], row[1][:TEXT_KEPT], why(row[2], layout.profile)))
    return Rows(
        times_s[good],
        np.array([row[3] for row in rows], np.float64)[good],
        np.array([row[0] for row in rows], np.int64)[good],
        tuple(sorted(faults, key=lambda fault: fault.line)),
        rows_read,
        rows_missing,
    )


def _lines(block: TextBlock, indices: Iterable[int]) -> Iterator[tuple[int, str]]:
    """Yield number and text of the lines at those places in the block."""
    lines = block.data.split(b"\n")
    for index in indices:
        yield block.first_line + index, lines[index].decode().rstrip("\r")


def _implausible(text: str, profile: Profile) -> Sentence:
    first, last = (np.datetime64(at, "s") for at in (profile.earliest_s, profile.latest_s))
    return _(
        "the time “%(text)s” does not lie between %(first)s and %(last)s",
        text=text[:60],
        first=str(first.astype("datetime64[D]")),
        last=str(last.astype("datetime64[D]")),
    )


def _time_and_value(line: str, layout: Layout) -> tuple[str, float | Sentence | None]:
    """Give a row's time text and its value in m, None if declared missing, or what is wrong."""
    try:
        cells = split_cells(line, layout.delimiter)
    except csv.Error:
        return "", _("the quotes in the row do not close")
    if len(cells) <= max(*layout.time_indices, layout.value_index):
        return "", _("too few columns in the row: %(n)d", n=len(cells))
    if any(cell.strip() for cell in cells[layout.column_count :]):
        return "", _(
            "the row has %(n)d columns, the first one %(first)d",
            n=len(cells),
            first=layout.column_count,
        )
    time_text = " ".join(cells[index] for index in layout.time_indices)
    return time_text, _value_m(cells[layout.value_index], layout)


def _value_m(cell: str, layout: Layout) -> float | Sentence | None:
    profile = layout.profile
    text = cell.strip()
    if text in profile.missing:
        return None
    point = text.replace(",", ".") if profile.decimal == "," and "." not in text else text
    if not text:
        return _("the value is empty")
    if text.lower() in NOT_A_NUMBER:
        return _("the value “%(text)s” is not a number", text=text)
    if not NUMBER.fullmatch(point) or (profile.decimal == "," and "." in text):
        return _("the value “%(text)s” cannot be read as a number", text=text[:60])
    value = float(point)
    if value in layout.missing_values:
        return None
    if abs(value) / UNITS_PER_M[profile.unit] >= LARGEST_M:
        return _("the value “%(text)s” is too large to be a stage", text=text[:60])
    return value / UNITS_PER_M[profile.unit]
