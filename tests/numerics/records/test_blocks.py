"""The codec gives back what went in, stays small, reads old bytes and refuses damaged ones."""

import zlib

import numpy as np
import pytest
from hypothesis import given

from network.numerics.records.blocks import HEADER, VERSION, BlockError, decode, decode_many, encode
from network.numerics.records.readings import ReadingsError, no_readings
from tests.numerics.records.test_readings import record, records, rows

# Written by version 1 of the codec: five readings, 1 mm, a step of 900 s, then one of 37 s.
OLD_BLOCK = bytes.fromhex(
    "475752420103050000008000926500000000d2040000000000002260bc007801636262606068516566600431"
    "9819995880140be7de1b0c0c3c7c8ccc400e032303986662620400427d0288"
)
OLD_ROWS = [
    (1704067200, 1.234, 0),
    (1704068100, 1.236, 0),
    (1704069000, 1.231, 1),
    (1704069900, -0.4, 1),
    (1704069937, 1.5, 0),
]


@given(records)
def test_a_record_comes_back_to_the_last_bit(readings):
    assert rows(decode(encode(readings))) == rows(readings)


def test_blocks_written_long_ago_are_still_read():
    assert rows(decode(OLD_BLOCK)) == OLD_ROWS


@pytest.mark.parametrize("n", [0, 1, 2])
def test_short_records_come_back(n):
    readings = record(range(n), [0.0] * n)
    assert rows(decode(encode(readings))) == rows(readings)


def test_tenths_of_a_millimetre_are_kept_where_a_reading_needs_them():
    values_m = [1.234, 1.2341, -0.0001]
    assert decode(encode(record([0, 1, 2], values_m))).values_m.tolist() == values_m


def test_finer_digits_are_rounded_to_the_tenth_of_a_millimetre():
    # 0.93 ft = 0.283464 m
    assert decode(encode(record([0], [0.283464]))).values_m.tolist() == [0.2835]


def test_the_largest_swing_between_two_readings_fits():
    values_m = [-100_000.0, 100_000.0, -99_999.9999]
    assert decode(encode(record([0, 1, 2], values_m))).values_m.tolist() == values_m


@pytest.mark.parametrize(
    ("readings", "sentence"),
    [
        (record([0], [100_001.0]), "beyond 100 km"),
        (record([0, 2**33]), "136 years"),
    ],
)
def test_what_does_not_fit_a_block_is_refused(readings, sentence):
    with pytest.raises(ReadingsError, match=sentence):
        encode(readings)


def test_bytes_of_postgresql_are_read():
    readings = record([0, 60], [1.0, 2.0])
    assert rows(decode(memoryview(encode(readings)))) == rows(readings)


def test_blocks_that_follow_one_another_become_one_record():
    parts = [record([0, 60], [1, 2.0001]), no_readings(), record([90], [3], [255])]
    joined = decode_many(map(encode, parts))
    assert rows(joined) == [(0, 1.0, 0), (60, 2.0001, 0), (90, 3.0, 255)]


def test_blocks_out_of_order_are_refused():
    with pytest.raises(ReadingsError, match="Reading 1 is earlier"):
        decode_many([encode(record([60])), encode(record([0]))])


def test_a_single_wrong_bit_is_noticed_in_every_byte():
    for at in range(len(OLD_BLOCK)):
        damaged = bytearray(OLD_BLOCK)
        damaged[at] ^= 1
        with pytest.raises(BlockError, match=r"damaged|not a block"):
            decode(damaged)


def test_a_later_version_is_told_from_damage():
    head = HEADER.unpack_from(OLD_BLOCK)
    later = HEADER.pack(head[0], VERSION + 1, *head[2:-1], 0)
    body = OLD_BLOCK[HEADER.size :]
    checksum = zlib.crc32(body, zlib.crc32(later))
    with pytest.raises(BlockError, match="version 2"):
        decode(later[:-4] + checksum.to_bytes(4, "little") + body)


@pytest.mark.parametrize(
    "block",
    [b"", b"GWRB", OLD_BLOCK[:-1], OLD_BLOCK + b"\0", b"x" * 200],
    ids=["nothing", "magic only", "cut short", "too long", "foreign"],
)
def test_bytes_cut_short_or_foreign_are_refused(block):
    with pytest.raises(BlockError, match=r"damaged|not a block"):
        decode(block)


def test_a_month_of_quarter_hours_is_small():
    # speed.md holds 1.7 times the entropy of the millimetre differences; header and all.
    random = np.random.default_rng(5)
    differences_mm = np.rint(random.laplace(0, 2, 2976)).astype(int)
    month = record(np.arange(2976) * 900, np.cumsum(differences_mm) / 1000)
    share = np.unique(differences_mm, return_counts=True)[1] / 2976
    entropy_bytes = -2976 * (share * np.log2(share)).sum() / 8
    assert len(encode(month)) <= 1.7 * entropy_bytes
