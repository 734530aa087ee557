"""Notes on a record: what happened in a period, and what its flows then are."""

from datetime import datetime

from django.utils.translation import gettext as _

from network.models import Note, Person, Station
from network.services.acts import Refusal, lock_station, open_act, raise_record_version, withdraw


def add_note(
    *,
    station: Station,
    start_at: datetime,
    end_at: datetime,
    cause: str,
    flows: str,
    by: Person,
    at: datetime,
    uncertainty_percent: float | None = None,
    text: str = "",
    is_printed: bool = True,
) -> Note:
    """Note a cause for a period: flows stand, are estimated or are withheld.

    Notes of different causes may overlap; two of one cause, or flows said to be both estimated
    and withheld, may not.
    """
    with open_act(_("add note"), by=by, at=at, reason=text.strip(), station=station):
        lock_station(station)
        row = Note(
            station=station,
            start_at=start_at,
            end_at=end_at,
            cause=cause,
            flows=flows,
            uncertainty_percent=uncertainty_percent,
            text=text.strip(),
            is_printed=is_printed,
            recorded_at=at,
            recorded_by=by,
        )
        row.full_clean()
        _refuse_contradiction(row)
        row.save()
        raise_record_version(station)
    return row


def withdraw_note(*, note: Note, by: Person, at: datetime, reason: str) -> None:
    """Withdraw a note."""
    station = note.station
    with open_act(_("withdraw note"), by=by, at=at, reason=reason.strip(), station=station):
        lock_station(station)
        row = Note.objects.get(pk=note.pk)
        withdraw(row, by=by, at=at, reason=reason)
        raise_record_version(station)


def _refuse_contradiction(note: Note) -> None:
    overlapping = Note.objects.standing().filter(
        station=note.station, start_at__lt=note.end_at, end_at__gt=note.start_at
    )
    for other in overlapping:
        period = f"{other.start_at:%Y-%m-%d %H:%M} – {other.end_at:%Y-%m-%d %H:%M} UTC"
        if other.cause == note.cause:
            raise Refusal(
                _("A note of this cause stands already for %(period)s; withdraw it first.")
                % {"period": period},
                field="start_at",
            )
        if {other.flows, note.flows} == {Note.Flows.ESTIMATED, Note.Flows.WITHHELD}:
            raise Refusal(
                _("The flows of %(period)s are already noted as %(flows)s; they cannot be both.")
                % {"period": period, "flows": other.get_flows_display()},
                field="flows",
            )
