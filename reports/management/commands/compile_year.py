"""Compile the yearbooks of a water year."""

from typing import Any

from django.core.management.base import BaseCommand, CommandError, CommandParser
from django.utils import timezone

from reports import services
from reports.management import choosing


class Command(BaseCommand):
    """Compile, without issuing: `manage.py compile_year 2024 --by maud`."""

    help = "Compile the yearbooks of a water year, of all stations on record or of those named."
    requires_system_checks: list[str] = ["printing"]

    def add_arguments(self, parser: CommandParser) -> None:
        """Take the year, the stations, who compiles and the language of print."""
        parser.add_argument("year", type=int, help="water year, by the number it is named after")
        parser.add_argument("codes", nargs="*", help="stations; all on record where none is given")
        parser.add_argument("--by", required=True, help="login of who compiles")
        parser.add_argument("--language", default="", help="language of print; else the agency's")

    def handle(
        self, *args: Any, year: int, codes: list[str], by: str, language: str, **options: Any
    ) -> None:
        """Compile one station after the other, a line each."""
        person, refused = choosing.person(by), 0
        for station in choosing.on_record(codes, year):
            try:
                edition = services.compile_edition(
                    station=station, year=year, by=person, at=timezone.now(), language=language
                )
            except services.Refusal as refusal:
                refused += 1
                self.stderr.write(f"{station}: {refusal}")
                continue
            points = edition.open_points.count("\n") + 1 if edition.open_points else 0
            self.stdout.write(f"{edition}: {edition.pdf.path}, open points: {points}")
        if refused:
            raise CommandError(f"{refused} yearbooks could not be compiled.")
