"""The gaugings of a station as points of a rating: used, or left out with the reason."""

from collections.abc import Iterable, Mapping, Sequence
from dataclasses import dataclass, field
from datetime import date, datetime
from typing import Any

import numpy as np
from django.utils.translation import gettext as _

from network.models import Agency, CurveGauging, Gauging, Note, Station, StationZero
from network.numerics.arrays import Bools, Floats
from network.queries import clock, gaugings
from network.queries.held_gaugings import mid_time

UNSTATED_U95_PERCENT = 10.0  # common practice for a gauging whose sheet states none


@dataclass(frozen=True)
class Point:
    """A signed gauging with its present mean stage; used unless a reason leaves it out.

    is_open: the reason is only proposed, and the person who rates may use the gauging all the same.
    """

    gauging: Gauging
    at: datetime
    stage_m: float | None
    left_out_because: str = ""
    is_open: bool = True

    @property
    def is_used(self) -> bool:
        """Whether it serves the curve."""
        return not self.left_out_because

    @property
    def flow_m3s(self) -> float:
        """The discharge as signed."""
        return float(self.gauging.discharge_m3s or 0.0)

    @property
    def u95_percent(self) -> float:
        """Its U₉₅; where the sheet states none, a value of common practice."""
        stated = self.gauging.u95_percent
        return UNSTATED_U95_PERCENT if stated is None else stated


@dataclass(frozen=True)
class Points:
    """Points in order of time, as columns for the kernel."""

    rows: Sequence[Point]

    @property
    def stage_m(self) -> Floats:
        """float64[n], NaN where no mean stage is known."""
        stages = [np.nan if row.stage_m is None else row.stage_m for row in self.rows]
        return np.array(stages, np.float64)

    @property
    def flow_m3s(self) -> Floats:
        """float64[n]."""
        return np.array([row.flow_m3s for row in self.rows], np.float64)

    @property
    def u95_percent(self) -> Floats:
        """float64[n]."""
        return np.array([row.u95_percent for row in self.rows], np.float64)

    @property
    def used(self) -> Bools:
        """bool[n]."""
        return np.array([row.is_used for row in self.rows], np.bool_)

    def part(self, chosen: Bools) -> "Points":
        """Return some of the points."""
        return Points([row for row, kept in zip(self.rows, chosen, strict=True) if kept])


@dataclass(frozen=True, kw_only=True)
class Choice:
    """Which gaugings may serve, and what was said about each: used, or why not.

    methods: empty means all. answers: gauging key → reason for leaving it out, empty for used;
    gaugings without an answer are judged by their circumstances.
    """

    first_day: date | None = None
    last_day: date | None = None
    methods: frozenset[str] = frozenset()
    checked_only: bool = False
    answers: Mapping[int, str] = field(default_factory=dict)


def points_of(station: Station, choice: Choice) -> Points:
    """Return every signed gauging of a station, each left out with a reason or used."""
    rows = Gauging.objects.filter(station=station, discharge_m3s__isnull=False)
    ordered = sorted(rows, key=mid_time)
    stages = gaugings.stages_of(ordered)
    notes = list(Note.objects.standing().filter(station=station).exclude(flows=Note.Flows.STAND))
    own = clock.agency()
    return Points([_point(row, stages[row.pk], choice, notes, own) for row in ordered])


def points_of_version(
    rows: Iterable[CurveGauging], *, stages_m: Mapping[int, float | None] | None = None
) -> Points:
    """Return the gaugings a stored version looked at, in order of time, with present stages."""
    kept = sorted(rows, key=lambda row: mid_time(row.gauging))
    if stages_m is None:
        stages_m = gaugings.stages_of([row.gauging for row in kept])
    return Points(
        [
            Point(
                row.gauging, mid_time(row.gauging), stages_m[row.gauging_id], row.left_out_because
            )
            for row in kept
        ]
    )


def last_move_of_zero(station: Station) -> datetime | None:
    """Return since when stages are counted from the present station zero, None: from the first."""
    moves = StationZero.objects.standing().filter(station=station, kind=StationZero.Kind.MOVED)
    latest = moves.order_by("effective_from").last()
    return latest.effective_from if latest else None


def _point(
    row: Gauging, stage_m: float | None, choice: Choice, notes: Sequence[Any], own: Agency
) -> Point:
    at = mid_time(row)
    firm = _firm_reason(row, stage_m, choice, clock.record_day(at, of=own))
    if firm:
        return Point(row, at, stage_m, firm, is_open=False)
    reason = choice.answers.get(row.pk)
    return Point(row, at, stage_m, _circumstance(row, at, notes) if reason is None else reason)


def _firm_reason(row: Gauging, stage_m: float | None, choice: Choice, day: date) -> str:
    """Say what keeps a gauging out whatever one thinks of it."""
    if stage_m is None:
        return _("no stage known")
    if choice.first_day and day < choice.first_day:
        return _("before the period")
    if choice.last_day and day > choice.last_day:
        return _("after the period")
    if choice.methods and row.method not in choice.methods:
        return _("method not chosen")
    if choice.checked_only and row.state != Gauging.State.CHECKED:
        return _("not checked")
    return ""


def _circumstance(row: Gauging, at: datetime, notes: Sequence[Any]) -> str:
    """Say what speaks against a gauging: it was made when no open-water relation holds."""
    if row.way == Gauging.Way.ICE:
        return _("under ice")
    for note in notes:
        if note.start_at <= at < note.end_at:
            return _("noted then: %(cause)s") % {"cause": note.get_cause_display()}
    return ""
