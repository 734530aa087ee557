"""A rating as fitted: its segments, its band, and what each gauging says about it."""

from collections.abc import Sequence
from dataclasses import dataclass
from itertools import pairwise

import numpy as np
from scipy.special import ndtr, ndtri, stdtrit

from network.numerics.arrays import Floats, Indices
from network.numerics.ratings.curves import Segment, SegmentCurve
from network.numerics.ratings.power_rows import JoinedRows, PowerRows

Interval = tuple[float, float]


@dataclass(frozen=True)
class LineSums:
    """The weighted sums of a fitted line ln Q = ln c + b·x, x = ln(h − h0); h0 taken as known.

    variance is the mean square of the weighted residuals, Σ w·r²/(N − p).
    """

    variance: float
    sum_w: float
    x_mean: float
    sum_xx: float
    degrees_of_freedom: int

    @property
    def t_95(self) -> float:
        """Student's t for 95 %, two-sided, at N − p."""
        return float(stdtrit(self.degrees_of_freedom, 0.975))

    def covariance(self, x1: Floats, x2: Floats) -> Floats:
        """Give the covariance of ln Q between x1 and x2, which broadcast."""
        # cov = σ²·(1/Σw + (x₁ − x̄)(x₂ − x̄)/Σw(x − x̄)²)
        return self.variance * (
            1 / self.sum_w + (x1 - self.x_mean) * (x2 - self.x_mean) / self.sum_xx
        )


@dataclass(frozen=True, eq=False)
class FittedLine:
    """One segment's line before it is joined to its neighbours: a power law of one row.

    weights float64 of its gaugings; zero_given: h0 was not searched; zero_at_limit: its search
    ended at the far end of the range.
    """

    power: PowerRows
    sums: LineSums
    scatter: float
    weights: Floats
    zero_given: bool
    zero_at_limit: bool


@dataclass(frozen=True)
class FittedSegment:
    """Q = c·(h − h0)^b from lower_stage_m up, and how well it is known; intervals hold with 95 %.

    scatter is S_e, the standard deviation of the gaugings about the curve in ln Q. h0_at_limit:
    the search ended at the far end of its range, so the gaugings do not tell h0.
    """

    lower_stage_m: float
    c: float
    h0_m: float
    b: float
    gaugings: int
    scatter: float
    c_95: Interval
    b_95: Interval
    h0_95_m: Interval | None  # None where h0 was given
    h0_at_limit: bool
    sums: LineSums

    def x(self, stage_m: Floats) -> Floats:
        """Give ln(h − h0), far below zero at and under h0."""
        return np.log(np.maximum(stage_m - self.h0_m, 1e-30))


@dataclass(frozen=True, eq=False)
class RatingFit:
    """A fitted curve with its band.

    Arrays follow the order of the gaugings handed in: deviations_percent, gauging over curve − 1
    (NaN where the flow is zero or the curve is); weights of the fit (0 where the flow is zero);
    segment_of, the segment whose line the gauging served (−1 where the flow is zero).
    joint_gaps: upper over lower flow − 1 at each joint, 0 where the segments cross.
    redrawn holds the curves of the bootstrap, None where nothing was searched.
    """

    segments: tuple[FittedSegment, ...]
    joints_95_m: tuple[Interval, ...]
    joint_gaps: tuple[float, ...]
    gauged_lowest_m: float
    gauged_highest_m: float
    zero_flows_left_out: int
    deviations_percent: Floats
    weights: Floats
    segment_of: Indices
    fitted: JoinedRows
    redrawn: JoinedRows | None

    def flow_at(self, stage_m: Floats) -> Floats:
        """Give the flow of each stage, float64[n] m³/s; 0 at and below h0."""
        flow_m3s: Floats = np.exp(self.fitted.ln_flow(stage_m)[0])
        return flow_m3s

    def band_at(self, stage_m: Floats) -> tuple[Floats, Floats]:
        """Give the 95 % band of the mean relation, lower and upper, float64[n] m³/s each.

        By Student's t at N − p when h0 and breaks are given, else from the redrawn curves.
        """
        if self.redrawn is not None:
            return self._redrawn_band(self.redrawn, stage_m)
        ln_flow, half = self.fitted.ln_flow(stage_m)[0], np.zeros(len(stage_m))
        for k, segment in enumerate(self.segments):
            mine = self._segment_at(stage_m) == k
            x = segment.x(stage_m[mine])
            # ln Q̂ ± t·√(var)
            half[mine] = segment.sums.t_95 * np.sqrt(segment.sums.covariance(x, x))
        return np.exp(ln_flow - half), np.exp(ln_flow + half)

    def scatter_at(self, stage_m: Floats) -> Floats:
        """Give S_e in ln Q of the segment in which each stage lies, float64[n]."""
        scatters: Floats = np.array([s.scatter for s in self.segments])
        return scatters[self._segment_at(stage_m)]

    def ln_covariance(self, stage_m: Floats) -> Floats:
        """Give the covariance of ln Q̂ between stages above h0, float64[n, n]."""
        if self.redrawn is not None:
            ln_flow = np.maximum(self.redrawn.ln_flow(stage_m), -30.0)
            return np.atleast_2d(np.cov(ln_flow, rowvar=False))
        covariance = np.zeros((len(stage_m), len(stage_m)))
        for k, segment in enumerate(self.segments):
            mine = self._segment_at(stage_m) == k
            x = segment.x(stage_m[mine])
            covariance[np.ix_(mine, mine)] = segment.sums.covariance(x[:, None], x[None, :])
        return covariance

    def curve(self, *, lowest_use_m: float, highest_use_m: float) -> SegmentCurve:
        """Give the curve of a rating version with its range of use."""
        return SegmentCurve(
            segments=tuple(Segment(s.lower_stage_m, s.c, s.h0_m, s.b) for s in self.segments),
            lowest_use_m=lowest_use_m,
            highest_use_m=highest_use_m,
            gauged_lowest_m=self.gauged_lowest_m,
            gauged_highest_m=self.gauged_highest_m,
        )

    def _redrawn_band(self, redrawn: JoinedRows, stage_m: Floats) -> tuple[Floats, Floats]:
        """Take the 2.5 and 97.5 percentiles, the wider side on both sides of the curve in ln Q.

        Curves joined where they cross round the corner off on one side, the fitted one as well as
        the redrawn: there plain percentiles hold the truth in two cases of three only.
        """
        flows, curve = np.exp(redrawn.ln_flow(stage_m)), self.flow_at(stage_m)
        lower, upper = np.percentile(flows, [2.5, 97.5], axis=0)
        # Q̂²/Q_upper and Q̂²/Q_lower are the mirror images in ln Q, where the flow is not zero
        flowing = lower > 0
        squared, one = curve**2, np.ones(len(stage_m))
        mirrored_lower = squared / np.where(flowing, upper, one)
        mirrored_upper = squared / np.where(flowing, lower, one)
        return (
            np.where(flowing, np.minimum(lower, mirrored_lower), lower),
            np.where(flowing, np.maximum(upper, mirrored_upper), upper),
        )

    def _segment_at(self, stage_m: Floats) -> Indices:
        return np.searchsorted(self.fitted.joints_m[0], stage_m, side="right")


