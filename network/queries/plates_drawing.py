"""The plates of a station drawn to scale: places in a picture, no words and no colours."""

import math
from collections.abc import Sequence
from dataclasses import dataclass
from datetime import datetime

from network.models import Station
from network.numerics.levels import plates as kernel
from network.queries import gauges
from network.queries.working_rules import rules

HEIGHT = 320.0  # units of the picture for the whole range
MARGIN = 24.0
FIRST_X = 62.0
AXIS_LEFT = 14.0
COLUMN = 62.0
WIDE = 26.0
STEPS_M = (0.05, 0.1, 0.2, 0.5, 1.0, 2.0, 5.0)
MOST_TICKS = 12


@dataclass(frozen=True)
class Tick:
    """A line of the stage scale."""

    y: float
    stage_m: float
    x: float = FIRST_X - AXIS_LEFT - 5
    text_x: float = FIRST_X - AXIS_LEFT - 8

    @property
    def text_y(self) -> float:
        """Where its figure stands."""
        return self.y + 4


@dataclass(frozen=True)
class Bar:
    """One plate: its rectangle, the marks of its decimetres, and what is written on it."""

    label: str
    x: float
    y: float
    height: float
    bottom_m: float
    top_m: float
    marks: Sequence[float]

    @property
    def middle(self) -> float:
        """Where its label is centred."""
        return self.x + WIDE / 2

    @property
    def mark_x(self) -> float:
        """Where its marks end."""
        return self.x + WIDE / 3

    @property
    def label_y(self) -> float:
        """Where its label stands."""
        return self.y - 6


@dataclass(frozen=True)
class Band:
    """A range of stage across the picture: a hole between plates or an overlap of two."""

    y: float
    height: float
    from_m: float
    to_m: float
    is_hole: bool
    is_short: bool


@dataclass(frozen=True)
class Drawing:
    """Everything a template needs to draw the plates of one instant."""

    width: float
    height: float
    bar_width: float
    axis_x: float
    ticks: Sequence[Tick]
    bars: Sequence[Bar]
    bands: Sequence[Band]
    findings: Sequence[kernel.PlateFinding]
    top: float = MARGIN
    bottom: float = MARGIN + HEIGHT

    @property
    def band_width(self) -> float:
        """How wide a band is."""
        return self.width - self.axis_x


def drawing(station: Station, instant: datetime) -> Drawing | None:
    """Place the plates in service at an instant; None where no plate has a zero in force."""
    placed = [then.as_read for then in gauges.plates_in_service(station, instant)]
    plates = sorted((p for p in placed if p), key=lambda plate: plate.bottom_m)
    if not plates:
        return None
    lowest, highest = plates[0].bottom_m, max(plate.top_m for plate in plates)
    scale = HEIGHT / (highest - lowest)

    def y(stage_m: float) -> float:
        return round(MARGIN + (highest - stage_m) * scale, 2)

    overlap_m = rules().plate_overlap_m
    return Drawing(
        width=FIRST_X + COLUMN * len(plates),
        height=HEIGHT + 2 * MARGIN,
        bar_width=WIDE,
        axis_x=FIRST_X - AXIS_LEFT,
        ticks=[Tick(y(stage), stage) for stage in _ticks(lowest, highest)],
        bars=[
            Bar(
                label=plate.label,
                x=FIRST_X + COLUMN * place,
                y=y(plate.top_m),
                height=round((plate.top_m - plate.bottom_m) * scale, 2),
                bottom_m=plate.bottom_m,
                top_m=plate.top_m,
                marks=[y(mark + plate.zero_m) for mark in _decimetres(plate)],
            )
            for place, plate in enumerate(plates)
        ],
        bands=[
            Band(y(top), round((top - bottom) * scale, 2), bottom, top, is_hole, is_short)
            for bottom, top, is_hole, is_short in _joints(plates, overlap_m=overlap_m)
        ],
        findings=kernel.cover_findings(plates, overlap_m=overlap_m),
    )


def _ticks(lowest_m: float, highest_m: float) -> list[float]:
    step = next((s for s in STEPS_M if (highest_m - lowest_m) / s <= MOST_TICKS), STEPS_M[-1])
    first, last = math.ceil(lowest_m / step - 1e-9), math.floor(highest_m / step + 1e-9)
    return [round(number * step, 3) for number in range(first, last + 1)]


def _decimetres(plate: kernel.Plate) -> list[float]:
    first, last = math.ceil(plate.lowest_m * 10 - 1e-9), math.floor(plate.highest_m * 10 + 1e-9)
    return [number / 10 for number in range(first, last + 1)]


def _joints(
    plates: Sequence[kernel.Plate], *, overlap_m: float
) -> list[tuple[float, float, bool, bool]]:
    """Return bottom, top, whether it is a hole and whether it is too short, joint by joint."""
    found = []
    reached_m = plates[0].top_m
    for upper in plates[1:]:
        common_m = min(reached_m, upper.top_m) - upper.bottom_m
        if abs(common_m) > kernel.DUST_M:
            bottom, top = sorted((upper.bottom_m, upper.bottom_m + common_m))
            found.append((bottom, top, common_m < 0, 0 < common_m < overlap_m - kernel.DUST_M))
        reached_m = max(reached_m, upper.top_m)
    return found
