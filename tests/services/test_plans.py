"""Work put off, inspections and intervals: what is done, refused, and said about it."""

from datetime import date, timedelta

import pytest

from network.models import Act, KindInterval, Postponement, Station, WorkingRules
from network.queries.work_due.items import Kind
from network.queries.work_due.work_list import work_list
from network.services import plans
from network.services.acts import Refusal
from tests.people import make_station
from tests.work_rows import cableway, gauged, levelled, meter, noon, visited

TODAY = date(2024, 3, 1)
AT = noon(TODAY)
pytestmark = pytest.mark.django_db


@pytest.fixture
def late(agency, station, record_keeper):
    """A station whose visit is 8 days late, and nothing else."""
    visited(station, TODAY - timedelta(days=50), record_keeper)
    levelled(station, TODAY, record_keeper)
    gauged(station, TODAY, record_keeper)
    return station


def put_off(station, by, **changes):
    told = {
        "kind": Kind.VISIT, "subject": f"station-{station.pk}", "station": station,
        "until": TODAY + timedelta(days=30), "reason": "ice until April", "by": by, "at": AT,
    }  # fmt: skip
    return plans.postpone(**{**told, **changes})


def lines():
    return work_list(AT).lines


def test_work_put_off_leaves_the_list_with_an_act_that_says_why(late, field_person):
    put_off(late, field_person)
    assert lines() == ()
    act = Act.objects.get()
    assert (act.done_by, act.reason, act.station) == (field_person, "ice until April", late)


def test_work_put_off_anew_takes_the_new_day(late, field_person):
    put_off(late, field_person)
    put_off(late, field_person, until=TODAY + timedelta(days=60))
    standing = Postponement.objects.standing().get()
    assert standing.until == TODAY + timedelta(days=60)
    assert Postponement.objects.count() == 2


def test_a_postponement_withdrawn_brings_the_work_back(late, field_person, manager):
    row = put_off(late, field_person)
    plans.withdraw_postponement(postponement=row, by=manager, at=AT, reason="road is open")
    assert [line.kind for line in lines()] == [Kind.VISIT]
    with pytest.raises(Refusal, match="withdrawn already"):
        plans.withdraw_postponement(postponement=row, by=manager, at=AT, reason="again")


@pytest.mark.parametrize(
    ("changes", "field"), [({"until": TODAY}, "until"), ({"reason": "  "}, "reason")]
)
def test_work_is_put_off_to_a_day_ahead_and_with_a_reason(late, field_person, changes, field):
    with pytest.raises(Refusal) as refused:
        put_off(late, field_person, **changes)
    assert refused.value.field == field
    assert not Postponement.objects.exists()


def test_an_inspection_takes_a_cableway_off_the_list(late, field_person):
    item = cableway(late)
    plans.record_inspection(item=item, inspected_on=TODAY, is_safe=True, by=field_person, at=AT)
    assert Kind.SAFETY not in [line.kind for line in lines()]


def test_an_inspection_withdrawn_puts_it_back(late, manager):
    item = cableway(late)
    row = plans.record_inspection(item=item, inspected_on=TODAY, is_safe=True, by=manager, at=AT)
    plans.withdraw_inspection(inspection=row, by=manager, at=AT, reason="another cableway")
    assert lines()[0].kind == Kind.SAFETY


@pytest.mark.parametrize(
    ("told", "field"),
    [
        ({"inspected_on": TODAY + timedelta(days=1), "is_safe": True}, "inspected_on"),
        ({"inspected_on": TODAY, "is_safe": False}, "remarks"),
    ],
)
def test_an_inspection_lies_behind_us_and_a_fault_has_words(late, field_person, told, field):
    with pytest.raises(Refusal) as refused:
        plans.record_inspection(item=cableway(late), by=field_person, at=AT, **told)
    assert refused.value.field == field


def test_a_change_of_intervals_says_how_many_items_it_makes_due(late, manager):
    second = make_station(late.office, code="TE-020", name="Au")
    for days, act in ((10, visited), (0, levelled), (0, gauged)):
        act(second, TODAY - timedelta(days=days), manager)
    rules = WorkingRules.objects.get()
    tried = plans.try_intervals(row=rules, values={"visit_days": 7}, at=AT)
    assert (tried.before, tried.after, tried.made_due) == (1, 2, 1)
    assert WorkingRules.objects.get().visit_days == 42
    assert not Act.objects.exists()
    done = plans.change_intervals(row=rules, values={"visit_days": 7}, by=manager, at=AT)
    assert done == tried
    assert WorkingRules.objects.get().visit_days == 7


def test_a_station_speaks_of_its_own_items_only(late, manager):
    make_station(late.office, code="TE-020", name="Au")
    change = plans.change_intervals(
        row=late, values={"visit_interval_days": 90}, by=manager, at=AT, reason="quiet river"
    )
    assert (change.before, change.after) == (1, 0)
    assert Station.objects.get(pk=late.pk).version == late.version + 1
    assert Act.objects.get().station == late


def test_an_interval_of_a_kind_and_of_an_instrument(late, manager, office):
    pair = meter(office, date(2023, 8, 1), manager)
    kind = KindInterval.objects.create(kind="body")
    change = plans.change_intervals(row=kind, values={"months": 6}, by=manager, at=AT)
    assert change.made_due == 1
    change = plans.change_intervals(
        row=pair.body, values={"interval_months": 24}, by=manager, at=AT
    )
    assert change.made_due == -1


def test_an_interval_of_zero_is_refused_at_its_field(late, manager):
    with pytest.raises(Refusal) as refused:
        plans.change_intervals(row=late, values={"visit_interval_days": 0}, by=manager, at=AT)
    assert refused.value.field == "visit_interval_days"


def test_only_intervals_are_changed_here(late, manager):
    with pytest.raises(ValueError, match="no interval"):
        plans.change_intervals(row=late, values={"record_version": 1}, by=manager, at=AT)
