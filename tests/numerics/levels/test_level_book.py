"""What cannot stand in a level book is refused by row and field."""

import math

import pytest

from network.numerics.levels.level_book import Sight, find_faults

KNOWN = {"BM1": 10.0}
START = Sight("BM1", backsight_m=1.5)
END = Sight("BM1", foresight_m=1.5)


def faults(*sights):
    found = find_faults(sights, known=KNOWN, longest_staff_m=5.0)
    return [(fault.row, fault.field_name, str(fault.sentence)) for fault in found]


def test_a_sound_book_has_no_fault():
    change = Sight("CP1", backsight_m=1.2, foresight_m=0.9)
    assert faults(START, Sight("P1", intermediate_m=2.0), change, END) == []


def test_a_staff_held_upside_down_is_booked_with_a_minus():
    assert faults(START, Sight("bridge", intermediate_m=-1.75), END) == []


@pytest.mark.parametrize(
    ("sights", "row", "field_name", "said"),
    [
        ([], 0, "point", "no sights"),
        (
            [Sight("BM1", intermediate_m=1.0), END],
            1,
            "backsight_m",
            "Row 1 (BM1): the book must start with a backsight.",
        ),
        (
            [Sight("BM1", foresight_m=1.0), END],
            1,
            "foresight_m",
            "Row 1 (BM1): a foresight needs a backsight before it.",
        ),
        (
            [START, Sight("CP1", foresight_m=1.0), END],
            2,
            "backsight_m",
            "Row 2 (CP1): this change point has no backsight from the next set-up.",
        ),
        (
            [START, Sight("CP1", backsight_m=1.0), END],
            2,
            "foresight_m",
            "Row 2 (CP1): a backsight needs the foresight that leads to it.",
        ),
        (
            [START, Sight("P1", intermediate_m=1.0)],
            2,
            "foresight_m",
            "Row 2 (P1): the book is not closed, its last row has no foresight.",
        ),
        (
            [START, Sight("CP1", foresight_m=1.0)],
            2,
            "point",
            "Row 2 (CP1): the book must close on a benchmark with an elevation in force.",
        ),
        (
            [START, Sight("BM1", foresight_m=1.0, backsight_m=1.0)],
            2,
            "backsight_m",
            "Row 2 (BM1): the last backsight leads nowhere.",
        ),
        (
            [Sight("CP9", backsight_m=1.0), END],
            1,
            "point",
            "Row 1 (CP9): the book must start on a benchmark with an elevation in force.",
        ),
        (
            [START, Sight("P1", intermediate_m=1.0, foresight_m=1.0), END],
            2,
            "intermediate_m",
            "Row 2 (P1): an intermediate sight stands on its own row.",
        ),
        ([START, Sight("P1"), END], 2, "backsight_m", "Row 2 (P1): there is no sight on this row."),
        ([START, Sight(" ", intermediate_m=1.0), END], 2, "point", "Row 2: the point has no name."),
        (
            [START, Sight("P1", intermediate_m=125.0), END],
            2,
            "intermediate_m",
            "Row 2 (P1): the reading lies beyond a staff of 5 m.",
        ),
        (
            [START, Sight("P1", intermediate_m=math.nan), END],
            2,
            "intermediate_m",
            "Row 2 (P1): the reading is not a number.",
        ),
        ([START], 1, "foresight_m", "Row 1 (BM1): the book is not closed"),
    ],
)
def test_an_impossible_book_is_refused_by_row_and_field(sights, row, field_name, said):
    [(found_row, found_field, sentence)] = faults(*sights)
    assert (found_row, found_field) == (row, field_name)
    assert said in sentence


def test_every_faulty_row_is_named_at_once():
    found = faults(START, Sight("P1"), Sight("CP1", foresight_m=1.0), END)
    assert [(row, field_name) for row, field_name, _ in found] == [
        (2, "backsight_m"),
        (3, "backsight_m"),
    ]
