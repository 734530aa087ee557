"""The particulars of a station and its year that stand beside the daily values.

Free text (kinds, remarks) arrives in the language of print. Instants are aware datetimes and are
printed in the record clock. Rows are in order of time.
"""

from dataclasses import dataclass
from datetime import date, datetime, tzinfo

from reports.printed import Number


@dataclass(frozen=True, kw_only=True)
class Agency:
    """Who publishes, and under which conventions."""

    name: str
    address: str
    licence: str  # licence line for the data
    decimal_sign: str  # "." or ","
    record_clock: tzinfo  # a fixed offset
    record_clock_text: str  # "UTC+01:00"
    day_starts_at: int  # hour of the record clock
    every_day_needed: bool = True  # a missing day blanks mean and lowest of its month and year


@dataclass(frozen=True, kw_only=True)
class WaterYear:
    """The year printed; ``label`` shows both calendar years ("2019/20") unless it is one."""

    label: str
    first: date
    last: date


@dataclass(frozen=True, kw_only=True)
class OpenPoint:
    """Something still open when the year was compiled; ``reason`` when issued all the same."""

    text: str
    reason: str = ""


@dataclass(frozen=True, kw_only=True)
class Edition:
    """Which edition this is; ``issued_on`` is None while it is only compiled."""

    number: int
    compiled_on: date
    issued_on: date | None = None
    issued_by: str = ""
    supersedes: str = ""  # why it replaces the edition before it
    open_points: tuple[OpenPoint, ...] = ()


@dataclass(frozen=True, kw_only=True)
class Station:
    """The station as the first page describes it."""

    code: str
    name: str
    river: str
    basin: str
    latitude: float
    longitude: float
    coordinates: str  # as printed
    catchment_km2: Number
    stage_only: bool
    open_periods: tuple[tuple[date, date | None], ...]
    office: str
    control: str
    description: str = ""
    regulation: str = ""  # what disturbs the natural flow


@dataclass(frozen=True, kw_only=True)
class Zero:
    """A station zero in force during the year."""

    since: date
    elevation_m: Number
    datum: str
    reason: str


@dataclass(frozen=True, kw_only=True)
class Plate:
    """A plate in service during the year, with its zero."""

    label: str
    lowest_m: Number
    highest_m: Number
    zero_m: Number  # stage = reading + plate zero
    since: date
    until: date | None = None


@dataclass(frozen=True, kw_only=True)
class Recorder:
    """A recorder that stood at the station during the year."""

    instrument: str  # maker, model, serial
    kind: str
    series: str  # "primary", "second"
    since: date
    until: date | None
    interval: str  # "15 min"
    setting: str  # "stage = 1.000 × raw + 0.215 m"


@dataclass(frozen=True, kw_only=True)
class Segment:
    """One segment Q = C·(h − h₀)^b from a lower stage."""

    from_stage_m: Number
    coefficient: Number
    zero_flow_m: Number
    exponent: Number


@dataclass(frozen=True, kw_only=True)
class Rating:
    """A rating in force during the year; a table has no segments."""

    label: str
    since: datetime
    until: datetime | None
    use_lowest_m: Number
    use_highest_m: Number
    gauged_lowest_m: Number
    gauged_highest_m: Number
    gaugings: int
    standard_error_percent: Number
    segments: tuple[Segment, ...] = ()
    reason: str = ""
    shifts: str = ""  # a sentence on the shift tables in force


@dataclass(frozen=True, kw_only=True)
class Gauging:
    """A gauging of the year beside the rating in force at its mid-time."""

    number: str
    at: datetime
    method: str
    party: str
    stage_m: Number
    area_m2: Number
    velocity_ms: Number
    flow_m3s: Number
    u95_percent: Number
    rating: str
    deviation_percent: Number  # signed
    remark: str = ""


@dataclass(frozen=True, kw_only=True)
class Visit:
    """A visit of the year."""

    arrived: datetime
    party: str
    purposes: str
    stage_m: Number
    control: str
    remark: str = ""


@dataclass(frozen=True, kw_only=True)
class LevelCheck:
    """A level check of the year."""

    on: date
    party: str
    setups: int
    misclosure_mm: Number
    allowed_mm: Number
    outcome: str


@dataclass(frozen=True, kw_only=True)
class Calibration:
    """A calibration the year's gaugings rest on."""

    instrument: str
    on: date
    laboratory: str
    certificate: str
    valid_ms: str  # "0.03–3.00"
    standard_error: str
    gaugings: int


@dataclass(frozen=True, kw_only=True)
class Correction:
    """An accepted correction to the year's stage, linear between its ends."""

    since: datetime
    until: datetime
    start_mm: Number
    end_mm: Number
    reason: str
