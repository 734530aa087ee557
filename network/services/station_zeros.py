"""Set a station zero: its elevation determined anew, or the zero itself moved with all it bears."""

from collections.abc import Iterable, Iterator, Sequence
from dataclasses import dataclass
from datetime import datetime
from typing import Any

from django.db.models import Model
from django.utils.translation import gettext as _

from network.models import (
    Curve,
    OtherGauge,
    OtherGaugeZero,
    Person,
    PlateZero,
    RatingPeriod,
    SensorSetting,
    Series,
    StaffPlate,
    Station,
    StationZero,
)
from network.models.chains import ChainRow
from network.queries import gauges as answers
from network.queries import in_force
from network.services import acts, gauges, ratings, series
from network.services.acts import Refusal, lock_station, open_act


@dataclass(frozen=True, kw_only=True)
class NewPlateZero:
    """A plate's zero above the moved station zero, m."""

    plate: StaffPlate
    zero_m: float


@dataclass(frozen=True, kw_only=True)
class NewGaugeZero:
    """Another gauge's zero above the moved station zero, m."""

    gauge: OtherGauge
    zero_m: float


@dataclass(frozen=True, kw_only=True)
class NewSetting:
    """A sensor setting that gives stage above the moved station zero."""

    series: Series
    offset_m: float
    scale: float = 1.0


@dataclass(frozen=True, kw_only=True)
class NewRating:
    """The rating version for stages above the moved station zero; without one none is in force."""

    curve: Curve | None


def set_station_zero(
    *,
    station: Station,
    elevation_m: float | None,
    datum_name: str,
    effective_from: datetime,
    by: Person,
    at: datetime,
    reason: str,
    kind: str = StationZero.Kind.RE_DETERMINED,
    plate_zeros: Sequence[NewPlateZero] = (),
    gauge_zeros: Sequence[NewGaugeZero] = (),
    settings: Sequence[NewSetting] = (),
    rating: NewRating | None = None,
) -> StationZero:
    """Set the elevation of the station zero from an instant on.

    Determined anew: the mark did not move, and nothing else changes. Moved: every plate, other
    gauge and series in service then needs its zero or setting and a rated station its rating from
    the same instant, in this act or before it; refuses by naming what is missing.
    """
    moved = kind == StationZero.Kind.MOVED
    if not moved and (plate_zeros or gauge_zeros or settings or rating):
        raise Refusal(
            _("Where the mark did not move, zeros, settings and rating stay."), field="kind"
        )
    verb = _("moved the station zero") if moved else _("set the elevation of the station zero")
    with open_act(verb, by=by, at=at, reason=reason.strip(), station=station):
        lock_station(station)
        row = StationZero(
            station=station,
            elevation_m=elevation_m,
            datum_name=datum_name.strip(),
            kind=kind,
            effective_from=effective_from,
            reason=acts.required_reason(reason),
            recorded_by=by,
            recorded_at=at,
        )
        row.full_clean()
        row.save()
        signed: dict[str, Any] = {
            "effective_from": effective_from,
            "by": by,
            "at": at,
            "reason": reason,
        }
        for zero in plate_zeros:
            gauges.set_plate_zero(plate=zero.plate, zero_m=zero.zero_m, **signed)
        for other in gauge_zeros:
            gauges.set_gauge_zero(gauge=other.gauge, zero_m=other.zero_m, **signed)
        for new in settings:
            series.set_sensor(series=new.series, scale=new.scale, offset_m=new.offset_m, **signed)
        if rating is not None:
            ratings.put_in_force(station=station, curve=rating.curve, **signed)
        if moved:
            _refuse_what_is_missing(station, effective_from)
            acts.raise_record_version(station)
    return row


def withdraw_station_zero(*, zero: StationZero, by: Person, at: datetime, reason: str) -> None:
    """Withdraw a station zero and, where it had moved, all that was set with it in one act."""
    moved = zero.kind == StationZero.Kind.MOVED
    with open_act(
        _("withdrew a station zero"), by=by, at=at, reason=reason.strip(), station=zero.station
    ):
        lock_station(zero.station)
        acts.withdraw(StationZero.objects.get(pk=zero.pk), by=by, at=at, reason=reason)
        if moved:
            for row in _set_with(zero):
                acts.withdraw(row, by=by, at=at, reason=reason)
            acts.raise_record_version(zero.station)


def missing_at(station: Station, instant: datetime) -> list[str]:
    """Name what does not start at the instant at which the station zero moves."""
    plates = [then.plate for then in answers.plates_in_service(station, instant)]
    others = [
        gauge
        for gauge in answers.other_gauges_in_service(station, instant)
        if in_force.at(gauge.zeros, instant)
    ]
    recorded = [s for s in station.series.all() if in_force.at(s.settings, instant)]
    wanted: list[tuple[str, Iterable[Model]]] = [
        (_("the zero of plate %s"), plates),
        (_("the zero of gauge %s"), others),
        (_("the sensor setting of series %s"), recorded),
    ]
    missing = [
        words % owner for words, owners in wanted for owner in owners if not _starts(owner, instant)
    ]
    periods = RatingPeriod.objects.filter(station=station)
    rated = station.is_rated and in_force.at(periods, instant)
    if rated and not periods.standing().filter(effective_from=instant).exists():
        missing.append(_("the rating"))
    return missing


def _refuse_what_is_missing(station: Station, instant: datetime) -> None:
    missing = missing_at(station, instant)
    if missing:
        raise Refusal(
            _("The station zero moved: from the same instant give also %(missing)s.")
            % {"missing": ", ".join(missing)},
            field="kind",
        )


def _starts(owner: Model, instant: datetime) -> bool:
    chain = owner.settings if isinstance(owner, Series) else owner.zeros
    return bool(chain.standing().filter(effective_from=instant).exists())


def _set_with(zero: StationZero) -> Iterator[ChainRow]:
    """Yield the standing rows that one act set together with a moved station zero."""
    together = {"effective_from": zero.effective_from, "recorded_at": zero.recorded_at}
    for model, station in (
        (PlateZero, "plate__station"),
        (OtherGaugeZero, "gauge__station"),
        (SensorSetting, "series__station"),
        (RatingPeriod, "station"),
    ):
        yield from model.objects.standing().filter(**together, **{station: zero.station_id})
