"""The tables of the demo network's TOML files as frozen dataclasses; times are UTC."""

from dataclasses import dataclass
from datetime import date, datetime

from network.formats.demo_field_rows import Gauging, GaugingRule, OtherGauging, VisitRule
from network.formats.demo_record_rows import (
    Correction,
    Curve,
    Fault,
    Gap,
    IceSpell,
    Infill,
    Note,
    RatingPeriod,
    Series,
    TypedFlow,
)


@dataclass(frozen=True)
class Agency:
    name: str
    address: str
    licence_line: str
    record_utc_offset_minutes: int
    civil_zone: str
    day_starts_at_hour: int
    water_year_start_month: int
    water_year_named_by_end: bool
    decimal_sign: str
    language: str


@dataclass(frozen=True)
class Office:
    name: str
    address: str
    latitude_deg: float
    longitude_deg: float


@dataclass(frozen=True)
class Person:
    username: str
    first_name: str
    last_name: str
    role: str
    office: str
    phone: str


@dataclass(frozen=True)
class Storm:
    at: datetime
    rain_mm: float
    hours: float
    story: str = ""


@dataclass(frozen=True)
class Spell:
    start: datetime
    end: datetime
    story: str
    rain_factor: float = 1.0
    warmer_c: float = 0.0


@dataclass(frozen=True)
class Basin:
    """The seed, the span of the record and the weather that is part of the story."""

    name: str
    rivers: tuple[str, ...]
    seed: int
    first_day: date
    last_day: date
    storms: tuple[Storm, ...]
    spells: tuple[Spell, ...]


@dataclass(frozen=True)
class Upstream:
    """A station upstream and the reach from it: hours of travel and of storage."""

    station: str
    travel_h: float
    storage_h: float


@dataclass(frozen=True)
class Flow:
    """Where a station's invented flow comes from; own_km2 is the area below the upstreams.

    `width_m` and `depth_m` are those of the gauging section at `at_flow_m3s`.
    """

    own_km2: float
    lowest_m: float
    highest_m: float
    quick_h: float
    at_flow_m3s: float
    width_m: float
    depth_m: float
    slow_days: float = 3.0
    base_days: float = 70.0
    rain_factor: float = 1.0
    lake_storage_h: float = 0.0
    noise_m: float = 0.001
    upstream: tuple[Upstream, ...] = ()


@dataclass(frozen=True)
class StationFacts:
    """Field names follow the station's form."""

    code: str
    name: str
    river: str
    basin: str
    kind: str
    latitude_deg: float
    longitude_deg: float
    catchment_km2: float
    office: str
    opened_on: date
    control: str
    description: str
    hazards: str
    safety_notes: str
    access_notes: str
    visit_interval_days: int
    level_check_interval_months: int
    highlights: str = ""
    gaugings_wanted_per_year: int = 0


@dataclass(frozen=True)
class Zero:
    effective_from: datetime
    elevation_m: float
    datum_name: str
    kind: str
    reason: str


@dataclass(frozen=True)
class PlateZero:
    effective_from: datetime
    zero_m: float
    reason: str
    level_check: str = ""


@dataclass(frozen=True)
class Plate:
    label: str
    lowest_m: float
    highest_m: float
    installed_at: datetime
    zeros: tuple[PlateZero, ...]
    step_m: float = 0.01
    removed_at: datetime | None = None
    is_usual: bool = False


@dataclass(frozen=True)
class OtherGauge:
    label: str
    kind: str
    installed_at: datetime
    zeros: tuple[PlateZero, ...]


@dataclass(frozen=True)
class Elevation:
    effective_from: datetime
    elevation_m: float
    reason: str


@dataclass(frozen=True)
class Benchmark:
    label: str
    description: str
    elevations: tuple[Elevation, ...]
    is_main: bool = False


@dataclass(frozen=True)
class Station:
    """Everything one station file says."""

    station: StationFacts
    flow: Flow
    zeros: tuple[Zero, ...]
    plates: tuple[Plate, ...]
    benchmarks: tuple[Benchmark, ...]
    series: tuple[Series, ...]
    visits: VisitRule
    other_gauges: tuple[OtherGauge, ...] = ()
    faults: tuple[Fault, ...] = ()
    gaps: tuple[Gap, ...] = ()
    ice: tuple[IceSpell, ...] = ()
    curves: tuple[Curve, ...] = ()
    rating_periods: tuple[RatingPeriod, ...] = ()
    outlet_curve: Curve | None = None  # a lake's own: makes its stage, is no rating
    corrections: tuple[Correction, ...] = ()
    notes: tuple[Note, ...] = ()
    infills: tuple[Infill, ...] = ()
    typed_flows: tuple[TypedFlow, ...] = ()
    gauging_rule: GaugingRule | None = None
    gaugings: tuple[Gauging, ...] = ()
    other_gaugings: tuple[OtherGauging, ...] = ()
