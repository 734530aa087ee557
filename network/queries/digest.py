"""What a person is told by mail: what fell due since the last mail, and what is late."""

from collections.abc import Iterator
from dataclasses import dataclass
from datetime import date, datetime, timedelta

from network.models import Person
from network.queries.work_due import work_list
from network.queries.work_due.work_list import Filters, Line

LINES_TOLD = 200  # a longer list is for the screen


@dataclass(frozen=True)
class Digest:
    """The lines for one person: new since a day, and late from before; each urgent first."""

    person: Person
    since: date
    today: date
    new: tuple[Line, ...]
    late: tuple[Line, ...]
    total: int

    @property
    def left_off(self) -> int:
        """How many lines the mail does not show."""
        return self.total - len(self.new) - len(self.late)


def digests(at: datetime, *, days: int) -> Iterator[Digest]:
    """Yield the digest of every active person with an address for mail and something due.

    days: how far back something is new. The list is asked once for each office.
    """
    people = Person.objects.filter(is_active=True, is_staff=True).exclude(email="")
    lists: dict[int | None, tuple[Line, ...]] = {}
    today = work_list.ask(at).today
    for person in people.order_by("username"):
        if person.office_id not in lists:
            filters = Filters(office=person.office_id)
            lists[person.office_id] = work_list.work_list(at, filters=filters, per_page=None).lines
        found = lists[person.office_id]
        if found:
            yield _of(person, found, since=today - timedelta(days=days), today=today)


def _of(person: Person, found: tuple[Line, ...], *, since: date, today: date) -> Digest:
    new = tuple(line for line in found if line.due_on > since)
    late = tuple(line for line in found if line.due_on <= since)
    room = max(LINES_TOLD - len(new), 0)
    return Digest(person, since, today, new[:LINES_TOLD], late[:room], len(found))
