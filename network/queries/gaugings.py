"""What a field sheet gives, held against the rating in force: the one answer of screen and row."""

from collections.abc import Iterable, Sequence
from dataclasses import dataclass, replace
from datetime import datetime

import numpy as np
from django.db.models import prefetch_related_objects

from network.models import Agency, Calibration, Gauging, StaffPlate, WorkingRules
from network.numerics.gaugings import gauging as kernel
from network.numerics.gaugings.gauging_faults import BadSheet, Fault
from network.numerics.gaugings.gauging_findings import rating_deviation
from network.numerics.gaugings.gauging_input import (
    DischargeMethod,
    GaugingSettings,
    Meter,
    Sheet,
    StageReading,
)
from network.numerics.gaugings.gauging_result import Gauging as GaugingResult
from network.numerics.gaugings.gauging_result import Preview
from network.numerics.gaugings.mean_stage import MeanStage, mean_stage
from network.numerics.gaugings.other_methods import OtherGauging
from network.numerics.gaugings.vertical_findings import Finding
from network.numerics.sentences import gettext_noop, sentence
from network.queries import calibrations, clock, other_methods, station_facts
from network.queries.field_sheets import FieldSheet, known_stages, of_gauging
from network.queries.in_force import seconds
from network.queries.station_facts import StationFacts
from network.queries.working_rules import rules

STATED = gettext_noop("The uncertainty rests on a value of the agency: {case}.")
NO_STANDARD = gettext_noop("agency setting; the tables of ISO 748:2007 say nothing")


@dataclass(frozen=True, eq=False)
class Answer:
    """What a sheet gives so far; what is shown of it is what signing stores.

    preview: of a velocity-area gauging; other: of another method; faults forbid signing;
    rated_m3s, deviation_percent and shift_m by the rating in force at the mid-time, None where
    there is none or no mean stage.
    """

    sheet: FieldSheet
    faults: tuple[Fault, ...]
    findings: tuple[Finding, ...]
    preview: Preview | None = None
    other: OtherGauging | None = None
    stage: MeanStage | None = None
    calibration: Calibration | None = None
    version: str = ""
    rated_m3s: float | None = None
    deviation_percent: float | None = None
    shift_m: float | None = None
    wading_limit_m2s: float = 0.9

    @property
    def result(self) -> GaugingResult | None:
        """The kernel's result of a velocity-area gauging."""
        return self.preview.result if self.preview else None

    @property
    def discharge_m3s(self) -> float | None:
        """The discharge, None until something can be computed."""
        found = self.result or self.other
        return found.discharge_m3s if found else None

    @property
    def u95_percent(self) -> float | None:
        """The expanded uncertainty in %, None at zero flow."""
        if self.result:
            return self.result.uncertainty.u95_percent
        return self.other.u95_percent if self.other else None

    @property
    def u95_m3s(self) -> float | None:
        """The expanded uncertainty in m³/s."""
        if self.result:
            return self.result.uncertainty.u95_m3s
        return self.other.u95_m3s if self.other else None


def answer(
    sheet: FieldSheet, *, agency: Agency | None = None, leave_out: int | None = None
) -> Answer:
    """Compute what a sheet gives; with the agency given, in three queries.

    leave_out: key of the gauging whose own use of the meter does not count as wear before it.
    """
    own, limits = agency or clock.agency(), rules()
    heading = sheet.heading
    facts = station_facts.at(heading.station, heading.mid_time)
    settings = settings_of(own, limits)
    if heading.method != Gauging.Method.VELOCITY_AREA or not sheet.channels:
        return _held_against(_by_other_method(sheet, facts, settings), facts)
    then = calibrations.MeterThen(None, Meter(spin_test_s=heading.spin_test_seconds))
    if heading.pair is not None:
        then = calibrations.meter_then(
            heading.pair.pk,
            heading.mid_time,
            spin_test_s=heading.spin_test_seconds,
            leave_out=leave_out,
        )
    meter = then.meter if heading.pair is not None else None
    preview = kernel.preview(kernel_sheet(sheet, facts, meter), settings)
    result = preview.result
    return _held_against(
        Answer(
            sheet,
            preview.faults,
            (*result.findings, *_stated_cases(result)) if result else (),
            preview=preview,
            stage=result.stage if result else _plain_stage(sheet, facts, settings),
            calibration=then.calibration,
            wading_limit_m2s=settings.wading_product_m2s,
        ),
        facts,
    )


def of_stored(gauging: Gauging, *, agency: Agency | None = None) -> Answer:
    """Compute what a stored gauging's sheet gives today, by the calibration in force."""
    return answer(of_gauging(gauging), agency=agency, leave_out=gauging.pk)


def kernel_sheet(sheet: FieldSheet, facts: StationFacts, meter: Meter | None) -> Sheet:
    """Give the kernel's sheet; plate readings become stages by the zeros in force."""
    heading = sheet.heading
    stages = known_stages(sheet.stages, facts.plate_zeros_m)
    return Sheet(
        sheet.channels,
        meter=meter,
        stages=tuple(StageReading(seconds(at), stage_m) for at, stage_m in stages),
        started_s=seconds(heading.started_at),
        ended_s=seconds(heading.ended_at),
        wading=heading.way == Gauging.Way.WADING,
    )


def settings_of(agency: Agency, limits: WorkingRules) -> GaugingSettings:
    """Give the kernel what the agency has settled."""
    return GaugingSettings(
        method=DischargeMethod(agency.result_method),
        surface_factor=limits.surface_factor,
        systematic_percent=limits.systematic_percent,
        one_point_depth_m=limits.one_point_depth_m,
        two_point_depth_m=limits.two_point_depth_m,
        # a year of 12 months and a day, as ISO 2537 practice has it
        calibration_days=round(limits.calibration_months * 365.25 / 12) + 1,
        calibration_hours=limits.calibration_hours,
        wading_product_m2s=limits.wading_product_m2s,
    )


