"""Load the demo network into an empty installation."""

from pathlib import Path
from time import monotonic
from typing import Any

from django.conf import settings
from django.core.management import call_command
from django.core.management.base import BaseCommand, CommandError, CommandParser

from network.formats.demo_scenario import read_scenario
from network.formats.typed_toml import ScenarioError
from network.services import demo_loader, setting_up
from network.services.acts import Refusal

PASSWORD = "demo-of-the-veldra"


class Command(BaseCommand):
    """Load the invented network of fixtures_demo through the services that take users' data."""

    help = "Load the demo network into an empty installation, with a line of progress at each step."
    requires_system_checks: list[str] = ["printing"]

    def add_arguments(self, parser: CommandParser) -> None:
        """Take where the scenario lies and, for a quick look, some of its stations."""
        parser.add_argument(
            "--scenario", type=Path, default=settings.BASE_DIR / "fixtures_demo", help="its folder"
        )
        parser.add_argument("--stations", nargs="*", default=[], help="codes; all where none given")

    def handle(self, *args: Any, scenario: Path, stations: list[str], **options: Any) -> None:
        """Set the installation up where needed and load; do nothing where the demo is loaded."""
        started = monotonic()

        def tell(stage: str, n: int, total: int) -> None:
            self.stdout.write(f"{monotonic() - started:5.0f} s  {stage}: {n} of {total}")
            self.stdout.flush()

        try:
            story = read_scenario(scenario)
            self._ready(tell)
            if demo_loader.is_loaded(story):
                self.stdout.write("The demo is loaded already.")
            else:
                folder = Path(settings.DATA_DIR) / "logger_files"
                demo_loader.load(story, password=PASSWORD, folder=folder, tell=tell, only=stations)
                self.stdout.write(f"The logger files are in {folder}.")
        except (Refusal, ScenarioError) as error:
            raise CommandError(str(error)) from error
        self._tell_logins(story)

    def _ready(self, tell: demo_loader.Tell) -> None:
        """Make folder and key and bring the database up to date, as setup does."""
        tell("folder, key and database", 1, 1)
        setting_up.make_folder(Path(settings.DATA_DIR))
        setting_up.make_folder(Path(settings.MEDIA_ROOT))
        setting_up.make_secret_key(Path(settings.SECRET_KEY_FILE))
        call_command("migrate", interactive=False, verbosity=0)

    def _tell_logins(self, story: Any) -> None:
        self.stdout.write(f"Log in with the password {PASSWORD} (for this demo only) as")
        for person in story.people:
            self.stdout.write(f"  {person.username:<14} {person.role.replace('_', ' ')}")
