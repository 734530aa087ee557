"""The trail joins the rows one act changed, and shows old and new in words."""

from datetime import UTC, datetime

import pytest

from network.models import OperationPeriod, Station
from network.queries import trail
from network.services.acts import open_act
from tests.people import make_station

pytestmark = pytest.mark.django_db
AT = datetime(2024, 5, 1, 9, tzinfo=UTC)


@pytest.fixture
def acts(office, manager):
    """A station made, then changed together with its period; another station made."""
    with open_act("add station", by=manager, at=AT) as first:
        station = make_station(office)
    with open_act("change station", by=manager, at=AT, reason="typed wrong") as second:
        station.kind = Station.Kind.WEIR
        station.catchment_km2 = None
        station.save()
        period = station.operation_periods.get()
        period.closed_on = "2024-04-30"
        period.save()
    with open_act("add station", by=manager, at=AT):
        make_station(office, code="TE-020")
    return station, first, second


def test_a_rows_acts_are_those_that_changed_it_or_what_it_owns(acts):
    station, first, second = acts
    assert list(trail.acts_on(station)) == [second, first]
    period = OperationPeriod.objects.get(station=station)
    assert list(trail.acts_on(period)) == [second, first]


def test_acts_on_a_station_count_without_a_changed_row(acts, manager):
    station, first, second = acts
    with open_act("review record", by=manager, at=AT, station=station) as third:
        assert third.station == station
    assert list(trail.acts_on(station)) == [third, second, first]


def test_parent_and_child_read_as_one_change_with_old_and_new(acts):
    _station, _first, second = acts
    [entry] = trail.entries([second])
    changed = {
        (row.name, row.kind, field.label, field.old, field.new)
        for row in entry.rows
        for field in row.fields
    }
    assert changed == {
        ("station", "~", "kind", "stage–discharge station", "weir"),
        ("station", "~", "catchment area, km²", "312.0", "–"),
        ("period of operation", "~", "closed", "–", "2024-04-30"),
    }


def test_an_added_row_names_what_was_filled_in(acts):
    _station, first, _second = acts
    [entry] = trail.entries([first])
    added = {row.name: {f.label: f.new for f in row.fields} for row in entry.rows}
    assert added["station"]["office"] == "Oberau"
    assert added["station"]["river"] == "Tessel"
    assert "version" not in added["station"]
    assert added["period of operation"]["opened"] == "2019-01-01"


def test_a_page_of_acts_takes_a_bounded_number_of_queries(acts, django_assert_max_num_queries):
    station, *_ = acts
    with django_assert_max_num_queries(80):
        trail.entries(list(trail.acts_on(station)))
