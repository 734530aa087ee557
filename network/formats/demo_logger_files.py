"""Writes the demo network's logger files with their quirks, and says how to read them."""

from collections.abc import Iterator, Sequence
from datetime import UTC, datetime, timedelta, timezone, tzinfo
from zoneinfo import ZoneInfo

from network.formats.demo_field_rows import LoggerFile
from network.formats.logger_profile import UNITS_PER_M, Profile


def write_logger_file(file: LoggerFile, *, times_s: Sequence[int], raw_m: Sequence[float]) -> bytes:
    """Return the bytes of a logger file: heading, rows in its clock and unit, faulty rows.

    times_s: epoch seconds UTC, raw_m: the recorder's raw values in m, of one length; those before
    the file's start and from its end on are left out. Raises ValueError where the lengths differ.
    """
    inside = [
        (at, raw)
        for at, raw in zip(times_s, raw_m, strict=True)
        if file.start.timestamp() <= at < file.end.timestamp()
    ]
    lines = [*file.heading, *_rows(file, inside), ""]
    return file.line_end.join(lines).encode(file.encoding)


def profile_of(file: LoggerFile) -> Profile:
    """Return the mapping profile with which the file is read back."""
    return Profile(
        time_columns=(file.columns.index("time") + 1,),
        value_column=file.columns.index("raw") + 1,
        time_format=file.time_format,
        delimiter=file.delimiter,
        header_lines=len(file.heading),
        decimal="," if file.decimal_sign == "," else ".",
        unit=file.unit,  # type: ignore[arg-type]  # a wrong unit is refused by the profile
        encoding=file.encoding,
        clock=file.zone or file.utc_offset_minutes,
    )


def _rows(file: LoggerFile, readings: Sequence[tuple[int, float]]) -> Iterator[str]:
    cells = [_column(file, name, readings) for name in file.columns]
    faulty = {row.before_row: row.text for row in file.faulty_rows}
    for n, row in enumerate(zip(*cells, strict=True)):
        if n in faulty:
            yield faulty[n]
        yield file.delimiter.join(row)


def _column(file: LoggerFile, name: str, readings: Sequence[tuple[int, float]]) -> list[str]:
    """Write one column; temperature and battery nobody reads here: plain waves will do."""
    if name == "raw":
        scale = UNITS_PER_M[file.unit]
        return [_number(raw_m * scale, decimals=file.decimals, file=file) for _, raw_m in readings]
    clock: tzinfo = timezone(timedelta(minutes=file.utc_offset_minutes))
    if file.zone:
        clock = ZoneInfo(file.zone)
    if name == "time" and file.time_format == "ISO":
        return [_iso(at_s) for at_s, _ in readings]
    times = [datetime.fromtimestamp(at_s, UTC).astimezone(clock) for at_s, _ in readings]
    if name == "time":
        return [at.strftime(file.time_format) for at in times]
    middle, swing = {"temperature": (12.0, 9.0), "battery": (12.4, 0.3)}[name]
    waves = [middle + swing * _wave(at.timetuple().tm_yday) for at in times]
    return [_number(value, decimals=1, file=file) for value in waves]


def _iso(at_s: int) -> str:
    return f"{datetime.fromtimestamp(at_s, UTC).replace(tzinfo=None).isoformat()}Z"


def _wave(day_of_year: int) -> float:
    """Return a yearly wave without a sine: −1 in mid-January, +1 in mid-July."""
    return 1 - abs((day_of_year - 14) % 365 - 182.5) / 91.25


def _number(value: float, *, decimals: int, file: LoggerFile) -> str:
    return f"{value:.{decimals}f}".replace(".", file.decimal_sign)
