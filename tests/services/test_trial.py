"""Before and after: an act tried leaves every table as it was, and says what it would change."""

from datetime import UTC, date, datetime, timedelta

import numpy as np
import pytest
from django.apps import apps
from django.db import connection

from network.models import Infill, LoggerImport, MappingProfile, Note, Station
from network.queries import flows
from network.services import corrections, imports, infills, notes, ratings, series, trial
from network.services.acts import Refusal
from tests import records
from tests.people import make_agency
from tests.rated_world import AT, DAY, EARLY, approved, gauge, in_force, person, recorded

HOUR = timedelta(hours=1)
BY = {"at": AT}


@pytest.fixture
def station(db):
    """Ten days at 1.2 m under 10·(h − 0.2)²: 10 m³/s; one gauging of 11 m³/s in their middle."""
    make_agency(record_utc_offset_minutes=0)
    where = records.make_station()
    recorded(where, [1.2] * (24 * 10 + 1))
    in_force(where, approved(where))
    gauge(where, 1.2, 11.0, at=EARLY + 5 * DAY)
    return where


def everything():
    """Return every row of every table, as the database holds it."""
    return {
        model.__name__: list(model._default_manager.order_by("pk").values_list())
        for model in apps.get_models()
    }


def shift(station):
    return ratings.add_shift_table(
        period=station.rating_periods.earliest("effective_from"), effective_from=EARLY + 5 * DAY,
        points=[(1.0, 0.1)], by=person("ama"), at=AT, reason="scour",
    )  # fmt: skip


def put_second(station, since=EARLY + 8 * DAY):
    return in_force(station, approved(station, "2", c=20.0), since)


def test_a_tried_act_leaves_every_table_as_it_was(station):
    before = everything()
    trial.before_and_after(station, lambda: shift(station))
    after = everything()
    assert {name for name in before if before[name] != after[name]} == set()


def test_days_gaugings_and_years_are_told_in_numbers(station):
    found = trial.before_and_after(station, lambda: shift(station))
    # From 6 January 00:00: 10·(1.3 − 0.2)² = 12.1 m³/s on five days and the one reading after.
    assert found.days == [date(2020, 1, day) for day in range(6, 11)]
    assert found.changes == pytest.approx([2.1] * 5)
    assert (found.largest, found.mean) == pytest.approx((2.1, 2.1))
    assert (found.days_moved, found.days_gained, found.days_lost, found.days_marked) == (5, 0, 0, 0)
    # The gauging of 11 m³/s: +10 % before, 11/12.1 − 1 = −9.1 % after. Its mid-time is the start.
    [change] = found.gaugings
    assert change.before.deviation_percent == pytest.approx(10.0)
    assert change.after.deviation_percent == pytest.approx(-100 / 11)
    # The year lacks most of its days: it has no volume on either side.
    assert found.years == []
    assert found.editions == []
    assert not found.is_nothing


def test_a_year_with_all_its_days_tells_its_volume(db):
    make_agency(record_utc_offset_minutes=0)
    where = records.make_station()
    recorded(where, [1.2] * (4 * 366 + 1), step=6 * HOUR)
    series_row = where.series.get()
    series.change_series(series=series_row, gap_limit_minutes=400, by=person("ama"), at=AT)
    in_force(where, approved(where))
    found = trial.before_and_after(
        where, lambda: put_second(where, datetime(2020, 7, 1, tzinfo=UTC))
    )
    [year] = found.years
    # 10 m³/s over 366 days; 20 from 1 July on, 184 days.
    assert year.before_hm3 == pytest.approx(366 * 0.864)
    assert year.after_hm3 == pytest.approx((182 + 2 * 184) * 0.864)
    assert year.percent == pytest.approx(100 * 184 / 366)


def test_days_that_get_or_lose_a_figure_are_counted_apart(station):
    found = trial.before_and_after(station, lambda: in_force(station, None, EARLY + 8 * DAY))
    assert (found.days_lost, found.days_moved) == (2, 0)
    assert found.largest is None
    assert [row.after for row in found.day_rows()] == [None, None]


def test_confirming_does_what_was_shown_and_refuses_once_the_record_moved(station):
    seen = trial.before_and_after(station, lambda: shift(station)).fingerprint
    put_second(station)
    before = everything()
    with pytest.raises(Refusal, match="changed since this was shown"):
        trial.confirm(station, lambda: shift(station), seen=seen)
    assert everything() == before
    again = trial.before_and_after(station, lambda: shift(station)).fingerprint
    row = trial.confirm(station, lambda: shift(station), seen=again)
    assert row.pk
    day = EARLY.date() + 5 * DAY
    assert flows.days_of(station, day, day).flow_m3s[0] == pytest.approx(12.1)


def test_a_refusal_of_the_act_passes_through_and_writes_nothing(station):
    before = everything()
    with pytest.raises(Refusal, match="starts at this instant"):
        trial.before_and_after(station, lambda: in_force(station, approved(station, "2")))
    assert everything() == before


