"""Keep registry rows: the admin fills and saves them, the act around them is made here."""

from collections.abc import Callable
from datetime import datetime

from django.db import models

from network.models import Person, Station
from network.models.chains import Versioned
from network.services import acts


def keep(
    row: models.Model,
    *,
    save: Callable[[], None],
    verb: str,
    by: Person,
    at: datetime,
    version: int | None = None,
    touches_figures: bool = False,
) -> None:
    """Save a registry row and its children as one act on its station.

    `save` writes the filled row; `version` is the one the form was opened with. Raises Overtaken
    when someone else saved the row meanwhile, Refusal when the database refuses it.
    """
    with acts.open_act(verb, by=by, at=at) as act:
        if row._state.adding:
            _sign(row, by=by, at=at)
        elif isinstance(row, Versioned):
            acts.claim_version(row, version=version or 0)
        save()
        act.station = station_of(row)
        act.save(update_fields=["station"])
        if touches_figures and act.station is not None:
            acts.raise_record_version(act.station)


def station_of(row: models.Model) -> Station | None:
    """Return the station a row speaks of, if any: itself, or the one it names."""
    return row if isinstance(row, Station) else getattr(row, "station", None)


def _sign(row: models.Model, *, by: Person, at: datetime) -> None:
    """Write who made a new row and when, where it has a place for it."""
    for stem in ("recorded", "uploaded"):
        if hasattr(row, f"{stem}_at"):
            setattr(row, f"{stem}_at", at)
            setattr(row, f"{stem}_by", by)
