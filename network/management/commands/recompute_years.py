"""Compute the cached station years anew, or prove that they are what computing gives."""

from typing import Any

from django.core.management.base import BaseCommand, CommandError, CommandParser

from network.queries.series import Unknown
from network.queries.stations import stations_named
from network.services import station_years


class Command(BaseCommand):
    """Refresh or verify the cache of station years."""

    help = "Compute every stale station year; with --check compare the fresh ones bit by bit."

    def add_arguments(self, parser: CommandParser) -> None:
        """Take station codes, all where none is given."""
        parser.add_argument("codes", nargs="*", help="codes of stations; all where none is given")
        parser.add_argument("--check", action="store_true", help="compute again and compare")

    def handle(self, *args: Any, codes: list[str], check: bool, **options: Any) -> None:
        """Work through the stations, one line each."""
        try:
            stations = stations_named(codes)
        except Unknown as unknown:
            raise CommandError(str(unknown)) from unknown
        different = 0
        for station in stations:
            if check:
                compared = station_years.verify(station)
                wrong = [str(one.year) for one in compared if not one.same]
                different += len(wrong)
                told = f"{len(compared)} years compared, different: {', '.join(wrong) or 'none'}"
            else:
                told = f"{station_years.refresh(station)} years computed"
            self.stdout.write(f"{station}: {told}")
        if different:
            raise CommandError(f"{different} cached years differ from what computing gives.")
