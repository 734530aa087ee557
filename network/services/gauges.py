"""Acts upon gauges: plates put up and taken down, zeros set from an instant on."""

from datetime import datetime

from django.db.models import Q
from django.utils.translation import gettext as _

from network.models import (
    LevelCheck,
    OtherGauge,
    OtherGaugeZero,
    Person,
    PlateZero,
    StaffPlate,
    Station,
    VisitReading,
)
from network.services import acts, chains
from network.services.acts import Refusal, lock_station, open_act


def install_plate(
    *,
    station: Station,
    label: str,
    lowest_m: float,
    highest_m: float,
    installed_at: datetime,
    by: Person,
    at: datetime,
    step_m: float = 0.01,
    is_usual: bool = False,
    zero_m: float | None = None,
    reason: str = "",
) -> StaffPlate:
    """Put up a plate, with its first plate zero where that is known.

    No figure can rest on a plate that was not there before, so none becomes stale.
    """
    verb = _("put up plate %(label)s") % {"label": label}
    with open_act(verb, by=by, at=at, reason=reason, station=station):
        lock_station(station)
        _refuse_label_in_service(station, label.strip(), installed_at)
        plate = StaffPlate(
            station=station,
            label=label.strip(),
            lowest_m=lowest_m,
            highest_m=highest_m,
            step_m=step_m,
            installed_at=installed_at,
            is_usual=is_usual,
        )
        plate.full_clean()
        plate.save()
        if zero_m is not None:
            chains.begin(
                PlateZero(plate=plate, zero_m=chains.metres(zero_m, field="zero_m")),
                effective_from=installed_at,
                by=by,
                at=at,
                reason=reason.strip() or _("first zero of the plate"),
            )
    return plate


def remove_plate(
    *, plate: StaffPlate, removed_at: datetime, by: Person, at: datetime, reason: str
) -> StaffPlate:
    """Take a plate down; refuses an instant before a reading that was made on it."""
    station = plate.station
    verb = _("took down plate %(label)s") % {"label": plate.label}
    with open_act(verb, by=by, at=at, reason=acts.required_reason(reason), station=station):
        lock_station(station)
        row = StaffPlate.objects.get(pk=plate.pk)
        if row.removed_at is not None:
            raise Refusal(_("This plate is already taken down."))
        later = VisitReading.objects.filter(plate=row, read_at__gte=removed_at)
        if later.exists():
            raise Refusal(
                _("Plate %(label)s was still read after that.") % {"label": row.label},
                field="removed_at",
            )
        row.removed_at = removed_at
        row.full_clean()
        row.save()
    return row


def set_plate_zero(
    *,
    plate: StaffPlate,
    zero_m: float | None,
    effective_from: datetime,
    by: Person,
    at: datetime,
    reason: str,
    level_check: LevelCheck | None = None,
) -> PlateZero:
    """Set a plate's zero above the station zero from an instant on; none: it is not known."""
    if effective_from < plate.installed_at:
        raise Refusal(_("The plate was not there yet."), field="effective_from")
    if plate.removed_at is not None and effective_from >= plate.removed_at:
        raise Refusal(_("The plate was gone by then."), field="effective_from")
    verb = _("set the zero of plate %(label)s") % {"label": plate.label}
    row = PlateZero(
        plate=plate, zero_m=chains.metres(zero_m, field="zero_m"), level_check=level_check
    )
    return chains.set_from(
        row, plate.station, verb, effective_from=effective_from, by=by, at=at, reason=reason
    )


def add_other_gauge(
    *,
    station: Station,
    kind: str,
    label: str,
    installed_at: datetime,
    by: Person,
    at: datetime,
    zero_m: float | None = None,
    reason: str = "",
) -> OtherGauge:
    """Add a wire weight, dipper, crest gauge or flood mark, with its zero where that is known."""
    verb = _("added gauge %(label)s") % {"label": label}
    with open_act(verb, by=by, at=at, reason=reason, station=station):
        gauge = OtherGauge(
            station=station, kind=kind, label=label.strip(), installed_at=installed_at
        )
        gauge.full_clean()
        gauge.save()
        if zero_m is not None:
            chains.begin(
                OtherGaugeZero(gauge=gauge, zero_m=chains.metres(zero_m, field="zero_m")),
                effective_from=installed_at,
                by=by,
                at=at,
                reason=reason.strip() or _("first zero of the gauge"),
            )
    return gauge


def set_gauge_zero(
    *,
    gauge: OtherGauge,
    zero_m: float | None,
    effective_from: datetime,
    by: Person,
    at: datetime,
    reason: str,
) -> OtherGaugeZero:
    """Set the height of another gauge's zero mark above the station zero from an instant on."""
    verb = _("set the zero of gauge %(label)s") % {"label": gauge.label}
    row = OtherGaugeZero(gauge=gauge, zero_m=chains.metres(zero_m, field="zero_m"))
    return chains.set_from(
        row, gauge.station, verb, effective_from=effective_from, by=by, at=at, reason=reason
    )


def withdraw_plate_zero(*, zero: PlateZero, by: Person, at: datetime, reason: str) -> None:
    """Withdraw a plate zero; the one before it then holds on."""
    chains.take_back(
        zero, zero.plate.station, _("withdrew a plate zero"), by=by, at=at, reason=reason
    )


def withdraw_gauge_zero(*, zero: OtherGaugeZero, by: Person, at: datetime, reason: str) -> None:
    """Withdraw the zero of another gauge; the one before it then holds on."""
    verb = _("withdrew the zero of another gauge")
    chains.take_back(zero, zero.gauge.station, verb, by=by, at=at, reason=reason)


def _refuse_label_in_service(station: Station, label: str, instant: datetime) -> None:
    same = StaffPlate.objects.filter(station=station, label=label)
    if same.filter(Q(removed_at__isnull=True) | Q(removed_at__gt=instant)).exists():
        raise Refusal(
            _("Plate %(label)s still stands here; take it down first.") % {"label": label},
            field="label",
        )
