"""A peak may have fallen in a gap, or on a day that was estimated high enough."""

import numpy as np
import pytest

from network.numerics.marks import Mark
from network.numerics.years.hidden_peak import may_hide_peak

NAN = np.nan
MEAN = np.array([4.0, 10.0, 2.0])
HIGHEST = np.array([5.0, 15.0, 2.2])  # ratios 1.25, 1.5, 1.1


def marks(*bits):
    return np.array(bits, np.uint8)


def test_a_year_read_whole_hides_nothing():
    assert not may_hide_peak(MEAN, HIGHEST, marks(0, 0, 0))


@pytest.mark.parametrize("mark", [Mark.MISSING, Mark.WITHHELD, Mark.PARTIAL])
def test_a_gap_may_hide_a_peak(mark):
    assert may_hide_peak(MEAN, HIGHEST, marks(0, 0, mark))


@pytest.mark.parametrize("mark", [Mark.ESTIMATED, Mark.TYPED])
@pytest.mark.parametrize(("mean", "hidden"), [(9.9, False), (10.1, True)])
def test_an_estimated_day_hides_a_peak_where_its_mean_is_high_enough(mark, mean, hidden):
    # 1.5 × 10.1 passes the highest reading of 15, 1.5 × 9.9 does not
    found = may_hide_peak(np.append(MEAN, mean), np.append(HIGHEST, NAN), marks(0, 0, 0, mark))
    assert found is hidden


def test_low_flow_under_ice_hides_no_flood():
    ice = Mark.ESTIMATED | Mark.ICE_OR_BACKWATER
    assert not may_hide_peak(np.append(MEAN, 1.0), np.append(HIGHEST, NAN), marks(0, 0, 0, ice))


def test_where_every_day_is_typed_the_peak_is_not_known():
    assert may_hide_peak(MEAN, np.full(3, NAN), np.full(3, Mark.TYPED, np.uint8))


def test_an_estimated_day_without_a_value_is_no_reason():
    found = may_hide_peak(
        np.append(MEAN, NAN), np.append(HIGHEST, NAN), marks(0, 0, 0, Mark.ESTIMATED)
    )
    assert not found
