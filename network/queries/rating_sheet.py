"""A rating sheet: a curve with its gaugings, tests, band and table, and what it would change.

One answer for a fit, for a curve that was typed, for a weir, and for a stored version.
"""

from collections.abc import Iterable, Sequence
from dataclasses import dataclass

import numpy as np
from django.utils.translation import gettext as _

from network.models import Curve as CurveRow
from network.numerics.arrays import Bools, Floats
from network.numerics.ratings import curves as kernel
from network.numerics.ratings.fitted_rating import RatingFit
from network.numerics.ratings.rating_fit import deviations_percent, fit_rating
from network.numerics.ratings.rating_parts import FitChoice, FitRefused
from network.numerics.ratings.rating_tests import TestResult, bias_test, sign_change_test, sign_test
from network.numerics.sentences import Refused, gettext_noop
from network.queries import curves, rating_points
from network.queries.rating_points import Points
from network.queries.sentences import said

BAND_POINTS = 40
LEAST_FOR_SCATTER = 3


@dataclass(frozen=True, eq=False)
class Band:
    """The 95 % band of the mean relation: stage m and ± % of the flow, float64[k] each."""

    stage_m: Floats
    u95_percent: Floats

    def pairs(self) -> list[tuple[float, float]]:
        """Return stage and percentage as pairs, lowest stage first."""
        return list(zip(self.stage_m.tolist(), self.u95_percent.tolist(), strict=True))


@dataclass(frozen=True)
class Verdict:
    """A test in words, and whether chance alone explains its outcome."""

    sentence: str
    passed: bool


@dataclass(frozen=True)
class SegmentLine:
    """One segment as shown, with what a fit says about it."""

    lower_stage_m: float
    upper_stage_m: float
    c: float
    h0_m: float
    b: float
    c_95: tuple[float, float] | None = None
    b_95: tuple[float, float] | None = None
    h0_95_m: tuple[float, float] | None = None
    scatter_percent: float | None = None
    gaugings: int | None = None
    h0_at_limit: bool = False

    @property
    def taken_off_m(self) -> float | None:
        """h₀ where it is taken off the stage; None where it lies below the station zero."""
        return self.h0_m if self.h0_m >= 0 else None

    @property
    def added_m(self) -> float:
        """What is added to the stage where h₀ lies below the station zero."""
        return -self.h0_m


@dataclass(frozen=True, eq=False)
class Sheet:
    """All that a rating sheet shows of one curve.

    deviations_percent float64[n] follows points, NaN where there is none; later are the gaugings
    made after the last one used. scatter_percent is the gaugings' standard deviation about the
    curve.
    """

    curve: kernel.Curve
    points: Points
    deviations_percent: Floats
    band: Band | None
    scatter_percent: float | None
    fit: RatingFit | None = None
    findings: Sequence[str] = ()

    @property
    def later(self) -> Bools:
        """Which gaugings were made after the last one that the curve rests on."""
        used = [row.at for row in self.points.rows if row.is_used]
        last = max(used, default=None)
        return np.array([last is not None and row.at > last for row in self.points.rows], np.bool_)

    def verdicts(self) -> list[Verdict]:
        """Test the gaugings used, in words."""
        return _verdicts(self.points.part(self.points.used), self._deviations(self.points.used))

    def later_verdicts(self) -> list[Verdict]:
        """Test the gaugings made after the curve, which it did not see."""
        return _verdicts(self.points.part(self.later), self._deviations(self.later))

    def segments(self) -> list[SegmentLine]:
        """Return the segments with the range of stage each holds for; none of a table."""
        if not isinstance(self.curve, kernel.SegmentCurve):
            return []
        low, high = self.curve.allowed_m
        starts = [segment.lower_stage_m for segment in self.curve.segments]
        ends = [*starts[1:], high]
        rows = zip(self.curve.segments, [low, *starts[1:]], ends, strict=True)
        lines = [SegmentLine(start, end, s.c, s.h0_m, s.b) for s, start, end in rows]
        return lines if self.fit is None else _with_fit(lines, self.fit)

    def _deviations(self, chosen: Bools) -> Floats:
        return self.deviations_percent[chosen]


def fitted(
    points: Points,
    choice: FitChoice,
    *,
    lowest_use_m: float | None = None,
    highest_use_m: float | None = None,
    extrapolate: tuple[float | None, float | None] = (None, None),
) -> Sheet:
    """Fit a curve to the points used; its range of use is the gauged one unless told.

    Raises FitRefused or Refused with a sentence, ValueError for a choice that is none.
    """
    used = points.part(points.used)
    if not used.rows:
        raise FitRefused(gettext_noop("No gauging is used."))
    fit = fit_rating(used.stage_m, used.flow_m3s, used.u95_percent, choice=choice)
    # outwards to the centimetre, so that the gaugings lie inside
    low = np.floor(fit.gauged_lowest_m * 100) / 100 if lowest_use_m is None else lowest_use_m
    high = np.ceil(fit.gauged_highest_m * 100) / 100 if highest_use_m is None else highest_use_m
    plain = fit.curve(lowest_use_m=float(low), highest_use_m=float(high))
    curve = kernel.SegmentCurve(
        segments=plain.segments,
        lowest_use_m=plain.lowest_use_m,
        highest_use_m=plain.highest_use_m,
        extrapolate_to_low_m=extrapolate[0],
        extrapolate_to_high_m=extrapolate[1],
        gauged_lowest_m=fit.gauged_lowest_m,
        gauged_highest_m=fit.gauged_highest_m,
    )
    squares = [s.gaugings * s.scatter**2 for s in fit.segments]
    scatter = np.sqrt(sum(squares) / sum(s.gaugings for s in fit.segments))
    return Sheet(
        curve=curve,
        points=points,
        deviations_percent=_deviations(curve, points),
        band=band_of(fit, curve),
        scatter_percent=100 * float(scatter),
        fit=fit,
        findings=_findings(fit),
    )


