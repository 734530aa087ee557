"""Tests of gaugings against a rating: sign, changes of sign, bias, several in a row.

Source: ISO 18320:2020, before it ISO 1100-2 (from memory). The tests also serve gaugings made
after the curve; on the fitted ones the bias is near zero by construction.
"""

from dataclasses import dataclass
from typing import Literal

import numpy as np
from scipy.special import bdtr, stdtr

from network.numerics.arrays import Bools, Floats
from network.numerics.sentences import Sentence, gettext_noop, sentence

SIGNIFICANT = 0.05

Side = Literal["above", "below"]


@dataclass(frozen=True)
class TestResult:
    """Hold a test's outcome: `passed` says that chance alone explains it; `verdict` says it."""

    statistic: float
    gaugings: int
    p_value: float
    verdict: Sentence

    __test__ = False  # a test of gaugings, none of this program

    @property
    def passed(self) -> bool:
        """Say whether the outcome is not significant at 5 %."""
        return self.p_value >= SIGNIFICANT


def sign_test(deviations: Floats) -> TestResult:
    """Ask whether as many gaugings lie above the curve as below, by the exact binomial test.

    deviations float64[n]: gauging minus curve in any unit, NaN and exact zeros left out.
    statistic is the number above. Two-sided.
    """
    above = _signs(deviations)
    n, k = len(above), int(above.sum())
    p = _even_chance(k, n)
    if p >= SIGNIFICANT:
        text = gettext_noop("{most} of {n} on one side: no sign that the curve lies off.")
    elif k > n - k:
        text = gettext_noop("{most} of {n} gaugings above the curve: the curve lies low.")
    else:
        text = gettext_noop("{most} of {n} gaugings below the curve: the curve lies high.")
    return TestResult(k, n, p, sentence(text, most=max(k, n - k), n=n))


def sign_change_test(stage_m: Floats, deviations: Floats) -> TestResult:
    """Ask whether the side changes as often along the stage as chance would have it.

    stage_m, deviations float64[n] in any order. statistic is the number of changes among N − 1
    neighbours, each with probability ½, exact binomial, two-sided.
    """
    order = np.argsort(stage_m, kind="stable")
    above = _signs(deviations[order])
    n = len(above)
    changes = int((above[1:] != above[:-1]).sum())
    p = _even_chance(changes, n - 1)
    if p >= SIGNIFICANT:
        text = gettext_noop("{changes} changes of side in {n} gaugings: as chance would have it.")
    elif changes < (n - 1) / 2:
        text = gettext_noop(
            "Only {changes} changes of side in {n} gaugings: the curve lies off over stretches."
        )
    else:
        text = gettext_noop(
            "{changes} changes of side in {n} gaugings: more than chance would have it."
        )
    return TestResult(changes, n, p, sentence(text, changes=changes, n=n))


def bias_test(deviations_percent: Floats) -> TestResult:
    """Ask whether the mean deviation differs from zero, by Student's t at N − 1.

    deviations_percent float64[n], NaN left out. statistic is the mean deviation in %. Fewer than
    two gaugings, or all exactly on the curve, pass.
    """
    values = deviations_percent[~np.isnan(deviations_percent)]
    n = len(values)
    mean = float(values.mean()) if n else 0.0
    spread = float(values.std(ddof=1)) if n > 1 else 0.0
    p = 1.0
    if spread > 0:
        # t = |mean| / (s/√N)
        p = float(2 * stdtr(n - 1, -abs(mean) / (spread / np.sqrt(n))))
    elif n > 1 and mean:
        p = 0.0
    if p >= SIGNIFICANT:
        text = gettext_noop("Mean deviation of {n} gaugings {mean:+.1f} %: no bias shown.")
    elif mean > 0:
        text = gettext_noop("Mean deviation of {n} gaugings {mean:+.1f} %: the curve lies low.")
    else:
        text = gettext_noop("Mean deviation of {n} gaugings {mean:+.1f} %: the curve lies high.")
    return TestResult(mean, n, p, sentence(text, mean=mean, n=n))


@dataclass(frozen=True)
class InARow:
    """Hold how many of the last gaugings lie on one side beyond their limits, and on which."""

    count: int
    side: Side | None


def in_a_row(deviations: Floats, limits: Floats) -> InARow:
    """Count the last gaugings that all lie on one side of the curve beyond their own limit.

    deviations and limits float64[n] in the same unit, in order of time; the limit is the combined
    95 % uncertainty of gauging and curve. NaN ends the row. Source: common practice.
    """
    side = np.where(np.abs(deviations) > limits, np.sign(deviations), 0.0)
    if not len(side) or side[-1] == 0:
        return InARow(0, None)
    differing = np.flatnonzero(side != side[-1])
    count = len(side) - 1 - int(differing[-1]) if len(differing) else len(side)
    return InARow(count, "above" if side[-1] > 0 else "below")


def _signs(deviations: Floats) -> Bools:
    """Say which lie above the curve, those exactly on it and NaN left out."""
    above: Bools = deviations[~np.isnan(deviations) & (deviations != 0)] > 0
    return above


def _even_chance(count: int, of: int) -> float:
    """Give the exact two-sided p-value of a count where each of so many falls either way evenly."""
    # p = 2·P(X ≤ the smaller side), X binomial with ½
    return min(1.0, 2 * float(bdtr(min(count, of - count), of, 0.5))) if of > 0 else 1.0
