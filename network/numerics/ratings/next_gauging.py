"""Where the next gauging would narrow a rating most, for the flows that occur."""

from dataclasses import dataclass
from typing import Literal

import numpy as np

from network.numerics.arrays import Floats
from network.numerics.ratings.fitted_rating import RatingFit


@dataclass(frozen=True)
class StageBand:
    """A band of stage and what one more gauging in it would do to the curve.

    share is the part of the volume or the time that falls in the band, gaugings those it has.
    u95_percent is the curve's uncertainty there now; mean_u95_percent that of all flows that occur,
    weighted, now and after the gauging.
    """

    lower_stage_m: float
    upper_stage_m: float
    share: float
    gaugings: int
    u95_percent: float
    mean_u95_percent_now: float
    mean_u95_percent_after: float

    @property
    def share_percent(self) -> float:
        """The share in %."""
        return 100 * self.share


def narrowing_bands(
    fit: RatingFit,
    stage_m: Floats,
    *,
    gauged_stage_m: Floats,
    weighted_by: Literal["volume", "time"] = "volume",
    bands: int = 10,
) -> tuple[StageBand, ...]:
    """Rank bands of stage by how much one more gauging in the middle of each narrows the curve.

    stage_m float64[n]: stages that occurred, at equal steps of time; gauged_stage_m: stages of the
    gaugings of the fit. The bands are equal slices of the stages that occurred, those without flow
    left out; each counts by its share of the volume, or of the time, so that low flows count too.
    A gauging is taken to scatter as those of its segment. The best band comes first. Raises
    ValueError where no stage has flow. Source: update of a covariance by one observation.
    """
    stage_m, flow_m3s = _with_flow(stage_m, fit)
    edges_m = np.linspace(stage_m.min(), stage_m.max() + 1e-9, bands + 1)
    middles_m = (edges_m[1:] + edges_m[:-1]) / 2
    counted = flow_m3s if weighted_by == "volume" else np.ones(len(stage_m))
    share = np.histogram(stage_m, edges_m, weights=counted)[0] / counted.sum()
    gaugings = np.histogram(gauged_stage_m, edges_m)[0]
    covariance = fit.ln_covariance(middles_m)
    variance = np.diag(covariance)
    # var after a gauging at j: V_ii − V_ij² / (V_jj + s²)
    after = variance[:, None] - covariance**2 / (variance + fit.scatter_at(middles_m) ** 2)
    mean_now, mean_after = _u95_percent(share @ variance), _u95_percent(share @ after)
    found = [
        StageBand(
            lower_stage_m=float(edges_m[k]),
            upper_stage_m=float(edges_m[k + 1]),
            share=float(share[k]),
            gaugings=int(gaugings[k]),
            u95_percent=float(_u95_percent(variance[k])),
            mean_u95_percent_now=float(mean_now),
            mean_u95_percent_after=float(mean_after[k]),
        )
        for k in range(bands)
    ]
    return tuple(sorted(found, key=lambda band: band.mean_u95_percent_after))


def _with_flow(stage_m: Floats, fit: RatingFit) -> tuple[Floats, Floats]:
    flow_m3s = fit.flow_at(stage_m)
    flowing = flow_m3s > 0
    if not flowing.any():
        raise ValueError("No stage that occurred has flow.")
    return stage_m[flowing], flow_m3s[flowing]


def _u95_percent(variance: Floats) -> Floats:
    # U₉₅ = 2·u, u in ln Q taken as a fraction of Q
    return 200 * np.sqrt(variance)
