"""Daily figures from rows: each rule worked by hand on a record simple enough to check."""

from datetime import UTC, date, datetime, timedelta

import numpy as np
import pytest

from network.models import Gauging, Infill, Note, RatingPeriod, SensorSetting
from network.numerics.marks import Mark
from network.queries import flows
from network.services import infills, notes, ratings, series, typed_flows
from tests.records import AT, make_person, make_profile, make_series, make_station, take

pytestmark = pytest.mark.django_db
START = datetime(2024, 2, 1, tzinfo=UTC)
DAY = timedelta(days=1)
HOUR = timedelta(hours=1)


@pytest.fixture
def keeper():
    return make_person("keeper")


@pytest.fixture
def approver():
    return make_person("approver")


@pytest.fixture
def station(keeper):
    return make_station()


@pytest.fixture
def recorder(keeper, station):
    return make_series(keeper, station)


@pytest.fixture
def profile(keeper):
    return make_profile(keeper)


def text_of(readings):
    return "time,level\n" + "".join(f"{at:%Y-%m-%d %H:%M},{stage:.3f}\n" for at, stage in readings)


def hourly(stage_m, *, start=START, days=10):
    return [(start + n * HOUR, stage_m) for n in range(24 * days + 1)]


def rate_linearly(station, keeper, approver, *, number, factor, since=START - 100 * DAY):
    """Put Q = factor · h in force: two points of a linear table."""
    version = ratings.draft(
        station=station, number=number,
        relation=ratings.Relation(points=[(0.0, 0.0), (10.0, 10.0 * factor)], form="linear"),
        use=ratings.Use(lowest_use_m=0.0, highest_use_m=10.0),
        reason="made for the test", by=keeper, at=AT,
    )  # fmt: skip
    ratings.approve(curve=version, by=approver, at=AT)
    return ratings.put_in_force(
        station=station, curve=version, effective_from=since, reason="made for the test",
        by=keeper, at=AT,
    )  # fmt: skip


@pytest.fixture
def steady(station, recorder, profile, keeper, approver):
    """Ten days at 2.000 m under Q = 3·h: 6 m³/s."""
    take(text_of(hourly(2.0)), series=recorder, profile=profile, by=keeper)
    rate_linearly(station, keeper, approver, number="1", factor=3.0)
    return station


def days(station, first=date(2024, 2, 1), n=10):
    return flows.days_of(station, first, first + (n - 1) * DAY)


def test_steady_stage_gives_steady_flow_without_marks(steady):
    found = days(steady)
    assert found.flow_m3s.tolist() == [6.0] * 10
    assert found.stage_m.tolist() == [2.0] * 10
    assert not found.marks.any()


def test_a_rating_change_inside_a_day_splits_the_day_there(steady, keeper, approver):
    # From 06:00 on 3 February Q = 4·h: 6 h at 6 and 18 h at 8 m³/s give 7.5.
    since = datetime(2024, 2, 3, 6, tzinfo=UTC)
    rate_linearly(steady, keeper, approver, number="2", factor=4.0, since=since)
    assert days(steady).flow_m3s[1:4] == pytest.approx([6.0, 7.5, 8.0], abs=1e-12)


def test_a_zero_moved_in_mid_record_is_carried_by_a_new_setting(steady, recorder, keeper):
    # The station zero is lowered by 0.100 m at noon of 5 February: the same water now stands at
    # 2.100 m of stage. Half the day at 2.000, half at 2.100 m: 2.050 m, 6.15 m³/s.
    series.set_sensor(
        series=recorder, effective_from=datetime(2024, 2, 5, 12, tzinfo=UTC), scale=1.0,
        offset_m=0.1, reason="zero moved", by=keeper, at=AT,
    )  # fmt: skip
    found = days(steady)
    # The step from 11:00 to 12:00 rises from 2.000 to 2.100: 11 h, 1 h at 2.050, 12 h at 2.100.
    assert found.stage_m[4] == pytest.approx((11 * 2.0 + 2.05 + 12 * 2.1) / 24, abs=1e-12)
    assert found.stage_m[3:6:2].tolist() == [2.0, pytest.approx(2.1)]


