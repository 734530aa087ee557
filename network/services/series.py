"""Open a series of readings and say how its raw values become stage."""

from datetime import UTC, datetime
from typing import Any

from django.utils.translation import gettext as _

from network.models import Deployment, Person, SensorSetting, Series, Station
from network.queries.series import operation_span
from network.services.acts import (
    Refusal,
    lock_station,
    open_act,
    raise_record_version,
    required_reason,
    withdraw,
)

# A setting for a station that does not say when it was opened: before any record on paper.
EVER = datetime(1800, 1, 1, tzinfo=UTC)


def open_series(
    *, station: Station, label: str, by: Person, at: datetime, **particulars: Any
) -> Series:
    """Open a series with a first sensor setting of scale 1 and offset 0, from the station's start.

    `particulars` are other fields of the series: kind, is_primary, gap_limit_minutes and so on.
    """
    with open_act(_("open series"), by=by, at=at, station=station):
        series = Series(station=station, label=label.strip(), **particulars)
        _check(series)
        series.save()
        earliest, _latest = operation_span(series, at=at)
        SensorSetting.objects.create(
            series=series,
            effective_from=earliest or EVER,
            reason=_("first setting: raw values are stage"),
            recorded_at=at,
            recorded_by=by,
        )
        raise_record_version(station)
    return series


def change_series(*, series: Series, by: Person, at: datetime, **particulars: Any) -> Series:
    """Change the particulars of a series; its station stays."""
    with open_act(_("change series"), by=by, at=at, station=series.station):
        for name, value in particulars.items():
            setattr(series, name, value)
        _check(series)
        series.save()
        raise_record_version(series.station)
    return series


def set_sensor(
    *,
    series: Series,
    effective_from: datetime,
    scale: float | None,
    offset_m: float,
    reason: str,
    by: Person,
    at: datetime,
    deployment: Deployment | None = None,
) -> SensorSetting:
    """Let stage = scale × raw + offset hold from an instant on; no scale: none is in force."""
    if scale == 0:
        raise Refusal(_("A scale of zero would make every stage the same."), field="scale")
    if deployment is not None and deployment.series_id != series.pk:
        raise Refusal(_("This recorder stood at another series."), field="deployment")
    with open_act(_("set sensor"), by=by, at=at, reason=reason.strip(), station=series.station):
        setting = SensorSetting.objects.create(
            series=series,
            deployment=deployment,
            effective_from=effective_from,
            scale=scale,
            offset_m=offset_m,
            reason=required_reason(reason),
            recorded_at=at,
            recorded_by=by,
        )
        raise_record_version(series.station)
    return setting


def withdraw_setting(*, setting: SensorSetting, by: Person, at: datetime, reason: str) -> None:
    """Withdraw a sensor setting; the one before it then holds on."""
    station = setting.series.station
    with open_act(
        _("withdraw sensor setting"), by=by, at=at, reason=reason.strip(), station=station
    ):
        lock_station(station)
        row = SensorSetting.objects.get(pk=setting.pk)
        withdraw(row, by=by, at=at, reason=reason)
        raise_record_version(station)


def _check(series: Series) -> None:
    lowest, highest = series.sensor_lowest_m, series.sensor_highest_m
    if lowest is not None and highest is not None and lowest >= highest:
        raise Refusal(_("The sensor's range ends above its start."), field="sensor_highest_m")
    series.full_clean()
