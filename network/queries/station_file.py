"""The station file: everything a party or a manager wants to see of a station on one page."""

from collections.abc import Sequence
from dataclasses import dataclass
from datetime import datetime

from network.models import (
    BenchmarkElevation,
    Deployment,
    Document,
    Gauging,
    LevelCheck,
    OtherGauge,
    PlateZero,
    RatingPeriod,
    SafetyItem,
    SensorSetting,
    SiteSurvey,
    Station,
    StationZero,
    Visit,
    WorkLeft,
)
from network.queries import gauges, in_force, visits
from network.queries.gauges import PlateThen
from network.queries.plates_drawing import Drawing, drawing
from network.queries.recorder_checks import Compared, compared
from network.queries.sentences import said

LATEST = 5


@dataclass(frozen=True)
class Recorder:
    """A recorder that stands here, its setting in force, and its last check beside the staff."""

    deployment: Deployment
    setting: SensorSetting | None
    last_check: Compared | None


@dataclass(frozen=True)
class StationFile:
    """What stands at a station now, and the latest of what was done."""

    station: Station
    zero: StationZero | None
    plates: Sequence[PlateThen]
    drawing: Drawing | None
    other_gauges: Sequence[tuple[OtherGauge, float | None]]
    zeros: Sequence[PlateZero]
    station_zeros: Sequence[StationZero]
    benchmarks: Sequence[BenchmarkElevation]
    recorders: Sequence[Recorder]
    rating: RatingPeriod | None
    visits: Sequence[Visit]
    level_checks: Sequence[LevelCheck]
    gaugings: Sequence[Gauging]
    work_left: Sequence[WorkLeft]
    safety_items: Sequence[SafetyItem]
    survey: SiteSurvey | None
    documents: Sequence[Document]

    @property
    def plate_findings(self) -> list[str]:
        """Holes and short overlaps in words."""
        return [said(found.sentence) for found in self.drawing.findings] if self.drawing else []


def station_file(station: Station, *, at: datetime) -> StationFile:
    """Gather the file of a station as it stands at an instant."""
    zeros = PlateZero.objects.standing().filter(plate__station=station)
    checks = LevelCheck.objects.filter(station=station)
    return StationFile(
        station=station,
        zero=gauges.station_zero(station, at),
        plates=gauges.plates_in_service(station, at),
        drawing=drawing(station, at),
        other_gauges=[
            (gauge, _zero_m(gauge, at)) for gauge in gauges.other_gauges_in_service(station, at)
        ],
        zeros=list(zeros.select_related("plate", "level_check").order_by("-effective_from")),
        station_zeros=list(
            StationZero.objects.standing().filter(station=station).order_by("-effective_from")
        ),
        benchmarks=_benchmarks(station, at),
        recorders=[_recorder(row, at) for row in visits.recorders_standing(station, at)],
        rating=in_force.at(RatingPeriod.objects.filter(station=station), at),
        visits=list(Visit.objects.filter(station=station).prefetch_related("party")[:LATEST]),
        level_checks=list(checks.order_by("-levelled_at")[:LATEST]),
        gaugings=list(Gauging.objects.filter(station=station).order_by("-started_at")[:LATEST]),
        work_left=visits.work_left(station),
        safety_items=list(station.safety_items.filter(removed_on__isnull=True)),
        survey=SiteSurvey.objects.filter(station=station).prefetch_related("criteria").first(),
        documents=list(station.documents.all()),
    )


def _zero_m(gauge: OtherGauge, at: datetime) -> float | None:
    row = in_force.at(gauge.zeros.all(), at)
    return row.zero_m if row is not None else None


def _benchmarks(station: Station, at: datetime) -> list[BenchmarkElevation]:
    marks = station.benchmarks.order_by("-is_main", "label")
    rows = [in_force.at(mark.elevations.select_related("benchmark"), at) for mark in marks]
    return [row for row in rows if row is not None]


def _recorder(deployment: Deployment, at: datetime) -> Recorder:
    series = deployment.series
    last = series.recorder_checks.filter(checked_at__lte=at).order_by("checked_at").last()
    return Recorder(
        deployment,
        in_force.at(series.settings.all(), at),
        compared([last])[0] if last is not None else None,
    )
