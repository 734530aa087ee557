"""Estimates for days without a record: line, neighbour, winter ratio, recession.

Every estimate says how it was made; the days it fills are always marked estimated.
"""

from dataclasses import dataclass

import numpy as np

from network.numerics.arrays import Floats
from network.numerics.sentences import Sentence, gettext_noop, sentence

LEAST_PAIRS = 10  # of days on which both stations have flow


class InfillRefused(ValueError):
    """The record does not carry the estimate; `sentence` says why."""

    def __init__(self, text: str, **values: float | str) -> None:
        self.sentence: Sentence = sentence(text, **values)
        super().__init__(str(self.sentence))


@dataclass(frozen=True, eq=False)
class Infill:
    """Hold estimated daily flows, NaN where the method gives none, and how they were made."""

    flow_m3s: Floats
    method: Sentence


def straight_line(
    times: Floats, *, before: tuple[float, float], after: tuple[float, float]
) -> Infill:
    """Draw a straight line between the last point before and the first after the gap.

    times float64[n] in days on any scale; before and after are (time, flow m³/s).
    Raises InfillRefused where a flow is negative or the points do not enclose the times.
    """
    _check_ends(times, before, after)
    flow = np.interp(times, [before[0], after[0]], [before[1], after[1]])
    text = gettext_noop("Straight line from {before:.4g} to {after:.4g} m³/s.")
    return Infill(flow, sentence(text, before=before[1], after=after[1]))


def recession(times: Floats, *, before: tuple[float, float], after: tuple[float, float]) -> Infill:
    """Let the flow recede exponentially from the point before to the point after.

    Arguments as for the straight line. Raises InfillRefused unless the flow falls and stays above
    zero. Source: linear reservoir, Q = Q₀·e^(−t/k), common practice.
    """
    _check_ends(times, before, after)
    if not before[1] > after[1] > 0:
        raise InfillRefused(
            gettext_noop(
                "A recession falls and stays above zero: {before:.4g} to {after:.4g} m³/s does not."
            ),
            before=before[1],
            after=after[1],
        )
    k_days = (after[0] - before[0]) / np.log(before[1] / after[1])
    # Q = Q₀ · e^(−(t − t₀)/k)
    flow = before[1] * np.exp(-(times - before[0]) / k_days)
    text = gettext_noop(
        "Exponential recession from {before:.4g} to {after:.4g} m³/s, k = {k:.3g} days."
    )
    return Infill(flow, sentence(text, before=before[1], after=after[1], k=float(k_days)))


@dataclass(frozen=True)
class NeighbourRegression:
    """Hold ln Q = intercept + slope·ln Q_neighbour from n common days.

    r2 is the squared correlation and s_e the residual standard deviation, both in ln Q;
    bias_factor = e^(s_e²/2) makes up for the mean lost by going back from logarithms. The range
    is that of the neighbour's flows it rests on.
    """

    intercept: float
    slope: float
    n: int
    r2: float
    s_e: float
    bias_factor: float
    neighbour_lowest_m3s: float
    neighbour_highest_m3s: float


def neighbour_regression(flow_m3s: Floats, neighbour_m3s: Floats) -> NeighbourRegression:
    """Relate a station's daily flows to a neighbour's by a log-log regression.

    Both float64[n], same days; days on which either is missing (NaN) or zero are left out. The
    neighbour's record is to come without its own infills. Raises InfillRefused for fewer than 10
    common days or a neighbour whose flow never changes.
    Source: ordinary least squares; bias factor after Ferguson (1986).
    """
    both = (flow_m3s > 0) & (neighbour_m3s > 0)
    x, y, n = np.log(neighbour_m3s[both]), np.log(flow_m3s[both]), int(both.sum())
    if n < LEAST_PAIRS or np.ptp(x) == 0:
        raise InfillRefused(
            gettext_noop(
                "{n} common days with flow, or all at one flow; {least} that differ are needed."
            ),
            n=n,
            least=LEAST_PAIRS,
        )
    dx, dy = x - x.mean(), y - y.mean()
    slope = float(dx @ dy / (dx @ dx))
    residual = dy - slope * dx
    explained = 1 - float(residual @ residual / (dy @ dy)) if dy.any() else 1.0
    s_e = float(np.sqrt(residual @ residual / (n - 2)))
    return NeighbourRegression(
        intercept=float(y.mean() - slope * x.mean()),
        slope=slope,
        n=n,
        r2=explained,
        s_e=s_e,
        bias_factor=float(np.exp(s_e**2 / 2)),
        neighbour_lowest_m3s=float(np.exp(x.min())),
        neighbour_highest_m3s=float(np.exp(x.max())),
    )


