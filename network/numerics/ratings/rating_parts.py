"""What a rating fit is asked for, and how the gaugings are parted among its segments."""

from dataclasses import dataclass
from itertools import pairwise

import numpy as np

from network.numerics.arrays import Floats, Indices
from network.numerics.ratings.rating_search import search_breaks
from network.numerics.sentences import Sentence, gettext_noop, sentence

MOST_POSITIONS, MOST_POSITIONS_PAIRED = 600, 100  # breaks tried at once; with two and an h0


class FitRefused(ValueError):
    """The gaugings do not carry the fit asked for; `sentence` says why."""

    def __init__(self, text: str, **values: float | str) -> None:
        self.sentence: Sentence = sentence(text, **values)
        super().__init__(str(self.sentence))


@dataclass(frozen=True)
class FitChoice:
    """Say what is given and what is searched: None is searched.

    zeros_m: stage of zero flow of each segment, lowest first; breaks_m: stage from which on the
    gaugings belong to the next segment. must_meet: refuse segments that do not meet.
    Raises ValueError unless there are 1–3 segments, a break between each two, given ones rising.
    """

    zeros_m: tuple[float | None, ...] = (None,)
    breaks_m: tuple[float | None, ...] = ()
    must_meet: bool = True

    def __post_init__(self) -> None:
        if not 1 <= len(self.zeros_m) <= 3 or len(self.breaks_m) != len(self.zeros_m) - 1:
            raise ValueError("A fit has 1 to 3 segments and one break between each two.")
        given = [b for b in self.breaks_m if b is not None]
        if any(a >= b for a, b in pairwise(given)):
            raise ValueError("The breaks do not rise.")


@dataclass(frozen=True, eq=False)
class Gaugings:
    """Gaugings with flow, rising in stage; u is the standard uncertainty in ln Q."""

    stage_m: Floats
    ln_flow: Floats
    u: Floats

    def part(self, start: int, stop: int) -> "Gaugings":
        """Give the gaugings from start up to, not with, stop."""
        return Gaugings(self.stage_m[start:stop], self.ln_flow[start:stop], self.u[start:stop])


def positions(gaugings: Gaugings, choice: FitChoice) -> list[Indices]:
    """List, for each break, the indices of the gaugings that may be the first above it."""
    stage_m = gaugings.stage_m
    rises = np.flatnonzero(np.diff(stage_m) > 0) + 1
    return [
        rises if break_m is None else np.searchsorted(stage_m, [break_m]).astype(np.intp)
        for break_m in choice.breaks_m
    ]


def firsts_of_segments(gaugings: Gaugings, choice: FitChoice, weights: Floats) -> Indices:
    """Find the first gauging of each upper segment, given or searched: coarsely, then closely.

    Gives indices into the gaugings, intp[segments − 1]. Raises FitRefused where no break will do.
    """
    tried_for = positions(gaugings, choice)
    if None not in choice.breaks_m:
        return np.concatenate([*tried_for, np.empty(0, np.intp)])
    paired = choice.breaks_m.count(None) > 1 and None in choice.zeros_m
    most = MOST_POSITIONS_PAIRED if paired else MOST_POSITIONS
    steps = [-(-len(tried) // most) for tried in tried_for]
    thin = [tried[::step] for tried, step in zip(tried_for, steps, strict=True)]
    firsts = _search(gaugings, choice, weights, thin)
    if max(steps) > 1:
        close = [
            tried[np.abs(np.searchsorted(tried, first) - np.arange(len(tried))) < step]
            for tried, first, step in zip(tried_for, firsts, steps, strict=True)
        ]
        firsts = _search(gaugings, choice, weights, close)
    return firsts


def _search(
    gaugings: Gaugings, choice: FitChoice, weights: Floats, tried_for: list[Indices]
) -> Indices:
    firsts: Indices = search_breaks(
        gaugings.stage_m,
        gaugings.ln_flow[None, :],
        weights,
        zeros_m=choice.zeros_m,
        positions=tried_for,
    )[0]
    if (firsts < 0).any():
        raise FitRefused(
            gettext_noop("No break leaves each segment 5 gaugings at different stages above h₀.")
        )
    return firsts


def segment_numbers(count: int, firsts: Indices) -> Indices:
    """Number the segments, from 0, that so many gaugings rising in stage belong to."""
    return np.searchsorted(firsts, np.arange(count), side="right")
