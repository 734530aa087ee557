"""Load the demo's safety items with inspections, its rounds, postponements and reviews."""

from datetime import date, datetime, timedelta

from django.utils.translation import gettext as _

from network.formats.demo_field_rows import Postponement as PostponementRow
from network.formats.demo_field_rows import Round as RoundRow
from network.formats.demo_field_rows import SafetyItem as SafetyRow
from network.formats.demo_rows import Station as StationRow
from network.models import Round, SafetyItem, Stop, StopTask
from network.queries import clock, station_years
from network.queries.work_due.items import Kind
from network.services import plans, registry, reviews
from network.services.demo_cast import OFFICE_OPENS, Cast

KINDS = {"stilling well": "well"}
KINDS_OF_WORK = {"gauging wanted": Kind.GAUGING, "level check": Kind.LEVELS}
PLANNED_BEFORE = timedelta(days=7)
PUT_OFF_BEFORE = timedelta(days=60)


def load_plans(cast: Cast) -> None:
    """Enter what the plans say of the stations that are loaded."""
    told_plans = cast.scenario.plans
    for item in told_plans.safety_items:
        if item.station in cast.stations:
            _load_safety_item(cast, item)
    for told in told_plans.rounds:
        _load_round(cast, told)
    for put_off in told_plans.postponements:
        if put_off.station in cast.stations:
            _load_postponement(cast, put_off)


def load_review(cast: Cast, row: StationRow) -> None:
    """Say that a station's record is reviewed, but for its last water year."""
    calendar = station_years.calendar()
    year = calendar.year_of(cast.scenario.basin.last_day)
    code = row.station.code
    reviews.review_record(
        station=cast.stations[code],
        reviewed_through=calendar.last_day(year - 1),
        by=cast.keeper(code),
        at=cast.present,
    )


def _morning(day: date) -> datetime:
    return clock.day_start(day, of=clock.agency()) + OFFICE_OPENS


def _load_safety_item(cast: Cast, told: SafetyRow) -> None:
    item = SafetyItem(
        station=cast.stations[told.station],
        kind=KINDS.get(told.kind, told.kind),
        label=told.label,
        interval_months=told.interval_months,
    )
    registry.keep(
        item, save=item.save, verb=_("added a safety item"), by=cast.manager, at=cast.opening
    )
    for seen in told.inspections:
        plans.record_inspection(
            item=item,
            inspected_on=seen.on,
            is_safe=seen.outcome == "passed",
            remarks=seen.remarks,
            by=cast.people[seen.by],
            at=_morning(seen.on),
        )


def _load_round(cast: Cast, told: RoundRow) -> None:
    plan = Round(
        name=told.name,
        office=cast.offices[told.office],
        first_day=told.start,
        last_day=told.end,
        vehicle=told.vehicle,
        remarks=told.left_out,
    )

    def save() -> None:
        plan.save()
        plan.party.set(cast.people[name] for name in told.party)
        plan.meters.set(cast.pairs[label] for label in told.meters)
        for position, stop in enumerate(told.stops, start=1):
            if stop.station in cast.stations:
                row = Stop.objects.create(
                    round=plan, position=position, station=cast.stations[stop.station]
                )
                for task in stop.tasks:
                    StopTask.objects.create(stop=row, text=task)

    planned = min(_morning(told.start - PLANNED_BEFORE), cast.present)
    registry.keep(plan, save=save, verb=_("planned a round"), by=cast.manager, at=planned)


def _load_postponement(cast: Cast, told: PostponementRow) -> None:
    station = cast.stations[told.station]
    plans.postpone(
        kind=KINDS_OF_WORK[told.what],
        subject=f"station-{station.pk}",
        station=station,
        until=told.until,
        reason=told.reason,
        by=cast.people[told.by],
        at=min(_morning(told.until) - PUT_OFF_BEFORE, cast.present),
    )