def from_neighbour(
    neighbour_m3s: Floats, regression: NeighbourRegression, *, neighbour: str
) -> Infill:
    """Estimate flows from a neighbour's, float64[n]; NaN where it is missing, 0 where it is 0.

    neighbour is the station's name for the method text, which also says on how many of the days
    the neighbour's flow lies outside the range of the regression.
    """
    with np.errstate(divide="ignore"):
        ln_flow = regression.intercept + regression.slope * np.log(neighbour_m3s)
    # Q̂ = e^(a + b·ln Q_n) · e^(s_e²/2)
    flow = np.where(neighbour_m3s > 0, np.exp(ln_flow) * regression.bias_factor, neighbour_m3s)
    low, high = regression.neighbour_lowest_m3s, regression.neighbour_highest_m3s
    outside = (neighbour_m3s < low * (1 - 1e-9)) | (neighbour_m3s > high * (1 + 1e-9))
    text = gettext_noop(
        "Log-log regression on {neighbour}: n = {n}, r² = {r2:.3f}, s_e = {s_e:.1f} %, "
        "bias factor {bias:.4f} applied, slope {slope:.3f}; {outside} days outside its range."
    )
    method = sentence(
        text,
        neighbour=neighbour,
        n=regression.n,
        r2=regression.r2,
        s_e=100 * regression.s_e,
        bias=regression.bias_factor,
        slope=regression.slope,
        outside=int(outside.sum()),
    )
    return Infill(flow, method)


def winter_ratio(
    times: Floats, open_water_m3s: Floats, *, gauged_times: Floats, ratios: Floats
) -> Infill:
    """Multiply the open-water flow by the ratio found at gaugings, linear in time between them.

    times and open_water_m3s float64[n]: the rating's flow as if there were no ice; gauged_times
    rising and ratios float64[k]: measured over open-water flow. Before the first and after the last
    gauging there is no estimate (NaN): give a ratio of 1 at the day the ice came or went.
    Raises InfillRefused for fewer than two ratios, a ratio below zero or times that do not rise.
    Source: common practice for ice periods (WMO-No. 1044, from memory).
    """
    falling = bool((np.diff(gauged_times) <= 0).any())
    if len(ratios) < 2 or len(ratios) != len(gauged_times) or (ratios < 0).any() or falling:
        raise InfillRefused(
            gettext_noop("A winter ratio needs two or more ratios, none negative, rising in time.")
        )
    ratio = np.interp(times, gauged_times, ratios, left=np.nan, right=np.nan)
    text = gettext_noop(
        "Winter ratio, measured over open-water flow, {lowest:.3f} to {highest:.3f}, linear "
        "between {n} points."
    )
    lowest, highest = float(ratios.min()), float(ratios.max())
    method = sentence(text, lowest=lowest, highest=highest, n=len(ratios))
    return Infill(open_water_m3s * ratio, method)


def _check_ends(times: Floats, before: tuple[float, float], after: tuple[float, float]) -> None:
    inside = len(times) > 0 and before[0] < times.min() and times.max() < after[0]
    if not inside or not min(before[1], after[1]) >= 0:
        raise InfillRefused(
            gettext_noop(
                "The points before and after do not enclose the days, or a flow is negative."
            )
        )
