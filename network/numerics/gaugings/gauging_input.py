"""What a gauging sheet holds when it is typed, and what the agency has settled."""

from dataclasses import dataclass, field
from enum import StrEnum

from network.numerics.meters.meter_rating import Piece


class Edge(StrEnum):
    """Kinds of edge zone between a bank and the nearest vertical."""

    SLOPING = "sloping"
    ROUGH = "rough"
    SMOOTH = "smooth"
    DEAD = "dead"
    TWO_THIRDS = "two_thirds"


# Mean velocity of the edge zone over that of the nearest vertical: from memory, 2/3 in some
# practice (Zalepukhin, Gidrologiya, 2001).
EDGE_FACTORS = {
    Edge.SLOPING: 0.7,
    Edge.ROUGH: 0.8,
    Edge.SMOOTH: 0.9,
    Edge.DEAD: 0.5,
    Edge.TWO_THIRDS: 2 / 3,
}


@dataclass(frozen=True)
class Point:
    """A velocity at a fraction of the effective depth: 0 surface, 1 bed; negative upstream."""

    fraction: float | None
    velocity_ms: float | None = None
    revolutions: float | None = None
    seconds: float | None = None


@dataclass(frozen=True)
class Vertical:
    """A sounding, and the points measured in it; without points and mean velocity a sounding only.

    depth_m as read: from the water surface to the bed; with a line angle the length of line below
    the water surface. air_line_m: height of the guide point above the water.
    """

    distance_m: float | None
    depth_m: float | None
    points: tuple[Point, ...] = ()
    mean_velocity_ms: float | None = None
    angle_deg: float = 0.0
    ice_underside_m: float = 0.0
    line_angle_deg: float = 0.0
    air_line_m: float = 0.0
    time_s: int | None = None


@dataclass(frozen=True)
class Bank:
    """The edge of the water: a depth is a wall, a velocity measured there overrides the factor."""

    distance_m: float | None
    depth_m: float = 0.0
    edge: Edge = Edge.SLOPING
    factor: float | None = None
    velocity_ms: float | None = None


@dataclass(frozen=True)
class Channel:
    """Verticals from one bank (or pier, or island) to the other, in the order measured."""

    first_bank: Bank
    last_bank: Bank
    verticals: tuple[Vertical, ...]
    starts_at_left_bank: bool = True


@dataclass(frozen=True)
class Meter:
    """The rating in force of the meter pair, and what is known about it on the day."""

    pieces: tuple[Piece, ...] = ()
    lowest_ms: float | None = None
    highest_ms: float | None = None
    calibrated_singly: bool = True
    standard_uncertainty_percent: float | None = None
    days_since_calibration: float | None = None
    hours_since_calibration: float | None = None
    spin_test_s: float | None = None


@dataclass(frozen=True)
class StageReading:
    """A stage above station zero read during the gauging."""

    time_s: int
    stage_m: float


@dataclass(frozen=True)
class Sheet:
    """A whole gauging by velocity and area."""

    channels: tuple[Channel, ...]
    meter: Meter | None = None
    stages: tuple[StageReading, ...] = ()
    started_s: int | None = None
    ended_s: int | None = None
    wading: bool = False


class DischargeMethod(StrEnum):
    """The two ways from verticals to discharge."""

    MID_SECTION = "mid"
    MEAN_SECTION = "mean"


@dataclass(frozen=True)
class GaugingSettings:
    """What the agency has settled; defaults are common practice, each with its source.

    Uncertainties are standard uncertainties in %; those under "agency" stand where the tables of
    ISO 748:2007 say nothing and are stated as such with the result.
    """

    method: DischargeMethod = DischargeMethod.MID_SECTION
    edge_factors: dict[Edge, float] = field(default_factory=lambda: dict(EDGE_FACTORS))
    surface_factor: float = 0.86  # natural bed; 0.90 lined (USGS WSP 2175 p. 170)
    # Uncertainty, agency values
    systematic_percent: float = 1.0
    shallow_depth_percent: float = 1.5  # depth under 0.4 m
    three_points_percent: float = 3.0  # between two points 3.5 and five 2.5
    six_points_percent: float = 2.5
    given_mean_percent: float = 3.5
    ice_one_point_percent: float = 10.0
    ice_more_points_percent: float = 5.0
    unstated_exposure_s: float = 30.0
    # Limits of findings
    panel_share_percent: float = 10.0
    panel_share_advice_percent: float = 5.0
    neighbours_percent: float = 20.0
    exposure_s: float = 30.0
    lowest_velocity_ms: float = 0.15  # where the calibration states no range (common practice)
    highest_velocity_ms: float = 4.0
    one_point_depth_m: float = 0.5  # two points in less depth: unfit
    two_point_depth_m: float = 0.8  # one point in more depth: unfit
    stage_change_m: float = 0.05
    stage_interval_s: float = 1800.0
    calibration_days: float = 366.0
    calibration_hours: float = 300.0
    methods_apart_percent: float = 3.0
    outlier_ratio: float = 4.0
    wading_product_m2s: float = 0.9
