"""A meter's rating v = a + b·n in straight pieces: velocity, change since last time, joints."""

from collections.abc import Sequence
from dataclasses import dataclass
from itertools import pairwise

import numpy as np
import numpy.typing as npt

from network.numerics.arrays import Bools, Floats
from network.numerics.sentences import Refused, gettext_noop, sentence

# Five speeds over the usual range of rotating meters (about 0.15 to 4 m/s, common practice).
COMPARISON_SPEEDS_MS = (0.15, 0.3, 0.6, 1.2, 2.4)

# Certificates give n to a few decimals; this keeps binary dust from raising the flag.
DUST = 1e-9


@dataclass(frozen=True)
class Piece:
    """One straight piece v = a + b·n, v in m/s, n in revolutions per second; and its range of n."""

    a_ms: float
    b_m: float
    n_from: float
    n_to: float

    def velocity_ms(self, n: float) -> float:
        # v = a + b·n
        return self.a_ms + self.b_m * n


@dataclass(frozen=True)
class MeterVelocities:
    """Velocities (m/s) and n (1/s) of one meter; outside: beyond the calibrated range."""

    velocity_ms: Floats
    n_per_s: Floats
    outside: Bools


@dataclass(frozen=True)
class JointGap:
    """The step between two pieces where the lower one ends, and where their lines cross."""

    n_per_s: float
    lower_ms: float
    upper_ms: float
    crossing_per_s: float | None  # None for parallel lines

    @property
    def gap_ms(self) -> float:
        return self.upper_ms - self.lower_ms

    @property
    def gap_percent(self) -> float:
        return 100 * self.gap_ms / self.lower_ms


@dataclass(frozen=True)
class RatingChange:
    """Change of a rating at given speeds; outside: beyond the range of either calibration."""

    older_ms: Floats
    newer_ms: Floats
    change_percent: Floats
    outside: Bools


def velocity(
    revolutions: npt.ArrayLike,
    seconds: npt.ArrayLike,
    pieces: Sequence[Piece],
    *,
    valid_ms: tuple[float, float] | None = None,
) -> MeterVelocities:
    """Turn revolutions counted in seconds into velocities.

    revolutions, seconds: arrays of one shape or scalars; pieces: in rising n; valid_ms: the
    velocity range of the certificate in m/s, where it states one.
    Result: arrays of at least one dimension. A still rotor gives 0 and no flag; outside the range
    of n or of valid_ms the nearest piece is continued and the flag raised.
    Raises Refused naming row (from 1) and field for a value that is no number, negative
    revolutions or no time; for pieces, see check_pieces.
    Source: ISO 2537 (rating equation in straight pieces).
    """
    check_pieces(pieces)
    counted, timed = np.broadcast_arrays(
        np.atleast_1d(np.asarray(revolutions, dtype=np.float64)),
        np.atleast_1d(np.asarray(seconds, dtype=np.float64)),
    )
    _check_counts(counted, timed)
    # n = revolutions / seconds
    n = counted / timed
    rated = _rate(n, pieces)
    outside = (n < pieces[0].n_from - DUST) | (n > pieces[-1].n_to + DUST)
    if valid_ms is not None:
        outside |= (rated < valid_ms[0] - DUST) | (rated > valid_ms[1] + DUST)
    still = n == 0
    return MeterVelocities(
        velocity_ms=np.where(still, 0.0, rated), n_per_s=n, outside=outside & ~still
    )


def _rate(n: Floats, pieces: Sequence[Piece]) -> Floats:
    """v = a + b·n of the piece that holds n; a joint belongs to the lower piece."""
    held = np.searchsorted([piece.n_to for piece in pieces[:-1]], n, side="left")
    a_ms = np.array([piece.a_ms for piece in pieces])
    b_m = np.array([piece.b_m for piece in pieces])
    rated: Floats = a_ms[held] + b_m[held] * n
    return rated


