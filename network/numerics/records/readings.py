"""A record of readings in time order: what it must be, two joined into one, cut at the months."""

from dataclasses import dataclass
from itertools import pairwise

import numpy as np

from network.numerics.arrays import Floats, MarkBits, Seconds


class ReadingsError(ValueError):
    """The readings are not a record: out of order, twice at one time, not a number."""


@dataclass(frozen=True, eq=False)
class Readings:
    """A record in time order: times_s int64[n], values_m float64[n], flags uint8[n].

    Times are epoch seconds UTC, strictly increasing; values metres, finite; flags bits of Mark.
    Raises ReadingsError naming the first reading at fault, counted from 0.
    """

    times_s: Seconds
    values_m: Floats
    flags: MarkBits

    def __post_init__(self) -> None:
        if not self.times_s.shape == self.values_m.shape == self.flags.shape:
            raise ReadingsError("Times, values and flags differ in number.")
        late = self.times_s[1:] <= self.times_s[:-1]
        if late.any():
            at = int(late.argmax()) + 1
            same = self.times_s[at] == self.times_s[at - 1]
            raise ReadingsError(
                f"Reading {at} has the same time as the one before it."
                if same
                else f"Reading {at} is earlier than the one before it."
            )
        if not np.isfinite(self.values_m).all():
            at = int(np.isfinite(self.values_m).argmin())
            raise ReadingsError(f"The value of reading {at} is not a number.")

    @classmethod
    def known(cls, times_s: Seconds, values_m: Floats, flags: MarkBits) -> "Readings":
        """Take arrays known to be a record, such as a part of one: they are not looked at again."""
        record = object.__new__(cls)
        for name, column in (("times_s", times_s), ("values_m", values_m), ("flags", flags)):
            object.__setattr__(record, name, column)
        return record

    def __len__(self) -> int:
        return len(self.times_s)

    def part(self, start: int, stop: int) -> "Readings":
        """Give readings start to stop (not included) as views."""
        cut = slice(start, stop)
        return Readings.known(self.times_s[cut], self.values_m[cut], self.flags[cut])


def no_readings() -> Readings:
    """Give a record with nothing in it."""
    return Readings(np.empty(0, np.int64), np.empty(0), np.empty(0, np.uint8))


def merge(older: Readings, newer: Readings) -> Readings:
    """Join two records into one; where both have a reading at one time the newer is kept."""
    times_s = np.concatenate((older.times_s, newer.times_s))
    order = np.argsort(times_s, kind="stable")
    last_of_time = np.append(np.diff(times_s[order]) != 0, True)[: len(order)]
    kept = order[last_of_time]
    return Readings(
        times_s[kept],
        np.concatenate((older.values_m, newer.values_m))[kept],
        np.concatenate((older.flags, newer.flags))[kept],
    )


def split_by_month(readings: Readings) -> dict[tuple[int, int], Readings]:
    """Cut a record at the months of UTC: {(year, month): its readings}, in order, none empty."""
    if not len(readings):
        return {}
    first, last = readings.times_s[[0, -1]].astype("datetime64[s]").astype("datetime64[M]")
    months = np.arange(first, last + 1)
    # Looked up month by month: to turn every time into its month takes ten times as long.
    starts = months[1:].astype("datetime64[s]").astype(np.int64)
    edges = [0, *np.searchsorted(readings.times_s, starts).tolist(), len(readings)]
    return {
        (1970 + month // 12, month % 12 + 1): readings.part(start, stop)
        for month, (start, stop) in zip(
            months.astype(np.int64).tolist(), pairwise(edges), strict=True
        )
        if stop > start
    }
