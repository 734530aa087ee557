"""What is still open before a station's year can be issued."""

from collections.abc import Iterator
from datetime import date, datetime, timedelta

import numpy as np
from django.db.models import Max
from django.utils.translation import gettext as _
from django.utils.translation import ngettext

from network.models import Correction, Gauging, LevelCheck, RecordReview, Station, Visit
from network.numerics.marks import Mark
from network.queries import clock
from network.queries.flows import StationDays


def open_points(station: Station, days: StationDays) -> list[str]:
    """Return what is open in a year, given its days, as sentences; none means ready."""
    first, last = (day.astype(date) for day in (days.days[0], days.days[-1]))
    own = clock.agency()
    start = clock.day_start(first, of=own)
    end = clock.day_start(last + timedelta(days=1), of=own)
    return [
        *_unchecked(station, start, end),
        *_proposed(station, start, end),
        *_unexplained(days),
        *_unreviewed(station, last),
    ]


def _unchecked(station: Station, start: datetime, end: datetime) -> Iterator[str]:
    visits = Visit.objects.filter(
        station=station, state=Visit.State.DRAFT, arrived_at__gte=start, arrived_at__lt=end
    ).count()
    if visits:
        text = ngettext("{n} visit is not checked.", "{n} visits are not checked.", visits)
        yield text.format(n=visits)
    gaugings = Gauging.objects.filter(station=station, started_at__gte=start, started_at__lt=end)
    open_gaugings = gaugings.exclude(state=Gauging.State.CHECKED).count()
    if open_gaugings:
        text = ngettext(
            "{n} gauging is not checked.", "{n} gaugings are not checked.", open_gaugings
        )
        yield text.format(n=open_gaugings)
    levels = LevelCheck.objects.filter(
        station=station, state=LevelCheck.State.DRAFT, levelled_at__gte=start, levelled_at__lt=end
    ).count()
    if levels:
        text = ngettext("{n} level check is not checked.", "{n} level checks are open.", levels)
        yield text.format(n=levels)


def _proposed(station: Station, start: datetime, end: datetime) -> Iterator[str]:
    proposed = Correction.objects.filter(
        series__station=station,
        state=Correction.State.PROPOSED,
        start_at__lt=end,
        end_at__gt=start,
    )
    count = proposed.standing().count()
    if count:
        text = ngettext(
            "{n} proposed correction is neither accepted nor withdrawn.",
            "{n} proposed corrections are neither accepted nor withdrawn.",
            count,
        )
        yield text.format(n=count)


def _unexplained(days: StationDays) -> Iterator[str]:
    """Name the days without a value that nobody chose to withhold."""
    missing = (days.marks & Mark.MISSING) > 0
    count = int(np.count_nonzero(missing & ((days.marks & Mark.WITHHELD) == 0)))
    if count:
        text = ngettext(
            "{n} day has no value and is not withheld.",
            "{n} days have no value and are not withheld.",
            count,
        )
        yield text.format(n=count)


def _unreviewed(station: Station, last: date) -> Iterator[str]:
    reviews = RecordReview.objects.filter(station=station).standing()
    through = reviews.aggregate(Max("reviewed_through"))["reviewed_through__max"]
    if through is None:
        yield _("The record has never been reviewed.")
    elif through < last:
        yield _("The record is reviewed only through {day}.").format(day=through.isoformat())
