"""How a rating holds: gaugings made since, doubt, and where the next gauging helps most."""

from datetime import UTC, datetime

import numpy as np
import pytest

from network.models import CurveGauging
from network.queries import held_gaugings, next_gaugings, rating_health
from network.services import ratings, station_years
from tests import records
from tests.people import make_agency
from tests.rated_world import (
    AT,
    DAY,
    EARLY,
    approved,
    gauge,
    gauge_along,
    in_force,
    person,
    recorded,
)  # fmt: skip

pytestmark = pytest.mark.django_db
NOW = datetime(2024, 6, 1, tzinfo=UTC)
SINCE = datetime(2022, 1, 1, tzinfo=UTC)
STAGES = [0.5, 0.6, 0.7, 0.8, 0.9, 1.1, 1.3, 1.5, 1.8, 2.1, 2.4, 2.8]
NOISE = [0.03, -0.02, 0.01, -0.03, 0.02, -0.01, 0.03, -0.02, -0.01, 0.02, -0.03, 0.01]


@pytest.fixture
def station():
    make_agency()
    return records.make_station()


def rated(station, *, band=(), number="1"):
    """Rest Q = 10·(h − 0.2)² on twelve gaugings of 2020 and put it in force from then."""
    rows = gauge_along(station, STAGES, errors=NOISE)
    curve = approved(
        station, number, gaugings=[ratings.GaugingChoice(gauging=row) for row in rows], band=band
    )
    return in_force(station, curve, EARLY)


def later(station, errors, *, stage_m=1.2, since=SINCE):
    """Gauge at 1.2 m, where the curve gives 10 m³/s, a month apart, by fractions off."""
    return [
        gauge(station, stage_m, 10 * (1 + error), at=since + 30 * n * DAY)
        for n, error in enumerate(errors)
    ]


def test_three_in_a_row_beyond_their_u_put_the_rating_in_doubt(station):
    # U of each 5 %; 8 % off beyond it three times: the agency's count is 3.
    rated(station)
    rows = later(station, [0.0, 0.08, 0.08, 0.08])
    health = rating_health.of_station(station, at=NOW)
    assert health.is_in_doubt
    assert (health.in_a_row, health.side) == (3, "above")
    assert health.doubted_since == held_gaugings.mid_time(rows[1])
    assert [one.is_beyond for one in health.later] == [False, True, True, True]
    assert health.sentence() == (
        "The last 3 gaugings all lie above the curve beyond their U: in doubt."
    )


@pytest.mark.parametrize(
    "errors", [[0.08, 0.08], [0.08, -0.08, 0.08], [0.08, 0.08, 0.08, 0.01], [0.04] * 5]
)
def test_fewer_other_sides_or_within_their_u_leave_it_in_peace(station, errors):
    rated(station)
    later(station, errors)
    health = rating_health.of_station(station, at=NOW)
    assert not health.is_in_doubt
    assert len(health.later) == len(errors)


def test_the_band_of_the_curve_widens_the_limit(station):
    # √((5 %·1.08)² + 6 %²) = 8.07 %, above 8 %.
    rated(station, band=[(0.2, 6.0), (5.0, 6.0)])
    later(station, [0.08] * 3)
    health = rating_health.of_station(station, at=NOW)
    assert health.later[0].limit_percent == pytest.approx(np.hypot(5 * 1.08, 6.0))
    assert not health.is_in_doubt


def test_a_shift_in_force_is_part_of_the_rating(station):
    # 10·(1.2 + 0.04 − 0.2)² = 10.816 against 10.8 m³/s gauged.
    period = rated(station)
    later(station, [0.08] * 3)
    ratings.add_shift_table(
        period=period, effective_from=SINCE, points=[(1.0, 0.04)], reason="scour",
        by=person("ama"), at=AT,
    )  # fmt: skip
    health = rating_health.of_station(station, at=NOW)
    assert health.in_a_row == 0
    assert health.later[0].held.rated_m3s == pytest.approx(10.816)


def test_gaugings_before_the_rating_and_after_the_day_asked_for_do_not_count(station):
    curve = rated(station).curve
    later(station, [0.08] * 3)
    in_force(station, approved(station, "2"), SINCE + 45 * DAY)
    assert len(rating_health.of_station(station, at=NOW).later) == 1
    before = rating_health.of_station(station, at=SINCE + 31 * DAY)
    assert (before.curve, len(before.later)) == (curve, 2)


def test_without_a_rating_or_without_gaugings_it_says_so(station):
    assert rating_health.of_station(station, at=NOW).sentence() == "No rating is in force."
    rated(station)
    found = rating_health.of_station(station, at=NOW)
    assert found.sentence() == "No gauging has been made since."


def test_many_stations_cost_as_many_queries_as_one(station, django_assert_num_queries):
    stations = [station, *(records.make_station(f"QA-0{n}") for n in (20, 30, 40))]
    for each in stations:
        rated(each)
        later(each, [0.0, 0.08, 0.08, 0.08])
    count = 12
    with django_assert_num_queries(count, exact=False) as one:
        rating_health.of_many(stations[:1], at=NOW)
    with django_assert_num_queries(len(one), exact=True):
        found = rating_health.of_many(stations, at=NOW)
    assert all(found[each.pk].is_in_doubt for each in stations)
    assert all(len(found[each.pk].later) == 3 for each in stations)


def test_the_next_gauging_is_wanted_where_volume_passes_and_gaugings_lack(station):
    # Gauged up to 2.8 m; water often stands at 4 m, where no gauging is.
    rated(station)
    recorded(station, [0.9] * 24 * 10 + [4.0] * 24 * 10)
    found = next_gaugings.of_station(station, at=NOW)
    best = found.best
    assert best.lower_stage_m > 2.8
    assert best.gaugings == 0
    assert best.mean_u95_percent_after < best.mean_u95_percent_now
    sentence = found.sentence()
    assert sentence.startswith("Gauge between 3.")
    assert "of the volume passes there, on 0 gaugings" in sentence


def test_many_are_answered_from_the_cache_alone(station, django_assert_num_queries):
    rated(station)
    recorded(station, [0.9] * 24 * 10 + [4.0] * 24 * 10)
    assert next_gaugings.of_many([station], at=NOW) == {}
    station_years.refresh(station)
    found = next_gaugings.of_many([station], at=NOW)
    assert found[station.pk].best == next_gaugings.of_station(station, at=NOW).best
    CurveGauging.objects.all().delete()
    assert next_gaugings.of_many([station], at=NOW) == {}


def test_a_curve_that_no_gaugings_carry_wants_no_band(station):
    in_force(station, approved(station))
    recorded(station, [0.9] * 48)
    assert next_gaugings.of_station(station, at=NOW) is None


def test_every_gauging_is_held_against_the_rating_of_its_own_time(station):
    rated(station)
    in_force(station, approved(station, "2", c=20.0), SINCE)
    later(station, [0.0], since=SINCE - 60 * DAY)
    later(station, [0.0], since=SINCE)
    then, now = held_gaugings.of_station(station)[-2:]
    assert then.deviation_percent == pytest.approx(0.0, abs=1e-9)
    assert now.deviation_percent == pytest.approx(-50.0)
