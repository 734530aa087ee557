"""Load the demo's agency, people, stations with their gauges, instruments and calibrations."""

from collections.abc import Collection
from datetime import UTC, datetime, time
from typing import Any

from network.formats.demo_field_rows import Calibration
from network.formats.demo_rows import Station as StationRow
from network.formats.demo_scenario import Scenario
from network.models import Calibration as CalibrationModel
from network.models import Instrument, StationZero
from network.queries import clock
from network.services import (
    benchmarks,
    calibrations,
    gauges,
    instruments,
    people,
    setting_up,
    station_zeros,
    stations,
)
from network.services.demo_cast import Cast
from network.services.demo_field import pieces_of, tow_runs_of
from network.services.demo_world import make_truths

KINDS = {
    "meter body": "body",
    "meter rotor": "rotor",
    "levelling staff": "staff",
    "winch and weight": "winch",
    "acoustic profiler": "acoustic",
    "conductivity probe": "salt",
    "dipper": "other",
}
GAUGE_KINDS = {"wire weight": "wire", "flood mark": "mark"}
CLOCK_FIELDS = (
    "record_utc_offset_minutes",
    "civil_zone",
    "day_starts_at_hour",
    "water_year_start_month",
    "water_year_named_by_end",
)
OTHER_FIELDS = ("address", "licence_line", "decimal_sign", "language")


def load_agency(scenario: Scenario, *, password: str, only: Collection[str] = ()) -> Cast:
    """Write the agency, its offices and its people, all with one password; return the cast.

    `only`: codes of the stations that will be loaded; all where there are none.
    """
    row = scenario.agency
    founded = datetime.combine(scenario.basin.first_day, time(6), tzinfo=scenario.clock)
    setting_up.found_agency(
        name=row.name,
        clocks=setting_up.Clocks(**{name: getattr(row, name) for name in CLOCK_FIELDS}),
        at=founded.astimezone(UTC),
        **{name: getattr(row, name) for name in OTHER_FIELDS},
    )
    offices = {
        office.name: setting_up.open_office(**vars(office), by=None, at=founded)
        for office in scenario.offices
    }
    taken_on = {
        person.username: people.take_on(
            username=person.username,
            password=password,
            roles_held=[person.role.replace("_", " ")],
            first_name=person.first_name,
            last_name=person.last_name,
            office=offices[person.office],
            phone=person.phone,
            by=None,
            at=founded,
        )
        for person in scenario.people
    }
    return Cast(scenario, make_truths(scenario), taken_on, offices, only)


def load_station(cast: Cast, row: StationRow) -> None:
    """Open a station with its zeros, plates, other gauges and benchmarks."""
    facts = dict(vars(row.station))
    office = cast.offices[facts.pop("office")]
    signed: dict[str, Any] = {"by": cast.manager, "at": cast.opening}
    station = stations.open_station(**facts, office=office, **signed)
    cast.stations[station.code] = station
    for zero in row.zeros:
        if zero.kind != StationZero.Kind.MOVED:
            station_zeros.set_station_zero(
                station=station, **vars(zero), by=cast.manager, at=cast.entered(zero.effective_from)
            )
    moved = moves_of(row)
    _load_plates(cast, row, moved)
    _load_other_gauges(cast, row, moved)
    for mark in row.benchmarks:
        first, *later = mark.elevations
        benchmark = benchmarks.add_benchmark(
            station=station,
            label=mark.label,
            description=mark.description,
            is_main=mark.is_main,
            **vars(first),
            **signed,
        )
        for elevation in later:
            benchmarks.set_elevation(
                benchmark=benchmark,
                **vars(elevation),
                by=cast.manager,
                at=cast.entered(elevation.effective_from),
            )


def moves_of(row: StationRow) -> Collection[datetime]:
    """Return the instants at which the station zero moved: all that starts then is one act."""
    return {zero.effective_from for zero in row.zeros if zero.kind == StationZero.Kind.MOVED}


