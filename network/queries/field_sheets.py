"""A field sheet: what was noted of a gauging, the same from a form, a workbook or the rows."""

from collections.abc import Sequence
from dataclasses import dataclass
from datetime import UTC, datetime

import network.models as models
from network.models import Gauging
from network.numerics.gaugings.gauging_input import Bank, Channel, Edge, Point, Vertical
from network.numerics.gaugings.other_methods import Fill
from network.queries import in_force


@dataclass(frozen=True, kw_only=True)
class Heading:
    """The head of a sheet: where, when, how and with what."""

    station: models.Station
    started_at: datetime
    ended_at: datetime
    way: str = Gauging.Way.WADING
    method: str = Gauging.Method.VELOCITY_AREA
    pair: models.MeterPair | None = None
    instrument: models.Instrument | None = None
    visit: models.Visit | None = None
    sounding: str = Gauging.Sounding.ROD
    spin_test_seconds: float | None = None
    remarks: str = ""
    stated_discharge_m3s: float | None = None
    stated_u95_percent: float | None = None

    @property
    def mid_time(self) -> datetime:
        """The instant a gauging belongs to."""
        return self.started_at + (self.ended_at - self.started_at) / 2


@dataclass(frozen=True)
class StageRow:
    """A stage read during the gauging, on a plate, or above the station zero without one."""

    read_at: datetime
    reading_m: float
    plate: models.StaffPlate | None = None


@dataclass(frozen=True)
class Crossing:
    """One crossing of a moving boat; one left out stays on the sheet."""

    flow_m3s: float | None
    seconds: float | None
    from_left_bank: bool
    is_used: bool = True


@dataclass(frozen=True)
class Boat:
    """Crossings in reciprocal pairs, and the moving-bed test where one was made."""

    crossings: tuple[Crossing, ...]
    tracks_the_bed: bool = True
    bed_velocity_ms: float | None = None
    water_velocity_ms: float | None = None


@dataclass(frozen=True)
class TimedFloat:
    """One float: the part of the section it ran in, that part's area, and its time."""

    panel: int
    area_m2: float | None
    seconds: float | None


@dataclass(frozen=True)
class Floats:
    """Floats timed over a reach."""

    length_m: float | None
    floats: tuple[TimedFloat, ...]


@dataclass(frozen=True)
class Fills:
    """A vessel filled several times."""

    fills: tuple[Fill, ...]


@dataclass(frozen=True)
class Sample:
    """A concentration at a place of sampling, with its time where a cloud passed."""

    probe: int
    concentration_kgm3: float | None
    seconds: float | None = None


@dataclass(frozen=True)
class Tracer:
    """A tracer put in at a rate (m³/s, kg/m³) or as a mass at once (kg), and what came by."""

    samples: tuple[Sample, ...]
    background_kgm3: float = 0.0
    injection_m3s: float | None = None
    injected_kgm3: float | None = None
    mass_kg: float | None = None


@dataclass(frozen=True)
class Weir:
    """The head on a thin-plate notch and its sizes; its uncertainty is stated in the heading."""

    shape: str
    head_m: float | None
    crest_height_m: float | None
    channel_width_m: float | None
    angle_deg: float | None = None
    notch_width_m: float | None = None


Other = Boat | Floats | Fills | Tracer | Weir


@dataclass(frozen=True)
class FieldSheet:
    """A whole sheet; with neither channels nor other the result stated in the heading stands."""

    heading: Heading
    stages: tuple[StageRow, ...] = ()
    channels: tuple[Channel, ...] = ()
    other: Other | None = None


def of_gauging(gauging: Gauging) -> FieldSheet:
    """Read the sheet of a stored gauging."""
    fields = Heading.__dataclass_fields__
    return FieldSheet(
        Heading(**{name: getattr(gauging, name) for name in fields}),
        tuple(
            StageRow(row.read_at, row.reading_m, row.plate)
            for row in gauging.stages.select_related("plate")
        ),
        tuple(
            _channel(row) for row in gauging.channels.prefetch_related("verticals__points").all()
        ),
        _other(gauging),
    )


