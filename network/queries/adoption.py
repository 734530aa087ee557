"""What rests on plate zeros: stages of readings at visits and gaugings, corrections proposed."""

from collections.abc import Iterable, Mapping, Sequence
from dataclasses import dataclass
from datetime import UTC, datetime
from typing import Any

from network.models import Gauging, StageReading, Station, VisitReading
from network.numerics.records.recorder_checks import ProposedCorrection
from network.queries import gauges, recorder_checks


@dataclass(frozen=True)
class StageChange:
    """The stage of one reading before and after, m above the station zero."""

    reading: VisitReading | StageReading
    before_m: float | None
    after_m: float | None


@dataclass(frozen=True)
class CorrectionChange:
    """A correction that is proposed on one side only, or with other figures."""

    series: str
    before: ProposedCorrection | None
    after: ProposedCorrection | None

    @property
    def start_at(self) -> datetime:
        """When the period starts; both sides speak of the same."""
        return datetime.fromtimestamp(self._either.start_s, UTC)

    @property
    def end_at(self) -> datetime:
        """When the period ends."""
        return datetime.fromtimestamp(self._either.end_s, UTC)

    @property
    def _either(self) -> ProposedCorrection:
        found = self.before or self.after
        assert found is not None
        return found


@dataclass(frozen=True)
class Changes:
    """What an act would change besides the days."""

    visits: Sequence[StageChange]
    gaugings: Sequence[StageChange]
    corrections: Sequence[CorrectionChange]

    @property
    def gaugings_touched(self) -> list[Gauging]:
        """The gaugings of which a stage changes, each once."""
        return list({change.reading.gauging: None for change in self.gaugings})


def look(station: Station, *, since: datetime) -> Mapping[str, Any]:
    """Return the stages of all plate readings since an instant, and the corrections proposed."""
    visits = VisitReading.objects.filter(visit__station=station, read_at__gte=since)
    sheets = StageReading.objects.filter(gauging__station=station, read_at__gte=since)
    return {
        "visits": _stages(visits.select_related("plate", "other_gauge", "visit")),
        "gaugings": _stages(sheets.filter(plate__isnull=False).select_related("plate", "gauging")),
        "corrections": {
            (series.label, row.correction.start_s, row.correction.end_s): row.correction
            for series in station.series.all()
            for row in recorder_checks.proposals(series)
        },
    }


def changes(more: Mapping[str, Mapping[str, Any]]) -> Changes:
    """Compare the two looks of a trial and keep what differs."""
    before, after = more["before"], more["after"]
    corrections = [
        CorrectionChange(key[0], before["corrections"].get(key), after["corrections"].get(key))
        for key in sorted(before["corrections"] | after["corrections"])
    ]
    return Changes(
        visits=_differing(before["visits"], after["visits"]),
        gaugings=_differing(before["gaugings"], after["gaugings"]),
        corrections=[row for row in corrections if row.before != row.after],
    )


def _stages(readings: Iterable[Any]) -> dict[Any, float | None]:
    rows = list(readings)
    return dict(zip(rows, gauges.stages_m(rows), strict=True))


def _differing(before: Mapping[Any, Any], after: Mapping[Any, Any]) -> list[StageChange]:
    return [
        StageChange(reading, stage_m, after.get(reading))
        for reading, stage_m in before.items()
        if stage_m != after.get(reading)
    ]
