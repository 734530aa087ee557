"""Load the demo's gaugings: sheets saved, signed by their parties, checked by record keepers."""

from collections.abc import Iterator, Sequence
from datetime import datetime
from functools import partial
from typing import Any

from network.formats.demo_field_rows import Gauging as MeterPlan
from network.formats.demo_field_rows import OtherGauging as OtherPlan
from network.formats.demo_rows import Station as StationRow
from network.models import Gauging, Visit
from network.queries.field_sheets import FieldSheet, Heading, Other, StageRow
from network.services import gaugings
from network.services.demo_cast import Cast, Due
from network.services.demo_field import (
    MadeGauging,
    MadeResult,
    make_gaugings,
    make_results,
    plate_zero_m,
    stands,
)
from network.services.demo_other_methods import notes_of
from network.services.demo_visits import WRITTEN_AFTER, form_id

METHODS = {"volumetric": "volume"}
BY_ROD = {"wading", "ice"}


def gaugings_due(cast: Cast, row: StationRow) -> Iterator[Due]:
    """Yield when each gauging of a station, by meter or another method, is to be entered."""
    truth = cast.truths[row.station.code]
    for made in make_gaugings(truth, cast.scenario.instruments):
        yield made.ended, partial(_enter_made, cast, row, made)
    for result in make_results(truth):
        yield result.ended, partial(_enter_result, cast, row, result)


def _enter_made(cast: Cast, row: StationRow, made: MadeGauging) -> None:
    _enter(cast, row, made.plan, _meter_sheet(cast, row, made))


def _enter_result(cast: Cast, row: StationRow, made: MadeResult) -> None:
    notes = notes_of(cast.truths[row.station.code], made)
    _enter(cast, row, made.plan, _other_sheet(cast, row, made, notes))


def _enter(cast: Cast, row: StationRow, plan: MeterPlan | OtherPlan, sheet: FieldSheet) -> None:
    code, ended = row.station.code, sheet.heading.ended_at
    party = [cast.people[name] for name in plan.party]
    written: dict[str, Any] = {"by": party[0], "at": ended + WRITTEN_AFTER}
    gauging = gaugings.save(
        sheet=sheet,
        form_id=form_id(code, "gauging", plan.at.isoformat()),
        party=party,
        **written,
    )
    if plan.state != Gauging.State.DRAFT:
        gauging = gaugings.sign(gauging=gauging, version=gauging.version, **written)
    if plan.state == Gauging.State.CHECKED:
        gaugings.check(
            gauging=gauging, version=gauging.version, by=cast.keeper(code), at=cast.entered(ended)
        )


def _meter_sheet(cast: Cast, row: StationRow, made: MadeGauging) -> FieldSheet:
    plan = made.plan
    return FieldSheet(
        Heading(
            station=cast.stations[row.station.code],
            started_at=plan.at,
            ended_at=made.ended,
            way=plan.how,
            pair=cast.pairs[plan.meter],
            visit=_visit_at(cast, row, plan.at),
            sounding="rod" if plan.how in BY_ROD else "line",
            spin_test_seconds=made.spin_test_s,
            remarks=plan.remarks,
        ),
        stages=_stages(cast, row, made.stages_m),
        channels=(made.channel,),
    )


def _other_sheet(cast: Cast, row: StationRow, made: MadeResult, notes: Other) -> FieldSheet:
    plan = made.plan
    return FieldSheet(
        Heading(
            station=cast.stations[row.station.code],
            started_at=plan.at,
            ended_at=made.ended,
            way=plan.how or "bank",
            method=METHODS.get(plan.method, plan.method),
            instrument=cast.instruments.get(plan.instrument),
            visit=_visit_at(cast, row, plan.at),
            remarks=" ".join(filter(None, (plan.details, plan.moving_bed))),
            stated_u95_percent=plan.uncertainty_percent if plan.method == "weir" else None,
        ),
        stages=_stages(cast, row, made.stages_m),
        other=notes,
    )


def _visit_at(cast: Cast, row: StationRow, at: datetime) -> Visit | None:
    """Return the visit during which something was done, if it was one."""
    station = cast.stations[row.station.code]
    return station.visits.filter(arrived_at__lte=at, departed_at__gte=at).first()


def _stages(
    cast: Cast, row: StationRow, stages_m: Sequence[tuple[datetime, float]]
) -> tuple[StageRow, ...]:
    """Return the stages as read on the first plate that the water stands on, else above zero."""
    station = cast.stations[row.station.code]
    plates = {plate.label: plate for plate in station.plates.all()}
    rows = []
    for at, stage_m in stages_m:
        found = StageRow(at, stage_m)
        for plate in (each for each in row.plates if stands(each, at)):
            reading_m = round(stage_m - plate_zero_m(plate, at), 3)
            if plate.lowest_m <= reading_m <= plate.highest_m:
                found = StageRow(at, reading_m, plates[plate.label])
                break
        rows.append(found)
    return tuple(rows)
