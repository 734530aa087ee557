"""Answers about editions: what is issued, what changed since, and what an act would touch."""

import hashlib
from collections.abc import Sequence
from dataclasses import dataclass
from datetime import date
from itertools import chain

from django.utils.translation import gettext as _

from network.formats import daily_csv
from network.formats.daily_csv import DailyRow
from network.formats.faults import FileFault
from network.models import Station
from network.queries import station_years
from reports.content import book, year_data
from reports.models import Edition, Volume

FOLDER = "editions"  # below the media folder


class EditionLost(Exception):
    """The data of an edition are not where they were kept, or no longer what was issued."""


@dataclass(frozen=True)
class DayChange:
    """A day whose value is no longer the one issued; None where there is none."""

    day: date
    issued: float | None
    now: float | None

    @property
    def difference(self) -> float | None:
        """What it is now minus what was issued; None where one of them is missing."""
        return None if self.issued is None or self.now is None else self.now - self.issued


def latest(station: Station, first_day: date) -> Edition | None:
    """Return the latest edition of a station's year, in whatever state."""
    rows = Edition.objects.filter(station=station, first_day=first_day)
    return rows.order_by("-number").first()


def issued_of(station: Station, first_day: date) -> Edition | None:
    """Return the issued edition of a station's year."""
    rows = Edition.objects.filter(station=station, first_day=first_day)
    return rows.filter(state=Edition.State.ISSUED).first()


def issued_in(first_day: date) -> list[Edition]:
    """Return the issued editions of the water year that starts on a day, by station."""
    rows = Edition.objects.filter(first_day=first_day, state=Edition.State.ISSUED)
    return list(rows.select_related("station").order_by("station__code"))


def changed_since(edition: Edition) -> list[DayChange]:
    """Compute the year again and return the days that differ from the edition's data.

    Raises EditionLost where the data cannot be read or are not those of the edition's hash.
    """
    kept = issued_rows(edition)
    year = station_years.calendar().year_of(edition.first_day)
    now = daily_csv.read(book.daily_values(year_data.read_alone(edition.station, year))).rows
    return [
        DayChange(then.date, then.value, today.value)
        for then, today in zip(kept, now, strict=True)
        if then.value != today.value
    ]


def largest(changes: Sequence[DayChange]) -> DayChange | None:
    """Return the change of the largest difference, a lost or new value before any other."""
    return max(
        changes,
        key=lambda each: float("inf") if each.difference is None else abs(each.difference),
        default=None,
    )


def issued_rows(edition: Edition) -> Sequence[DailyRow]:
    """Return the days of an edition as they were issued; raises EditionLost."""
    try:
        with edition.csv.open("rb") as file:
            data = file.read()
        if hashlib.sha256(data).hexdigest() != edition.numbers_sha256:
            raise EditionLost(_("The data file of this edition is not the one that was issued."))
        return daily_csv.read(data).rows
    except (OSError, ValueError, FileFault) as error:
        raise EditionLost(_("The data file of this edition cannot be read.")) from error


def touched_by(station: Station, days: Sequence[date]) -> list[Edition]:
    """Return the issued editions of a station whose year holds one of the days."""
    if not days:
        return []
    issued = Edition.objects.filter(station=station, state=Edition.State.ISSUED)
    issued = issued.filter(first_day__lte=max(days), last_day__gte=min(days))
    return [
        edition
        for edition in issued
        if any(edition.first_day <= day <= edition.last_day for day in days)
    ]


def file_name(edition: Edition, ending: str) -> str:
    """Return the name a reader's copy of an edition bears, such as "VE-010_2024_edition-1.pdf"."""
    year = edition.year_label.replace("/", "-")
    return f"{edition.station.code}_{year}_edition-{edition.number}{ending}"


def volume_name(volume: Volume) -> str:
    """Return the name a reader's copy of a volume bears."""
    return f"volume_{volume.year_label.replace('/', '-')}_{volume.pk}.pdf"


def named_files() -> set[str]:
    """Return the names of all files that editions and volumes, of today or before, name."""
    rows = (
        model.objects.values_list(field, flat=True)
        for model, field in ((Edition, "pdf"), (Edition, "csv"), (Volume, "pdf"))
    )
    return set(chain.from_iterable(rows))
