"""Recorder checks of a series beside the staff, and the corrections they propose."""

from collections.abc import Iterable, Sequence
from dataclasses import dataclass
from datetime import UTC, datetime, timedelta

from network.models import Correction, RecorderCheck, Series, Visit, VisitReading
from network.numerics.records import recorder_checks as kernel
from network.queries import gauges, in_force
from network.queries.working_rules import rules

# A plate read longer before or after says nothing about the water at the check.
BESIDE = timedelta(minutes=30)


@dataclass(frozen=True)
class Compared:
    """A recorder check with the stage the staff gave then, m above the station zero."""

    check: RecorderCheck
    staff_stage_m: float | None

    @property
    def found_error_m(self) -> float | None:
        """Recorder as found less staff."""
        return _less(self.check.found_m, self.staff_stage_m)

    @property
    def left_error_m(self) -> float | None:
        """Recorder as left less staff."""
        left_m = self.check.found_m if self.check.left_m is None else self.check.left_m
        return _less(left_m, self.staff_stage_m)


@dataclass(frozen=True)
class Proposal:
    """A correction proposed at a check."""

    check: RecorderCheck
    correction: kernel.ProposedCorrection

    @property
    def start_at(self) -> datetime:
        """Return the instant of the check before."""
        return datetime.fromtimestamp(self.correction.start_s, UTC)

    @property
    def end_at(self) -> datetime:
        """Return the instant of this check."""
        return datetime.fromtimestamp(self.correction.end_s, UTC)


def compared(checks: Iterable[RecorderCheck]) -> list[Compared]:
    """Return checks with the staff's stage: as typed, else of the plate read nearest in time."""
    rows = list(checks)
    visits = {check.visit_id for check in rows if check.staff_stage_m is None}
    readings = VisitReading.objects.filter(visit__in=visits, plate__isnull=False)
    readings = list(readings.select_related("plate", "other_gauge"))
    stages = gauges.stages_m(readings)
    by_visit: dict[int, list[tuple[VisitReading, float]]] = {}
    for reading, stage_m in zip(readings, stages, strict=True):
        if stage_m is not None:
            by_visit.setdefault(reading.visit_id, []).append((reading, stage_m))
    return [Compared(check, _staff(check, by_visit.get(check.visit_id, []))) for check in rows]


def of_series(series: Series) -> list[Compared]:
    """Return the checks of a series in order of time; of two at one instant the later entered."""
    rows = RecorderCheck.objects.filter(series=series).order_by("checked_at", "pk")
    by_time = {check.checked_at: check for check in rows.select_related("visit")}
    return compared(by_time.values())


def proposals(series: Series) -> list[Proposal]:
    """Return every correction the checks of a series propose, whether or not it stands already."""
    checks = of_series(series)
    by_time = {in_force.seconds(row.check.checked_at): row.check for row in checks}
    tolerance_m = rules().correction_tolerance_mm / 1000
    found = kernel.propose_corrections([_kernel(row) for row in checks], tolerance_m=tolerance_m)
    return [Proposal(by_time[row.end_s], row) for row in found]


def open_proposals(series: Series) -> list[Proposal]:
    """Return the proposals whose period no standing correction has yet."""
    standing = Correction.objects.standing().filter(series=series)
    taken = {
        (in_force.seconds(start), in_force.seconds(end))
        for start, end in standing.values_list("start_at", "end_at")
    }
    return [
        row
        for row in proposals(series)
        if (row.correction.start_s, row.correction.end_s) not in taken
    ]


def open_proposals_of_visit(visit: Visit) -> list[Proposal]:
    """Return the open proposals that end at a recorder check of a visit."""
    series = Series.objects.filter(recorder_checks__visit=visit).distinct()
    return [row for one in series for row in open_proposals(one) if row.check.visit_id == visit.pk]


def corrections_of_visit(visit: Visit) -> list[Correction]:
    """Return the standing corrections proposed from recorder checks of a visit."""
    rows = Correction.objects.standing().filter(recorder_check__visit=visit)
    return list(rows.select_related("series").order_by("start_at"))


def time_shifts(series: Series) -> Sequence[kernel.ProposedTimeShift]:
    """Return the remarks on the recorder's clock that its checks give."""
    return kernel.propose_time_shifts([_kernel(row) for row in of_series(series)])


def _staff(check: RecorderCheck, read: Sequence[tuple[VisitReading, float]]) -> float | None:
    if check.staff_stage_m is not None:
        return check.staff_stage_m
    near = [
        (abs(reading.read_at - check.checked_at), reading.pk, stage_m)
        for reading, stage_m in read
        if abs(reading.read_at - check.checked_at) <= BESIDE
    ]
    return min(near)[2] if near else None


def _kernel(row: Compared) -> kernel.RecorderCheck:
    check = row.check
    return kernel.RecorderCheck(
        time_s=in_force.seconds(check.checked_at),
        found_m=check.found_m,
        staff_stage_m=row.staff_stage_m,
        left_m=check.left_m,
        wave_m=check.wave_m or 0.0,
        clock_error_s=check.clock_error_s or 0,
    )


def _less(value_m: float | None, staff_m: float | None) -> float | None:
    return None if value_m is None or staff_m is None else value_m - staff_m