def test_where_no_setting_is_in_force_there_is_no_figure(steady, recorder, keeper):
    series.set_sensor(
        series=recorder, effective_from=datetime(2024, 2, 8, tzinfo=UTC), scale=None,
        offset_m=0.0, reason="recorder removed", by=keeper, at=AT,
    )  # fmt: skip
    found = days(steady)
    assert np.isnan(found.flow_m3s[7:]).all()
    assert (found.marks[7:] & Mark.MISSING).all()


def test_a_gap_longer_than_the_limit_is_not_bridged(station, recorder, profile, keeper, approver):
    # 3 February is recorded until 06:00 and from 20:00: 10 of 24 h, below 80 %.
    gap = (datetime(2024, 2, 3, 6, tzinfo=UTC), datetime(2024, 2, 3, 20, tzinfo=UTC))
    kept = [row for row in hourly(2.0) if not gap[0] < row[0] < gap[1]]
    take(text_of(kept), series=recorder, profile=profile, by=keeper)
    rate_linearly(station, keeper, approver, number="1", factor=3.0)
    found = days(station)
    assert np.isnan(found.flow_m3s[2])
    assert found.covered_s[2] == 10 * 3600
    assert Mark(int(found.marks[2])) == Mark.MISSING


def test_a_short_gap_leaves_a_partial_day(station, recorder, profile, keeper, approver):
    # Four hours missing, more than the limit of three: 20 of 24 h are enough, the day is partial.
    gap = (datetime(2024, 2, 3, 6, tzinfo=UTC), datetime(2024, 2, 3, 10, tzinfo=UTC))
    kept = [row for row in hourly(2.0) if not gap[0] < row[0] < gap[1]]
    take(text_of(kept), series=recorder, profile=profile, by=keeper)
    rate_linearly(station, keeper, approver, number="1", factor=3.0)
    found = days(station)
    assert found.flow_m3s[2] == 6.0
    assert Mark(int(found.marks[2])) == Mark.PARTIAL


def test_no_flow_is_zero_and_not_missing(station, recorder, profile, keeper, approver):
    take(text_of(hourly(0.0)), series=recorder, profile=profile, by=keeper)
    rate_linearly(station, keeper, approver, number="1", factor=3.0)
    found = days(station)
    assert found.flow_m3s.tolist() == [0.0] * 10
    assert not found.marks.any()


def test_the_leap_day_has_its_own_row(station, recorder, profile, keeper, approver):
    start = datetime(2024, 2, 28, tzinfo=UTC)
    take(text_of(hourly(2.0, start=start, days=1)), series=recorder, profile=profile, by=keeper)
    rate_linearly(station, keeper, approver, number="1", factor=3.0)
    found = days(station, first=date(2024, 2, 28), n=3)
    assert [str(day) for day in found.days] == ["2024-02-28", "2024-02-29", "2024-03-01"]


def test_an_ice_period_without_an_estimate_is_never_rated_as_open_water(steady, keeper):
    note(steady, keeper, cause=Note.Cause.ICE, treatment=Note.Flows.ESTIMATED)
    found = days(steady)
    assert np.isnan(found.flow_m3s[3:6]).all()
    assert found.flow_m3s[2] == 6.0
    assert (found.marks[3:6] == Mark.MISSING | Mark.ICE_OR_BACKWATER).all()


def test_withheld_flows_stay_withheld_even_with_an_infill(steady, keeper):
    note(steady, keeper, cause=Note.Cause.DATUM_DOUBT, treatment=Note.Flows.WITHHELD)
    infill(steady, keeper, Infill.Method.LINE)
    assert np.isnan(days(steady).flow_m3s[3:6]).all()


def test_a_straight_line_fills_the_days_between(steady, keeper):
    # 3 February at 6, 7 February at 6 m³/s typed as 10: a quarter of the way up each day.
    note(steady, keeper, cause=Note.Cause.ICE, treatment=Note.Flows.ESTIMATED)
    type_flow(steady, keeper, date(2024, 2, 7), 10.0)
    infill(steady, keeper, Infill.Method.LINE, percent=20)
    found = days(steady)
    # Typed flows come after infills: the line runs to the rated 6 m³/s of 7 February.
    assert found.flow_m3s[3:7].tolist() == [6.0, 6.0, 6.0, 10.0]
    assert (found.marks[3:6] == Mark.ESTIMATED | Mark.ICE_OR_BACKWATER).all()
    assert found.estimated_percent[3:6].tolist() == [20.0] * 3
    assert Mark(int(found.marks[6])) == Mark.TYPED


