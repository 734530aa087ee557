"""Many power curves at once: ln Q by row, segments joined where they cross."""

from dataclasses import dataclass
from itertools import pairwise

import numpy as np

from network.numerics.arrays import Bools, Floats


@dataclass(frozen=True, eq=False)
class PowerRows:
    """Power laws ln Q = ln_c + b·ln(h − h0_m), arrays over rows."""

    ln_c: Floats
    h0_m: Floats
    b: Floats

    def ln_flow(self, stage_m: Floats) -> Floats:
        """Give ln Q of (rows, stages) or of one list of stages; −∞ at and below h₀."""
        with np.errstate(divide="ignore"):
            ln_head = np.log(np.maximum(stage_m - self.h0_m[:, None], 0.0))
        return self.ln_c[:, None] + self.b[:, None] * ln_head


@dataclass(frozen=True, eq=False)
class JoinedRows:
    """Curves of one to three segments, lowest first; joints_m (rows, segments − 1) rising."""

    segments: tuple[PowerRows, ...]
    joints_m: Floats

    def ln_flow(self, stage_m: Floats) -> Floats:
        """Give ln Q of (rows, stages) from one list of stages."""
        ln_flow = self.segments[0].ln_flow(stage_m)
        for segment, joint_m in zip(self.segments[1:], self.joints_m.T, strict=True):
            ln_flow = np.where(stage_m >= joint_m[:, None], segment.ln_flow(stage_m), ln_flow)
        return ln_flow


def joined(
    segments: tuple[PowerRows, ...], *, lowest_m: Floats, highest_m: Floats, near_m: Floats
) -> Floats:
    """Find the joints of neighbouring segments: (rows, segments − 1), NaN where they do not cross.

    lowest_m and highest_m (rows, segments) are the stages each segment was fitted on, near_m
    (rows, segments − 1) the stages at which their gaugings part.
    """
    return np.column_stack(
        [
            crossings(low, up, between_m=(lowest_m[:, k], highest_m[:, k + 1]), near_m=near_m[:, k])
            for k, (low, up) in enumerate(pairwise(segments))
        ]
        or [near_m]
    )


def crossings(
    lower: PowerRows, upper: PowerRows, *, between_m: tuple[Floats, Floats], near_m: Floats
) -> Floats:
    """Find the stage at which two power laws cross, by row; NaN where they do not.

    between_m and near_m float64[rows]; of several crossings the one nearest to near_m.
    """
    least = np.maximum(lower.h0_m, upper.h0_m)
    low = np.maximum(between_m[0], least + 1e-9 * np.maximum(np.abs(least), 1))
    high = np.maximum(between_m[1], low)
    grid = low[:, None] + (high - low)[:, None] * np.linspace(0, 1, 129)

    def below(stage_m: Floats) -> Bools:
        # ln Q₂ < ln Q₁
        rise = upper.ln_c[:, None] + upper.b[:, None] * np.log(stage_m - upper.h0_m[:, None])
        other = lower.ln_c[:, None] + lower.b[:, None] * np.log(stage_m - lower.h0_m[:, None])
        return rise < other

    side = below(grid)
    turns = side[:, 1:] != side[:, :-1]
    distance = np.where(turns, np.abs((grid[:, 1:] + grid[:, :-1]) / 2 - near_m[:, None]), np.inf)
    rows, at = np.arange(len(grid)), distance.argmin(axis=1)
    left, right, first = grid[rows, at], grid[rows, at + 1], side[rows, at]
    for _ in range(40):
        middle = (left + right) / 2
        same = below(middle[:, None])[:, 0] == first
        left, right = np.where(same, middle, left), np.where(same, right, middle)
    return np.where(turns.any(axis=1), (left + right) / 2, np.nan)
