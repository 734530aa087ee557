"""Ratings in doubt: the last gaugings all on one side of the curve, each beyond its uncertainty."""

from collections import defaultdict
from collections.abc import Iterator
from datetime import date
from functools import reduce
from operator import or_
from typing import Any, NamedTuple

import numpy as np
from django.db.models import Exists, F, Model, OuterRef, Q, Subquery
from django.db.models.functions import Abs

from network.models import CurveBand, Gauging, PlateZero, RatingPeriod, ShiftTable, Station
from network.queries.record_days import RecordDay
from network.queries.work_due.items import Asked, Item, Kind

DEVIATION = F("signed_deviation_percent")
# U of the gauging in % of the curve's flow: U·Q/Q_rating
OWN = F("u95_percent") * (1 + DEVIATION / 100.0)


class Signed(NamedTuple):
    """A signed gauging with its deviation and own U in % of the curve's flow."""

    pk: int
    station: int
    office: int
    day: int
    stage_m: float
    deviation: float
    own: float


Suspect = list[Signed]  # the last gaugings of a station, on one side beyond their own U


def items(asked: Asked) -> Iterator[Item]:
    """Yield the ratings whose last gaugings lie beyond the combined U of gauging and curve."""
    suspects = _suspects(asked)
    bands = _bands([row[0].station for row in suspects], asked)
    for row in suspects:
        first = row[0]
        band = np.array(bands.get(first.station, [(0.0, 0.0)])).T
        # U = √(U_gauging² + U_curve²)
        limits = np.hypot([g.own for g in row], np.interp([g.stage_m for g in row], *band))
        deviations = tuple(g.deviation for g in row)
        if (np.abs(deviations) > limits).all():
            since, count = date.fromordinal(first.day), len(row)
            yield Item(
                Kind.DOUBT, first.station, first.station, first.office, since, since, count,
                deviations,
            )  # fmt: skip


def _suspects(asked: Asked) -> list[Suspect]:
    """Find them by the deviations at signing.

    These are the present ones where neither rating, shift nor plate zero changed after the first
    of those gaugings was signed; where one did, they say nothing of the rating now in force.
    """
    by_station: dict[int, Suspect] = defaultdict(list)
    for gauging in _signed(asked):
        by_station[gauging.station].append(gauging)
    last = [row[-asked.rules.doubt_count :] for row in by_station.values()]
    found = [row for row in last if _on_one_side(row)]
    present = _still_present([row[0].pk for row in found])
    return [row for row in found if row[0].pk in present]


def _signed(asked: Asked) -> Iterator[Signed]:
    """Read the gaugings, in order, of the few stations whose last ones lie beyond their own U."""
    signed = Gauging.objects.filter(
        signed_deviation_percent__gt=-100, u95_percent__gt=0, signed_stage_m__isnull=False
    )
    latest = signed.filter(station=OuterRef("pk")).order_by("-started_at")
    times_u = latest.annotate(times_u=Abs(DEVIATION / OWN)).values("times_u")
    last = {f"times_u_{n}": Subquery(times_u[n : n + 1]) for n in range(asked.rules.doubt_count)}
    stations: Any = Station.objects.alias(**last).filter(**{f"{name}__gt": 1 for name in last})
    if asked.station is not None:
        stations = stations.filter(pk=asked.station)
    day = RecordDay("started_at", of=asked.agency)
    rows = signed.filter(station__in=stations).order_by("started_at")
    for row in rows.values_list(
        "pk", "station", "station__office", day, "signed_stage_m", DEVIATION, OWN
    ):
        yield Signed(*row)


def _on_one_side(row: Suspect) -> bool:
    deviations = [gauging.deviation for gauging in row]
    return min(deviations) > 0 or max(deviations) < 0


def _still_present(firsts: list[int]) -> set[int]:
    """Return those of the gaugings since which nothing changed that their deviation rests on."""
    if not firsts:
        return set()
    began_since = Q(withdrawn_at=None, effective_from__gt=OuterRef("started_at"))
    rows = Gauging.objects.filter(
        ~_changed(RatingPeriod, "station", began_since),
        ~_changed(ShiftTable, "period__station"),
        ~_changed(PlateZero, "plate__station"),
        pk__in=firsts,
    )
    return set(rows.values_list("pk", flat=True))


def _bands(stations: list[int], asked: Asked) -> dict[int, list[tuple[float, float]]]:
    """Return stage and U₉₅ of the curves in force, by station; rising in stage."""
    found: dict[int, list[tuple[float, float]]] = defaultdict(list)
    if not stations:
        return found
    standing = RatingPeriod.objects.standing().filter(station=OuterRef("station"))
    began = standing.filter(effective_from__lt=asked.end_of(asked.today))
    latest = began.order_by("-effective_from")
    current = RatingPeriod.objects.filter(
        station__in=stations, pk=Subquery(latest.values("pk")[:1])
    )
    points = CurveBand.objects.filter(curve__periods__in=current).order_by("stage_m")
    for station, stage_m, u95_percent in points.values_list(
        "curve__station", "stage_m", "u95_percent"
    ):
        found[station].append((stage_m, u95_percent))
    return found


def _changed(model: type[Model], station: str, *or_else: Q) -> Exists:
    """Tell whether rows of a gauging's station were recorded or withdrawn since it was signed."""
    since = OuterRef("signed_at")
    rows = model._default_manager.filter(**{station: OuterRef("station")})
    ways = (Q(recorded_at__gt=since), Q(withdrawn_at__gt=since), *or_else)
    return Exists(rows.filter(reduce(or_, ways)))