def instant(seconds: int) -> datetime:
    """Return the instant of epoch seconds."""
    return datetime.fromtimestamp(seconds, UTC)


def _channel(row: models.Channel) -> Channel:
    return Channel(
        Bank(
            row.start_distance_m,
            row.start_depth_m,
            Edge(row.start_edge),
            velocity_ms=row.start_velocity_ms,
        ),
        Bank(
            row.end_distance_m, row.end_depth_m, Edge(row.end_edge), velocity_ms=row.end_velocity_ms
        ),
        tuple(_vertical(vertical) for vertical in row.verticals.all()),
        starts_at_left_bank=row.starting_bank == models.Channel.Bank.LEFT,
    )


def _vertical(row: models.Vertical) -> Vertical:
    return Vertical(
        row.distance_m,
        row.depth_m,
        tuple(Point(p.fraction, p.velocity_ms, p.revolutions, p.seconds) for p in row.points.all()),
        mean_velocity_ms=row.given_velocity_ms,
        angle_deg=row.angle_deg,
        ice_underside_m=row.ice_underside_m or 0.0,
        line_angle_deg=row.line_angle_deg or 0.0,
        air_line_m=row.air_line_m or 0.0,
        time_s=None if row.measured_at is None else in_force.seconds(row.measured_at),
    )


def _other(gauging: Gauging) -> Other | None:
    """Read what another method noted, None where it noted nothing but a result."""
    method = Gauging.Method(gauging.method)
    reader = READERS.get(method)
    return reader(gauging) if reader else None


def _boat(gauging: Gauging) -> Boat | None:
    rows = tuple(
        Crossing(t.discharge_m3s, t.seconds, t.starting_bank == models.Channel.Bank.LEFT, t.is_used)
        for t in gauging.transects.all()
    )
    track = models.BoatTrack.objects.filter(gauging=gauging).first()
    if not rows and track is None:
        return None
    track = track or models.BoatTrack()
    return Boat(rows, track.tracks_the_bed, track.bed_velocity_ms, track.water_velocity_ms)


def _floats(gauging: Gauging) -> Floats | None:
    reach = models.FloatReach.objects.filter(gauging=gauging).first()
    if reach is None:
        return None
    rows = tuple(TimedFloat(row.panel, row.area_m2, row.seconds) for row in reach.floats.all())
    return Floats(reach.length_m, rows)


def _fills(gauging: Gauging) -> Fills | None:
    rows = tuple(Fill(row.volume_m3, row.seconds) for row in gauging.fills.all())
    return Fills(rows) if rows else None


def _tracer(gauging: Gauging) -> Tracer | None:
    row = models.TracerInjection.objects.filter(gauging=gauging).first()
    if row is None:
        return None
    samples = tuple(Sample(s.probe, s.concentration_kgm3, s.seconds) for s in row.samples.all())
    return Tracer(samples, row.background_kgm3, row.injection_m3s, row.injected_kgm3, row.mass_kg)


def _weir(gauging: Gauging) -> Weir | None:
    row = models.WeirHead.objects.filter(gauging=gauging).first()
    if row is None:
        return None
    return Weir(
        row.shape,
        row.head_m,
        row.crest_height_m,
        row.channel_width_m,
        row.angle_deg,
        row.notch_width_m,
    )


READERS = {
    Gauging.Method.MOVING_BOAT: _boat,
    Gauging.Method.FLOAT: _floats,
    Gauging.Method.VOLUMETRIC: _fills,
    Gauging.Method.DILUTION: _tracer,
    Gauging.Method.WEIR: _weir,
}


def known_stages(
    stages: Sequence[StageRow], zeros_m: dict[int, float]
) -> list[tuple[datetime, float]]:
    """Turn stage readings into stages above the station zero; a plate without a zero gives none."""
    return [
        (row.read_at, row.reading_m + (zeros_m[row.plate.pk] if row.plate else 0.0))
        for row in stages
        if row.plate is None or row.plate.pk in zeros_m
    ]
