"""Mean velocity of a vertical from its points."""

import pytest

from network.numerics.gaugings.gauging import compute
from network.numerics.gaugings.gauging_input import GaugingSettings, Point
from network.numerics.gaugings.verticals import point_method
from tests.numerics.sheets import plain_sheet

# A profile: fraction of the depth → m/s.
PROFILE = {0.0: 1.00, 0.2: 0.95, 0.4: 0.85, 0.5: 0.80, 0.6: 0.70, 0.8: 0.50, 1.0: 0.20}


def mean_of(*fractions, settings=None, **vertical):
    points = tuple(Point(f, velocity_ms=PROFILE[f]) for f in fractions)
    sheet = plain_sheet(points=points, depth_m=2.0, **vertical)
    result = compute(sheet, settings) if settings else compute(sheet)
    return result.verticals[1].velocity_ms


@pytest.mark.parametrize(
    ("fractions", "expected"),
    [
        # Weights of ISO 748 and WMO-No. 1044 (from memory), reckoned by hand on the profile.
        ((0.6,), 0.70),
        ((0.5,), 0.80 * 0.95),
        ((0.2, 0.8), 0.725),
        ((0.2, 0.6, 0.8), (0.95 + 1.40 + 0.50) / 4),
        ((0.0, 0.2, 0.6, 0.8, 1.0), (1.00 + 2.85 + 2.10 + 1.00 + 0.20) / 10),
        ((0.0, 0.2, 0.4, 0.6, 0.8, 1.0), (1.00 + 1.90 + 1.70 + 1.40 + 1.00 + 0.20) / 10),
        ((0.0,), 0.86),
    ],
)
def test_every_set_of_points(fractions, expected):
    assert mean_of(*fractions) == pytest.approx(expected, abs=1e-12)
    assert mean_of(*reversed(fractions)) == pytest.approx(expected, abs=1e-12)


def test_a_lined_channel_has_its_own_surface_coefficient():
    # 0.86 natural, 0.90 lined: USGS WSP 2175 p. 170 (read).
    assert mean_of(0.0, settings=GaugingSettings(surface_factor=0.90)) == pytest.approx(0.90)


@pytest.mark.parametrize(("angle_deg", "cosine"), [(10, 0.9848), (20, 0.9397), (-30, 0.8660)])
def test_oblique_flow_goes_by_the_cosine(angle_deg, cosine):
    # Cosines as printed, 4 decimals.
    assert mean_of(0.6, angle_deg=angle_deg) / 0.70 == pytest.approx(cosine, abs=5e-5)


@pytest.mark.parametrize(("fraction", "factor"), [(0.6, 0.92), (0.5, 0.88)])
def test_one_point_under_ice_has_its_factor(fraction, factor):
    # ISO 9196; factors from the design.
    mean_ms = mean_of(fraction, ice_underside_m=0.3)
    assert mean_ms == pytest.approx(PROFILE[fraction] * factor)


def test_an_odd_set_of_points_makes_no_method():
    assert point_method((0.3, 0.7)) is None
    assert point_method((0.8, 0.2)).method.name == "TWO_POINTS"
