"""Ratios of ratings: a fit with searched breaks, and before and after of a whole record."""

from collections.abc import Iterator
from itertools import combinations

import numpy as np
from django.utils.module_loading import import_string

from network.models import Station
from network.numerics.arrays import Floats
from network.numerics.ratings.rating_fit import fit_rating
from network.numerics.ratings.rating_parts import FitChoice
from reports.management.benchmark.timing import Ratio, medians, milliseconds

GAUGINGS, LEAST = 500, 5
SAMPLE = 2_000  # of the spans that are fitted one by one
ZEROS_M = (0.2, 0.6, 0.6)
DOOR = "network.services.rating_speed.works"  # reports call no service of the network by import


def ratios(station: Station, *, years: int, runs: int) -> Iterator[Ratio]:
    """Measure the fit on drawn gaugings and before-and-after on a station with a record."""
    yield fit_ratio(runs=runs)
    taken = medians(import_string(DOOR)(station), runs=runs)
    yield Ratio(
        f"before and after, {years} years, to twice the chain from the database",
        taken.ratio("trial", "twice"),
        1.2,
        remark=milliseconds(**taken),
    )


def fit_ratio(*, runs: int) -> Ratio:
    """Fit 500 gaugings with two searched breaks and their bootstrap.

    Against one call of numpy's least squares for each span that two breaks can leave; a sample of
    the spans is timed and counted up.
    """
    stage_m, flow_m3s = _gaugings()
    spans = _spans()
    sample = np.random.default_rng(2).choice(len(spans), SAMPLE, replace=False)

    def bare() -> None:
        for at in sample:
            start, stop = spans[at]
            x = np.log(stage_m[start:stop])
            np.linalg.lstsq(np.column_stack((np.ones(len(x)), x)), flow_m3s[start:stop])

    def fit() -> object:
        choice = FitChoice(ZEROS_M, (None, None), must_meet=False)
        return fit_rating(stage_m, flow_m3s, np.full(GAUGINGS, 5.0), choice=choice)

    taken = medians({"fit": fit, "bare": bare}, runs=runs)
    whole = taken["bare"] * len(spans) / SAMPLE
    return Ratio(
        "fit of 500 gaugings, two searched breaks, to the bare lines",
        taken["fit"] / whole,
        1.0,
        remark=milliseconds(fit=taken["fit"], bare=whole),
    )


def _gaugings() -> tuple[Floats, Floats]:
    """Draw gaugings of 5 % about three power laws that meet at 1.2 and 2.2 m."""
    random = np.random.default_rng(1)
    stage_m = np.sort(random.uniform(0.8, 3.5, GAUGINGS))
    lower, upper = 5 * (stage_m - 0.2) ** 1.6, 5 * ((stage_m - 0.6) / 0.6) ** 2.4
    top = 5 * (1.6 / 0.6) ** 2.4 * ((stage_m - 0.6) / 1.6) ** 1.8
    flow_m3s = np.where(stage_m < 1.2, lower, np.where(stage_m < 2.2, upper, top))
    return stage_m, flow_m3s * np.exp(random.normal(0, 0.05, GAUGINGS))


def _spans() -> list[tuple[int, int]]:
    """List every span that can be a segment when two breaks part the gaugings."""
    inner = range(LEAST, GAUGINGS - LEAST + 1)
    middle = [(a, b) for a, b in combinations(inner, 2) if b - a >= LEAST]
    ends = [(0, b) for b in inner], [(a, GAUGINGS) for a in inner]
    return [*middle, *ends[0], *ends[1]]