def _load_plates(cast: Cast, row: StationRow, moved: Collection[datetime]) -> None:
    """Put up the plates; zeros found by a level check come with it, those of a move with it."""
    for plate in row.plates:
        first, *later = plate.zeros
        stands = gauges.install_plate(
            station=cast.stations[row.station.code],
            label=plate.label,
            lowest_m=plate.lowest_m,
            highest_m=plate.highest_m,
            step_m=plate.step_m,
            is_usual=plate.is_usual,
            installed_at=plate.installed_at,
            zero_m=first.zero_m,
            reason=first.reason,
            by=cast.manager,
            at=cast.entered(plate.installed_at),
        )
        for zero in later:
            if not zero.level_check and zero.effective_from not in moved:
                gauges.set_plate_zero(
                    plate=stands,
                    zero_m=zero.zero_m,
                    effective_from=zero.effective_from,
                    reason=zero.reason,
                    by=cast.keeper(row.station.code),
                    at=cast.entered(zero.effective_from),
                )
        if plate.removed_at:
            gauges.remove_plate(
                plate=stands,
                removed_at=plate.removed_at,
                by=cast.manager,
                at=cast.entered(plate.removed_at),
                reason="Taken down.",
            )


def _load_other_gauges(cast: Cast, row: StationRow, moved: Collection[datetime]) -> None:
    for gauge in row.other_gauges:
        first, *later = gauge.zeros
        stands = gauges.add_other_gauge(
            station=cast.stations[row.station.code],
            kind=GAUGE_KINDS.get(gauge.kind, gauge.kind),
            label=gauge.label,
            installed_at=gauge.installed_at,
            zero_m=first.zero_m,
            reason=first.reason,
            by=cast.manager,
            at=cast.entered(gauge.installed_at),
        )
        for zero in later:
            if zero.effective_from not in moved:
                gauges.set_gauge_zero(
                    gauge=stands,
                    zero_m=zero.zero_m,
                    effective_from=zero.effective_from,
                    reason=zero.reason,
                    by=cast.keeper(row.station.code),
                    at=cast.entered(zero.effective_from),
                )


def load_instruments(cast: Cast) -> None:
    """Add the instruments, join bodies and rotors; what is withdrawn now is so after its use."""
    own = clock.agency()
    for row in cast.scenario.instruments.instruments:
        status = Instrument.Status.SPARE if row.status == "spare" else Instrument.Status.IN_SERVICE
        acquired = clock.day_start(row.acquired_on, of=own)
        cast.instruments[row.label] = instruments.add(
            kind=KINDS.get(row.kind, row.kind),
            serial=row.serial,
            office=cast.offices[row.office],
            maker=row.maker,
            model=row.model,
            status=status,
            interval_months=row.interval_months or None,
            interval_hours=row.interval_hours or None,
            remarks=row.remarks,
            by=cast.manager,
            at=cast.entered(acquired),
        )
    for pair in cast.scenario.instruments.meter_pairs:
        cast.pairs[pair.label] = instruments.pair(
            body=cast.instruments[pair.body],
            rotor=cast.instruments[pair.rotor],
            by=cast.manager,
            at=cast.opening,
        )


def load_calibrations(cast: Cast) -> None:
    """Enter the calibrations: fitted to tow runs where there are any, else from the certificate."""
    own = clock.agency()
    for row in cast.scenario.instruments.calibrations:
        _load_calibration(cast, row, effective_from=clock.day_start(row.on, of=own))
    for check in cast.scenario.instruments.checks:
        day = clock.day_start(check.on, of=own)
        calibrations.from_certificate(
            owner=cast.instruments[check.instrument],
            effective_from=day,
            certificate=calibrations.Certificate(
                laboratory=check.laboratory, certificate_number=check.certificate
            ),
            by=cast.manager,
            at=cast.entered(day),
        )


def _load_calibration(cast: Cast, row: Calibration, *, effective_from: datetime) -> None:
    passed, _comma, remarks = row.outcome.partition(", ")
    paper = calibrations.Certificate(
        laboratory=row.laboratory,
        certificate_number=row.certificate,
        lowest_velocity_ms=row.lowest_ms,
        highest_velocity_ms=row.highest_ms,
        uncertainty_percent=row.standard_error_percent,
        outcome=CalibrationModel.Outcome(passed),
        remarks=remarks,
    )
    known: dict[str, Any] = {
        "owner": cast.pairs[row.pair],
        "effective_from": effective_from,
        "certificate": paper,
        "by": cast.manager,
        "at": cast.entered(effective_from),
    }
    runs = tow_runs_of(row, seed=cast.scenario.basin.seed) if row.tow_speeds_ms else ()
    if runs:
        calibrations.from_tow_runs(
            **known,
            runs=[calibrations.Run(**vars(run)) for run in runs],
            pieces=len(row.pieces),  # type: ignore[arg-type]  # one to three
        )
    else:
        calibrations.from_certificate(**known, pieces=pieces_of(row))
