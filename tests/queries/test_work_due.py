"""Each rule of the work list by hand-made dates; the list's order, filters and postponements."""

from datetime import date, timedelta

import pytest

from network.models import (
    Instrument,
    KindInterval,
    Office,
    OperationPeriod,
    Postponement,
    Station,
    WorkingRules,
    WorkLeft,
)
from network.queries.instruments import pair_due
from network.queries.work_due.items import Kind
from network.queries.work_due.work_list import Filters, number_due, work_list
from tests.people import make_station
from tests.work_rows import (
    cableway,
    calibrated,
    gauged,
    inspected,
    levelled,
    meter,
    noon,
    rated,
    recorded,
    reviewed,
    visited,
)

TODAY = date(2024, 3, 1)
pytestmark = pytest.mark.django_db


@pytest.fixture
def by(record_keeper):
    return record_keeper


@pytest.fixture
def kept(agency, station, by):
    """A station where nothing is due."""
    visited(station, TODAY, by)
    levelled(station, TODAY, by)
    gauged(station, TODAY, by)
    return station


def days_ago(days):
    return TODAY - timedelta(days=days)


def due(**filters):
    return list(work_list(noon(TODAY), filters=Filters(**filters), per_page=None).lines)


def only(kind, **filters):
    found = [line for line in due(**filters) if line.kind == kind]
    assert len(found) == 1, found
    return found[0]


def kinds(**filters):
    return [line.kind for line in due(**filters)]


def test_nothing_is_due_where_all_was_done_today(kept):
    assert due() == []


# --- the rules of a station ----------------------------------------------------------------------


@pytest.mark.parametrize(("days", "late"), [(41, None), (42, 0), (43, 1)])
def test_a_routine_visit_falls_due_on_the_day_its_interval_ends(agency, station, by, days, late):
    visited(station, days_ago(days), by)
    found = [line for line in due() if line.kind == Kind.VISIT]
    assert [line.days_late for line in found] == ([] if late is None else [late])


def test_a_visit_says_how_long_ago_and_how_often(agency, station, by):
    visited(station, days_ago(75), by)
    line = only(Kind.VISIT)
    assert line.reason == "last routine visit 75 days ago; every 42"
    assert (line.since, line.due_on) == (days_ago(75), days_ago(33))


def test_the_stations_own_interval_comes_before_the_agencys(kept):
    Station.objects.update(visit_interval_days=7)
    assert "visit" not in kinds()
    assert only(Kind.VISIT, within_days=7).days_late == -7


def test_a_flood_visit_is_no_routine_visit(agency, station, by):
    visited(station, days_ago(50), by)
    visited(station, days_ago(2), by, is_routine=False)
    assert only(Kind.VISIT).since == days_ago(50)


def test_a_station_never_visited_is_due_from_its_opening(agency, station):
    line = only(Kind.VISIT)
    assert (line.since, line.due_on) == (None, date(2019, 1, 1) + timedelta(days=42))
    assert line.reason == "no routine visit yet; every 42 days"


def test_a_closed_station_asks_for_nothing(agency, station):
    OperationPeriod.objects.update(closed_on=days_ago(1))
    assert due() == []


def test_a_level_check_over_leap_day_and_month_end(agency, station, by):
    Station.objects.update(level_check_interval_months=12)
    levelled(station, date(2023, 2, 28), by)
    assert only(Kind.LEVELS).due_on == date(2024, 2, 28)
    levelled(station, date(2023, 3, 1), by)
    assert only(Kind.LEVELS).due_on == TODAY


def test_a_level_check_speaks_in_months(agency, station, by):
    levelled(station, date(2020, 10, 1), by)
    # October 2020 to March 2024: 3 years and 5 months
    assert only(Kind.LEVELS).reason == "last level check 41 months ago; every 36"


def test_a_gauging_is_wanted_by_the_number_a_year(agency, station, by):
    gauged(station, days_ago(61), by)
    # 365.25 / 6 is 61 days
    assert only(Kind.GAUGING).due_on == TODAY
    assert only(Kind.GAUGING).reason == "last gauging 61 days ago; 6 a year wanted"


