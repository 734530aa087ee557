"""What a calendar link shows: the rounds and the work due of a person or an office."""

import hashlib
from collections.abc import Iterable
from dataclasses import dataclass
from datetime import date, datetime, timedelta

from django.db.models import QuerySet

from network.models import FeedLink, Office, Person, Round
from network.queries.work_due import work_list
from network.queries.work_due.work_list import Filters, Line

AHEAD_DAYS = 60  # work that falls due in the next two months is in the feed
BACK = timedelta(days=31)  # rounds made are kept for a month


@dataclass(frozen=True)
class FeedContent:
    """The rounds and lines of one link, and the day they were asked for."""

    name: str
    rounds: tuple[Round, ...]
    lines: tuple[Line, ...]
    today: date


def digest_of(secret: str) -> str:
    """Return the hash under which a secret is kept."""
    return hashlib.sha256(secret.encode()).hexdigest()


def link_of(secret: str) -> FeedLink | None:
    """Return the standing link of a secret; one of a person who left opens nothing."""
    rows = FeedLink.objects.standing().select_related("person__office", "office")
    link = rows.filter(secret_sha256=digest_of(secret)).first()
    if link is None or (link.person is not None and not link.person.is_active):
        return None
    return link


def links_of(person: Person) -> Iterable[FeedLink]:
    """Return the standing links of a person, the latest first."""
    return FeedLink.objects.standing().filter(person=person).order_by("-recorded_at")


def content(link: FeedLink, *, at: datetime) -> FeedContent:
    """Return what a link shows: of a person the rounds with them, and their office's work.

    Someone without an office sees the work of all offices.
    """
    office = link.office or (link.person.office if link.person else None)
    rounds = Round.objects.filter(party=link.person) if link.person else _rounds_of(office)
    filters = Filters(office=office.pk if office else None, within_days=AHEAD_DAYS)
    found = work_list.work_list(at, filters=filters, per_page=None)
    recent = rounds.filter(last_day__gte=found.today - BACK)
    rows = recent.select_related("office").prefetch_related("stops__station").order_by("first_day")
    return FeedContent(str(link), tuple(rows), found.lines, found.today)


def _rounds_of(office: Office | None) -> "QuerySet[Round]":
    return Round.objects.filter(office=office)
