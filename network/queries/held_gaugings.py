"""A station's signed gaugings held against the ratings in force when they were made."""

from collections.abc import Sequence
from dataclasses import dataclass
from datetime import datetime, timedelta

import numpy as np

from network.models import Gauging, Station
from network.numerics.ratings.rating import RatingPeriod, rate
from network.queries import gaugings, in_force
from network.queries.station_inputs import rating_periods

ONE_SECOND = timedelta(seconds=1)  # periods are asked for up to an instant, not with it


@dataclass(frozen=True)
class Held:
    """A gauging with its present mean stage and what the rating of its time gives there."""

    gauging: Gauging
    stage_m: float | None
    rated_m3s: float | None

    @property
    def at(self) -> datetime:
        """The mid-time, to which a gauging belongs."""
        return mid_time(self.gauging)

    @property
    def deviation_percent(self) -> float | None:
        """By how many % it lies above the rating; None where there is nothing to compare."""
        if not self.rated_m3s or self.gauging.discharge_m3s is None:
            return None
        # 100·(Q − Q̂)/Q̂
        return 100 * (self.gauging.discharge_m3s / self.rated_m3s - 1)

    @property
    def figures(self) -> tuple[float | None, ...]:
        """All that an act could change."""
        return self.gauging.discharge_m3s, self.stage_m, self.rated_m3s


@dataclass(frozen=True)
class HeldChange:
    """A gauging whose stage, discharge or rated flow differs between two sides."""

    before: Held
    after: Held


def mid_time(gauging: Gauging) -> datetime:
    """Return the instant half-way between start and end."""
    return gauging.started_at + (gauging.ended_at - gauging.started_at) / 2


def of_station(station: Station) -> list[Held]:
    """Hold every signed gauging against the rating and shift of its mid-time, in order of time."""
    rows = Gauging.objects.filter(station=station, discharge_m3s__isnull=False)
    rows = sorted(rows, key=mid_time)
    if not rows:
        return []
    stages = gaugings.stages_of(rows)
    first, last = mid_time(rows[0]), mid_time(rows[-1])
    return hold(rows, stages, rating_periods(station, first, last + ONE_SECOND))


def hold(
    rows: Sequence[Gauging],
    stages_m: dict[int, float | None],
    periods: Sequence[RatingPeriod],
) -> list[Held]:
    """Rate the stages of gaugings in order of time by the periods given."""
    known = [row for row in rows if stages_m[row.pk] is not None]
    times_s = np.array([in_force.seconds(mid_time(row)) for row in known], np.int64)
    stage_m = np.array([stages_m[row.pk] for row in known], np.float64)
    flow_m3s = rate(times_s, stage_m, periods=periods, gap_limit_s=0).flow_m3s
    rated = {
        row.pk: None if np.isnan(flow) else float(flow)
        for row, flow in zip(known, flow_m3s, strict=True)
    }
    return [Held(row, stages_m[row.pk], rated.get(row.pk)) for row in rows]


def changes(before: Sequence[Held], after: Sequence[Held]) -> list[HeldChange]:
    """Return the gaugings of both sides whose figures differ, in order of time."""
    then = {held.gauging.pk: held for held in before}
    return [
        HeldChange(then[now.gauging.pk], now)
        for now in after
        if now.gauging.pk in then and then[now.gauging.pk].figures != now.figures
    ]
