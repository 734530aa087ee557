"""The figures of every station as CSV, with units in the heads of the columns."""

import csv
import io
from collections.abc import Iterator

from network.queries.network_figures import NetworkFigures, StationFigures

HEAD = (
    "code", "name", "river", "office", "days_run", "visits", "visits_planned_by_interval",
    "visits_planned_in_rounds", "gaugings", "gaugings_wanted", "gaugings_low_third",
    "gaugings_middle_third", "gaugings_high_third", "gaugings_without_band", "completeness_percent",
    "days_with_daily_figures", "record_awaiting_review_days",
)  # fmt: skip
UNSAFE = ("=", "+", "-", "@", "\t", "\r")  # what a spreadsheet would take for a formula


def csv_of(found: NetworkFigures) -> bytes:
    """Return one line a station, decimal points, comma-separated, UTF-8."""
    out = io.StringIO()
    writer = csv.writer(out, lineterminator="\r\n")
    writer.writerow(["# period", found.period.first_day, found.period.last_day])
    writer.writerow(HEAD)
    writer.writerows(_rows(found))
    return out.getvalue().encode()


def _rows(found: NetworkFigures) -> Iterator[list[object]]:
    for row in found.stations:
        yield _row(row)


def _row(row: StationFigures) -> list[object]:
    station = row.station
    texts = (station.code, station.name, station.river, station.office_name)
    return [
        *("'" + text if text.startswith(UNSAFE) else text for text in texts),
        row.days_run,
        row.visits,
        f"{row.planned_visits:.1f}",
        row.stops,
        row.gaugings,
        f"{row.wanted_gaugings:.1f}",
        *row.gaugings_by_band,
        "" if row.completeness_percent is None else f"{row.completeness_percent:.1f}",
        "" if row.days_known is None else row.days_known,
        "" if row.unreviewed_days is None else row.unreviewed_days,
    ]
