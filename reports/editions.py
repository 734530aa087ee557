"""Answers about editions: what is issued, and what an act would touch."""

from collections.abc import Sequence
from datetime import date

from network.models import Station
from reports.models import Edition


def touched_by(station: Station, days: Sequence[date]) -> list[Edition]:
    """Return the issued editions of a station whose year holds one of the days."""
    if not days:
        return []
    issued = Edition.objects.filter(station=station, state=Edition.State.ISSUED)
    issued = issued.filter(first_day__lte=max(days), last_day__gte=min(days))
    return [
        edition
        for edition in issued
        if any(edition.first_day <= day <= edition.last_day for day in days)
    ]