def ice(station, treatment=Note.Flows.WITHHELD):
    return notes.add_note(
        station=station, start_at=EARLY + 3 * DAY, end_at=EARLY + 5 * DAY, cause=Note.Cause.ICE,
        flows=treatment, by=person("ama"), **BY,
    )  # fmt: skip


def setting(station):
    return series.set_sensor(
        series=station.series.get(), effective_from=EARLY + 9 * DAY, scale=1.0, offset_m=0.1,
        reason="moved", by=person("ama"), **BY,
    )  # fmt: skip


def correction(station):
    row = corrections.propose_correction(
        series=station.series.get(), start_at=EARLY + 2 * DAY, end_at=EARLY + 4 * DAY,
        start_offset_m=0.05, end_offset_m=0.05, reason="drift", by=person("ama"), **BY,
    )  # fmt: skip
    return corrections.accept_correction(correction=row, by=person("ben"), **BY)


@pytest.mark.parametrize(
    ("act", "days"),
    [(shift, 5), (put_second, 2), (ice, 2), (setting, 1), (correction, 2)],
    ids=lambda value: getattr(value, "__name__", ""),
)
def test_what_was_shown_is_what_happens(station, act, days):
    """Both sides are computed by the same code as the record itself."""
    span = EARLY.date(), EARLY.date() + 9 * DAY
    before = flows.days_of(station, *span)
    shown = trial.before_and_after(station, lambda: act(station))
    act(station)
    after = flows.days_of(station, *span)
    same = (before.flow_m3s == after.flow_m3s) | np.isnan(before.flow_m3s + after.flow_m3s)
    moved = np.flatnonzero(~same | (before.marks != after.marks))
    inside = [day for day in shown.days if span[0] <= day <= span[1]]
    assert inside == before.days[moved].tolist()
    assert len(moved) >= days
    kept = [shown.days.index(day) for day in inside]
    assert shown.after[kept].tobytes() == after.flow_m3s[moved].tobytes()


def test_the_withdrawal_of_an_import_is_tried_with_its_readings(station):
    row = LoggerImport.objects.get()

    def withdraw():
        imports.withdraw_import(logger_import=row, by=person("ama"), at=AT, reason="wrong logger")

    before = everything()
    found = trial.before_and_after(station, withdraw, touches_readings=True)
    assert everything() == before
    assert found.days_lost == len(found.days) == 10


def test_days_that_rest_on_a_regression_are_computed_while_the_act_stands(db):
    """The regression reads the record by itself: after the rollback it would read the old one."""
    make_agency(record_utc_offset_minutes=0)
    where, neighbour = records.make_station("QA-010"), records.make_station("QA-020")
    for each in (where, neighbour):
        values = [1.2 + 0.5 * np.sin(n / 50) for n in range(24 * 40 + 1)]
        row = records.make_series(person("ama"), each)
        profile = MappingProfile.objects.first() or records.make_profile(person("ama"))
        records.take(
            records.logger_text(values, start=EARLY, step=HOUR), series=row, profile=profile,
            by=person("ama"),
        )  # fmt: skip
        in_force(each, approved(each))
    ice(where, Note.Flows.ESTIMATED)
    infills.add_infill(
        station=where, first_day=date(2020, 1, 4), last_day=date(2020, 1, 5), reason="ice",
        method=Infill.Method.NEIGHBOUR, neighbour=neighbour, by=person("ama"), at=AT,
    )  # fmt: skip
    first, last = date(2020, 1, 4), date(2020, 1, 5)
    shown = trial.before_and_after(where, lambda: put_second(where, EARLY + 6 * DAY))
    assert shown.days[0] == first
    put_second(where, EARLY + 6 * DAY)
    assert shown.after[:2].tolist() == flows.days_of(where, first, last).flow_m3s.tolist()


def test_stations_estimated_from_this_one_are_named(station):
    other = records.make_station("QA-020")
    infills.add_infill(
        station=other, first_day=date(2020, 1, 2), last_day=date(2020, 1, 3),
        method=Infill.Method.NEIGHBOUR, neighbour=station, reason="gap", by=person("ama"), at=AT,
    )  # fmt: skip
    found = trial.before_and_after(station, lambda: shift(station))
    assert found.followers == [Station.objects.get(code="QA-020")]


def test_the_readings_are_decoded_once(station, monkeypatch):
    reads = []
    read = flows.blocks.read
    monkeypatch.setattr(flows.blocks, "read", lambda *asked: reads.append(asked) or read(*asked))
    trial.before_and_after(station, lambda: shift(station))
    assert len(reads) == 1


def test_a_constraint_the_database_defers_is_seen_in_the_trial(station):
    if connection.vendor == "sqlite":
        assert connection.features.can_defer_constraint_checks
    period = station.rating_periods.get()

    def act():
        period.curve_id = 10**9
        period.save()

    with pytest.raises(Exception, match=r"(?i)foreign key"):
        trial.before_and_after(station, act)
    period.refresh_from_db()
    assert period.curve.number == "1"
