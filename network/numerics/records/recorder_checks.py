"""Corrections and time shifts proposed from recorder checks; nothing is applied here."""

from collections.abc import Iterator, Sequence
from dataclasses import dataclass
from itertools import pairwise

from network.numerics.sentences import Refused, Sentence, gettext_noop, sentence

TOLERANCE_M = 0.005
CLOCK_TOLERANCE_S = 60

# Differences come to a tenth of a millimetre; this keeps binary dust from deciding a verdict.
DUST_M = 1e-8


@dataclass(frozen=True)
class RecorderCheck:
    """A recorder beside the staff: stages above station zero in metres, instant in epoch seconds.

    found and left: the recorder before and after it was set (left is None: not touched);
    staff_stage_m is None where the gauge could not be read; clock errors are recorder minus true
    time in seconds, as found and after setting.
    """

    time_s: int
    found_m: float | None
    staff_stage_m: float | None
    left_m: float | None = None
    wave_m: float = 0.0
    clock_error_s: int = 0
    clock_left_s: int = 0

    @property
    def error_found_m(self) -> float | None:
        if self.found_m is None or self.staff_stage_m is None:
            return None
        return self.found_m - self.staff_stage_m

    @property
    def error_left_m(self) -> float | None:
        left_m = self.found_m if self.left_m is None else self.left_m
        if left_m is None or self.staff_stage_m is None:
            return None
        return left_m - self.staff_stage_m

    @property
    def was_set(self) -> bool:
        return self.left_m is not None and self.left_m != self.found_m


@dataclass(frozen=True)
class ProposedCorrection:
    """An offset to be added to stage, linear from start to end, metres and epoch seconds."""

    start_s: int
    end_s: int
    start_offset_m: float
    end_offset_m: float
    sentence: Sentence


@dataclass(frozen=True)
class ProposedTimeShift:
    """Seconds to be added to the recorder's times, linear from start to end; a remark only."""

    start_s: int
    end_s: int
    start_shift_s: int
    end_shift_s: int
    sentence: Sentence


def propose_corrections(
    checks: Sequence[RecorderCheck], *, tolerance_m: float = TOLERANCE_M
) -> tuple[ProposedCorrection, ...]:
    """Propose corrections between successive recorder checks of one series.

    checks: in rising time; tolerance_m: metres, or the wave at the check where that is more; an
    error below it counts as none, at each end by itself.
    Result: one proposal for each span with an error at either end. Before the first check nothing
    is proposed, since nobody knows when its error began; a check without a staff reading is passed
    over, unless the recorder was set at it: then the spans on both sides are left to people.
    Raises Refused when the checks are not in rising time.
    Source: common practice (drift taken as linear from the error left to the error found).
    """
    _check_order(checks)
    text = gettext_noop(
        "The recorder stood {left_m:+.3f} m off the staff when left at the last check and "
        "{found_m:+.3f} m off when found at this one."
    )
    found = []
    for last, this in _spans(checks):
        left_m = _beyond(last.error_left_m, max(tolerance_m, last.wave_m))
        found_m = _beyond(this.error_found_m, max(tolerance_m, this.wave_m))
        if left_m or found_m:
            said = sentence(text, left_m=left_m, found_m=found_m)
            # correction = −error; the difference from 0 keeps a minus off zero
            found.append(
                ProposedCorrection(last.time_s, this.time_s, 0.0 - left_m, 0.0 - found_m, said)
            )
    return tuple(found)


def _spans(checks: Sequence[RecorderCheck]) -> Iterator[tuple[RecorderCheck, RecorderCheck]]:
    last: RecorderCheck | None = None
    for check in checks:
        if check.error_found_m is not None and last is not None:
            yield last, check
        if check.error_left_m is not None:
            last = check
        elif check.was_set:
            last = None


def _beyond(error_m: float | None, tolerance_m: float) -> float:
    return 0.0 if error_m is None or abs(error_m) < tolerance_m - DUST_M else error_m


def propose_time_shifts(
    checks: Sequence[RecorderCheck], *, tolerance_s: int = CLOCK_TOLERANCE_S
) -> tuple[ProposedTimeShift, ...]:
    """Turn clock errors found at recorder checks into remarks on the times recorded before them.

    checks: in rising time; tolerance_s: a clock error of fewer seconds counts as none.
    Raises Refused when the checks are not in rising time.
    Source: common practice (a clock gains or loses evenly).
    """
    _check_order(checks)
    found = []
    for last, this in pairwise(checks):
        if abs(this.clock_error_s) < tolerance_s:
            continue
        fast = gettext_noop(
            "The recorder's clock was {seconds} s fast at the check: its times up to then are late "
            "by up to that much."
        )
        slow = gettext_noop(
            "The recorder's clock was {seconds} s slow at the check: its times up to then are "
            "early by up to that much."
        )
        text = fast if this.clock_error_s > 0 else slow
        found.append(
            ProposedTimeShift(
                start_s=last.time_s,
                end_s=this.time_s,
                start_shift_s=-last.clock_left_s,
                end_shift_s=-this.clock_error_s,
                sentence=sentence(text, seconds=abs(this.clock_error_s)),
            )
        )
    return tuple(found)


def _check_order(checks: Sequence[RecorderCheck]) -> None:
    for row, (last, this) in enumerate(pairwise(checks), start=2):
        if this.time_s <= last.time_s:
            text = gettext_noop("Recorder check {row} is not later than the one before it.")
            raise Refused(sentence(text, row=row), row=row, field_name="time_s")
