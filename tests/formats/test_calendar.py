"""The calendar feed read back by the same standard's parser, and its bytes."""

from datetime import UTC, date, datetime

import pytest
from icalendar import Calendar

from network.formats.calendar import Entry, write

AT = datetime(2024, 3, 1, 6, 30, tzinfo=UTC)
ENTRIES = [
    Entry(
        uid="visit-station-1@x", title="Routine visit: TE-010 Mühlsteg; weir, left",
        first_day=date(2024, 2, 29), last_day=date(2024, 2, 29), text="Every 42.\nSay, when?",
        place="TE-010", url="https://example.org/staff/", category="routine visit",
    ),
    Entry(
        uid="round-1@x", title="Round " + "very " * 30 + "long",
        first_day=date(2024, 2, 28), last_day=date(2024, 3, 1), is_urgent=True,
    ),
]  # fmt: skip


def test_every_entry_comes_back_as_it_was_written():
    events = Calendar.from_ical(write(ENTRIES, name="Work due", written_at=AT)).walk("VEVENT")
    read = [(str(e["UID"]), str(e["SUMMARY"]), e.decoded("DTSTART")) for e in events]
    assert read == [(e.uid, e.title, e.first_day) for e in ENTRIES]
    assert str(events[0]["DESCRIPTION"]) == ENTRIES[0].text
    assert events[0].decoded("DTSTAMP") == AT
    assert int(events[1]["PRIORITY"]) == 1


def test_an_entry_ends_on_the_day_after_its_last_over_a_leap_day():
    events = Calendar.from_ical(write(ENTRIES, name="x", written_at=AT)).walk("VEVENT")
    assert [e.decoded("DTEND") for e in events] == [date(2024, 3, 1), date(2024, 3, 2)]


def test_lines_are_folded_and_end_as_the_standard_asks():
    body = write(ENTRIES, name="x", written_at=AT)
    assert body.endswith(b"END:VCALENDAR\r\n")
    assert max(len(line) for line in body.split(b"\r\n")) <= 75  # RFC 5545, 3.1


def test_a_feed_without_entries_is_a_calendar():
    assert Calendar.from_ical(write([], name="x", written_at=AT)).walk("VEVENT") == []


def test_an_entry_that_ends_before_it_begins_is_refused():
    wrong = Entry(uid="u", title="t", first_day=date(2024, 3, 2), last_day=date(2024, 3, 1))
    with pytest.raises(ValueError, match="ends before"):
        write([wrong], name="x", written_at=AT)


def test_the_instant_of_writing_needs_its_zone():
    with pytest.raises(ValueError, match="zone"):
        write([], name="x", written_at=datetime(2024, 3, 1))
