"""Withdraw an import: `manage.py withdraw_import NUMBER --reason TEXT --by LOGIN`."""

from argparse import ArgumentParser
from typing import Any

from django.core.management.base import BaseCommand, CommandError
from django.utils import timezone
from django.utils.translation import gettext as _

from network.queries import people, series
from network.services import imports
from network.services.acts import Refusal


class Command(BaseCommand):
    """Exit code 0: withdrawn; 1: refused, in one sentence, with nothing changed."""

    help = "Withdraw an import; its months are made anew from the files that still stand."

    def add_arguments(self, parser: ArgumentParser) -> None:
        """Name the import, the reason and the person."""
        parser.add_argument("number", type=int, help="number of the import")
        parser.add_argument("--reason", required=True, help="why it is withdrawn")
        parser.add_argument("--by", required=True, metavar="LOGIN", help="who withdraws")

    def handle(self, *args: Any, **options: Any) -> None:
        """Withdraw it and say so."""
        try:
            logger_import = series.import_numbered(options["number"])
            imports.withdraw_import(
                logger_import=logger_import,
                by=people.person_named(options["by"]),
                at=timezone.now(),
                reason=options["reason"],
            )
        except (series.Unknown, Refusal) as error:
            raise CommandError(str(error)) from error
        self.stdout.write(
            _("Import %(number)d (%(name)s) is withdrawn.")
            % {"number": logger_import.pk, "name": logger_import.original_name}
        )
