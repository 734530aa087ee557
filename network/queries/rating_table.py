"""A rating as a table: a flow for every centimetre, ten to a row, one row a decimetre."""

from collections.abc import Iterator, Sequence
from dataclasses import dataclass

import numpy as np

from network.numerics.arrays import Floats
from network.numerics.marks import Mark
from network.numerics.ratings.curves import Curve, flow

MOST_ROWS = 2_000  # 200 m of stage: a wrong unit was typed


@dataclass(frozen=True)
class Cell:
    """The flow of one centimetre; None outside the range of use."""

    stage_m: float
    flow_m3s: float | None
    extrapolated: bool


@dataclass(frozen=True)
class Decimetre:
    """Ten centimetres from a stage that is a whole decimetre."""

    stage_m: float
    cells: Sequence[Cell]


def decimetres(curve: Curve) -> list[Decimetre]:
    """Return the table of a curve over its range of use and what it may be extrapolated to."""
    cells = list(centimetres(curve))
    return [Decimetre(cells[k].stage_m, cells[k : k + 10]) for k in range(0, len(cells), 10)]


def centimetres(curve: Curve) -> Iterator[Cell]:
    """Yield every centimetre of the decimetres that the curve touches, lowest first."""
    low, high = curve.allowed_m
    first, last = int(np.floor(low * 10 + 1e-6)), int(np.floor(high * 10 + 1e-6))
    # counted in whole centimetres, so that 0.29 is 0.29
    stage_m: Floats = np.arange(first * 10, (min(last, first + MOST_ROWS) + 1) * 10) / 100
    flow_m3s, marks = flow(curve, stage_m)
    for stage, value, bits in zip(stage_m.tolist(), flow_m3s.tolist(), marks, strict=True):
        known = not np.isnan(value)
        yield Cell(stage, value if known else None, bool(known and bits & Mark.EXTRAPOLATED))
