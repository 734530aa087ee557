"""One stage–discharge curve: stage to flow and back, by power segments or by a table."""

from collections.abc import Callable, Sequence
from dataclasses import dataclass, field

import numpy as np

from network.numerics.arrays import Floats, MarkBits
from network.numerics.marks import Mark
from network.numerics.pieces import Lines, Powers
from network.numerics.sentences import Refused, gettext_noop, sentence

SLACK_M = 1e-6  # a stage at the end of a range is inside, whatever the rounding of its sum
CHUNK = 16384  # stages worked on at a time, so that the arrays between stay in the cache


@dataclass(frozen=True)
class Segment:
    """Q = c·(h − h0)^b for stages from lower_stage_m up to where the next segment begins."""

    lower_stage_m: float
    c: float
    h0_m: float
    b: float


@dataclass(frozen=True, kw_only=True, eq=False)
class Curve:
    """What every curve says about where it may be used; stages in m above station zero.

    Outside lowest_use_m … highest_use_m there is no flow figure, except up to the stages of
    extrapolate_to_*, where given. gauged_*, where given, is the range the gaugings cover.
    """

    lowest_use_m: float
    highest_use_m: float
    extrapolate_to_low_m: float | None = None
    extrapolate_to_high_m: float | None = None
    gauged_lowest_m: float | None = None
    gauged_highest_m: float | None = None
    pieces: Powers | Lines = field(init=False, repr=False)

    def __post_init__(self) -> None:
        _refuse_unless(
            self.lowest_use_m < self.highest_use_m, gettext_noop("The range of use is empty.")
        )
        low, high = self.allowed_m
        _refuse_unless(
            low <= self.lowest_use_m and self.highest_use_m <= high,
            gettext_noop("An extrapolation ends inside the range of use."),
        )

    @property
    def allowed_m(self) -> tuple[float, float]:
        """The lowest and highest stage that get a flow, extrapolation included."""
        low, high = self.extrapolate_to_low_m, self.extrapolate_to_high_m
        return (
            self.lowest_use_m if low is None else low,
            self.highest_use_m if high is None else high,
        )

    @property
    def unmarked_m(self) -> tuple[float, float]:
        """The lowest and highest stage whose flow is no extrapolation."""
        low, high = self.gauged_lowest_m, self.gauged_highest_m
        return (
            self.lowest_use_m if low is None else max(low, self.lowest_use_m),
            self.highest_use_m if high is None else min(high, self.highest_use_m),
        )

    def flow_at(self, stage_m: Floats) -> Floats:
        """Give the flow of each stage, whatever the range of use."""
        return self.pieces.flow_at(stage_m)

    def stage_at(self, flow_m3s: Floats) -> Floats:
        """Give the stage of each flow, whatever the range of use."""
        return self.pieces.stage_at(flow_m3s)

    def _resolve_into(self, pieces: Powers | Lines) -> None:
        object.__setattr__(self, "pieces", pieces)


@dataclass(frozen=True, kw_only=True, eq=False)
class SegmentCurve(Curve):
    """One or more power segments, lowest first; the first also holds below its lower stage.

    Raises Refused where segments are out of order, c or b is not above zero, or a segment other
    than the first begins at or below its own h0.
    """

    segments: Sequence[Segment]

    def __post_init__(self) -> None:
        super().__post_init__()
        _refuse_unless(len(self.segments) > 0, gettext_noop("A curve needs at least one segment."))
        rows = np.array([(s.lower_stage_m, s.h0_m, s.b, s.c) for s in self.segments], np.float64)
        bounds_m, h0_m, b, c = rows.T.copy()
        _refuse_unless(
            np.isfinite(rows).all(), gettext_noop("A figure of a segment is not a number.")
        )
        _refuse_unless(
            (np.diff(bounds_m) > 0).all(), gettext_noop("The segments do not rise in stage.")
        )
        _refuse_unless((c > 0).all() and (b > 0).all(), gettext_noop("C and b must be above zero."))
        _refuse_unless(
            (h0_m[1:] < bounds_m[1:]).all(),
            gettext_noop("A segment begins at or below its stage of zero flow."),
        )
        self._resolve_into(Powers(bounds_m, h0_m, b, np.log(c)))


@dataclass(frozen=True, kw_only=True, eq=False)
class TableCurve(Curve):
    """Pairs of rising stage and flow; between them by rule, beyond them as in the end interval.

    stages_m, flows_m3s float64[k]. rule "log": ln Q is linear in ln(h − h0_m), a first point of
    zero flow joined linearly; rule "linear": Q is linear in h.
    Equal flows at neighbouring stages are accepted, as published tables of 3 figures have them.
    Raises Refused where the table falls or the rule cannot take its points.
    """

    stages_m: Floats
    flows_m3s: Floats
    rule: str = "log"
    h0_m: float = 0.0

    def __post_init__(self) -> None:
        super().__post_init__()
        stages_m, flows_m3s = self.stages_m, self.flows_m3s
        _refuse_unless(
            stages_m.shape == flows_m3s.shape, gettext_noop("Stages and flows differ in number.")
        )
        _refuse_unless(len(stages_m) >= 2, gettext_noop("A table needs at least two points."))
        _refuse_unless(
            (np.diff(stages_m) > 0).all() and (np.diff(flows_m3s) >= 0).all(),
            gettext_noop("Stages in the table must rise and flows must not fall."),
        )
        _refuse_unless(
            flows_m3s[0] >= 0 and flows_m3s[1] > 0 and flows_m3s[-1] > flows_m3s[-2],
            gettext_noop(
                "Flow begins at zero or above and rises in the last interval of the table."
            ),
        )
        _refuse_unless(self.rule in RULES, gettext_noop("The rule of a table is log or linear."))
        self._resolve_into(RULES[self.rule](stages_m, flows_m3s, self.h0_m))


