"""Staff gauges and others: what was in service, what a reading means, whether plates cover."""

from collections.abc import Iterable, Sequence
from dataclasses import dataclass
from datetime import datetime
from typing import Protocol

from django.db.models import Q

from network.models import (
    OtherGauge,
    OtherGaugeZero,
    PlateZero,
    StaffPlate,
    Station,
    StationZero,
)
from network.models.chains import ChainRow
from network.numerics.levels import plates as kernel
from network.queries import in_force
from network.queries.working_rules import rules


@dataclass(frozen=True)
class PlateThen:
    """A plate in service at an instant with its zero then; None where it has none."""

    plate: StaffPlate
    zero_m: float | None

    @property
    def as_read(self) -> kernel.Plate | None:
        """The plate as the kernel takes it."""
        if self.zero_m is None:
            return None
        return kernel.Plate(
            self.plate.label, self.plate.lowest_m, self.plate.highest_m, self.zero_m
        )


class Reading(Protocol):
    """Anything read from one gauge: stored at a visit or a gauging, or being typed."""

    @property
    def read_at(self) -> datetime:
        """When it was read."""

    @property
    def plate(self) -> StaffPlate | None:
        """The plate, or none where another gauge was read."""

    @property
    def reading_m(self) -> float | None:
        """The reading, none where there was none to take."""


def station_zero(station: Station, instant: datetime) -> StationZero | None:
    """Return the station zero in force."""
    return in_force.at(StationZero.objects.filter(station=station), instant)


def plates_in_service(station: Station, instant: datetime) -> list[PlateThen]:
    """Return the plates in service at an instant with their zeros, the lowest first."""
    rows = StaffPlate.objects.filter(station=station, installed_at__lte=instant)
    rows = rows.filter(Q(removed_at__isnull=True) | Q(removed_at__gt=instant))
    zeros = zero_chains(PlateZero, "plate", [row.pk for row in rows])
    found = [PlateThen(row, _zero_at(zeros.get(row.pk, []), instant)) for row in rows]
    return sorted(found, key=lambda then: (then.zero_m or 0.0) + then.plate.lowest_m)


def other_gauges_in_service(station: Station, instant: datetime) -> list[OtherGauge]:
    """Return the other gauges in service at an instant, by label."""
    rows = OtherGauge.objects.filter(station=station, installed_at__lte=instant)
    return list(rows.filter(Q(removed_at__isnull=True) | Q(removed_at__gt=instant)))


def stages_m(readings: Iterable[Reading]) -> list[float | None]:
    """Return the stage of each reading, in metres above the station zero.

    None for dry, frozen, and a gauge without a zero in force. Three queries for any number.
    """
    rows = [(row, row.plate, getattr(row, "other_gauge", None)) for row in readings]
    plates = zero_chains(PlateZero, "plate", [plate.pk for _, plate, _ in rows if plate])
    gauges = zero_chains(OtherGaugeZero, "gauge", [gauge.pk for *_, gauge in rows if gauge])
    found: list[float | None] = []
    for row, plate, gauge in rows:
        chain = plates.get(plate.pk, []) if plate else gauges.get(gauge.pk, []) if gauge else []
        zero_m = _zero_at(chain, row.read_at)
        downwards = gauge is not None and gauge.reads_downwards
        found.append(_stage(row.reading_m, zero_m=zero_m, downwards=downwards))
    return found


def stage_m(reading: Reading) -> float | None:
    """Return the stage of one reading."""
    return stages_m([reading])[0]


def cover_findings(station: Station, instant: datetime) -> Sequence[kernel.PlateFinding]:
    """Find holes and short overlaps of the plates in service."""
    placed = [then.as_read for then in plates_in_service(station, instant)]
    return kernel.cover_findings(
        [plate for plate in placed if plate], overlap_m=rules().plate_overlap_m
    )


def zero_chains(
    model: type[PlateZero] | type[OtherGaugeZero], owner: str, keys: Sequence[int]
) -> dict[int, list[ChainRow]]:
    """Return the standing zeros of many gauges in one query, by owner, each in order of time."""
    chains: dict[int, list[ChainRow]] = {}
    if not keys:
        return chains
    rows = model.objects.standing().filter(**{f"{owner}__in": set(keys)})
    for row in rows.order_by("effective_from"):
        chains.setdefault(getattr(row, f"{owner}_id"), []).append(row)
    return chains


def _zero_at(chain: Sequence[ChainRow], instant: datetime) -> float | None:
    begun = [row for row in chain if row.effective_from <= instant]
    return begun[-1].zero_m if begun else None


def _stage(reading_m: float | None, *, zero_m: float | None, downwards: bool) -> float | None:
    if reading_m is None or zero_m is None:
        return None
    # A dipper measures down from its zero mark to the water.
    return float(kernel.stage_m(-reading_m if downwards else reading_m, zero_m))
