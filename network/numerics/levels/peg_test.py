"""The two-peg test: the collimation error of a level from two set-ups."""

import math
from dataclasses import asdict, dataclass

from network.numerics.sentences import Refused, gettext_noop, sentence

ARC_SECONDS_PER_RADIAN = 180 * 3600 / math.pi

# 0.003 ft in 100 ft: USGS TM 3-A19, from memory; the agency sets its own.
COLLIMATION_LIMIT_MM_PER_M = 0.03

# Below this a reading error of 1 mm would look like 1 mm/m.
LEAST_IMBALANCE_M = 1.0


@dataclass(frozen=True)
class PegSetUp:
    """Staff readings on pegs A and B from one set-up, and the sighting distances, all in metres."""

    reading_a_m: float
    reading_b_m: float
    distance_a_m: float
    distance_b_m: float

    @property
    def difference_m(self) -> float:
        return self.reading_a_m - self.reading_b_m

    @property
    def imbalance_m(self) -> float:
        return self.distance_a_m - self.distance_b_m


@dataclass(frozen=True)
class PegTest:
    """Collimation error, positive when the line of sight rises away from the level."""

    first_difference_m: float
    second_difference_m: float
    imbalance_m: float
    collimation_mm_per_m: float
    collimation_arcsec: float
    limit_mm_per_m: float

    @property
    def passes(self) -> bool:
        return abs(self.collimation_mm_per_m) <= self.limit_mm_per_m + 1e-9


def peg_test(
    first: PegSetUp, second: PegSetUp, *, limit_mm_per_m: float = COLLIMATION_LIMIT_MM_PER_M
) -> PegTest:
    """Compute the collimation error of a level from two set-ups over the same two pegs.

    first, second: readings and distances in metres; usually one midway and one near a peg.
    Result: millimetres per metre and seconds of arc, with the verdict against the limit.
    Raises Refused, naming set-up and field, when a value is not a number, a distance is negative
    or the set-ups are balanced alike, so that the error does not show.
    Source: the usual two-peg test (common practice); curvature and refraction are left out, they
    stay below 0.1 mm at the distances of a peg test (up to about 40 m).
    """
    _check(1, first)
    _check(2, second)
    imbalance_m = second.imbalance_m - first.imbalance_m
    if abs(imbalance_m) < LEAST_IMBALANCE_M:
        text = gettext_noop(
            "The two set-ups are balanced alike: move the level so that its distances to the "
            "pegs differ from the first set-up by at least {least_m:g} m."
        )
        raise Refused(sentence(text, least_m=LEAST_IMBALANCE_M), row=2, field_name="distance_a_m")
    # c = ((a₂ − b₂) − (a₁ − b₁)) / ((dA₂ − dB₂) − (dA₁ − dB₁))
    collimation = (second.difference_m - first.difference_m) / imbalance_m
    return PegTest(
        first_difference_m=first.difference_m,
        second_difference_m=second.difference_m,
        imbalance_m=imbalance_m,
        collimation_mm_per_m=1000 * collimation,
        collimation_arcsec=math.atan(collimation) * ARC_SECONDS_PER_RADIAN,
        limit_mm_per_m=limit_mm_per_m,
    )


def _check(set_up: int, values: PegSetUp) -> None:
    for name, value in asdict(values).items():
        if not math.isfinite(value):
            text = gettext_noop("Set-up {set_up}: a reading or distance is not a number.")
        elif name.startswith("distance") and value < 0:
            text = gettext_noop("Set-up {set_up}: a distance cannot be negative.")
        else:
            continue
        raise Refused(sentence(text, set_up=set_up), row=set_up, field_name=name)
