"""Redraws the gaugings of a fitted rating many times and fits each draw again, all at once."""

from collections.abc import Sequence

import numpy as np

from network.numerics.arrays import Floats, Indices
from network.numerics.ratings.fitted_rating import FittedLine
from network.numerics.ratings.power_rows import JoinedRows, PowerRows, joined
from network.numerics.ratings.rating_parts import FitChoice, Gaugings, positions, segment_numbers
from network.numerics.ratings.rating_search import search_breaks, search_zero, weighted_lines

MOST_POSITIONS = 64  # breaks tried in a draw: closer together than the draws scatter


def redraw(
    gaugings: Gaugings,
    fitted: JoinedRows,
    *,
    lines: Sequence[FittedLine],
    choice: FitChoice,
    firsts: Indices,
    draws: int,
    seed: int,
) -> JoinedRows | None:
    """Fit `draws` sets of gaugings drawn about the fitted curve, one row each, if anything is free.

    lines: the fitted segments; firsts: the first gauging of each upper one. A draw is the curve
    plus normal errors of variance/weight, the variance itself drawn from its distribution (χ² at
    N − p), so that the intervals would be those of Student's t if nothing were searched; then there
    is none (None). The weights stay. Seeded, so the same gaugings give the same band.
    Source: parametric bootstrap (Efron and Tibshirani 1993), from memory.
    """
    if None not in (*choice.zeros_m, *choice.breaks_m):
        return None
    random = np.random.default_rng(seed)
    stage_m, weights = gaugings.stage_m, np.concatenate([line.weights for line in lines])
    freedom = np.array([line.sums.degrees_of_freedom for line in lines], dtype=np.float64)
    variances = np.array([line.sums.variance for line in lines])
    # σ* = σ·√(ν/χ²_ν)
    spread = np.sqrt(variances * freedom / random.chisquare(freedom, (draws, len(lines))))
    errors = random.standard_normal((draws, len(stage_m))) / np.sqrt(weights)
    y = fitted.ln_flow(stage_m) + errors * spread[:, segment_numbers(len(stage_m), firsts)]
    firsts_of_rows = np.tile(firsts, (draws, 1))
    if None in choice.breaks_m:
        tried_for = positions(gaugings, choice)
        thin = [tried[:: -(-len(tried) // MOST_POSITIONS)] for tried in tried_for]
        found = search_breaks(stage_m, y, weights, zeros_m=choice.zeros_m, positions=thin)
        firsts_of_rows = np.where(found >= 0, found, firsts_of_rows)
    return _fit_rows(stage_m, y, weights, firsts=firsts_of_rows, zeros_m=choice.zeros_m)


def _fit_rows(
    stage_m: Floats, y: Floats, w: Floats, *, firsts: Indices, zeros_m: Sequence[float | None]
) -> JoinedRows:
    rows, n = y.shape
    starts = np.column_stack([np.zeros(rows, dtype=np.intp), firsts])
    stops = np.column_stack([firsts, np.full(rows, n)])
    segments = []
    for start, stop, zero_m in zip(starts.T, stops.T, zeros_m, strict=True):
        # what no row uses is cut off, what this row does not use has no weight
        span = slice(int(start.min()), int(stop.max()))
        at = np.arange(n)[span]
        mine = (at >= start[:, None]) & (at < stop[:, None])
        segments.append(_power_rows(stage_m[span], y[:, span], w[span] * mine, zero_m))
    near_m = (stage_m[firsts - 1] + stage_m[firsts]) / 2
    joints_m = joined(
        tuple(segments), lowest_m=stage_m[starts], highest_m=stage_m[stops - 1], near_m=near_m
    )
    return JoinedRows(tuple(segments), np.where(np.isnan(joints_m), near_m, joints_m))


def _power_rows(stage_m: Floats, y: Floats, w: Floats, zero_m: float | None) -> PowerRows:
    h0_m = np.full(len(y), zero_m) if zero_m is not None else search_zero(stage_m, y, w, steps=12)
    x = np.log(np.maximum(stage_m - h0_m[:, None], 1e-30))
    lines = weighted_lines(np.where(w > 0, x, 0.0), y, w)
    return PowerRows(lines.a, h0_m, lines.b)
