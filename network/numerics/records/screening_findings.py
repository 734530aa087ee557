"""Findings of the screening: what, from when to when, by how much, and how to say it."""

from dataclasses import dataclass
from typing import Literal

from network.numerics.sentences import Sentence, gettext_noop, sentence

Kind = Literal[
    "gap",
    "duplicate_time",
    "backward_time",
    "spike",
    "step",
    "flat_line",
    "rate_of_rise",
    "outside_plates",
    "outside_sensor",
    "staff",
    "second_series",
]

# The sentence of each kind and what its figure and limit are divided by for reading aloud.
SAID: dict[Kind, tuple[str, float]] = {
    "gap": (
        gettext_noop("No reading for {figure:.1f} hours; the gap limit is {limit:.1f} hours."),
        3600,
    ),
    "duplicate_time": (gettext_noop("Two readings carry the same time."), 1),
    "backward_time": (gettext_noop("The time runs backward by {figure:.0f} minutes."), 60),
    "spike": (
        gettext_noop(
            "A spike departs by {figure:+.3f} m from the readings around it; limit {limit:.3f} m."
        ),
        1,
    ),
    "step": (
        gettext_noop(
            "The stage jumps by {figure:+.3f} m between two readings; limit {limit:.3f} m."
        ),
        1,
    ),
    "flat_line": (
        gettext_noop("The stage does not move for {figure:.1f} hours; limit {limit:.1f} hours."),
        3600,
    ),
    "rate_of_rise": (
        gettext_noop("The stage moves at up to {figure:+.2f} m/h; limit {limit:.2f} m/h."),
        1,
    ),
    "outside_plates": (
        gettext_noop("The stage {figure:.3f} m is beyond the plates, which end at {limit:.3f} m."),
        1,
    ),
    "outside_sensor": (
        gettext_noop(
            "The stage {figure:.3f} m is beyond the sensor's range, which ends at {limit:.3f} m."
        ),
        1,
    ),
    "staff": (
        gettext_noop(
            "The recorder differs from the staff by {figure:+.3f} m; limit {limit:.3f} m."
        ),
        1,
    ),
    "second_series": (
        gettext_noop(
            "The recorder differs from the second series by {figure:+.3f} m; limit {limit:.3f} m."
        ),
        1,
    ),
}


@dataclass(frozen=True)
class Finding:
    """One finding: epoch seconds, and figure and limit in seconds, metres or metres per hour."""

    kind: Kind
    start_s: int
    end_s: int
    figure: float
    limit: float
    sentence: Sentence


def finding(kind: Kind, *, start_s: int, end_s: int, figure: float, limit: float) -> Finding:
    """Return a finding with its sentence; times in epoch seconds, figures as in Finding."""
    text, divisor = SAID[kind]
    said = sentence(text, figure=float(figure) / divisor, limit=float(limit) / divisor)
    return Finding(kind, int(start_s), int(end_s), float(figure), float(limit), said)
