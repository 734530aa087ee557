"""Acts upon rounds: planned, their stops added, ordered, left out with a reason; made."""

from collections.abc import Iterable, Sequence
from datetime import date, datetime

from django.db.models import Max
from django.utils.translation import gettext as _

from network.models import MeterPair, Office, Person, Round, Station, Stop, StopTask
from network.queries import rounds
from network.services.acts import Refusal, claim_version, open_act, required_reason


def save_round(
    *,
    name: str,
    office: Office,
    first_day: date,
    last_day: date,
    by: Person,
    at: datetime,
    round: Round | None = None,
    version: int = 0,
    party: Sequence[Person] = (),
    vehicle: str = "",
    meters: Sequence[MeterPair] = (),
    remarks: str = "",
) -> Round:
    """Plan a round, or change the heading of one.

    Refuses, at its field, an end before the start, and a meter that is not in calibration through
    the last day.
    """
    if last_day < first_day:
        raise Refusal(_("The last day is not before the first."), field="last_day")
    for sentence in rounds.meters_out(meters, last_day):
        raise Refusal(sentence, field="meters")
    with open_act(_("planned a round"), by=by, at=at):
        row = round or Round(recorded_at=at, recorded_by=by)
        if round is not None:
            row = Round.objects.select_for_update().get(pk=round.pk)
            _refuse_made(row)
            claim_version(row, version=version)
        row.name, row.office, row.vehicle, row.remarks = name.strip(), office, vehicle, remarks
        row.first_day, row.last_day = first_day, last_day
        row.save()
        row.party.set(party)
        row.meters.set(meters)
    return row


def add_stop(
    *,
    round: Round,
    station: Station,
    by: Person,
    at: datetime,
    hours: float = 2.0,
    by_cableway: bool = False,
    tasks: Iterable[str] = (),
) -> Stop:
    """Add a station at the end of a round.

    Refuses, at its field, a gauging from a cableway that is overdue or unsafe, and a station that
    is in the round.
    """
    with open_act(_("added a stop"), by=by, at=at, station=station):
        _lock(round)
        if round.stops.filter(station=station).exists():
            raise Refusal(_("This station is in the round already."), field="station")
        _refuse_cableway(round, station, by_cableway)
        last = round.stops.aggregate(last=Max("position"))["last"] or 0
        stop = Stop.objects.create(
            round=round, station=station, position=last + 1,
            hours=_hours(hours), by_cableway=by_cableway,
        )  # fmt: skip
        _write_tasks(stop, tasks)
    return stop


def change_stop(
    *,
    stop: Stop,
    hours: float,
    by_cableway: bool,
    tasks: Iterable[str],
    by: Person,
    at: datetime,
    left_out_because: str = "",
) -> Stop:
    """Change hours, cableway and tasks of a stop; with a reason given it is left out."""
    with open_act(_("changed a stop"), by=by, at=at, station=stop.station, reason=left_out_because):
        _lock(stop.round)
        row = Stop.objects.get(pk=stop.pk)
        if not left_out_because.strip():
            _refuse_cableway(row.round, row.station, by_cableway)
        row.hours, row.by_cableway = _hours(hours), by_cableway
        row.left_out_because = left_out_because.strip()
        row.save()
        _write_tasks(row, tasks)
    return row


def leave_out(*, stop: Stop, reason: str, by: Person, at: datetime) -> None:
    """Leave a stop out of its round and say why; it stays on the paper."""
    why = required_reason(reason)
    with open_act(_("left out a stop"), by=by, at=at, station=stop.station, reason=why):
        _lock(stop.round)
        row = Stop.objects.get(pk=stop.pk)
        row.left_out_because = why
        row.save()


def take_up(*, stop: Stop, by: Person, at: datetime) -> None:
    """Take a stop that was left out up again."""
    with open_act(_("took a stop up again"), by=by, at=at, station=stop.station):
        _lock(stop.round)
        row = Stop.objects.get(pk=stop.pk)
        _refuse_cableway(row.round, row.station, row.by_cableway)
        row.left_out_because = ""
        row.save()


def remove_stop(*, stop: Stop, by: Person, at: datetime) -> None:
    """Take a stop that was added by mistake off its round; its history remains."""
    with open_act(_("removed a stop"), by=by, at=at, station=stop.station):
        _lock(stop.round)
        stop.delete()
        _number(stop.round.stops.order_by("position"))


def move_stop(*, stop: Stop, places: int, by: Person, at: datetime) -> None:
    """Move a stop up (below zero) or down by so many places; at the end it stays."""
    with open_act(_("moved a stop"), by=by, at=at, station=stop.station):
        _lock(stop.round)
        stops = list(stop.round.stops.order_by("position"))
        here = stops.index(stop)
        stops.insert(min(max(here + places, 0), len(stops) - 1), stops.pop(here))
        _number(stops)


def finish_round(*, round: Round, by: Person, at: datetime) -> Round:
    """Say that a round was made; it then stays as it is."""
    with open_act(_("made a round"), by=by, at=at):
        row = _lock(round)
        row.done_at, row.done_by = at, by
        row.save()
    return row


def _lock(round: Round) -> Round:
    row = Round.objects.select_for_update().get(pk=round.pk)
    _refuse_made(row)
    return row


def _refuse_made(round: Round) -> None:
    if round.done_at is not None:
        raise Refusal(_("This round was made; it stays as it is."))


def _refuse_cableway(round: Round, station: Station, by_cableway: bool) -> None:
    if by_cableway:
        why = rounds.blocked_cableways([station.pk], round.last_day).get(station.pk)
        if why:
            raise Refusal(why, field="by_cableway")


def _hours(hours: float) -> float:
    if not 0 < hours <= 24:
        raise Refusal(_("The hours at a station lie above 0 and up to 24."), field="hours")
    return hours


def _write_tasks(stop: Stop, tasks: Iterable[str]) -> None:
    """Keep the tasks that stay, add the new, remove the rest."""
    wanted = list(dict.fromkeys(text.strip() for text in tasks if text.strip()))
    if any(len(text) > 200 for text in wanted):
        raise Refusal(_("A task has at most 200 signs."), field="tasks")
    for task in stop.tasks.all():
        if task.text in wanted:
            wanted.remove(task.text)
        else:
            task.delete()
    for text in wanted:
        StopTask.objects.create(stop=stop, text=text)


def _number(stops: Iterable[Stop]) -> None:
    for position, stop in enumerate(stops, 1):
        if stop.position != position:
            stop.position = position
            stop.save()
