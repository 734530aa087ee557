"""Corrections for a line that the current carries downstream."""

import numpy as np
import pytest

from network.numerics.gaugings.sounding_lines import (
    air_line_correction_m,
    corrected_depth_m,
    wet_line_percent,
)


def arrays(*values):
    return [np.array([value], dtype=np.float64) for value in values]


@pytest.mark.parametrize(("angle_deg", "secant"), [(10, 1.015427), (20, 1.064178), (30, 1.154701)])
def test_air_line_goes_by_the_secant(angle_deg, secant):
    # 100(sec θ − 1) % of the vertical length; secants from a table of functions, 6 decimals.
    length, angle = arrays(10.0, angle_deg)
    assert air_line_correction_m(length, angle) == pytest.approx(10 * (secant - 1), abs=1e-5)


def test_wet_line_table_from_memory():
    # From memory (Coon & Futrell 1986 question it): angle → % of the wet length.
    table = {4: 0.06, 8: 0.32, 12: 0.72, 16: 1.28, 20: 2.04, 24: 2.96, 28: 4.08, 30: 4.72}
    assert wet_line_percent(np.array(list(table), float)) == pytest.approx(list(table.values()))


def test_depth_under_an_inclined_line_by_hand():
    # 5 m of air line at 20°: 5·0.064178 = 0.32089 m too much; 3 − 0.32089 = 2.67911 m wet;
    # less 2.04 %: 2.62446 m.
    depth, angle, air = arrays(3.0, 20.0, 5.0)
    corrected = corrected_depth_m(depth, angle_deg=angle, air_line_m=air)
    assert corrected == pytest.approx(2.62446, abs=1e-5)


def test_a_plumb_line_needs_no_correction():
    depth, angle, air = arrays(3.0, 0.0, 5.0)
    assert corrected_depth_m(depth, angle_deg=angle, air_line_m=air) == 3.0
