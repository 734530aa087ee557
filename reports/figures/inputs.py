"""What the figures draw: arrays of one station and year, missing values NaN, times in record clock.

Times are ``datetime64`` of the record clock (not UTC), days ``datetime64[D]`` of the water year.
"""

from dataclasses import dataclass, field

import numpy as np
import numpy.typing as npt

Values = npt.NDArray[np.float64]
Times = npt.NDArray[np.datetime64]
Flags = npt.NDArray[np.bool_]


def _none() -> Values:
    return np.empty(0)


def _never() -> Times:
    return np.empty(0, dtype="datetime64[s]")


@dataclass(frozen=True, eq=False, kw_only=True)
class EarlierRange:
    """Lowest, quartiles and highest of the earlier years, one value a day of this year."""

    years: str  # "1999–2018"
    count: int
    lowest: Values
    lower_quartile: Values
    median: Values
    upper_quartile: Values
    highest: Values


@dataclass(frozen=True, eq=False, kw_only=True)
class FlowYear:
    """Daily mean flow in m³/s; ``estimated`` marks every day not recorded as open-water flow."""

    days: Times
    flow_m3s: Values
    estimated: Flags
    earlier: EarlierRange | None = None
    gauged_at: Times = field(default_factory=_never)
    gauged_m3s: Values = field(default_factory=_none)


@dataclass(frozen=True, eq=False, kw_only=True)
class StageYear:
    """Daily mean, lowest and highest stage in metres above station zero."""

    days: Times
    mean_m: Values
    lowest_m: Values
    highest_m: Values
    estimated: Flags
    earlier: EarlierRange | None = None  # drawn for stage-only stations
    read_at: Times = field(default_factory=_never)  # staff gauge readings at visits
    read_m: Values = field(default_factory=_none)


@dataclass(frozen=True, eq=False, kw_only=True)
class DurationCurves:
    """Values in descending order and the percentage of days each is reached or exceeded."""

    percent: Values
    value: Values
    earlier_percent: Values = field(default_factory=_none)
    earlier_value: Values = field(default_factory=_none)
    earlier_years: str = ""
    of_stage: bool = False


@dataclass(frozen=True, eq=False, kw_only=True)
class RatingCurve:
    """One rating: flow and its 95 % band in m³/s against stage in metres, ascending."""

    label: str  # "Rating 5"
    stage_m: Values
    flow_m3s: Values
    lower_m3s: Values = field(default_factory=_none)  # empty when the rating states no band
    upper_m3s: Values = field(default_factory=_none)
    extrapolated: Flags = field(default_factory=lambda: np.empty(0, dtype=np.bool_))


@dataclass(frozen=True, eq=False, kw_only=True)
class RatingSheet:
    """The ratings of the year and the gaugings they are judged by."""

    curves: tuple[RatingCurve, ...]
    gauged_stage_m: Values
    gauged_m3s: Values
    gauged_u95_percent: Values  # NaN where unknown
    in_year: Flags
    numbers: tuple[str, ...]  # the gaugings' numbers, printed at those of the year


@dataclass(frozen=True, eq=False, kw_only=True)
class Place:
    """A place on the sketch, degrees WGS 84."""

    name: str
    latitude: float
    longitude: float


@dataclass(frozen=True, eq=False, kw_only=True)
class LocationSketch:
    """The station among its neighbours; rivers are arrays (n, 2) of latitude and longitude."""

    station: Place
    neighbours: tuple[Place, ...] = ()
    rivers: tuple[Values, ...] = ()


@dataclass(frozen=True, eq=False, kw_only=True)
class PlateBar:
    """One plate in service, in metres of stage."""

    label: str
    lowest_m: float
    highest_m: float


@dataclass(frozen=True, eq=False, kw_only=True)
class PlateStack:
    """The staff gauge to scale beside the year's lowest and highest stage."""

    plates: tuple[PlateBar, ...]
    year_lowest_m: float
    year_highest_m: float
    cease_to_flow_m: float = np.nan


@dataclass(frozen=True, kw_only=True)
class Words:
    """Every word a figure prints, already in the language of print."""

    decimal_sign: str
    months: tuple[str, ...]  # January first, short
    flow_axis: str
    stage_axis: str
    percent_axis: str
    estimated: str
    missing: str
    gauging: str
    reading: str
    extreme_range: str  # takes {years} and {count}
    middle_half: str
    median: str
    daily_range: str
    this_year: str
    earlier: str  # takes {years}
    band: str
    extrapolated: str
    gauging_in_year: str
    gauging_before: str
    north: str
    year_highest: str
    year_lowest: str
    cease_to_flow: str
    log_axes: str
    plain_axes: str
