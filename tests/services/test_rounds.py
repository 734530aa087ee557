"""Rounds: meters in calibration, cableways that may be used, stops in order, reasons kept."""

from datetime import date, timedelta

import pytest

from network.models import Round, Stop
from network.queries import round_choice, rounds
from network.services import rounds as acts
from network.services.acts import Overtaken, Refusal
from tests.people import make_station
from tests.work_rows import cableway, inspected, meter, noon, visited

TODAY = date(2024, 3, 1)
AT = noon(TODAY)
LAST = TODAY + timedelta(days=10)
pytestmark = pytest.mark.django_db


@pytest.fixture
def stations(agency, station):
    return [station] + [
        make_station(station.office, code=f"TE-0{n}0", name=f"Ford {n}", latitude_deg=47.5 + n / 10)
        for n in (2, 3)
    ]


def plan(office, by, **changes):
    told = {
        "name": "March", "office": office, "first_day": TODAY + timedelta(days=8),
        "last_day": LAST, "by": by, "at": AT,
    }  # fmt: skip
    return acts.save_round(**{**told, **changes})


@pytest.fixture
def march(agency, office, manager):
    return plan(office, manager)


def add(march, station, by, **told):
    return acts.add_stop(round=march, station=station, by=by, at=AT, **told)


def names(march):
    return [stop.station.code for stop in march.stops.order_by("position")]


def test_a_meter_must_be_in_calibration_through_the_last_day(agency, office, manager):
    pair = meter(office, date(2023, 3, 10), manager)
    with pytest.raises(Refusal, match="from 2024-03-10; the round ends 2024-03-11") as refused:
        plan(office, manager, meters=[pair])
    assert refused.value.field == "meters"
    assert plan(office, manager, meters=[pair], last_day=date(2024, 3, 9)).meters.get() == pair


def test_a_meter_never_calibrated_is_refused(agency, office, manager):
    with pytest.raises(Refusal, match="no calibration"):
        plan(office, manager, meters=[meter(office)])


def test_a_meter_whose_calibration_is_withdrawn_later_is_found(agency, office, manager):
    pair = meter(office, TODAY, manager)
    march = plan(office, manager, meters=[pair])
    assert rounds.sheet(march).problems == ()
    pair.calibrations.update(
        withdrawn_at=AT, withdrawn_by=manager, withdrawn_reason="wrong certificate"
    )
    assert rounds.sheet(march).problems == ("Meter 1 / 1 has no calibration.",)


def test_a_round_does_not_end_before_it_begins(agency, office, manager):
    with pytest.raises(Refusal) as refused:
        plan(office, manager, last_day=TODAY)
    assert refused.value.field == "last_day"


def test_two_people_on_one_heading_the_second_is_told(march, office, manager):
    acts.save_round(
        round=march, version=1, name="April", office=office, first_day=TODAY, last_day=LAST,
        by=manager, at=AT,
    )  # fmt: skip
    with pytest.raises(Overtaken):
        plan(office, manager, round=march, version=1)


@pytest.mark.parametrize(
    ("inspected_on", "is_safe", "why"),
    [
        (date(2023, 3, 11), True, "overdue since 2024-03-11"),  # due on the round's last day
        (date(2024, 2, 1), False, "found unsafe on 2024-02-01"),
        (None, True, "never inspected"),
    ],
)
def test_a_cableway_that_must_not_be_used_blocks_its_stop(
    march, station, manager, inspected_on, is_safe, why
):
    cableway(station, inspected_on, manager, is_safe=is_safe)
    with pytest.raises(Refusal, match=why) as refused:
        add(march, station, manager, by_cableway=True)
    assert refused.value.field == "by_cableway"
    assert not Stop.objects.exists()
    assert add(march, station, manager).by_cableway is False


def test_a_cableway_inspected_in_time_may_be_used_until_found_unsafe(march, station, manager):
    item = cableway(station, date(2023, 3, 12), manager)
    add(march, station, manager, by_cableway=True)
    assert rounds.sheet(march).legs[0].problem == ""
    inspected(item, TODAY, manager, is_safe=False)
    assert "unsafe" in rounds.sheet(march).legs[0].problem


def test_where_there_is_no_cableway_none_is_planned(march, station, manager):
    with pytest.raises(Refusal, match="no cableway"):
        add(march, station, manager, by_cableway=True)


