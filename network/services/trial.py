"""Before and after: run the real act, look at what it changes, and take it back."""

import hashlib
from collections.abc import Callable, Mapping, Sequence
from contextlib import suppress
from dataclasses import dataclass
from datetime import date, timedelta
from typing import Any

import numpy as np
from django.conf import settings
from django.db import connection, transaction
from django.utils.module_loading import import_string
from django.utils.translation import gettext as _

from network.models import Station
from network.numerics.arrays import Floats
from network.queries import flows, station_years
from network.queries.flows import StationDays
from network.queries.station_inputs import StationInputs, load
from network.services.acts import Refusal


@dataclass(frozen=True)
class YearChange:
    """The volume of a water year before and after, hm³; None where days are missing."""

    label: str
    before_hm3: float | None
    after_hm3: float | None


@dataclass(frozen=True, eq=False)
class Differences:
    """What an act would change in the published figures of one station.

    days are those whose value or marks differ; changes their after − before in m³/s (m at a
    stage-only station), NaN where one side is missing.
    """

    station: Station
    fingerprint: str
    days: Sequence[date]
    changes: Floats
    before: Floats
    after: Floats
    years: Sequence[YearChange]
    editions: Sequence[Any]
    more: Mapping[str, Any]

    @property
    def largest(self) -> float | None:
        """The largest change of a day, with its sign."""
        known = self.changes[~np.isnan(self.changes)]
        return float(known[np.argmax(np.abs(known))]) if len(known) else None

    @property
    def mean(self) -> float | None:
        """The mean change of the days that have both sides."""
        known = self.changes[~np.isnan(self.changes)]
        return float(known.mean()) if len(known) else None


def before_and_after(
    station: Station,
    act: Callable[[], Any],
    *,
    look: Callable[[], Mapping[str, Any]] = dict,
) -> Differences:
    """Run an act in a transaction that is rolled back and compare both sides.

    look returns other answers (of gaugings, of visits) to compare; it is asked on both sides and
    comes back as {"before": …, "after": …}. A refusal of the act passes through.
    Inputs are chains, not readings: the readings are decoded once, after the transaction.
    """
    span = _span(station)
    before = load(station, *span)
    looked_before = look()
    with transaction.atomic():
        act()
        after = load(station, *span)
        looked_after = look()
        with suppress(NotImplementedError):
            connection.check_constraints()  # deferred foreign keys are not seen in a rollback
        transaction.set_rollback(True)
    sides = _both_sides(before, after, span)
    return _compare(
        station,
        *sides,
        fingerprint=fingerprint(before),
        more={"before": looked_before, "after": looked_after},
    )


def confirm(station: Station, act: Callable[[], Any], *, seen: str) -> Any:
    """Do the act if the first side is still the one that was shown; refuse if it moved."""
    with transaction.atomic():
        Station.objects.select_for_update(no_key=True).get(pk=station.pk)
        if fingerprint(load(station, *_span(station))) != seen:
            raise Refusal(
                _("The record changed since this was shown. Look at the differences again.")
            )
        return act()


def fingerprint(inputs: StationInputs) -> str:
    """Return a short name of one side, which changes with any input of the station."""
    text = f"{inputs.station.pk}:{inputs.record_version}:{inputs.first_day}:{inputs.last_day}"
    return hashlib.sha256(text.encode()).hexdigest()[:32]


def _span(station: Station) -> tuple[date, date]:
    """Return whole water years around all readings, or one day where there are none."""
    years = station_years.years_on_record(station)
    calendar = station_years.calendar()
    if not years:
        return date(2000, 1, 1), date(2000, 1, 1)
    return calendar.first_day(years[0]), calendar.last_day(years[-1])


def _both_sides(
    before: StationInputs, after: StationInputs, span: tuple[date, date]
) -> tuple[StationDays, StationDays]:
    """Compute both sides by the same code from readings decoded once."""
    raw = dict(flows.readings_of(before))
    raw |= {pk: r for pk, r in flows.readings_of(after).items() if pk not in raw}
    return flows.compute(before, raw).part(*span), flows.compute(after, raw).part(*span)


def _compare(
    station: Station,
    before: StationDays,
    after: StationDays,
    *,
    fingerprint: str,
    more: Mapping[str, Any],
) -> Differences:
    one, other = _published(station, before), _published(station, after)
    same = (one == other) | (np.isnan(one) & np.isnan(other))
    changed = np.flatnonzero(~same | (before.marks != after.marks))
    days = [day.astype(date) for day in before.days[changed]]
    return Differences(
        station=station,
        fingerprint=fingerprint,
        days=days,
        changes=other[changed] - one[changed],
        before=one[changed],
        after=other[changed],
        years=_years(before, after) if station.is_rated else (),
        editions=import_string(settings.EDITIONS_TOUCHED_BY)(station, days),
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
