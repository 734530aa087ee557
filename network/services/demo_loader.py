"""Load the demo network through the services that take a user's data, in the order of the chain."""

from collections.abc import Callable, Collection
from pathlib import Path

from django.db import transaction
from django.utils.translation import gettext as _

from network.formats.demo_rows import Station as StationRow
from network.formats.demo_scenario import Scenario
from network.models import Agency, Station
from network.services import (
    demo_gaugings,
    demo_plans,
    demo_ratings,
    demo_records,
    demo_registry,
    demo_visits,
    station_years,
)
from network.services.acts import Refusal
from network.services.demo_cast import Cast
from network.services.generated_network import OFFICE

Tell = Callable[[str, int, int], None]  # stage, n, of how many


def is_loaded(scenario: Scenario) -> bool:
    """Tell whether this database holds the demo; refuse one that holds anything else."""
    agency = Agency.objects.filter(pk=1).first()
    if agency is None and not Station.objects.exists():
        return False
    if agency is None or agency.name != scenario.agency.name:
        raise Refusal(
            _(
                "This database holds the books of “%(name)s”. The demo goes only into an empty "
                "one: set GAUGEWRIGHT_DATA or DATABASE_URL to another place."
            )
            % {"name": agency.name if agency else OFFICE}
        )
    return True


def load(
    scenario: Scenario,
    *,
    password: str,
    folder: Path,
    tell: Tell,
    only: Collection[str] = (),
) -> None:
    """Load the whole demo, or the stations named in `only`, in one transaction: all or nothing.

    The logger files are written into `folder`, where a user would have them, and imported.
    """
    if is_loaded(scenario):
        raise Refusal(_("The demo is loaded already."))
    with transaction.atomic():
        _load(scenario, password=password, folder=folder, tell=tell, only=only)


def _load(
    scenario: Scenario, *, password: str, folder: Path, tell: Tell, only: Collection[str]
) -> None:
    tell(_("agency and people"), 1, 1)
    cast = demo_registry.load_agency(scenario, password=password, only=only)
    _by_station(cast, _("stations"), demo_registry.load_station, tell=tell)
    tell(_("instruments"), 1, 1)
    demo_registry.load_instruments(cast)
    demo_registry.load_calibrations(cast)
    _by_station(cast, _("recorders"), demo_records.load_series, tell=tell)

    def take_files(cast: Cast, row: StationRow) -> None:
        for file in demo_records.write_files(cast, row, folder):
            demo_records.import_written(cast, file, folder)

    _by_station(cast, _("logger files"), take_files, tell=tell)
    _by_station(cast, _("visits"), demo_visits.load_visits, tell=tell)
    _by_station(cast, _("level checks"), demo_visits.load_level_checks, tell=tell)
    _by_station(cast, _("ratings and gaugings"), _gauge_and_rate, tell=tell)
    _by_station(cast, _("notes on the record"), demo_records.load_remarks, tell=tell)
    _by_station(cast, _("reviews"), demo_plans.load_review, tell=tell)
    tell(_("plans"), 1, 1)
    demo_plans.load_plans(cast)
    _by_station(cast, _("daily figures"), _refresh, tell=tell)


def _by_station(
    cast: Cast, stage: str, load_one: Callable[[Cast, StationRow], None], *, tell: Tell
) -> None:
    rows = cast.rows
    for n, row in enumerate(rows, start=1):
        tell(stage, n, len(rows))
        load_one(cast, row)


def _gauge_and_rate(cast: Cast, row: StationRow) -> None:
    """Enter gaugings and ratings as they came: each is signed under the rating of its day."""
    due = [*demo_ratings.ratings_due(cast, row), *demo_gaugings.gaugings_due(cast, row)]
    for _at, act in sorted(due, key=lambda each: each[0]):
        act()


def _refresh(cast: Cast, row: StationRow) -> None:
    station_years.refresh(cast.stations[row.station.code])