def stages_of(gaugings: Iterable[Gauging]) -> dict[int, float | None]:
    """Give the present mean stage of signed gaugings by their keys, in a fixed number of queries.

    The plate zeros in force at the mid-time count: a levelling adopted later moves old stages.
    """
    rows = list(gaugings)
    prefetch_related_objects(rows, "stages__plate__zeros")
    read = {row.pk: _stages_read(row) for row in rows}
    limit_m = GaugingSettings().stage_change_m
    # flows weigh the stage only where it moved; elsewhere the verticals need not be read
    moved = [row for row in rows if _spread_m(read[row.pk]) > limit_m]
    prefetch_related_objects(moved, "channels__verticals")
    flows = {row.pk: _vertical_flows(row) for row in moved}
    return {
        row.pk: _stored_stage_m(row, read[row.pk], flows.get(row.pk, ()), limit_m) for row in rows
    }


def _by_other_method(sheet: FieldSheet, facts: StationFacts, settings: GaugingSettings) -> Answer:
    stage = _plain_stage(sheet, facts, settings)
    try:
        other = other_methods.discharge(sheet)
    except BadSheet as bad:
        return Answer(sheet, bad.faults, (), stage=stage)
    return Answer(sheet, (), other.findings, other=other, stage=stage)


def _held_against(found: Answer, facts: StationFacts) -> Answer:
    """Add what the rating in force says to an answer."""
    flow_m3s, stage = found.discharge_m3s, found.stage
    if flow_m3s is None or stage is None:
        return replace(found, version=facts.version)
    rated_m3s = facts.rated_m3s(stage.stage_m)
    # (Q − Q_rating) / Q_rating · 100
    apart = 100 * (flow_m3s - rated_m3s) / rated_m3s if rated_m3s else None
    findings = list(found.findings)
    if rated_m3s is not None:
        beyond = rating_deviation(
            flow_m3s=flow_m3s,
            u95_m3s=found.u95_m3s or 0.0,
            rated_m3s=rated_m3s,
            rated_u95_m3s=rated_m3s * facts.rated_u95_percent(stage.stage_m) / 100,
        )
        findings += [beyond] if beyond else []
    return replace(
        found,
        findings=tuple(findings),
        version=facts.version,
        rated_m3s=rated_m3s,
        deviation_percent=apart,
        shift_m=facts.closing_shift_m(stage.stage_m, flow_m3s),
    )


def _plain_stage(
    sheet: FieldSheet, facts: StationFacts, settings: GaugingSettings
) -> MeanStage | None:
    """Give the mean stage without flows to weigh it by."""
    stages = known_stages(sheet.stages, facts.plate_zeros_m)
    if not stages:
        return None
    heading = sheet.heading
    return mean_stage(
        np.array([seconds(at) for at, _stage in stages], np.float64),
        np.array([stage_m for _at, stage_m in stages], np.float64),
        vertical_s=np.empty(0),
        flow_m3s=np.empty(0),
        period_s=(seconds(heading.started_at), seconds(heading.ended_at)),
        limit_m=settings.stage_change_m,
    )


def _stated_cases(result: GaugingResult) -> Iterable[Finding]:
    """Name the cases in which an agency value stands for a table of the standard."""
    for case in result.uncertainty.agency_values:
        said = sentence(STATED, case=case)
        yield Finding("agency_value", "verticals", said, None, NO_STANDARD, advice=True)


def _stages_read(gauging: Gauging) -> list[tuple[int, float]]:
    """Return the instants and stages of a gauging's readings, those whose zero is known."""
    middle = gauging.started_at + (gauging.ended_at - gauging.started_at) / 2
    return [
        (seconds(row.read_at), row.reading_m + zero)
        for row in gauging.stages.all()
        if (zero := 0.0 if row.plate is None else _zero_m(row.plate, middle)) is not None
    ]


def _spread_m(read: list[tuple[int, float]]) -> float:
    stages = [stage_m for _at, stage_m in read]
    return max(stages) - min(stages) if stages else 0.0


def _vertical_flows(gauging: Gauging) -> list[tuple[float, float]]:
    """Return the time (not a number where not noted) and flow of each vertical."""
    return [
        (np.nan if v.measured_at is None else seconds(v.measured_at), v.panel_flow_m3s)
        for channel in gauging.channels.all()
        for v in channel.verticals.all()
        if v.panel_flow_m3s is not None
    ]


def _stored_stage_m(
    gauging: Gauging,
    read: Sequence[tuple[int, float]],
    flows: Sequence[tuple[float, float]],
    limit_m: float,
) -> float | None:
    if not read:
        return None
    readings, verticals = (np.array(rows, np.float64).reshape(-1, 2).T for rows in (read, flows))
    return mean_stage(
        readings[0],
        readings[1],
        vertical_s=verticals[0],
        flow_m3s=verticals[1],
        period_s=(seconds(gauging.started_at), seconds(gauging.ended_at)),
        limit_m=limit_m,
    ).stage_m


def _zero_m(plate: StaffPlate, at: datetime) -> float | None:
    """Return a plate's zero at an instant from its rows already read."""
    standing = [row for row in plate.zeros.all() if row.stands and row.effective_from <= at]
    return max(standing, key=lambda row: row.effective_from).zero_m if standing else None
