"""Curves in pieces, forward and inverse: neighbouring power laws, or straight lines."""

from dataclasses import dataclass

import numpy as np

from network.numerics.arrays import Floats, Indices

NO_HEAD_M = 1e-9  # less is the rounding of a sum; readings come in tenths of a millimetre
FEW_PIECES = 6  # up to here counting comparisons is faster than a binary search


@dataclass(frozen=True, eq=False)
class Powers:
    """Power laws side by side, arrays of one length: piece i holds from bounds_m[i] on."""

    bounds_m: Floats
    h0_m: Floats
    b: Floats
    ln_c: Floats

    def flow_at(self, stage_m: Floats) -> Floats:
        """Give Q of each h; exactly 0 at or below h0, NaN for NaN."""
        piece = _piece_of(stage_m, self.bounds_m[1:])
        # Q = exp(ln C + b · ln(h − h₀)); ln 0 = −∞ gives exactly 0
        flow_m3s = stage_m - self.h0_m.take(piece, mode="clip")
        if not flow_m3s.min(initial=np.inf) > NO_HEAD_M:
            flow_m3s[flow_m3s <= NO_HEAD_M] = 0.0
        with np.errstate(divide="ignore"):
            np.log(flow_m3s, out=flow_m3s)
        flow_m3s *= self.b.take(piece, mode="clip")
        flow_m3s += self.ln_c.take(piece, mode="clip")
        return np.exp(flow_m3s, out=flow_m3s)

    def stage_at(self, flow_m3s: Floats) -> Floats:
        """Give h of each Q ≥ 0; a flow on a level piece gives that piece's upper end."""
        piece = _piece_of(flow_m3s, self.flow_at(self.bounds_m[1:]))
        # h = h₀ + (Q / C)^(1/b)
        with np.errstate(divide="ignore"):
            ln_head = (np.log(flow_m3s) - self.ln_c[piece]) / self.b[piece]
        return self.h0_m[piece] + np.exp(ln_head)


@dataclass(frozen=True, eq=False)
class Lines:
    """Straight lines between points, the outer two prolonged, never below zero flow."""

    stages_m: Floats
    flows_m3s: Floats

    def flow_at(self, stage_m: Floats) -> Floats:
        """Give Q of each h."""
        return np.maximum(_along(stage_m, self.stages_m, self.flows_m3s), 0.0)

    def stage_at(self, flow_m3s: Floats) -> Floats:
        """Give h of each Q; a flow on a level piece gives that piece's upper end."""
        return _along(flow_m3s, self.flows_m3s, self.stages_m)


def _piece_of(values: Floats, bounds: Floats) -> Indices:
    """Count the bounds at or below each value; for NaN any count."""
    if len(bounds) > FEW_PIECES:
        return bounds.searchsorted(values, side="right")
    piece = np.zeros(len(values), np.intp)
    for bound in bounds:
        piece += values >= bound
    return piece


def _along(x: Floats, xs: Floats, ys: Floats) -> Floats:
    """Follow the lines through the points (xs, ys), the outer two prolonged."""
    at = _piece_of(x, xs[1:-1])
    with np.errstate(divide="ignore"):
        slopes = np.diff(ys) / np.diff(xs)
    return ys[at] + slopes[at] * (x - xs[at])
