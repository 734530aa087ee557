"""What a rule finds: kinds of work, and one item of work with the facts behind it."""

from dataclasses import dataclass
from datetime import date, datetime, timedelta
from typing import Any, NamedTuple

from django.db import models
from django.utils.translation import gettext_lazy as _

from network.models import Agency, WorkingRules
from network.queries import clock


class Kind(models.TextChoices):
    """Kinds of work, the most urgent first; the value is stored with a postponement."""

    SAFETY = "safety", _("safety inspection")
    SILENCE = "silence", _("no data")
    VISIT = "visit", _("routine visit")
    GAUGING = "gauging", _("gauging wanted")
    LEVELS = "levels", _("level check")
    CALIBRATION = "calibration", _("calibration")
    INSTRUMENT = "instrument", _("calibration of another instrument")
    DOUBT = "doubt", _("rating in doubt")
    REVIEW = "review", _("record to review")
    VISIT_OPEN = "visit_open", _("visit unchecked")
    GAUGING_OPEN = "gauging_open", _("gauging unchecked")
    LEVELS_OPEN = "levels_open", _("level check unchecked")
    LEFT = "left", _("work left")


# People's lives first, then a record that is being lost now; the rest by lateness alone.
URGENCY = {Kind.SAFETY: 0, Kind.SILENCE: 1}
LEAST_URGENT = 2

# Of which row an item speaks; with its key it names the item in a postponement.
SUBJECTS = {
    Kind.SAFETY: "safety-item",
    Kind.SILENCE: "series",
    Kind.CALIBRATION: "meter",
    Kind.INSTRUMENT: "instrument",
    Kind.VISIT_OPEN: "visit",
    Kind.GAUGING_OPEN: "gauging",
    Kind.LEVELS_OPEN: "level-check",
    Kind.LEFT: "work-left",
}


class Item(NamedTuple):
    """One item of work, light enough for tens of thousands; `facts` are what the words need."""

    kind: Kind
    key: int  # of the row it speaks of
    station: int | None
    office: int
    since: date | None  # when it was last done, or began
    due_on: date
    every: int | None = None
    facts: tuple[Any, ...] = ()

    @property
    def subject(self) -> str:
        """The row it speaks of, by kind and key."""
        return f"{SUBJECTS.get(self.kind, 'station')}-{self.key}"


@dataclass(frozen=True)
class Asked:
    """What every rule is asked: on which day, by which limits, and of what alone, if not of all.

    Items are found that are due by `until`. With a station only its own are found, with an
    instrument only its calibrations.
    """

    today: date
    until: date
    rules: WorkingRules
    agency: Agency
    station: int | None = None
    instrument: int | None = None

    def end_of(self, day: date) -> datetime:
        """Return the instant at which a record day ends."""
        return clock.day_start(day + timedelta(days=1), of=self.agency)
