"""What a person finds on the desk: own drafts, work of the machine."""

from collections.abc import Sequence
from itertools import chain

from django.db import models

from network.models import Gauging, Job, LevelCheck, Person, Visit

JOBS_SHOWN = 8


def drafts_of(person: Person) -> Sequence[models.Model]:
    """Return the visits, level checks and gaugings a person recorded and did not finish."""
    own = [
        model.objects.filter(state="draft", recorded_by=person).select_related("station")
        for model in (Visit, LevelCheck, Gauging)
    ]
    return sorted(chain.from_iterable(own), key=lambda row: row.recorded_at, reverse=True)


def latest_jobs() -> models.QuerySet[Job]:
    """Return the latest long works."""
    return Job.objects.select_related("asked_by")[:JOBS_SHOWN]