def test_an_infill_gives_the_same_days_whatever_window_is_asked_for(steady, keeper):
    note(steady, keeper, cause=Note.Cause.ICE, treatment=Note.Flows.ESTIMATED)
    infill(steady, keeper, Infill.Method.LINE)
    alone = days(steady, first=date(2024, 2, 5), n=1)
    assert alone.flow_m3s.tobytes() == days(steady).flow_m3s[4:5].tobytes()


def test_a_station_without_a_rating_period_has_stage_and_no_flow(
    station, recorder, profile, keeper
):
    take(text_of(hourly(2.0)), series=recorder, profile=profile, by=keeper)
    assert not RatingPeriod.objects.exists()
    assert SensorSetting.objects.count() == 1
    found = days(station)
    assert np.isnan(found.flow_m3s).all()
    assert found.stage_m.tolist() == [2.0] * 10


def note(station, keeper, *, cause, treatment):
    """Note 4 to 6 February."""
    return notes.add_note(
        station=station, start_at=datetime(2024, 2, 4, tzinfo=UTC),
        end_at=datetime(2024, 2, 7, tzinfo=UTC), cause=cause, flows=treatment, by=keeper, at=AT,
    )  # fmt: skip


def infill(station, keeper, method, percent=None):
    """Fill 4 to 6 February."""
    return infills.add_infill(
        station=station, first_day=date(2024, 2, 4), last_day=date(2024, 2, 6), method=method,
        reason="ice", uncertainty_percent=percent, by=keeper, at=AT,
    )  # fmt: skip


def type_flow(station, keeper, day, flow_m3s):
    return typed_flows.type_flow(
        station=station, day=day, flow_m3s=flow_m3s, method="by eye", reason="ice", by=keeper,
        at=AT,
    )  # fmt: skip


def test_a_winter_ratio_scales_the_open_water_flow_by_the_gauging_under_ice(steady, keeper):
    # Open-water flow 6 m³/s, 1.5 m³/s gauged at noon of 5 February: the ratio 0.25 is held.
    note(steady, keeper, cause=Note.Cause.ICE, treatment=Note.Flows.ESTIMATED)
    infill(steady, keeper, Infill.Method.WINTER_RATIO, percent=30)
    assert np.isnan(days(steady).flow_m3s[3:6]).all()  # no gauging, no estimate
    noon = datetime(2024, 2, 5, 12, tzinfo=UTC)
    Gauging.objects.create(
        station=steady, started_at=noon - HOUR, ended_at=noon + HOUR, discharge_m3s=1.5,
        state=Gauging.State.SIGNED, signed_at=noon, signed_by=keeper, recorded_at=noon,
        recorded_by=keeper,
    )  # fmt: skip
    found = days(steady)
    assert found.flow_m3s[2:7].tolist() == [6.0, 1.5, 1.5, 1.5, 6.0]
    assert (found.marks[3:6] == Mark.ESTIMATED | Mark.ICE_OR_BACKWATER).all()


def test_a_note_takes_nothing_from_the_day_beside_it(station, recorder, profile, keeper, approver):
    # Six-hourly readings: the step from 18:00 to midnight belongs to 3 February all the same.
    readings = [(START + n * 6 * HOUR, 2.0) for n in range(4 * 10 + 1)]
    series.change_series(series=recorder, gap_limit_minutes=400, by=keeper, at=AT)
    take(text_of(readings), series=recorder, profile=profile, by=keeper)
    rate_linearly(station, keeper, approver, number="1", factor=3.0)
    note(station, keeper, cause=Note.Cause.ICE, treatment=Note.Flows.ESTIMATED)
    found = days(station)
    assert found.flow_m3s[[2, 6]].tolist() == [6.0, 6.0]
    assert found.covered_s[2:7].tolist() == [86_400, 0, 0, 0, 86_400]
