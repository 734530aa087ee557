"""Rows for tests of the work list: things done at a station on a day, without their acts."""

from datetime import UTC, datetime, time, timedelta

from network.models import (
    Block,
    Calibration,
    Curve,
    Gauging,
    Inspection,
    Instrument,
    LevelCheck,
    MeterPair,
    RatingPeriod,
    RecordReview,
    SafetyItem,
    Series,
    Visit,
)


def noon(day):
    return datetime.combine(day, time(12), tzinfo=UTC)


def _recorded(day, by):
    return {"recorded_at": noon(day), "recorded_by": by}


def visited(station, day, by, *, checked=True, **fields):
    check = {"state": "checked", "checked_at": noon(day), "checked_by": by} if checked else {}
    return Visit.objects.create(
        station=station, arrived_at=noon(day), departed_at=noon(day) + timedelta(hours=2),
        **check, **_recorded(day, by), **fields,
    )  # fmt: skip


def levelled(station, day, by):
    return LevelCheck.objects.create(
        station=station, levelled_at=noon(day), state="checked", checked_at=noon(day),
        checked_by=by, **_recorded(day, by),
    )  # fmt: skip


def gauged(station, day, by, *, state="checked", hours=1.0, deviation=0.0, **fields):
    signed = {"signed_at": noon(day), "signed_by": by, "discharge_m3s": 1.0}
    check = {"checked_at": noon(day), "checked_by": by}
    return Gauging.objects.create(
        station=station, started_at=noon(day), ended_at=noon(day) + timedelta(hours=hours),
        state=state, signed_stage_m=0.5, u95_percent=6.0, signed_deviation_percent=deviation,
        **(signed if state != "draft" else {}), **(check if state == "checked" else {}),
        **_recorded(day, by), **fields,
    )  # fmt: skip


def recorded(station, first, last, **fields):
    """Give a station a primary series with readings from a day to a day."""
    series = Series.objects.create(station=station, label="Recorder", is_primary=True, **fields)
    Block.objects.create(
        series=series, month=last.replace(day=1), data=b"", count=2,
        first_at=noon(first), last_at=noon(last),
    )  # fmt: skip
    return series


def reviewed(station, through, by):
    return RecordReview.objects.create(
        station=station, reviewed_through=through, **_recorded(through, by)
    )


def rated(station, day, by):
    curve = Curve.objects.create(
        station=station, number=f"{day}", lowest_use_m=0, highest_use_m=2, reason="first",
        state="approved", approved_at=noon(day), approved_by=by, **_recorded(day, by),
    )  # fmt: skip
    return RatingPeriod.objects.create(
        station=station, curve=curve, effective_from=noon(day), **_recorded(day, by)
    )


def meter(office, day=None, by=None, *, serial="1", **fields):
    """Join a body and a rotor, calibrated on a day if one is given."""
    parts = {
        kind: Instrument.objects.create(kind=kind, serial=serial, office=office, **more)
        for kind, more in (("body", fields), ("rotor", {}))
    }
    pair = MeterPair.objects.create(**parts)
    if day is not None:
        calibrated(day, by, pair=pair)
    return pair


def calibrated(day, by, **owner):
    return Calibration.objects.create(effective_from=noon(day), **owner, **_recorded(day, by))


def cableway(station, day=None, by=None, *, is_safe=True, **fields):
    item = SafetyItem.objects.create(station=station, kind="cableway", label="Main", **fields)
    if day is not None:
        inspected(item, day, by, is_safe=is_safe)
    return item


def inspected(item, day, by, *, is_safe=True):
    return Inspection.objects.create(
        item=item, inspected_on=day, is_safe=is_safe, **_recorded(day, by)
    )
