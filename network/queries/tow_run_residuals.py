"""The tow runs of a calibration beside its equation: residuals, and what a plot of them shows."""

from collections.abc import Sequence
from dataclasses import dataclass

from network.models import Calibration
from network.numerics.meters.meter_rating import velocity
from network.queries.calibrations import kernel_pieces

WIDTH, HEIGHT, LEFT, BOTTOM, TOP = 400.0, 240.0, 40.0, 210.0, 12.0


@dataclass(frozen=True)
class Residual:
    """One run: n, carriage speed, the equation's velocity, and speed minus velocity in %."""

    number: int
    n_per_s: float
    speed_ms: float
    fitted_ms: float
    percent: float


@dataclass(frozen=True)
class RatingPlot:
    """Runs and pieces in the plot's own units; lines are the ends x1, y1, x2, y2 of each piece."""

    runs: Sequence[tuple[float, float]]
    lines: Sequence[tuple[float, float, float, float]]
    largest_n: float
    largest_ms: float
    width: float = WIDTH
    height: float = HEIGHT
    left: float = LEFT
    right: float = WIDTH - 8
    bottom: float = BOTTOM
    top: float = TOP


def residuals(calibration: Calibration) -> list[Residual]:
    """Compare every tow run with the equation that is stored."""
    runs, pieces = list(calibration.tow_runs.all()), kernel_pieces(calibration)
    if not runs or not pieces:
        return []
    rated = velocity([r.revolutions for r in runs], [r.seconds for r in runs], pieces)
    return [
        Residual(
            run.position, float(n), run.speed_ms, float(v), 100 * (run.speed_ms - v) / run.speed_ms
        )
        for run, n, v in zip(runs, rated.n_per_s, rated.velocity_ms, strict=True)
    ]


def rating_plot(calibration: Calibration) -> RatingPlot | None:
    """Draw the pieces and the runs of a meter rating; None where there is no equation."""
    pieces, runs = kernel_pieces(calibration), residuals(calibration)
    if not pieces:
        return None
    most_n = max([*(run.n_per_s for run in runs), *(p.n_to for p in pieces if p.n_to < 1e5), 1.0])
    most_ms = max(pieces[-1].velocity_ms(most_n), *(run.speed_ms for run in runs), 0.1)

    def x(n: float) -> float:
        return round(LEFT + n / most_n * (WIDTH - LEFT - 8), 1)

    def y(v: float) -> float:
        return round(BOTTOM - v / most_ms * (BOTTOM - TOP), 1)

    ends = [(p, p.n_from, min(p.n_to, most_n)) for p in pieces if p.n_from < most_n]
    return RatingPlot(
        [(x(run.n_per_s), y(run.speed_ms)) for run in runs],
        [(x(a), y(p.velocity_ms(a)), x(b), y(p.velocity_ms(b))) for p, a, b in ends],
        most_n,
        most_ms,
    )
