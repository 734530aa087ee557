"""What a new calibration says about the gaugings made since the one before."""

from collections.abc import Sequence
from dataclasses import dataclass

import numpy as np

from network.models import Calibration, Gauging
from network.numerics.gaugings import gauging as kernel
from network.numerics.gaugings.gauging_input import Meter
from network.numerics.meters.meter_rating import RatingChange, compare
from network.queries import calibrations, clock, station_facts
from network.queries.field_sheets import of_gauging
from network.queries.gaugings import kernel_sheet, settings_of
from network.queries.working_rules import rules


@dataclass(frozen=True)
class Touched:
    """A gauging made in between: as signed, and as the newer rating would have it."""

    gauging: Gauging
    would_become_m3s: float | None

    @property
    def change_percent(self) -> float | None:
        """The change in % of the signed discharge."""
        before, after = self.gauging.discharge_m3s, self.would_become_m3s
        return 100 * (after - before) / before if before and after is not None else None


@dataclass(frozen=True)
class SpeedChange:
    """One speed by the older rating, by the newer, and the change in %; None where none holds."""

    older_ms: float
    newer_ms: float | None
    percent: float | None


@dataclass(frozen=True)
class LookBack:
    """A calibration beside the one before; gaugings are listed beyond the agency's limit only."""

    older: Calibration
    newer: Calibration
    change: RatingChange
    limit_percent: float
    gaugings: Sequence[Touched]

    @property
    def speeds(self) -> list[SpeedChange]:
        """The five speeds one by one."""
        columns = (self.change.older_ms, self.change.newer_ms, self.change.change_percent)
        return [
            SpeedChange(
                float(older),
                None if np.isnan(newer) else float(newer),
                None if np.isnan(percent) else float(percent),
            )
            for older, newer, percent in zip(*columns, strict=True)
        ]

    @property
    def largest_percent(self) -> float:
        """The largest change in % among the speeds both ratings cover, 0 where there is none."""
        known = np.abs(self.change.change_percent[~np.isnan(self.change.change_percent)])
        return float(known.max()) if len(known) else 0.0

    @property
    def is_beyond(self) -> bool:
        """Tell whether the change calls for a look at the gaugings made in between."""
        return self.largest_percent > self.limit_percent


def look_back(newer: Calibration) -> LookBack | None:
    """Compare a calibration with the one before at five speeds; None where there is none."""
    older = calibrations.before(newer)
    if older is None or not older.pieces.exists() or not newer.pieces.exists():
        return None
    limits = rules()
    change = compare(calibrations.kernel_pieces(older), calibrations.kernel_pieces(newer))
    found = LookBack(older, newer, change, limits.calibration_change_percent, ())
    if not found.is_beyond:
        return found
    made = calibrations.made_between(older, newer).select_related("station", "pair")
    rows = tuple(Touched(row, would_become(row, newer)) for row in made)
    return LookBack(older, newer, change, limits.calibration_change_percent, rows)


def would_become(gauging: Gauging, calibration: Calibration) -> float | None:
    """Compute the discharge of a stored gauging by another calibration, None where none results."""
    sheet = of_gauging(gauging)
    facts = station_facts.at(gauging.station, sheet.heading.mid_time)
    meter = calibrations.with_rating(Meter(), calibration)
    settings = settings_of(clock.agency(), rules())
    preview = kernel.preview(kernel_sheet(sheet, facts, meter), settings)
    return preview.result.discharge_m3s if preview.result and not preview.faults else None
