"""Bind the issued yearbooks of a water year into a volume."""

from typing import Any

from django.core.management.base import BaseCommand, CommandError, CommandParser
from django.utils import timezone

from network.queries import station_years
from reports import editions, services
from reports.management import choosing


class Command(BaseCommand):
    """Bind what is issued: `manage.py bind_volume 2024 --by maud`."""

    help = "Bind the issued yearbooks of a water year into one PDF."
    requires_system_checks: list[str] = ["printing"]

    def add_arguments(self, parser: CommandParser) -> None:
        """Take the year, the title and who binds."""
        parser.add_argument("year", type=int, help="water year, by the number it is named after")
        parser.add_argument("--by", required=True, help="login of who binds")
        parser.add_argument("--title", default="", help="title of the volume")

    def handle(self, *args: Any, year: int, by: str, title: str, **options: Any) -> None:
        """Bind and say where the volume is."""
        calendar = station_years.calendar()
        try:
            volume = services.bind(
                bound=editions.issued_in(calendar.first_day(year)),
                title=title or f"Yearbook {calendar.label(year)}",
                by=choosing.person(by),
                at=timezone.now(),
            )
        except services.Refusal as refusal:
            raise CommandError(str(refusal)) from refusal
        self.stdout.write(f"{volume}: {volume.pdf.path}")
