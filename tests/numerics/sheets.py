"""Gauging sheets for the tests, built from plain columns."""

from network.numerics.gaugings.gauging_input import Bank, Channel, Meter, Point, Sheet, Vertical
from network.numerics.meters.meter_rating import Piece

# v = 0.25·n up to n = 10: easy to reckon by hand.
METER = Meter((Piece(a_ms=0.0, b_m=0.25, n_from=0.0, n_to=10.0),), spin_test_s=60.0)


def channel(distances, depths, velocities, *, banks, **bank):
    """Give a channel from columns; a velocity of None is a sounding, banks are distances."""
    verticals = tuple(
        Vertical(x, d, mean_velocity_ms=v)
        for x, d, v in zip(distances, depths, velocities, strict=True)
    )
    return Channel(Bank(banks[0], **bank), Bank(banks[1], **bank), verticals)


def counted(revolutions, seconds=60.0, fraction=0.6):
    """Give a point at which a rotor was counted."""
    return Point(fraction, revolutions=revolutions, seconds=seconds)


def plain_sheet(**changes):
    """Give a faultless sheet of three verticals; changes: field=value of the middle one."""
    middle = {"distance_m": 4.0, "depth_m": 1.0, "points": (Point(0.6, velocity_ms=0.8),)}
    middle.update(changes)
    side = {"depth_m": 0.5, "points": (Point(0.6, velocity_ms=0.4),)}
    verticals = (Vertical(2.0, **side), Vertical(**middle), Vertical(6.0, **side))
    return Sheet((Channel(Bank(0.0), Bank(8.0), verticals),))
