"""Import logger files into a series: looked at first, taken whole or not at all, withdrawn."""

from collections.abc import Sequence
from concurrent.futures import ThreadPoolExecutor
from dataclasses import dataclass
from datetime import date, datetime
from itertools import islice
from typing import Any, BinaryIO, cast

import numpy as np
from django.utils.translation import gettext as _
from django.utils.translation import ngettext

from network.formats.faults import FileFault, RowFault
from network.formats.logger_csv import LoggerFile, read
from network.formats.text_encoding import Progress
from network.models import ImportFault, LoggerImport, MappingProfile, Person, Series
from network.numerics.records.readings import Readings
from network.queries import blocks as stored
from network.queries.series import operation_span
from network.services import blocks, originals, profiles
from network.services.acts import (
    Refusal,
    open_act,
    raise_record_version,
    withdraw,
)

FAULTS_NAMED = 3
TENTHS_OF_MM = 10_000  # per metre: as fine as readings are kept


class AlreadyImported(Refusal):
    """This file is in the series already; nothing was changed."""


class FaultyRows(Refusal):
    """The file has rows that cannot be read, and nobody said yet that they may be skipped."""


@dataclass(frozen=True)
class Fault:
    """A row of the file that is not as it should be, in the user's words; `kept` rows are odd."""

    line: int
    text: str
    reason: str
    kept: bool


@dataclass(frozen=True)
class Preview:
    """What a file would bring, before anything is written.

    rows_new, rows_changed and rows_equal compare its readings with those of the series.
    """

    sha256: str
    rows_read: int
    rows_missing: int
    rows_kept: int
    rows_faulty: int
    first_at: datetime
    last_at: datetime
    faults: tuple[Fault, ...]
    rows_new: int
    rows_changed: int
    rows_equal: int
    months: tuple[date, ...]
    already: LoggerImport | None


def dry_run(
    *,
    series: Series,
    profile: MappingProfile,
    file: BinaryIO,
    at: datetime,
    keep: bool = False,
    progress: Progress | None = None,
) -> Preview:
    """Read a file and tell what an import would do; no row is written.

    With `keep` the file stays under its hash until it is imported or swept.
    Refuses, with its sentence, a file of which nothing can be used.
    """
    if not keep:
        return _preview(series, _read(file, series=series, profile=profile, at=at, tell=progress))
    with originals.receiving(file) as received:
        stream = cast("BinaryIO", received)
        found = _read(stream, series=series, profile=profile, at=at, tell=progress)
        received.keep(found.sha256)
    return _preview(series, found)


def import_file(
    *,
    series: Series,
    profile: MappingProfile,
    file: BinaryIO,
    original_name: str,
    skip_faulty: bool,
    by: Person,
    at: datetime,
    progress: Progress | None = None,
) -> LoggerImport:
    """Take a logger file into a series: keep the original, merge its readings, list its faults.

    `progress` is called with the bytes read and the bytes in all. Where files overlap, the one
    imported later wins. Raises AlreadyImported for a file the series has, FaultyRows where rows
    cannot be read and `skip_faulty` is not set, Refusal for a file that cannot be used at all.
    """
    with originals.receiving(file) as received:
        stream = cast("BinaryIO", received)
        found = _read(stream, series=series, profile=profile, at=at, tell=progress)
        _refuse_known(series, found.sha256)
        if found.faults and not skip_faulty:
            raise FaultyRows(_faulty_sentence(found.faults), field="skip_faulty")
        # The disk flushes the file while the months are packed; the row is committed after both.
        with ThreadPoolExecutor(1) as disk:
            keeping = disk.submit(received.keep, found.sha256)
            with open_act(_("import logger file"), by=by, at=at, station=series.station):
                row = _record(
                    found, series=series, profile=profile, by=by, at=at, original_name=original_name
                )
                keeping.result()
    return row


def _record(
    found: LoggerFile,
    *,
    series: Series,
    profile: MappingProfile,
    by: Person,
    at: datetime,
    original_name: str,
) -> LoggerImport:
    """Write the row of a file, its faults and its readings, within the open act."""
    locked = _locked(series)
    _refuse_known(locked, found.sha256)
    row = LoggerImport.objects.create(
        series=locked,
        profile=profile,
        file=originals.name_of(found.sha256),
        original_name=_last_part(original_name),
        sha256=found.sha256,
        recorded_at=at,
        recorded_by=by,
        **_counts(found),
    )
    ImportFault.objects.bulk_create(_fault_rows(row, found.faults), batch_size=2_000)
    blocks.merge_in(locked, blocks.readings_in(found))
    raise_record_version(series.station)
    return row


