"""Level books worked by hand, and what must hold for any of them."""

import math
from dataclasses import replace

import pytest
from hypothesis import given
from hypothesis import strategies as st

from network.numerics.levels.level_book import Sight
from network.numerics.levels.levelling import LevelLimits, adjust, reduce_book
from network.numerics.sentences import Refused

# A loop of four set-ups, worked by hand. BM1 102.350 m.
#
# row point    BS     IS     FS    height of coll.   level
#  1  BM1    1.250                     103.600     102.350
#  2  BM2           1.688                          101.912
#  3  CP1    0.900         2.600       101.900     101.000
#  4  P1            1.400                          100.500
#  5  P2            2.400                           99.500
#  6  CP2    1.150         1.000       102.050     100.900
#  7  P1            1.549                          100.501
#  8  P2            2.550                           99.500
#  9  CP3    2.300         0.850       103.500     101.200
# 10  BM2           1.588                          101.912
# 11  BM1                  1.149                   102.351
#     sums   5.600         5.599   ΣBS − ΣFS = 0.001 = 102.351 − 102.350
# misclosure +1.0 mm, allowed 0.9·√4 = 1.8 mm: the book closes.
CLOSING = (
    Sight("BM1", backsight_m=1.250),
    Sight("BM2", intermediate_m=1.688),
    Sight("CP1", foresight_m=2.600, backsight_m=0.900),
    Sight("P1", intermediate_m=1.400, remark="on the 2.00 m graduation"),
    Sight("P2", intermediate_m=2.400),
    Sight("CP2", foresight_m=1.000, backsight_m=1.150),
    Sight("P1", intermediate_m=1.549),
    Sight("P2", intermediate_m=2.550),
    Sight("CP3", foresight_m=0.850, backsight_m=2.300),
    Sight("BM2", intermediate_m=1.588),
    Sight("BM1", foresight_m=1.149),
)
COLLIMATIONS_M = (103.600, None, 101.900, None, None, 102.050, None, None, 103.500, None, None)
LEVELS_M = (
    *(102.350, 101.912, 101.000, 100.500, 99.500, 100.900),
    *(100.501, 99.500, 101.200, 101.912, 102.351),
)
# −1 mm · (0, ½, 1, 1½, 1½, 2, 2½, 2½, 3, 3½, 4)/4, an intermediate sight half-way in its set-up
CORRECTIONS_MM = (-0.125, -0.25, -0.375, -0.375, -0.5, -0.625, -0.625, -0.75, -0.875, -1.0)
ADJUSTED_M = {
    "BM2": 101.9115,  # (101.911875 + 101.911125)/2
    "CP1": 100.99975,
    "P1": 100.5000,  # (100.499625 + 100.500375)/2
    "P2": 99.4995,  # (99.499625 + 99.499375)/2
    "CP2": 100.8995,
    "CP3": 101.19925,
    "BM1": 102.3500,
}
ELEVATIONS_M = {"BM1": 102.350, "BM2": 101.905}

# From one benchmark to another in two set-ups, worked by hand. A 50.000 m, B 51.400 m in force.
#
# row point    BS     IS     FS    height of coll.   level
#  1  A      1.500                      51.500      50.000
#  2  P             2.250                           49.250
#  3  CP     1.300         0.700        52.100      50.800
#  4  P             2.853                           49.247
#  5  B                    0.697                    51.403
#     sums   2.800         1.397   ΣBS − ΣFS = 1.403 = 51.403 − 50.000
# misclosure 51.403 − 51.400 = +3.0 mm, allowed 0.9·√2 = 1.27 mm: it does not close.
NOT_CLOSING = (
    Sight("A", backsight_m=1.500),
    Sight("P", intermediate_m=2.250),
    Sight("CP", foresight_m=0.700, backsight_m=1.300),
    Sight("P", intermediate_m=2.853),
    Sight("B", foresight_m=0.697),
)


