"""Gaugings drawn from a known curve of two segments, for the tests of the rating fit."""

import numpy as np

from network.numerics.ratings.curves import Segment

JOINT_M = 1.2
LOWER = Segment(lower_stage_m=0.4, c=5.0, h0_m=0.2, b=1.6)
UPPER = Segment(JOINT_M, 5.0 * 1.0**1.6 / 0.6**2.4, h0_m=0.6, b=2.4)  # meets the lower at 1.2 m
ZEROS_M = (LOWER.h0_m, UPPER.h0_m)
STAGES_M = np.concatenate([np.linspace(0.42, 1.17, 20), np.linspace(1.23, 3.5, 20)])


def true_flow(stage_m):
    """Give the flow of the known curve."""
    lower = LOWER.c * np.maximum(stage_m - LOWER.h0_m, 0) ** LOWER.b
    upper = UPPER.c * np.maximum(stage_m - UPPER.h0_m, 0) ** UPPER.b
    return np.where(stage_m < JOINT_M, lower, upper)


def drawn_flow(stage_m, *, seed, noise=0.05):
    """Give gauged flows: the known curve with normal noise in ln Q."""
    random = np.random.default_rng(seed)
    return true_flow(stage_m) * np.exp(random.normal(0, noise, len(stage_m)))
