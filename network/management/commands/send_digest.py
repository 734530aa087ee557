"""Mail everyone what is due: to be run each week, or each morning with --days 1."""

from argparse import ArgumentParser
from typing import Any

from django.core.management.base import BaseCommand, CommandError
from django.utils import timezone, translation
from django.utils.translation import gettext as _
from django.utils.translation import ngettext

from network.queries import clock
from network.services import digests


class Command(BaseCommand):
    """Send the digest of work due."""

    help = "Mail each person with an address what is new and what is late at their office."

    def add_arguments(self, parser: ArgumentParser) -> None:
        """Take how far back something is new."""
        parser.add_argument("--days", type=int, default=7, help="new: fallen due in so many days")

    def handle(self, *args: Any, **options: Any) -> None:
        """Send and say to how many."""
        if options["days"] < 1:
            raise CommandError(_("Something is new for at least one day."))
        own = clock.agency()
        with translation.override(own.language), timezone.override(clock.record_clock(own)):
            sent = digests.send(at=timezone.now(), days=options["days"])
            text = ngettext("Wrote to {n} person.", "Wrote to {n} people.", sent)
        self.stdout.write(text.format(n=sent))
