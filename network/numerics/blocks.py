"""The codec of a month of readings: a few kilobytes of bytes, and the arrays they stand for."""

import struct
import zlib
from collections.abc import Iterable, Sequence
from dataclasses import dataclass

import numpy as np
import numpy.typing as npt

from network.numerics.arrays import Floats, MarkBits, Seconds
from network.numerics.readings import Readings, ReadingsError

MAGIC = b"GWRB"
VERSION = 1
HEADER = struct.Struct("<4sBBIqqI")  # magic, version, decimals, count, first time, first value, CRC
PACKED = struct.Struct("<BI")  # width in bytes and count of a packed array
COARSE_DECIMALS, FINE_DECIMALS = 3, 4  # 1 mm, or 0.1 mm where a reading needs it
FARTHEST_M = 100_000.0  # no stage or elevation lies farther out; differences then fit 32 bits
LONGEST_STEP_S = 2**32 - 1

Unsigned = npt.NDArray[np.uint32]


class BlockError(ValueError):
    """The bytes are not a block this program can read."""


def encode(readings: Readings) -> bytes:
    """Pack readings into bytes, in whole millimetres or, where they need it, tenths.

    Finer digits are rounded away. Raises ReadingsError for values beyond ±100 km or a step of more
    than 136 years. Method: own; zig-zag before the byte planes halves the size.
    """
    units, decimals = _whole_units(readings.values_m)
    steps_s = np.diff(readings.times_s)
    if len(steps_s) and steps_s.max() > LONGEST_STEP_S:
        raise ReadingsError("Two neighbouring readings are more than 136 years apart.")
    differences = np.diff(units).astype(np.int32)
    zigzag = ((differences << 1) ^ (differences >> 31)).view(np.uint32)
    arrays = (*_runs(steps_s), zigzag, *_runs(readings.flags))
    body = zlib.compress(b"".join(_pack(array) for array in arrays), 1)
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
    opened = [_open(memoryview(block)) for block in blocks]
    total = sum(block.count for block in opened)
    times_s, values_m = np.empty(total, np.int64), np.empty(total)
    flags = np.empty(total, np.uint8)
    start = 0
    for block in opened:
        stop = start + block.count
        if block.count:
            _unpack_into(block, times_s[start:stop], values_m[start:stop], flags[start:stop])
        start = stop
    return Readings(times_s, values_m, flags)


@dataclass(frozen=True)
class _Opened:
    decimals: int
    count: int
    first_s: int
    first_unit: int
    arrays: Sequence[Unsigned]


def _whole_units(values_m: Floats) -> tuple[Seconds, int]:
    if len(values_m) and np.abs(values_m).max() > FARTHEST_M:
        raise ReadingsError("A value lies beyond 100 km above or below zero.")
    fine = np.rint(values_m * 10**FINE_DECIMALS)
    coarse = np.rint(values_m * 10**COARSE_DECIMALS)
    if (coarse * 10 != fine).any():
        return fine.astype(np.int64), FINE_DECIMALS
    return coarse.astype(np.int64), COARSE_DECIMALS


def _runs(values: npt.NDArray[np.integer]) -> tuple[Unsigned, Unsigned]:
    """Give each run's value and length."""
    if not len(values):
        return np.empty(0, np.uint32), np.empty(0, np.uint32)
    changes = np.flatnonzero(values[1:] != values[:-1]) + 1
    edges = np.concatenate(([0], changes, [len(values)]))
    return values[edges[:-1]].astype(np.uint32), (edges[1:] - edges[:-1]).astype(np.uint32)


def _pack(values: Unsigned) -> bytes:
    """Write unsigned numbers as byte planes: all lowest bytes first, as many planes as needed."""
    width = (int(values.max()).bit_length() + 7) // 8 if len(values) else 0
    planes = np.ascontiguousarray(values, "<u4").view(np.uint8).reshape(-1, 4)[:, :width].T
    return PACKED.pack(width, len(values)) + planes.tobytes()


def _unpack(body: bytes, start: int) -> tuple[Unsigned, int]:
    """Read one packed array from byte start on; also give the byte after it."""
    width, count = PACKED.unpack_from(body, start)
    start += PACKED.size
    planes = np.frombuffer(body, np.uint8, width * count, start).reshape(width, count)
    values = np.zeros(count, np.uint32)
    for place, plane in enumerate(planes):
        values |= plane.astype(np.uint32) << np.uint32(8 * place)
    return values, start + width * count


def _checksum(head_without_checksum: bytes, body: bytes | memoryview) -> int:
    return zlib.crc32(body, zlib.crc32(head_without_checksum))


def _open(block: memoryview) -> _Opened:
    """Check a block's header and checksum and unpack its five arrays."""
    if len(block) < HEADER.size or bytes(block[:4]) != MAGIC:
        raise BlockError("These bytes are not a block of readings, or its beginning is damaged.")
    *head, checksum = HEADER.unpack_from(block)
    _, version, decimals, count, first_s, first_unit = head
    body = block[HEADER.size :]
    if checksum != _checksum(HEADER.pack(*head, 0), body):
        raise BlockError("The block of readings is damaged: its checksum does not agree.")
    if version != VERSION:
        raise BlockError(
            f"The block of readings has version {version}; this program reads {VERSION}."
        )
    unpacked, at, arrays = zlib.decompress(body), 0, []
    for _ in range(5):
        array, at = _unpack(unpacked, at)
        arrays.append(array)
    return _Opened(decimals, count, first_s, first_unit, arrays)


def _unpack_into(block: _Opened, times_s: Seconds, values_m: Floats, flags: MarkBits) -> None:
    """Write a block's readings, one at least, into the arrays given."""
    steps, step_counts, zigzag, flag_runs, flag_counts = block.arrays
    times_s[0], units = block.first_s, np.empty(block.count, np.int64)
    times_s[1:] = np.repeat(steps, step_counts)
    np.cumsum(times_s, out=times_s)
    units[0] = block.first_unit
    units[1:] = (zigzag >> 1).astype(np.int32) ^ -(zigzag & 1).astype(np.int32)
    np.cumsum(units, out=units)
    np.divide(units, 10**block.decimals, out=values_m)
    flags[:] = np.repeat(flag_runs, flag_counts)
