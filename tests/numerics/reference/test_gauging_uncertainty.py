"""Uncertainty of a gauging against ISO 748:2007 as printed in Morgenschweis and Adler."""

import numpy as np
import pytest

from network.numerics.gaugings.gauging import compute
from network.numerics.gaugings.gauging_input import Bank, Channel, Meter, Point, Sheet, Vertical
from network.numerics.gaugings.gauging_uncertainty import (
    combine,
    depth_percent,
    exposure_percent,
    meter_percent,
    verticals_percent,
    width_percent,
)


def test_worked_example_of_equation_4_52():
    # Morgenschweis, Hydrometrie (2010), eq. 4.52 (read): u 2.81 %, U 5.6 %, 138 ± 7.7 m³/s.
    n = 5
    causes = [0.15, 0.60, 2.5, 0.5 / n**0.5, 5.7 / n**0.5]
    result = combine(
        np.full(20, 138 / 20),
        verticals_percent=verticals_percent(20),
        systematic_percent=1.0,
        random_percent=np.repeat([causes], 20, axis=0).T,
    )
    assert result.verticals_percent == 2.5
    assert result.u_percent == pytest.approx(2.81, abs=0.005)
    assert result.u95_percent == pytest.approx(5.6, abs=0.05)
    # 7.7 was reckoned with the rounded 5.6 % (7.73); with 5.62 % it is 7.76.
    assert result.u95_m3s == pytest.approx(7.7, abs=0.07)


def test_the_causes_add_up_to_the_whole():
    result = compute(equal_panels(20, (0.2, 0.8))).uncertainty
    causes = [
        *(result.verticals_percent, result.systematic_percent, result.width_percent),
        *(result.depth_percent, result.points_percent, result.meter_percent),
        result.exposure_percent,
    ]
    assert np.hypot.reduce(causes) == pytest.approx(result.u_percent)


def equal_panels(count, fractions):
    """Give a section of equal panels: 1 m deep, 0.6 m/s at 60 s, meter calibrated singly."""
    points = tuple(Point(f, velocity_ms=0.6, seconds=60.0) for f in fractions)
    verticals = tuple(Vertical(float(i), 1.0, points) for i in range(1, count + 1))
    return Sheet((Channel(Bank(0.0), Bank(count + 1.0), verticals),), Meter())


FIVE = (0.0, 0.2, 0.6, 0.8, 1.0)


@pytest.mark.parametrize(
    ("count", "fractions", "printed"),
    [
        (20, (0.6,), 7),
        (20, (0.2, 0.8), 6),
        (20, FIVE, 6),
        (45, (0.6,), 4),
        (45, (0.2, 0.8), 3),
    ],
)
def test_table_of_adler(count, fractions, printed):
    # Adler 2008, table 4.14 (read): whole per cents (±0.5); its velocities and exposures are not
    # known to us, and u_c and u_e move U by about 0.1.
    result = compute(equal_panels(count, fractions)).uncertainty
    assert result.u95_percent == pytest.approx(printed, abs=0.6)


def test_more_points_hardly_change_it_more_verticals_do():
    def u95(count, fractions):
        return compute(equal_panels(count, fractions)).uncertainty.u95_percent

    assert u95(20, (0.2, 0.8)) - u95(20, FIVE) < 0.3
    assert u95(20, (0.2, 0.8)) - u95(30, (0.2, 0.8)) > 1.5


def test_entries_of_the_tables():
    # Typed from tables 4.8 to 4.13, and one value between two entries each.
    assert [verticals_percent(m) for m in (3, 5, 10, 15, 20, 25, 30, 35, 45, 60)] == [
        *[7.5, 7.5, 4.5, 3.0, 2.5, 2.0, 1.5, 1.0, 1.0, 1.0],
    ]
    assert verticals_percent(12) == pytest.approx(3.9)
    assert [width_percent(b) for b in (5, 100, 120, 200, 400)] == [0.15, 0.15, 0.2, 0.25, 0.25]
    depths = depth_percent(np.array([0.3, 0.4, 5.9, 6.0, 20.0]), 1.5)
    assert depths.tolist() == [1.5, 0.65, 0.65, 0.25, 0.25]
    speeds = np.array([0.01, 0.03, 0.10, 0.15, 0.25, 0.50, 2.0, -0.25])
    single = meter_percent(speeds, calibrated_singly=True)
    assert single == pytest.approx([10, 10, 2.5, 1.25, 1.0, 0.5, 0.5, 1.0])
    group = meter_percent(speeds, calibrated_singly=False)
    assert group == pytest.approx([10, 10, 5, 2.5, 2, 1.5, 1.0, 2])


@pytest.mark.parametrize(
    ("velocity_ms", "seconds", "fraction", "percent"),
    [
        (0.05, 30, 0.6, 25),
        (0.05, 180, 0.2, 10),
        (0.2, 60, 0.6, 6),
        (1.0, 180, 0.6, 2),
        (3.0, 600, 0.6, 2),
        (0.01, 10, 0.8, 40),
        (0.1, 120, 0.8, 10),
        (0.2, 60, 0.8, 7),
        (0.15, 60, 0.6, 8.5),  # between 11 and 6
        (0.2, 45, 0.6, 7.0),  # between 8 and 6
    ],
)
def test_exposure(velocity_ms, seconds, fraction, percent):
    columns = (np.array([x], dtype=np.float64) for x in (velocity_ms, seconds, fraction))
    assert exposure_percent(*columns) == pytest.approx(percent)


def test_the_certificates_own_figure_replaces_the_table():
    sheet = equal_panels(20, (0.6,))
    with_own = Sheet(sheet.channels, Meter(standard_uncertainty_percent=2.0))
    # 20 equal panels, one point each: 2/√20.
    assert compute(with_own).uncertainty.meter_percent == pytest.approx(2.0 / 20**0.5)


def test_where_the_tables_say_nothing_the_agencys_value_is_stated():
    points = tuple(Point(f, velocity_ms=0.5) for f in (0.2, 0.6, 0.8))
    rows = tuple(Vertical(x, 0.3, points) for x in (1.0, 2.0, 3.0))
    stated = compute(Sheet((Channel(Bank(0.0), Bank(4.0), rows),))).uncertainty.agency_values
    assert stated == (
        "depth under 0.4 m",
        "three points in a vertical",
        "exposure time not stated",
    )