def _check_counts(revolutions: Floats, seconds: Floats) -> None:
    for field_name, bad, text in (
        (
            "revolutions",
            ~np.isfinite(revolutions) | (revolutions < 0),
            gettext_noop("Row {row}: the revolutions must be a number, 0 or more."),
        ),
        (
            "seconds",
            ~np.isfinite(seconds) | (seconds <= 0),
            gettext_noop("Row {row}: revolutions need a time of more than 0 seconds."),
        ),
    ):
        if bad.any():
            row = int(np.flatnonzero(bad)[0]) + 1
            raise Refused(sentence(text, row=row), row=row, field_name=field_name)


def check_pieces(pieces: Sequence[Piece]) -> None:
    """Refuse pieces that are no rating: none, a line that does not rise, ranges that overlap.

    pieces: in rising n. Raises Refused naming the piece (from 1) and field.
    """
    if not pieces:
        raise Refused(sentence(gettext_noop("A meter rating needs at least one piece.")))
    for row, piece in enumerate(pieces, start=1):
        if not np.isfinite([piece.a_ms, piece.b_m, piece.n_from, piece.n_to]).all():
            text = gettext_noop("Piece {row}: every value must be a number.")
            raise Refused(sentence(text, row=row), row=row, field_name="a_ms")
        if piece.b_m <= 0:
            text = gettext_noop("Piece {row}: the velocity must rise with the revolutions.")
            raise Refused(sentence(text, row=row), row=row, field_name="b_m")
        if not 0 <= piece.n_from < piece.n_to:
            text = gettext_noop("Piece {row}: the range of n must start at 0 or above and rise.")
            raise Refused(sentence(text, row=row), row=row, field_name="n_to")
    for row, (lower, upper) in enumerate(pairwise(pieces), start=2):
        if upper.n_from < lower.n_to - DUST:
            text = gettext_noop("Piece {row}: it starts before the piece below it ends.")
            raise Refused(sentence(text, row=row), row=row, field_name="n_from")


def crossing(lower: Piece, upper: Piece) -> float | None:
    """Return the n (1/s) at which the lines of two pieces cross, or None when parallel."""
    if lower.b_m == upper.b_m:
        return None
    # n = (a₁ − a₂) / (b₂ − b₁)
    return (lower.a_ms - upper.a_ms) / (upper.b_m - lower.b_m)


def joint_gaps(pieces: Sequence[Piece]) -> tuple[JointGap, ...]:
    """Measure the step at each joint of pieces typed from a certificate.

    pieces: in rising n. Result: one gap for each pair of neighbours, velocities in m/s at the n
    where the lower piece ends. Source: common practice.
    """
    check_pieces(pieces)
    return tuple(
        JointGap(
            n_per_s=lower.n_to,
            lower_ms=lower.velocity_ms(lower.n_to),
            upper_ms=upper.velocity_ms(lower.n_to),
            crossing_per_s=crossing(lower, upper),
        )
        for lower, upper in pairwise(pieces)
    )


def compare(
    older: Sequence[Piece],
    newer: Sequence[Piece],
    speeds_ms: Sequence[float] = COMPARISON_SPEEDS_MS,
) -> RatingChange:
    """Tell what the newer rating makes of the revolutions that the older one rated at some speeds.

    older, newer: pieces in rising n of the same meter; speeds_ms: m/s by the older rating.
    Result: arrays as long as speeds_ms, the change in % of the older velocity; not a number where
    the older rotor would stand still. Raises Refused for pieces that are no rating.
    Source: common practice.
    """
    check_pieces(older)
    check_pieces(newer)
    speeds = np.asarray(speeds_ms, dtype=np.float64)
    tops = [piece.velocity_ms(piece.n_to) for piece in older[:-1]]
    held = np.searchsorted(tops, speeds, side="left")
    # n = (v − a) / b
    n = (speeds - np.array([p.a_ms for p in older])[held]) / np.array([p.b_m for p in older])[held]
    n = np.where(n > 0, n, np.nan)
    newer_ms = np.where(np.isnan(n), np.nan, _rate(n, newer))
    lowest, highest = max(older[0].n_from, newer[0].n_from), min(older[-1].n_to, newer[-1].n_to)
    return RatingChange(
        older_ms=speeds,
        newer_ms=newer_ms,
        change_percent=100 * (newer_ms - speeds) / speeds,
        outside=~((n >= lowest - DUST) & (n <= highest + DUST)),
    )
