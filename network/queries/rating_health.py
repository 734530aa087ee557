"""How a rating holds: gaugings made after it, doubt, and where the next gauging helps most.

Source: ISO 18320:2020 (tests on later gaugings), common practice (several in a row).
"""

from collections.abc import Iterable, Mapping, Sequence
from dataclasses import dataclass
from datetime import datetime

import numpy as np
from django.db.models import F, OuterRef, Prefetch, Subquery, Window
from django.db.models.functions import RowNumber
from django.utils.translation import gettext as _

from network.models import Curve, CurveGauging, Gauging, RatingPeriod, ShiftTable, Station
from network.numerics.arrays import Floats
from network.numerics.ratings.rating_tests import Side, in_a_row
from network.queries import curves, gaugings, held_gaugings, rating_points
from network.queries.held_gaugings import Held
from network.queries.working_rules import rules

ENOUGH = 200  # gaugings of one station: all that a curve in force ever sees


@dataclass(frozen=True)
class Later:
    """A gauging made after a curve: its deviation and the combined U₉₅ of both, %."""

    held: Held
    limit_percent: float

    @property
    def is_beyond(self) -> bool:
        """Whether it deviates by more than both uncertainties together explain."""
        return abs(self.held.deviation_percent or 0.0) > self.limit_percent


@dataclass(frozen=True)
class Health:
    """The rating in force at a station and what the gaugings made after it say.

    in_a_row: how many of the last lie on one side, each beyond its U; doubt_count: how many put
    the rating in doubt.
    """

    station: Station
    curve: Curve | None
    later: Sequence[Later]
    in_a_row: int
    side: Side | None
    doubt_count: int

    @property
    def is_in_doubt(self) -> bool:
        """Whether enough in a row lie on one side."""
        return self.in_a_row >= self.doubt_count

    @property
    def doubted_since(self) -> datetime | None:
        """When the first of those in a row was made."""
        return self.later[-self.in_a_row].held.at if self.is_in_doubt else None

    def sentence(self) -> str:
        """Say how the rating holds."""
        if self.curve is None:
            return _("No rating is in force.")
        if not self.later:
            return _("No gauging has been made since.")
        if not self.is_in_doubt:
            text = _("%(n)d gaugings since; the last %(row)d in a row on one side beyond their U.")
            if self.in_a_row < 2:
                text = _("%(n)d gaugings since; the last ones give no reason to doubt it.")
            return text % {"n": len(self.later), "row": self.in_a_row}
        above = _("The last %(row)d gaugings all lie above the curve beyond their U: in doubt.")
        below = _("The last %(row)d gaugings all lie below the curve beyond their U: in doubt.")
        return (above if self.side == "above" else below) % {"row": self.in_a_row}


def of_station(station: Station, *, at: datetime) -> Health:
    """Return how the rating in force at a station holds, by every gauging made after it."""
    return _healths([station], at=at, last=ENOUGH)[station.pk]


def of_many(stations: Iterable[Station], *, at: datetime) -> dict[int, Health]:
    """Return the same by station key, from no more of the last gaugings than doubt needs.

    The number of queries does not grow with the stations.
    """
    return _healths(list(stations), at=at, last=rules().doubt_count)


def _healths(stations: Sequence[Station], *, at: datetime, last: int) -> dict[int, Health]:
    periods = periods_in_force(stations, at=at)
    made = _last_gaugings(periods.values(), last=last, at=at)
    stages = gaugings.stages_of([row for rows in made.values() for row in rows])
    doubt_count = rules().doubt_count
    return {
        station.pk: _health(
            station,
            periods.get(station.pk),
            made.get(station.pk, []),
            stages=stages,
            doubt_count=doubt_count,
        )
        for station in stations
    }


def _health(
    station: Station,
    period: RatingPeriod | None,
    rows: Sequence[Gauging],
    *,
    stages: dict[int, float | None],
    doubt_count: int,
) -> Health:
    curve = period.curve if period else None
    if period is None or curve is None:
        return Health(station, None, (), 0, None, doubt_count)
    held = held_gaugings.hold(rows, stages, curves.kernel_periods([period]))
    band = np.array(sorted((p.stage_m, p.u95_percent) for p in curve.band.all())).reshape(-1, 2)
    later = [Later(one, _limit(one, band)) for one in held if one.deviation_percent is not None]
    row = in_a_row(
        np.array([one.held.deviation_percent for one in later], np.float64),
        np.array([one.limit_percent for one in later], np.float64),
    )
    return Health(station, curve, later, row.count, row.side, doubt_count)


def _limit(held: Held, band: Floats) -> float:
    """Combine the U of gauging and curve, in % of the curve's flow."""
    own = held.gauging.u95_percent
    own = rating_points.UNSTATED_U95_PERCENT if own is None else own
    flow_m3s, rated_m3s = held.gauging.discharge_m3s or 0.0, held.rated_m3s or np.nan
    of_curve = float(np.interp(held.stage_m or 0.0, *band.T)) if len(band) else 0.0
    # U = √(U_gauging² + U_curve²)
    return float(np.hypot(own * flow_m3s / rated_m3s, of_curve))


def periods_in_force(stations: Sequence[Station], *, at: datetime) -> Mapping[int, RatingPeriod]:
    """Return the rating period in force at each station, its curve, band, shifts, gaugings used."""
    chain = RatingPeriod.objects.standing().filter(effective_from__lte=at)
    latest = chain.filter(station=OuterRef("station")).order_by("-effective_from")
    rows = chain.filter(
        station__in=[s.pk for s in stations if s.is_rated], pk=Subquery(latest.values("pk")[:1])
    )
    used = CurveGauging.objects.filter(is_used=True).select_related("gauging")
    rows = rows.select_related("curve").prefetch_related(
        "curve__segments",
        "curve__points",
        "curve__band",
        Prefetch("curve__gaugings", used),
        Prefetch("shift_tables", ShiftTable.objects.standing().prefetch_related("points")),
    )
    return {row.station_id: row for row in rows}


def _last_gaugings(
    periods: Iterable[RatingPeriod], *, last: int, at: datetime
) -> dict[int, list[Gauging]]:
    """Return the last gaugings of each station made under its period and not used by its curve."""
    kept = {period.station_id: period for period in periods if period.curve}
    signed = Gauging.objects.filter(
        station__in=list(kept), discharge_m3s__isnull=False, started_at__lte=at
    )
    from_last = Window(
        RowNumber(), partition_by=F("station"), order_by=[F("started_at").desc(), F("pk").desc()]
    )
    rows = signed.annotate(from_last=from_last).filter(from_last__lte=last)
    found: dict[int, list[Gauging]] = {}
    for row in rows.order_by("started_at"):
        period = kept[row.station_id]
        used = {each.gauging_id for each in period.curve.gaugings.all()}
        if row.pk not in used and held_gaugings.mid_time(row) >= period.effective_from:
            found.setdefault(row.station_id, []).append(row)
    return found
