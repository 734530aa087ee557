"""The main job on the demo network: from installed to yearbooks in a folder."""

import shutil
from collections.abc import Iterator
from concurrent.futures import ProcessPoolExecutor, as_completed
from multiprocessing import get_context
from pathlib import Path
from time import monotonic
from typing import Any

import django
from django.conf import settings
from django.core.management import call_command
from django.core.management.base import BaseCommand, CommandError, CommandParser
from django.db import connections
from django.utils import timezone

from network.models import Person, Station
from network.queries import station_years
from reports import editions, services
from reports.models import Edition, Volume

WORKERS = 2
PRELOADED = ["reports.rendering"]  # not the apps: those are set up in each worker
IN_GERMAN = "IS-020"  # one station prints in the second language
WHY = "Issued for the demonstration: the open points are part of its story."


class Command(BaseCommand):
    """Load the demo, print every station's years with two workers, bind the last year."""

    help = "Load the demo network and issue all its yearbooks into a folder."
    requires_system_checks: list[str] = ["printing"]

    def add_arguments(self, parser: CommandParser) -> None:
        """Take some of the stations, for a quick look."""
        parser.add_argument("--stations", nargs="*", default=[], help="codes; all by default")

    def handle(self, *args: Any, stations: list[str], **options: Any) -> None:
        """Load, compute, print and bind; what is there already is left as it is."""
        self.started = monotonic()
        services_or_end()
        call_command("load_demo", stations=stations, stdout=self.stdout)
        call_command("recompute_years", stdout=self.stdout)
        self._issue()
        self._bind()
        folder = Path(settings.DATA_DIR) / "yearbooks"
        count = copy_out(folder)
        self._tell(f"{count} PDFs in {folder}")

    def _issue(self) -> None:
        """Issue every year that is not issued yet, two at a time."""
        due = list(_due())
        connections.close_all()  # no worker may inherit one
        context = get_context("forkserver")
        context.set_forkserver_preload(PRELOADED)
        with ProcessPoolExecutor(WORKERS, mp_context=context, initializer=django.setup) as pool:
            asked = [pool.submit(issue_one, code, year) for code, year in due]
            for done, each in enumerate(as_completed(asked), start=1):
                self._tell(f"yearbooks: {done} of {len(due)}, {each.result()}")

    def _bind(self) -> None:
        latest = Edition.objects.filter(state=Edition.State.ISSUED).order_by("-first_day").first()
        if latest is None:
            raise CommandError("No station of the demo has a record.")
        bound = editions.issued_in(latest.first_day)
        title = f"Yearbook {latest.year_label}"
        volume = services.bind(bound=bound, title=title, by=_publisher(), at=timezone.now())
        self._tell(f"volume of {len(bound)} yearbooks: {volume}")

    def _tell(self, text: str) -> None:
        self.stdout.write(f"{monotonic() - self.started:5.0f} s  {text}")
        self.stdout.flush()


def services_or_end() -> None:
    """End with a sentence that names the packages where no PDF can be made."""
    try:
        services.printer("rendering")
    except services.Refusal as refusal:
        raise CommandError(str(refusal)) from refusal


def issue_one(code: str, year: int) -> str:
    """Compile and issue one yearbook, in a worker."""
    edition = services.compile_and_issue(
        station=Station.objects.get(code=code),
        year=year,
        by=_publisher(),
        at=timezone.now(),
        reason=WHY,
        language="de" if code == IN_GERMAN else "",
    )
    return str(edition)


def copy_out(folder: Path) -> int:
    """Copy what is issued into a folder, under names for readers; return how many PDFs."""
    folder.mkdir(parents=True, exist_ok=True)
    issued = Edition.objects.filter(state=Edition.State.ISSUED).select_related("station")
    named = [(edition.pdf.path, editions.file_name(edition, ".pdf")) for edition in issued]
    for edition in issued:
        shutil.copyfile(edition.csv.path, folder / editions.file_name(edition, ".csv"))
    volumes = Volume.objects.all()
    named += [(each.pdf.path, editions.volume_name(each)) for each in volumes]
    for path, name in named:
        shutil.copyfile(path, folder / name)
    return len(named)


def _due() -> Iterator[tuple[str, int]]:
    calendar = station_years.calendar()
    for station in Station.objects.order_by("code"):
        for year in station_years.years_on_record(station):
            if editions.issued_of(station, calendar.first_day(year)) is None:
                yield station.code, year


def _publisher() -> Person:
    return Person.objects.filter(groups__name="publisher", is_active=True).order_by("pk")[0]
