"""Errors of plates and benchmarks that a closed level run has found."""

from collections.abc import Mapping, Sequence
from dataclasses import dataclass

from network.numerics.levels.levelling import DUST_M, USUAL_LIMITS, LevelLimits, PointLevel
from network.numerics.sentences import Sentence, gettext_noop, sentence


@dataclass(frozen=True)
class PlateMark:
    """The mark sighted on a plate: its graduation and the plate zero in force, in metres.

    The zero is above the datum of the level book (station zero plus plate zero). Where the level
    read the plate itself instead of a staff, the graduation is 0.
    """

    graduation_m: float
    zero_m: float


@dataclass(frozen=True)
class LevelError:
    """Found minus in force of a plate zero or a benchmark; no error below the tolerance."""

    point: str
    found_m: float
    in_force_m: float
    tolerance_mm: float

    @property
    def difference_mm(self) -> float:
        return 1000 * (self.found_m - self.in_force_m)

    @property
    def error_mm(self) -> float:
        below = abs(self.difference_mm) < self.tolerance_mm - 1000 * DUST_M
        return 0.0 if below else self.difference_mm


def plate_errors(
    points: Sequence[PointLevel],
    marks: Mapping[str, PlateMark],
    limits: LevelLimits = USUAL_LIMITS,
) -> tuple[LevelError, ...]:
    """Compare the plate zeros found with those in force.

    points: levels of the adjusted run; marks: by point name, of the plates at the station.
    Result: zeros in metres above the book's datum, for each plate that was sighted.
    Source: common practice; below the tolerance the zero in force stands.
    """
    return tuple(
        LevelError(
            point=level.point,
            # zero found = level of the mark − its graduation
            found_m=level.adjusted_m - marks[level.point].graduation_m,
            in_force_m=marks[level.point].zero_m,
            tolerance_mm=limits.plate_tolerance_mm,
        )
        for level in points
        if level.point in marks
    )


def benchmark_errors(
    points: Sequence[PointLevel],
    elevations_m: Mapping[str, float],
    limits: LevelLimits = USUAL_LIMITS,
) -> tuple[LevelError, ...]:
    """Compare the elevations found of benchmarks with those in force, in metres.

    The benchmark that closes the run agrees by construction. Source: common practice.
    """
    return tuple(
        LevelError(
            point=level.point,
            found_m=level.adjusted_m,
            in_force_m=elevations_m[level.point],
            tolerance_mm=limits.benchmark_tolerance_mm,
        )
        for level in points
        if level.point in elevations_m
    )


@dataclass(frozen=True)
class SetUpFinding:
    """A plate whose sights do not prove each other: the sums do not see intermediate sights."""

    point: str
    set_ups: int
    spread_mm: float
    limit_mm: float
    sentence: Sentence


def two_set_up_findings(
    points: Sequence[PointLevel],
    marks: Mapping[str, PlateMark],
    limits: LevelLimits = USUAL_LIMITS,
) -> tuple[SetUpFinding, ...]:
    """Find plates sighted from one set-up only, not at all, or differently from two.

    points, marks: as for plate_errors; the limit is in millimetres. Source: USGS TM 3-A19
    (every objective point from two set-ups); the limit is common practice.
    """
    by_point = {level.point: level for level in points}
    found = []
    for point in marks:
        level = by_point.get(point)
        set_ups, spread_mm = (level.set_ups, level.spread_mm) if level else (0, 0.0)
        if set_ups == 0:
            text = gettext_noop("Plate {point} was not sighted.")
        elif set_ups == 1:
            text = gettext_noop("Plate {point} was sighted from one set-up only.")
        elif spread_mm > limits.two_set_ups_mm + 1000 * DUST_M:
            text = gettext_noop(
                "Plate {point}: its sights from {set_ups} set-ups differ by {spread_mm:.1f} mm, "
                "allowed {limit_mm:.1f} mm; look for a misread staff."
            )
        else:
            continue
        values = {"set_ups": set_ups, "spread_mm": spread_mm, "limit_mm": limits.two_set_ups_mm}
        found.append(
            SetUpFinding(
                point=point,
                set_ups=set_ups,
                spread_mm=spread_mm,
                limit_mm=limits.two_set_ups_mm,
                sentence=sentence(text, point=point, **values),
            )
        )
    return tuple(found)
