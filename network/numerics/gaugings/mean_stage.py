"""Stage readings during a gauging to the stage that its discharge belongs to."""

from dataclasses import dataclass

import numpy as np

from network.numerics.arrays import Bools, Floats


@dataclass(frozen=True)
class MeanStage:
    """Mean stage in m, its change during the gauging, and how it was found."""

    stage_m: float
    change_m: float
    weighted_by_flow: bool
    times_assumed: bool
    longest_interval_s: float


def mean_stage(
    readings_s: Floats,
    readings_m: Floats,
    *,
    vertical_s: Floats,
    flow_m3s: Floats,
    period_s: tuple[float, float] | None,
    limit_m: float,
) -> MeanStage:
    """Find the stage of a gauging.

    readings_s, readings_m [r ≥ 1]: epoch seconds and m above station zero; vertical_s, flow_m3s
    [n]: time (not a number where not noted) and flow of each vertical in the order measured;
    period_s: start and end of the gauging, else those of the readings; limit_m: change up to which
    the mean of start and end serves. Flow upstream weighs by its size, so the result stays between
    the readings. A time not noted is taken between its neighbours'.
    Source: Pegelvorschrift 1991 (0.05 m), ISO 748 (weights by flow).
    """
    order = readings_s.argsort(kind="stable")
    t, h = readings_s[order], readings_m[order]
    start_s, end_s = period_s or (t[0], t[-1])
    ends = np.interp([start_s, end_s], t, h)
    every = np.concatenate((ends, h[(t >= start_s) & (t <= end_s)]))
    change_m = float(every.max() - every.min())
    noted = ~np.isnan(vertical_s)
    weight = np.abs(flow_m3s)
    weighted = change_m > limit_m + 1e-9 and bool(weight.sum() > 0)
    stage_m = float(ends.mean())
    if weighted:
        times_s = _times_s(vertical_s, noted, (float(start_s), float(end_s)))
        # h̄ = Σ qᵢ·hᵢ / Q
        stage_m = float(weight @ np.interp(times_s, t, h) / weight.sum())
    read_s = np.concatenate(([start_s], t[(t > start_s) & (t < end_s)], [end_s]))
    return MeanStage(
        stage_m=stage_m,
        change_m=change_m,
        weighted_by_flow=weighted,
        times_assumed=weighted and not noted.all(),
        longest_interval_s=float((read_s[1:] - read_s[:-1]).max()),
    )


def _times_s(vertical_s: Floats, noted: Bools, period_s: tuple[float, float]) -> Floats:
    n = len(vertical_s)
    place = np.concatenate(([-1], noted.nonzero()[0], [n]))
    known_s = np.concatenate((period_s[:1], vertical_s[noted], period_s[1:]))
    return np.asarray(np.interp(np.arange(n), place, known_s), dtype=np.float64)
