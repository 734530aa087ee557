"""The drawing of a section keeps its shares and its water within the frame."""

import pytest

from network.numerics.gaugings.gauging_input import Bank, Channel, Vertical
from network.queries import gaugings
from network.queries.section_drawing import HEIGHT, SURFACE, WIDTH, drawing
from tests import field_world as world

pytestmark = pytest.mark.django_db


def points_of(polygon):
    return [tuple(map(float, pair.split(","))) for pair in polygon.split()]


def test_water_lies_below_its_surface_and_a_bar_stands_over_each_panel():
    found = gaugings.answer(world.sheet(world.station(), world.rated_meter()))
    drawn = drawing(found)
    inside = [p for polygon in drawn.water for p in points_of(polygon)]
    assert all(0 <= x <= WIDTH and SURFACE <= y <= HEIGHT for x, y in inside)
    assert len(drawn.bars) == 20
    assert all(bar.y >= 0 and bar.y + bar.height <= SURFACE for bar in drawn.bars)
    # shares of 4.9 % within and 5.9 % at the edges (0.6 of 10.2 m³/s): over 5 % is advice
    assert [bar.grade for bar in drawn.bars] == ["advice", *[""] * 18, "advice"]


def test_islands_ice_and_a_section_without_water():
    ice = tuple(Vertical(x, 1.0, mean_velocity_ms=0.4, ice_underside_m=0.2) for x in (1.0, 2.0))
    far = tuple(Vertical(x, 1.0, mean_velocity_ms=0.4) for x in (5.0, 6.0))
    channels = [Channel(Bank(0.0), Bank(3.0), ice), Channel(Bank(4.0), Bank(7.0), far)]
    where = world.station()
    drawn = drawing(gaugings.answer(world.sheet(where, channels=channels)))
    assert (len(drawn.water), len(drawn.ice), len(drawn.marks)) == (2, 1, 4)
    dry = Channel(Bank(0.0), Bank(3.0), (Vertical(1.0, 0.0),))
    assert drawing(gaugings.answer(world.sheet(where, channels=[dry]))) is None