def fitted_segments(
    lines: Sequence[FittedLine], fitted: JoinedRows, *, redrawn: JoinedRows | None, lowest_m: float
) -> tuple[FittedSegment, ...]:
    """Put joined lines into the words of a rating; lowest_m is the lowest gauging with flow."""
    lower_stages_m = [lowest_m, *fitted.joints_m[0].tolist()]
    return tuple(
        _fitted_segment(
            line, lower_stage_m=lower_m, redrawn=redrawn.segments[k] if redrawn else None
        )
        for k, (line, lower_m) in enumerate(zip(lines, lower_stages_m, strict=True))
    )


def joint_intervals(
    segments: Sequence[FittedSegment], redrawn: JoinedRows | None
) -> tuple[Interval, ...]:
    """Give the 95 % interval of the stage of each joint."""
    if redrawn is not None:
        joints = zip(redrawn.joints_m.T, segments[1:], strict=True)
        return tuple(_bias_corrected(rows, upper.lower_stage_m) for rows, upper in joints)
    return tuple(_joint_interval(low, up) for low, up in pairwise(segments))


def _fitted_segment(
    line: FittedLine, *, lower_stage_m: float, redrawn: PowerRows | None
) -> FittedSegment:
    """Take the intervals from the sums or, where something was searched, from the redrawn rows."""
    ln_c, h0_m, b = (float(value[0]) for value in (line.power.ln_c, line.power.h0_m, line.power.b))
    if redrawn is None:
        spread = line.sums.t_95 * np.sqrt(line.sums.covariance(np.zeros(1), np.zeros(1))[0])
        ln_c_95 = (ln_c - spread, ln_c + spread)
        # b ± t·σ/√Σw(x − x̄)²
        spread = line.sums.t_95 * np.sqrt(line.sums.variance / line.sums.sum_xx)
        b_95 = (b - spread, b + spread)
    else:
        ln_c_95, b_95 = _bias_corrected(redrawn.ln_c, ln_c), _bias_corrected(redrawn.b, b)
    return FittedSegment(
        lower_stage_m=lower_stage_m,
        c=float(np.exp(ln_c)),
        h0_m=h0_m,
        b=b,
        gaugings=len(line.weights),
        scatter=line.scatter,
        c_95=(float(np.exp(ln_c_95[0])), float(np.exp(ln_c_95[1]))),
        b_95=(float(b_95[0]), float(b_95[1])),
        h0_95_m=_bias_corrected(redrawn.h0_m, h0_m) if redrawn and not line.zero_given else None,
        h0_at_limit=line.zero_at_limit,
        sums=line.sums,
    )


def _joint_interval(lower: FittedSegment, upper: FittedSegment) -> Interval:
    """Carry the errors of two segments over to the stage at which they cross."""
    stage_m = upper.lower_stage_m
    variance = 0.0
    for segment in (lower, upper):
        x = segment.x(np.array([stage_m]))
        variance += float(segment.sums.covariance(x, x)[0])
    # δh = δ(ln Q₂ − ln Q₁) / (b₂/(h − h₀₂) − b₁/(h − h₀₁))
    slope = upper.b / (stage_m - upper.h0_m) - lower.b / (stage_m - lower.h0_m)
    t = max(lower.sums.t_95, upper.sums.t_95)
    half = t * np.sqrt(variance) / abs(slope) if slope else np.inf
    return (float(stage_m - half), float(stage_m + half))


def _bias_corrected(rows: Floats, estimate: float) -> Interval:
    """Give the 95 % interval of redrawn values, its percentiles shifted by the draws' own bias.

    Source: bias-corrected percentiles (Efron 1981, from memory); plain ones held 90 % at times.
    """
    share = np.clip(np.mean(rows < estimate), 0.5 / len(rows), 1 - 0.5 / len(rows))
    # z₀ = Φ⁻¹(share of draws below the estimate), percentiles at Φ(2·z₀ ± 1.96)
    levels = ndtr(2 * ndtri(share) + ndtri([0.025, 0.975]))
    low, high = np.quantile(rows, levels)
    return (float(low), float(high))
