"""A calendar feed by RFC 5545: all-day entries for work due and rounds."""

from collections.abc import Iterable
from dataclasses import dataclass
from datetime import date, datetime, timedelta

from icalendar import Calendar, Event

PRODUCT = "-//Gaugewright//Work due//EN"
REFRESH = timedelta(hours=6)


@dataclass(frozen=True)
class Entry:
    """One entry: from its first to its last day; uid stays the same while the item stands."""

    uid: str
    title: str
    first_day: date
    last_day: date
    text: str = ""
    place: str = ""
    url: str = ""
    category: str = ""
    is_urgent: bool = False


def write(entries: Iterable[Entry], *, name: str, written_at: datetime) -> bytes:
    """Return a calendar as bytes in UTF-8, lines folded at 75 octets.

    written_at: an instant with its zone. Raises ValueError for one without, and for an entry that
    ends before it begins. Source: RFC 5545; RFC 7986 for name and refresh interval.
    """
    if written_at.tzinfo is None:
        raise ValueError("The instant of writing needs its zone.")
    calendar = Calendar()
    calendar.add("prodid", PRODUCT)
    calendar.add("version", "2.0")
    calendar.add("method", "PUBLISH")
    calendar.add("name", name)
    calendar.add("refresh-interval", REFRESH, parameters={"VALUE": "DURATION"})
    for entry in entries:
        calendar.add_component(_event(entry, written_at))
    return bytes(calendar.to_ical())


def _event(entry: Entry, written_at: datetime) -> Event:
    if entry.last_day < entry.first_day:
        raise ValueError(f"{entry.uid} ends before it begins.")
    event = Event()
    event.add("uid", entry.uid)
    event.add("dtstamp", written_at)
    event.add("summary", entry.title)
    event.add("dtstart", entry.first_day)
    # The end of an all-day entry is the day after its last (RFC 5545, 3.6.1).
    event.add("dtend", entry.last_day + timedelta(days=1))
    event.add("transp", "TRANSPARENT")
    event.add("priority", 1 if entry.is_urgent else 5)
    for field, value in (
        ("description", entry.text),
        ("location", entry.place),
        ("url", entry.url),
        ("categories", entry.category),
    ):
        if value:
            event.add(field, value)
    return event
