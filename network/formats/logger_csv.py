"""A logger's file → instants, stages and a list of the rows that could not be read."""

import io
from collections import deque
from collections.abc import Iterator
from concurrent.futures import Future, ThreadPoolExecutor
from dataclasses import dataclass
from itertools import chain
from typing import BinaryIO

import numpy as np
import numpy.typing as npt

from network.formats.faults import FileFault, RowFault
from network.formats.faults import sentence as _
from network.formats.logger_profile import Layout, Profile, lay_out
from network.formats.logger_rows import Rows, read_rows
from network.formats.text_encoding import Progress, TextBlock, TextReader

MAX_BYTES = 200_000_000
PARSERS = 2  # threads; the parser leaves the interpreter free most of the time


@dataclass(frozen=True)
class LoggerFile:
    """What a file holds: readings in order of time, each instant once.

    `times_s` int64 epoch seconds UTC, `values_m` float64 metres. `rows_read` counts rows that are
    not blank, `rows_missing` those whose value is declared missing. `sha256` is of the bytes.
    """

    times_s: npt.NDArray[np.int64]
    values_m: npt.NDArray[np.float64]
    faults: tuple[RowFault, ...]
    rows_read: int
    rows_missing: int
    size_bytes: int
    sha256: str
    encoding: str
    delimiter: str


def read(
    stream: BinaryIO,
    profile: Profile,
    *,
    max_bytes: int = MAX_BYTES,
    progress: Progress | None = None,
) -> LoggerFile:
    """Read a logger's file from a stream of bytes, by blocks.

    `progress` is called with the bytes done and the bytes in all (None where unknown). Where an
    instant stands twice the later row counts; the earlier is a fault if its value differs. A row
    earlier than the one before it is sorted in and reported, unless the whole file runs backwards.
    Raises FileFault, with a sentence: nothing of the file can be used, or more than half cannot.
    """
    reader = TextReader(stream, encoding=profile.encoding, max_bytes=max_bytes, progress=progress)
    layout, parts = _parsed(iter(reader), profile)
    if layout is None:
        raise FileFault(_("The file has a header but no rows."))
    if not any(len(part.times_s) or part.faults for part in parts):
        raise FileFault(_("Every row of the file is marked as missing."))
    return _assemble(parts, reader=reader, layout=layout)


def _parsed(blocks: Iterator[TextBlock], profile: Profile) -> tuple[Layout | None, list[Rows]]:
    """Lay the columns out by the first row and parse block by block; no layout where no row is.

    The next blocks are read and hashed while those before are parsed.
    """
    header, blocks = _after_header(blocks, profile.header_lines)
    layout, parts = None, list[Rows]()
    parsing = deque[Future[list[Rows]]]()
    with ThreadPoolExecutor(PARSERS) as pool:
        for block in blocks:
            if layout is None and (first_row := _first_row(block)):
                layout = lay_out(profile, names_line=header, first_row=first_row)
            if layout:
                parsing.append(pool.submit(read_rows, block, layout))
            if len(parsing) > PARSERS:
                parts += parsing.popleft().result()
        for parsed in parsing:
            parts += parsed.result()
    return layout, parts


def _after_header(
    blocks: Iterator[TextBlock], header_lines: int
) -> tuple[str, Iterator[TextBlock]]:
    """Take the header off; give its last line and the blocks that follow."""
    last = ""
    for block in blocks:
        taken = min(header_lines, block.line_count)
        lines = io.BytesIO(block.data)
        for _number in range(taken):
            last = lines.readline().decode()
        header_lines -= taken
        if block.line_count > taken:
            rest = TextBlock(lines.read(), block.first_line + taken, block.line_count - taken)
            return last.rstrip("\r\n"), chain([rest], blocks)
    return last.rstrip("\r\n"), blocks


def _first_row(block: TextBlock) -> str:
    """Give the first line that is not blank, "" where all are."""
    lines = (line for line in io.BytesIO(block.data) if line.strip())
    return next(lines, b"").decode().rstrip("\r\n")


def _assemble(parts: list[Rows], *, reader: TextReader, layout: Layout) -> LoggerFile:
    faults = [fault for part in parts for fault in part.faults]
    rows_read = sum(part.rows_read for part in parts)
    _check_enough(faults, rows_read=rows_read)
    times_s = np.concatenate([part.times_s for part in parts])
    values_m = np.concatenate([part.values_m for part in parts])
    if not (np.diff(times_s) > 0).all():
        lines = np.concatenate([np.array(part.lines, np.int64) for part in parts])
        faults += _backward(times_s, values_m=values_m, lines=lines)
        order = np.argsort(times_s, kind="stable")
        times_s, values_m, lines = times_s[order], values_m[order], lines[order]
        last = np.append(np.diff(times_s) > 0, True)
        faults += _replaced(last, times_s=times_s, values_m=values_m, lines=lines)
        times_s, values_m = times_s[last], values_m[last]
    return LoggerFile(
        times_s=times_s,
        values_m=values_m,
        faults=tuple(sorted(faults, key=lambda fault: fault.line)),
        rows_read=rows_read,
        rows_missing=sum(part.rows_missing for part in parts),
        size_bytes=reader.size_bytes,
        sha256=reader.sha256,
        encoding="utf-8" if reader.encoding == "auto" else reader.encoding,
        delimiter=layout.delimiter,
    )


def _check_enough(faults: list[RowFault], *, rows_read: int) -> None:
    """Refuse a file of which more rows fail than pass: the profile is not meant for it."""
    if 2 * len(faults) <= rows_read:
        return
    line, reason = faults[0].line, faults[0].reason
    if len(faults) == rows_read:
        raise FileFault(
            _("No row can be read; line %(line)d: %(reason)s.", line=line, reason=reason)
        )
    raise FileFault(
        _(
            "%(bad)d of %(rows)d rows cannot be read, more than half; line %(line)d: %(reason)s.",
            bad=len(faults),
            rows=rows_read,
            line=line,
            reason=reason,
        )
    )


def _backward(
    times_s: npt.NDArray[np.int64],
    *,
    values_m: npt.NDArray[np.float64],
    lines: npt.NDArray[np.int64],
) -> list[RowFault]:
    """Report each row earlier than the row before it; none where the newest row stands first."""
    steps_s = np.diff(times_s)
    if (steps_s <= 0).all():
        return []
    reason = _("the time goes backwards; the row is sorted in")
    return [
        RowFault(int(lines[i]), _shown(times_s[i], values_m[i]), reason, kept=True)
        for i in np.flatnonzero(steps_s < 0) + 1
    ]


def _replaced(
    last: npt.NDArray[np.bool_],
    *,
    times_s: npt.NDArray[np.int64],
    values_m: npt.NDArray[np.float64],
    lines: npt.NDArray[np.int64],
) -> list[RowFault]:
    """Report rows whose instant stands again further down with another value (`last` is False)."""
    losers, winners = np.flatnonzero(~last), np.flatnonzero(last)
    winners = winners[np.searchsorted(winners, losers)]
    differ = values_m[losers] != values_m[winners]
    return [
        RowFault(
            int(lines[i]),
            _shown(times_s[i], values_m[i]),
            _("the same time stands again in line %(line)d, which counts", line=int(lines[j])),
        )
        for i, j in zip(losers[differ], winners[differ], strict=True)
    ]


def _shown(time_s: np.int64, value_m: np.float64) -> str:
    return f"{np.datetime64(int(time_s), 's')}Z {value_m:g} m"
