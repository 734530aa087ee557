"""Where the next gauging would narrow the rating in force most, with the reason in numbers."""

from collections.abc import Iterable, Mapping, Sequence
from dataclasses import dataclass
from datetime import datetime

import numpy as np
from django.utils.translation import gettext as _

from network.models import Curve, Station
from network.numerics.arrays import Floats
from network.numerics.ratings.fitted_rating import RatingFit
from network.numerics.ratings.next_gauging import StageBand, narrowing_bands
from network.numerics.ratings.rating_fit import fit_rating
from network.numerics.ratings.rating_parts import FitChoice, FitRefused
from network.queries import gaugings, rating_health, rating_points, stages_that_occur
from network.queries.working_rules import rules


@dataclass(frozen=True)
class NextGauging:
    """The bands of stage, the one where a gauging narrows the curve most first."""

    bands: Sequence[StageBand]
    by_time: bool

    @property
    def best(self) -> StageBand:
        """The band where the next gauging is worth most."""
        return self.bands[0]

    def sentence(self) -> str:
        """Say where to gauge next and why, in numbers."""
        text = _(
            "Gauge between %(low).2f and %(high).2f m: %(share).0f %% of the volume passes there, "
            "on %(n)d gaugings; one more narrows the curve from ±%(now).1f to ±%(after).1f %%."
        )
        if self.by_time:
            text = _(
                "Gauge between %(low).2f and %(high).2f m: the water stands there %(share).0f %% "
                "of the time, on %(n)d gaugings; one more narrows the curve from ±%(now).1f to "
                "±%(after).1f %%."
            )
        best = self.best
        return text % {
            "low": best.lower_stage_m,
            "high": best.upper_stage_m,
            "share": 100 * best.share,
            "n": best.gaugings,
            "now": best.mean_u95_percent_now,
            "after": best.mean_u95_percent_after,
        }


def of_station(station: Station, *, at: datetime) -> NextGauging | None:
    """Return where to gauge next; None where no fit carries the curve, or no stage is on record."""
    stages = {station.pk: stages_that_occur.of_station(station)}
    return _answers([station], stages, at=at).get(station.pk)


def of_many(stations: Iterable[Station], *, at: datetime) -> dict[int, NextGauging]:
    """Return the same by station key for those whose last years are in the cache.

    The number of queries does not grow with the stations.
    """
    rows = list(stations)
    return _answers(rows, stages_that_occur.cached(rows), at=at)


def refit(curve: Curve, points: rating_points.Points) -> RatingFit | None:
    """Fit a stored version's form anew to its gaugings, its h₀ and breaks given; None if none can.

    Nothing is searched, so it is quick; what it is for is how well each stage is known.
    """
    segments = list(curve.segments.all())
    if curve.form != Curve.Form.SEGMENTS or not segments:
        return None
    used = points.part(points.used & ~np.isnan(points.stage_m))
    try:
        choice = FitChoice(
            zeros_m=tuple(segment.h0_m for segment in segments),
            breaks_m=tuple(segment.lower_stage_m for segment in segments[1:]),
            must_meet=False,
        )
        return fit_rating(used.stage_m, used.flow_m3s, used.u95_percent, choice=choice)
    except (FitRefused, ValueError):
        return None


def _answers(
    stations: Sequence[Station], stages: Mapping[int, Floats], *, at: datetime
) -> dict[int, NextGauging]:
    by_time = rules().weigh_bands_by_time
    periods = rating_health.periods_in_force(stations, at=at)
    known = {pk: row.curve for pk, row in periods.items() if row.curve and pk in stages}
    rows = [row for curve in known.values() for row in curve.gaugings.all()]
    present = gaugings.stages_of([row.gauging for row in rows])
    found = {}
    for pk, curve in known.items():
        points = rating_points.points_of_version(curve.gaugings.all(), stages_m=present)
        answer = _answer(curve, points, stages[pk], by_time=by_time)
        if answer is not None:
            found[pk] = answer
    return found


def _answer(
    curve: Curve, points: rating_points.Points, stage_m: Floats, *, by_time: bool
) -> NextGauging | None:
    fit = refit(curve, points)
    if fit is None or not len(stage_m) or not (fit.flow_at(stage_m) > 0).any():
        return None
    used = points.part(points.used)
    bands = narrowing_bands(
        fit,
        stage_m,
        gauged_stage_m=used.stage_m,
        weighted_by="time" if by_time else "volume",
    )
    return NextGauging(bands, by_time)
