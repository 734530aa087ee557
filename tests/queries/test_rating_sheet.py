"""Rating sheets from rows: gaugings chosen, curve, tests in words, table, difference, refusals."""

from datetime import UTC, date, datetime

import numpy as np
import pytest

from network.models import Gauging, Note
from network.numerics.ratings.curves import Segment, SegmentCurve
from network.queries import (
    chart_axes,
    rating_charts,
    rating_difference,
    rating_points,
    rating_sheet,
    rating_table,
    stages_that_occur,
    typed_ratings,
)
from network.queries.rating_points import Choice
from network.queries.rating_sheet import FitChoice
from network.queries.typed_ratings import Range
from network.services import notes
from tests import records
from tests.people import make_agency
from tests.rated_world import AT, DAY, EARLY, gauge, gauge_along, person, recorded

pytestmark = pytest.mark.django_db
STAGES = [0.5, 0.6, 0.7, 0.8, 0.9, 1.1, 1.3, 1.5, 1.8, 2.1, 2.4, 2.8]
NOISE = [0.03, -0.02, 0.01, -0.03, 0.02, -0.01, 0.03, -0.02, -0.01, 0.02, -0.03, 0.01]


@pytest.fixture
def station():
    make_agency()
    return records.make_station()


def points(station, **choice):
    return rating_points.points_of(station, Choice(**choice))


def reasons(found):
    return [row.left_out_because for row in found.rows]


def test_each_gauging_left_out_says_why(station):
    gauge_along(station, [1.0, 1.1, 1.2, 1.3], since=datetime(2023, 1, 1, tzinfo=UTC))
    gauge(station, 1.4, 15.0, at=datetime(2023, 6, 1, tzinfo=UTC), way=Gauging.Way.ICE)
    gauge(station, 1.5, 17.0, at=datetime(2023, 7, 1, tzinfo=UTC), method="dilution")
    dry = gauge(station, 1.5, 17.0, at=datetime(2023, 8, 1, tzinfo=UTC))
    dry.stages.all().delete()
    notes.add_note(
        station=station, start_at=datetime(2023, 1, 10, tzinfo=UTC),
        end_at=datetime(2023, 1, 13, tzinfo=UTC), cause=Note.Cause.BACKWATER,
        flows=Note.Flows.ESTIMATED, by=person("ama"), at=AT,
    )  # fmt: skip
    found = points(
        station, first_day=date(2023, 1, 5), last_day=date(2023, 7, 31),
        methods=frozenset({"meter"}),
    )  # fmt: skip
    assert reasons(found) == [
        "before the period", "noted then: backwater", "", "", "under ice", "method not chosen",
        "no stage known",
    ]  # fmt: skip
    assert found.used.tolist() == [False, False, True, True, False, False, False]
    only = points(station, checked_only=True)
    assert set(reasons(only)) == {"not checked", "no stage known"}


def test_what_was_said_of_a_gauging_overrules_its_circumstances_but_not_the_choice(station):
    row = gauge(station, 1.4, 15.0, way=Gauging.Way.ICE)
    assert reasons(points(station, answers={row.pk: ""})) == [""]
    assert reasons(points(station, answers={row.pk: "ice in the section"})) == [
        "ice in the section"
    ]
    late = points(station, answers={row.pk: ""}, last_day=date(2020, 1, 1))
    assert reasons(late) == ["after the period"]


def test_a_fit_finds_the_curve_the_gaugings_were_made_from(station):
    gauge_along(station, STAGES)
    sheet = rating_sheet.fitted(points(station), FitChoice())
    [line] = sheet.segments()
    # exact power law: Q = 10·(h − 0.2)²
    assert (line.c, line.h0_m, line.b) == pytest.approx((10.0, 0.2, 2.0), rel=1e-4)
    assert sheet.scatter_percent < 0.01
    assert (sheet.curve.lowest_use_m, sheet.curve.highest_use_m) == (0.5, 2.8)
    assert np.abs(sheet.deviations_percent).max() < 0.01