def test_every_intermediate_level_of_the_closing_book_is_as_worked_by_hand():
    book = reduce_book(CLOSING, ELEVATIONS_M)
    # binary dust only: the readings are whole millimetres
    assert [row.height_of_collimation_m for row in book.rows] == [
        None if level is None else pytest.approx(level, abs=1e-9) for level in COLLIMATIONS_M
    ]
    assert [row.level_m for row in book.rows] == pytest.approx(LEVELS_M, abs=1e-9)
    assert [row.set_up for row in book.rows] == [0, 1, 1, 2, 2, 2, 3, 3, 3, 4, 4]
    assert book.sum_backsights_m == pytest.approx(5.600, abs=1e-9)
    assert book.sum_foresights_m == pytest.approx(5.599, abs=1e-9)
    assert book.sum_difference_m == pytest.approx(0.001, abs=1e-9)
    assert book.level_difference_m == pytest.approx(0.001, abs=1e-9)
    assert book.sums_agree
    assert book.set_ups == 4
    assert book.misclosure_mm == pytest.approx(1.0, abs=1e-6)
    assert book.limit_mm == pytest.approx(1.8)
    assert book.closes
    assert book.refusal is None


def test_the_misclosure_is_spread_over_the_set_ups():
    points = adjust(reduce_book(CLOSING, ELEVATIONS_M))
    assert [point.point for point in points] == ["BM2", "CP1", "P1", "P2", "CP2", "CP3", "BM1"]
    by_row = sorted((d for point in points for d in point.determinations), key=lambda d: d.row)
    corrections_mm = [1000 * d.correction_m for d in by_row]
    assert corrections_mm == pytest.approx(CORRECTIONS_MM, abs=1e-6)
    adjusted_m = {point.point: point.adjusted_m for point in points}
    assert adjusted_m == pytest.approx(ADJUSTED_M, abs=1e-9)


def test_a_plate_sighted_from_two_set_ups_takes_the_mean():
    plate = next(p for p in adjust(reduce_book(CLOSING, ELEVATIONS_M)) if p.point == "P1")
    assert plate.set_ups == 2
    assert plate.raw_m == pytest.approx(100.5005, abs=1e-9)
    assert plate.spread_mm == pytest.approx(0.75, abs=1e-6)


def test_a_book_beyond_the_limit_is_reduced_but_refused_with_the_figure():
    book = reduce_book(NOT_CLOSING, {"A": 50.000, "B": 51.400})
    assert [row.level_m for row in book.rows] == pytest.approx(
        [50.000, 49.250, 50.800, 49.247, 51.403], abs=1e-9
    )
    assert book.rows[0].height_of_collimation_m == pytest.approx(51.500, abs=1e-9)
    assert book.rows[2].height_of_collimation_m == pytest.approx(52.100, abs=1e-9)
    assert book.sums_agree  # the sums see arithmetic, not the misclosure
    assert book.misclosure_mm == pytest.approx(3.0, abs=1e-6)
    assert not book.closes
    with pytest.raises(Refused, match=r"\+3\.0 mm, allowed 1\.3 mm with 2 set-ups"):
        adjust(book)


def test_the_agency_may_allow_more():
    limits = LevelLimits(misclosure_mm_per_root=3.0, misclosure_cap_mm=10.0)
    book = reduce_book(NOT_CLOSING, {"A": 50.000, "B": 51.400}, limits)
    assert book.closes
    assert adjust(book)[-1].adjusted_m == pytest.approx(51.400, abs=1e-9)


def test_a_misclosure_at_the_limit_closes():
    limits = LevelLimits(misclosure_mm_per_root=0.5)  # 0.5·√4 = 1.0 mm
    assert reduce_book(CLOSING, ELEVATIONS_M, limits).closes


def test_a_book_being_typed_is_reduced_as_far_as_it_goes():
    book = reduce_book(CLOSING[:5], ELEVATIONS_M)
    assert [row.level_m for row in book.rows] == pytest.approx(LEVELS_M[:5], abs=1e-9)
    assert book.misclosure_mm is None
    assert not book.closes
    assert "not closed" in str(book.refusal)
    with pytest.raises(Refused, match=r"Row 5 \(P2\)") as refused:
        adjust(book)
    assert (refused.value.row, refused.value.field_name) == (5, "foresight_m")


