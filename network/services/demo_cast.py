"""Who and what the loading of the demo network speaks of, found by the names of its files."""

from collections.abc import Callable, Collection
from dataclasses import dataclass, field
from datetime import datetime, timedelta

from network.formats.demo_rows import Station as StationRow
from network.formats.demo_scenario import Scenario
from network.models import Instrument, MeterPair, Office, Person, Series, Station
from network.queries import clock
from network.services.demo_world import Truth

Due = tuple[datetime, Callable[[], None]]  # when something is done, and the doing of it

OFFICE_OPENS = timedelta(hours=8)
ENTERED_AFTER = timedelta(days=1)
BOOKS_CLOSE_AFTER = timedelta(days=5)


@dataclass(frozen=True, eq=False)
class Cast:
    """The rows loaded so far, by the names the scenario gives them, and the invented truth."""

    scenario: Scenario
    truths: dict[str, Truth]
    people: dict[str, Person]
    offices: dict[str, Office]
    only: Collection[str] = ()  # codes of the stations to load; all where there are none
    stations: dict[str, Station] = field(default_factory=dict)
    series: dict[tuple[str, str], Series] = field(default_factory=dict)
    instruments: dict[str, Instrument] = field(default_factory=dict)
    pairs: dict[str, MeterPair] = field(default_factory=dict)

    @property
    def opening(self) -> datetime:
        """The morning on which these books were begun."""
        return clock.day_start(self.scenario.basin.first_day, of=clock.agency()) + OFFICE_OPENS

    @property
    def present(self) -> datetime:
        """The day on which the demo stands still."""
        last = clock.day_start(self.scenario.basin.last_day, of=clock.agency())
        return last + OFFICE_OPENS + BOOKS_CLOSE_AFTER

    @property
    def manager(self) -> Person:
        """The person who keeps the registry."""
        return self._with_role("manager")

    def keeper(self, code: str) -> Person:
        """Return the record keeper of a station's office."""
        return self._with_role("record_keeper", office=self._row(code).station.office)

    @property
    def rows(self) -> list[StationRow]:
        """What the files say of each station to load, upstream first."""
        stations = self.scenario.stations
        return [row for row in stations if not self.only or row.station.code in self.only]

    def entered(self, instant: datetime) -> datetime:
        """Return when something that happened at an instant was entered into the books."""
        return min(max(instant + ENTERED_AFTER, self.opening), self.present)

    def _row(self, code: str) -> StationRow:
        return self.scenario.station(code)

    def _with_role(self, role: str, office: str = "") -> Person:
        return next(
            self.people[row.username]
            for row in self.scenario.people
            if row.role == role and office in ("", row.office)
        )
