"""The stage record, ratings, notes and infills of the demo network as frozen dataclasses."""

from dataclasses import dataclass
from datetime import date, datetime


@dataclass(frozen=True)
class Setting:
    """stage = scale × raw + offset_m from this instant."""

    effective_from: datetime
    scale: float
    offset_m: float
    reason: str


@dataclass(frozen=True)
class Deployment:
    instrument: str
    start: datetime
    resolution: float
    settings: tuple[Setting, ...]
    end: datetime | None = None


@dataclass(frozen=True)
class Series:
    label: str
    kind: str
    is_primary: bool
    step_s: int
    deployments: tuple[Deployment, ...] = ()


@dataclass(frozen=True)
class Fault:
    """An error of the recorder (m), straight from start to end; part of the invented truth."""

    series: str
    start: datetime
    end: datetime
    start_m: float
    end_m: float
    story: str


@dataclass(frozen=True)
class Gap:
    series: str
    start: datetime
    end: datetime
    story: str


@dataclass(frozen=True)
class IceSpell:
    start: datetime
    end: datetime
    greatest_m: float


@dataclass(frozen=True)
class Curve:
    """Power segments [lower stage, C, h0, b], or a table of [stage, flow] with its rule.

    What its statistics say: the scatter of its gaugings, the stages they cover, the 95 % band of
    the mean relation as [stage, ± %].
    """

    label: str
    lowest_use_m: float
    highest_use_m: float
    author: str
    approver: str
    reason: str
    segments: tuple[tuple[float, float, float, float], ...] = ()
    table: tuple[tuple[float, float], ...] = ()
    rule: str = ""
    h0_m: float = 0.0
    extrapolate_to_high_m: float | None = None
    scatter_percent: float | None = None
    gauged_m: tuple[float, ...] = ()
    band: tuple[tuple[float, float], ...] = ()


@dataclass(frozen=True)
class ShiftTable:
    at: datetime
    to_next: str
    points: tuple[tuple[float, float], ...]
    reason: str


@dataclass(frozen=True)
class RatingPeriod:
    curve: str
    effective_from: datetime
    reason: str
    shifts: tuple[ShiftTable, ...] = ()


@dataclass(frozen=True)
class Correction:
    series: str
    start: datetime
    end: datetime
    start_m: float
    end_m: float
    reason: str
    accepted_by: str = ""


@dataclass(frozen=True)
class Note:
    """`flows`: estimated, withheld or kept."""

    start: datetime
    end: datetime
    cause: str
    flows: str
    text: str
    percent: float | None = None
    printed: bool = True


@dataclass(frozen=True)
class Infill:
    start: datetime
    end: datetime
    method: str
    reason: str
    neighbour: str = ""
    series: str = ""


@dataclass(frozen=True)
class TypedFlow:
    day: date
    flow_m3s: float
    method: str
    author: str
    reason: str
