"""Ratings in doubt: the last gaugings all on one side of the curve, each beyond its uncertainty."""

from collections.abc import Iterator
from typing import Any

from django.db.models import F, OuterRef, Q, Subquery

from network.models import Gauging, Station
from network.queries.record_days import RecordDay
from network.queries.work_due.items import Asked, Item, Kind

# Deviation in units of the gauging's own U₉₅: beyond ±1 it is beyond its uncertainty.
RATIO = F("signed_deviation_percent") / F("u95_percent")


def items(asked: Asked) -> Iterator[Item]:
    """Yield the stations whose last gaugings all lie on one side of the rating, in one query."""
    count = asked.rules.doubt_count
    signed = Gauging.objects.filter(
        station=OuterRef("pk"), signed_deviation_percent__isnull=False, u95_percent__gt=0
    ).order_by("-started_at")
    above, below, ratios, deviations = Q(), Q(), {}, {}
    for n in range(count):
        one = signed[n : n + 1]
        ratios[f"ratio_{n}"] = Subquery(one.annotate(ratio=RATIO).values("ratio"))
        deviations[f"deviation_{n}"] = Subquery(one.values("signed_deviation_percent"))
        above &= Q(**{f"ratio_{n}__gt": 1})
        below &= Q(**{f"ratio_{n}__lt": -1})
    rows: Any = Station.objects.all()
    if asked.station is not None:
        rows = rows.filter(pk=asked.station)
    found = rows.alias(**ratios).filter(above | below).annotate(**deviations)
    first = RecordDay(Subquery(signed[count - 1 : count].values("started_at")), of=asked.agency)
    for station, office, since, *apart in found.values_list("pk", "office", first, *deviations):
        facts = tuple(reversed(apart))
        yield Item(Kind.DOUBT, station, station, office, since, since, count, facts)
