"""Before and after: run the real act, look at what it changes, and take it back."""

import hashlib
from collections.abc import Callable, Mapping
from contextlib import suppress
from dataclasses import dataclass
from datetime import date
from typing import Any

from django.conf import settings
from django.db import connection, transaction
from django.utils.module_loading import import_string
from django.utils.translation import gettext as _

from network.models import Station
from network.numerics.records.readings import Readings
from network.queries import flows, held_gaugings, station_years
from network.queries.differences import Differences, compared
from network.queries.flows import StationDays
from network.queries.held_gaugings import Held
from network.queries.station_inputs import StationInputs, load
from network.services.acts import Refusal, lock_station

__all__ = ["Differences", "before_and_after", "confirm", "fingerprint"]

Span = tuple[date, date]
NO_READINGS = date(2000, 1, 1), date(2000, 1, 1)


@dataclass(eq=False)
class _Side:
    """What is loaded of one side; its days where they can only be computed while it stands."""

    inputs: StationInputs
    gaugings: list[Held]
    looked: Mapping[str, Any]
    days: StationDays | None = None


def before_and_after(
    station: Station,
    act: Callable[[], Any],
    *,
    look: Callable[[], Mapping[str, Any]] = dict,
    touches_readings: bool = False,
) -> Differences:
    """Run an act in a transaction that is rolled back and compare both sides.

    look returns other answers (of plates, of visits) to compare; it is asked on both sides and
    comes back as {"before": …, "after": …}. A refusal of the act passes through.
    Inputs are chains, not readings: the readings are decoded once, after the transaction, unless
    the act touches readings too or days rest on a regression, which reads the record by itself.
    """
    span = _span(station)
    with transaction.atomic():
        lock_station(station)
        before = _side(station, span, look)
        if touches_readings:
            before.days = _days(before, span)
        act()
        after = _side(station, span, look)
        if touches_readings or any(each.neighbour for each in after.inputs.infills):
            after.days = _days(after, span)
        with suppress(NotImplementedError):
            connection.check_constraints()  # deferred foreign keys are not seen in a rollback
        transaction.set_rollback(True)
    raw = None if before.days else _shared_readings(before, after)
    days = [side.days or _days(side, span, raw) for side in (before, after)]
    found = compared(
        station,
        days[0],
        days[1],
        fingerprint=fingerprint(before.inputs),
        gaugings=held_gaugings.changes(before.gaugings, after.gaugings),
        more={"before": before.looked, "after": after.looked},
    )
    return found.with_editions(import_string(settings.EDITIONS_TOUCHED_BY)(station, found.days))


def confirm(station: Station, act: Callable[[], Any], *, seen: str) -> Any:
    """Do the act if the first side is still the one that was shown; refuse if it moved."""
    with transaction.atomic():
        lock_station(station)
        if fingerprint(load(station, *_span(station))) != seen:
            raise Refusal(
                _("The record changed since this was shown. Look at the differences again.")
            )
        return act()


def fingerprint(inputs: StationInputs) -> str:
    """Return a short name of one side, which changes with any input of the station."""
    text = f"{inputs.station.pk}:{inputs.record_version}:{inputs.first_day}:{inputs.last_day}"
    return hashlib.sha256(text.encode()).hexdigest()[:32]


def _span(station: Station) -> Span:
    """Return whole water years around all readings, or one day where there are none."""
    years = station_years.years_on_record(station)
    if not years:
        return NO_READINGS
    calendar = station_years.calendar()
    return calendar.first_day(years[0]), calendar.last_day(years[-1])


def _side(station: Station, span: Span, look: Callable[[], Mapping[str, Any]]) -> _Side:
    return _Side(load(station, *span), held_gaugings.of_station(station), look())


def _days(side: _Side, span: Span, raw: Mapping[int, Readings] | None = None) -> StationDays:
    readings = flows.readings_of(side.inputs) if raw is None else raw
    return flows.compute(side.inputs, readings).part(*span)


def _shared_readings(before: _Side, after: _Side) -> Mapping[int, Readings] | None:
    """Decode once what both sides need; None where they need different readings."""
    one, other = before.inputs, after.inputs
    same_period = (one.first_day, one.last_day) == (other.first_day, other.last_day)
    if not same_period or _series(other) - _series(one):
        return None
    return flows.readings_of(one)


def _series(inputs: StationInputs) -> set[int]:
    wanted = [inputs.series, *(span.series for span in inputs.infills)]
    return {series.pk for series in wanted if series is not None}
