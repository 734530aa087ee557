"""Tow runs of a meter fitted by one to three straight pieces."""

from collections.abc import Iterator, Sequence
from dataclasses import dataclass
from itertools import combinations, pairwise
from typing import Literal

import numpy as np
import numpy.typing as npt

from network.numerics.arrays import Floats, Indices
from network.numerics.meters.meter_rating import Piece, crossing
from network.numerics.sentences import Refused, gettext_noop, sentence

LEAST_RUNS = 5


@dataclass(frozen=True)
class TowRunFit:
    """Fitted pieces with the residual of every run, in the order the runs were given."""

    pieces: tuple[Piece, ...]
    n_per_s: Floats
    fitted_ms: Floats
    residual_ms: Floats  # carriage speed minus the equation
    residual_percent: Floats  # of the carriage speed
    piece_of_run: Indices
    piece_standard_errors_ms: tuple[float, ...]
    standard_error_ms: float


def fit_tow_runs(
    speeds_ms: npt.ArrayLike,
    revolutions: npt.ArrayLike,
    seconds: npt.ArrayLike,
    *,
    pieces: Literal[1, 2, 3] = 1,
) -> TowRunFit:
    """Fit v = a + b·n to tow runs in one, two or three straight pieces.

    speeds_ms: carriage speeds in m/s; revolutions counted in seconds: arrays of one length, any
    order. Each piece is an ordinary least-squares line of v on n; the breaks are those, among the
    runs, of the smallest residual sum, and neighbouring lines are joined where they cross. Breaks
    whose lines do not cross so that every piece keeps its runs are not considered.
    Result: pieces from the smallest to the largest n run, residuals, standard errors in m/s with
    m − 2 degrees of freedom a piece and N − 2·pieces in all.
    Raises Refused for bad runs (row from 1 and field), for fewer than 5 runs in a piece and for
    pieces that do not cross. Source: ISO 3455 (straight pieces by least squares), breaks by
    exhaustive search (common practice).
    """
    speed, n = _runs(speeds_ms, revolutions, seconds)
    _check_enough(len(n), pieces)
    order = np.argsort(n, kind="stable")
    joined = min(
        _candidates(n[order], speed[order], pieces), key=lambda found: found[0], default=None
    )
    if joined is None:
        no_line = gettext_noop("The runs give no line that rises: check speeds and revolutions.")
        no_break = gettext_noop(
            "No break among the runs gives {pieces} pieces of at least {least} runs that rise and "
            "cross: fit fewer pieces or check the runs."
        )
        text = no_line if pieces == 1 else no_break
        raise Refused(sentence(text, pieces=pieces, least=LEAST_RUNS), field_name="pieces")
    return _result(joined[1], speed, n)


def _runs(
    speeds_ms: npt.ArrayLike, revolutions: npt.ArrayLike, seconds: npt.ArrayLike
) -> tuple[Floats, Floats]:
    speed, turns, time = (
        np.atleast_1d(np.asarray(given, dtype=np.float64))
        for given in (speeds_ms, revolutions, seconds)
    )
    if not speed.shape == turns.shape == time.shape:
        raise ValueError("speeds, revolutions and seconds must be of one length")
    for field_name, values in (("speeds_ms", speed), ("revolutions", turns), ("seconds", time)):
        bad = ~(np.isfinite(values) & (values > 0))
        if bad.any():
            row = int(np.flatnonzero(bad)[0]) + 1
            text = gettext_noop(
                "Run {row}: carriage speed, revolutions and seconds must be more than 0; leave out "
                "a run in which the rotor stood still."
            )
            raise Refused(sentence(text, row=row), row=row, field_name=field_name)
    return speed, turns / time


def _check_enough(runs: int, pieces: int) -> None:
    if runs < LEAST_RUNS * pieces:
        text = gettext_noop(
            "There are {runs} tow runs; every piece needs at least {least}, in all {needed}."
        )
        values = {"runs": runs, "least": LEAST_RUNS, "needed": LEAST_RUNS * pieces}
        raise Refused(sentence(text, **values), field_name="pieces")


def _candidates(n: Floats, speed: Floats, pieces: int) -> Iterator[tuple[float, tuple[Piece, ...]]]:
    """Yield the residual sum and the joined pieces of every admissible set of breaks."""
    runs = len(n)
    lines: dict[tuple[int, int], tuple[Piece, float] | None] = {}
    for breaks in combinations(range(LEAST_RUNS, runs - LEAST_RUNS + 1), pieces - 1):
        spans = list(pairwise((0, *breaks, runs)))
        if any(last - first < LEAST_RUNS for first, last in spans):
            continue
        for span in spans:
            if span not in lines:
                lines[span] = _line(n[slice(*span)], speed[slice(*span)])
        fitted = [line for span in spans if (line := lines[span]) is not None]
        if len(fitted) < pieces:
            continue
        joined = _join([piece for piece, _ in fitted], n)
        if joined is not None:
            yield sum(residual_sum for _, residual_sum in fitted), joined


def _line(n: Floats, speed: Floats) -> tuple[Piece, float] | None:
    """Return the least-squares line and its residual sum; None where it does not rise."""
    mean_n, mean_speed = n.mean(), speed.mean()
    spread = float(((n - mean_n) ** 2).sum())
    if spread == 0:
        return None
    # b = Σ(n − n̄)(v − v̄) / Σ(n − n̄)²,  a = v̄ − b·n̄
    b = float(((n - mean_n) * (speed - mean_speed)).sum()) / spread
    a = float(mean_speed) - b * float(mean_n)
    if b <= 0:
        return None
    return Piece(a, b, float(n[0]), float(n[-1])), float(((speed - a - b * n) ** 2).sum())


def _join(lines: Sequence[Piece], n: Floats) -> tuple[Piece, ...] | None:
    """Let neighbouring lines meet where they cross; None where a piece would lose its runs."""
    crossings = [crossing(lower, upper) for lower, upper in pairwise(lines)]
    joints = [float(n[0]), *(np.nan if n_at is None else n_at for n_at in crossings), float(n[-1])]
    if not np.all(np.diff(joints) > 0):
        return None
    # A joint belongs to the lower piece, as in meter_rating.velocity.
    held = np.searchsorted(joints[1:-1], n, side="left")
    if np.bincount(held, minlength=len(lines)).min() < LEAST_RUNS:
        return None
    return tuple(
        Piece(line.a_ms, line.b_m, n_from, n_to)
        for line, (n_from, n_to) in zip(lines, pairwise(joints), strict=True)
    )


def _result(pieces: tuple[Piece, ...], speed: Floats, n: Floats) -> TowRunFit:
    held = np.searchsorted([piece.n_to for piece in pieces[:-1]], n, side="left")
    fitted = (
        np.array([piece.a_ms for piece in pieces])[held]
        + np.array([piece.b_m for piece in pieces])[held] * n
    )
    residual = speed - fitted
    squares = residual**2
    return TowRunFit(
        pieces=pieces,
        n_per_s=n,
        fitted_ms=fitted,
        residual_ms=residual,
        residual_percent=100 * residual / speed,
        piece_of_run=held,
        # s = √(Σr² / (m − 2))
        piece_standard_errors_ms=tuple(
            float(np.sqrt(squares[held == number].sum() / ((held == number).sum() - 2)))
            for number in range(len(pieces))
        ),
        standard_error_ms=float(np.sqrt(squares.sum() / (len(n) - 2 * len(pieces)))),
    )
