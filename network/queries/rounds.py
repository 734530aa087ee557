"""Rounds: stops in order with distances and hours, and what speaks against them."""

from collections.abc import Iterable, Iterator
from dataclasses import dataclass
from datetime import date, datetime

from django.utils.translation import gettext as _

from network.models import Instrument, MeterPair, Office, Round, SafetyItem, Station, Stop
from network.numerics.due_dates import months_after
from network.numerics.great_circle import distance_km
from network.queries import clock
from network.queries.instruments import pair_due
from network.queries.working_rules import rules

# A rough speed along the straight line between two places, by hilly roads (common practice).
STRAIGHT_KMH = 40.0


@dataclass(frozen=True)
class Leg:
    """A stop and the way to it: straight distance in km, None where a place is unknown."""

    stop: Stop
    km: float | None
    problem: str  # why the stop cannot be made as planned, empty where it can


@dataclass(frozen=True)
class RoundSheet:
    """A round in order, with its sums and with what is left out."""

    legs: tuple[Leg, ...]
    left_out: tuple[Stop, ...]
    way_back_km: float | None
    km: float
    hours: float
    problems: tuple[str, ...]


@dataclass(frozen=True)
class AtHand:
    """An instrument of an office that does not stand in service: a spare, or in the laboratory."""

    instrument: Instrument
    since: datetime | None
    days: int | None


def sheet(of: Round) -> RoundSheet:
    """Return a round's stops in order; distances are great circles, from the office and back."""
    stops = list(of.stops.select_related("station").prefetch_related("tasks"))
    made = [stop for stop in stops if not stop.left_out_because]
    blocked = blocked_cableways([stop.station_id for stop in made], of.last_day)
    legs, here = [], _place(of.office)
    for stop in made:
        there = _place(stop.station)
        km = _km(here, there)
        problem = blocked.get(stop.station_id, "") if stop.by_cableway else ""
        legs.append(Leg(stop, km, problem))
        here = there
    back = _km(here, _place(of.office)) if legs else None
    km = sum(leg.km or 0 for leg in legs) + (back or 0)
    return RoundSheet(
        legs=tuple(legs),
        left_out=tuple(stop for stop in stops if stop.left_out_because),
        way_back_km=back,
        km=km,
        hours=km / STRAIGHT_KMH + sum(leg.stop.hours for leg in legs),
        problems=tuple(meters_out(of.meters.all(), of.last_day)),
    )


def meters_out(meters: Iterable[MeterPair], last_day: date) -> Iterator[str]:
    """Yield a sentence for each meter that is not in calibration through a round's last day."""
    limits, own = rules(), clock.agency()
    end = clock.day_start(last_day, of=own)
    for pair in meters:
        due = pair_due(pair, end, of=limits)
        said = {"meter": pair, "last_day": last_day.isoformat(), "hours": due.hours_used}
        if due.last is None:
            yield _("Meter %(meter)s has no calibration.") % said
        elif due.due_on is not None and due.due_on <= last_day:
            text = _(
                "Meter %(meter)s is out of calibration from %(day)s; the round ends %(last_day)s."
            )
            yield text % {**said, "day": due.due_on.isoformat()}
        elif due.is_due(last_day):
            text = _("Meter %(meter)s is due for calibration: %(hours).0f hours of use.")
            yield text % said


def blocked_cableways(stations: Iterable[int], on: date) -> dict[int, str]:
    """Return, by station, why no gauging may be made from a cableway there on a day.

    A cableway is usable when one in use there was found safe and its inspection is not overdue.
    """
    keys, limits = list(stations), rules()
    found: dict[int, list[str]] = {key: [] for key in keys}
    usable = set()
    rows = SafetyItem.objects.filter(
        station__in=keys, kind=SafetyItem.Kind.CABLEWAY, removed_on__isnull=True
    )
    for item in rows.prefetch_related("inspections"):
        fault = _fault(item, on, item.interval_months or limits.inspection_months)
        if fault:
            found[item.station_id].append(fault)
        else:
            usable.add(item.station_id)
    return {
        key: " ".join(faults) or _("There is no cableway here.")
        for key, faults in found.items()
        if key not in usable
    }


def at_hand(office: Office, *, status: str, at: datetime) -> list[AtHand]:
    """Return the instruments of an office in a status and since when, by their history."""
    rows = Instrument.objects.filter(office=office, status=status)
    kept = {row.pk: row for row in rows}
    since: dict[int, datetime | None] = dict.fromkeys(kept)
    past = Instrument.history.filter(id__in=kept).order_by("id", "-history_date", "-history_id")
    ended = set()
    for row in past.values_list("id", "status", "history_date"):
        key, then, changed_at = row
        if then != status:
            ended.add(key)
        elif key not in ended:
            since[key] = changed_at
    return [
        AtHand(row, since[key], (at - began).days if (began := since[key]) else None)
        for key, row in kept.items()
    ]


def _fault(item: SafetyItem, on: date, months: int) -> str:
    standing = [row for row in item.inspections.all() if row.stands and row.inspected_on <= on]
    if not standing:
        return _("%(item)s was never inspected.") % {"item": item}
    last = max(standing, key=lambda row: (row.inspected_on, row.pk))
    said = {"item": item, "day": last.inspected_on.isoformat()}
    if not last.is_safe:
        return _("%(item)s was found unsafe on %(day)s.") % said
    due_on = months_after(last.inspected_on, months)
    if due_on <= on:
        text = _("The inspection of %(item)s is overdue since %(due)s.")
        return text % {**said, "due": due_on.isoformat()}
    return ""


def _place(of: Station | Office) -> tuple[float, float] | None:
    if of.latitude_deg is None or of.longitude_deg is None:
        return None
    return of.latitude_deg, of.longitude_deg


def _km(here: tuple[float, float] | None, there: tuple[float, float] | None) -> float | None:
    if here is None or there is None:
        return None
    to = {"to_latitude_deg": there[0], "to_longitude_deg": there[1]}
    return float(distance_km(*here, **to))
