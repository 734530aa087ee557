"""Acts upon yearbooks: compile, issue, supersede, bind; and the proof that numbers still hold."""

import hashlib
from collections.abc import Sequence
from dataclasses import dataclass
from datetime import datetime, timedelta
from importlib import import_module
from pathlib import Path
from typing import Any

from django.conf import settings
from django.core.checks import run_checks
from django.utils import timezone, translation
from django.utils.translation import gettext as _

from network.formats import kept_files
from network.models import Person, Station
from network.numerics.marks import Mark
from network.queries import clock, readiness, station_years
from network.services.acts import Refusal, open_act, required_reason
from network.services.jobs import Report, ask_for, kind
from network.services.station_years import refresh
from reports import editions, particulars
from reports.content import book
from reports.models import Edition, Volume
from reports.yearbook import Yearbook

COMPILING = "yearbook"
SWEPT_AFTER = timedelta(days=1)


def printer(module: str) -> Any:
    """Load a module that prints: only who prints needs its system libraries and waits for them.

    Refuses, naming the packages to install, where the system lacks the libraries.
    """
    try:
        return import_module(f"reports.{module}")
    except OSError as error:
        lacking = run_checks(tags=["printing"])
        told = " ".join(f"{message.msg} {message.hint}" for message in lacking)
        raise Refusal(told or str(error)) from error


def _no_progress(_done: int, _total: int) -> None:
    """Tell nobody."""


def compile_edition(
    *,
    station: Station,
    year: int,
    by: Person,
    at: datetime,
    reason: str = "",
    language: str = "",
    progress: Report = _no_progress,
) -> Edition:
    """Compile the next edition of a station's year: PDF, data and the hash of the numbers.

    An edition that was compiled and never issued is replaced. Refuses a year without a record.
    language is the edition's language of print, the agency's where none is given.
    """
    edition = _next_edition(
        station=station, year=year, by=by, at=at, reason=reason, language=language
    )
    _write_files(edition, year, progress)
    verb = _("compiled the yearbook %(year)s") % {"year": edition.year_label}
    with open_act(verb, by=by, at=at, station=station):
        edition.save()
    return edition


def issue(
    *, edition: Edition, by: Person, at: datetime, reason: str = "", superseding: str = ""
) -> Edition:
    """Issue a compiled edition; from then on it is frozen. An earlier issued one is superseded.

    Issuing past an open point needs a reason, and superseding an edition needs one of its own
    (given here or when it was compiled); both are printed. Refuses when the record changed since
    the edition was compiled: what was looked at is what is issued.
    """
    if edition.state != Edition.State.COMPILED:
        raise Refusal(_("Only a compiled edition can be issued."))
    year = station_years.calendar().year_of(edition.first_day)
    seen = edition.numbers_sha256
    edition.open_points = "\n".join(_open_points(edition.station, year, edition.language))
    edition.reason = superseding.strip() or edition.reason
    _sign(edition, by=by, at=at, reason=reason)
    _write_files(edition, year)
    if edition.numbers_sha256 != seen:
        raise Refusal(_("The record changed since this was compiled. Compile and look again."))
    return _save_issued(edition, reason=reason)


def compile_and_issue(
    *,
    station: Station,
    year: int,
    by: Person,
    at: datetime,
    reason: str = "",
    superseding: str = "",
    language: str = "",
) -> Edition:
    """Compile and issue in one go, for years nobody needs to look at first."""
    edition = _next_edition(
        station=station, year=year, by=by, at=at, reason=superseding, language=language
    )
    _sign(edition, by=by, at=at, reason=reason)
    _write_files(edition, year)
    return _save_issued(edition, reason=reason)


def bind(*, bound: Sequence[Edition], title: str, by: Person, at: datetime) -> Volume:
    """Bind issued editions of one year into a volume with title, contents, sketch and summary."""
    if not bound:
        raise Refusal(_("There is no issued edition to bind."))
    if any(edition.state != Edition.State.ISSUED for edition in bound):
        raise Refusal(_("Only issued editions are bound."))
    if len({edition.first_day for edition in bound}) > 1:
        raise Refusal(_("A volume holds one water year."))
    volumes = printer("volumes")
    ordered = sorted(bound, key=lambda edition: edition.station.code)
    with kept_files.incoming(_folder()) as file:
        own = clock.agency()
        bound_on = at.astimezone(clock.record_clock(own)).date()
        volumes.write(
            volumes.contents_of(ordered), file.copy, title=title, agency=own, bound_on=bound_on
        )
        kept = file.keep(f"{file.sha256()}.pdf")
    with open_act(_("bound a volume"), by=by, at=at):
        volume = Volume.objects.create(
            title=title,
            first_day=ordered[0].first_day,
            year_label=ordered[0].year_label,
            bound_at=at,
            bound_by=by,
            pdf=_name_of(kept),
        )
        volume.editions.set(ordered)
    return volume


def sweep(*, at: datetime) -> list[Path]:
    """Remove the files of editions and volumes that no row names, older than a day; return them."""
    named = {Path(name).name for name in editions.named_files()}
    swept = kept_files.unnamed(_folder(), named=named, before=at - SWEPT_AFTER)
    for path in swept:
        path.unlink(missing_ok=True)
    return swept


