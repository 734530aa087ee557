"""Time texts of a logger → epoch seconds UTC; what a civil zone leaves open is a fault."""

import datetime as dt
import re
from zoneinfo import ZoneInfo

import numpy as np
import numpy.typing as npt
import pandas as pd

from network.formats.faults import Sentence
from network.formats.faults import sentence as _
from network.formats.logger_profile import Profile

# pandas reads these words as the present time, whatever the format: a file has no clock.
CLOCK_WORDS = ("now", "today")
OWN_OFFSET = re.compile(r".*\d[T ]\d.*(Z|[+-]\d\d(:?\d\d)?)$", re.IGNORECASE)
NO_TIME = np.iinfo(np.int64).min


def pandas_format(profile: Profile) -> str:
    """Give the profile's time format in the words of pandas."""
    return "ISO8601" if profile.time_format == "ISO" else profile.time_format


def parse_times(texts: list[str], profile: Profile) -> npt.NDArray[np.int64]:
    """Turn texts into epoch seconds UTC, NO_TIME where a text is no time or no single instant.

    Fractions of a second are dropped.
    """
    series = pd.Series(texts, dtype=object)
    if profile.time_format == "ISO":
        own = np.array([bool(OWN_OFFSET.match(text)) for text in texts], np.bool_)
    else:
        own = np.full(len(texts), "%z" in profile.time_format)
    series[series.str.strip().str.lower().isin(CLOCK_WORDS)] = ""
    times_s = np.full(len(series), NO_TIME)
    for mask, aware in ((own, True), (~own, False)):
        if mask.any():
            parsed = pd.to_datetime(
                series[mask], format=pandas_format(profile), errors="coerce", utc=aware
            )
            times_s[mask] = epoch_seconds(parsed, profile)
    return times_s


def epoch_seconds(parsed: pd.Series, profile: Profile) -> npt.NDArray[np.int64]:
    """Turn a column of pandas datetimes into epoch seconds UTC by the profile's clock.

    Times with an offset of their own keep it. NO_TIME stands for not-a-time and for a civil hour
    that happens twice or never.
    """
    index, offset_s = pd.DatetimeIndex(parsed), 0
    if index.tz is None and isinstance(profile.clock, str):
        zone = ZoneInfo(profile.clock)
        index = index.tz_localize(zone, ambiguous="NaT", nonexistent="NaT")
    elif index.tz is None:
        offset_s = 60 * int(profile.clock)
    if index.tz is not None:
        index = index.tz_convert(None)  # UTC without saying so: what numpy can hold
    instants = index.to_numpy().astype("datetime64[s]")
    none = np.isnat(instants)
    times_s: npt.NDArray[np.int64] = instants.view(np.int64)
    times_s -= offset_s
    times_s[none] = NO_TIME
    return times_s


def why_no_time(text: str, profile: Profile) -> Sentence:
    """Say why a text gave no instant."""
    if not text.strip():
        return _("the time is empty")
    if isinstance(profile.clock, str) and text.strip().lower() not in CLOCK_WORDS:
        parsed = pd.to_datetime(
            pd.Series([text], dtype=object), format=pandas_format(profile), errors="coerce"
        )[0]
        if not pd.isna(parsed):
            return _civil_hour(parsed.to_pydatetime(), profile.clock)
    return _(
        "“%(text)s” is no time in the format %(format)s", text=text[:60], format=profile.time_format
    )


def _civil_hour(civil: dt.datetime, zone: str) -> Sentence:
    local = civil.replace(tzinfo=ZoneInfo(zone))
    # In a repeated hour the first reading of the clock is ahead of the second (PEP 495).
    twice = local.utcoffset() > local.replace(fold=1).utcoffset()  # type: ignore[operator]
    hour, day = f"{civil:%H:%M}", f"{civil.day} {civil:%B %Y}"
    if twice:
        return _("%(hour)s on %(day)s happens twice in this zone", hour=hour, day=day)
    return _("%(hour)s on %(day)s does not exist in this zone", hour=hour, day=day)
