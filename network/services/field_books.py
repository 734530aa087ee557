"""What visits and level checks share: a form saved once, its rows kept in step, its two states."""

from collections.abc import Mapping, Sequence
from datetime import datetime, timedelta
from typing import Any, TypeVar

from django.core.exceptions import NON_FIELD_ERRORS, ValidationError
from django.db import models
from django.db.models import ProtectedError
from django.utils.translation import gettext as _

from network.models import LevelCheck, Person, Visit
from network.services import acts
from network.services.acts import Overtaken, Refusal

Book = TypeVar("Book", Visit, LevelCheck)

# A phone's clock may run ahead a little.
CLOCK_AHEAD = timedelta(hours=1)


def open_book(book: Book, *, version: int | None, by: Person, at: datetime) -> Book:
    """Return the book to write into, within the open act: new, or the stored one of its form.

    version is the one the form was opened with; None where it was opened empty. A form that was
    sent twice finds what its first sending stored and writes over it, as long as nobody else did.
    """
    stored = type(book).objects.filter(form_id=book.form_id).first()
    if stored is None:
        if version is not None:
            raise Refusal(_("This is no longer there."))
        book.recorded_by, book.recorded_at = by, at
        return book
    if stored.station_id != book.station_id:
        raise Refusal(_("This form was saved for another station."), field="station")
    refuse_unless_draft(stored)
    if version is None and (stored.version != 1 or stored.recorded_by_id != by.pk):
        raise Overtaken(
            _("This form was saved before and changed since; open it from the station's page.")
        )
    if version is not None:
        acts.claim_version(stored, version=version)
    return stored


def refuse_unless_draft(book: Visit | LevelCheck) -> None:
    """Refuse to change a checked book."""
    if book.state != book.State.DRAFT:
        raise Refusal(_("This is checked; reopen it first, with a reason."))


def refuse_future(instant: datetime, *, at: datetime, field: str) -> None:
    """Refuse an instant that lies ahead of the clock."""
    if instant > at + CLOCK_AHEAD:
        raise Refusal(_("This lies in the future; is the date right?"), field=field)


def save_row(row: models.Model, *, prefix: str = "") -> None:
    """Save a row that its own rules allow; refuse it at its field, `prefix` before its name."""
    try:
        row.full_clean()
    except ValidationError as error:
        name, sentences = next(iter(error.message_dict.items()))
        field = prefix.rstrip("-") if name == NON_FIELD_ERRORS else f"{prefix}{name}"
        raise Refusal(" ".join(sentences), field=field) from error
    row.save()


def keep_in_step(
    model: type[models.Model],
    owner: Mapping[str, models.Model],
    rows: Sequence[tuple[int | None, Mapping[str, Any]]],
    *,
    called: str,
) -> None:
    """Make a book's rows those that were typed: (key or None, values) in order.

    A row with a key is changed where it differs, one without is added, one not named is removed.
    `called` is the name of the rows on the form: a refusal names `called-2-field`, from 0.
    """
    manager = model._default_manager
    there = {row.pk: row for row in manager.filter(**owner)}
    named = {key for key, _values in rows if key is not None}
    if named - set(there):
        raise Refusal(_("A row is no longer there; open the page again."), field=called)
    for key in set(there) - named:
        _remove(there[key], field=called)
    for number, (key, values) in enumerate(rows):
        row = model(**owner) if key is None else there[key]
        if key is None or any(getattr(row, name) != value for name, value in values.items()):
            for name, value in values.items():
                setattr(row, name, value)
            save_row(row, prefix=f"{called}-{number}-")


def _remove(row: models.Model, *, field: str) -> None:
    try:
        row.delete()
    except ProtectedError as error:
        raise Refusal(
            _("“%(row)s” cannot be taken out: a correction rests on it.") % {"row": row},
            field=field,
        ) from error
