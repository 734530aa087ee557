"""The codec of a month of readings: a few kilobytes of bytes, and the arrays they stand for."""

import struct
import zlib
from collections.abc import Iterable, Sequence
from typing import Any, NamedTuple

import numpy as np
import numpy.typing as npt
from isal import isal_zlib

from network.numerics.arrays import Floats, MarkBits, Seconds
from network.numerics.records.readings import Readings, ReadingsError, no_readings

MAGIC = b"GWRB"
VERSION = 1
HEADER = struct.Struct("<4sBBIqqI")  # magic, version, decimals, count, first time, first value, CRC
PACKED = struct.Struct("<BI")  # width in bytes and count of a packed array
COARSE_DECIMALS, FINE_DECIMALS = 3, 4  # 1 mm, or 0.1 mm where a reading needs it
FARTHEST_M = 100_000.0  # no stage or elevation lies farther out; differences then fit 32 bits
LONGEST_STEP_S = 2**32 - 1

WIDTHS = {width: np.dtype(f"<u{width}") for width in (1, 2, 4)}
ZERO, ONE = np.zeros(1, np.uint8), np.ones(1, np.uint8)

Unsigned = npt.NDArray[np.unsignedinteger]
Places = npt.NDArray[np.intp]
Whole = npt.NDArray[np.signedinteger]


class BlockError(ValueError):
    """The bytes are not a block this program can read."""


def encode(readings: Readings) -> bytes:
    """Pack readings into bytes, in whole millimetres or, where they need it, tenths.

    Finer digits are rounded away. Raises ReadingsError for values beyond ±100 km or a step of more
    than 136 years. Method: own; zig-zag before the byte planes halves the size.
    """
    units, decimals = _whole_units(readings.values_m)
    steps_s = _differences(readings.times_s)
    if len(steps_s) and _largest(steps_s) > LONGEST_STEP_S:
        raise ReadingsError("Two neighbouring readings are more than 136 years apart.")
    differences = _differences(units)
    zigzag = ((differences << 1) ^ (differences >> 31)).view(np.uint32)
    arrays = (*_runs(steps_s), zigzag, *_runs(readings.flags))
    body = _compressed(b"".join(_pack(array) for array in arrays))
    first = (readings.times_s[0], units[0]) if len(readings) else (0, 0)
    head = (MAGIC, VERSION, decimals, len(readings), *first)
    return HEADER.pack(*head, _checksum(HEADER.pack(*head, 0), body)) + body


def decode(block: bytes | bytearray | memoryview) -> Readings:
    """Unpack one block. Raises BlockError where the bytes are damaged or of a later version."""
    return decode_many([block])


def decode_many(blocks: Iterable[bytes | bytearray | memoryview]) -> Readings:
    """Unpack blocks that follow one another in time into one record.

    Raises BlockError for damaged bytes and ReadingsError where the blocks are out of order.
    """
    opened = [one for one in (_open(memoryview(block)) for block in blocks) if one.readings]
    if not opened:
        return no_readings()
    starts = np.cumsum([0, *(one.readings for one in opened[:-1])])
    columns = _times(opened, starts), _values(opened, starts), _flags(opened)
    in_order = _in_order(opened, starts, columns[0])
    return Readings.known(*columns) if in_order else Readings(*columns)


class _Opened(NamedTuple):
    decimals: int
    readings: int
    first_s: int
    first_unit: int
    steps: Unsigned
    step_counts: Unsigned
    zigzag: Unsigned
    flags: Unsigned
    flag_counts: Unsigned


def _whole_units(values_m: Floats) -> tuple[npt.NDArray[np.int32], int]:
    if len(values_m) and _largest(np.abs(values_m)) > FARTHEST_M:
        raise ReadingsError("A value lies beyond 100 km above or below zero.")
    fine = np.rint(values_m * 10**FINE_DECIMALS).astype(np.int32)
    coarse, tenths = np.divmod(fine, 10 ** (FINE_DECIMALS - COARSE_DECIMALS))
    return (fine, FINE_DECIMALS) if tenths.any() else (coarse, COARSE_DECIMALS)


def _largest(values: npt.NDArray[Any]) -> Any:
    return np.maximum.reduce(values)  # values.max() takes twice as long over a month


def _differences(values: Whole) -> Whole:
    return values[1:] - values[:-1]  # np.diff takes several times as long over a month


def _runs(values: npt.NDArray[np.integer]) -> tuple[Unsigned, Unsigned]:
    """Give each run's value and length."""
    changes = np.flatnonzero(values[1:] != values[:-1]) + 1
    if not len(changes):  # as in most months
        return values[:1].astype(np.uint32), np.array(
            [len(values)] if len(values) else [], np.uint32
        )
    edges = np.concatenate(([0], changes, [len(values)]))
    return values[edges[:-1]].astype(np.uint32), _differences(edges).astype(np.uint32)