def examined(
    curve: kernel.Curve, points: Points, *, band: Band | None = None, findings: Iterable[str] = ()
) -> Sheet:
    """Hold gaugings against a curve that is no fit: typed, of a weir, or drawn by hand."""
    deviations = _deviations(curve, points)
    return Sheet(
        curve=curve,
        points=points,
        deviations_percent=deviations,
        band=band,
        scatter_percent=scatter_about(deviations[points.used]),
        findings=tuple(findings),
    )


def stored(row: CurveRow) -> Sheet:
    """Return the sheet of a stored version, held against its gaugings as they stand today.

    Raises Refused where the row is no curve.
    """
    points = rating_points.points_of_version(row.gaugings.select_related("gauging"))
    rows = [(point.stage_m, point.u95_percent) for point in row.band.all()]
    band = Band(*np.array(sorted(rows), np.float64).T) if rows else None
    found = examined(curves.kernel_curve(row), points, band=band)
    return Sheet(**{**vars(found), "scatter_percent": row.scatter_percent})


def band_of(fit: RatingFit, curve: kernel.Curve) -> Band:
    """Return the band of a fit over the curve's range, closer together where heads are small."""
    low, high = curve.allowed_m
    h0_m = fit.segments[0].h0_m
    lowest = max(low, h0_m + 0.02 * (high - h0_m))
    grid = h0_m + np.geomspace(lowest - h0_m, high - h0_m, BAND_POINTS)
    joints = [s.lower_stage_m for s in fit.segments[1:] if lowest < s.lower_stage_m < high]
    stage_m = np.unique(np.round(np.append(grid, joints), 4))
    lower, upper = fit.band_at(stage_m)
    # half the width in % of the flow
    percent = 50 * (upper - lower) / fit.flow_at(stage_m)
    return Band(stage_m, np.round(percent, 2))


def scatter_about(deviations: Floats) -> float | None:
    """Return the standard deviation of gaugings about a curve they did not make, %."""
    known = deviations[~np.isnan(deviations)]
    if len(known) < LEAST_FOR_SCATTER:
        return None
    # s = √(Σ ln(Q/Q̂)² / N): no parameter was fitted
    return float(100 * np.sqrt(np.mean(np.log1p(known / 100) ** 2)))


def sentence_of(error: Exception) -> str:
    """Return why no curve came of it, in the user's language."""
    if isinstance(error, FitRefused | Refused):
        return said(error.sentence)
    return _(str(error))


def _deviations(curve: kernel.Curve, points: Points) -> Floats:
    flow_m3s = np.array(points.flow_m3s)
    stage_m = points.stage_m
    known = ~np.isnan(stage_m)
    rated = np.zeros(len(stage_m))
    rated[known] = curve.flow_at(stage_m[known])
    return deviations_percent(flow_m3s, rated)


def _verdicts(points: Points, deviations: Floats) -> list[Verdict]:
    if not len(deviations[~np.isnan(deviations)]):
        return []
    tests: list[TestResult] = [
        sign_test(deviations),
        sign_change_test(points.stage_m, deviations),
        bias_test(deviations),
    ]
    return [Verdict(said(test.verdict), test.passed) for test in tests]


def _with_fit(lines: Sequence[SegmentLine], fit: RatingFit) -> list[SegmentLine]:
    return [
        SegmentLine(
            line.lower_stage_m, line.upper_stage_m, line.c, line.h0_m, line.b,
            s.c_95, s.b_95, s.h0_95_m, 100 * s.scatter, s.gaugings, s.h0_at_limit,
        )
        for line, s in zip(lines, fit.segments, strict=True)
    ]  # fmt: skip


def _findings(fit: RatingFit) -> list[str]:
    found = []
    if fit.zero_flows_left_out:
        text = _("Gaugings without flow are left out of the fit: %(n)d.")
        found.append(text % {"n": fit.zero_flows_left_out})
    for number, segment in enumerate(fit.segments, start=1):
        if segment.h0_at_limit:
            text = _(
                "The gaugings of segment %(n)d do not tell h₀: the search ended at its limit. "
                "Give a surveyed one."
            )
            found.append(text % {"n": number})
    return found
