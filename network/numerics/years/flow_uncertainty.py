"""The uncertainty of a flow, of a daily mean and of the year's volume; always 95 %, in m³/s.

Source: ISO 18320 and ISO/TS 25377 (from memory): components that do not depend on one another add
as squares. Within a day they are taken not to average out, which is on the safe side.
"""

from collections.abc import Callable
from dataclasses import dataclass

import numpy as np

from network.numerics.arrays import Floats, Seconds
from network.numerics.years.daily import daily_means

CLASSES_PERCENT = (5.0, 10.0, 20.0)


def flow_u95_m3s(
    stage_m: Floats,
    *,
    flow_at: Callable[[Floats], Floats],
    band_m3s: tuple[Floats, Floats],
    scatter: Floats | float,
    u_stage_m: float,
) -> Floats:
    """Combine the uncertainties of the flow at each stage: float64[n], m³/s at 95 %.

    stage_m float64[n]; flow_at gives the rating at any stage; band_m3s the lower and upper 95 %
    band of the mean relation at the stages; scatter the gaugings' standard deviation about the
    curve in ln Q; u_stage_m the standard uncertainty of stage. NaN where the flow is unknown.
    """
    # half the band, 2·S_e·Q, and 2·u of the stage carried through the rating at h ± u
    band = (band_m3s[1] - band_m3s[0]) / 2
    gaugings = 2 * scatter * flow_at(stage_m)
    stage = 2 * (flow_at(stage_m + u_stage_m) - flow_at(stage_m - u_stage_m)) / 2
    combined: Floats = np.sqrt(band**2 + gaugings**2 + stage**2)
    return combined


def daily_u95_m3s(
    times_s: Seconds, flow_u95_m3s: Floats, *, edges_s: Seconds, gap_limit_s: int
) -> Floats:
    """Average the uncertainty of the flow over each day: float64[days], m³/s at 95 %.

    times_s int64[n], flow_u95_m3s float64[n] at the readings; edges_s int64[days + 1]. The mean of
    the absolute uncertainty over time is the percentage weighted by flow, times the mean flow, and
    also holds where the flow is zero. NaN where no part of the day is known.
    """
    unmarked = np.zeros(len(times_s), dtype=np.uint8)
    # U_day = ∫ U dt / covered time = Q̄ · Σ Q·(U/Q) / Σ Q
    return daily_means(
        times_s,
        flow_u95_m3s,
        marks=unmarked,
        edges_s=edges_s,
        gap_limit_s=gap_limit_s,
        least_covered=0.0,
    ).mean


def estimated_u95_m3s(daily_flow_m3s: Floats, note_percent: Floats) -> Floats:
    """Give the uncertainty of estimated days from the ± % of their notes, float64[days] m³/s."""
    return daily_flow_m3s * note_percent / 100


def u95_percent(daily_flow_m3s: Floats, daily_u95_m3s: Floats) -> Floats:
    """Give the uncertainty of each day in %; NaN at zero flow, where there is none to give."""
    flowing = daily_flow_m3s > 0
    return np.where(flowing, 100 * daily_u95_m3s / np.where(flowing, daily_flow_m3s, 1), np.nan)


@dataclass(frozen=True)
class VolumeClasses:
    """Hold the shares of a volume known within 5, 10, 20 %, wider, and without a stated figure.

    The five add up to 1; all are 0 where nothing has flowed.
    """

    within_5: float
    within_10: float
    within_20: float
    wider: float
    not_stated: float


def volume_classes(daily_flow_m3s: Floats, daily_u95_m3s: Floats) -> VolumeClasses:
    """Sort the volume of the days by their uncertainty: above 5 up to 10 %, above 10 up to 20 % …

    Both float64[days]; a day without flow figure (NaN) is left out, one without uncertainty is
    counted as not stated.
    """
    there = daily_flow_m3s > 0
    volume = daily_flow_m3s[there]
    percent = u95_percent(volume, daily_u95_m3s[there])
    # a share of a percent in the last digit does not move a day to the next class
    number = np.searchsorted(CLASSES_PERCENT, np.round(percent, 9), side="left")
    number[np.isnan(percent)] = len(CLASSES_PERCENT) + 1
    shares = np.bincount(number, weights=volume, minlength=5) / max(volume.sum(), 1e-300)
    return VolumeClasses(*(float(share) for share in shares))
