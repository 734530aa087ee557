"""The gauging kernel on 40 verticals against the bare array arithmetic of both methods."""

import time
from collections.abc import Iterator

import numpy as np

from network.numerics.gaugings.gauging import compute
from network.numerics.gaugings.gauging_input import (
    Bank,
    Channel,
    Meter,
    Point,
    Sheet,
    StageReading,
    Vertical,
)
from network.numerics.meters.meter_rating import Piece
from reports.management.benchmark.timing import Ratio, Work, medians, milliseconds

VERTICALS = 40
SECONDS = 50.0
TIMES = 50  # computed in one turn, so that the clock sees something
X = np.arange(VERTICALS + 2, dtype=np.float64)
DEPTH = 2 * np.sin(np.pi * X / X[-1]) + np.where((X > 0) & (X[-1] > X), 1.0, 0.0)
COUNTS = np.random.default_rng(1).integers(40, 70, (VERTICALS, 2)).astype(np.float64)


def sheet() -> Sheet:
    """Give a whole sheet: checks, findings, stage and uncertainty come with the result."""
    verticals = tuple(
        Vertical(
            float(X[at]),
            float(DEPTH[at]),
            (_point(0.2, COUNTS[at - 1, 0]), _point(0.8, COUNTS[at - 1, 1])),
            time_s=60 * at,
        )
        for at in range(1, VERTICALS + 1)
    )
    banks = Bank(float(X[0])), Bank(float(X[-1]))
    meter = Meter((Piece(0.02, 0.25, 0, 1), Piece(0.01, 0.26, 1, 10)), spin_test_s=60)
    stages = StageReading(0, 1.0), StageReading(3_000, 1.2)
    return Sheet((Channel(*banks, verticals),), meter, stages=stages, started_s=0, ended_s=3_000)


def bare() -> tuple[float, float]:
    """Do both methods on arrays and nothing else."""
    n = COUNTS / SECONDS
    v = np.where(n < 1, 0.02 + 0.25 * n, 0.01 + 0.26 * n).mean(axis=1)
    mid = v * DEPTH[1:-1] * (X[2:] - X[:-2]) / 2
    whole = np.concatenate(([0.4 * v[0]], v, [0.4 * v[-1]]))
    mean = (whole[1:] + whole[:-1]) / 2 * (DEPTH[1:] + DEPTH[:-1]) / 2 * np.diff(X)
    return float(mid.sum()), float(mean.sum())


def ratios(*, runs: int) -> Iterator[Ratio]:
    """Measure one sheet in CPU time."""
    noted = sheet()
    taken = medians(
        {"bare": lambda: _often(bare), "kernel": lambda: _often(lambda: compute(noted))},
        runs=runs,
        clock=time.process_time,
    )
    yield Ratio(
        f"gauging of {VERTICALS} verticals with all findings, CPU, to bare arithmetic",
        taken.ratio("kernel", "bare"),
        60,
        remark=milliseconds(**{name: spent / TIMES for name, spent in taken.items()}),
    )


def _often(work: Work) -> None:
    for _turn in range(TIMES):
        work()


def _point(fraction: float, revolutions: float) -> Point:
    return Point(fraction, revolutions=float(revolutions), seconds=SECONDS)
