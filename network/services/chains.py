"""Rows in force from an instant on: begun and taken back, each as an act."""

from datetime import datetime
from math import isfinite
from typing import TypeVar

from django.utils.translation import gettext as _

from network.models import Person, Station
from network.models.chains import ChainRow
from network.services import acts
from network.services.acts import Refusal, lock_station, open_act

Row = TypeVar("Row", bound=ChainRow)

FARTHEST_M = 9000.0  # nothing on earth lies higher: a wrong unit was typed


def set_from(
    row: Row,
    station: Station,
    verb: str,
    *,
    effective_from: datetime,
    by: Person,
    at: datetime,
    reason: str,
    touches_figures: bool = True,
) -> Row:
    """Begin a chain's row as an act of its own."""
    with open_act(verb, by=by, at=at, reason=reason.strip(), station=station):
        lock_station(station)
        begin(row, effective_from=effective_from, by=by, at=at, reason=reason)
        if touches_figures:
            acts.raise_record_version(station)
    return row


def begin(
    row: ChainRow, *, effective_from: datetime, by: Person, at: datetime, reason: str
) -> None:
    """Save a row that starts at an instant, within the open act."""
    row.effective_from, row.reason = effective_from, acts.required_reason(reason)
    row.recorded_by, row.recorded_at = by, at
    row.full_clean()
    row.save()


def take_back(
    row: ChainRow,
    station: Station,
    verb: str,
    *,
    by: Person,
    at: datetime,
    reason: str,
    touches_figures: bool = True,
) -> None:
    """Withdraw a chain's row; the one before it then holds on."""
    with open_act(verb, by=by, at=at, reason=reason.strip(), station=station):
        lock_station(station)
        acts.withdraw(type(row).objects.get(pk=row.pk), by=by, at=at, reason=reason)
        if touches_figures:
            acts.raise_record_version(station)


def metres(value: float | None, *, field: str) -> float | None:
    """Return a height if it can be one; refuse it at its field."""
    if value is not None and not (isfinite(value) and abs(value) <= FARTHEST_M):
        raise Refusal(_("%(value)g m cannot be; is this metres?") % {"value": value}, field=field)
    return value
