"""The drawing of plates puts stages where they belong and shows every hole."""

import pytest

from network.queries import plates_drawing
from network.services import gauges
from tests import field_world
from tests import gauge_world as world
from tests.gauge_world import LEVELLED, plate, signed

pytestmark = pytest.mark.django_db


@pytest.fixture
def where():
    return world.gauged(field_world.station())


def test_plates_stand_to_scale_and_share_their_overlap(where):
    # P1 stage 0 to 1.2, P2 stage 1 to 3: 320 units for 3 m.
    found = plates_drawing.drawing(where, LEVELLED)
    first, second = found.bars
    unit = 320 / 3
    assert (first.bottom_m, first.top_m, second.bottom_m, second.top_m) == (0, 1.2, 1, 3)
    assert first.height == pytest.approx(1.2 * unit, abs=0.01)
    assert first.y + first.height == pytest.approx(second.y + 3 * unit, abs=0.02)
    (band,) = found.bands
    assert (band.is_hole, band.is_short) == (False, False)
    assert band.height == pytest.approx(0.2 * unit, abs=0.01)
    assert [tick.stage_m for tick in found.ticks][:3] == [0, 0.5, 1.0]
    assert found.findings == ()


def test_a_hole_is_drawn_and_named(where):
    gauges.set_plate_zero(plate=plate(where, "P2"), zero_m=1.3, effective_from=LEVELLED, **signed())
    found = plates_drawing.drawing(where, LEVELLED)
    (band,) = found.bands
    assert band.is_hole
    assert (band.from_m, band.to_m) == (pytest.approx(1.2), pytest.approx(1.3))
    assert [finding.kind for finding in found.findings] == ["hole"]


def test_without_plates_there_is_no_drawing(where):
    assert plates_drawing.drawing(field_world.station("B2"), LEVELLED) is None
