"""Remove files that no row names: `manage.py sweep [--dry-run]`."""

from argparse import ArgumentParser
from typing import Any

from django.core.management.base import BaseCommand
from django.utils import timezone
from django.utils.translation import gettext as _

from network.services import originals, photographs

KINDS = (originals, photographs)


class Command(BaseCommand):
    """Remove what a crash, or an upload nobody confirmed, left among the kept files."""

    help = "Remove logger files and photographs that no row names, older than a day."

    def add_arguments(self, parser: ArgumentParser) -> None:
        """Offer to look only."""
        parser.add_argument("--dry-run", action="store_true", help="list them, remove nothing")

    def handle(self, *args: Any, **options: Any) -> None:
        """List or remove the files, one a line."""
        name = "unnamed_files" if options["dry_run"] else "sweep"
        now = timezone.now()
        found = [path for kind in KINDS for path in getattr(kind, name)(at=now)]
        for path in found:
            self.stdout.write(path.name)
        said = _("%(count)d files to remove.") if options["dry_run"] else _("%(count)d removed.")
        self.stdout.write(said % {"count": len(found)})
