"""What a gauging is held against at its station: rating, band and plate zeros, in one query."""

from dataclasses import dataclass, field
from datetime import datetime
from typing import Any

import numpy as np
from django.db.models import (
    CharField,
    DateTimeField,
    F,
    FloatField,
    OuterRef,
    Q,
    QuerySet,
    Subquery,
    Value,
)
from django.db.models.functions import Cast

from network.models import (
    Curve,
    CurveBand,
    CurvePoint,
    CurveSegment,
    PlateZero,
    RatingPeriod,
    ShiftPoint,
    ShiftTable,
    Station,
)
from network.numerics.ratings.curves import stage_for
from network.numerics.ratings.rating import ALWAYS_S, rate
from network.numerics.ratings.rating import RatingPeriod as KernelPeriod
from network.queries import curves, in_force

USE = (
    *("lowest_use_m", "highest_use_m", "extrapolate_low_m", "extrapolate_high_m"),
    *("gauged_lowest_m", "gauged_highest_m", "h0_m"),
)
WIDTH = len(USE)


@dataclass(frozen=True, eq=False)
class StationFacts:
    """The rating period in force at an instant (None: none), its band, and the plate zeros then."""

    at: datetime
    version: str = ""
    period: KernelPeriod | None = None
    band: tuple[tuple[float, float], ...] = ()  # stage m, U₉₅ %
    plate_zeros_m: dict[int, float] = field(default_factory=dict)

    def rated_m3s(self, stage_m: float) -> float | None:
        """Give the flow of the rating and shift in force, None where they give none."""
        if self.period is None:
            return None
        times = np.array([in_force.seconds(self.at)], np.int64)
        rated = rate(times, np.array([stage_m]), periods=[self.period], gap_limit_s=0)
        flow_m3s = float(rated.flow_m3s[-1])
        return None if np.isnan(flow_m3s) else flow_m3s

    def closing_shift_m(self, stage_m: float, flow_m3s: float) -> float | None:
        """Give the shift that, added to the stage, lets the rating give the measured flow."""
        if self.period is None or self.period.curve is None:
            return None
        needed_m = float(stage_for(self.period.curve, np.array([flow_m3s]))[0])
        return None if np.isnan(needed_m) else needed_m - stage_m

    def rated_u95_percent(self, stage_m: float) -> float:
        """Give the 95 % band of the mean relation at a stage, 0 where the version states none."""
        if not self.band:
            return 0.0
        stages, percents = zip(*self.band, strict=True)
        return float(np.interp(stage_m, stages, percents))


def at(station: Station, instant: datetime) -> StationFacts:
    """Read the facts of a station at an instant in one query; of the station its key suffices."""
    rows: dict[str, list[Any]] = {}
    for kind, label, since, key, *numbers in _query(station, instant):
        rows.setdefault(kind, []).append((label, since, key, numbers))
    zeros = {
        key: numbers[0] for _l, _s, key, numbers in rows.get("plate", ()) if numbers[0] is not None
    }
    if "curve" not in rows:
        return StationFacts(instant, plate_zeros_m=zeros)
    (form, _since, _key, numbers), (number, *_rest) = rows["curve"][0], rows["version"][0]
    curve = curves.curve_of(
        Curve(form=form, **dict(zip(USE, numbers, strict=True))),
        [
            CurveSegment(lower_stage_m=n[0], c=n[1], h0_m=n[2], b=n[3])
            for *_head, n in rows.get("segment", ())
        ],
        [CurvePoint(stage_m=n[0], flow_m3s=n[1]) for *_head, n in rows.get("point", ())],
    )
    band = sorted((n[0], n[1]) for *_head, n in rows.get("band", ()))
    period = KernelPeriod(-ALWAYS_S, curve, _shifts(rows.get("shift", [])))
    return StationFacts(instant, number, period, tuple(band), zeros)


def _shifts(rows: list[Any]) -> list[Any]:
    tables: dict[int, tuple[ShiftTable, list[ShiftPoint]]] = {}
    for joins, since, key, numbers in rows:
        table = ShiftTable(joins=joins, effective_from=since)
        points = tables.setdefault(key, (table, []))[1]
        points.append(ShiftPoint(stage_m=numbers[0], shift_m=numbers[1]))
    in_order = sorted(tables.values(), key=lambda pair: pair[0].effective_from)
    return [curves.shift_table(table, points) for table, points in in_order]


def _query(station: Station, instant: datetime) -> QuerySet[Any]:
    """Put all rows that matter under one another: kind, label, since, key and seven numbers."""
    chain = RatingPeriod.objects.standing().filter(station=station, effective_from__lte=instant)
    latest = chain.order_by("-effective_from")
    period, curve = Subquery(latest.values("pk")[:1]), Subquery(latest.values("curve")[:1])
    tables = Q(table__period=period, table__withdrawn_at__isnull=True)
    then = PlateZero.objects.standing().filter(plate=OuterRef("plate"), effective_from__lte=instant)
    in_force_then = Subquery(then.order_by("-effective_from").values("pk")[:1])
    rated = Curve.objects.filter(station__unrated_because="")
    version = rated.exclude(station__kind=Station.Kind.STAGE_ONLY).filter(pk=curve)
    return _rows(version, "curve", instant, *USE, label="form").union(
        _rows(version, "version", instant, label="number"),
        _rows(CurveSegment.objects.filter(curve=curve), "segment", instant, *SEGMENT),
        _rows(CurvePoint.objects.filter(curve=curve), "point", instant, "stage_m", "flow_m3s"),
        _rows(CurveBand.objects.filter(curve=curve), "band", instant, "stage_m", "u95_percent"),
        _rows(
            ShiftPoint.objects.filter(tables),
            "shift",
            F("table__effective_from"),
            "stage_m",
            "shift_m",
            label="table__joins",
            key="table",
        ),
        _rows(
            PlateZero.objects.filter(plate__station=station, pk=in_force_then),
            "plate",
            instant,
            "zero_m",
            key="plate",
        ),
        all=True,
    )


SEGMENT = ("lower_stage_m", "c", "h0_m", "b")


def _rows(
    rows: QuerySet[Any],
    kind: str,
    since: Any,
    *numbers: str,
    label: str | None = None,
    key: str = "pk",
) -> QuerySet[Any]:
    since = since if isinstance(since, F) else Value(since, output_field=DateTimeField())
    label_of = F(label) if label else Value("")
    filled = [Cast(F(name), FloatField()) for name in numbers]
    filled += [Cast(Value(0.0), FloatField())] * (WIDTH - len(numbers))
    return rows.order_by().values_list(
        Value(kind, output_field=CharField()),
        Cast(label_of, CharField()),
        Cast(since, DateTimeField()),
        F(key),
        *filled,
    )
