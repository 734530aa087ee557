"""Fits a stage–discharge rating to gaugings: one to three power segments that meet.

Source: ISO 18320:2020, before it ISO 1100-2 (from memory).
"""

from itertools import pairwise

import numpy as np

from network.numerics.arrays import Floats, Indices
from network.numerics.ratings.fitted_rating import (
    FittedLine,
    LineSums,
    RatingFit,
    fitted_segments,
    joint_intervals,
)
from network.numerics.ratings.power_rows import JoinedRows, PowerRows, joined
from network.numerics.ratings.rating_bootstrap import redraw
from network.numerics.ratings.rating_parts import (
    FitChoice,
    FitRefused,
    Gaugings,
    firsts_of_segments,
    segment_numbers,
)
from network.numerics.ratings.rating_search import (
    FARTHEST,
    LEAST_GAUGINGS,
    search_zero,
    weighted_lines,
)
from network.numerics.sentences import gettext_noop

MEETING = 0.005  # fraction of flow by which two segments may miss each other
LEAST_SCATTER = 1e-6  # in ln Q: keeps weights finite where gaugings lie exactly on a curve


def fit_rating(
    stage_m: Floats,
    flow_m3s: Floats,
    u95_percent: Floats,
    *,
    choice: FitChoice,
    draws: int = 500,
    seed: int = 1,
) -> RatingFit:
    """Fit ln Q = ln C + b·ln(h − h₀) in each segment by weighted least squares.

    stage_m, flow_m3s, u95_percent (the gauging's 95 % uncertainty) float64[n] in any order. The
    weights are 1/(u_Q² + s²), s the scatter about the curve, iterated, so that one very good
    gauging does not rule. Zero flows are left out and counted. Breaks are searched by the smallest
    weighted residual sum; the segments are joined where they cross. draws, seed: of the bootstrap.
    Raises FitRefused with a sentence; ValueError for figures that are none.
    """
    order, gaugings = _with_flow(stage_m, flow_m3s, u95_percent)
    firsts, lines = _settle(gaugings, choice)
    fitted, gaps = _join(gaugings, lines, firsts=firsts, must_meet=choice.must_meet)
    weights, segment_of = np.zeros(len(stage_m)), np.full(len(stage_m), -1)
    weights[order] = np.concatenate([line.weights for line in lines])
    segment_of[order] = segment_numbers(len(order), firsts)
    redrawn = redraw(
        gaugings, fitted, lines=lines, choice=choice, firsts=firsts, draws=draws, seed=seed
    )
    segments = fitted_segments(lines, fitted, redrawn=redrawn, lowest_m=float(gaugings.stage_m[0]))
    return RatingFit(
        segments=segments,
        joints_95_m=joint_intervals(segments, redrawn),
        joint_gaps=gaps,
        gauged_lowest_m=float(gaugings.stage_m[0]),
        gauged_highest_m=float(gaugings.stage_m[-1]),
        zero_flows_left_out=len(stage_m) - len(order),
        deviations_percent=deviations_percent(flow_m3s, np.exp(fitted.ln_flow(stage_m)[0])),
        weights=weights,
        segment_of=segment_of,
        fitted=fitted,
        redrawn=redrawn,
    )


def deviations_percent(flow_m3s: Floats, curve_m3s: Floats) -> Floats:
    """Give by how many % each gauging lies above its curve, NaN where either flow is zero."""
    usable = (flow_m3s > 0) & (curve_m3s > 0)
    # 100·(Q − Q̂)/Q̂
    return np.where(usable, 100 * (flow_m3s / np.where(usable, curve_m3s, 1) - 1), np.nan)


def _with_flow(stage_m: Floats, flow_m3s: Floats, u95_percent: Floats) -> tuple[Indices, Gaugings]:
    """Check the figures and give the gaugings with flow rising in stage, and where they stood."""
    if not len(stage_m) == len(flow_m3s) == len(u95_percent):
        raise ValueError("Stages, flows and uncertainties differ in number.")
    for name, values in (("stage", stage_m), ("flow", flow_m3s), ("uncertainty", u95_percent)):
        if not np.isfinite(values).all():
            raise ValueError(f"A {name} is missing or not a number.")
    if (flow_m3s < 0).any() or (u95_percent < 0).any():
        raise ValueError("A flow or an uncertainty is negative.")
    order = np.argsort(stage_m, kind="stable")
    order = order[flow_m3s[order] > 0]
    return order, Gaugings(stage_m[order], np.log(flow_m3s[order]), u95_percent[order] / 200)


def _settle(gaugings: Gaugings, choice: FitChoice) -> tuple[Indices, list[FittedLine]]:
    """Part the gaugings and fit each part, until searched breaks and weights agree."""
    least = LEAST_GAUGINGS * len(choice.zeros_m)
    if len(gaugings.stage_m) < least:
        raise FitRefused(
            gettext_noop("{count} gaugings with flow; {least} are needed, 5 to each segment."),
            count=len(gaugings.stage_m), least=least,
        )  # fmt: skip
    firsts = firsts_of_segments(gaugings, choice, np.ones(len(gaugings.stage_m)))
    for _ in range(10):
        lines = _lines(gaugings, choice, firsts)
        scatter2 = np.mean([line.scatter**2 for line in lines])
        found = firsts_of_segments(gaugings, choice, 1 / (gaugings.u**2 + scatter2))
        if (found == firsts).all():
            break
        firsts = found
    return firsts, lines


