"""Packed months: readings merged in, months rebuilt from the original files, both compared."""

from collections.abc import Iterator
from datetime import UTC, date, datetime

import numpy as np
from django.utils.translation import gettext as _

from network.formats.faults import FileFault
from network.formats.logger_csv import LoggerFile, read
from network.models import Block, LoggerImport, Series
from network.numerics.records.blocks import encode
from network.numerics.records.readings import Readings, merge, split_by_month
from network.queries.blocks import month_of, months_between, read_months
from network.services import originals, profiles

Months = dict[date, Readings]


def readings_in(file: LoggerFile) -> Readings:
    """Return what a logger file holds as a record of raw readings."""
    return Readings(file.times_s, file.values_m, np.zeros(len(file.times_s), np.uint8))


def by_month(readings: Readings) -> Months:
    """Cut readings at the months of UTC, keyed by the first day."""
    return {date(*key, 1): part for key, part in split_by_month(readings).items()}


def merge_in(series: Series, readings: Readings) -> None:
    """Merge readings into the months of a locked series; what comes in wins over what is there."""
    parts = by_month(readings)
    there = read_months(series, months=list(parts))
    _save(
        series,
        {
            month: merge(there[month], part) if month in there else part
            for month, part in parts.items()
        },
    )


def rebuild(series: Series, *, start: datetime, end: datetime) -> None:
    """Make the months from start to end of a locked series anew from its standing imports."""
    months = list(months_between(start, end))
    rebuilt = rebuilt_months(series, months=months)
    Block.objects.filter(series=series, month__in=set(months) - set(rebuilt)).delete()
    _save(series, rebuilt)


def rebuilt_months(series: Series, *, months: list[date]) -> Months:
    """Return consecutive months as the originals of the standing imports make them, in order.

    The order of import is that of the keys: they are given under the lock on the series.
    Refuses, naming the file, where an original is lost or damaged.
    """
    wanted = set(months)
    rebuilt: Months = {}
    standing = LoggerImport.objects.standing().filter(series=series).select_related("profile")
    for logger_import in standing.order_by("pk"):
        if month_of(logger_import.last_at) < months[0]:
            continue
        if month_of(logger_import.first_at) > months[-1]:
            continue
        for month, part in by_month(readings_in(read_again(logger_import))).items():
            if month in wanted:
                rebuilt[month] = merge(rebuilt[month], part) if month in rebuilt else part
    return rebuilt


def read_again(logger_import: LoggerImport) -> LoggerFile:
    """Read the original of an import as it was read then; refuse one that is lost or changed."""
    # What was implausible then lies outside the readings kept then, and so it does now.
    profile = profiles.as_read(
        logger_import.profile,
        earliest_s=int(logger_import.first_at.timestamp()),
        latest_s=int(logger_import.last_at.timestamp()),
    )
    name = logger_import.original_name
    with originals.opened(logger_import.sha256, called=name) as stream:
        try:
            file = read(stream, profile)
        except FileFault as fault:
            raise originals.OriginalLost(
                _("The kept file “%(name)s” can no longer be read: %(why)s")
                % {"name": name, "why": profiles.said(fault.sentence)}
            ) from fault
    if file.sha256 != logger_import.sha256:
        raise originals.OriginalLost(
            _("The kept file “%(name)s” is no longer what was received; restore it from a backup.")
            % {"name": name}
        )
    return file


def months_that_differ(series: Series) -> list[date]:
    """Rebuild a series from the originals and return the months whose packed bytes differ."""
    stored = {
        month: bytes(data)
        for month, data in Block.objects.filter(series=series).values_list("month", "data")
    }
    ends = _ends(series)
    months = list(months_between(*ends)) if ends else []
    rebuilt = rebuilt_months(series, months=months) if months else {}
    return sorted(
        month
        for month in stored.keys() | rebuilt.keys()
        if month not in rebuilt or stored.get(month) != encode(rebuilt[month])
    )


def every_series() -> Iterator[Series]:
    """Yield all series with their station, in order of station."""
    yield from Series.objects.select_related("station").order_by("station__code", "label")


def _ends(series: Series) -> tuple[datetime, datetime] | None:
    standing = LoggerImport.objects.standing().filter(series=series)
    ends = [end for row in standing.values_list("first_at", "last_at") for end in row]
    return (min(ends), max(ends)) if ends else None


def _save(series: Series, months: Months) -> None:
    Block.objects.bulk_create(
        packed(series, months),
        update_conflicts=True,
        unique_fields=["series", "month"],
        update_fields=["data", "count", "first_at", "last_at"],
    )


def packed(series: Series, months: Months) -> list[Block]:
    """Return the unsaved blocks of a series for its months."""
    return [
        Block(
            series=series,
            month=month,
            data=encode(readings),
            count=len(readings),
            first_at=instant(readings.times_s[0]),
            last_at=instant(readings.times_s[-1]),
        )
        for month, readings in months.items()
    ]


def instant(at_s: np.int64) -> datetime:
    """Return epoch seconds as an instant in UTC."""
    return datetime.fromtimestamp(int(at_s), UTC)