def test_a_stage_only_station_wants_gaugings_only_when_it_says_so(agency, station):
    Station.objects.update(kind="stage")
    assert "gauging" not in kinds()
    Station.objects.update(gaugings_wanted_per_year=1)
    assert "gauging" in kinds()


def test_a_recorder_that_is_silent_is_urgent(kept):
    recorded(kept, date(2023, 1, 1), days_ago(46))
    line = only(Kind.SILENCE)
    assert line.is_urgent
    assert line.days_late == 1
    assert line.reason == "last reading 46 days ago; expected every 45"


def test_the_silence_of_an_event_logger_says_nothing(kept):
    recorded(kept, date(2023, 1, 1), days_ago(400), is_event_logger=True)
    assert "silence" not in kinds()


def test_a_record_is_to_be_reviewed_from_its_last_review_on(kept, by):
    recorded(kept, date(2023, 1, 1), days_ago(1))
    assert only(Kind.REVIEW).due_on == date(2023, 1, 1) + timedelta(days=90)
    reviewed(kept, days_ago(91), by)
    line = only(Kind.REVIEW)
    assert line.days_late == 1
    assert line.reason == f"reviewed through {days_ago(91)}, 91 days ago; every 90"


def test_a_record_reviewed_to_its_end_waits_for_nobody(kept, by):
    recorded(kept, date(2022, 1, 1), date(2023, 1, 1))
    reviewed(kept, date(2023, 1, 1), by)
    assert "review" not in kinds()


def test_the_record_day_decides_not_the_day_in_utc(agency, station, by):
    # 23:30 UTC is 00:30 of the next day on a record clock of UTC+01:00
    visit = visited(station, days_ago(42), by)
    visit.arrived_at = visit.arrived_at.replace(hour=23, minute=30)
    visit.departed_at = None
    visit.save()
    assert "visit" not in kinds()
    assert only(Kind.VISIT, within_days=1).since == days_ago(41)


# --- what was begun and not finished -------------------------------------------------------------


def test_a_visit_waits_two_weeks_to_be_checked(kept, by):
    visit = visited(kept, days_ago(15), by, checked=False)
    line = only(Kind.VISIT_OPEN)
    assert (line.key, line.days_late) == (visit.pk, 1)


def test_a_gauging_says_whether_it_lacks_a_signature_or_a_check(kept, by):
    gauged(kept, days_ago(20), by, state="signed")
    assert "signed, not checked" in only(Kind.GAUGING_OPEN).reason
    gauged(kept, days_ago(30), by, state="draft")
    assert any("not signed" in line.reason for line in due())


def test_work_left_stays_until_it_is_done(kept, by):
    work = WorkLeft.objects.create(visit=visited(kept, days_ago(3), by), text="Paint the plates.")
    assert only(Kind.LEFT).reason == f"left at the visit of {days_ago(3)}: Paint the plates."
    work.done_at, work.done_by = noon(TODAY), by
    work.save()
    assert due() == []


def test_own_drafts_are_found_before_they_are_due(kept, by):
    visited(kept, TODAY, by, checked=False)
    found = work_list(noon(TODAY))
    assert [(row.kind, row.recorded_by) for row in found.unfinished] == [(Kind.VISIT_OPEN, by.pk)]
    assert found.lines == ()


# --- safety --------------------------------------------------------------------------------------


def test_an_overdue_cableway_comes_before_everything(agency, station, by):
    cableway(station, date(2023, 2, 28), by)
    first = due()[0]
    assert (first.kind, first.due_on) == (Kind.SAFETY, date(2024, 2, 28))
    assert first.reason == "cableway Main: last inspection 12 months ago; every 12"


def test_a_cableway_found_unsafe_is_due_though_inspected_today(kept, by):
    item = cableway(kept, days_ago(30), by)
    inspected(item, TODAY, by, is_safe=False)
    assert "found unsafe" in only(Kind.SAFETY).reason