def test_the_tests_are_told_in_words(station):
    # One of twelve lies above: 11 of 12 on one side has p = 2·13/4096 = 0.0063.
    rows = gauge_along(station, STAGES, errors=[-0.05] * 11 + [0.05])
    curve = SegmentCurve(segments=[Segment(0.2, 10.0, 0.2, 2.0)], lowest_use_m=0.2,
                         highest_use_m=3.0)  # fmt: skip
    sheet = rating_sheet.examined(curve, points(station))
    told = [(verdict.sentence, verdict.passed) for verdict in sheet.verdicts()]
    assert told[0] == ("11 of 12 gaugings below the curve: the curve lies high.", False)
    assert len(told) == 3
    assert sheet.later_verdicts() == []
    later = gauge(station, 1.0, 5.0, at=rows[-1].ended_at + DAY)
    found = points(station, answers={later.pk: "kept for the test"})
    sheet = rating_sheet.examined(curve, found)
    assert sheet.later.tolist() == [False] * 12 + [True]
    # (5/6.4 − 1) = −21.9 %
    assert "−21.9" in sheet.later_verdicts()[2].sentence.replace("-", "−")


def test_the_band_is_half_the_width_of_the_kernels_over_the_flow(station):
    gauge_along(station, STAGES, errors=NOISE)
    sheet = rating_sheet.fitted(points(station), FitChoice(zeros_m=(0.2,)))
    lower, upper = sheet.fit.band_at(sheet.band.stage_m)
    flow = sheet.fit.flow_at(sheet.band.stage_m)
    assert sheet.band.u95_percent == pytest.approx(50 * (upper - lower) / flow, abs=0.005)
    assert (sheet.band.stage_m[0], sheet.band.stage_m[-1]) == (0.5, 2.8)


@pytest.mark.parametrize(
    ("stages", "choice", "sentence"),
    [
        ([0.5, 0.7, 0.9, 1.1], FitChoice(), "4 gaugings with flow; 5 are needed"),
        (STAGES[:8], FitChoice((0.2, 0.2), (1.0,)), "8 gaugings with flow; 10 are needed"),
        ([1.0] * 6, FitChoice((0.2,)), "All gaugings of segment 1 are at one stage, 1.000 m"),
        (STAGES, FitChoice((0.55,)), "h₀ of segment 1, 0.550 m, is not below its lowest gauging"),
        ([], FitChoice(), "No gauging is used."),
    ],
)
def test_gaugings_that_carry_no_fit_are_refused_with_a_sentence(station, stages, choice, sentence):
    gauge_along(station, stages)
    with pytest.raises(ValueError, match=sentence) as refused:
        rating_sheet.fitted(points(station), choice)
    assert rating_sheet.sentence_of(refused.value) == str(refused.value)


def test_a_gauging_without_flow_is_left_out_of_the_fit_and_told(station):
    gauge_along(station, STAGES)
    gauge(station, 0.1, 0.0, at=EARLY - DAY, u95_percent=None)
    sheet = rating_sheet.fitted(points(station), FitChoice(zeros_m=(0.2,)))
    assert sheet.findings == ["Gaugings without flow are left out of the fit: 1."]
    assert np.isnan(sheet.deviations_percent[0])


def test_a_typed_table_takes_its_rule_and_a_falling_one_is_refused(station):
    found = points(station)
    rows = [(1.0, 1.0), (2.0, 4.0)]
    log = typed_ratings.of_table(rows, found, Range(), rule="log", h0_m=0.0)
    linear = typed_ratings.of_table(rows, found, Range(), rule="linear", h0_m=0.0)
    stage_m = np.array([1.5])
    # ln Q linear in ln h: Q = h²; linear: 2.5
    assert log.curve.flow_at(stage_m)[0] == pytest.approx(2.25)
    assert linear.curve.flow_at(stage_m)[0] == pytest.approx(2.5)
    with pytest.raises(ValueError, match="must not fall"):
        typed_ratings.of_table([(1.0, 4.0), (2.0, 1.0)], found, Range(), rule="linear", h0_m=0.0)


