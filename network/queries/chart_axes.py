"""Axes of the charts that pages draw as SVG: figures to places, and the ticks between."""

from collections.abc import Sequence
from dataclasses import dataclass
from math import ceil, floor, log10

import numpy as np

from network.numerics.arrays import Bools, Floats

STEPS = (1, 2, 5, 10)
LEAST_YEARS = 2.5  # a shorter axis of time is marked by months


@dataclass(frozen=True)
class Tick:
    """A line across the chart and its number; empty text for a line between."""

    place: float
    text: str


@dataclass(frozen=True)
class Axis:
    """A stretch of figures laid on a stretch of the drawing; by their logarithms where is_log."""

    low: float
    high: float
    start: float
    end: float
    is_log: bool = False

    def places(self, values: Floats) -> Floats:
        """Return where figures lie: float64[n]; what is not positive lies at the low end of a log
        axis.
        """
        low, high = self.low, self.high
        if self.is_log:
            values = np.log10(np.maximum(values, low / 1e3))
            low, high = log10(low), log10(high)
        return np.round(self.start + (values - low) / (high - low) * (self.end - self.start), 1)

    def holds(self, values: Floats) -> Bools:
        """Tell which figures lie on the axis."""
        inside: Bools = (values >= self.low) & (values <= self.high)
        return inside

    def ticks(self, *, wanted: int = 6, decimal_sign: str = ".") -> list[Tick]:
        """Return ticks at round figures."""
        values = self._log_ticks() if self.is_log else self._plain_ticks(wanted)
        places = self.places(np.array([value for value, _shown in values], np.float64))
        return [
            Tick(float(place), _text(value, decimal_sign) if shown else "")
            for place, (value, shown) in zip(places, values, strict=True)
        ]

    def year_ticks(self) -> list[Tick]:
        """Return ticks of an axis of years and their fractions: years, or months of a short one."""
        if self.high - self.low >= LEAST_YEARS:
            whole = [
                (value, f"{value:g}") for value, _shown in self._plain_ticks(6) if value % 1 == 0
            ]
        else:
            months = range(ceil(self.low * 12), floor(self.high * 12) + 1)
            step = ceil(len(months) / 6)
            whole = [(m / 12, f"{m // 12}-{m % 12 + 1:02}") for m in months[::step]]
        places = self.places(np.array([value for value, _text in whole], np.float64))
        return [Tick(float(at), text) for at, (_value, text) in zip(places, whole, strict=True)]

    def _plain_ticks(self, wanted: int) -> list[tuple[float, bool]]:
        raw = (self.high - self.low) / wanted
        power = 10.0 ** floor(log10(raw))
        step = next(s * power for s in STEPS if s * power >= raw * 0.999)
        first, last = ceil(self.low / step - 1e-9), floor(self.high / step + 1e-9)
        return [(k * step, True) for k in range(first, last + 1)]

    def _log_ticks(self) -> list[tuple[float, bool]]:
        first, last = floor(log10(self.low)), ceil(log10(self.high))
        is_long = last - first > 3
        shown, drawn = ((1,), (1, 2, 5)) if is_long else ((1, 2, 5), range(1, 10))
        every = [(k * 10.0**p, k in shown) for p in range(first, last + 1) for k in drawn]
        return [tick for tick in every if self.low * 0.999 <= tick[0] <= self.high * 1.001]


def around(values: Floats, *, margin: float = 0.04) -> tuple[float, float]:
    """Return ends a little outside the figures; of one figure alone, ends around it."""
    low, high = float(values.min()), float(values.max())
    room = (high - low) * margin or abs(high) * margin or 1.0
    return low - room, high + room


def around_log(values: Floats, *, margin: float = 0.04) -> tuple[float, float]:
    """Return the same for a logarithmic axis, of the positive figures."""
    low, high = around(np.log10(values[values > 0]), margin=margin)
    return 10.0**low, 10.0**high


def polyline(x: Floats, y: Floats) -> str:
    """Return the points of a line as SVG writes them."""
    return " ".join(f"{a:g},{b:g}" for a, b in zip(x.tolist(), y.tolist(), strict=True))


def area(x: Sequence[Floats], y: Sequence[Floats]) -> str:
    """Return the outline between two lines."""
    return f"{polyline(x[0], y[0])} {polyline(x[1][::-1], y[1][::-1])}"


def _text(value: float, decimal_sign: str) -> str:
    return f"{round(value, 10):g}".replace("-", "−").replace(".", decimal_sign)
