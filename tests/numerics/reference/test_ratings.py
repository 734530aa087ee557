"""Ratings against published figures (reference README, section 6)."""

from datetime import UTC, datetime

import numpy as np
import pytest

from network.numerics.ratings.curves import Segment, SegmentCurve, TableCurve, flow
from network.numerics.ratings.rating import RatingPeriod, rate
from tests.numerics.reference.figures import FOOT_M, FT3S_M3S, rounded

# USGS 01594440, rating 20.0, in force from 2015-10-01, offset 2.00 ft; read.
STAGES_FT = [2.99, 4.00, 5.00, 5.50, 6.00, 6.50, 7.00, 9.00, 13.00, 20.85, 27.90]
FLOWS_FT3S = [30, 110, 225, 300, 390, 490, 600, 1175, 4350, 16497.75, 31100]
RATING_20 = TableCurve(
    stages_m=np.array(STAGES_FT) * FOOT_M,
    flows_m3s=np.array(FLOWS_FT3S) * FT3S_M3S,
    h0_m=2.00 * FOOT_M,
    lowest_use_m=2.99 * FOOT_M,
    highest_use_m=27.90 * FOOT_M,
)
PEAKS_OF_RATING_20 = [
    ("2016-08-01", 14.64, 6140),
    ("2017-07-30", 13.60, 4960),
    ("2018-06-04", 16.32, 8360),
    ("2018-12-16", 15.50, 7220),
]
PEAKS_OF_EARLIER_RATINGS = [
    ("2014-05-01", 20.56, 15600),
    ("2011-12-08", 13.74, 4900),
    ("2005-04-03", 13.42, 5210),
    ("2000-03-22", 11.90, 3640),
]


def epoch_s(day):
    return int(datetime.fromisoformat(day).replace(tzinfo=UTC).timestamp())


def peak_by_rating_20(stage_ft):
    flow_m3s = flow(RATING_20, np.array([stage_ft * FOOT_M]))[0]
    return rounded(flow_m3s[0] / FT3S_M3S)


@pytest.mark.parametrize(("day", "stage_ft", "published_ft3s"), PEAKS_OF_RATING_20)
def test_peaks_under_the_rating_in_force_are_equal_at_three_figures(day, stage_ft, published_ft3s):
    assert peak_by_rating_20(stage_ft) == published_ft3s


@pytest.mark.parametrize(("day", "stage_ft", "published_ft3s"), PEAKS_OF_EARLIER_RATINGS)
def test_peaks_of_earlier_ratings_differ(day, stage_ft, published_ft3s):
    assert peak_by_rating_20(stage_ft) != published_ft3s


def test_the_date_chooses_the_rating():
    days, stages_ft, published_ft3s = zip(
        *sorted(PEAKS_OF_EARLIER_RATINGS + PEAKS_OF_RATING_20), strict=True
    )
    rated = rate(
        np.array([epoch_s(day) for day in days]),
        np.array(stages_ft) * FOOT_M,
        periods=[RatingPeriod(epoch_s("2015-10-01"), RATING_20)],
        gap_limit_s=3600,
    )
    assert np.isnan(rated.flow_m3s[:4]).all()
    assert [rounded(q) for q in rated.flow_m3s[4:] / FT3S_M3S] == list(published_ft3s[4:])


# V-notch weirs, ASTM D5242 tabulation; read: head in ft, flow in l/s for 60° and 45°.
NOTCHES = {60: (796.7, [0.7310, 1.277, 2.014]), 45: (571.4, [0.5243, 0.9160, 1.445])}
HEADS_M = np.array([0.20, 0.25, 0.30]) * FOOT_M


@pytest.mark.parametrize("angle", NOTCHES)
def test_the_law_of_a_notch_gives_its_tabulated_flows(angle):
    c_ls, flows_ls = NOTCHES[angle]
    notch = SegmentCurve(
        segments=[Segment(0.0, c_ls / 1000, 0.0, 2.5)], lowest_use_m=0.0, highest_use_m=0.4
    )
    found_ls = flow(notch, HEADS_M)[0] * 1000
    assert [rounded(q, 4) for q in found_ls] == pytest.approx(flows_ls, abs=1.01e-3)


@pytest.mark.parametrize("angle", NOTCHES)
def test_the_outer_rows_of_a_notch_table_give_the_row_between(angle):
    # ln Q is linear in ln H, so the middle row follows from the outer ones to the printed digit.
    flows_m3s = np.array(NOTCHES[angle][1]) / 1000
    table = TableCurve(
        stages_m=HEADS_M[[0, 2]],
        flows_m3s=flows_m3s[[0, 2]],
        lowest_use_m=HEADS_M[0],
        highest_use_m=HEADS_M[2],
    )
    assert flow(table, HEADS_M[1:2])[0] == pytest.approx(flows_m3s[1:2], rel=1e-3)
