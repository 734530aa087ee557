"""Where instruments are, what they measured, and when they are to be calibrated again."""

from collections.abc import Iterator
from dataclasses import dataclass
from datetime import date, datetime

from django.db.models import Q, QuerySet

from network.models import (
    Calibration,
    Deployment,
    Gauging,
    Instrument,
    KindInterval,
    MeterPair,
    Visit,
    WorkingRules,
)
from network.numerics.due_dates import months_after
from network.queries import calibrations, clock
from network.queries.working_rules import rules

METER_KINDS = {Instrument.Kind.METER_BODY, Instrument.Kind.METER_ROTOR}


@dataclass(frozen=True)
class CalibrationDue:
    """When a meter or an instrument is to be calibrated, and by which rule.

    last: the calibration that counts, None where there is none; due_on: by months, None where no
    interval is set; hours_left None where no limit of hours is set.
    """

    last: Calibration | None
    due_on: date | None
    months: int | None
    hours_used: float
    hours_limit: int | None

    def is_due(self, on: date) -> bool:
        """Tell whether it is due on a day: never calibrated, or by months or hours."""
        if self.last is None:
            return self.months is not None or self.hours_limit is not None
        by_hours = self.hours_limit is not None and self.hours_used >= self.hours_limit
        return by_hours or (self.due_on is not None and self.due_on <= on)


def pair_due(pair: MeterPair, at: datetime, *, of: WorkingRules) -> CalibrationDue:
    """Tell when a current meter is due: its own intervals, its kind's or the agency's."""
    last = calibrations.in_force(pair, at)
    used = calibrations.hours_of_use(pair, last.effective_from, at) if last else 0.0
    months, hours = _intervals(pair.body)
    return _due(
        last,
        months=months or of.calibration_months,
        hours_used=used,
        hours_limit=hours or of.calibration_hours,
    )


def instrument_due(instrument: Instrument, at: datetime) -> CalibrationDue:
    """Tell when an instrument other than a meter is due, by its own interval or its kind's."""
    rows = calibrations.that_count().filter(instrument=instrument, effective_from__lte=at)
    months, _hours = _intervals(instrument)
    return _due(
        rows.order_by("effective_from").last(), months=months, hours_used=0.0, hours_limit=None
    )


def standing_place(instrument: Instrument, at: datetime) -> Deployment | None:
    """Return where a recorder stands at an instant, None where it stands nowhere."""
    rows = instrument.deployments.filter(installed_at__lte=at)
    rows = rows.filter(Q(removed_at__isnull=True) | Q(removed_at__gt=at))
    return rows.select_related("series__station").first()


def pairs_of(instrument: Instrument) -> QuerySet[MeterPair]:
    """Return the meters that an instrument is the body or the rotor of."""
    rows = MeterPair.objects.filter(Q(body=instrument) | Q(rotor=instrument))
    return rows.select_related("body", "rotor", "group")


def gaugings_with(instrument: Instrument) -> QuerySet[Gauging]:
    """Return the gaugings an instrument took part in, the latest first."""
    used = Q(instrument=instrument) | Q(pair__body=instrument) | Q(pair__rotor=instrument)
    return Gauging.objects.filter(used).select_related("station").order_by("-started_at")


def visits_with(instrument: Instrument) -> QuerySet[Visit]:
    """Return the visits on which an instrument was taken along, the latest first."""
    return instrument.visits.select_related("station").order_by("-arrived_at")


def calibrations_of(instrument: Instrument) -> QuerySet[Calibration]:
    """Return all calibrations that concern an instrument, withdrawn ones too, latest first."""
    pairs = list(pairs_of(instrument))
    groups = [pair.group_id for pair in pairs if pair.group_id]
    rows = Calibration.objects.filter(
        Q(instrument=instrument) | Q(pair__in=pairs) | Q(group__in=groups)
    )
    return rows.select_related("pair__body", "pair__rotor", "group", "instrument").order_by(
        "-effective_from"
    )


def meters_due(at: datetime) -> Iterator[tuple[MeterPair, CalibrationDue]]:
    """Yield the current meters in service that are due for calibration."""
    of, today = rules(), clock.record_day(at, of=clock.agency())
    in_use = [Instrument.Status.IN_SERVICE, Instrument.Status.SPARE]
    pairs = MeterPair.objects.filter(body__status__in=in_use, rotor__status__in=in_use)
    for pair in pairs.select_related("body__office", "rotor", "group"):
        due = pair_due(pair, at, of=of)
        if due.is_due(today):
            yield pair, due


def _intervals(instrument: Instrument) -> tuple[int | None, int | None]:
    """Return the months and hours between calibrations, each its own or else its kind's."""
    of_kind = KindInterval.objects.filter(kind=instrument.kind).first() or KindInterval()
    return (
        instrument.interval_months or of_kind.months,
        instrument.interval_hours or of_kind.hours,
    )


def _due(
    last: Calibration | None, *, months: int | None, hours_used: float, hours_limit: int | None
) -> CalibrationDue:
    own = clock.agency()
    since = clock.record_day(last.effective_from, of=own) if last else None
    due_on = months_after(since, months) if since and months else None
    return CalibrationDue(last, due_on, months, hours_used, hours_limit)
