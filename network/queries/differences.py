"""What lies between two sides of a station's record: days, years, gaugings, editions touched."""

from collections.abc import Mapping, Sequence
from dataclasses import dataclass, replace
from datetime import date, timedelta
from typing import Any

import numpy as np

from network.models import Infill, Station
from network.numerics.arrays import Floats
from network.queries import station_years
from network.queries.flows import StationDays
from network.queries.held_gaugings import HeldChange


@dataclass(frozen=True)
class YearChange:
    """The volume of a water year before and after, hm³; None where days are missing."""

    label: str
    before_hm3: float | None
    after_hm3: float | None

    @property
    def percent(self) -> float | None:
        """The change in % of the volume before."""
        if not self.before_hm3 or self.after_hm3 is None:
            return None
        return 100 * (self.after_hm3 / self.before_hm3 - 1)


@dataclass(frozen=True)
class DayChange:
    """One published day before and after, m³/s (m at a stage-only station); None where missing."""

    day: date
    before: float | None
    after: float | None

    @property
    def change(self) -> float | None:
        """After − before, None where one side is missing."""
        if self.before is None or self.after is None:
            return None
        return self.after - self.before


@dataclass(frozen=True, eq=False)
class Differences:
    """What an act would change in the published figures of one station.

    days are those whose value or marks differ; changes their after − before in m³/s (m at a
    stage-only station), NaN where one side is missing. followers are the stations that are
    estimated from this one: their figures may change with it.
    """

    station: Station
    fingerprint: str
    days: Sequence[date]
    changes: Floats
    before: Floats
    after: Floats
    years: Sequence[YearChange]
    gaugings: Sequence[HeldChange]
    followers: Sequence[Station]
    more: Mapping[str, Any]
    editions: Sequence[Any] = ()

    @property
    def largest(self) -> float | None:
        """The largest change of a day, with its sign."""
        at = self._largest_at()
        return None if at is None else float(self.changes[at])

    @property
    def largest_day(self) -> date | None:
        """The day of the largest change."""
        at = self._largest_at()
        return None if at is None else self.days[at]

    @property
    def mean(self) -> float | None:
        """The mean change of the days that have both sides."""
        known = self.changes[~np.isnan(self.changes)]
        return float(known.mean()) if len(known) else None

    @property
    def days_gained(self) -> int:
        """Days that would get a figure."""
        return int((np.isnan(self.before) & ~np.isnan(self.after)).sum())

    @property
    def days_lost(self) -> int:
        """Days that would lose their figure."""
        return int((~np.isnan(self.before) & np.isnan(self.after)).sum())

    @property
    def days_moved(self) -> int:
        """Days whose figure would become another one."""
        return int((np.nan_to_num(self.changes) != 0).sum())

    @property
    def days_marked(self) -> int:
        """Days that keep their figure, or their lack of one, and change their mark only."""
        return len(self.days) - self.days_moved - self.days_gained - self.days_lost

    @property
    def is_nothing(self) -> bool:
        """Tell that no published figure and no gauging would change."""
        return not len(self.days) and not self.gaugings

    def day_rows(self) -> list[DayChange]:
        """Return the days that change, one row each."""
        rows = zip(self.days, self.before, self.after, strict=True)
        return [DayChange(day, _none(one), _none(other)) for day, one, other in rows]

    def with_editions(self, editions: Sequence[Any]) -> "Differences":
        """Return the same with the issued editions it touches."""
        return replace(self, editions=editions)

    def _largest_at(self) -> int | None:
        size = np.abs(self.changes)
        return None if np.isnan(size).all() else int(np.nanargmax(size))


def compared(
    station: Station,
    before: StationDays,
    after: StationDays,
    *,
    fingerprint: str,
    gaugings: Sequence[HeldChange],
    more: Mapping[str, Any],
) -> Differences:
    """Compare the published figures of two sides over the same days."""
    one, other = _published(station, before), _published(station, after)
    same = (one == other) | (np.isnan(one) & np.isnan(other))
    changed = np.flatnonzero(~same | (before.marks != after.marks))
    return Differences(
        station=station,
        fingerprint=fingerprint,
        days=before.days[changed].tolist(),
        changes=other[changed] - one[changed],
        before=one[changed],
        after=other[changed],
        years=_years(before, after) if station.is_rated else (),
        gaugings=gaugings,
        followers=_followers(station) if len(changed) else (),
        more=more,
    )


def _published(station: Station, days: StationDays) -> Floats:
    return days.flow_m3s if station.is_rated else days.stage_m


def _years(before: StationDays, after: StationDays) -> list[YearChange]:
    """Return the years whose volume differs."""
    calendar = station_years.calendar()
    numbers = calendar.years_of(before.days)
    changes = []
    for year in np.unique(numbers):
        volumes = [_volume_hm3(side.flow_m3s[numbers == year]) for side in (before, after)]
        if volumes[0] != volumes[1]:
            changes.append(YearChange(calendar.label(int(year)), *volumes))
    return changes


def _volume_hm3(flow_m3s: Floats) -> float | None:
    # V = Σ Q̄ · 86 400 s
    volume = float(np.sum(flow_m3s)) * timedelta(days=1).total_seconds() / 1e6
    return None if np.isnan(volume) else volume


def _followers(station: Station) -> list[Station]:
    """Return the stations with an infill estimated from this one."""
    rows = Infill.objects.standing().filter(neighbour=station).values("station")
    return list(Station.objects.filter(pk__in=rows))


def _none(value: float) -> float | None:
    return None if np.isnan(value) else float(value)
