"""Acts upon benchmarks: added, their elevations set from an instant on. No stage rests on them."""

from datetime import datetime

from django.utils.translation import gettext as _

from network.models import Benchmark, BenchmarkElevation, Person, Station
from network.services import chains
from network.services.acts import open_act


def add_benchmark(
    *,
    station: Station,
    label: str,
    by: Person,
    at: datetime,
    description: str = "",
    is_main: bool = False,
    elevation_m: float | None = None,
    effective_from: datetime | None = None,
    reason: str = "",
) -> Benchmark:
    """Add a benchmark, with its elevation above the national datum where that is known."""
    verb = _("added benchmark %(label)s") % {"label": label}
    with open_act(verb, by=by, at=at, reason=reason, station=station):
        mark = Benchmark(
            station=station, label=label.strip(), description=description, is_main=is_main
        )
        mark.full_clean()
        mark.save()
        if elevation_m is not None:
            chains.begin(
                BenchmarkElevation(
                    benchmark=mark, elevation_m=chains.metres(elevation_m, field="elevation_m")
                ),
                effective_from=effective_from or at,
                by=by,
                at=at,
                reason=reason.strip() or _("first elevation of the benchmark"),
            )
    return mark


def set_elevation(
    *,
    benchmark: Benchmark,
    elevation_m: float | None,
    effective_from: datetime,
    by: Person,
    at: datetime,
    reason: str,
) -> BenchmarkElevation:
    """Set a benchmark's elevation from an instant on; no stage and no flow rests on it."""
    verb = _("set the elevation of benchmark %(label)s") % {"label": benchmark.label}
    row = BenchmarkElevation(
        benchmark=benchmark, elevation_m=chains.metres(elevation_m, field="elevation_m")
    )
    return chains.set_from(
        row,
        benchmark.station,
        verb,
        effective_from=effective_from,
        by=by,
        at=at,
        reason=reason,
        touches_figures=False,
    )


def withdraw_elevation(
    *, elevation: BenchmarkElevation, by: Person, at: datetime, reason: str
) -> None:
    """Withdraw a benchmark elevation; the one before it then holds on."""
    station = elevation.benchmark.station
    verb = _("withdrew a benchmark elevation")
    chains.take_back(elevation, station, verb, by=by, at=at, reason=reason, touches_figures=False)