def withdraw_import(*, logger_import: LoggerImport, by: Person, at: datetime, reason: str) -> None:
    """Withdraw an import: its months become what they are without it, read from the originals.

    Refuses, and changes nothing, where the original of another import is lost or damaged.
    """
    series = logger_import.series
    with open_act(
        _("withdraw import"), by=by, at=at, reason=reason.strip(), station=series.station
    ):
        locked = _locked(series)
        row = LoggerImport.objects.get(pk=logger_import.pk)
        withdraw(row, by=by, at=at, reason=reason)
        blocks.rebuild(locked, start=row.first_at, end=row.last_at)
        raise_record_version(series.station)


def _locked(series: Series) -> Series:
    """Lock the row of a series: a month's first block does not exist yet to be locked."""
    return Series.objects.select_for_update(no_key=True).get(pk=series.pk)


def _read(
    file: BinaryIO,
    *,
    series: Series,
    profile: MappingProfile,
    at: datetime,
    tell: Progress | None,
) -> LoggerFile:
    earliest, latest = operation_span(series, at=at)
    bounds = {"latest_s": int(latest.timestamp())}
    if earliest is not None:
        bounds["earliest_s"] = int(earliest.timestamp())
    as_read = profiles.as_read(profile, **bounds)
    try:
        found = read(file, as_read, progress=tell)
    except FileFault as fault:
        raise Refusal(profiles.said(fault.sentence), field="file") from fault
    if not len(found.times_s):
        raise Refusal(_("The file has no reading that can be used."), field="file")
    return found


def _refuse_known(series: Series, sha256: str) -> None:
    known = _known(series, sha256)
    if known is not None:
        raise AlreadyImported(
            _("This file is already in the series, imported on %(day)s; nothing was changed.")
            % {"day": f"{known.recorded_at:%Y-%m-%d}"},
            field="file",
        )


def _known(series: Series, sha256: str) -> LoggerImport | None:
    return LoggerImport.objects.standing().filter(series=series, sha256=sha256).first()


def _faulty_sentence(faults: Sequence[RowFault]) -> str:
    first = "; ".join(
        _("line %(line)d: %(reason)s") % {"line": fault.line, "reason": profiles.said(fault.reason)}
        for fault in islice(faults, FAULTS_NAMED)
    )
    return ngettext(
        "%(count)d row is faulty (%(first)s). Confirm that it may be skipped.",
        "%(count)d rows are faulty (%(first)s). Confirm that they may be skipped.",
        len(faults),
    ) % {"count": len(faults), "first": first + ("; …" if len(faults) > FAULTS_NAMED else "")}


def _counts(found: LoggerFile) -> dict[str, Any]:
    return {
        "rows_read": found.rows_read,
        "rows_kept": len(found.times_s),
        "rows_faulty": sum(not fault.kept for fault in found.faults),
        "first_at": blocks.instant(found.times_s[0]),
        "last_at": blocks.instant(found.times_s[-1]),
    }


def _fault_rows(row: LoggerImport, faults: Sequence[RowFault]) -> list[ImportFault]:
    return [
        ImportFault(
            logger_import=row,
            line=fault.line,
            text=fault.text[:200],
            reason=profiles.said(fault.reason)[:200],
        )
        for fault in faults
    ]


def _preview(series: Series, found: LoggerFile) -> Preview:
    readings = blocks.readings_in(found)
    new, changed, equal = _compared(series, readings)
    return Preview(
        sha256=found.sha256,
        rows_missing=found.rows_missing,
        faults=tuple(
            Fault(fault.line, fault.text, profiles.said(fault.reason), fault.kept)
            for fault in found.faults
        ),
        rows_new=new,
        rows_changed=changed,
        rows_equal=equal,
        months=tuple(blocks.by_month(readings)),
        already=_known(series, found.sha256),
        **_counts(found),
    )


def _compared(series: Series, readings: Readings) -> tuple[int, int, int]:
    """Count the readings that the series lacks, has otherwise, and has already."""
    ends = int(readings.times_s[0]), int(readings.times_s[-1])
    there = stored.read(series.pk, *ends)
    common, ours, theirs = np.intersect1d(
        readings.times_s, there.times_s, assume_unique=True, return_indices=True
    )
    units = np.rint(readings.values_m[ours] * TENTHS_OF_MM)
    changed = np.count_nonzero(units != np.rint(there.values_m[theirs] * TENTHS_OF_MM))
    return len(readings) - len(common), int(changed), len(common) - int(changed)


def _last_part(name: str) -> str:
    """Return a file's name without any folders, as long as the row takes."""
    return name.replace("\\", "/").rsplit("/", 1)[-1][-255:]
