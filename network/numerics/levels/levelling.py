"""Booked sights of a level run reduced by height of collimation, closed, spread and compared."""

import math
from collections.abc import Mapping, Sequence
from dataclasses import dataclass

from network.numerics.levels.level_book import BookFault, Sight, find_faults
from network.numerics.sentences import Refused, Sentence, gettext_noop, sentence

# Readings come to a tenth of a millimetre; this keeps binary dust from deciding a verdict.
DUST_M = 1e-8


@dataclass(frozen=True)
class LevelLimits:
    """Limits of an agency; the closure is USGS TM 3-A19 in SI, the others common practice."""

    misclosure_mm_per_root: float = 0.9
    misclosure_cap_mm: float = 4.6
    two_set_ups_mm: float = 2.0
    plate_tolerance_mm: float = 5.0
    benchmark_tolerance_mm: float = 5.0
    longest_staff_m: float = 5.0

    def misclosure_mm(self, set_ups: int) -> float:
        # limit = min(k·√n, cap)
        return min(self.misclosure_mm_per_root * math.sqrt(set_ups), self.misclosure_cap_mm)


USUAL_LIMITS = LevelLimits()


@dataclass(frozen=True)
class LevelRow:
    """One line of the book, reduced: levels in metres above the datum of the benchmarks."""

    row: int
    point: str
    set_up: int  # the set-up from which the point was sighted; 0 on the starting benchmark
    passed: float  # set-ups' share of the misclosure that the level carries
    height_of_collimation_m: float | None  # set by this line's backsight
    level_m: float | None


@dataclass(frozen=True)
class LevelBook:
    """A reduced book, finished or not, with its faults, sums and misclosure."""

    rows: tuple[LevelRow, ...]
    faults: tuple[BookFault, ...]
    set_ups: int
    sum_backsights_m: float
    sum_foresights_m: float
    limit_mm: float
    misclosure_mm: float | None  # found minus in force; None while the book is not closed

    @property
    def sum_difference_m(self) -> float:
        return self.sum_backsights_m - self.sum_foresights_m

    @property
    def level_difference_m(self) -> float | None:
        """Last minus first reduced level."""
        if not self.rows or self.rows[0].level_m is None or self.rows[-1].level_m is None:
            return None
        return self.rows[-1].level_m - self.rows[0].level_m

    @property
    def sums_agree(self) -> bool:
        difference = self.level_difference_m
        return difference is not None and abs(difference - self.sum_difference_m) < DUST_M

    @property
    def closes(self) -> bool:
        return (
            self.misclosure_mm is not None
            and abs(self.misclosure_mm) <= self.limit_mm + 1000 * DUST_M
        )

    @property
    def refusal(self) -> Sentence | None:
        """Why nothing may be taken from this book: its first fault, or its misclosure."""
        if self.faults:
            return self.faults[0].sentence
        if self.closes or self.misclosure_mm is None:
            return None
        text = gettext_noop(
            "The levels do not close: {misclosure_mm:+.1f} mm, allowed {limit_mm:.1f} mm "
            "with {set_ups} set-ups."
        )
        return sentence(
            text, misclosure_mm=self.misclosure_mm, limit_mm=self.limit_mm, set_ups=self.set_ups
        )


@dataclass(frozen=True)
class Determination:
    """The level of a point from one sight: as reduced and with its share of the misclosure."""

    row: int
    set_up: int
    raw_m: float
    correction_m: float

    @property
    def adjusted_m(self) -> float:
        return self.raw_m + self.correction_m


@dataclass(frozen=True)
class PointLevel:
    """The level of a point: the mean of its determinations."""

    point: str
    determinations: tuple[Determination, ...]

    @property
    def raw_m(self) -> float:
        return math.fsum(d.raw_m for d in self.determinations) / len(self.determinations)

    @property
    def adjusted_m(self) -> float:
        return math.fsum(d.adjusted_m for d in self.determinations) / len(self.determinations)

    @property
    def spread_mm(self) -> float:
        levels = [d.adjusted_m for d in self.determinations]
        return 1000 * (max(levels) - min(levels))

    @property
    def set_ups(self) -> int:
        return len({d.set_up for d in self.determinations})