def _lines(gaugings: Gaugings, choice: FitChoice, firsts: Indices) -> list[FittedLine]:
    ends = [0, *firsts.tolist(), len(gaugings.stage_m)]
    lines = []
    for number, (zero_m, (start, stop)) in enumerate(
        zip(choice.zeros_m, pairwise(ends), strict=True), start=1
    ):
        part = gaugings.part(start, stop)
        _refuse(part, zero_m, number)
        # a searched break is a parameter too: of the segment above it
        searched = (zero_m is None) + (number > 1 and choice.breaks_m[number - 2] is None)
        lines.append(_line(part, zero_m, freedom=len(part.stage_m) - 2 - searched))
        if lines[-1].power.b[0] <= 0:
            raise FitRefused(
                gettext_noop("In segment {number} flow does not rise with stage."), number=number
            )
    return lines


def _refuse(part: Gaugings, zero_m: float | None, number: int) -> None:
    """Refuse a segment whose gaugings do not carry a line."""
    count = len(part.stage_m)
    if count < LEAST_GAUGINGS:
        raise FitRefused(
            gettext_noop("Segment {number} has {count} gaugings with flow; 5 are needed."),
            number=number, count=count,
        )  # fmt: skip
    if part.stage_m[0] == part.stage_m[-1]:
        raise FitRefused(
            gettext_noop("All gaugings of segment {number} are at one stage, {stage:.3f} m."),
            number=number, stage=float(part.stage_m[0]),
        )  # fmt: skip
    if zero_m is not None and zero_m >= part.stage_m[0]:
        raise FitRefused(
            gettext_noop(
                "h₀ of segment {number}, {zero:.3f} m, is not below its lowest gauging with flow, "
                "{stage:.3f} m."
            ),
            number=number, zero=zero_m, stage=float(part.stage_m[0]),
        )  # fmt: skip


def _line(part: Gaugings, zero_m: float | None, *, freedom: int) -> FittedLine:
    """Fit one segment, its weights iterated until the scatter stands."""
    n, stage_m, y = len(part.stage_m), part.stage_m, part.ln_flow[None, :]
    scatter, h0_m = 1.0, zero_m if zero_m is not None else np.nan
    for _ in range(60):
        # w = 1/(u_Q² + s²)
        w = 1 / (part.u**2 + scatter**2)
        if zero_m is None:
            h0_m = float(search_zero(stage_m, y, w[None, :], steps=34)[0])
        line = weighted_lines(np.log(stage_m - h0_m)[None, :], y, w)
        variance = float(line.ssr[0]) / freedom
        # s² = Σ w·r²/(N − p) · N/Σw
        last, scatter = scatter, max(float(np.sqrt(variance * n / w.sum())), LEAST_SCATTER)
        if abs(scatter - last) <= 1e-8 * last:
            break
    sums = LineSums(
        variance=variance,
        sum_w=float(w.sum()),
        x_mean=float(line.x_mean[0]),
        sum_xx=float(line.sum_xx[0]),
        degrees_of_freedom=freedom,
    )
    far = stage_m[0] - h0_m > 0.999 * FARTHEST * (stage_m[-1] - stage_m[0])
    power = PowerRows(line.a, np.array([h0_m]), line.b)
    return FittedLine(power, sums, scatter, w, zero_m is not None, bool(far and zero_m is None))


def _join(
    gaugings: Gaugings, lines: list[FittedLine], *, firsts: Indices, must_meet: bool
) -> tuple[JoinedRows, tuple[float, ...]]:
    """Join the lines where they cross; where they do not, at the break, with the gap there."""
    stage_m, powers = gaugings.stage_m, tuple(line.power for line in lines)
    near_m = ((stage_m[firsts - 1] + stage_m[firsts]) / 2)[None, :]
    joints_m = joined(
        powers,
        lowest_m=stage_m[[0, *firsts]][None, :],
        highest_m=stage_m[[*(firsts - 1), -1]][None, :],
        near_m=near_m,
    )
    joints_m = np.where(np.isnan(joints_m), near_m, joints_m)
    gaps = []
    for (low, up), joint_m in zip(pairwise(powers), joints_m[0], strict=True):
        at = np.array([joint_m])
        gaps.append(float(np.exp(up.ln_flow(at) - low.ln_flow(at))[0, 0] - 1))
    if must_meet:
        _refuse_gaps(gaps, joints_m[0])
    return JoinedRows(powers, joints_m), tuple(gaps)


def _refuse_gaps(gaps: list[float], joints_m: Floats) -> None:
    for number, gap in enumerate(gaps, start=1):
        if abs(gap) > MEETING:
            raise FitRefused(
                gettext_noop(
                    "Segments {lower} and {upper} do not meet: at {stage:.3f} m the upper gives "
                    "{gap:+.1f} % against the lower; 0.5 % is allowed."
                ),
                lower=number, upper=number + 1, stage=float(joints_m[number - 1]), gap=100 * gap,
            )  # fmt: skip
    if (np.diff(joints_m) <= 0).any():
        raise FitRefused(gettext_noop("The segments cross in the wrong order."))
