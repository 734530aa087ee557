"""Plates, zeros and benchmarks: what may be said of them, and when a moved zero is whole."""

from datetime import timedelta
from uuid import uuid4

import pytest

from network.models import BenchmarkElevation, OtherGauge, StationZero
from network.queries import gauges as answers
from network.queries.visit_sheet import ReadingRow
from network.services import benchmarks, gauges, station_zeros, visits
from network.services.acts import Refusal
from network.services.station_zeros import NewGaugeZero, NewPlateZero, NewRating, NewSetting
from tests import field_world
from tests import gauge_world as world
from tests.gauge_world import LATER, LEVELLED, SINCE, plate, signed

pytestmark = pytest.mark.django_db


@pytest.fixture
def where():
    return world.gauged(field_world.station())


def version(where):
    where.refresh_from_db()
    return where.record_version


def stage(where, label, reading_m, at=LEVELLED):
    return answers.stage_m(ReadingRow(read_at=at, plate=plate(where, label), reading_m=reading_m))


def test_a_reading_becomes_a_stage_by_the_zero_in_force_then(where):
    gauges.set_plate_zero(
        plate=plate(where, "P2"), zero_m=1.02, effective_from=LEVELLED, **signed()
    )
    before = stage(where, "P2", 0.5, LEVELLED - timedelta(seconds=1))
    assert (before, stage(where, "P2", 0.5)) == (1.5, pytest.approx(1.52))


def test_a_dipper_measures_down_from_its_zero(where):
    dipper = gauges.add_other_gauge(
        station=where, kind=OtherGauge.Kind.DIPPER, label="D", installed_at=SINCE, zero_m=4.0,
        **signed(),
    )  # fmt: skip
    reading = ReadingRow(read_at=LEVELLED, other_gauge=dipper, reading_m=3.25)
    assert answers.stage_m(reading) == pytest.approx(0.75)


def test_a_withdrawn_zero_gives_way_to_the_one_before_and_both_raise_the_version(where):
    first = version(where)
    zero = gauges.set_plate_zero(
        plate=plate(where, "P2"), zero_m=1.02, effective_from=LEVELLED, **signed()
    )
    second = version(where)
    gauges.withdraw_plate_zero(zero=zero, **signed())
    assert first < second < version(where)
    assert stage(where, "P2", 0.5) == 1.5


def test_benchmarks_carry_no_figure(where):
    first = version(where)
    mark = where.benchmarks.get()
    row = benchmarks.set_elevation(
        benchmark=mark, elevation_m=100.01, effective_from=LEVELLED, **signed()
    )
    benchmarks.withdraw_elevation(elevation=row, **signed())
    assert version(where) == first
    assert BenchmarkElevation.objects.standing().filter(benchmark=mark).count() == 1


def test_two_zeros_from_one_instant_are_refused_with_a_sentence(where):
    with pytest.raises(Refusal, match="already starts at this instant"):
        gauges.set_plate_zero(plate=plate(where, "P1"), zero_m=1, effective_from=SINCE, **signed())


@pytest.mark.parametrize("zero_m", [float("nan"), 12345.0])
def test_a_height_that_cannot_be_is_refused_at_its_field(where, zero_m):
    with pytest.raises(Refusal) as refused:
        gauges.set_plate_zero(
            plate=plate(where, "P1"), zero_m=zero_m, effective_from=LEVELLED, **signed()
        )
    assert refused.value.field == "zero_m"


def test_a_plate_read_later_is_not_taken_down_before(where):
    reading = ReadingRow(read_at=LEVELLED, plate=plate(where, "P1"), reading_m=0.5)
    visits.save_visit(
        form_id=uuid4(),
        sheet=world.visit_sheet(where, readings=(reading,)),
        by=field_world.person(),
        at=LATER,
    )
    with pytest.raises(Refusal) as refused:
        gauges.remove_plate(plate=plate(where, "P1"), removed_at=LEVELLED, **signed())
    assert refused.value.field == "removed_at"
    gauges.remove_plate(
        plate=plate(where, "P1"), removed_at=LEVELLED + timedelta(hours=1), **signed()
    )
    labels = [then.plate.label for then in answers.plates_in_service(where, LATER)]
    assert labels == ["P2"]


def test_a_label_is_free_again_once_its_plate_is_down(where):
    new = {"station": where, "label": "P1", "lowest_m": 0.0, "highest_m": 1.0} | signed()
    with pytest.raises(Refusal, match="still stands"):
        gauges.install_plate(installed_at=LEVELLED, **new)
    gauges.remove_plate(plate=plate(where, "P1"), removed_at=LEVELLED, **signed())
    assert gauges.install_plate(installed_at=LEVELLED, **new).label == "P1"


def zero(where, **changes):
    given = {"station": where, "elevation_m": 97.5, "datum_name": "NN", "effective_from": LEVELLED}
    return station_zeros.set_station_zero(**given | signed() | changes)


def test_an_elevation_determined_anew_changes_nothing_else(where):
    first = version(where)
    zero(where)
    assert version(where) == first
    assert stage(where, "P2", 0.5) == 1.5
    with pytest.raises(Refusal, match="did not move"):
        zero(where, rating=NewRating(curve=None))


def test_a_moved_zero_names_what_is_missing_and_leaves_nothing_behind(where):
    field_world.rate(where)
    gauges.add_other_gauge(
        station=where, kind="wire", label="W", installed_at=SINCE, zero_m=5.0, **signed()
    )
    with pytest.raises(Refusal) as refused:
        zero(
            where,
            kind=StationZero.Kind.MOVED,
            plate_zeros=[NewPlateZero(plate=plate(where, "P1"), zero_m=0.5)],
        )
    said = refused.value.sentence
    assert all(part in said for part in ("plate P2", "gauge W", "series float", "the rating"))
    assert "P1" not in said
    assert StationZero.objects.count() == 1
    assert stage(where, "P1", 0.5) == 0.5


def test_a_moved_zero_takes_all_in_one_act_and_is_withdrawn_with_all(where):
    curve = field_world.rate(where)
    wire = gauges.add_other_gauge(
        station=where, kind="wire", label="W", installed_at=SINCE, zero_m=5.0, **signed()
    )
    acts = where.acts.count()
    moved = zero(
        where,
        kind=StationZero.Kind.MOVED,
        plate_zeros=[
            NewPlateZero(plate=plate(where, label), zero_m=zero_m)
            for label, zero_m in (("P1", 0.5), ("P2", 1.5))
        ],
        gauge_zeros=[NewGaugeZero(gauge=wire, zero_m=5.5)],
        settings=[NewSetting(series=where.series.get(), offset_m=0.5)],
        rating=NewRating(curve=curve),
    )
    assert where.acts.count() == acts + 1
    assert stage(where, "P2", 0.5) == 2.0
    station_zeros.withdraw_station_zero(zero=moved, **signed())
    assert stage(where, "P2", 0.5) == 1.5
    assert where.rating_periods.standing().count() == 1
