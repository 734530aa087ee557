"""Print the ratios of speed that this program means to hold, and write them to a file."""

from collections.abc import Iterator
from pathlib import Path
from typing import Any

from django.conf import settings
from django.core.management.base import BaseCommand, CommandError, CommandParser
from django.db import connection
from django.db.utils import Error as DatabaseError

from network.models import Station
from reports import services
from reports.management.benchmark import place, ratings, records, sections, work
from reports.management.benchmark.timing import Ratio

SMALL_NETWORK = {"stations": 100, "instruments": 300, "visits": 5_000, "gaugings": 2_500}


class Command(BaseCommand):
    """Measure in a throw-away database of the engine that DATABASE_URL names."""

    help = "Measure ratios side by side, medians of interleaved runs; print them and write a file."
    requires_system_checks: list[str] = ["printing"]

    def add_arguments(self, parser: CommandParser) -> None:
        """Take how long to measure and where to write."""
        parser.add_argument("--quick", action="store_true", help="fewer years and runs: a look")
        parser.add_argument("--output", type=Path, help="file; benchmark.txt in the data folder")

    def handle(self, *args: Any, quick: bool, output: Path | None, **options: Any) -> None:
        """Measure; end well whatever the ratios are, those out of hold marked."""
        lines = [f"{connection.vendor}, {'quick look' if quick else 'medians of 7 runs'}"]
        self.stdout.write(lines[0])
        try:
            for ratio in _ratios(quick=quick):
                lines.append(str(ratio))
                self.stdout.write(lines[-1])
                self.stdout.flush()
        except (DatabaseError, services.Refusal) as error:
            raise CommandError(str(error)) from error
        path = output or Path(settings.DATA_DIR) / "benchmark.txt"
        path.parent.mkdir(parents=True, exist_ok=True)
        path.write_text("\n".join(lines) + "\n", encoding="utf-8")
        self.stdout.write(f"Written to {path}.")


def _ratios(*, quick: bool) -> Iterator[Ratio]:
    """Measure one long record, its ratings and its yearbooks, then the work of a large network."""
    runs, years, yearbooks = (3, 3, 12) if quick else (7, 30, 50)
    yield from sections.ratios(runs=runs)
    printing = services.printer("management.benchmark.printing")
    with place.throw_away() as folder:
        yield from records.ratios(folder, years=years, runs=runs)
        yield from ratings.ratios(Station.objects.get(), years=years, runs=runs)
        yield from printing.ratios(folder, runs=2 if quick else runs, yearbooks=yearbooks)
    with place.throw_away():
        yield from work.ratios(runs=runs, **(SMALL_NETWORK if quick else {}))
