"""Set an installation up: its folder and secret key, its agency, its first person."""

import os
from dataclasses import dataclass
from datetime import datetime
from pathlib import Path
from zoneinfo import available_timezones

from django.core.management.utils import get_random_secret_key
from django.utils.translation import gettext as _

from network.models import Agency, Office, Person, WorkingRules
from network.services import people, roles
from network.services.acts import Refusal, open_act

OWNER_ONLY = 0o700
OWNER_READS = 0o600


@dataclass(frozen=True, kw_only=True)
class Clocks:
    """What can hardly be changed later: the record clock, the watches, the water year."""

    record_utc_offset_minutes: int = 0
    civil_zone: str = "UTC"
    day_starts_at_hour: int = 0
    water_year_start_month: int = 1
    water_year_named_by_end: bool = True


def make_folder(folder: Path) -> bool:
    """Make a folder that only its owner can enter; return whether it was missing."""
    if folder.is_dir():
        return False
    folder.mkdir(parents=True, mode=OWNER_ONLY)
    folder.chmod(OWNER_ONLY)  # whatever the umask says
    return True


def make_secret_key(file: Path) -> bool:
    """Write a secret key only its owner can read; return whether there was none.

    The permissions of a key that is there already are narrowed to its owner.
    """
    if file.is_file() and file.read_text().strip():
        file.chmod(OWNER_READS)
        return False
    new = file.with_name(f"{file.name}.new")
    new.unlink(missing_ok=True)
    with open(os.open(new, os.O_CREAT | os.O_EXCL | os.O_WRONLY, OWNER_READS), "w") as stream:
        stream.write(get_random_secret_key())
        stream.flush()
        os.fsync(stream.fileno())
    os.replace(new, file)
    return True


def found_agency(*, name: str, clocks: Clocks, at: datetime, **particulars: object) -> Agency:
    """Write the agency of a new installation and its working rules; refuse a second one.

    `particulars` are other fields of the agency: address, licence_line, decimal_sign and so on.
    """
    if Agency.objects.exists():
        raise Refusal(_("This installation has its agency already."))
    if not name.strip():
        raise Refusal(_("Give the name of the agency."), field="name")
    if clocks.civil_zone not in available_timezones():
        raise Refusal(
            _("“%(zone)s” is not the name of a time zone.") % {"zone": clocks.civil_zone},
            field="civil_zone",
        )
    with open_act(_("set the agency up"), by=None, at=at):
        agency = Agency(pk=1, name=name.strip(), **vars(clocks), **particulars)
        agency.full_clean()
        agency.save()
        WorkingRules.objects.get_or_create(pk=1)
    return agency


def open_office(
    *,
    name: str,
    by: Person | None,
    at: datetime,
    address: str = "",
    latitude_deg: float | None = None,
    longitude_deg: float | None = None,
) -> Office:
    """Open an office from which stations are served."""
    with open_act(_("opened an office"), by=by, at=at):
        office = Office(
            name=name.strip(),
            address=address,
            latitude_deg=latitude_deg,
            longitude_deg=longitude_deg,
        )
        office.full_clean()
        office.save()
    return office


def first_person_is_there() -> bool:
    """Tell whether someone may do everything already."""
    return Person.objects.filter(is_active=True, is_superuser=True).exists()


def first_person(*, username: str, password: str, at: datetime) -> Person:
    """Take on the first person, who holds every role and may do everything; refuse a second."""
    if first_person_is_there():
        raise Refusal(_("This installation has a person who may do everything already."))
    return people.take_on(
        username=username,
        password=password,
        roles_held=list(roles.TABLE),
        is_superuser=True,
        by=None,
        at=at,
    )
