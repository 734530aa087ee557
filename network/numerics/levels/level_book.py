"""The lines of a level book as booked, and what cannot be in one."""

import math
from collections.abc import Container, Iterator, Sequence
from dataclasses import dataclass

from network.numerics.sentences import Sentence, gettext_noop, sentence


@dataclass(frozen=True)
class Sight:
    """One line of a level book: a point and the staff readings on it, in metres.

    A change point has its foresight and the next set-up's backsight on one line. A reading on a
    staff held upside down is booked with a minus.
    """

    point: str
    backsight_m: float | None = None
    intermediate_m: float | None = None
    foresight_m: float | None = None
    remark: str = ""


@dataclass(frozen=True)
class BookFault:
    """Something impossible in a book: the row (from 1; 0 is the whole book) and field meant."""

    row: int
    field_name: str
    sentence: Sentence


def find_faults(
    sights: Sequence[Sight], *, known: Container[str], longest_staff_m: float
) -> tuple[BookFault, ...]:
    """List what makes a level book impossible, row by row, at most one fault a row.

    sights: the lines in order; known: points with an elevation in force; longest_staff_m: metres.
    Source: common practice of booking.
    """
    if not sights:
        text = gettext_noop("The level book has no sights.")
        return (BookFault(0, "point", sentence(text)),)
    faults = []
    for row, sight in enumerate(sights, start=1):
        found = next(_faults_of_line(sight, longest_staff_m), None) or next(
            _faults_of_place(row, sights, known), None
        )
        if found is not None:
            field_name, text = found
            said = sentence(text, row=row, point=sight.point, longest_staff_m=longest_staff_m)
            faults.append(BookFault(row, field_name, said))
    return tuple(faults)


def _faults_of_line(sight: Sight, longest_staff_m: float) -> Iterator[tuple[str, str]]:
    readings = {
        "backsight_m": sight.backsight_m,
        "intermediate_m": sight.intermediate_m,
        "foresight_m": sight.foresight_m,
    }
    if not sight.point.strip():
        yield "point", gettext_noop("Row {row}: the point has no name.")
    if all(value is None for value in readings.values()):
        yield "backsight_m", gettext_noop("Row {row} ({point}): there is no sight on this row.")
    for name, value in readings.items():
        if value is not None and not math.isfinite(value):
            yield name, gettext_noop("Row {row} ({point}): the reading is not a number.")
        elif value is not None and abs(value) > longest_staff_m:
            text = gettext_noop(
                "Row {row} ({point}): the reading lies beyond a staff of {longest_staff_m:g} m."
            )
            yield name, text
    if sight.intermediate_m is not None and (sight.backsight_m, sight.foresight_m) != (None, None):
        text = gettext_noop("Row {row} ({point}): an intermediate sight stands on its own row.")
        yield "intermediate_m", text


def _faults_of_place(
    row: int, sights: Sequence[Sight], known: Container[str]
) -> Iterator[tuple[str, str]]:
    sight = sights[row - 1]
    if row == 1:
        yield from _faults_of_start(sight, known)
    elif sight.backsight_m is not None and sight.foresight_m is None:
        text = gettext_noop(
            "Row {row} ({point}): a backsight needs the foresight that leads to it."
        )
        yield "foresight_m", text
    if row == len(sights):
        yield from _faults_of_end(sight, known)
    elif row > 1 and sight.foresight_m is not None and sight.backsight_m is None:
        text = gettext_noop(
            "Row {row} ({point}): this change point has no backsight from the next set-up."
        )
        yield "backsight_m", text


def _faults_of_start(sight: Sight, known: Container[str]) -> Iterator[tuple[str, str]]:
    if sight.foresight_m is not None:
        text = gettext_noop("Row {row} ({point}): a foresight needs a backsight before it.")
        yield "foresight_m", text
    if sight.backsight_m is None:
        text = gettext_noop("Row {row} ({point}): the book must start with a backsight.")
        yield "backsight_m", text
    if sight.point not in known:
        text = gettext_noop(
            "Row {row} ({point}): the book must start on a benchmark with an elevation in force."
        )
        yield "point", text


def _faults_of_end(sight: Sight, known: Container[str]) -> Iterator[tuple[str, str]]:
    if sight.foresight_m is None:
        text = gettext_noop(
            "Row {row} ({point}): the book is not closed, its last row has no foresight."
        )
        yield "foresight_m", text
    elif sight.backsight_m is not None:
        text = gettext_noop("Row {row} ({point}): the last backsight leads nowhere.")
        yield "backsight_m", text
    elif sight.point not in known:
        text = gettext_noop(
            "Row {row} ({point}): the book must close on a benchmark with an elevation in force."
        )
        yield "point", text