def test_a_missing_backsight_leaves_the_later_levels_open():
    broken = (*CLOSING[:2], replace(CLOSING[2], backsight_m=None), *CLOSING[3:])
    levels_m = [row.level_m for row in reduce_book(broken, ELEVATIONS_M).rows]
    assert levels_m[:3] == pytest.approx(LEVELS_M[:3], abs=1e-9)
    assert levels_m[3:] == [None] * 8


def test_an_empty_book_is_refused():
    book = reduce_book((), ELEVATIONS_M)
    assert (book.rows, book.level_difference_m, book.sums_agree) == ((), None, False)
    with pytest.raises(Refused, match="no sights"):
        adjust(book)


millimetres = st.integers(200, 4500).map(lambda value: value / 1000)
set_ups = st.lists(
    st.tuples(millimetres, st.lists(millimetres, max_size=3), millimetres), min_size=1, max_size=8
)


def run_of(set_ups, share):
    """Book set-ups from A to B and let B be in force so that a share of the limit is missed."""
    sights = [Sight("A", backsight_m=set_ups[0][0])]
    for number, (_, intermediates, foresight_m) in enumerate(set_ups, start=1):
        sights += [
            Sight(f"P{place}", intermediate_m=value) for place, value in enumerate(intermediates)
        ]
        next_m = set_ups[number][0] if number < len(set_ups) else None
        point = f"CP{number}" if next_m else "B"
        sights.append(Sight(point, foresight_m=foresight_m, backsight_m=next_m))
    risen_m = math.fsum(back - fore for back, _, fore in set_ups)
    limit_mm = LevelLimits().misclosure_mm(len(set_ups))
    return tuple(sights), {"A": 100.0, "B": 100.0 + risen_m - share * limit_mm / 1000}


def reversed_run(sights):
    return tuple(
        replace(sight, backsight_m=sight.foresight_m, foresight_m=sight.backsight_m)
        for sight in reversed(sights)
    )


@given(set_ups=set_ups, share=st.floats(-0.99, 0.99))
def test_reduced_levels_do_not_depend_on_the_order_of_set_ups(set_ups, share):
    sights, elevations_m = run_of(set_ups, share)
    there = adjust(reduce_book(sights, elevations_m))
    back = adjust(reduce_book(reversed_run(sights), elevations_m))
    ahead_m = {p.point: p.adjusted_m for p in there if p.point not in elevations_m}
    behind_m = {p.point: p.adjusted_m for p in back if p.point not in elevations_m}
    assert ahead_m == pytest.approx(behind_m, abs=1e-9)  # dust of sums near 100 m


@given(set_ups=set_ups, share=st.floats(-0.99, 0.99), lift_m=st.floats(-500, 500))
def test_adding_a_constant_to_the_benchmarks_moves_all(set_ups, share, lift_m):
    sights, elevations_m = run_of(set_ups, share)
    lifted_m = {point: level_m + lift_m for point, level_m in elevations_m.items()}
    before = adjust(reduce_book(sights, elevations_m))
    after = adjust(reduce_book(sights, lifted_m))
    assert [p.adjusted_m for p in after] == pytest.approx(
        [p.adjusted_m + lift_m for p in before], abs=1e-9
    )


@given(set_ups=set_ups, share=st.floats(-0.99, 0.99))
def test_the_sums_always_agree_with_the_levels(set_ups, share):
    book = reduce_book(*run_of(set_ups, share))
    assert book.sums_agree
    assert book.closes
    assert adjust(book)[-1].adjusted_m == pytest.approx(
        book.rows[-1].level_m - book.misclosure_mm / 1000
    )


@given(set_ups=set_ups, share=st.floats(1.01, 50), sign=st.sampled_from([-1, 1]))
def test_beyond_the_limit_nothing_is_spread(set_ups, share, sign):
    book = reduce_book(*run_of(set_ups, sign * share))
    with pytest.raises(Refused, match="do not close"):
        adjust(book)
