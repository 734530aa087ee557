"""Visits, gaugings, instruments, levels and plans of the demo network as frozen dataclasses."""

from dataclasses import dataclass
from datetime import date, datetime


@dataclass(frozen=True)
class VisitStory:
    """What a visit says beyond the routine; `at` is its arrival in the rule's list."""

    at: datetime
    control: str = "clear"
    weather: str = ""
    river_state: str = ""
    purposes: tuple[str, ...] = ()
    work_done: str = ""
    work_left: str = ""
    frozen: bool = False
    dry: bool = False
    state: str = "checked"


@dataclass(frozen=True)
class VisitRule:
    """Arrivals of the routine visits; readings and recorder checks are made by the program."""

    at: tuple[datetime, ...]
    party: tuple[str, ...]
    minutes: int
    stories: tuple[VisitStory, ...] = ()


@dataclass(frozen=True)
class GaugingRule:
    """Times of ordinary gaugings; the way of working and the points follow the flow."""

    at: tuple[datetime, ...]
    party: tuple[str, ...]
    meter: str
    above: str
    wade_below_m3s: float = 0.0
    verticals: int = 20
    two_points_from_m: float = 0.6


@dataclass(frozen=True)
class Gauging:
    """One gauging by current meter that is part of the story."""

    at: datetime
    how: str
    points: str
    meter: str
    party: tuple[str, ...]
    verticals: int = 20
    ice_m: float = 0.0
    spin_test: bool = True
    state: str = "checked"
    remarks: str = ""


@dataclass(frozen=True)
class OtherGauging:
    """A result of another method with its own stated uncertainty."""

    at: datetime
    method: str
    minutes: int
    uncertainty_percent: float
    party: tuple[str, ...]
    how: str = ""
    instrument: str = ""
    transects: int = 0
    transect_scatter_percent: float = 2.0
    moving_bed: str = ""
    details: str = ""
    state: str = "checked"


@dataclass(frozen=True)
class Instrument:
    label: str
    kind: str
    maker: str
    model: str
    serial: str
    status: str
    office: str
    acquired_on: date
    interval_months: int = 0
    interval_hours: int = 0
    remarks: str = ""


@dataclass(frozen=True)
class MeterPair:
    """A body and a rotor; the equation belongs to the pair."""

    label: str
    body: str
    rotor: str


@dataclass(frozen=True)
class Calibration:
    """Pieces [from n, a, b] of v = a + b·n; with tow speeds the runs are made by the program."""

    pair: str
    on: date
    laboratory: str
    certificate: str
    pieces: tuple[tuple[float, float, float], ...]
    lowest_ms: float
    highest_ms: float
    standard_error_percent: float
    outcome: str
    tow_speeds_ms: tuple[float, ...] = ()


@dataclass(frozen=True)
class InstrumentCheck:
    """A calibration of an instrument that has no meter equation."""

    instrument: str
    on: date
    laboratory: str
    certificate: str
    outcome: str


@dataclass(frozen=True)
class Instruments:
    """Everything instruments.toml says."""

    instruments: tuple[Instrument, ...]
    meter_pairs: tuple[MeterPair, ...]
    calibrations: tuple[Calibration, ...]
    checks: tuple[InstrumentCheck, ...]


@dataclass(frozen=True)
class PegTest:
    """Readings (m) on pegs A and B from two set-ups and the sighting distances (m)."""

    first: tuple[float, float, float, float]
    second: tuple[float, float, float, float]


@dataclass(frozen=True)
class LevelLine:
    """One line of the level book, in exactly one of its three columns; a turning point has two."""

    point: str
    plate: str = ""
    graduation_m: float | None = None
    bs: float | None = None
    i: float | None = None
    fs: float | None = None
    remark: str = ""


@dataclass(frozen=True)
class Finding:
    """What the book gives for a plate: zero found (m above station zero), error (m)."""

    plate: str
    zero_found_m: float
    error_m: float


@dataclass(frozen=True)
class LevelCheck:
    label: str
    station: str
    at: datetime
    instrument: str
    party: tuple[str, ...]
    start_benchmark: str
    start_elevation_m: float
    set_ups: int
    misclosure_mm: float
    peg_test: PegTest
    lines: tuple[LevelLine, ...]
    findings: tuple[Finding, ...]
    remarks: str
    adopted_from: datetime | None = None
    adopted_by: str = ""


@dataclass(frozen=True)
class Stop:
    station: str
    at: datetime
    tasks: tuple[str, ...]


@dataclass(frozen=True)
class Round:
    name: str
    office: str
    start: date
    end: date
    party: tuple[str, ...]
    vehicle: str
    meters: tuple[str, ...]
    stops: tuple[Stop, ...]
    left_out: str = ""


@dataclass(frozen=True)
class Inspection:
    on: date
    by: str
    outcome: str
    remarks: str = ""


@dataclass(frozen=True)
class SafetyItem:
    station: str
    kind: str
    label: str
    interval_months: int
    inspections: tuple[Inspection, ...]


@dataclass(frozen=True)
class Postponement:
    station: str
    what: str
    until: date
    by: str
    reason: str


@dataclass(frozen=True)
class Plans:
    """Everything plans.toml says."""

    rounds: tuple[Round, ...]
    safety_items: tuple[SafetyItem, ...]
    postponements: tuple[Postponement, ...]


@dataclass(frozen=True)
class FaultyRow:
    """A line put into a logger file before the row of that number (counted from 0)."""

    before_row: int
    text: str


@dataclass(frozen=True)
class LoggerFile:
    """The quirks of one logger file; `columns` name time, raw, battery and temperature."""

    file_name: str
    station: str
    series: str
    start: datetime
    end: datetime
    encoding: str
    delimiter: str
    decimal_sign: str
    unit: str
    decimals: int
    columns: tuple[str, ...]
    heading: tuple[str, ...]
    time_format: str
    zone: str = ""
    utc_offset_minutes: int = 0
    line_end: str = "\n"
    faulty_rows: tuple[FaultyRow, ...] = ()
