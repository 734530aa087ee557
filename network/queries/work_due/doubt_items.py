"""Ratings in doubt: the last gaugings all on one side of the curve, each beyond its uncertainty."""

from collections import defaultdict
from collections.abc import Iterable, Iterator
from datetime import date
from typing import Any, NamedTuple

import numpy as np
from django.db.models import Exists, F, FloatField, Model, OuterRef, Q, QuerySet, Subquery

from network.models import CurveBand, Gauging, PlateZero, RatingPeriod, ShiftTable, Station
from network.queries.record_days import RecordDay
from network.queries.work_due.items import Asked, Item, Kind

DEVIATION = F("signed_deviation_percent")
# U of the gauging in % of the curve's flow: U·Q/Q_rating
OWN = F("u95_percent") * (1 + DEVIATION / 100.0)
FIGURES = {"deviation": DEVIATION, "own": OWN, "stage": F("signed_stage_m")}


class Suspect(NamedTuple):
    """A station whose last gaugings lie on one side beyond their own U; latest first."""

    station: int
    office: int
    since: date
    deviations: tuple[float, ...]
    own: tuple[float, ...]
    stages_m: tuple[float, ...]


def items(asked: Asked) -> Iterator[Item]:
    """Yield the ratings whose last gaugings lie beyond the combined U of gauging and curve.

    One query finds suspects, a second the bands of their curves, if there is any.
    """
    suspects = list(_suspects(asked))
    bands = _bands(suspects, asked)
    for row in suspects:
        band = np.array(bands.get(row.station, [(0.0, 0.0)])).T
        # U = √(U_gauging² + U_curve²)
        limits = np.hypot(row.own, np.interp(row.stages_m, *band))
        if (np.abs(row.deviations) > limits).all():
            facts = tuple(reversed(row.deviations))
            since, count = row.since, len(facts)
            yield Item(Kind.DOUBT, row.station, row.station, row.office, since, since, count, facts)


def _suspects(asked: Asked) -> Iterator[Suspect]:
    """Find them by the deviations at signing.

    These are the present ones where neither rating, shift nor plate zero changed after the first
    of those gaugings was signed; where one did, they say nothing of the rating now in force.
    """
    count = asked.rules.doubt_count
    signed = Gauging.objects.filter(
        station=OuterRef("pk"),
        signed_deviation_percent__gt=-100,
        u95_percent__gt=0,
        signed_stage_m__isnull=False,
    ).order_by("-started_at", "-pk")
    last = [signed[n : n + 1] for n in range(count)]
    first_at = Subquery(last[-1].values("started_at"))
    rows: Any = Station.objects.all()
    if asked.station is not None:
        rows = rows.filter(pk=asked.station)
    rows = rows.alias(
        **_each(last, "ratio", DEVIATION / OWN),
        first_at=first_at,
        first_signed_at=Subquery(last[-1].values("signed_at")),
    ).filter(
        _all("ratio", count, gt=1) | _all("ratio", count, lt=-1),
        ~Exists(_periods(OuterRef("pk")).filter(effective_from__gt=OuterRef("first_at"))),
        ~_changed(RatingPeriod, "station"),
        ~_changed(ShiftTable, "period__station"),
        ~_changed(PlateZero, "plate__station"),
    )
    for name, figure in FIGURES.items():
        rows = rows.annotate(**_each(last, name, figure))
    wanted = [name for figure in FIGURES for name in _names(figure, count)]
    since = RecordDay(first_at, of=asked.agency)
    for station, office, day, *figures in rows.values_list("pk", "office", since, *wanted):
        parts = [tuple(figures[n * count : (n + 1) * count]) for n in range(len(FIGURES))]
        yield Suspect(station, office, day, *parts)


def _bands(suspects: Iterable[Suspect], asked: Asked) -> dict[int, list[tuple[float, float]]]:
    """Return stage and U₉₅ of the curves in force, by station; rising in stage."""
    stations = [row.station for row in suspects]
    found: dict[int, list[tuple[float, float]]] = defaultdict(list)
    if not stations:
        return found
    end = asked.end_of(asked.today)
    latest = (
        _periods(OuterRef("station")).filter(effective_from__lt=end).order_by("-effective_from")
    )
    current = RatingPeriod.objects.filter(
        station__in=stations, pk=Subquery(latest.values("pk")[:1])
    )
    points = CurveBand.objects.filter(curve__periods__in=current).order_by("stage_m")
    for station, stage_m, u95_percent in points.values_list(
        "curve__station", "stage_m", "u95_percent"
    ):
        found[station].append((stage_m, u95_percent))
    return found


def _each(last: list[QuerySet[Any]], name: str, figure: Any) -> dict[str, Subquery]:
    """Return a figure of each of the last gaugings under a name of its own."""
    names = _names(name, len(last))
    return {
        one: Subquery(row.annotate(figure=figure).values("figure"), output_field=FloatField())
        for one, row in zip(names, last, strict=True)
    }


def _names(name: str, count: int) -> list[str]:
    return [f"{name}_{n}" for n in range(count)]


def _all(name: str, count: int, **limit: float) -> Q:
    ((how, value),) = limit.items()
    return Q(**{f"{one}__{how}": value for one in _names(name, count)})


def _periods(station: OuterRef) -> QuerySet[Any]:
    return RatingPeriod.objects.standing().filter(station=station)


def _changed(model: type[Model], station: str) -> Exists:
    """Tell whether rows of a station were recorded or withdrawn since the first was signed."""
    since = OuterRef("first_signed_at")
    rows = model._default_manager.filter(**{station: OuterRef("pk")})
    return Exists(rows.filter(Q(recorded_at__gt=since) | Q(withdrawn_at__gt=since)))
