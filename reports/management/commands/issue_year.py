"""Issue the compiled yearbooks of a water year."""

from typing import Any

from django.core.management.base import BaseCommand, CommandError, CommandParser
from django.utils import timezone

from network.queries import station_years
from reports import editions, services
from reports.management import choosing
from reports.models import Edition


class Command(BaseCommand):
    """Issue what is compiled: `manage.py issue_year 2024 --by maud --reason "…"`."""

    help = "Issue the compiled yearbooks of a water year; each owes its reasons as on the desk."
    requires_system_checks: list[str] = ["printing"]

    def add_arguments(self, parser: CommandParser) -> None:
        """Take the year, the stations, who issues, and the reasons."""
        parser.add_argument("year", type=int, help="water year, by the number it is named after")
        parser.add_argument("codes", nargs="*", help="stations; all where none is given")
        parser.add_argument("--by", required=True, help="login of who issues")
        parser.add_argument("--reason", default="", help="why it is issued past open points")
        parser.add_argument("--superseding", default="", help="why it replaces an issued edition")

    def handle(self, *args: Any, year: int, codes: list[str], by: str, **options: Any) -> None:
        """Issue one station after the other, a line each."""
        person, first = choosing.person(by), station_years.calendar().first_day(year)
        latest = [editions.latest(station, first) for station in choosing.stations(codes)]
        compiled = [e for e in latest if e is not None and e.state == Edition.State.COMPILED]
        refused = 0
        for edition in compiled:
            try:
                services.issue(
                    edition=edition, by=person, at=timezone.now(),
                    reason=options["reason"], superseding=options["superseding"],
                )  # fmt: skip
            except services.Refusal as refusal:
                refused += 1
                self.stderr.write(f"{edition}: {refusal}")
                continue
            self.stdout.write(f"{edition}: {edition.pdf.path}")
        if refused or not compiled:
            raise CommandError(
                f"{refused} yearbooks were not issued, {len(compiled)} were compiled."
            )
