"""Mapping profiles: recorded and checked, frozen once used, handed to the reader of files."""

from datetime import datetime
from typing import Any

from django.utils.translation import gettext as _

from network.formats.faults import FileFault, Sentence
from network.formats.logger_profile import WHITE_SPACE, Profile
from network.models import MappingProfile, Person
from network.queries.series import is_used
from network.services.acts import Refusal, open_act

DELIMITERS = {"tab": "\t", "space": WHITE_SPACE}
ENCODINGS = {"latin-1": "cp1252"}  # which holds all of Latin-1's letters


def as_read(profile: MappingProfile, **plausible: int) -> Profile:
    """Return a profile as the reader takes it; earliest_s and latest_s bound plausible instants.

    Refuses, with its sentence, a profile that contradicts itself.
    """
    times = [name for name in (profile.time_column, profile.clock_column) if name]
    columns = [_column(name) for name in (*times, profile.value_column)]
    if not profile.has_column_names and any(isinstance(column, str) for column in columns):
        raise Refusal(
            _("Columns can be named only where the file has a line of column names."),
            field="time_column",
        )
    civil = profile.clock == MappingProfile.Clock.CIVIL
    try:
        return Profile(
            time_columns=tuple(columns[:-1]),
            value_column=columns[-1],
            time_format=profile.time_format.strip(),
            delimiter=DELIMITERS.get(profile.delimiter, profile.delimiter),
            header_lines=profile.header_lines + profile.has_column_names,
            decimal=profile.decimal_sign,
            unit=profile.unit,
            encoding=ENCODINGS.get(profile.encoding, profile.encoding),
            clock=profile.civil_zone if civil else profile.utc_offset_minutes,
            missing=tuple(profile.missing_texts.split()),
            **plausible,
        )
    except FileFault as fault:
        raise Refusal(said(fault.sentence)) from fault


def record_profile(
    *, profile: MappingProfile, by: Person, at: datetime, values: dict[str, Any] | None = None
) -> MappingProfile:
    """Save a profile, new or not yet used, with these values; refuse a used one.

    Copy a used profile under another name instead: the imports must stay readable as they were.
    """
    with open_act(_("record mapping profile"), by=by, at=at):
        if is_used(profile):
            raise Refusal(_("An import was read by this profile; make a copy and change that."))
        for name, value in (values or {}).items():
            setattr(profile, name, value)
        profile.full_clean()
        as_read(profile)
        profile.save()
    return profile


def copy_profile(*, profile: MappingProfile, name: str, by: Person, at: datetime) -> MappingProfile:
    """Record a copy of a profile under another name; the copy may be changed until it is used."""
    values = {
        field.name: getattr(profile, field.name)
        for field in MappingProfile._meta.concrete_fields
        if not field.primary_key
    }
    copy = MappingProfile()
    return record_profile(profile=copy, by=by, at=at, values={**values, "name": name.strip()})


def said(sentence: str) -> str:
    """Return a sentence of the file reader in the user's language."""
    if not isinstance(sentence, Sentence):
        return sentence
    return str(_(sentence.template) % sentence.values)


def _column(name: str) -> int | str:
    return int(name) if name.strip().isdecimal() else name.strip()
