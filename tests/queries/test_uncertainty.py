"""The uncertainty of daily flows from rows: band, scatter and stage, worked by hand."""

from datetime import UTC, date, datetime

import numpy as np
import pytest

from network.models import Infill, Note
from network.numerics.years.flow_uncertainty import u95_percent, volume_classes
from network.queries import flows, uncertainty
from network.services import infills, notes
from tests import records
from tests.people import make_agency
from tests.rated_world import AT, DAY, EARLY, approved, in_force, person, recorded

pytestmark = pytest.mark.django_db
FIRST = EARLY.date()
BAND = [(0.0, 4.0), (5.0, 4.0)]


@pytest.fixture
def station():
    make_agency(record_utc_offset_minutes=0)
    return records.make_station()


def rate(station, number="1", *, since=EARLY, band=BAND, scatter=3.0):
    """Put Q = 10·(h − 0.2)² in force, with its band and scatter."""
    curve = approved(station, number, band=band)
    type(curve).objects.filter(pk=curve.pk).update(scatter_percent=scatter)
    return in_force(station, curve, since)


def u95(station, n=1):
    days = flows.days_of(station, FIRST, FIRST + (n - 1) * DAY)
    return days, uncertainty.daily_u95(station, days)


def test_a_day_by_hand(station):
    # To 11:00 at 1.2 m, from 12:00 on at 2.2 m. At 1.2 m, Q = 10: band 4 % 0.4, gaugings 2·3 % 0.6,
    # stage Q(1.205) − Q(1.195) = 0.2: √(0.16 + 0.36 + 0.04) = 0.748331 m³/s. At 2.2 m, Q = 40:
    # √(1.6² + 2.4² + 0.4²) = 2.912044. The hour between has the mean of both.
    recorded(station, [1.2] * 12 + [2.2] * 13)
    rate(station)
    days, found = u95(station)
    low, high = 0.748331, 2.912044
    assert found[0] == pytest.approx((11 * low + (low + high) / 2 + 12 * high) / 24, abs=1e-5)
    # Q̄: 11 h at 10, an hour at 25 and 12 h at 40 m³/s
    assert days.flow_m3s[0] == pytest.approx((11 * 10 + 25 + 12 * 40) / 24)
    assert u95_percent(days.flow_m3s, found)[0] == pytest.approx(7.32, abs=0.02)
    assert volume_classes(days.flow_m3s, found).within_10 == 1.0


def test_a_rating_that_states_no_band_leaves_the_day_unstated(station):
    recorded(station, [1.2] * 25)
    rate(station, band=())
    assert np.isnan(u95(station)[1][0])


def test_a_rating_that_begins_on_the_last_day_counts(station):
    # ±4 % to noon, ±8 % after: √(0.64 + 0.36 + 0.04) = 1.019804 m³/s.
    recorded(station, [1.2] * 25)
    rate(station)
    rate(station, "2", since=EARLY + DAY / 2, band=[(0.0, 8.0), (5.0, 8.0)])
    # The step across noon has the mean of both sides: 11 h, 1 h, 12 h.
    low, high = 0.748331, 1.019804
    expected = (11 * low + (low + high) / 2 + 12 * high) / 24
    assert u95(station)[1][0] == pytest.approx(expected, abs=0.006)


def test_estimated_days_have_what_their_infill_states(station):
    recorded(station, [1.2] * (24 * 4 + 1))
    rate(station)
    notes.add_note(
        station=station, start_at=EARLY + DAY, end_at=EARLY + 2 * DAY, cause=Note.Cause.ICE,
        flows=Note.Flows.ESTIMATED, by=person("ama"), at=AT,
    )  # fmt: skip
    infills.add_infill(
        station=station, first_day=date(2020, 1, 2), last_day=date(2020, 1, 2), reason="ice",
        method=Infill.Method.LINE, uncertainty_percent=20, by=person("ama"), at=AT,
    )  # fmt: skip
    _days, found = u95(station, 4)
    # 20 % of 10 m³/s
    assert found[1] == pytest.approx(2.0)
    assert found[[0, 2, 3]] == pytest.approx([0.748331] * 3, abs=1e-6)


def test_at_zero_flow_there_is_no_percentage(station):
    recorded(station, [0.2] * 25, start=datetime(2020, 1, 1, tzinfo=UTC))
    rate(station)
    days, found = u95(station)
    assert days.flow_m3s[0] == 0.0
    # Q(0.205) − Q(0.195) = 10·0.005² = 0.00025
    assert found[0] == pytest.approx(0.00025)
    assert np.isnan(u95_percent(days.flow_m3s, found)[0])
