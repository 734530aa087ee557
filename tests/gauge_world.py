"""A station with two plates and a benchmark, and a level book over them worked by hand."""

from datetime import UTC, datetime, timedelta
from uuid import uuid4

from network.models import Series, Sight
from network.queries.level_sheet import LevelSheet, PegRow, SightRow
from network.queries.visit_sheet import CheckRow, ReadingRow, VisitSheet
from network.services import benchmarks, gauges, levels, series, station_zeros, visits
from tests import field_world as world

SINCE = datetime(2020, 1, 1, tzinfo=UTC)
LEVELLED = datetime(2024, 5, 14, 12, tzinfo=UTC)
LATER = datetime(2024, 6, 1, 8, tzinfo=UTC)
SIGNED = {"at": LATER, "reason": "as surveyed"}


def signed():
    return {**SIGNED, "by": world.person()}


def gauged(where):
    """Zero at 98 m; P1 from stage 0 to 1.2 m, P2 from 1 to 3 m; benchmark at 100 m; a recorder."""
    station_zeros.set_station_zero(
        station=where, elevation_m=98.0, datum_name="NN", effective_from=SINCE, **signed()
    )
    for label, highest_m, zero_m in (("P1", 1.2, 0.0), ("P2", 2.0, 1.0)):
        gauges.install_plate(
            station=where,
            label=label,
            lowest_m=0.0,
            highest_m=highest_m,
            installed_at=SINCE,
            zero_m=zero_m,
            is_usual=label == "P1",
            **signed(),
        )
    benchmarks.add_benchmark(
        station=where,
        label="BM",
        is_main=True,
        elevation_m=100.0,
        effective_from=SINCE,
        **signed(),
    )
    series.open_series(
        station=where,
        label="float",
        kind=Series.Kind.RECORDER,
        is_primary=True,
        by=world.person(),
        at=SINCE,
    )
    return where


def plate(where, label):
    return where.plates.get(label=label)


def sight(where, on, bs=None, i=None, fs=None):
    """One line: "BM", "P1 1.00" (plate and graduation), "water" or "turning"."""
    label, _, graduation = on.partition(" ")
    readings = {"backsight_m": bs, "intermediate_m": i, "foresight_m": fs}
    if label == "BM":
        mark = where.benchmarks.get(label="BM")
        return SightRow(point=Sight.Point.BENCHMARK, benchmark=mark, **readings)
    if graduation:
        return SightRow(
            point=Sight.Point.PLATE,
            plate=plate(where, label),
            graduation_m=float(graduation),
            **readings,
        )
    return SightRow(point=label, **readings)


def book(where, last_foresight_m=1.301):
    """A book of two set-ups that closes to −1.0 mm, and to +4.0 mm with a last sight of 1.296.

    By hand:                     sight           height of       reduced   share of
                                                 collimation     level     misclosure
      BM                         BS 1.500        101.500         100.000
      P1 at 1.00                 IS 2.502                         98.998   +0.25 mm
      P2 at 1.50                 IS 0.980                        100.520   +0.25 mm
      turning                    FS 1.800                         99.700   +0.50 mm
                                 BS 1.600        101.300
      water                      IS 2.580                         98.720   +0.75 mm
      P1 at 1.00                 IS 2.301                         98.999   +0.75 mm
      P2 at 1.50                 IS 0.780                        100.520   +0.75 mm
      BM                         FS 1.301                         99.999   +1.00 mm

    ΣBS − ΣFS = 3.100 − 3.101 = −0.001. Limit 0.9·√2 = 1.27 mm.
    P1: (98.99825 + 98.99975)/2 − 1.00 = 97.9990, 0.0010 m below the station zero of 98: no error.
    P2: (100.52025 + 100.52075)/2 − 1.50 = 99.0205, which is 1.0205 m above the station zero.
    """
    return (
        sight(where, "BM", bs=1.500),
        sight(where, "P1 1.00", i=2.502),
        sight(where, "P2 1.50", i=0.980),
        sight(where, "turning", fs=1.800, bs=1.600),
        sight(where, "water", i=2.580),
        sight(where, "P1 1.00", i=2.301),
        sight(where, "P2 1.50", i=0.780),
        sight(where, "BM", fs=last_foresight_m),
    )


LEVELS_BY_HAND = [100.000, 98.998, 100.520, 99.700, 98.720, 98.999, 100.520, 99.999]
PEG = PegRow(distance_m=40, middle_a_m=1.4, middle_b_m=1.3, near_a_m=1.5, near_b_m=1.4)


def level_sheet(where, **changes):
    return LevelSheet(
        **{"station": where, "levelled_at": LEVELLED, "peg": PEG, "sights": book(where)} | changes
    )


def saved_levels(where, **changes):
    return levels.save_level_check(
        form_id=uuid4(), sheet=level_sheet(where, **changes), by=world.person(), at=LATER
    )


def checked_levels(where, **changes):
    return levels.check_level_check(
        level_check=saved_levels(where, **changes), by=world.person("ben"), at=LATER
    )


def visit_sheet(where, **changes):
    return VisitSheet(**{"station": where, "arrived_at": LEVELLED} | changes)


def read_twice(where, since):
    """Two visits 28 days apart: P2 read at 0.500, the recorder right beside it."""
    for days in (2, 30):
        at = since + timedelta(days=days)
        reading = ReadingRow(read_at=at, plate=plate(where, "P2"), reading_m=0.5)
        check = CheckRow(series=where.series.get(), checked_at=at, found_m=1.5)
        visits.save_visit(
            form_id=uuid4(),
            sheet=visit_sheet(where, arrived_at=at, readings=(reading,), recorder_checks=(check,)),
            by=world.person(),
            at=LATER,
        )