def _compressed(data: bytes) -> bytes:
    """Compress by runs and Huffman codes alone: noise has no longer repeats to look for."""
    deflate = zlib.compressobj(1, strategy=zlib.Z_RLE)
    return deflate.compress(data) + deflate.flush()


def _pack(values: Unsigned) -> bytes:
    """Write unsigned numbers as byte planes: all lowest bytes first, as many planes as needed."""
    width = (int(_largest(values)).bit_length() + 7) // 8 if len(values) else 0
    if len(values) == 1:  # as most run lengths are: no planes to lay out
        return PACKED.pack(width, 1) + int(values[0]).to_bytes(width, "little")
    planes = np.ascontiguousarray(values, "<u4").view(np.uint8).reshape(-1, 4)[:, :width].T
    return PACKED.pack(width, len(values)) + planes.tobytes()


def _unpack(body: bytes, start: int) -> tuple[Unsigned, int]:
    """Read one packed array from byte start on; also give the byte after it.

    The array keeps the width it was packed in, so that small numbers stay quick to handle.
    """
    width, count = PACKED.unpack_from(body, start)
    start += PACKED.size
    stop = start + width * count
    if width == 0:
        return np.zeros(count, np.uint8), stop
    if width == 1 or (count == 1 and width in (2, 4)):  # no planes to put together
        return np.frombuffer(body, WIDTHS[width], count, start), stop
    values = np.zeros(count, "<u2" if width == 2 else "<u4")
    planes = np.frombuffer(body, np.uint8, width * count, start).reshape(width, count)
    values.view(np.uint8).reshape(count, values.itemsize)[:, :width] = planes.T
    return values, stop


def _checksum(head: bytes | memoryview, body: bytes | memoryview) -> int:
    """Sum a block as if the four bytes of the sum itself were zero."""
    return zlib.crc32(body, zlib.crc32(bytes(4), zlib.crc32(head[: HEADER.size - 4])))


def _open(block: memoryview) -> _Opened:
    """Check a block's header and checksum and unpack its five arrays."""
    if len(block) < HEADER.size or block[:4] != MAGIC:
        raise BlockError("These bytes are not a block of readings, or its beginning is damaged.")
    _, version, decimals, count, first_s, first_unit, checksum = HEADER.unpack_from(block)
    head, body = block[: HEADER.size], block[HEADER.size :]
    if checksum != _checksum(head, body):
        raise BlockError("The block of readings is damaged: its checksum does not agree.")
    if version != VERSION:
        raise BlockError(
            f"The block of readings has version {version}; this program reads {VERSION}."
        )
    unpacked, at, arrays = isal_zlib.decompress(body), 0, []
    for _ in range(5):
        array, at = _unpack(unpacked, at)
        arrays.append(array)
    return _Opened(decimals, count, first_s, first_unit, *arrays)


# All blocks at once from here on: numpy's own cost for each call would be most of it, block by
# block.
def _times(opened: Sequence[_Opened], starts: Places) -> Seconds:
    steps = _joined([one.steps for one in opened], first=ZERO)
    counts = _joined([one.step_counts for one in opened], first=ONE)
    steps_s = np.repeat(steps, counts).astype(np.int64)
    return _summed_up(steps_s, [one.first_s for one in opened], starts)


def _in_order(opened: Sequence[_Opened], starts: Places, times_s: Seconds) -> bool:
    """Tell whether times rise, by the few steps and the ends of the blocks alone."""
    if any(len(one.steps) and not one.steps.all() for one in opened):
        return False
    return bool((times_s[starts[1:]] > times_s[starts[1:] - 1]).all())


def _values(opened: Sequence[_Opened], starts: Places) -> Floats:
    zigzag = _joined([one.zigzag for one in opened], first=ZERO)
    differences = ((zigzag >> 1) ^ -(zigzag & 1)).view(f"i{zigzag.itemsize}").astype(np.int32)
    units = _summed_up(differences, [one.first_unit for one in opened], starts)
    scales = [10**one.decimals for one in opened]
    one_scale = len(set(scales)) == 1
    by = scales[0] if one_scale else np.repeat(scales, [one.readings for one in opened])
    values_m: Floats = np.divide(units, by, dtype=np.float64)
    return values_m


def _flags(opened: Sequence[_Opened]) -> MarkBits:
    runs = np.concatenate([one.flags for one in opened])
    counts = np.concatenate([one.flag_counts for one in opened])
    return np.repeat(runs, counts).astype(np.uint8, copy=False)


def _joined(parts: Sequence[Unsigned], *, first: Unsigned) -> Unsigned:
    """Join the blocks' arrays, each with a place before it for the block's first reading."""
    return np.concatenate([each for part in parts for each in (first, part)])


def _summed_up(differences: Whole, firsts: Sequence[int], starts: Places) -> Whole:
    """Sum differences in place, each block's from its own first value on."""
    begin = np.array(firsts, differences.dtype)
    last = begin + np.add.reduceat(differences, starts, dtype=differences.dtype)
    differences[starts] = begin - np.append(0, last[:-1])
    return np.add.accumulate(differences, out=differences)
