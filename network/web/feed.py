"""The calendar feed behind a secret address; whoever does not know it finds nothing."""

from django.conf import settings
from django.http import Http404, HttpRequest, HttpResponse
from django.urls import reverse
from django.utils import timezone
from django.utils.text import capfirst
from django.utils.translation import gettext as _
from django.views.decorators.cache import never_cache
from django.views.decorators.http import require_safe

from network.formats import calendar
from network.formats.calendar import Entry
from network.models import Round
from network.queries import feeds
from network.queries.work_due.work_list import Line

DOMAIN = "gaugewright"


@require_safe
@never_cache
def calendar_feed(request: HttpRequest, secret: str) -> HttpResponse:
    """Return the calendar of a link."""
    link = feeds.link_of(secret)
    if link is None:
        raise Http404
    now = timezone.now()
    found = feeds.content(link, at=now)
    entries = [_round_entry(row) for row in found.rounds]
    entries += [_line_entry(line) for line in found.lines]
    title = _("Work due: %(name)s") % {"name": found.name}
    body = calendar.write(entries, name=title, written_at=now)
    return HttpResponse(body, content_type="text/calendar; charset=utf-8")


def _line_entry(line: Line) -> Entry:
    """Put an item on the day it is due; what is late stands on today, where it is seen."""
    day = max(line.due_on, timezone.localdate())
    late = _("late: ") if line.days_late > 0 else ""
    return Entry(
        uid=f"{line.kind.value}-{line.subject}@{DOMAIN}",
        title=f"{late}{capfirst(str(line.kind.label))}: {line.place}",
        first_day=day,
        last_day=day,
        text=f"{capfirst(line.reason)}.",
        place=line.place,
        url=_address("admin:network_station_change", line.station) if line.station else "",
        category=str(line.kind.label),
        is_urgent=line.is_urgent,
    )


def _round_entry(row: Round) -> Entry:
    stops = [str(stop.station) for stop in row.stops.all() if not stop.left_out_because]
    return Entry(
        uid=f"round-{row.pk}@{DOMAIN}",
        title=_("Round: %(name)s") % {"name": row.name},
        first_day=row.first_day,
        last_day=row.last_day,
        text="\n".join(f"{number} {stop}" for number, stop in enumerate(stops, 1)),
        place=str(row.office),
        url=_address("admin:network_round_plan", row.pk),
        category=_("round"),
    )


def _address(page: str, key: int) -> str:
    return settings.SITE_URL + reverse(page, args=[key])
