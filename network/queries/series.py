"""Series, profiles and imports: found by what people call them, and when readings can be true."""

from datetime import datetime, timedelta

from django.utils.translation import gettext as _

from network.models import LoggerImport, MappingProfile, OperationPeriod, Series
from network.queries import clock

# A logger's clock, or the one it is read with, may run ahead a little.
CLOCK_AHEAD = timedelta(hours=1)


class Unknown(LookupError):
    """There is nothing of that name; the sentence says what was looked for."""


def series_named(station_code: str, label: str) -> Series:
    """Return the series of a station by its label. Raises Unknown, naming those there are."""
    there = {
        series.label: series
        for series in Series.objects.filter(station__code=station_code).select_related("station")
    }
    if label not in there:
        raise Unknown(
            _("Station “%(code)s” has no series “%(label)s”; it has: %(there)s.")
            % {"code": station_code, "label": label, "there": ", ".join(there) or "–"}
        )
    return there[label]


def profile_named(name: str) -> MappingProfile:
    """Return the mapping profile of that name. Raises Unknown, naming those there are."""
    there = {profile.name: profile for profile in MappingProfile.objects.all()}
    if name not in there:
        raise Unknown(
            _("There is no profile “%(name)s”; there are: %(there)s.")
            % {"name": name, "there": ", ".join(there) or "–"}
        )
    return there[name]


def import_numbered(number: int) -> LoggerImport:
    """Return the import of that number. Raises Unknown."""
    found = LoggerImport.objects.select_related("series__station").filter(pk=number).first()
    if found is None:
        raise Unknown(_("There is no import %(number)d.") % {"number": number})
    return found


def is_used(profile: MappingProfile) -> bool:
    """Tell whether an import was read by this profile, which freezes it."""
    return profile.pk is not None and profile.imports.exists()


def operation_span(series: Series, *, at: datetime) -> tuple[datetime | None, datetime]:
    """Return the instants between which readings of a series can be true, looked at from `at`.

    From the first opening of the station (none: no bound) to its last closing or, where it is
    open, to the present with an hour for a clock that runs ahead.
    """
    of = clock.agency()
    periods = list(OperationPeriod.objects.filter(station=series.station_id))
    earliest = clock.day_start(min(p.opened_on for p in periods), of=of) if periods else None
    latest = at + CLOCK_AHEAD
    closings = [period.closed_on for period in periods if period.closed_on]
    if periods and len(closings) == len(periods):
        latest = min(latest, clock.day_start(max(closings) + timedelta(days=1), of=of))
    return earliest, latest
