"""A record of stage to a record of flow: the curve in force at each instant, shifted as noted."""

from collections.abc import Iterator, Sequence
from dataclasses import dataclass
from typing import TypeVar

import numpy as np
import numpy.typing as npt

from network.numerics.arrays import Floats, Indices, MarkBits, Seconds
from network.numerics.ratings.curves import Curve, rate_into
from network.numerics.sentences import Refused, gettext_noop, sentence

ALWAYS_S = 2**62  # farther than any instant, either way

N = TypeVar("N", np.int64, np.float64)


@dataclass(frozen=True, eq=False)
class ShiftTable:
    """Shifts by stage, from start_s on: linear in stage, held beyond the ends.

    stages_m float64[k] rising, shifts_m float64[k]. linear_to_next: the shift passes linearly in
    time to the next table; else it steps there. Raises Refused where the stages do not rise.
    """

    start_s: int
    stages_m: Floats
    shifts_m: Floats
    linear_to_next: bool = False

    def __post_init__(self) -> None:
        if not len(self.stages_m) or self.stages_m.shape != self.shifts_m.shape:
            raise Refused(
                sentence(
                    gettext_noop("A shift table needs as many stages as shifts, one at least.")
                )
            )
        if (np.diff(self.stages_m) <= 0).any():
            raise Refused(sentence(gettext_noop("The stages of a shift table do not rise.")))

    def at(self, stage_m: Floats) -> Floats:
        """Give the shift for each stage, in m."""
        return np.interp(stage_m, self.stages_m, self.shifts_m)


@dataclass(frozen=True, eq=False)
class RatingPeriod:
    """A curve in force from start_s until the next period, None where no rating is in force.

    Its shift tables, in order of time, belong to it alone: no shift before the first, the last one
    held to the period's end, nothing carried into the next period.
    Raises Refused where the tables do not follow one another or begin before the period.
    """

    start_s: int
    curve: Curve | None
    shifts: Sequence[ShiftTable] = ()

    def __post_init__(self) -> None:
        if (np.diff([table.start_s for table in self.shifts]) <= 0).any():
            raise Refused(
                sentence(gettext_noop("The shift tables do not follow one another in time."))
            )
        if self.shifts and self.shifts[0].start_s < self.start_s:
            raise Refused(
                sentence(gettext_noop("A shift table begins before its rating is in force."))
            )


@dataclass(frozen=True, eq=False)
class Rated:
    """A record of flow: times_s int64[n], stage_m and flow_m3s float64[n], marks uint8[n].

    Times never fall; an instant at which the rating changes stands twice, old rating first.
    """

    times_s: Seconds
    stage_m: Floats
    flow_m3s: Floats
    marks: MarkBits


@dataclass(frozen=True, eq=False)
class _Span:
    """A stretch of time over which neither the curve nor the shift jumps."""

    start_s: int
    curve: Curve | None = None
    shift: ShiftTable | None = None
    towards: ShiftTable | None = None

    def rate(self, rated: Rated, part: slice) -> None:
        """Fill in the flow and marks of the part of the record that lies in this span."""
        flow_m3s, marks = rated.flow_m3s[part], rated.marks[part]
        if self.curve is None:
            flow_m3s[:] = np.nan
        else:
            shifted_m = self._shifted(rated.times_s[part], rated.stage_m[part])
            rate_into(self.curve, shifted_m, flow_m3s=flow_m3s, marks=marks)

    def _shifted(self, times_s: Seconds, stage_m: Floats) -> Floats:
        if self.shift is None:
            return stage_m
        if self.towards is None:
            return stage_m + self.shift.at(stage_m)
        start_s, end_s = self.shift.start_s, self.towards.start_s
        passed = (times_s - start_s) / (end_s - start_s)
        # shift(h, t) = (1 − p) · shift₁(h) + p · shift₂(h)
        return stage_m + (1.0 - passed) * self.shift.at(stage_m) + passed * self.towards.at(stage_m)


