"""Level checks reduced: levels line by line, closure, and what was found of plates and marks."""

from collections.abc import Mapping, Sequence
from dataclasses import dataclass
from datetime import datetime
from functools import cached_property

from django.utils.translation import gettext as _

from network.models import Benchmark, LevelCheck, Sight, StaffPlate, Station
from network.numerics.levels.level_book import Sight as BookedSight
from network.numerics.levels.level_errors import (
    LevelError,
    PlateMark,
    benchmark_errors,
    plate_errors,
    two_set_up_findings,
)
from network.numerics.levels.levelling import (
    LevelBook,
    LevelLimits,
    LevelRow,
    PointLevel,
    adjust,
    reduce_book,
)
from network.numerics.levels.peg_test import PegSetUp, PegTest, peg_test
from network.numerics.sentences import Refused
from network.queries import gauges, in_force, working_rules
from network.queries.level_sheet import LevelSheet, PegRow, SightRow, sheet_of
from network.queries.sentences import said


@dataclass(frozen=True)
class Fault:
    """What stands in the way: the line (from 1; 0 is the whole book), its field, the sentence."""

    row: int
    field: str
    sentence: str


@dataclass(frozen=True)
class Line:
    """One line of the book as booked and as reduced."""

    sight: SightRow
    reduced: LevelRow
    fault: Fault | None


@dataclass(frozen=True)
class PlateFound:
    """The zero found of a plate beside the one in force, metres above the station zero."""

    plate: StaffPlate
    found_m: float
    in_force_m: float
    error_mm: float  # 0 below the tolerance
    difference_mm: float
    tolerance_mm: float
    spread_mm: float


@dataclass(frozen=True)
class BenchmarkFound:
    """The elevation found of a benchmark beside the one in force, metres above the datum."""

    benchmark: Benchmark
    found_m: float
    in_force_m: float
    error_mm: float
    difference_mm: float
    tolerance_mm: float


@dataclass(frozen=True)
class Known:
    """What stood in force when the levels were run."""

    elevations_m: Mapping[str, float]
    station_zero_m: float | None
    plate_zeros_m: Mapping[StaffPlate, float]
    limits: LevelLimits


@dataclass(frozen=True)
class Reduction:
    """A book reduced as far as it goes."""

    sheet: LevelSheet
    known: Known
    book: LevelBook
    faults: Sequence[Fault]

    @property
    def lines(self) -> list[Line]:
        """Every line with its level and its fault, if it has one."""
        by_row = {fault.row: fault for fault in reversed(self.faults)}
        return [
            Line(sight, reduced, by_row.get(reduced.row))
            for sight, reduced in zip(self.sheet.sights, self.book.rows, strict=True)
        ]

    @property
    def refusal(self) -> str:
        """Why nothing may be taken from this book, or nothing."""
        if self.faults:
            return self.faults[0].sentence
        return said(self.book.refusal) if self.book.refusal else ""

    @cached_property
    def points(self) -> Sequence[PointLevel]:
        """The levels of all points with the misclosure spread; none where the book is refused."""
        return () if self.refusal else adjust(self.book)

    @property
    def plates(self) -> list[PlateFound]:
        """The plates sighted, the lowest row first."""
        zero_m = self.known.station_zero_m or 0.0
        plates = {_name(sight): sight.plate for sight in self.sheet.sights if sight.plate}
        spreads = {level.point: level.spread_mm for level in self.points}
        return [
            PlateFound(
                plates[error.point],
                error.found_m - zero_m,
                error.in_force_m - zero_m,
                error.error_mm,
                error.difference_mm,
                error.tolerance_mm,
                spreads[error.point],
            )
            for error in plate_errors(self.points, self._marks(), self.known.limits)
        ]

    @property
    def benchmarks(self) -> list[BenchmarkFound]:
        """The benchmarks sighted."""
        marks = {_name(sight): sight.benchmark for sight in self.sheet.sights if sight.benchmark}
        return [
            BenchmarkFound(marks[error.point], *_figures(error))
            for error in benchmark_errors(self.points, self.known.elevations_m, self.known.limits)
        ]

    @property
    def water_stages_m(self) -> list[float]:
        """The stages of the water surface that was sighted, above the station zero."""
        zero_m = self.known.station_zero_m
        water = {_name(s, row) for row, s in enumerate(self.sheet.sights, 1) if _is_water(s)}
        if zero_m is None:
            return []
        return [level.adjusted_m - zero_m for level in self.points if level.point in water]

    @property
    def findings(self) -> list[str]:
        """What speaks against the figures without forbidding them."""
        found = two_set_up_findings(self.points, self._marks(), self.known.limits)
        sentences = [said(row.sentence) for row in found] if self.points else []
        collimation, fault = peg_result(self.sheet.peg)
        if fault:
            sentences.append(fault.sentence)
        if collimation and not collimation.passes:
            sentences.append(
                _("The peg test finds %(found)+.3f mm in a metre, allowed %(limit).3f.")
                % {
                    "found": collimation.collimation_mm_per_m,
                    "limit": collimation.limit_mm_per_m,
                }
            )
        if self.sheet.peg is None:
            sentences.append(_("There is no peg test."))
        return sentences

    def _marks(self) -> dict[str, PlateMark]:
        """Return the marks of all plates in service, sighted or not, above the book's datum."""
        if self.known.station_zero_m is None:
            return {}
        graduations = {s.plate: s.graduation_m or 0.0 for s in self.sheet.sights if s.plate}
        return {
            plate.label: PlateMark(graduations.get(plate, 0.0), self.known.station_zero_m + zero_m)
            for plate, zero_m in self.known.plate_zeros_m.items()
        }


