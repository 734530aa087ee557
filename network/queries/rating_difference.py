"""How two curves differ over the stages that occur, by time and by volume."""

from collections.abc import Sequence
from dataclasses import dataclass

import numpy as np

from network.numerics.arrays import Bools, Floats
from network.numerics.ratings.curves import Curve, flow

BANDS = 12


@dataclass(frozen=True)
class BandChange:
    """A band of stage: how often it occurs, its mean flow by either curve, None where unrated."""

    lower_stage_m: float
    upper_stage_m: float
    time_percent: float
    before_m3s: float | None
    after_m3s: float | None

    @property
    def percent(self) -> float | None:
        """The change in % of the flow before."""
        if not self.before_m3s or self.after_m3s is None:
            return None
        return 100 * (self.after_m3s / self.before_m3s - 1)


@dataclass(frozen=True)
class CurveChange:
    """The bands that occur, lowest first, and what it comes to over all days rated by both.

    days: how many the stages stand for; unrated_before and _after: how many of them each leaves
    without a flow.
    """

    bands: Sequence[BandChange]
    days: int
    volume_percent: float | None
    unrated_before: int
    unrated_after: int


def compare(before: Curve, after: Curve, stage_m: Floats) -> CurveChange | None:
    """Rate the daily mean stages that occurred by both curves; None where none did.

    A day weighs by itself for time and by its flow for volume.
    """
    if not len(stage_m):
        return None
    one, other = flow(before, stage_m)[0], flow(after, stage_m)[0]
    both = ~np.isnan(one) & ~np.isnan(other)
    total = float(one[both].sum())
    return CurveChange(
        bands=_bands(stage_m, one, other),
        days=len(stage_m),
        volume_percent=100 * (float(other[both].sum()) / total - 1) if total else None,
        unrated_before=int(np.isnan(one).sum()),
        unrated_after=int(np.isnan(other).sum()),
    )


def _bands(stage_m: Floats, one: Floats, other: Floats) -> list[BandChange]:
    edges = np.linspace(stage_m.min(), stage_m.max() + 1e-9, BANDS + 1)
    number = np.clip(np.searchsorted(edges, stage_m, side="right") - 1, 0, BANDS - 1)
    bands = []
    for k in range(BANDS):
        inside = number == k
        if inside.any():
            share = 100 * float(inside.mean())
            flows = [_mean(values, inside) for values in (one, other)]
            bands.append(BandChange(float(edges[k]), float(edges[k + 1]), share, *flows))
    return bands


def _mean(values: Floats, inside: Bools) -> float | None:
    known = values[inside & ~np.isnan(values)]
    return float(known.mean()) if len(known) else None