def reduce_book(
    sights: Sequence[Sight],
    elevations_m: Mapping[str, float],
    limits: LevelLimits = USUAL_LIMITS,
) -> LevelBook:
    """Reduce booked sights by height of collimation, as far as the book goes.

    sights: the lines of the book in order, readings in metres.
    elevations_m: elevation in force of each benchmark by point name, metres above one datum.
    Result: every line with height of collimation and reduced level, ΣBS, ΣFS, set-ups and the
    misclosure; faults name row and field. A book being typed is reduced up to where it breaks.
    Source: height of collimation (common practice); closure USGS TM 3-A19 (Kenney 2010).
    """
    rows = _reduce(sights, elevations_m)
    faults = find_faults(sights, known=elevations_m, longest_staff_m=limits.longest_staff_m)
    set_ups = sum(sight.backsight_m is not None for sight in sights)
    misclosure_mm = None
    if not faults and rows[-1].level_m is not None:
        misclosure_mm = 1000 * (rows[-1].level_m - elevations_m[rows[-1].point])
    return LevelBook(
        rows=rows,
        faults=faults,
        set_ups=set_ups,
        sum_backsights_m=math.fsum(s.backsight_m for s in sights if s.backsight_m is not None),
        sum_foresights_m=math.fsum(s.foresight_m for s in sights if s.foresight_m is not None),
        limit_mm=limits.misclosure_mm(set_ups),
        misclosure_mm=misclosure_mm,
    )


def _reduce(sights: Sequence[Sight], elevations_m: Mapping[str, float]) -> tuple[LevelRow, ...]:
    rows: list[LevelRow] = []
    collimation_m: float | None = None
    set_up = 0
    for number, sight in enumerate(sights, start=1):
        level_m = elevations_m.get(sight.point) if number == 1 else None
        reading_m = sight.intermediate_m if sight.foresight_m is None else sight.foresight_m
        if number > 1 and reading_m is not None and collimation_m is not None:
            # level = height of collimation − intermediate sight or foresight
            level_m = collimation_m - reading_m
        from_set_up = set_up
        if sight.foresight_m is not None:
            collimation_m = None
        if sight.backsight_m is not None:
            set_up += 1
            # height of collimation = level + backsight
            collimation_m = None if level_m is None else level_m + sight.backsight_m
        rows.append(
            LevelRow(
                row=number,
                point=sight.point,
                set_up=from_set_up,
                # Backsight and foresight err alike, so an intermediate sight carries half of its
                # own set-up; only so does a book read backwards give the same levels.
                passed=from_set_up - (0.5 if sight.intermediate_m is not None else 0.0),
                height_of_collimation_m=None if sight.backsight_m is None else collimation_m,
                level_m=level_m,
            )
        )
    return tuple(rows)


def adjust(book: LevelBook) -> tuple[PointLevel, ...]:
    """Spread the misclosure over the set-ups and give the level of every point sighted.

    Result: one level per point in the order of first sight; a point sighted more than once takes
    the mean. The starting benchmark's own line is no determination.
    Raises Refused with the fault or with the misclosure when the book does not close.
    Source: USGS TM 3-A19 (equal shares for equal set-ups).
    """
    reason = book.refusal
    if reason is not None or book.misclosure_mm is None:
        fault = book.faults[0] if book.faults else None
        assert reason is not None
        raise Refused(
            reason,
            row=fault.row if fault else None,
            field_name=fault.field_name if fault else None,
        )
    points: dict[str, list[Determination]] = {}
    for row in book.rows[1:]:
        assert row.level_m is not None  # a book without faults has every level
        # correction = −misclosure · set-ups passed / n
        correction_m = -book.misclosure_mm / 1000 * row.passed / book.set_ups
        points.setdefault(row.point, []).append(
            Determination(row.row, row.set_up, row.level_m, correction_m)
        )
    return tuple(PointLevel(point, tuple(found)) for point, found in points.items())
