"""Great-circle distances against a published example."""

import numpy as np
import pytest

from network.numerics.great_circle import EARTH_RADIUS_KM, distance_km


def test_the_published_distance_from_los_angeles_to_new_york():
    # Ed Williams, Aviation Formulary: LAX 33°57′N 118°24′W, JFK 40°38′N 73°47′W, 0.623585 rad
    # (2144 nautical miles). Given to six figures, hence the tolerance.
    found = distance_km(
        33 + 57 / 60,
        -(118 + 24 / 60),
        to_latitude_deg=40 + 38 / 60,
        to_longitude_deg=-(73 + 47 / 60),
    )
    assert found / EARTH_RADIUS_KM == pytest.approx(0.623585, abs=1e-6)
    assert found == pytest.approx(2144 * 1.852, rel=1e-3)


def test_a_quarter_of_the_equator_and_the_way_over_the_date_line():
    # the arc is angle times radius: 90° and 2°
    quarter = distance_km(0.0, 0.0, to_latitude_deg=0.0, to_longitude_deg=90.0)
    across = distance_km(0.0, 179.0, to_latitude_deg=0.0, to_longitude_deg=-179.0)
    assert quarter == pytest.approx(EARTH_RADIUS_KM * np.pi / 2)
    assert across == pytest.approx(EARTH_RADIUS_KM * np.radians(2))


def test_places_a_metre_apart_are_not_lost():
    # one metre of latitude: 1 / (R·π/180) degrees
    step_deg = 0.001 / (EARTH_RADIUS_KM * np.pi / 180)
    found = distance_km(47.0, 11.0, to_latitude_deg=47.0 + step_deg, to_longitude_deg=11.0)
    assert found == pytest.approx(0.001, rel=1e-4)


def test_arrays_pair_up():
    found = distance_km(
        np.array([0.0, 10.0]), np.array([0.0, 20.0]),
        to_latitude_deg=np.array([0.0, 10.0]), to_longitude_deg=np.array([1.0, 20.0]),
    )  # fmt: skip
    assert found == pytest.approx([EARTH_RADIUS_KM * np.radians(1), 0])


def test_there_is_no_place_beyond_the_pole():
    with pytest.raises(ValueError, match="90"):
        distance_km(91.0, 0.0, to_latitude_deg=0.0, to_longitude_deg=0.0)
