"""The duration curve: how often a flow is reached or exceeded."""

from dataclasses import dataclass

import numpy as np

from network.numerics.arrays import Floats

STANDARD_PERCENTS = (5, 10, 25, 50, 75, 90, 95, 99)


@dataclass(frozen=True, eq=False)
class DurationCurve:
    """Hold the values present in falling order and the probability of exceedance of each.

    values float64[N] (m³/s or m); exceedance float64[N] between 0 and 1, equal for equal values.
    """

    values: Floats
    exceedance: Floats


def duration_curve(values: Floats) -> DurationCurve:
    """Rank daily values: P = m/(N + 1), m the rank from the top, ties the mean of their ranks.

    values float64[n], NaN = missing and left out, so N counts the values present.
    Source: Weibull plotting position, common practice.
    """
    falling = np.sort(values[~np.isnan(values)])[::-1]
    _, place, ties = np.unique(-falling, return_inverse=True, return_counts=True)
    rank = (np.cumsum(ties) - (ties - 1) / 2)[place]
    # P = m / (N + 1)
    return DurationCurve(falling, rank / (len(falling) + 1))


def exceeded(curve: DurationCurve, percents: Floats) -> Floats:
    """Return the values reached or exceeded in the given percentages of the time.

    percents float64[k] within 0–100; gives float64[k]. Between two neighbours in the order of
    size the value is linear in m/(N + 1), each with a rank of its own, so equal values hold over
    all their ranks. NaN below 1/(N + 1) and above N/(N + 1): the record does not say.
    Source: common practice.
    """
    n = len(curve.values)
    if n == 0:
        return np.full(len(percents), np.nan)
    positions = np.arange(1, n + 1) / (n + 1)
    return np.interp(percents / 100, positions, curve.values, left=np.nan, right=np.nan)


def standard_percentiles(curve: DurationCurve) -> dict[int, float]:
    """Return the values exceeded 5, 10, 25, 50, 75, 90, 95 and 99 % of the time, by percentage."""
    values = exceeded(curve, np.array(STANDARD_PERCENTS, dtype=np.float64))
    return dict(zip(STANDARD_PERCENTS, values.tolist(), strict=True))
