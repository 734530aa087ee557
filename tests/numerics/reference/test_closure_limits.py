"""Closure limits of level runs against the published table."""

import pytest

from network.numerics.levels.levelling import LevelLimits

FOOT_MM = 304.8

# Kenney 2010, USGS TM 3-A19: 0.003·√n ft, never above 0.015 ft, by number of set-ups.
LIMITS_FT = {1: 0.0030, 4: 0.0060, 9: 0.0090, 25: 0.0150, 36: 0.0150}


@pytest.mark.parametrize(("set_ups", "limit_ft"), LIMITS_FT.items())
def test_the_rule_in_feet_gives_the_published_table(set_ups, limit_ft):
    in_feet = LevelLimits(misclosure_mm_per_root=0.003 * FOOT_MM, misclosure_cap_mm=0.015 * FOOT_MM)
    assert in_feet.misclosure_mm(set_ups) / FOOT_MM == pytest.approx(limit_ft, abs=1e-9)


@pytest.mark.parametrize(("set_ups", "limit_ft"), LIMITS_FT.items())
def test_the_usual_limits_are_the_table_in_tenths_of_a_millimetre(set_ups, limit_ft):
    # 0.9144 and 4.572 mm are rounded to 0.9 and 4.6 mm: 1.6 % of the limit at most
    limit_mm = LevelLimits().misclosure_mm(set_ups)
    assert limit_mm == pytest.approx(limit_ft * FOOT_MM, rel=0.016)