def test_a_weir_fills_a_table_and_names_the_limits_it_passes(station):
    sheet = typed_ratings.of_weir(
        points(station), Range(0.55, 0.95), kind="rectangular", crest_stage_m=0.5, height_m=0.4,
        channel_width_m=2.0, angle_deg=None, notch_width_m=2.0,
    )  # fmt: skip
    # Rehbock (reference section 6): h 0.3, p 0.4, b 2 m → 0.6487 m³/s, g and rounding apart
    assert sheet.curve.flow_at(np.array([0.8]))[0] == pytest.approx(0.6487, rel=0.001)
    # h/p = 0.45/0.4 = 1.125, above 1.0
    assert sheet.findings == ("h/p 1.12 above 1 (ISO 1438)",)
    with pytest.raises(ValueError, match="from which to which stage"):
        typed_ratings.of_weir(
            points(station), Range(), kind="v-notch", crest_stage_m=0.5, height_m=0.4,
            channel_width_m=2.0, angle_deg=90.0, notch_width_m=None,
        )  # fmt: skip


def test_the_table_has_every_centimetre_of_its_decimetres(station):
    curve = SegmentCurve(segments=[Segment(0.2, 10.0, 0.2, 2.0)], lowest_use_m=0.25,
                         highest_use_m=0.41, extrapolate_to_high_m=0.43)  # fmt: skip
    rows = rating_table.decimetres(curve)
    assert [row.stage_m for row in rows] == [0.2, 0.3, 0.4]
    cells = [cell for row in rows for cell in row.cells]
    assert [round(100 * cell.stage_m) for cell in cells] == list(range(20, 50))
    assert [cell.stage_m for cell in cells if cell.flow_m3s is None] == pytest.approx(
        [0.20, 0.21, 0.22, 0.23, 0.24, 0.44, 0.45, 0.46, 0.47, 0.48, 0.49]
    )
    assert [cell.stage_m for cell in cells if cell.extrapolated] == [0.42, 0.43]
    # 10·(0.3 − 0.2)² = 0.1
    assert rows[1].cells[0].flow_m3s == pytest.approx(0.1)


def test_the_difference_is_weighted_by_the_stages_that_occur(station):
    # Two days at 1.2 m and one at 2.2 m: 10 and 40 m³/s before, 11 and 44 after: 10 % more.
    recorded(station, [1.2] * 48 + [2.2] * 25)
    stages = stages_that_occur.of_station(station)
    one, other, short = (
        SegmentCurve(segments=[Segment(0.2, c, 0.2, 2.0)], lowest_use_m=0.2, highest_use_m=top)
        for c, top in ((10.0, 3.0), (11.0, 3.0), (11.0, 2.0))
    )
    found = rating_difference.compare(one, other, stages)
    assert found.volume_percent == pytest.approx(10.0)
    assert sum(band.time_percent for band in found.bands) == pytest.approx(100)
    assert found.bands[0].percent == pytest.approx(10.0)
    cut = rating_difference.compare(one, short, stages)
    assert (cut.unrated_before, cut.unrated_after) == (0, int((stages > 2.0).sum()))
    assert rating_difference.compare(one, other, np.empty(0)) is None


def test_charts_place_curve_and_gaugings_inside_their_frame(station):
    rows = gauge_along(station, STAGES, errors=NOISE)
    found = points(station, answers={rows[0].pk: "weed"})
    sheet = rating_sheet.fitted(found, FitChoice(zeros_m=(0.2,)))
    plain, log, over_stage, in_time = rating_charts.charts(sheet, before=sheet.curve)
    for chart in (plain, log, over_stage, in_time):
        assert len(chart.dots) == 12
        assert [dot.kind for dot in chart.dots].count("left") == 1
        assert all(chart.left <= dot.x <= chart.right for dot in chart.dots)
        assert all(chart.top <= dot.y <= chart.bottom for dot in chart.dots)
    # On log axes above h₀ a power law is straight: the middle of three points lies on the line.
    ends = [tuple(map(float, p.split(","))) for p in log.curve.split()]
    (x0, y0), (x1, y1), (x2, y2) = ends[0], ends[len(ends) // 2], ends[-1]
    assert (y1 - y0) * (x2 - x0) == pytest.approx((y2 - y0) * (x1 - x0), abs=60)
    assert plain.other == plain.curve


def test_ticks_stand_at_round_figures():
    plain = chart_axes.Axis(0.13, 2.9, 0.0, 100.0).ticks()
    assert [tick.text for tick in plain] == ["0.5", "1", "1.5", "2", "2.5"]
    log = chart_axes.Axis(0.8, 60.0, 0.0, 100.0, is_log=True).ticks(decimal_sign=",")
    assert [tick.text for tick in log if tick.text] == ["1", "2", "5", "10", "20", "50"]
