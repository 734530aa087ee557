"""The record clock: one fixed offset per installation."""

from datetime import UTC, date, datetime, time, timedelta, timezone
from zoneinfo import ZoneInfo

from network.models import Agency

UNSET = Agency(pk=1, name="")


def agency() -> Agency:
    """Return the agency, or an unsaved one with the defaults before set-up has run."""
    return Agency.objects.filter(pk=1).first() or UNSET


def record_clock(of: Agency) -> timezone:
    """Return the fixed-offset zone of the record clock, named like UTC+01:00."""
    return timezone(timedelta(minutes=of.record_utc_offset_minutes))


def civil_clock(of: Agency) -> ZoneInfo:
    """Return the zone that people's watches show."""
    return ZoneInfo(of.civil_zone)


def day_start(day: date, *, of: Agency) -> datetime:
    """Return the instant, in UTC, at which a record day starts."""
    local = datetime.combine(day, time(of.day_starts_at_hour), tzinfo=record_clock(of))
    return local.astimezone(UTC)


def record_day(instant: datetime, *, of: Agency) -> date:
    """Return the record day an instant belongs to: it carries the date on which it starts."""
    local = instant.astimezone(record_clock(of)) - timedelta(hours=of.day_starts_at_hour)
    return local.date()
