"""What was in force: the one way to ask a chain of rows about an instant or a period."""

from collections.abc import Sequence
from datetime import datetime
from typing import Any

import numpy as np

from network.models.chains import StandingQuerySet
from network.numerics.arrays import Floats, Seconds


def at(chain: StandingQuerySet, instant: datetime) -> Any | None:
    """Return the row in force at an instant: the latest that began by then, or None."""
    return chain.standing().filter(effective_from__lte=instant).order_by("effective_from").last()


def between(chain: StandingQuerySet, start: datetime, end: datetime) -> list[Any]:
    """Return the rows in force in start ≤ t < end, in order; the first may have begun earlier."""
    rows = list(chain.standing().filter(effective_from__lt=end).order_by("effective_from"))
    begun = sum(row.effective_from <= start for row in rows)
    return rows[max(begun - 1, 0) :]


def starts(rows: Sequence[Any]) -> Seconds:
    """Return the starts of a chain's rows: int64 epoch seconds UTC."""
    return np.array([seconds(row.effective_from) for row in rows], np.int64)


def column(rows: Sequence[Any], name: str) -> Floats:
    """Return one figure of each row: float64, NaN where the row has none."""
    values = [getattr(row, name) for row in rows]
    return np.array([np.nan if value is None else value for value in values], np.float64)


def seconds(instant: datetime) -> int:
    """Return an instant as whole epoch seconds UTC."""
    return int(instant.timestamp())
