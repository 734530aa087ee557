"""The live answer: few queries, the kernel's numbers, held against the rating in force."""

import uuid
from datetime import timedelta

import pytest

from network.models import Agency, PlateZero, RatingPeriod, StaffPlate
from network.numerics.gaugings.gauging_input import Bank, Channel, Point, Vertical
from network.numerics.gaugings.other_methods import Fill
from network.queries import clock, gaugings
from network.queries.field_sheets import (
    Boat,
    Crossing,
    Fills,
    Floats,
    Sample,
    StageRow,
    TimedFloat,
    Tracer,
    Weir,
    of_gauging,
)
from network.services import gaugings as acts
from network.services import ratings
from tests import field_world as world

pytestmark = pytest.mark.django_db


@pytest.fixture
def where():
    found = world.station()
    world.rate(found)
    return found


@pytest.fixture
def pair():
    return world.rated_meter()


def plate(where, zero_m):
    row = StaffPlate.objects.create(
        station=where, label="0-2", lowest_m=0, highest_m=2, installed_at=world.EARLY
    )
    zero(row, world.EARLY, zero_m)
    return row


def zero(row, since, zero_m):
    PlateZero.objects.create(
        plate=row, effective_from=since, zero_m=zero_m, reason="levels",
        recorded_by=world.person(), recorded_at=since,
    )  # fmt: skip


def test_the_live_answer_needs_three_queries(where, pair, django_assert_max_num_queries):
    sheet = world.sheet(where, pair)
    own = clock.agency()
    with django_assert_max_num_queries(3):
        found = gaugings.answer(sheet, agency=own)
    assert found.discharge_m3s == pytest.approx(10.2)
    assert found.rated_m3s == pytest.approx(22.5)


def test_shifts_in_force_move_the_rating(where, pair):
    period = RatingPeriod.objects.get(station=where)
    for days, shift_m, joins in ((0, 0.0, "linear"), (20, 0.2, "step")):
        ratings.add_shift_table(
            period=period,
            effective_from=world.NOON + timedelta(days=days - 10, minutes=30),
            points=[(0.0, shift_m), (3.0, shift_m)],
            joins=joins,
            reason="scour",
            by=world.person(),
            at=world.NOON,
        )
    found = gaugings.answer(world.sheet(where, pair))
    # Half-way between the tables in time the shift is 0.1 m: 10·(1.5 + 0.1)² = 25.6.
    assert found.rated_m3s == pytest.approx(25.6)


def test_plates_are_read_by_the_zero_in_force_and_a_later_levelling_moves_old_stages(where, pair):
    row = plate(where, 0.4)
    stages = tuple(StageRow(world.NOON + timedelta(hours=h), 1.1, row) for h in (0, 1))
    sheet = world.sheet(where, pair)
    sheet = type(sheet)(sheet.heading, stages, sheet.channels)
    assert gaugings.answer(sheet).stage.stage_m == pytest.approx(1.5)
    stored = acts.save(sheet=sheet, form_id=uuid.uuid4(), by=world.person(), at=world.NOON)
    stored = acts.sign(gauging=stored, version=1, by=world.person(), at=world.NOON)
    zero(row, world.NOON - timedelta(days=3), 0.45)
    assert gaugings.of_stored(stored).stage.stage_m == pytest.approx(1.55)
    assert gaugings.stages_of([stored]) == {stored.pk: pytest.approx(1.55)}
    assert stored.signed_stage_m == pytest.approx(1.5)


def test_a_rising_stage_is_weighed_by_the_flow_the_same_live_and_stored(where, pair):
    sheet = world.sheet(where, pair, stages=(1.5, 1.9))
    found = gaugings.answer(sheet)
    assert found.stage.weighted_by_flow
    row = acts.save(sheet=sheet, form_id=uuid.uuid4(), by=world.person(), at=world.NOON)
    row = acts.sign(gauging=row, version=1, by=world.person(), at=world.NOON)
    assert gaugings.stages_of([row])[row.pk] == row.signed_stage_m == found.stage.stage_m


