"""Fill an empty database with visits, gaugings and instruments, to measure the work list."""

from typing import Any

from django.core.management.base import BaseCommand, CommandError, CommandParser
from django.utils import timezone
from django.utils.translation import gettext as _

from network.queries.people import person_named
from network.queries.series import Unknown
from network.services import bulk_network
from network.services.acts import Refusal
from network.services.bulk_network import Size

SIZES = ("stations", "instruments", "visits", "gaugings")


class Command(BaseCommand):
    """Make rows in bulk from a fixed seed."""

    help = "Generate stations, instruments, visits and gaugings without records; for measuring."

    def add_arguments(self, parser: CommandParser) -> None:
        """Take the sizes and who is to have recorded the rows."""
        parser.add_argument("--by", required=True, help="login of who recorded the rows")
        usual = Size()
        for name in SIZES:
            parser.add_argument(f"--{name}", type=int, default=getattr(usual, name))

    def handle(self, *args: Any, by: str, **options: Any) -> None:
        """Make them; refuse a database that holds stations."""
        try:
            person = person_named(by)
        except Unknown as error:
            raise CommandError(str(error)) from error
        size = Size(**{name: options[name] for name in SIZES})
        try:
            bulk_network.make(size=size, by=person, at=timezone.now())
        except Refusal as refusal:
            raise CommandError(refusal.sentence) from refusal
        self.stdout.write(_("The network was made."))
