"""Open an act: one transaction, one Act row, and history rows tied to it."""

from collections.abc import Iterator
from contextlib import contextmanager
from datetime import datetime

from django.core.exceptions import ValidationError
from django.db import IntegrityError, models, transaction
from django.db.models import F, Q
from django.utils.translation import gettext as _

from network.models import Act, Infill, Person, Station
from network.models.acts import current_act
from network.models.violations import sentence_for


class Refusal(Exception):
    """An act that cannot be done, with the sentence for the user and the field it speaks of."""

    def __init__(self, sentence: str, *, field: str = "") -> None:
        super().__init__(str(sentence))
        self.sentence = str(sentence)
        self.field = field


class Overtaken(Refusal):
    """Someone else saved the same row since the form was opened."""


@contextmanager
def open_act(
    verb: str,
    *,
    by: Person | None,
    at: datetime,
    reason: str = "",
    station: Station | None = None,
) -> Iterator[Act]:
    """Run an act in one transaction and leave its Act row; an act within an act joins it.

    Integrity and validation errors leave as Refusal with their sentence, and nothing is written.
    """
    running = current_act.get()
    if running is not None:
        yield Act.objects.get(pk=running)
        return
    try:
        with transaction.atomic():
            act = Act.objects.create(
                verb=str(verb), done_by=by, done_at=at, reason=reason, station=station
            )
            token = current_act.set(act.pk)
            try:
                yield act
            finally:
                current_act.reset(token)
    except IntegrityError as error:
        raise Refusal(sentence_for(error)) from error
    except ValidationError as error:
        raise Refusal(" ".join(error.messages)) from error


def lock_station(station: Station) -> None:
    """Let acts on one station wait for one another until the open act ends.

    Without the key: the Act row already refers to the station, and two acts that then both wanted
    the whole row would wait for each other for ever.
    """
    Station.objects.select_for_update(no_key=True).get(pk=station.pk)


def raise_record_version(station: Station) -> None:
    """Say that an input of the station's published figures changed, within the open act.

    Stations that are estimated from this one by regression change with it.
    """
    from_it = Infill.objects.standing().filter(neighbour=station).values("station")
    Station.objects.filter(Q(pk=station.pk) | Q(pk__in=from_it)).update(
        record_version=F("record_version") + 1
    )


def raise_every_record_version() -> None:
    """Say that a rule behind all published figures changed, within the open act."""
    Station.objects.update(record_version=F("record_version") + 1)


def claim_version(row: models.Model, *, version: int) -> None:
    """Take the next version of a row edited through a form; raise Overtaken if it moved on."""
    claimed = (
        type(row)
        ._default_manager.filter(pk=row.pk, version=version)
        .update(version=F("version") + 1)
    )
    if not claimed:
        raise Overtaken(
            _(
                "Someone else saved this meanwhile. What you typed is still here: look at the "
                "newer version in another window, then save again."
            )
        )
    row.version = version + 1


def required_reason(reason: str) -> str:
    """Return a reason without its blanks; refuse an empty one."""
    stripped = reason.strip()
    if not stripped:
        raise Refusal(_("Give a reason."), field="reason")
    return stripped


def withdraw(row: models.Model, *, by: Person, at: datetime, reason: str) -> None:
    """Mark a withdrawable row as withdrawn, within the open act; refuse one already withdrawn."""
    if row.withdrawn_at is not None:
        raise Refusal(_("This is already withdrawn."))
    row.withdrawn_at, row.withdrawn_by = at, by
    row.withdrawn_reason = required_reason(reason)
    row.save()
