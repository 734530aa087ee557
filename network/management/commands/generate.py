"""Generate a network of any size into an empty database, for measuring and for trying out."""

from time import monotonic
from typing import Any

from django.core.management.base import BaseCommand, CommandError, CommandParser

from network.services import generated_network
from network.services.acts import Refusal


class Command(BaseCommand):
    """Make stations with records and ratings from a fixed seed."""

    help = "Generate stations with 15-minute stage and a rating each; the same seed, the same rows."

    def add_arguments(self, parser: CommandParser) -> None:
        """Take the size of the network and the seed."""
        parser.add_argument("--stations", type=int, default=50)
        parser.add_argument("--years", type=int, default=3, help="calendar years, the last is 2024")
        parser.add_argument("--seed", type=int, default=1)

    def handle(self, *args: Any, stations: int, years: int, seed: int, **options: Any) -> None:
        """Generate, with a line of progress for every few stations."""
        started = monotonic()

        def tell(n: int, total: int) -> None:
            self.stdout.write(f"{monotonic() - started:5.0f} s  stations: {n} of {total}")

        try:
            made = generated_network.generate(stations=stations, years=years, seed=seed, tell=tell)
        except Refusal as refusal:
            raise CommandError(refusal.sentence) from refusal
        self.stdout.write(f"{made} stations were made.")
