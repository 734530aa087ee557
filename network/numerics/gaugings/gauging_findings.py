"""What a hydrographer would ask about a gauging as a whole, each with limit and source."""

from bisect import bisect_right
from collections.abc import Iterator, Sequence
from dataclasses import dataclass

import numpy as np

from network.numerics.gaugings.gauging_input import GaugingSettings, Meter
from network.numerics.gaugings.gauging_result import Panel
from network.numerics.gaugings.mean_stage import MeanStage
from network.numerics.gaugings.vertical_findings import Finding
from network.numerics.sentences import gettext_noop, sentence

PANEL_SOURCE = gettext_noop("USGS practice; Swiss rule")
WIDTH_SOURCE = gettext_noop("ISO 748:2007, from memory")
STAGE_SOURCE = gettext_noop("Pegelvorschrift 1991")
INTERVAL_SOURCE = gettext_noop("ISO 748:2021, 5.2.3")
CALIBRATION_SOURCE = gettext_noop("ISO 2537 practice")
APART_SOURCE = gettext_noop("agency setting; mostly under 1 % (British Columbia manual 1998)")
COMMON = gettext_noop("common practice")
RATING_SOURCE = gettext_noop("combined 95 % uncertainties (common practice)")

# Fewest verticals for a width below … m (ISO 748:2007, from memory); 22 above.
WIDTHS_M = (0.5, 1.0, 3.0, 5.0)
FEWEST = (5, 6, 7, 13, 22)


@dataclass(frozen=True)
class Totals:
    """Both discharges, the width, and the panels of the method that is the result."""

    mid_m3s: float
    mean_m3s: float
    width_m: float
    verticals: int
    panels: tuple[Panel, ...]


def of_whole(
    totals: Totals, *, meter: Meter | None, stage: MeanStage | None, settings: GaugingSettings
) -> Iterator[Finding]:
    """Find what to ask about the gauging. Limits: settings; sources: in the findings."""
    yield from _shares(totals.panels, settings)
    yield from _count(totals)
    yield from _apart(totals, settings.methods_apart_percent)
    yield from _stage(stage, settings)
    if meter is not None:
        yield from _meter(meter, settings)


def rating_deviation(
    *, flow_m3s: float, u95_m3s: float, rated_m3s: float, rated_u95_m3s: float
) -> Finding | None:
    """Tell whether a gauging departs from the rating by more than both uncertainties explain.

    All in m³/s; the limit of the finding too. Source: combined 95 % uncertainties (common
    practice).
    """
    # |Q − Q_r| > √(U² + U_r²)
    limit_m3s = float(np.hypot(u95_m3s, rated_u95_m3s))
    apart_m3s = flow_m3s - rated_m3s
    if abs(apart_m3s) <= limit_m3s:
        return None
    text = gettext_noop(
        "The discharge departs from the rating by {value} m³/s; both uncertainties together "
        "explain {limit} m³/s."
    )
    said = sentence(text, value=float(f"{apart_m3s:.3g}"), limit=float(f"{limit_m3s:.3g}"))
    return Finding("rating_deviation", "discharge_m3s", said, limit_m3s, RATING_SOURCE)


def _shares(panels: Sequence[Panel], settings: GaugingSettings) -> Iterator[Finding]:
    limit, advice = settings.panel_share_percent, settings.panel_share_advice_percent
    text = gettext_noop(
        "The panel from {start} m to {end} m carries {value} % of the flow; the limit is {limit} %."
    )
    for panel in panels:
        percent = 100 * abs(panel.share)
        if percent > limit:
            start, end, value = round(panel.from_m, 3), round(panel.to_m, 3), round(percent, 1)
            said = sentence(text, start=start, end=end, value=value, limit=limit)
            place = (panel.channel, panel.vertical)
            yield Finding("panel_share", "distance_m", said, limit, PANEL_SOURCE, *place)
    count = sum(advice < 100 * abs(panel.share) <= limit for panel in panels)
    if count:
        text = gettext_noop(
            "{count} more panels carry over {limit} % of the flow; more verticals would be better."
        )
        said = sentence(text, count=count, limit=advice)
        yield Finding("panel_advice", "verticals", said, advice, PANEL_SOURCE, advice=True)


def _count(totals: Totals) -> Iterator[Finding]:
    least = FEWEST[bisect_right(WIDTHS_M, totals.width_m)]
    if totals.verticals < least:
        text = gettext_noop(
            "{count} verticals in a width of {value} m; at least {limit} are wanted."
        )
        value_m = round(totals.width_m, 2)
        said = sentence(text, count=totals.verticals, value=value_m, limit=least)
        yield Finding("few_verticals", "verticals", said, least, WIDTH_SOURCE)


def _apart(totals: Totals, limit_percent: float) -> Iterator[Finding]:
    apart = 100 * abs(totals.mid_m3s - totals.mean_m3s)
    smaller = min(abs(totals.mid_m3s), abs(totals.mean_m3s))
    if apart > limit_percent * smaller and smaller > 0:
        text = gettext_noop(
            "Mid-section and mean-section differ by {value} %; the limit is {limit} %."
        )
        said = sentence(text, value=round(apart / smaller, 1), limit=limit_percent)
        yield Finding("methods_apart", "verticals", said, limit_percent, APART_SOURCE)


def _stage(stage: MeanStage | None, settings: GaugingSettings) -> Iterator[Finding]:
    if stage is None:
        said = sentence(gettext_noop("No stage was read during the gauging."))
        yield Finding("no_stage", "stages", said, None, COMMON)
        return
    limit_m = settings.stage_change_m
    if stage.change_m <= limit_m + 1e-9:
        return
    text = gettext_noop(
        "The stage changed by {value} m, more than {limit} m: the mean stage is weighted by flow."
    )
    said = sentence(text, value=round(stage.change_m, 3), limit=limit_m)
    yield Finding("stage_change", "stages", said, limit_m, STAGE_SOURCE)
    if stage.longest_interval_s > settings.stage_interval_s:
        text = gettext_noop(
            "{value} min passed between stage readings while the stage changed; the most is "
            "{limit} min."
        )
        value, limit = round(stage.longest_interval_s / 60), settings.stage_interval_s / 60
        said = sentence(text, value=value, limit=limit)
        yield Finding("stage_interval", "stages", said, limit, INTERVAL_SOURCE)
    if stage.times_assumed:
        text = gettext_noop("Verticals without a time: taken as evenly spread between the others.")
        yield Finding("times_assumed", "time_s", sentence(text), None, COMMON)


def _meter(meter: Meter, settings: GaugingSettings) -> Iterator[Finding]:
    days = gettext_noop("The meter was calibrated {value} days ago; the most is {limit}.")
    hours = gettext_noop(
        "The meter has run {value} h since its calibration; the most is {limit} h."
    )
    for value, limit, text in (
        (meter.days_since_calibration, settings.calibration_days, days),
        (meter.hours_since_calibration, settings.calibration_hours, hours),
    ):
        if value is not None and value > limit:
            said = sentence(text, value=round(value), limit=limit)
            yield Finding("calibration", "meter", said, limit, CALIBRATION_SOURCE)
    if meter.pieces and meter.spin_test_s is None:
        said = sentence(gettext_noop("No spin test of the meter is noted."))
        yield Finding("spin_test", "spin_test_s", said, None, COMMON)
