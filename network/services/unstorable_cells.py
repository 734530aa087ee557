"""The cells of a sheet that no row can hold, so that even a draft of it is refused by field."""

from collections.abc import Iterator

from network.numerics.gaugings.gauging_columns import lay_out
from network.numerics.gaugings.gauging_faults import Fault, find_faults
from network.numerics.gaugings.gauging_input import GaugingSettings, Meter, Point, Sheet, Vertical
from network.numerics.meters.meter_rating import Piece
from network.numerics.sentences import gettext_noop, sentence
from network.queries.field_sheets import Boat, FieldSheet, Fills, Floats, Other, Tracer, Weir

SETTINGS = GaugingSettings()
ANY_METER = Meter(pieces=(Piece(0.0, 1.0, 0.0, 1.0),))  # which meter it was is no matter here
MISSING = gettext_noop("Row {row}: this value is missing.")
ABOVE_ZERO = gettext_noop("Row {row}: this value must be above 0.")


def unstorable(sheet: FieldSheet) -> tuple[Fault, ...]:
    """Find the cells of a sheet that cannot be stored, with the kernel's own sentences."""
    return (*_of_channels(sheet), *_of_other(sheet.other))


def _of_channels(sheet: FieldSheet) -> Iterator[Fault]:
    kernel = Sheet(sheet.channels, meter=ANY_METER)
    for fault in find_faults(kernel, lay_out(kernel, SETTINGS)):
        if fault.channel is None:
            continue
        channel = sheet.channels[fault.channel]
        if fault.vertical is None:
            bank = getattr(channel, fault.field.partition(".")[0], None)
            if bank is not None and bank.distance_m is None:
                yield fault
        elif _spoils(channel.verticals[fault.vertical], fault):
            yield fault


def _spoils(vertical: Vertical, fault: Fault) -> bool:
    """Tell whether the fault speaks of a cell that the rows cannot hold."""
    if fault.field == "distance_m":
        return vertical.distance_m is None
    if fault.field == "depth_m":
        return vertical.depth_m is None or vertical.depth_m < 0
    return fault.point is not None and not _holds(vertical.points[fault.point])


def _holds(point: Point) -> bool:
    if point.fraction is None or not 0 <= point.fraction <= 1:
        return False
    if point.velocity_ms is not None:
        return point.revolutions is None and point.seconds is None
    counted = point.revolutions is not None and point.revolutions >= 0
    return counted and point.seconds is not None and point.seconds > 0


def _of_other(other: Other | None) -> Iterator[Fault]:
    if isinstance(other, Boat):
        yield from _rows(other.crossings, missing=("flow_m3s",), above_zero=("seconds",))
    elif isinstance(other, Floats):
        if other.length_m is None or other.length_m <= 0:
            text = gettext_noop("The length of the reach must be more than 0 m.")
            yield Fault("length_m", sentence(text))
        yield from _rows(other.floats, above_zero=("area_m2", "seconds"))
    elif isinstance(other, Fills):
        yield from _rows(other.fills, above_zero=("volume_m3", "seconds"))
    elif isinstance(other, Tracer):
        yield from _rows(other.samples, missing=("concentration_kgm3",))
    elif isinstance(other, Weir):
        sizes = ("head_m", "crest_height_m", "channel_width_m")
        yield from (
            Fault(name, sentence(gettext_noop("This size of the weir is missing.")))
            for name in sizes
            if getattr(other, name) is None
        )


def _rows(
    rows: tuple[object, ...],
    *,
    missing: tuple[str, ...] = (),
    above_zero: tuple[str, ...] = (),
) -> Iterator[Fault]:
    for place, row in enumerate(rows):
        for name in (*missing, *above_zero):
            value = getattr(row, name)
            if value is None:
                yield Fault(name, sentence(MISSING, row=place + 1), row=place)
            elif name in above_zero and value <= 0:
                yield Fault(name, sentence(ABOVE_ZERO, row=place + 1), row=place)
