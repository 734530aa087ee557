"""Load the demo's visits and level checks as their parties and record keepers would."""

from datetime import timedelta
from uuid import NAMESPACE_URL, UUID, uuid5

from network.formats.demo_field_rows import LevelCheck as LevelRow
from network.formats.demo_rows import Station as StationRow
from network.models import Sight, StaffPlate, Visit, VisitReading
from network.queries.level_sheet import LevelSheet, PegRow, SightRow
from network.queries.visit_sheet import CheckRow, ReadingRow, VisitSheet, WorkRow
from network.services import levels, visits
from network.services.demo_cast import Cast
from network.services.demo_field import MadeVisit, make_visits

WRITTEN_AFTER = timedelta(hours=5)  # on the evening of the day


def form_id(*names: object) -> UUID:
    """Return the same form's name at every load."""
    return uuid5(NAMESPACE_URL, " ".join(map(str, names)))


def load_visits(cast: Cast, row: StationRow) -> None:
    """Write down a station's visits; their drafts stay drafts."""
    code = row.station.code
    for made in make_visits(cast.truths[code]):
        visit = visits.save_visit(
            form_id=form_id(code, "visit", made.arrived.isoformat()),
            sheet=_visit_sheet(cast, row, made),
            by=cast.people[made.party[0]],
            at=made.departed + WRITTEN_AFTER,
        )
        if made.story.state == Visit.State.CHECKED:
            visits.check_visit(visit=visit, by=cast.keeper(code), at=cast.entered(made.departed))


def _visit_sheet(cast: Cast, row: StationRow, made: MadeVisit) -> VisitSheet:
    station, story = cast.stations[row.station.code], made.story
    plates = {plate.label: plate for plate in station.plates.all()}
    gauged = [*(g.at for g in row.gaugings), *(g.at for g in row.other_gaugings)]
    return VisitSheet(
        station=station,
        arrived_at=made.arrived,
        departed_at=made.departed,
        party=tuple(cast.people[name] for name in made.party),
        is_for_gauging=any(made.arrived <= at <= made.departed for at in gauged),
        is_for_levels="level check" in story.purposes,
        is_for_repair="recorder fault" in story.purposes,
        weather=story.weather,
        river=story.river_state,
        control_condition=story.control,
        work_done=story.work_done,
        readings=_readings(made, plates),
        recorder_checks=(_check(cast, row, made),),
        work_left=(WorkRow(text=story.work_left),) if story.work_left else (),
    )


def _readings(made: MadeVisit, plates: dict[str, StaffPlate]) -> tuple[ReadingRow, ...]:
    """Return what was read; where the plates were frozen or dry, that of the usual one."""
    if made.story.frozen or made.story.dry:
        seen = VisitReading.Observation.FROZEN if made.story.frozen else "dry"
        usual = next(plate for plate in plates.values() if plate.is_usual)
        return (ReadingRow(read_at=made.check.at, plate=usual, observation=str(seen)),)
    return tuple(
        ReadingRow(
            read_at=reading.at,
            plate=plates[reading.plate],
            reading_m=reading.reading_m,
            wave_m=reading.wave_m,
        )
        for reading in made.readings
    )


def _check(cast: Cast, row: StationRow, made: MadeVisit) -> CheckRow:
    check = made.check
    return CheckRow(
        series=cast.series[row.station.code, check.series],
        checked_at=check.at,
        found_m=check.found_m,
        left_m=check.left_m,
        clock_error_s=check.clock_error_s,
        battery_v=check.battery_v,
        was_downloaded=True,
    )


def load_level_checks(cast: Cast, row: StationRow) -> None:
    """Write down a station's level books, check them, and adopt the zeros where the story does."""
    for told in cast.scenario.level_checks:
        if told.station == row.station.code:
            _load_level_check(cast, told)


def _load_level_check(cast: Cast, told: LevelRow) -> None:
    entered = cast.entered(told.at)
    booked = levels.save_level_check(
        form_id=form_id(told.label),
        sheet=_level_sheet(cast, told),
        by=cast.people[told.party[0]],
        at=told.at + WRITTEN_AFTER,
    )
    checked = levels.check_level_check(level_check=booked, by=cast.keeper(told.station), at=entered)
    if told.adopted_from:
        levels.adopt(
            level_check=checked,
            effective_from=told.adopted_from,
            by=cast.people[told.adopted_by],
            at=entered,
            reason=told.remarks,
        )


def _level_sheet(cast: Cast, told: LevelRow) -> LevelSheet:
    station = cast.stations[told.station]
    plates = {plate.label: plate for plate in station.plates.all()}
    marks = {mark.label: mark for mark in station.benchmarks.all()}
    kinds = {**dict.fromkeys(plates, Sight.Point.PLATE), **dict.fromkeys(marks, "benchmark")}
    peg = told.peg_test
    return LevelSheet(
        station=station,
        levelled_at=told.at,
        party=tuple(cast.people[name] for name in told.party),
        instrument=cast.instruments[told.instrument],
        remarks=told.remarks,
        peg=PegRow(
            distance_m=peg.first[2] + peg.first[3],
            middle_a_m=peg.first[0],
            middle_b_m=peg.first[1],
            near_a_m=peg.second[0],
            near_b_m=peg.second[1],
        ),
        sights=tuple(
            SightRow(
                point=str(kinds.get(line.point, Sight.Point.TURNING)),
                benchmark=marks.get(line.point),
                plate=plates.get(line.point),
                graduation_m=line.graduation_m,
                backsight_m=line.bs,
                intermediate_m=line.i,
                foresight_m=line.fs,
                remark=line.remark,
            )
            for line in told.lines
        ),
    )
