"""Remove PDFs and data that no edition or volume names."""

from typing import Any

from django.core.management.base import BaseCommand
from django.utils import timezone

from reports import services


class Command(BaseCommand):
    """Remove what compiling again, or a crash, left in the folder of editions."""

    help = "Remove files in the folder of editions that no row names and that are a day old."

    def handle(self, *args: Any, **options: Any) -> None:
        """Remove them, a line each."""
        for path in services.sweep(at=timezone.now()):
            self.stdout.write(path.name)
