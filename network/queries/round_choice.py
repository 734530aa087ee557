"""What can be put into a round: the stations of an office with what is due there, and their map."""

from dataclasses import dataclass
from datetime import datetime
from math import cos, radians

from network.models import Round, Station
from network.queries.work_due import work_list
from network.queries.work_due.items import Kind
from network.queries.work_due.work_list import Filters, Line

MAP_WIDTH, MAP_HEIGHT, MARGIN = 720, 420, 40
# Work that a visit to the station can do; sheets to be checked are desk work.
FIELD_WORK = {
    Kind.SAFETY, Kind.SILENCE, Kind.VISIT, Kind.GAUGING, Kind.LEVELS, Kind.DOUBT, Kind.LEFT,
}  # fmt: skip


@dataclass(frozen=True)
class Choice:
    """A station that can be a stop, what is due there by the round's end, its place on the map."""

    station: Station
    lines: tuple[Line, ...]
    x: float
    y: float
    position: int | None  # of its stop, None where it is not in the round

    @property
    def is_urgent(self) -> bool:
        """Whether anything urgent is due there."""
        return any(line.is_urgent for line in self.lines)

    @property
    def tasks(self) -> list[str]:
        """What is due, in words for the paper."""
        return [f"{line.kind.label}: {line.reason}"[:200] for line in self.lines]


def choices(of: Round, *, at: datetime) -> list[Choice]:
    """Return the stations of the round's office and those of its stops, the latest work first."""
    today = work_list.ask(at).today
    ahead = max((of.last_day - today).days, 0)
    found = work_list.work_list(at, filters=Filters(within_days=ahead), per_page=None)
    due: dict[int, list[Line]] = {}
    for line in found.lines:
        if line.station is not None and line.kind in FIELD_WORK:
            due.setdefault(line.station, []).append(line)
    places = {stop.station_id: stop.position for stop in of.stops.all()}
    wanted = Station.objects.filter(office=of.office_id) | Station.objects.filter(pk__in=places)
    rows = list(wanted.distinct().order_by("code"))
    spots = _spots(rows)
    made = [
        Choice(row, tuple(due.get(row.pk, ())), *spots[row.pk], places.get(row.pk)) for row in rows
    ]
    return sorted(made, key=_order)


def choice_of(of: Round, station: Station, *, at: datetime) -> Choice:
    """Return one station as a choice. Raises LookupError where the round cannot name it."""
    for choice in choices(of, at=at):
        if choice.station == station:
            return choice
    raise LookupError(station.code)


def _order(choice: Choice) -> tuple[bool, int, str]:
    late = max((line.days_late for line in choice.lines), default=-9_999)
    return not choice.is_urgent, -late, choice.station.code


def _spots(rows: list[Station]) -> dict[int, tuple[float, float]]:
    """Lay the stations out on the map, north up, east and north to one scale."""
    if not rows:
        return {}
    middle = sum(row.latitude_deg for row in rows) / len(rows)
    east = {row.pk: row.longitude_deg * cos(radians(middle)) for row in rows}
    north = {row.pk: row.latitude_deg for row in rows}
    left, low = min(east.values()), min(north.values())
    wide, high = max(east.values()) - left, max(north.values()) - low
    scale = min(
        (MAP_WIDTH - 2 * MARGIN) / (wide or 1e-9), (MAP_HEIGHT - 2 * MARGIN) / (high or 1e-9), 1e5
    )
    return {
        row.pk: (
            round(MAP_WIDTH / 2 + (east[row.pk] - left - wide / 2) * scale, 1),
            round(MAP_HEIGHT / 2 - (north[row.pk] - low - high / 2) * scale, 1),
        )
        for row in rows
    }
