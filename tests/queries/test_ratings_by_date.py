"""The date chooses the rating, from rows to figures, on published peaks (reference section 6)."""

from datetime import UTC, datetime

import pytest

from network.queries import held_gaugings
from network.services import ratings
from tests import records
from tests.numerics.reference.figures import FOOT_M, FT3S_M3S, rounded
from tests.numerics.reference.test_ratings import (
    FLOWS_FT3S,
    PEAKS_OF_EARLIER_RATINGS,
    PEAKS_OF_RATING_20,
    STAGES_FT,
)
from tests.people import make_agency
from tests.rated_world import AT, gauge, in_force, person

pytestmark = pytest.mark.django_db


def instant(day):
    return datetime.fromisoformat(day).replace(tzinfo=UTC)


@pytest.fixture
def peaks():
    """USGS 01594440: eight published peaks, held against what is in force at their time.

    Rating 20.0 from 2015-10-01; what was in force before is not published: a table of half its
    flows stands for it.
    """
    make_agency(record_utc_offset_minutes=0)
    station = records.make_station()
    for number, since, factor in (("old", "1990-01-01", 0.5), ("20.0", "2015-10-01", 1.0)):
        points = [
            (stage * FOOT_M, flow * FT3S_M3S * factor)
            for stage, flow in zip(STAGES_FT, FLOWS_FT3S, strict=True)
        ]
        curve = ratings.draft(
            station=station, number=number,
            relation=ratings.Relation(points=points, form="log", h0_m=2.00 * FOOT_M),
            use=ratings.Use(lowest_use_m=points[0][0], highest_use_m=points[-1][0]),
            reason="published", by=person("ama"), at=AT,
        )  # fmt: skip
        ratings.approve(curve=curve, by=person("ben"), at=AT)
        in_force(station, curve, instant(since))
    for day, stage_ft, flow_ft3s in PEAKS_OF_EARLIER_RATINGS + PEAKS_OF_RATING_20:
        gauge(station, stage_ft * FOOT_M, flow_ft3s * FT3S_M3S, at=instant(day))
    return {f"{held.at:%Y-%m-%d}": held for held in held_gaugings.of_station(station)}


@pytest.mark.parametrize(("day", "_stage_ft", "published_ft3s"), PEAKS_OF_RATING_20)
def test_peaks_under_the_rating_are_equal_at_three_figures(peaks, day, _stage_ft, published_ft3s):
    assert rounded(peaks[day].rated_m3s / FT3S_M3S) == published_ft3s


@pytest.mark.parametrize(("day", "_stage_ft", "published_ft3s"), PEAKS_OF_EARLIER_RATINGS)
def test_earlier_peaks_are_rated_by_the_earlier_version(peaks, day, _stage_ft, published_ft3s):
    by_old = peaks[day].rated_m3s / FT3S_M3S
    # The newer rating gives twice as much; neither is the published figure.
    assert rounded(by_old) != published_ft3s
    assert rounded(2 * by_old) != published_ft3s