def rate(
    times_s: Seconds,
    stage_m: Floats,
    *,
    periods: Sequence[RatingPeriod],
    gap_limit_s: int,
) -> Rated:
    """Rate every reading by the curve and shift in force at its time.

    times_s int64[n] rising, stage_m float64[n]; periods in order of time. Where the rating changes
    or a shift steps inside a step of the record no longer than gap_limit_s, the stage is
    interpolated at that instant, which then stands twice: under the old rating, then the new.
    At a reading of that very time the old rating is added too. Flow is NaN where stage is, where no
    rating is in force and outside the range of use. The shift is added to stage before the rating,
    so the range of use is that of the shifted stage.
    Raises Refused where the periods do not follow one another in time.
    Source: WMO-No. 1044, volume II, 6.11 (shifts); ISO 18320 (change of rating).
    """
    if (np.diff([period.start_s for period in periods]) <= 0).any():
        raise Refused(
            sentence(gettext_noop("The rating periods do not follow one another in time."))
        )
    spans = [_Span(-ALWAYS_S), *_spans(periods)]
    cuts_s = np.array([span.start_s for span in spans[1:]], np.int64)
    times_s, stage_m, edges = _split(times_s, stage_m, cuts_s=cuts_s, gap_limit_s=gap_limit_s)
    rated = Rated(times_s, stage_m, np.full(len(times_s), np.nan), np.zeros(len(times_s), np.uint8))
    bounds = [0, *edges.tolist(), len(times_s)]
    for span, start, stop in zip(spans, bounds[:-1], bounds[1:], strict=True):
        span.rate(rated, slice(start, stop))
    return rated


def _spans(periods: Sequence[RatingPeriod]) -> Iterator[_Span]:
    """Cut the periods at their shift tables, in order of time, without holes between."""
    ends_s = [*(period.start_s for period in periods[1:]), ALWAYS_S]
    for period, end_s in zip(periods, ends_s, strict=False):
        tables = period.shifts
        if not tables or tables[0].start_s > period.start_s:
            yield _Span(period.start_s, period.curve)
        for table, following in zip(tables, [*tables[1:], None], strict=False):
            if table.start_s < end_s:
                towards = following if table.linear_to_next else None
                yield _Span(table.start_s, period.curve, table, towards)


def _split(
    times_s: Seconds, stage_m: Floats, *, cuts_s: Seconds, gap_limit_s: int
) -> tuple[Seconds, Floats, Indices]:
    """Put each cut into the record where it lies in a step that may be bridged.

    Gives the record with the cuts in it and, for each cut, the index at which its new side begins.
    """
    after = np.searchsorted(times_s, cuts_s)  # the first reading at or after each cut
    split = np.flatnonzero((after > 0) & (after < len(times_s)))
    split = split[np.diff(_pairs(times_s, after[split])).ravel() <= gap_limit_s]
    if not len(split):
        return times_s, stage_m, after
    at, cut_s = after[split], cuts_s[split]
    (start_s, end_s), (start_m, end_m) = _pairs(times_s, at).T, _pairs(stage_m, at).T
    passed = (cut_s - start_s) / (end_s - start_s)
    cut_m = np.where(cut_s == end_s, end_m, start_m + (end_m - start_m) * passed)
    copies = np.where(cut_s == end_s, 1, 2)  # a reading at the cut is its new side already
    added = np.zeros(len(cuts_s), np.intp)
    added[split] = copies
    places = np.repeat(at, copies)
    return (
        np.insert(times_s, places, np.repeat(cut_s, copies)),
        np.insert(stage_m, places, np.repeat(cut_m, copies)),
        after + np.cumsum(added) - added + (added > 0),
    )


def _pairs(values: npt.NDArray[N], at: Indices) -> npt.NDArray[N]:
    """Give the values before and at each index, one row each."""
    return values[np.column_stack((at - 1, at))]
