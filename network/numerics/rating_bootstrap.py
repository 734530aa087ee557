"""Redraws the gaugings of a fitted rating many times and fits each draw again, all at once."""

from collections.abc import Sequence

import numpy as np

from network.numerics.arrays import Floats, Indices
from network.numerics.fitted_rating import LineSums
from network.numerics.power_rows import JoinedRows, PowerRows, joined
from network.numerics.rating_search import search_breaks, search_zero, weighted_lines

MOST_POSITIONS = 32  # breaks tried in a draw: closer than the draws scatter


def redraw(
    stage_m: Floats,
    fitted: JoinedRows,
    *,
    weights: Floats,
    sums: Sequence[LineSums],
    firsts: Indices,
    zeros_m: Sequence[float | None],
    positions: Sequence[Indices],
    draws: int,
    seed: int,
) -> JoinedRows:
    """Fit `draws` sets of gaugings drawn about the fitted curve, one row each.

    stage_m and weights float64[n], stages rising; sums of each segment; firsts: index of the first
    gauging of each upper segment; positions: those tried for each break, one where it is given;
    zeros_m None = searched. A draw is the curve plus normal errors of variance/weight, the
    variance itself drawn from its distribution (χ² at N − p), so that where nothing is searched
    the intervals are those of Student's t. The weights stay. Seeded, so the same gaugings give the
    same band.
    Source: parametric bootstrap (Efron and Tibshirani 1993), from memory.
    """
    random = np.random.default_rng(seed)
    segment_of = np.searchsorted(firsts, np.arange(len(stage_m)), side="right")
    freedom = np.array([s.degrees_of_freedom for s in sums], dtype=np.float64)
    variances = np.array([s.variance for s in sums])
    # σ* = σ·√(ν/χ²_ν)
    spread = np.sqrt(variances * freedom / random.chisquare(freedom, (draws, len(freedom))))
    errors = random.standard_normal((draws, len(stage_m))) / np.sqrt(weights)
    y = fitted.ln_flow(stage_m) + errors * spread[:, segment_of]
    firsts_of_rows = np.tile(firsts, (draws, 1))
    if any(len(tried) > 1 for tried in positions):
        thin = [tried[:: -(-len(tried) // MOST_POSITIONS)] for tried in positions]
        found = search_breaks(stage_m, y, weights, zeros_m=zeros_m, positions=thin)
        firsts_of_rows = np.where(found >= 0, found, firsts_of_rows)
    return _fit_rows(stage_m, y, weights, firsts=firsts_of_rows, zeros_m=zeros_m)


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
