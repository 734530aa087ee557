"""What a person finds on the desk beside the work due: what the machine is busy with."""

from django.db import models

from network.models import Job

JOBS_SHOWN = 8


def latest_jobs() -> models.QuerySet[Job]:
    """Return the latest long works."""
    return Job.objects.select_related("asked_by")[:JOBS_SHOWN]
