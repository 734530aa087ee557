"""Discharge from acoustic transects of a moving boat, with reciprocal pairs and moving-bed test."""

import math
from collections.abc import Iterator, Sequence
from dataclasses import dataclass

import numpy as np

from network.numerics.gaugings.gauging_faults import BadSheet, Fault
from network.numerics.gaugings.other_methods import (
    FEW_REPEATS,
    REPEATS,
    SYSTEMATIC,
    OtherGauging,
    positive,
    repeats_percent,
)
from network.numerics.gaugings.vertical_findings import Finding
from network.numerics.sentences import gettext_noop, sentence

SOURCE = gettext_noop("USGS TM 3-A22, from memory")
COMMON = gettext_noop("common practice")


@dataclass(frozen=True)
class Transect:
    """One crossing: its discharge (negative upstream), how long it took, from which bank."""

    flow_m3s: float | None
    seconds: float | None
    from_left_bank: bool


@dataclass(frozen=True)
class MovingBedTest:
    """Apparent upstream speed of the boat over the bed while held in place, and of the water."""

    bed_velocity_ms: float
    water_velocity_ms: float


@dataclass(frozen=True)
class MovingBoatSettings:
    """Standard uncertainties in % and limits."""

    systematic_percent: float = 1.5  # instrument, and the parts near surface, bed and banks
    scatter_percent: float = 3.0  # one transect, where fewer than four were made
    no_bed_test_percent: float = 2.0
    least_transects: int = 2
    least_seconds: float = 720.0
    departure_percent: float = 5.0
    moving_bed_percent: float = 1.0


def by_moving_boat(
    transects: Sequence[Transect],
    *,
    bed_test: MovingBedTest | None,
    tracks_the_bed: bool,
    settings: MovingBoatSettings = MovingBoatSettings(),
) -> OtherGauging:
    """Compute the discharge as the mean of both directions, corrected for a moving bed.

    bed_test: None where none was made; tracks_the_bed: the boat's path was taken from the bed
    (then a moving bed makes the discharge too small), not from satellites.
    Raises BadSheet naming row and field. Source: USGS TM 3-A22 (from memory) for pairs, time and
    the test; the mean of the two directions, so that an odd transect does not lean one way, and
    the correction of the whole by the test's ratio: own rule after common practice.
    """
    if faults := (*_faults(transects, bed_test),):
        raise BadSheet(faults)
    ratio = _bed_ratio(bed_test, settings)
    correct = 1 + ratio if tracks_the_bed else 1.0
    # Q = Q_measured · (1 + v_bed/v_water)
    flows = correct * np.array([t.flow_m3s for t in transects], dtype=np.float64)
    left = np.array([t.from_left_bank for t in transects])
    one_way = bool(left.all() or not left.any())
    total = float(flows.mean() if one_way else (flows[left].mean() + flows[~left].mean()) / 2)
    parts, stated = _parts(flows.tolist(), bed_test is None and tracks_the_bed, settings)
    findings = (
        *_pair_findings(transects, settings),
        *_scatter_findings(flows.tolist(), total, settings),
        *_bed_findings(bed_test, ratio, tracks_the_bed, settings),
    )
    repeats = tuple(flows.tolist())
    return OtherGauging("moving_boat", total, parts, repeats, findings, stated)


def _parts(
    flows: list[float], untested: bool, settings: MovingBoatSettings
) -> tuple[tuple[tuple[str, float], ...], tuple[str, ...]]:
    """Give the uncertainty by cause, and the causes that rest on the agency's figures."""
    scatter = gettext_noop("scatter of the transects")
    no_test = gettext_noop("no moving-bed test")
    parts = [
        (SYSTEMATIC, settings.systematic_percent),
        (scatter, repeats_percent(flows, settings.scatter_percent)),
        *([(no_test, settings.no_bed_test_percent)] if untested else []),
    ]
    few = [REPEATS] if len(flows) < FEW_REPEATS else []
    return tuple(parts), (SYSTEMATIC, *few, *([no_test] if untested else []))


def _bed_ratio(test: MovingBedTest | None, settings: MovingBoatSettings) -> float:
    if test is None:
        return 0.0
    ratio = test.bed_velocity_ms / test.water_velocity_ms
    return ratio if 100 * ratio > settings.moving_bed_percent else 0.0


def _faults(transects: Sequence[Transect], test: MovingBedTest | None) -> Iterator[Fault]:
    if not transects:
        yield Fault("transects", sentence(gettext_noop("No transect is noted.")))
    text = gettext_noop("Transect {row}: the discharge is missing.")
    for row, transect in enumerate(transects):
        if transect.flow_m3s is None or not math.isfinite(transect.flow_m3s):
            yield Fault("flow_m3s", sentence(text, row=row + 1), row=row)
    times = [t.seconds for t in transects]
    text = gettext_noop("Transect {row}: the time must be more than 0 seconds.")
    yield from positive(times, "seconds", text)
    if test is not None and not (0 <= test.bed_velocity_ms < math.inf):
        text = gettext_noop("Moving-bed test: the speed over the bed must be 0 or more.")
        yield Fault("bed_velocity_ms", sentence(text))
    if test is not None and not (0 < test.water_velocity_ms < math.inf):
        text = gettext_noop("Moving-bed test: the speed of the water must be above 0.")
        yield Fault("water_velocity_ms", sentence(text))


def _pair_findings(
    transects: Sequence[Transect], settings: MovingBoatSettings
) -> Iterator[Finding]:
    count, from_left = len(transects), sum(t.from_left_bank for t in transects)
    if count < settings.least_transects:
        text = gettext_noop("{count} transects; at least {limit} are wanted.")
        said = sentence(text, count=count, limit=settings.least_transects)
        yield Finding("few_transects", "transects", said, settings.least_transects, SOURCE)
    if 2 * from_left != count:
        text = gettext_noop(
            "{left} transects from the left bank and {right} from the right: not in pairs."
        )
        said = sentence(text, left=from_left, right=count - from_left)
        yield Finding("not_in_pairs", "transects", said, None, SOURCE)
    seconds, limit = sum(t.seconds or 0 for t in transects), settings.least_seconds
    if seconds < limit:
        text = gettext_noop("{value} s of measuring in all; the least is {limit} s.")
        said = sentence(text, value=round(seconds), limit=limit)
        yield Finding("exposure", "seconds", said, limit, SOURCE)


def _scatter_findings(
    flows: list[float], total: float, settings: MovingBoatSettings
) -> Iterator[Finding]:
    limit = settings.departure_percent
    text = gettext_noop("Transect {row}: {value} % from the mean; the limit is {limit} %.")
    for row, flow in enumerate(flows):
        if abs(flow - total) * 100 > limit * abs(total):
            value = round(100 * (flow - total) / abs(total), 1) if total else math.inf
            said = sentence(text, row=row + 1, value=value, limit=limit)
            yield Finding("departure", "flow_m3s", said, limit, COMMON, row=row)


def _bed_findings(
    test: MovingBedTest | None, ratio: float, tracks: bool, settings: MovingBoatSettings
) -> Iterator[Finding]:
    if test is None:
        said = sentence(gettext_noop("No moving-bed test was made."))
        yield Finding("no_bed_test", "bed_test", said, None, SOURCE)
    if ratio and tracks:
        text = gettext_noop("The bed moves: the discharge is raised by {value} % for it.")
        said = sentence(text, value=round(100 * ratio, 1))
        yield Finding("moving_bed", "bed_test", said, settings.moving_bed_percent, SOURCE)
