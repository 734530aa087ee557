"""The figures of the network as two pages of PDF with their plots."""

from collections.abc import Iterable, Sequence
from itertools import pairwise
from pathlib import Path

from django.contrib.staticfiles import finders
from django.template.loader import render_to_string
from django.utils import timezone, translation
from django.utils.translation import gettext as _

from network.queries import clock
from network.queries.network_figures import NetworkFigures, StationFigures
from reports import rendering
from reports.figures.network_bars import Bars, Pairs, draw_bars, draw_pairs

STYLESHEET = "reports/print/network_figures.css"
COMPLETENESS = (50, 80, 90, 95, 99.9)  # %; lower ends of the classes above the first
REVIEW_DAYS = (30, 90, 180, 365, 730)
WORST = 14  # stations named on paper; the CSV names all
OFFICES_DRAWN = 12


def pdf_of(found: NetworkFigures) -> bytes:
    """Return the figures as tagged PDF in the agency's language of print."""
    own = clock.agency()
    with translation.override(own.language), timezone.override(clock.record_clock(own)):
        context = {
            "found": found,
            "agency": own,
            "least_complete": least_complete(found.stations),
            "least_gauged": least_gauged(found.stations),
            "css": Path(finders.find(STYLESHEET)).read_text(encoding="utf-8"),
        }
        html = render_to_string("reports/network_figures.html", context)
        page = rendering.Page(html, _plots(found))
        period = found.period
        identity = f"network figures {period.first_day} {period.last_day} {found.today}"
        return rendering.write_pdf(page, identity=identity)


def least_complete(stations: Iterable[StationFigures]) -> list[StationFigures]:
    """Return the stations with most days missing, the worst first."""
    known = [row for row in stations if (row.completeness_percent or 100) < 100]
    return sorted(known, key=lambda row: row.completeness_percent or 0)[:WORST]


def least_gauged(stations: Iterable[StationFigures]) -> list[StationFigures]:
    """Return the stations that lack most gaugings, the worst first."""
    lacking = [row for row in stations if row.gaugings < row.wanted_gaugings - 0.5]
    return sorted(lacking, key=lambda row: row.gaugings - row.wanted_gaugings)[:WORST]


def _plots(found: NetworkFigures) -> dict[str, str]:
    offices = sorted(found.offices, key=lambda row: -row.planned_visits)[:OFFICES_DRAWN]
    names = [row.name for row in offices]
    bands = [sum(row.gaugings_by_band[n] for row in found.stations) for n in range(4)]
    complete = [
        row.completeness_percent for row in found.stations if row.completeness_percent is not None
    ]
    waits = [row.unreviewed_days for row in found.stations if row.unreviewed_days is not None]
    made, stations = _("made"), _("stations")
    return {
        "visits": draw_pairs(
            Pairs(names, [row.visits for row in offices],
                  [row.planned_visits for row in offices], made, _("planned by interval"))
        ),
        "gaugings": draw_pairs(
            Pairs(names, [row.gaugings for row in offices],
                  [row.wanted_gaugings for row in offices], made, _("wanted"))
        ),
        "bands": draw_bars(
            Bars([_("low"), _("middle"), _("high"), _("unknown")], bands,
                 _("third of the stages the rating is used at"), _("gaugings"))
        ),
        "completeness": draw_bars(
            Bars(_classes(COMPLETENESS), _counts(complete, COMPLETENESS),
                 _("days with a value, %"), stations)
        ),
        "review": draw_bars(
            Bars(_classes(REVIEW_DAYS), _counts(waits, REVIEW_DAYS),
                 _("age of the record awaiting review, days"), stations)
        ),
    }  # fmt: skip


def _classes(ends: Sequence[float]) -> list[str]:
    """Return the names of the classes below, between and from the ends on."""
    texts = [f"{end:g}" for end in ends]
    between = [f"{low}–{high}" for low, high in pairwise(texts)]
    return [f"< {texts[0]}", *between, f"≥ {texts[-1]}"]


def _counts(values: Iterable[float], ends: Sequence[float]) -> list[int]:
    found = [0] * (len(ends) + 1)
    for value in values:
        found[sum(value >= end for end in ends)] += 1
    return found