def test_a_withdrawn_inspection_does_not_count(kept, by):
    item = cableway(kept, date(2022, 1, 1), by)
    wrong = inspected(item, TODAY, by)
    wrong.withdrawn_at, wrong.withdrawn_by, wrong.withdrawn_reason = noon(TODAY), by, "other site"
    wrong.save()
    assert only(Kind.SAFETY).since == date(2022, 1, 1)


def test_an_item_never_inspected_is_due_and_one_removed_is_not(kept):
    item = cableway(kept)
    assert "never inspected" in only(Kind.SAFETY).reason
    item.removed_on = TODAY
    item.save()
    assert due() == []


# --- calibration ---------------------------------------------------------------------------------


def test_a_meter_is_due_after_twelve_months(kept, office, by):
    meter(office, date(2023, 2, 28), by)
    line = only(Kind.CALIBRATION)
    assert (line.due_on, line.reason) == (date(2024, 2, 28), "calibrated 12 months ago; every 12")


def test_a_meter_is_due_by_hours_on_the_day_that_filled_them(kept, office, by):
    pair = meter(office, days_ago(100), by, interval_hours=20)
    for days in (80, 60, 40):
        gauged(kept, days_ago(days), by, hours=8, pair=pair)
    line = only(Kind.CALIBRATION)
    # 8 + 8 + 8 passes 20 at the third gauging
    assert line.due_on == days_ago(40)
    assert line.reason == "24 hours of use since the calibration; every 20"


def test_hours_before_the_calibration_are_not_counted(kept, office, by):
    pair = meter(office, days_ago(100), by, interval_hours=20)
    gauged(kept, days_ago(120), by, hours=15, pair=pair)
    gauged(kept, days_ago(50), by, hours=10, pair=pair)
    assert due() == []


def test_own_interval_then_the_kinds_then_the_agencys(kept, office, by):
    pair = meter(office, days_ago(200), by, serial="1")
    assert due() == []
    KindInterval.objects.create(kind="body", months=6)
    assert only(Kind.CALIBRATION).reason == "calibrated 6 months ago; every 6"
    # A round asks for one meter at a time, and is told the same.
    alone = pair_due(pair, noon(TODAY), of=WorkingRules.objects.get())
    assert (alone.months, alone.due_on) == (6, only(Kind.CALIBRATION).due_on)
    Instrument.objects.filter(kind="body").update(interval_months=24)
    assert due() == []


def test_a_group_rating_counts_for_a_meter_without_its_own(kept, office, by):
    pair = meter(office)
    assert only(Kind.CALIBRATION).reason == "never calibrated"
    group = pair.group = type(pair).group.field.related_model.objects.create(name="small")
    pair.save()
    calibrated(days_ago(10), by, group=group)
    assert due() == []


def test_a_failed_calibration_leaves_the_one_before(kept, office, by):
    pair = meter(office, date(2023, 1, 1), by)
    failed = calibrated(days_ago(5), by, pair=pair)
    failed.outcome = "failed"
    failed.save()
    assert only(Kind.CALIBRATION).since == date(2023, 1, 1)


def test_an_instrument_is_due_only_by_an_interval_of_its_own_or_its_kind(kept, office, by):
    level = Instrument.objects.create(kind="level", serial="7", office=office)
    calibrated(date(2020, 1, 1), by, instrument=level)
    assert due() == []
    KindInterval.objects.create(kind="level", months=24)
    assert only(Kind.INSTRUMENT).place == "level 7"


def test_an_instrument_in_the_laboratory_is_not_due(kept, office, by):
    meter(office, date(2020, 1, 1), by, status=Instrument.Status.IN_CALIBRATION)
    assert due() == []


# --- rating in doubt -----------------------------------------------------------------------------


@pytest.fixture
def doubted(kept, by):
    rated(kept, days_ago(300), by)
    for days, deviation in ((50, 12.0), (30, 9.0), (10, 14.0)):
        gauged(kept, days_ago(days), by, deviation=deviation)
    kept.gaugings.filter(started_at__gte=noon(TODAY)).delete()
    return kept


