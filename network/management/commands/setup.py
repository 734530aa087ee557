"""Make an installation ready: folder, secret key, database, agency, first person."""

import getpass
import os
import re
from pathlib import Path
from typing import Any

from django.conf import settings
from django.core.management import call_command
from django.core.management.base import BaseCommand, CommandError, CommandParser
from django.utils import timezone

from network.queries import clock
from network.services import setting_up
from network.services.acts import Refusal

PASSWORD = "GAUGEWRIGHT_FIRST_PASSWORD"
OFFSET = re.compile(r"(?:UTC)?([+-])(\d{1,2})(?::?([0-5]\d))?")


def minutes_of(text: str) -> int:
    """Return an offset such as +01:00, -3:30 or 0 as minutes; raise CommandError for another."""
    found = OFFSET.fullmatch(text.strip().replace("−", "-"))
    if text.strip() in {"0", "UTC"}:
        return 0
    if found is None:
        raise CommandError(f"The record clock is an offset such as +01:00, not “{text}”.")
    sign, hours, minutes = found.groups()
    return int(f"{sign}1") * (60 * int(hours) + int(minutes or 0))


class Command(BaseCommand):
    """Set an installation up; run again it only does what is still missing."""

    help = (
        "Make the data folder and secret key, bring the database up to date, and write the agency "
        f"and its first person. The password comes from a prompt or from {PASSWORD}."
    )
    requires_system_checks: list[str] = []  # what they would find missing is made here

    def add_arguments(self, parser: CommandParser) -> None:
        """Take every answer as an option, for scripts."""
        add = parser.add_argument
        add("--no-input", action="store_true", help="ask nothing: options and defaults decide")
        add("--name", help="name of the agency")
        add("--record-clock", help="offset of the record clock from UTC, such as +01:00")
        add("--civil-zone", help="zone that people's watches show, such as Europe/Vienna")
        add("--day-starts-at", help="hour at which a day starts, 0 to 23")
        add("--water-year-starts", help="first month of the water year, 1 to 12")
        add("--water-year-named-by", help="start or end: the year a water year is named after")
        add("--user", help="login of the first person")

    def handle(self, *args: Any, **options: Any) -> None:
        """Do what is missing, and say a line about each step."""
        self.options = options
        try:
            self._make_files()
            call_command("migrate", interactive=False, verbosity=0)
            self.stdout.write("The database is up to date.")
            self._found_agency()
            self._first_person()
        except Refusal as refusal:
            raise CommandError(refusal.sentence) from refusal
        except OSError as error:
            raise CommandError(f"The data folder cannot be written: {error}") from error
        self.stdout.write(self.style.SUCCESS("This installation is set up."))

    def _make_files(self) -> None:
        folder = Path(settings.DATA_DIR)
        made = setting_up.make_folder(folder)
        self.stdout.write(f"Data folder {folder}: {'made' if made else 'there already'}.")
        setting_up.make_folder(Path(settings.MEDIA_ROOT))
        if os.environ.get("GAUGEWRIGHT_SECRET_KEY"):
            self.stdout.write("Secret key: taken from the environment.")
            return
        made = setting_up.make_secret_key(Path(settings.SECRET_KEY_FILE))
        self.stdout.write(f"Secret key: {'made' if made else 'there already'}.")

    def _found_agency(self) -> None:
        agency = clock.agency()
        if not agency._state.adding:
            self.stdout.write(f"Agency: {agency.name} is there already and stays as it is.")
            return
        clocks = setting_up.Clocks(
            record_utc_offset_minutes=minutes_of(
                self._answer("record_clock", "Record clock, offset from UTC", "+00:00")
            ),
            civil_zone=self._answer("civil_zone", "Zone of people's watches", "UTC"),
            day_starts_at_hour=self._number("day_starts_at", "Hour at which a day starts", "0"),
            water_year_start_month=self._number(
                "water_year_starts", "First month of the water year", "1"
            ),
            water_year_named_by_end=self._named_by_end(),
        )
        name = self._answer("name", "Name of the agency", "")
        agency = setting_up.found_agency(name=name, clocks=clocks, at=timezone.now())
        zone = clock.record_clock(agency)
        self.stdout.write(f"Agency: {agency.name}, record clock {zone}.")

    def _first_person(self) -> None:
        if setting_up.first_person_is_there():
            self.stdout.write("First person: there already.")
            return
        username = self._answer("user", "Login of the first person", "manager")
        person = setting_up.first_person(
            username=username, password=self._password(), at=timezone.now()
        )
        self.stdout.write(f"First person: {person.username}, who holds every role.")

    def _answer(self, option: str, question: str, default: str) -> str:
        """Return an option, else what is typed, else the default."""
        given = self.options[option]
        if given is None and not self.options["no_input"]:
            given = input(f"{question} [{default}]: ").strip()
        answer = given or default
        if not answer:
            raise CommandError(f"{question}: give it with --{option.replace('_', '-')}.")
        return str(answer)

    def _number(self, option: str, question: str, default: str) -> int:
        answer = self._answer(option, question, default)
        if not answer.isdecimal():
            raise CommandError(f"{question}: a whole number, not “{answer}”.")
        return int(answer)

    def _named_by_end(self) -> bool:
        question = "A water year is named after the year of its start or its end"
        answer = self._answer("water_year_named_by", question, "end")
        if answer not in {"start", "end"}:
            raise CommandError(f"{question}: “start” or “end”, not “{answer}”.")
        return answer == "end"

    def _password(self) -> str:
        password = os.environ.get(PASSWORD, "")
        if not password and self.options["no_input"]:
            raise CommandError(f"Put the first person's password into {PASSWORD}.")
        if not password:
            password = getpass.getpass("Password: ")
            if getpass.getpass("Password again: ") != password:
                raise CommandError("The two passwords differ; nothing was changed about people.")
        return password