def test_stops_are_moved_by_hand_and_numbered_without_holes(march, stations, manager):
    first, second, third = (add(march, station, manager) for station in stations)
    acts.move_stop(stop=third, places=-1, by=manager, at=AT)
    assert names(march) == ["TE-010", "TE-030", "TE-020"]
    acts.move_stop(stop=first, places=-1, by=manager, at=AT)  # it stands at the top already
    assert names(march) == ["TE-010", "TE-030", "TE-020"]
    acts.remove_stop(stop=third, by=manager, at=AT)
    assert list(march.stops.values_list("station__code", "position")) == [
        ("TE-010", 1),
        ("TE-020", 2),
    ]
    assert Stop.history.filter(station=stations[2], history_type="-").exists()
    assert second.pk in march.stops.values_list("pk", flat=True)


def test_a_station_stands_once_in_a_round(march, station, manager):
    add(march, station, manager)
    with pytest.raises(Refusal, match="already") as refused:
        add(march, station, manager)
    assert refused.value.field == "station"


def test_a_stop_left_out_stays_with_its_reason_and_is_not_driven(march, stations, manager):
    first, second, _third = (add(march, station, manager) for station in stations)
    acts.leave_out(stop=second, reason="road closed", by=manager, at=AT)
    sheet = rounds.sheet(march)
    assert [leg.stop.station.code for leg in sheet.legs] == ["TE-010", "TE-030"]
    assert [stop.left_out_because for stop in sheet.left_out] == ["road closed"]
    acts.take_up(stop=second, by=manager, at=AT)
    assert len(rounds.sheet(march).legs) == 3
    with pytest.raises(Refusal, match="reason"):
        acts.leave_out(stop=first, reason=" ", by=manager, at=AT)


def test_distances_run_from_the_office_by_the_stops_and_back(march, stations, office, manager):
    office.latitude_deg, office.longitude_deg = 47.5, 13.25
    office.save()
    for station in (stations[1], stations[2]):  # 0.2° and 0.3° to the north of the office
        add(march, station, manager, hours=3)
    sheet = rounds.sheet(Round.objects.get())
    # one degree of latitude on the mean sphere: 6371.0088 km · π/180 = 111.195 km
    assert [leg.km for leg in sheet.legs] == pytest.approx([22.239, 11.1195], abs=0.001)
    assert sheet.km == pytest.approx(66.717, abs=0.001)
    assert sheet.hours == pytest.approx(6 + 66.717 / 40, abs=0.001)


def test_without_a_place_of_the_office_the_first_way_is_unknown(march, stations, manager):
    add(march, stations[0], manager)
    add(march, stations[1], manager)
    sheet = rounds.sheet(march)
    assert sheet.legs[0].km is None
    assert sheet.legs[1].km == pytest.approx(22.239, abs=0.001)


def test_tasks_are_changed_and_kept_in_order(march, station, manager):
    stop = add(march, station, manager, tasks=["visit", " gauging ", "", "visit"])
    assert [task.text for task in stop.tasks.all()] == ["visit", "gauging"]
    acts.change_stop(
        stop=stop, hours=1.5, by_cableway=False, tasks=["gauging", "levels"], by=manager, at=AT
    )
    stop.refresh_from_db()
    assert sorted(task.text for task in stop.tasks.all()) == ["gauging", "levels"]
    assert stop.hours == 1.5


def test_hours_that_cannot_be_are_refused(march, station, manager):
    with pytest.raises(Refusal) as refused:
        add(march, station, manager, hours=0)
    assert refused.value.field == "hours"


def test_a_round_that_was_made_stays_as_it_is(march, station, manager):
    acts.finish_round(round=march, by=manager, at=AT)
    with pytest.raises(Refusal, match="was made"):
        add(march, station, manager)


def test_choices_bring_what_is_due_by_the_last_day_as_tasks(march, station, manager):
    visited(station, LAST - timedelta(days=42), manager)
    chosen = round_choice.choices(march, at=AT)[0]
    assert "routine visit: last routine visit 32 days ago; every 42" in chosen.tasks
    assert chosen.position is None


def test_instruments_in_the_laboratory_say_since_when(march, office, manager):
    pair = meter(office)
    body = pair.body
    body.status = "calibration"
    body.save()
    changed_at = body.history.latest().history_date
    found = rounds.at_hand(office, status="calibration", at=changed_at + timedelta(days=9))
    assert [(one.instrument, one.days) for one in found] == [(body, 9)]
