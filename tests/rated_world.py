"""A station with signed gaugings, a record and ratings, for the tests of ratings."""

from datetime import UTC, datetime, timedelta

import numpy as np

from network.models import Gauging, Person, StageReading
from network.numerics.ratings.curves import Segment
from network.services import ratings
from tests import records

AT = datetime(2024, 3, 1, 12, tzinfo=UTC)
EARLY = datetime(2020, 1, 1, tzinfo=UTC)
DAY = timedelta(days=1)


def person(name):
    return Person.objects.get_or_create(username=name)[0]


def gauge(station, stage_m, flow_m3s, *, at=AT, u95_percent=5.0, **changes):
    """Keep a signed gauging of one hour around an instant, its stage read at start and end."""
    half = timedelta(minutes=30)
    row = Gauging.objects.create(
        station=station, started_at=at - half, ended_at=at + half, state="signed", signed_at=at,
        signed_by=person("ama"), recorded_at=at, recorded_by=person("ama"),
        discharge_m3s=flow_m3s, u95_percent=u95_percent, **changes,
    )  # fmt: skip
    for when in (at - half, at + half):
        StageReading.objects.create(gauging=row, read_at=when, reading_m=stage_m)
    return row


def gauge_along(station, stages_m, *, c=10.0, h0_m=0.2, b=2.0, since=EARLY, errors=None):
    """Gauge Q = c·(h − h0)^b at each stage, ten days apart; errors in ln Q."""
    stages_m = np.asarray(stages_m, np.float64)
    flows = c * (stages_m - h0_m) ** b * np.exp(0 if errors is None else np.asarray(errors))
    return [
        gauge(station, float(h), float(q), at=since + n * 10 * DAY)
        for n, (h, q) in enumerate(zip(stages_m, flows, strict=True))
    ]


def approved(station, number="1", *, c=10.0, h0_m=0.2, b=2.0, use=(0.2, 5.0), **content):
    """Approve Q = c·(h − h0)^b."""
    curve = ratings.draft(
        station=station, number=number,
        relation=ratings.Relation(segments=[Segment(h0_m, c, h0_m, b)]),
        use=ratings.Use(lowest_use_m=use[0], highest_use_m=use[1]),
        reason="made for the test", by=person("ama"), at=AT, **content,
    )  # fmt: skip
    return ratings.approve(curve=curve, by=person("ben"), at=AT)


def in_force(station, curve, since=EARLY, **how):
    return ratings.put_in_force(
        station=station, curve=curve, effective_from=since, reason="made for the test",
        by=person("ama"), at=AT, **how,
    )  # fmt: skip


def recorded(station, values_m, *, start=EARLY, step=timedelta(hours=1)):
    """Give the station a primary series with these readings; return the series."""
    by = person("ama")
    series = records.make_series(by, station)
    text = records.logger_text(values_m, start=start, step=step)
    records.take(text, series=series, profile=records.make_profile(by), by=by)
    return series