def ask_to_compile(*, station: Station, year: int, language: str, by: Person, at: datetime) -> None:
    """Have an edition compiled as long work."""
    subject = " · ".join([station.code, str(year), language, by.username])
    ask_for(kind=COMPILING, subject=subject, by=by, at=at)


@kind(COMPILING)
def _compile_as_asked(subject: str, report: Report) -> str:
    code, year, language, username = subject.split(" · ")
    edition = compile_edition(
        station=Station.objects.get(code=code),
        year=int(year),
        language=language,
        by=Person.objects.get(username=username),
        at=timezone.now(),
        progress=report,
    )
    return str(edition)


def _next_edition(
    *, station: Station, year: int, by: Person, at: datetime, reason: str, language: str
) -> Edition:
    """Return the next edition of a year, not saved; it takes the row of one never issued."""
    refresh(station)  # the year and those printed beside it: each is computed once
    calendar = station_years.calendar()
    latest = editions.latest(station, calendar.first_day(year))
    again = latest is not None and latest.state == Edition.State.COMPILED
    return Edition(
        pk=latest.pk if again and latest else None,
        station=station,
        first_day=calendar.first_day(year),
        last_day=calendar.last_day(year),
        year_label=calendar.label(year),
        number=(latest.number if latest else 0) + (0 if again else 1),
        language=language or clock.agency().language,
        compiled_at=at,
        compiled_by=by,
        reason=reason.strip(),
        open_points="\n".join(_open_points(station, year, language or clock.agency().language)),
    )


def _sign(edition: Edition, *, by: Person, at: datetime, reason: str) -> None:
    """Make an edition an issued one, not saved; refuses where a reason is owed."""
    if edition.open_points:
        edition.open_points_reason = required_reason(reason)
    earlier = editions.issued_of(edition.station, edition.first_day)
    if earlier is not None and not edition.reason:
        raise Refusal(
            _("An edition is issued already: say why another one follows."), field="superseding"
        )
    edition.state, edition.issued_by, edition.issued_at = Edition.State.ISSUED, by, at


def _save_issued(edition: Edition, *, reason: str) -> Edition:
    """Save an issued edition, and the one it supersedes, in one act."""
    earlier = editions.issued_of(edition.station, edition.first_day)
    with open_act(
        _("issued the yearbook %(year)s") % {"year": edition.year_label},
        by=edition.issued_by,
        at=edition.issued_at,
        reason=reason.strip() or edition.reason,
        station=edition.station,
    ):
        if earlier is not None:
            earlier.state = Edition.State.SUPERSEDED
            earlier.save()
        edition.save()
    return edition


@dataclass(frozen=True)
class Owed:
    """What must be explained before an edition can be issued."""

    points: Sequence[str]
    earlier: Edition | None


def owed(edition: Edition) -> Owed:
    """Return what is open now, and the issued edition that would be superseded."""
    year = station_years.calendar().year_of(edition.first_day)
    return Owed(
        points=_open_points(edition.station, year),
        earlier=editions.issued_of(edition.station, edition.first_day),
    )


def _open_points(station: Station, year: int, language: str | None = None) -> list[str]:
    with translation.override(language or translation.get_language()):
        return readiness.open_points(station, station_years.year_of_station(station, year))


def _write_files(edition: Edition, year: int, progress: Report = _no_progress) -> None:
    """Compile content, PDF and data and name them by their hashes."""
    progress(0, 2)
    try:
        content, values = book.compile_book(
            edition.station, year, edition=_particulars(edition), language=edition.language
        )
    except LookupError as error:
        raise Refusal(str(error)) from error
    progress(1, 2)
    pdf = printer("rendering").render(content, csv=values)
    edition.numbers_sha256 = hashlib.sha256(values).hexdigest()
    edition.csv = _name_of(kept_files.keep(values, folder=_folder(), ending=".csv"))
    edition.pdf = _name_of(kept_files.keep(pdf, folder=_folder(), ending=".pdf"))
    _take_summary(edition, content)
    progress(2, 2)


def _take_summary(edition: Edition, content: Yearbook) -> None:
    """Keep the figures of the year as the edition prints them, for lists and volumes."""
    year = content.daily.year
    edition.mean_text = str(year.mean)
    edition.highest_text = str(year.highest_day.number)
    edition.highest_on = year.highest_day.when
    edition.lowest_text = str(year.lowest_day.number)
    edition.lowest_on = year.lowest_day.when
    edition.runoff_text = str(year.runoff_mm)
    cells = [cell for month in content.daily.months for cell in month.cells]
    edition.days_given = sum(not cell.marks & Mark.MISSING for cell in cells)


def _particulars(edition: Edition) -> particulars.Edition:
    own = clock.record_clock(clock.agency())
    points = edition.open_points.splitlines()
    return particulars.Edition(
        number=edition.number,
        compiled_on=edition.compiled_at.astimezone(own).date(),
        issued_on=edition.issued_at.astimezone(own).date() if edition.issued_at else None,
        issued_by=str(edition.issued_by or ""),
        supersedes=edition.reason,
        open_points=tuple(
            particulars.OpenPoint(text=point, reason=edition.open_points_reason) for point in points
        ),
    )


def _folder() -> Path:
    return Path(settings.MEDIA_ROOT, editions.FOLDER)


def _name_of(kept: Path) -> str:
    return f"{editions.FOLDER}/{kept.name}"
