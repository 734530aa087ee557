"""The content of one station's yearbook: frozen, every number final, nothing left to compute.

Built by ``reports.content`` with the language of print active, read by ``reports.rendering``. A
number carries the text it is printed as and the rounded value behind it. Headings and labels
belong to the templates. An empty tuple prints a sentence ("No gauging …"), never an empty table.
"""

from dataclasses import dataclass
from datetime import date, datetime

from network.numerics.marks import Mark
from reports.figures.inputs import (
    DurationCurves,
    FlowYear,
    LocationSketch,
    PlateStack,
    RatingSheet,
    StageYear,
)
from reports.particulars import (
    Agency,
    Calibration,
    Correction,
    Edition,
    Gauging,
    LevelCheck,
    Plate,
    Rating,
    Recorder,
    Station,
    Visit,
    WaterYear,
    Zero,
)
from reports.printed import NO_EVENT, NO_NUMBER, Event, Number


@dataclass(frozen=True, kw_only=True)
class Month:
    """One column of the daily table; ``cells`` has one number for each of its days."""

    first: date
    cells: tuple[Number, ...]
    mean: Number
    highest: Event
    lowest: Event
    volume_hm3: Number = NO_NUMBER
    runoff_mm: Number = NO_NUMBER
    earlier_mean: Number = NO_NUMBER
    earlier_highest: Event = NO_EVENT
    earlier_lowest: Event = NO_EVENT


@dataclass(frozen=True, kw_only=True)
class YearFigures:
    """The figures of one year, or the mean or extreme of several."""

    mean: Number
    highest_day: Event
    lowest_day: Event
    lowest_seven_days: Event = NO_EVENT  # with its last day
    volume_hm3: Number = NO_NUMBER
    runoff_mm: Number = NO_NUMBER
    specific_ls_km2: Number = NO_NUMBER


@dataclass(frozen=True, kw_only=True)
class Extreme:
    """An instantaneous extreme; the text of a flow, or of a stage where stage is published, begins
    with "≥" when a gap may hide more."""

    stage_m: Number
    flow_m3s: Number = NO_NUMBER
    at: datetime | date | None = None


@dataclass(frozen=True, kw_only=True)
class Extremes:
    """Highest and lowest instant of the year and of the whole record."""

    year_highest: Extreme
    year_lowest: Extreme
    record_highest: Extreme
    record_lowest: Extreme
    record_since: str  # "1999"


@dataclass(frozen=True, kw_only=True)
class DurationRow:
    """The value reached or exceeded during a share of the days."""

    percent: int
    value: Number
    earlier: Number = NO_NUMBER


@dataclass(frozen=True, kw_only=True)
class DailyTable:
    """Daily means of the year, in m³/s or (stage-only) m, with months and years beside them.

    ``earlier_years`` is "1999–2018", empty when there is nothing to compare with, and
    ``leap_years`` how many of them hold a 29 February.
    """

    months: tuple[Month, ...]
    year: YearFigures
    earlier: YearFigures | None
    earlier_years: str
    earlier_count: int
    leap_years: int
    extremes: Extremes
    duration: tuple[DurationRow, ...]


@dataclass(frozen=True, kw_only=True)
class CompletenessRow:
    """Days bearing a mark in each month and in the year; ``RECORDED`` counts days without one."""

    mark: Mark
    days: tuple[int, ...]
    year: int


@dataclass(frozen=True, kw_only=True)
class UncertaintyRow:
    """Days and share of the year's volume known within ± a percentage (None: wider)."""

    within_percent: int | None
    days: int
    volume_percent: Number


@dataclass(frozen=True, kw_only=True)
class Figures:
    """What is drawn; None leaves a figure out."""

    stage: StageYear
    duration: DurationCurves | None
    sketch: LocationSketch
    plates: PlateStack | None = None
    flow: FlowYear | None = None
    rating: RatingSheet | None = None


@dataclass(frozen=True, kw_only=True)
class Yearbook:
    """One station and water year."""

    language: str  # "en", "de"
    agency: Agency
    year: WaterYear
    edition: Edition
    station: Station
    highlights: tuple[str, ...]  # sentences
    zeros: tuple[Zero, ...]
    plates: tuple[Plate, ...]
    recorders: tuple[Recorder, ...]
    ratings: tuple[Rating, ...]
    daily: DailyTable
    figures: Figures
    gaugings: tuple[Gauging, ...]
    visits: tuple[Visit, ...]
    level_checks: tuple[LevelCheck, ...]
    calibrations: tuple[Calibration, ...]
    corrections: tuple[Correction, ...]
    completeness: tuple[CompletenessRow, ...]
    notes: tuple[str, ...]  # data-quality sentences of reports.notes
    uncertainty: tuple[UncertaintyRow, ...] = ()
    uncertainty_remark: str = ""  # what the classes leave out

    @property
    def title(self) -> str:
        """Return river and station, as the title and the bookmarks print them."""
        return f"{self.station.river} – {self.station.name}"