def flow(curve: Curve, stage_m: Floats) -> tuple[Floats, MarkBits]:
    """Rate stages by one curve.

    stage_m float64[n], m above station zero; gives flow_m3s float64[n] and marks uint8[n]. At or
    below h0 the flow is exactly 0. Outside the range of use it is NaN, inside an allowed
    extrapolation or beyond the gauged range it is marked EXTRAPOLATED. Where h0 lies above the
    lowest stage of use, the range decides: no figure rather than a zero nobody vouches for.
    Source: ISO 18320:2020 (power segments), USGS practice (logarithmic tables).
    """
    flow_m3s, marks = np.empty(len(stage_m)), np.zeros(len(stage_m), np.uint8)
    rate_into(curve, stage_m, flow_m3s=flow_m3s, marks=marks)
    return flow_m3s, marks


def rate_into(curve: Curve, stage_m: Floats, *, flow_m3s: Floats, marks: MarkBits) -> None:
    """Do what flow() does, into arrays given; marks are added to those there."""
    (low, high), (sure_low, sure_high) = map(_widened, (curve.allowed_m, curve.unmarked_m))
    for start in range(0, len(stage_m), CHUNK):
        part = np.ascontiguousarray(stage_m[start : start + CHUNK])
        flow_part = flow_m3s[start : start + CHUNK]
        marks_part = marks[start : start + CHUNK]
        flow_part[:] = curve.flow_at(part)
        if not (part.min() >= sure_low and part.max() <= sure_high):
            flow_part[(part < low) | (part > high)] = np.nan
            outside = (part < sure_low) | (part > sure_high)
            marks_part[outside & ~np.isnan(flow_part)] |= np.uint8(Mark.EXTRAPOLATED)


def stage_for(curve: Curve, flow_m3s: Floats) -> Floats:
    """Give the stage at which each flow runs: the inverse of flow().

    flow_m3s float64[n], gives stage_m float64[n], NaN for negative flows and outside the range of
    use with its allowed extrapolation. For zero flow it is the cease-to-flow stage.
    Where two segments overlap at their joint, the stage of the upper one is given.
    """
    low, high = _widened(curve.allowed_m)
    stage_m = curve.stage_at(np.where(flow_m3s >= 0, flow_m3s, np.nan))
    inside = (stage_m >= low) & (stage_m <= high)
    return np.where(inside, np.clip(stage_m, *curve.allowed_m), np.nan)


def joint_gaps(curve: SegmentCurve) -> Floats:
    """Give, at each joint of k segments, by what fraction the upper flow exceeds the lower.

    float64[k − 1]; all within a percent or so of zero on a curve whose segments join.
    """
    pairs = zip(curve.segments[:-1], curve.segments[1:], strict=True)
    return np.array(
        [_power(up, up.lower_stage_m) / _power(low, up.lower_stage_m) - 1.0 for low, up in pairs]
    )


def zero_from_three_points(h1_m: float, h2_m: float, h3_m: float) -> float:
    """Give the cease-to-flow stage from three points of a curve with Q₂ = √(Q₁·Q₃).

    Exact on any power law. Raises Refused where the points do not bend as a curve with a zero.
    Source: WMO-No. 1044, volume II; ISO 18320 (from memory).
    """
    bend = h1_m + h3_m - 2.0 * h2_m
    _refuse_unless(
        h1_m < h2_m < h3_m and bend > 0,
        gettext_noop("The three points give no stage of zero flow."),
    )
    # h₀ = (h₁·h₃ − h₂²) / (h₁ + h₃ − 2·h₂)
    return (h1_m * h3_m - h2_m**2) / bend


def _widened(ends_m: tuple[float, float]) -> tuple[float, float]:
    return ends_m[0] - SLACK_M, ends_m[1] + SLACK_M


def _power(segment: Segment, stage_m: float) -> float:
    return float(segment.c * max(stage_m - segment.h0_m, 0.0) ** segment.b)


def _log_powers(stages_m: Floats, flows_m3s: Floats, h0_m: float) -> Powers:
    """Turn a table into power pieces: each interval is a power law through its two points."""
    zero_first = flows_m3s[0] == 0
    start = 1 if zero_first else 0
    _refuse_unless(
        stages_m[start] > h0_m, gettext_noop("A point of the table with flow lies at or below h0.")
    )
    ln_head, ln_flow = np.log(stages_m[start:] - h0_m), np.log(flows_m3s[start:])
    b = np.diff(ln_flow) / np.diff(ln_head)
    ln_c, zeros_m = ln_flow[:-1] - b * ln_head[:-1], np.full(len(b), h0_m)
    if zero_first:
        # Q = Q₂ · (h − h₁) / (h₂ − h₁) is a power piece with b = 1 and its zero at h₁
        b, zeros_m = np.append(1.0, b), np.append(stages_m[0], zeros_m)
        ln_c = np.append(np.log(flows_m3s[1] / (stages_m[1] - stages_m[0])), ln_c)
    return Powers(stages_m[:-1], zeros_m, b, ln_c)


def _lines(stages_m: Floats, flows_m3s: Floats, _h0_m: float) -> Lines:
    return Lines(stages_m, flows_m3s)


def _refuse_unless(holds: bool | np.bool_, reason: str) -> None:
    if not holds:
        raise Refused(sentence(reason))


RULES: dict[str, Callable[[Floats, Floats, float], Powers | Lines]] = {
    "log": _log_powers,
    "linear": _lines,
}