def reduce(sheet: LevelSheet) -> Reduction:
    """Reduce a book, finished or not; faults stand beside the lines, nothing is raised."""
    known = known_at(sheet.station, sheet.levelled_at)
    booked = [
        BookedSight(_name(row, n), row.backsight_m, row.intermediate_m, row.foresight_m, row.remark)
        for n, row in enumerate(sheet.sights, start=1)
    ]
    book = reduce_book(booked, known.elevations_m, known.limits)
    faults = [Fault(f.row, f.field_name, said(f.sentence)) for f in book.faults]
    faults += _plate_faults(sheet, known)
    return Reduction(sheet, known, book, sorted(faults, key=lambda fault: fault.row))


def reduction_of(check: LevelCheck) -> Reduction:
    """Reduce a stored level check."""
    return reduce(sheet_of(check))


def known_at(station: Station, instant: datetime) -> Known:
    """Return the elevations and zeros in force at a station when its levels were run."""
    elevations = {}
    for mark in Benchmark.objects.filter(station=station):
        row = in_force.at(mark.elevations, instant)
        if row is not None and row.elevation_m is not None:
            elevations[mark.label] = row.elevation_m
    zero = gauges.station_zero(station, instant)
    plates = gauges.plates_in_service(station, instant)
    return Known(
        elevations,
        zero.elevation_m if zero else None,
        {then.plate: then.zero_m for then in plates if then.zero_m is not None},
        working_rules.level_limits(working_rules.rules()),
    )


def peg_result(peg: PegRow | None) -> tuple[PegTest | None, Fault | None]:
    """Return the collimation error of a peg test, or why there is none.

    The second set-up stands beside peg A, as close as its staff can be read.
    """
    if peg is None:
        return None, None
    half = peg.distance_m / 2
    try:
        result = peg_test(
            PegSetUp(peg.middle_a_m, peg.middle_b_m, half, half),
            PegSetUp(peg.near_a_m, peg.near_b_m, 0.0, peg.distance_m),
            limit_mm_per_m=working_rules.collimation_limit_mm_per_m(working_rules.rules()),
        )
    except Refused as refused:
        return None, Fault(0, "distance_m", said(refused.sentence))
    return result, None


def _plate_faults(sheet: LevelSheet, known: Known) -> list[Fault]:
    """Find plates sighted without a graduation or at two, or without zeros to compare with."""
    found = []
    seen: dict[StaffPlate, float | None] = {}
    for row, sight in enumerate(sheet.sights, start=1):
        if sight.plate is None:
            continue
        names = {"row": row, "point": sight.plate.label}
        first = seen.setdefault(sight.plate, sight.graduation_m)
        if sight.graduation_m is None:
            text = _(
                "Row %(row)d (%(point)s): give the graduation that was sighted, 0 where the level "
                "read the plate itself."
            )
            found.append(Fault(row, "graduation_m", text % names))
        elif first is not None and sight.graduation_m != first:
            text = _("Row %(row)d (%(point)s): sight the same graduation as before.")
            found.append(Fault(row, "graduation_m", text % names))
        elif sight.plate not in known.plate_zeros_m:
            text = _("Row %(row)d (%(point)s): this plate has no zero in force at that time.")
            found.append(Fault(row, "plate", text % names))
    if seen and known.station_zero_m is None:
        found.append(Fault(0, "plate", _("The station zero has no elevation in force.")))
    return found


def _name(sight: SightRow, row: int = 0) -> str:
    """Name a point for the kernel; turning points and water are points of their own each time."""
    if sight.benchmark is not None:
        return sight.benchmark.label
    if sight.plate is not None:
        return sight.plate.label
    return f"{Sight.Point(sight.point).label} {row}" if sight.point else ""


def _is_water(sight: SightRow) -> bool:
    return sight.point == Sight.Point.WATER


def _figures(error: LevelError) -> tuple[float, float, float, float, float]:
    return (
        error.found_m,
        error.in_force_m,
        error.error_mm,
        error.difference_mm,
        error.tolerance_mm,
    )
