"""Discharges by velocity and area against published worked examples."""

import numpy as np
import pytest

from network.numerics.gaugings.gauging import compute
from network.numerics.gaugings.gauging_input import (
    Bank,
    Channel,
    DischargeMethod,
    Edge,
    GaugingSettings,
    Sheet,
    Vertical,
)

FT_M = 0.3048
FT3_M3 = FT_M**3

# W1: Ghilani, Elementary Surveying, 15th ed., problem 26.28 (read). The eighth distance is printed
# 74, an evident misprint: only 70 gives the stated result.
W1_DISTANCE_FT = [0, 10, 20, 30, 40, 50, 60, 70, 80, 90, 100, 108, 116]
W1_DEPTH_FT = [1.0, 2.3, 3.0, 2.7, 2.4, 3.0, 3.1, 3.0, 2.8, 3.3, 2.0, 2.2, 1.5]
W1_VELOCITY_FTS = [0, 1.30, 1.54, 1.90, 1.95, 1.60, 1.70, 1.70, 1.54, 1.24, 0.58, 0.28, 0]

# W3: Zalepukhin, Gidrologiya, method guide 2001, table 4 (read): soundings between the verticals.
W3_DISTANCE_M = [21, 25, 30, 35, 40, 45, 50, 55, 60, 65, 70, 75, 80, 85, 90, 93]
W3_DEPTH_M = [
    *[0.00, 0.60, 1.70, 2.40, 2.40, 2.25, 2.05, 1.95],
    *[1.70, 1.55, 1.42, 1.53, 1.61, 1.56, 1.05, 0.00],
]
W3_VELOCITY_MS = {30: 0.387, 40: 0.771, 50: 0.727, 60: 0.642, 70: 0.541, 80: 0.469}

# M1: Chow, Maidment & Mays, Applied Hydrology, table 6.3.1 (from memory).
M1_DISTANCE_FT = [
    *[0, 12, 32, 52, 72, 92, 112, 132, 152, 167, 182],
    *[197, 212, 227, 242, 257, 272, 287, 302, 317, 325],
]
M1_DEPTH_FT = [
    *[0, 3.1, 4.4, 4.6, 5.7, 4.5, 4.4, 5.4, 6.1, 5.8, 5.7],
    *[5.1, 6.0, 6.5, 7.2, 7.2, 8.2, 5.5, 3.6, 3.2, 0],
]
M1_VELOCITY_FTS = [
    *[0, 0.37, 0.87, 1.09, 1.34, 0.71, 0.87, 1.42, 2.03, 2.22, 2.51],
    *[3.06, 3.12, 2.96, 2.62, 2.04, 1.56, 2.04, 1.57, 1.18, 0],
]


def in_feet(distance, depth, velocity):
    """Give a sheet of one channel from columns in feet; the first and last row are the banks."""
    x, d, v = (FT_M * np.array(column) for column in (distance, depth, velocity))
    rows = [
        Vertical(float(xi), float(di), mean_velocity_ms=float(vi))
        for xi, di, vi in zip(x[1:-1], d[1:-1], v[1:-1], strict=True)
    ]
    first = Bank(float(x[0]), float(d[0]), velocity_ms=float(v[0]))
    last = Bank(float(x[-1]), float(d[-1]), velocity_ms=float(v[-1]))
    return Sheet((Channel(first, last, tuple(rows)),))


BY_MEAN = GaugingSettings(method=DischargeMethod.MEAN_SECTION)


@pytest.fixture
def w1():
    return compute(in_feet(W1_DISTANCE_FT, W1_DEPTH_FT, W1_VELOCITY_FTS), BY_MEAN)


@pytest.fixture
def w3():
    verticals = tuple(
        Vertical(x, d, mean_velocity_ms=W3_VELOCITY_MS.get(x))
        for x, d in zip(W3_DISTANCE_M[1:-1], W3_DEPTH_M[1:-1], strict=True)
    )
    banks = [Bank(x, edge=Edge.TWO_THIRDS) for x in (21, 93)]
    return compute(Sheet((Channel(*banks, verticals),)))


@pytest.fixture
def m1():
    return compute(in_feet(M1_DISTANCE_FT, M1_DEPTH_FT, M1_VELOCITY_FTS))


def test_w1_gives_the_stated_mean_section_discharge(w1):
    # Stated 419.3; the same sum to two decimals 419.35, area 302.60, mid-section 425.31.
    assert w1.discharge_m3s / FT3_M3 == pytest.approx(419.35, abs=0.005)
    assert w1.section.area_m2 / FT_M**2 == pytest.approx(302.60, abs=0.005)
    assert w1.mid_section_m3s / FT3_M3 == pytest.approx(425.31, abs=0.005)


def test_w1_findings_fire(w1):
    kinds = [finding.kind for finding in w1.findings]
    assert len(w1.mean_panels) == 12
    assert kinds.count("panel_share") == 7
    assert kinds.count("neighbours") == 5
    assert kinds.count("few_verticals") == 1
    assert "outlier" not in kinds


def test_averaging_v_times_d_would_give_the_mid_section_total(w1):
    # The common mistake: (v₁d₁ + v₂d₂)/2 instead of the product of the averages.
    x, d, v = (np.array(c, float) for c in (W1_DISTANCE_FT, W1_DEPTH_FT, W1_VELOCITY_FTS))
    wrong = np.sum(np.diff(x) * ((v * d)[1:] + (v * d)[:-1]) / 2)
    assert wrong == pytest.approx(w1.mid_section_m3s / FT3_M3, abs=1e-9)
    assert w1.mean_section_m3s / FT3_M3 < wrong - 5


def test_w3_gives_the_stated_discharge_with_soundings_between_verticals(w3):
    # Stated 66.4 with small slips in the printed areas: ±0.1. The edge factor applied twice
    # would give 68.12.
    assert w3.mean_section_m3s == pytest.approx(66.4, abs=0.1)
    flows = [panel.flow_m3s for panel in w3.mean_panels]
    # Zone flows as printed; ±0.06 for the slips in the printed areas.
    assert flows == pytest.approx([1.79, 12.88, 16.74, 13.08, 9.17, 7.69, 5.01], abs=0.06)


def test_m1_gives_the_stated_mid_section_discharge(m1):
    # From memory: 3061 ft³/s (3061.4), area 1685 ft², largest panel 9.4 %.
    assert m1.discharge_m3s / FT3_M3 == pytest.approx(3061.4, abs=0.05)
    assert m1.section.area_m2 / FT_M**2 == pytest.approx(1685, abs=0.5)
    assert 100 * max(panel.share for panel in m1.panels) == pytest.approx(9.4, abs=0.05)
    assert "panel_share" not in [finding.kind for finding in m1.findings]
