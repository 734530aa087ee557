"""Readings on a sectional staff gauge: stage, the plates that fit, holes and overlaps."""

import math
from collections.abc import Sequence
from dataclasses import dataclass
from typing import Literal

import numpy as np

from network.numerics.arrays import Floats
from network.numerics.sentences import Sentence, gettext_noop, sentence

# Plates are read to millimetres; this keeps binary dust from deciding a verdict.
DUST_M = 1e-8

OVERLAP_M = 0.10  # common practice
AGREEMENT_M = 0.01  # one graduation of a centimetre, common practice


@dataclass(frozen=True)
class Plate:
    """One plate in service: its graduations and its zero in force above station zero, metres."""

    label: str
    lowest_m: float
    highest_m: float
    zero_m: float

    def __post_init__(self) -> None:
        if not self.lowest_m < self.highest_m or not math.isfinite(self.zero_m):
            raise ValueError(f"plate {self.label}: graduations must rise and the zero be a number")

    @property
    def bottom_m(self) -> float:
        """Stage at the lowest graduation."""
        return self.lowest_m + self.zero_m

    @property
    def top_m(self) -> float:
        """Stage at the highest graduation."""
        return self.highest_m + self.zero_m

    def holds(self, reading_m: float) -> bool:
        return self.lowest_m - DUST_M <= reading_m <= self.highest_m + DUST_M


@dataclass(frozen=True)
class PlateFinding:
    """What is wrong with plates or readings: the plates meant, the figure and its limit, metres."""

    kind: Literal["off_plate", "hole", "short_overlap", "not_covered", "plates_disagree"]
    labels: tuple[str, ...]
    figure_m: float
    limit_m: float
    sentence: Sentence


def stage_m(readings_m: Floats | float, zeros_m: Floats | float) -> Floats:
    """Turn plate readings into stage above station zero.

    readings_m, zeros_m: metres, shapes that broadcast; the zero of each reading's own plate in
    force at its instant. Result: metres, the broadcast shape. Source: common practice.
    """
    # stage = reading + plate zero
    return np.asarray(np.add(readings_m, zeros_m), dtype=np.float64)


def plates_that_hold(plates: Sequence[Plate], reading_m: float) -> tuple[Plate, ...]:
    """Return the plates on which a reading (metres) can have been made, in the order given."""
    return tuple(plate for plate in plates if plate.holds(reading_m))


def reading_finding(plate: Plate, reading_m: float) -> PlateFinding | None:
    """Find a reading (metres) above or below the graduations of its plate."""
    if plate.holds(reading_m):
        return None
    if reading_m > plate.highest_m:
        text = gettext_noop(
            "The reading {reading_m:.3f} m lies above plate {label}, which ends at {limit_m:.2f} m."
        )
        limit_m = plate.highest_m
    else:
        text = gettext_noop(
            "The reading {reading_m:.3f} m lies below plate {label}, "
            "which starts at {limit_m:.2f} m."
        )
        limit_m = plate.lowest_m
    said = sentence(text, reading_m=reading_m, label=plate.label, limit_m=limit_m)
    return PlateFinding("off_plate", (plate.label,), reading_m, limit_m, said)


def cover_findings(
    plates: Sequence[Plate],
    *,
    overlap_m: float = OVERLAP_M,
    range_m: tuple[float, float] | None = None,
) -> tuple[PlateFinding, ...]:
    """Find holes, short overlaps and ends not covered by the plates in service.

    plates: in service at one instant, any order; overlap_m: least overlap of neighbours, metres;
    range_m: lowest and highest stage to be read, where known.
    Source: common practice (overlap of at least 0.1 m).
    """
    ordered = sorted(plates, key=lambda plate: plate.bottom_m)
    found = []
    for number, upper in enumerate(ordered[1:], start=1):
        # The plate that reaches highest so far, not simply the one before: a short plate may
        # stand beside a long one.
        lower = max(ordered[:number], key=lambda plate: plate.top_m)
        common_m = min(lower.top_m, upper.top_m) - upper.bottom_m
        contained = upper.top_m <= lower.top_m + DUST_M
        if not contained and common_m < overlap_m - DUST_M:
            found.append(_joint_finding(lower, upper, common_m=common_m, overlap_m=overlap_m))
    return (*found, *_end_findings(ordered, range_m))


def _joint_finding(
    lower: Plate, upper: Plate, *, common_m: float, overlap_m: float
) -> PlateFinding:
    labels = (lower.label, upper.label)
    values = {"lower": lower.label, "upper": upper.label}
    if common_m < -DUST_M:
        text = gettext_noop(
            "Between plates {lower} and {upper} there is a hole of {figure_m:.3f} m, "
            "from stage {from_m:.3f} to {to_m:.3f} m."
        )
        said = sentence(text, figure_m=-common_m, from_m=lower.top_m, to_m=upper.bottom_m, **values)
        return PlateFinding("hole", labels, -common_m, 0.0, said)
    text = gettext_noop(
        "Plates {lower} and {upper} overlap by {figure_m:.3f} m; common practice asks for "
        "{limit_m:.2f} m."
    )
    figure_m = max(common_m, 0.0)
    said = sentence(text, figure_m=figure_m, limit_m=overlap_m, **values)
    return PlateFinding("short_overlap", labels, figure_m, overlap_m, said)


def _end_findings(
    ordered: Sequence[Plate], range_m: tuple[float, float] | None
) -> tuple[PlateFinding, ...]:
    if range_m is None or not ordered:
        return ()
    lowest, highest = ordered[0], max(ordered, key=lambda plate: plate.top_m)
    found = []
    if range_m[0] < lowest.bottom_m - DUST_M:
        text = gettext_noop(
            "Plate {label} starts at stage {figure_m:.3f} m; the lowest stage to be read is "
            "{limit_m:.3f} m."
        )
        said = sentence(text, label=lowest.label, figure_m=lowest.bottom_m, limit_m=range_m[0])
        found.append(
            PlateFinding("not_covered", (lowest.label,), lowest.bottom_m, range_m[0], said)
        )
    if range_m[1] > highest.top_m + DUST_M:
        text = gettext_noop(
            "Plate {label} ends at stage {figure_m:.3f} m; the highest stage to be read is "
            "{limit_m:.3f} m."
        )
        said = sentence(text, label=highest.label, figure_m=highest.top_m, limit_m=range_m[1])
        found.append(PlateFinding("not_covered", (highest.label,), highest.top_m, range_m[1], said))
    return tuple(found)


def pair_finding(
    first: tuple[Plate, float], second: tuple[Plate, float], *, limit_m: float = AGREEMENT_M
) -> PlateFinding | None:
    """Find two plates read together whose stages differ by more than a limit.

    first, second: plate and reading in metres; limit_m: metres, an agency setting.
    Source: common practice.
    """
    stages = [reading_m + plate.zero_m for plate, reading_m in (first, second)]
    difference_m = stages[1] - stages[0]
    if abs(difference_m) <= limit_m + DUST_M:
        return None
    labels = (first[0].label, second[0].label)
    text = gettext_noop(
        "Plates {first} and {second} read together give stages {first_m:.3f} and {second_m:.3f} m, "
        "{figure_m:.3f} m apart; allowed {limit_m:.3f} m."
    )
    said = sentence(
        text,
        first=labels[0],
        second=labels[1],
        first_m=stages[0],
        second_m=stages[1],
        figure_m=abs(difference_m),
        limit_m=limit_m,
    )
    return PlateFinding("plates_disagree", labels, difference_m, limit_m, said)
