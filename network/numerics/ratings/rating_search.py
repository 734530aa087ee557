"""Searches a rating fit needs: weighted lines by the row, stage of zero flow, breaks, crossings.

A row is one set of ln Q on the same stages: one for a fit, many for a bootstrap. Everything runs
over all rows at once; the sums are closed forms, so no solver is called.
"""

from collections.abc import Callable, Sequence
from dataclasses import dataclass
from itertools import pairwise

import numpy as np

from network.numerics.arrays import Floats, Indices

LEAST_GAUGINGS = 5  # of a segment
NEAREST, FARTHEST = 1e-3, 5.0  # of h₀ below the lowest stage, in ranges of stage of the segment
GOLDEN = (np.sqrt(5) - 1) / 2
CELLS = 2_000_000  # of one temporary array: 16 MB


@dataclass(frozen=True, eq=False)
class Lines:
    """Weighted straight lines y = a + b·x, arrays over rows, with the sums they rest on."""

    a: Floats
    b: Floats
    x_mean: Floats
    sum_w: Floats
    sum_xx: Floats  # Σ w·(x − x̄)²
    ssr: Floats  # Σ w·r²


def weighted_lines(x: Floats, y: Floats, w: Floats) -> Lines:
    """Fit a line to each row by weighted least squares; x, y, w broadcast to (rows, n).

    Source: normal equations in centred form.
    """
    sum_w = np.sum(w, axis=-1)
    x_mean = np.sum(w * x, axis=-1) / sum_w
    y_mean = np.sum(w * y, axis=-1) / sum_w
    dx, dy = x - x_mean[..., None], y - y_mean[..., None]
    wdx = w * dx
    sum_xx = np.sum(wdx * dx, axis=-1)
    # b = Σ w·dx·dy / Σ w·dx², a = ȳ − b·x̄
    b = np.sum(wdx * dy, axis=-1) / sum_xx
    residual = dy - b[..., None] * dx
    ssr = np.sum(w * residual * residual, axis=-1)
    return Lines(y_mean - b * x_mean, b, x_mean, sum_w, sum_xx, ssr)


def search_zero(stage_m: Floats, y: Floats, w: Floats, *, steps: int) -> Floats:
    """Search the stage of zero flow of each row that leaves the smallest weighted residual sum.

    stage_m float64[n] rising, y and w (rows, n); weight 0 keeps a gauging out. Gives h0_m
    float64[rows], always below the row's lowest stage in use. The distance below it is scanned on
    a logarithmic scale, then narrowed by so many steps of the golden section: its error is about
    0.618^steps of itself.
    """
    used = w > 0
    first, last = used.argmax(axis=-1), len(stage_m) - 1 - used[:, ::-1].argmax(axis=-1)
    low_m, range_m = stage_m[first], stage_m[last] - stage_m[first]
    above_m = np.maximum(stage_m - low_m[:, None], 0.0)
    sum_w = w.sum(axis=-1)
    dy = y - (_row_sums(w, y) / sum_w)[:, None]
    wdy = w * dy
    sum_yy = _row_sums(wdy, dy)

    def residual_sum(ln_distance: Floats) -> Floats:
        x = np.log(above_m + (range_m * np.exp(ln_distance))[:, None])
        wx = w * x
        sum_x = wx.sum(axis=-1)
        # Σ w·r² = S_yy − S_xy² / S_xx
        remainder: Floats = sum_yy - _row_sums(wdy, x) ** 2 / (
            _row_sums(wx, x) - sum_x * sum_x / sum_w
        )
        return remainder

    best = _least(residual_sum, np.log(NEAREST), np.log(FARTHEST), steps)
    h0_m: Floats = low_m - range_m * np.exp(best)
    return h0_m


def _row_sums(a: Floats, b: Floats) -> Floats:
    sums: Floats = np.einsum("rn,rn->r", a, b)
    return sums


def _least(of: Callable[[Floats], Floats], low: float, high: float, steps: int) -> Floats:
    """Find where a function of one number per row is least: a scan, then golden section."""
    scan = np.linspace(low, high, 17)
    found = np.array([of(np.array([t])) for t in scan])
    at, step = scan[found.argmin(axis=0)], scan[1] - scan[0]
    left, right = np.maximum(at - step, low), np.minimum(at + step, high)
    inner, outer = right - GOLDEN * (right - left), left + GOLDEN * (right - left)
    f_inner, f_outer = of(inner), of(outer)
    for _ in range(steps):
        lower = f_inner < f_outer
        left, right = np.where(lower, left, inner), np.where(lower, outer, right)
        fresh = np.where(lower, right - GOLDEN * (right - left), left + GOLDEN * (right - left))
        f_fresh = of(fresh)
        inner, outer = np.where(lower, fresh, outer), np.where(lower, inner, fresh)
        f_inner, f_outer = np.where(lower, f_fresh, f_outer), np.where(lower, f_inner, f_fresh)
    least: Floats = np.where(f_inner < f_outer, inner, outer)
    return least


