"""Compute issued editions again and name the days that differ."""

from typing import Any

from django.core.management.base import BaseCommand, CommandError, CommandParser

from reports import editions
from reports.management import choosing
from reports.models import Edition


class Command(BaseCommand):
    """Say whether the record still gives what was issued."""

    help = "Compute issued editions again; name the days that differ, and by how much."

    def add_arguments(self, parser: CommandParser) -> None:
        """Take station codes."""
        parser.add_argument("codes", nargs="*", help="stations; all where none is given")

    def handle(self, *args: Any, codes: list[str], **options: Any) -> None:
        """Verify one edition after the other; end with an error where any differs."""
        stations = choosing.stations(codes)
        issued = Edition.objects.filter(station__in=stations, state=Edition.State.ISSUED)
        different = sum(not self._holds(edition) for edition in issued.select_related("station"))
        if different:
            raise CommandError(f"{different} of {len(issued)} issued editions no longer hold.")
        self.stdout.write(f"{len(issued)} issued editions hold.")

    def _holds(self, edition: Edition) -> bool:
        try:
            changes = editions.changed_since(edition)
        except editions.EditionLost as error:
            self.stderr.write(f"{edition}: {error}")
            return False
        for each in changes:
            self.stdout.write(f"{edition}: {each.day} issued {each.issued}, now {each.now}")
        return not changes