def test_three_gaugings_on_one_side_put_a_rating_in_doubt(doubted):
    line = only(Kind.DOUBT)
    assert line.since == days_ago(50)
    assert line.reason.endswith("beyond their uncertainty: +12 %, +9 %, +14 %")


def test_one_within_its_uncertainty_or_on_the_other_side_ends_the_row(doubted):
    row = doubted.gaugings.order_by("started_at")[1]
    for deviation in (5.9, -9.0):
        row.signed_deviation_percent = deviation
        row.save()
        assert "doubt" not in kinds()


def test_the_band_of_the_curve_widens_what_is_borne(doubted):
    curve = doubted.curves.get()
    # √(6.54² + 6.5²) = 9.2: beyond the 9 % of the second gauging, whose own U is 6·1.09 %
    curve.band.create(stage_m=0.0, u95_percent=6.5)
    curve.band.create(stage_m=2.0, u95_percent=6.5)
    assert "doubt" not in kinds()


def test_a_rating_changed_since_is_not_judged_by_older_signatures(doubted, by):
    rated(doubted, days_ago(5), by)
    assert "doubt" not in kinds()


def test_as_many_in_a_row_as_the_agency_says(doubted):
    WorkingRules.objects.update(doubt_count=4)
    assert "doubt" not in kinds()


# --- the list ------------------------------------------------------------------------------------


@pytest.fixture
def two_stations(agency, station, by):
    other = Office.objects.create(name="Unterau")
    second = make_station(other, code="TE-020", name="Au", river="Lohbach")
    for row, days in ((station, 60), (second, 100)):
        visited(row, days_ago(days), by)
        levelled(row, TODAY, by)
        gauged(row, TODAY, by)
    return station, second


def test_the_latest_comes_first_after_the_urgent(two_stations, by):
    recorded(two_stations[0], date(2023, 1, 1), days_ago(50))
    reviewed(two_stations[0], days_ago(50), by)
    assert [(line.kind, line.days_late) for line in due()] == [
        (Kind.SILENCE, 5),
        (Kind.VISIT, 58),
        (Kind.VISIT, 18),
    ]


def test_the_list_is_filtered_by_office_river_and_kind(two_stations):
    station, second = two_stations
    assert [line.station for line in due(office=second.office_id)] == [second.pk]
    assert [line.station for line in due(river=station.river)] == [station.pk]
    assert due(kind=Kind.LEVELS) == []
    assert len(due(kind=Kind.VISIT)) == 2


def test_counts_are_those_of_all_kinds_whatever_kind_is_shown(two_stations, by):
    cableway(two_stations[0])
    found = work_list(noon(TODAY), filters=Filters(kind=Kind.SAFETY))
    assert found.counts == {Kind.SAFETY: 1, Kind.VISIT: 2}
    assert found.total == 1


def test_the_list_comes_in_pages(two_stations):
    first = work_list(noon(TODAY), page=1, per_page=1)
    second = work_list(noon(TODAY), page=2, per_page=1)
    beyond = work_list(noon(TODAY), page=9, per_page=1)
    assert (first.pages, first.total) == (2, 2)
    assert first.lines != second.lines
    assert beyond.lines == second.lines


def test_one_station_and_one_instrument_alone(two_stations, office, by):
    meter(office, date(2020, 1, 1), by)
    body = Instrument.objects.get(kind="body")
    assert [line.station for line in due(station=two_stations[1].pk)] == [two_stations[1].pk]
    assert [line.kind for line in due(instrument=body.pk)] == [Kind.CALIBRATION]


def test_what_is_put_off_is_hidden_until_its_day(two_stations, by):
    station = two_stations[0]
    row = Postponement.objects.create(
        rule="visit", subject=f"station-{station.pk}", station=station,
        until=TODAY + timedelta(days=1), reason="ice", recorded_at=noon(TODAY), recorded_by=by,
    )  # fmt: skip
    assert len(due()) == 1
    shown = [line for line in due(with_postponed=True) if line.postponed]
    assert [line.postponed.reason for line in shown] == ["ice"]
    assert number_due(noon(TODAY)) == 2
    row.until = TODAY
    row.save()
    assert len(due()) == 2
