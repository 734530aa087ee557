"""Every figure is SVG with real text, in the tokens' colours, the same bytes every time."""

import dataclasses
import re

import numpy as np
import pytest
from lxml import etree

from reports import rendering, words
from reports.figures import hydrograph, plates, rating_plot, style, time_lines
from tests.reports import sample
from tests.reports.figures.test_style import COLOURS


@pytest.fixture(scope="module")
def book():
    return sample.flow_station()


@pytest.fixture(scope="module")
def figures(book):
    return rendering.draw_figures(book)


@pytest.fixture(scope="module")
def printed(book):
    return words.figure_words(book)


NAMES = ["sketch", "plates", "flow", "stage", "duration", "rating"]


def texts(svg: str) -> list[str]:
    """Return the texts of an SVG."""
    return [node.text for node in etree.fromstring(svg.encode()).iter("{*}text")]


def test_the_flow_station_has_all_figures(figures):
    assert list(figures) == NAMES


@pytest.mark.parametrize("name", NAMES)
def test_figure_uses_no_colour_beside_the_tokens(figures, name):
    used = set(re.findall(r"(?:fill|stroke): (#[0-9a-f]{6})", figures[name]))
    assert used <= set(COLOURS.values())


@pytest.mark.parametrize("name", NAMES)
def test_figure_text_is_real_and_in_the_report_face(figures, name):
    assert len(texts(figures[name])) >= 3
    families = set(re.findall(r"font-family: ([^;]+);", figures[name]))
    assert families == {"'IBM Plex Sans Condensed'"}


@pytest.mark.parametrize("name", NAMES)
def test_no_text_of_a_figure_is_under_six_and_a_half_points(figures, name):
    sizes = [float(size) for size in re.findall(r"font-size: ([\d.]+)px", figures[name])]
    assert min(sizes) >= 6.5


def test_figures_are_the_same_bytes_when_drawn_again(book, figures):
    assert rendering.draw_figures(book) == figures


def test_hydrograph_names_its_lines_and_its_gap_without_a_caption(figures):
    said = texts(figures["flow"])
    for word in ("Flow, m³/s", "2019/20", "estimated", "missing", "gauging", "median", "Oct"):
        assert word in said


def test_an_intermittent_river_keeps_its_zero_on_plain_axes(book, printed):
    flow = book.figures.flow
    dry = dataclasses.replace(flow, flow_m3s=np.where(np.arange(366) > 300, 0.0, flow.flow_m3s))
    assert "0" in texts(hydrograph.draw(dry, printed))


def test_a_year_without_any_flow_is_still_drawn(book, printed):
    empty = dataclasses.replace(
        book.figures.flow,
        flow_m3s=np.full(366, np.nan),
        earlier=None,
        gauged_m3s=np.full(7, np.nan),
    )
    assert "missing" in texts(hydrograph.draw(empty, printed))


def test_numbers_in_a_figure_take_the_decimal_comma(book):
    comma = dataclasses.replace(words.figure_words(book), decimal_sign=",")
    assert "0,5" in texts(plates.draw(book.figures.plates, comma))


def test_the_gaugings_of_the_year_bear_their_numbers(book, figures):
    said = texts(figures["rating"])
    assert {gauging.number for gauging in book.gaugings} <= set(said)


def test_a_rating_below_the_station_zero_is_drawn_with_plain_stage(book, printed):
    sheet = book.figures.rating
    lower = dataclasses.replace(
        sheet,
        gauged_stage_m=sheet.gauged_stage_m - 2,
        curves=tuple(
            dataclasses.replace(curve, stage_m=curve.stage_m - 2) for curve in sheet.curves
        ),
    )
    assert "−1" in texts(rating_plot.draw(lower, printed))


def test_runs_of_flags_are_found_with_their_ends():
    """Hand count: true at 0, 1 and at 4."""
    flags = np.array([True, True, False, False, True])
    assert time_lines.spans(flags) == [(0, 1), (4, 4)]


def test_times_become_days_since_1970():
    """Noon of 2 January 1970 is 1.5 days after the epoch."""
    assert style.day_numbers(np.array(["1970-01-02T12:00"], dtype="datetime64[m]")) == [1.5]
