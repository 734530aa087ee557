"""Compare every month of readings with its original files: `manage.py verify_blocks`."""

from argparse import ArgumentParser
from typing import Any

from django.core.management.base import BaseCommand, CommandError
from django.utils.translation import gettext as _

from network.services import blocks
from network.services.acts import Refusal


class Command(BaseCommand):
    """Exit code 0: every packed month equals its originals bit by bit; 1: some do not."""

    help = "Compare the packed readings with what the original logger files say."

    def add_arguments(self, parser: ArgumentParser) -> None:
        """Offer to look at one station only."""
        parser.add_argument("--station", help="code of the one station to look at")

    def handle(self, *args: Any, **options: Any) -> None:
        """Name each month that differs, and each original that is lost."""
        faults = 0
        for series in blocks.every_series():
            if options["station"] not in (None, series.station.code):
                continue
            try:
                found = [f"{month:%Y-%m}" for month in blocks.months_that_differ(series)]
            except Refusal as refusal:
                found = [refusal.sentence]
            faults += len(found)
            for text in found:
                self.stdout.write(f"{series.station.code} {series.label}: {text}")
        if faults:
            raise CommandError(_("%(count)d differences.") % {"count": faults})
        self.stdout.write(_("All months equal their original files."))