def search_breaks(
    stage_m: Floats,
    y: Floats,
    w: Floats,
    *,
    zeros_m: Sequence[float | None],
    positions: Sequence[Indices],
) -> Indices:
    """Choose, for each row, where the segments part by the smallest weighted residual sum.

    stage_m float64[n] rising, y (rows, n), w float64[n]; zeros_m one per segment, None = searched
    over a grid; positions one array per break: indices of the first gauging above it to choose
    from. Gives (rows, breaks). Segments of fewer than 5 gaugings or of one stage are not chosen;
    where nothing can be chosen the row is −1. Source: common practice (exhaustive search).
    """
    n, last = len(stage_m), len(zeros_m) - 1
    inner = [grid.ravel() for grid in np.meshgrid(*positions, indexing="ij")]
    ends = np.vstack([np.zeros_like(inner[0]), *inner, np.full_like(inner[0], n)])
    ends = ends[:, (np.diff(ends, axis=0) >= LEAST_GAUGINGS).all(axis=0)]
    grids = [_zero_grid(stage_m, zero, lowest=k == 0) for k, zero in enumerate(zeros_m)]
    found = np.full((len(y), last), -1, dtype=np.intp)
    if not ends.size:
        return found
    step = max(1, CELLS // (n * max(map(len, grids))))
    for start in range(0, len(y), step):
        rows = slice(start, start + step)
        total = _totals(stage_m, y[rows], w, ends=ends, grids=grids)
        best = total.argmin(axis=-1)
        possible = np.isfinite(total[np.arange(len(best)), best])
        found[rows][possible] = ends[1:-1, best].T[possible]
    return found


def _totals(
    stage_m: Floats, y: Floats, w: Floats, *, ends: Indices, grids: Sequence[Floats]
) -> Floats:
    """Sum the residual sums of the segments of each choice of ends: (rows, choices)."""
    base = len(stage_m) + 1
    total = np.zeros((len(y), ends.shape[1]))
    for grid, (start, stop) in zip(grids, pairwise(ends), strict=True):
        codes, back = np.unique(start * base + stop, return_inverse=True)
        total += _residual_sums(stage_m, y, w, grid=grid, spans=np.divmod(codes, base))[:, back]
    return total


def _residual_sums(
    stage_m: Floats, y: Floats, w: Floats, *, grid: Floats, spans: tuple[Indices, Indices]
) -> Floats:
    """Fit a line to every span [start, stop) by prefix sums, with the best h₀ of the grid.

    Gives (rows, spans); infinite where the span has one stage only or no h₀ lies below it.
    """
    heads_m = stage_m - grid[:, None]
    x = np.log(np.maximum(heads_m, 1e-30))
    x = x - x.mean(axis=-1, keepdims=True)
    y = y - y.mean(axis=-1, keepdims=True)
    p_w, p_x, p_xx = _prefix(w), _prefix(w * x), _prefix(w * x * x)
    p_y, p_yy, p_xy = _prefix(w * y), _prefix(w * y * y), _prefix((w * y)[:, None, :] * x)
    sums = np.empty((len(y), len(spans[0])))
    step = max(1, CELLS // (len(y) * len(grid)))
    for first in range(0, len(spans[0]), step):
        i, j = (ends[first : first + step] for ends in spans)
        s_w, s_x, s_y = p_w[j] - p_w[i], p_x[:, j] - p_x[:, i], p_y[:, j] - p_y[:, i]
        s_xx = p_xx[:, j] - p_xx[:, i] - s_x * s_x / s_w
        usable = (heads_m[:, i] > 0) & (stage_m[j - 1] > stage_m[i])
        share = np.where(usable, 1 / np.where(usable, s_xx, 1), -np.inf)
        # Σ w·r² = S_yy − S_xy² / S_xx, a falling line taken as level
        s_xy = p_xy[..., j] - p_xy[..., i] - (s_x / s_w) * s_y[:, None, :]
        explained = (np.maximum(s_xy, 1e-150) ** 2 * share).max(axis=1)
        sums[:, first : first + step] = p_yy[:, j] - p_yy[:, i] - s_y * s_y / s_w - explained
    return sums


def _prefix(terms: Floats) -> Floats:
    """Sum along the last axis from the left, beginning with 0."""
    sums = np.zeros((*terms.shape[:-1], terms.shape[-1] + 1))
    np.cumsum(terms, axis=-1, out=sums[..., 1:])
    return sums


def _zero_grid(stage_m: Floats, zero_m: float | None, *, lowest: bool) -> Floats:
    """Lay out the stages of zero flow to try: dense below the lowest stage, even above it."""
    if zero_m is not None:
        return np.array([zero_m])
    range_m = stage_m[-1] - stage_m[0]
    below: Floats = stage_m[0] - range_m * np.geomspace(NEAREST, FARTHEST, 20)
    if lowest:
        return below
    return np.append(below, np.linspace(stage_m[0], stage_m[-LEAST_GAUGINGS], 16, endpoint=False))
