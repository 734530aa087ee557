"""Write a field sheet into the rows of its gauging, replacing what stood there."""

from collections.abc import Callable
from typing import Any

from simple_history.utils import bulk_create_with_history

import network.models as models
from network.models import Gauging
from network.numerics.gaugings.gauging_input import Bank, Channel, Vertical
from network.queries.field_sheets import (
    Boat,
    FieldSheet,
    Fills,
    Floats,
    Other,
    Tracer,
    Weir,
    instant,
)


def write(gauging: Gauging, sheet: FieldSheet) -> None:
    """Replace the child rows of a gauging by those of a sheet, within the open act."""
    _clear(gauging)
    for row in sheet.stages:
        models.StageReading.objects.create(gauging=gauging, **vars(row))
    for position, channel in enumerate(sheet.channels, start=1):
        _write_channel(gauging, position, channel)
    if sheet.other is not None:
        WRITERS[type(sheet.other)](gauging, sheet.other)


def _clear(gauging: Gauging) -> None:
    """Delete the child rows; each leaves its last state in the history."""
    for rows in (
        gauging.channels,
        gauging.stages,
        gauging.transects,
        gauging.fills,
        models.BoatTrack.objects.filter(gauging=gauging),
        models.FloatReach.objects.filter(gauging=gauging),
        models.TracerInjection.objects.filter(gauging=gauging),
        models.WeirHead.objects.filter(gauging=gauging),
    ):
        rows.all().delete()


def _write_channel(gauging: Gauging, position: int, channel: Channel) -> None:
    bank = models.Channel.Bank
    row = models.Channel.objects.create(
        gauging=gauging,
        position=position,
        starting_bank=bank.LEFT if channel.starts_at_left_bank else bank.RIGHT,
        **_bank("start", channel.first_bank),
        **_bank("end", channel.last_bank),
    )
    rows = [_vertical(row, place, v) for place, v in enumerate(channel.verticals, start=1)]
    verticals = bulk_create_with_history(rows, models.Vertical)
    points = [
        models.VerticalPoint(vertical=written, position=position, **vars(point))
        for written, vertical in zip(verticals, channel.verticals, strict=True)
        for position, point in enumerate(vertical.points, start=1)
    ]
    bulk_create_with_history(points, models.VerticalPoint)


def _bank(end: str, bank: Bank) -> dict[str, object]:
    return {
        f"{end}_distance_m": bank.distance_m,
        f"{end}_depth_m": bank.depth_m,
        f"{end}_edge": str(bank.edge),
        f"{end}_velocity_ms": bank.velocity_ms,
    }


def _vertical(channel: models.Channel, place: int, vertical: Vertical) -> models.Vertical:
    return models.Vertical(
        channel=channel,
        position=place,
        distance_m=vertical.distance_m,
        depth_m=vertical.depth_m,
        measured_at=None if vertical.time_s is None else instant(vertical.time_s),
        angle_deg=vertical.angle_deg,
        ice_underside_m=vertical.ice_underside_m or None,
        line_angle_deg=vertical.line_angle_deg or None,
        air_line_m=vertical.air_line_m or None,
        given_velocity_ms=vertical.mean_velocity_ms,
    )


def _write_boat(gauging: Gauging, boat: Boat) -> None:
    bank = models.Channel.Bank
    models.BoatTrack.objects.create(
        gauging=gauging,
        tracks_the_bed=boat.tracks_the_bed,
        bed_velocity_ms=boat.bed_velocity_ms,
        water_velocity_ms=boat.water_velocity_ms,
    )
    for position, crossing in enumerate(boat.crossings, start=1):
        models.Transect.objects.create(
            gauging=gauging,
            position=position,
            starting_bank=bank.LEFT if crossing.from_left_bank else bank.RIGHT,
            discharge_m3s=crossing.flow_m3s,
            seconds=crossing.seconds,
            is_used=crossing.is_used,
        )


def _write_floats(gauging: Gauging, sheet: Floats) -> None:
    reach = models.FloatReach.objects.create(gauging=gauging, length_m=sheet.length_m)
    for position, row in enumerate(sheet.floats, start=1):
        models.TimedFloat.objects.create(reach=reach, position=position, **vars(row))


def _write_fills(gauging: Gauging, sheet: Fills) -> None:
    for position, row in enumerate(sheet.fills, start=1):
        models.VesselFill.objects.create(gauging=gauging, position=position, **vars(row))


def _write_tracer(gauging: Gauging, tracer: Tracer) -> None:
    noted = {name: value for name, value in vars(tracer).items() if name != "samples"}
    injection = models.TracerInjection.objects.create(gauging=gauging, **noted)
    models.TracerSample.objects.bulk_create(
        models.TracerSample(injection=injection, position=position, **vars(row))
        for position, row in enumerate(tracer.samples, start=1)
    )


def _write_weir(gauging: Gauging, weir: Weir) -> None:
    models.WeirHead.objects.create(gauging=gauging, **vars(weir))


WRITERS: dict[type, Callable[[Gauging, Any], None]] = {
    Boat: _write_boat,
    Floats: _write_floats,
    Fills: _write_fills,
    Tracer: _write_tracer,
    Weir: _write_weir,
}
assert set(WRITERS) == set(Other.__args__)