def test_two_channels_with_an_island_under_ice(where, pair):
    """Worked by hand: under ice 0.6 depth × 0.92, effective depth 1.0 − 0.2 = 0.8 m."""
    vertical = Vertical(2.0, 1.0, (Point(0.6, velocity_ms=0.5),), ice_underside_m=0.2)
    three = [Vertical(x, 1.0, vertical.points, ice_underside_m=0.2) for x in (1.0, 2.0, 3.0)]
    near = Channel(Bank(0.0), Bank(4.0), tuple(three))
    further = tuple(Vertical(v.distance_m + 6, 1.0, v.points, ice_underside_m=0.2) for v in three)
    far = Channel(Bank(6.0), Bank(10.0), further)
    one, both = (
        gaugings.answer(world.sheet(where, pair, channels=channels))
        for channels in ([near], [near, far])
    )
    # v = 0.5·0.92 = 0.46. Mid-section 0.46·0.8·(1 + 1 + 1) = 1.104; mean-section with sloping
    # edges (0.7) of half a metre's depth: 0.46·(2·0.8 + 2·0.7·0.4) = 0.9936.
    assert one.result.mid_section_m3s == pytest.approx(1.104)
    assert one.result.mean_section_m3s == pytest.approx(0.9936)
    assert both.discharge_m3s == pytest.approx(2 * one.discharge_m3s)


def test_other_methods_state_their_own_uncertainty(where):
    boat = Boat(tuple(Crossing(q, 400.0, k % 2 == 0) for k, q in enumerate((20.0, 21.0, 20.4))))
    floats = Floats(10.0, tuple(TimedFloat(k, 2.0, 20.0) for k in (1, 2, 3)))
    fills = Fills((Fill(0.01, 5.0), Fill(0.01, 5.2), Fill(0.01, 4.8)))
    rate = Tracer((Sample(1, 0.101), Sample(2, 0.101)), 0.001, 0.0001, 100.0)
    notch = Weir("v", 0.2, 0.5, 3.0, angle_deg=90.0)
    for method, other, expected in (
        ("acoustic", boat, ((20.0 + 20.4) / 2 + 21.0) / 2),
        ("float", floats, 0.86 * 3 * 2.0 * 0.5),
        ("volume", fills, (0.01 / 5 + 0.01 / 5.2 + 0.01 / 4.8) / 3),
        ("dilution", rate, 0.0001 * (100 - 0.101) / 0.1),
        # Q = Cd·8/15·√(2g)·h^2.5 with Cd 0.578 and 0.9 mm added to the head (ISO 1438, 90°).
        ("weir", notch, 0.578 * 8 / 15 * (2 * 9.80665) ** 0.5 * 0.2009**2.5),
    ):
        sheet = world.sheet(where, channels=(), other=other, method=method, stated_u95_percent=4.0)
        found = gaugings.answer(sheet)
        assert found.discharge_m3s == pytest.approx(expected, rel=2e-3), method
        assert found.u95_percent > 0
        row = acts.save(sheet=sheet, form_id=uuid.uuid4(), by=world.person(), at=world.NOON)
        assert of_gauging(row) == sheet
        row = acts.sign(gauging=row, version=1, by=world.person(), at=world.NOON)
        assert row.discharge_m3s == found.discharge_m3s


def test_a_result_without_an_uncertainty_is_asked_for(where):
    sheet = world.sheet(where, channels=(), method="acoustic", stated_discharge_m3s=12.0)
    (fault,) = gaugings.answer(sheet).faults
    assert fault.field == "stated_u95_percent"


def test_the_agency_chooses_the_method_that_is_the_result(where, pair):
    Agency.objects.update(result_method="mean")
    found = gaugings.answer(world.sheet(where, pair))
    assert found.discharge_m3s == found.result.mean_section_m3s
