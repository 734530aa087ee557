"""Put a year's content together, and the data that go with it."""

from datetime import date

from django.utils import timezone, translation
from django.utils.translation import gettext as _

from network.formats import daily_csv
from network.models import Station
from network.numerics.marks import Mark
from network.numerics.years.water_year import rounded
from reports import notes, particulars
from reports.content import daily_table, drawings, facts, field_work, year_data
from reports.content import particulars as beside
from reports.content.year_data import YearData
from reports.words import MARK_WORDS
from reports.yearbook import Yearbook


def compile_book(
    station: Station, year: int, *, edition: particulars.Edition, language: str = ""
) -> tuple[Yearbook, bytes]:
    """Return the content of a station's yearbook and its daily values as CSV.

    Raises LookupError when the year has no record.
    """
    data = year_data.read(station, year)
    language = language or data.agency.language
    with translation.override(language), timezone.override(data.clock):
        return _book(data, edition, language), daily_values(data)


def _book(data: YearData, edition: particulars.Edition, language: str) -> Yearbook:
    classes, unknown_percent = facts.uncertainty(data)
    return Yearbook(
        language=language,
        agency=beside.agency(data),
        year=particulars.WaterYear(
            label=data.calendar.label(data.year), first=data.first, last=data.last
        ),
        edition=edition,
        station=beside.station(data),
        highlights=tuple(filter(None, data.station.highlights.splitlines())),
        zeros=beside.zeros(data),
        plates=beside.plates(data),
        recorders=beside.recorders(data),
        ratings=beside.ratings(data),
        daily=daily_table.daily_table(data),
        figures=drawings.figures(data),
        gaugings=field_work.gaugings(data),
        visits=beside.visits(data),
        level_checks=field_work.level_checks(data),
        calibrations=field_work.calibrations(data),
        corrections=beside.corrections(data),
        completeness=facts.completeness(data),
        notes=notes.write(facts.facts(data)),
        uncertainty=classes,
        uncertainty_remark=_unknown(data, unknown_percent) if classes else "",
    )


def _unknown(data: YearData, percent: float) -> str:
    if percent <= 0:
        return ""
    return _("Share of the volume without a stated uncertainty: {percent} %.").format(
        percent=data.printer.fixed(percent, 1)
    )


def daily_values(data: YearData) -> bytes:
    """Return the year's daily values as CSV, rounded as printed, in the active language."""
    own = data.agency
    return daily_csv.write(
        daily_csv.DailyTable(
            daily_csv.DailyHead(
                station=_line(f"{data.station.code} {data.station.name}, {data.station.river}"),
                quantity=_("daily mean stage") if data.stage_only else _("daily mean flow"),
                unit="m" if data.stage_only else "m³/s",
                clock=_("{clock}, a day starts at {hour}:00 and carries that date").format(
                    clock=data.clock, hour=own.day_starts_at_hour
                ),
                licence=_line(own.licence_line),
            ),
            tuple(_row(data, at) for at in range(len(data.values))),
        )
    )


def _row(data: YearData, at: int) -> daily_csv.DailyRow:
    mark = Mark(int(data.days.marks[at]))
    return daily_csv.DailyRow(
        data.days.days[at].astype(date),
        _rounded(data, float(data.values[at])),
        tuple(str(MARK_WORDS[each]) for each in mark),
    )


def _rounded(data: YearData, value: float) -> float | None:
    if value != value:
        return None
    own = data.agency
    if data.stage_only:
        return float(rounded(value, figures=9, max_decimals=3))
    return float(rounded(value, figures=own.significant_figures, max_decimals=own.max_decimals))


def _line(text: str) -> str:
    return " ".join(text.split())
