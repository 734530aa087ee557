"""A small network for the tests of field work: an agency, a station, a meter and a rating."""

from datetime import UTC, datetime, timedelta

from network.models import Agency, Instrument, Office, Person, Station, WorkingRules
from network.numerics.gaugings.gauging_input import Bank, Channel, Point, Vertical
from network.numerics.meters.meter_rating import Piece
from network.numerics.ratings.curves import Segment
from network.queries.field_sheets import FieldSheet, Heading, StageRow
from network.services import calibrations, instruments, ratings

NOON = datetime(2024, 5, 14, 12, tzinfo=UTC)
HOUR = timedelta(hours=1)
EARLY = datetime(2020, 1, 1, tzinfo=UTC)


def person(name="ama"):
    return Person.objects.get_or_create(username=name)[0]


def station(code="A1", **changes):
    Agency.objects.get_or_create(pk=1, defaults={"name": "River office"})
    WorkingRules.objects.get_or_create(pk=1)
    office = Office.objects.get_or_create(name="North")[0]
    return Station.objects.create(
        code=code, name="Mill", river="Ald", latitude_deg=50, longitude_deg=8, office=office,
        **changes,
    )  # fmt: skip


def meter(serial="1", **changes):
    """Join body and rotor, without a calibration."""
    office = Office.objects.get_or_create(name="North")[0]
    who = {"office": office, "by": person(), "at": EARLY}
    body = instruments.add(kind=Instrument.Kind.METER_BODY, serial=f"B{serial}", **who)
    rotor = instruments.add(kind=Instrument.Kind.METER_ROTOR, serial=f"R{serial}", **who)
    return instruments.pair(body=body, rotor=rotor, by=person(), at=EARLY, **changes)


def rated_meter(serial="1", b_m=0.25, since=datetime(2024, 1, 10, tzinfo=UTC)):
    """Join a meter with v = b·n up to n = 20."""
    pair = meter(serial)
    calibrations.from_certificate(
        owner=pair,
        effective_from=since,
        pieces=[Piece(0.0, b_m, 0.0, 20.0)],
        certificate=calibrations.Certificate(
            laboratory="Tank hall", lowest_velocity_ms=0.05, highest_velocity_ms=5.0
        ),
        by=person(),
        at=since,
    )
    return pair


def rate(where, c=10.0, h0_m=0.0, b=2.0):
    """Put Q = c·(h − h0)^b in force from the first."""
    curve = ratings.draft(
        station=where,
        number="1",
        relation=ratings.Relation(segments=[Segment(h0_m, c, h0_m, b)]),
        use=ratings.Use(lowest_use_m=h0_m, highest_use_m=5.0),
        band=[(0.0, 4.0), (5.0, 4.0)],
        reason="first",
        by=person(),
        at=EARLY,
    )
    ratings.approve(curve=curve, by=person("ben"), at=EARLY)
    ratings.put_in_force(
        station=where, curve=curve, effective_from=EARLY, by=person(), at=EARLY, reason="first"
    )
    return curve


def twenty_verticals(revolutions=120.0, depth_m=1.0):
    """A rectangle of 21 m by depth_m, 20 verticals a metre apart, two points each of 60 s."""
    points = tuple(Point(f, revolutions=revolutions, seconds=60.0) for f in (0.2, 0.8))
    verticals = tuple(Vertical(float(x), depth_m, points) for x in range(1, 21))
    return Channel(Bank(0.0, depth_m), Bank(21.0, depth_m), verticals)


def sheet(where, pair=None, *, channels=None, stages=(1.5, 1.5), other=None, **heading):
    """A sheet of one hour at noon with a stage at either end."""
    times = (NOON, NOON + timedelta(hours=1))
    return FieldSheet(
        Heading(
            station=where,
            started_at=times[0],
            ended_at=times[1],
            pair=pair,
            **{"spin_test_seconds": 90.0} | heading,
        ),
        tuple(StageRow(at, stage_m) for at, stage_m in zip(times, stages, strict=False)),
        (twenty_verticals(),) if channels is None else tuple(channels),
        other,
    )
