"""Meter ratings come from tow runs or certificates; a changed one lists what it would change."""

import uuid
from datetime import UTC, date, datetime, timedelta

import pytest

from network.models import Calibration, MeterPair
from network.numerics.meters.meter_rating import Piece
from network.queries import calibrations as answers
from network.queries import instruments as instrument_answers
from network.queries import meter_changes
from network.services import calibrations, gaugings, instruments
from network.services.acts import Refusal
from tests import field_world as world

pytestmark = pytest.mark.django_db

SPRING = datetime(2024, 3, 1, tzinfo=UTC)
AUTUMN = datetime(2024, 9, 1, tzinfo=UTC)


def runs(a_ms=0.02, b_m=0.25, count=10, slip=0.0):
    """Tow runs of 50 s on v = a + b·n, at n = 0.5, 1.0 …; slip is added to the last speed."""
    turns = [25.0 * (k + 1) for k in range(count)]
    speeds = [a_ms + b_m * r / 50 for r in turns]
    speeds[-1] += slip
    return [
        calibrations.Run(speed_ms=v, revolutions=r, seconds=50.0)
        for v, r in zip(speeds, turns, strict=True)
    ]


def from_runs(pair, rows, **changes):
    given = {"effective_from": SPRING, "pieces": 1, "by": world.person(), "at": SPRING} | changes
    return calibrations.from_tow_runs(owner=pair, runs=rows, **given)


def test_the_fit_is_kept_with_runs_and_pieces():
    row = from_runs(world.meter(), runs())
    piece = row.pieces.get()
    # The line the runs were made from; 10 decimals are the rounding of a least-squares sum.
    assert (piece.a_ms, piece.b_m) == (pytest.approx(0.02), pytest.approx(0.25))
    assert (row.lowest_velocity_ms, row.highest_velocity_ms) == pytest.approx((0.145, 1.27))
    assert row.standard_error_ms == pytest.approx(0, abs=1e-9)
    assert row.tow_runs.count() == 10


def test_a_bad_run_is_named_and_nothing_is_kept():
    rows = [*runs()[:4], calibrations.Run(speed_ms=1.0, revolutions=0, seconds=50), *runs()[4:]]
    with pytest.raises(Refusal, match="Run 5"):
        from_runs(world.meter(), rows)
    assert not Calibration.objects.exists()


def test_a_certificate_without_a_rating_or_with_a_hole_is_refused():
    pair = world.meter()
    given = {"owner": pair, "effective_from": SPRING, "by": world.person(), "at": SPRING}
    with pytest.raises(Refusal, match="at least one piece"):
        calibrations.from_certificate(**given)
    holed = [Piece(0.01, 0.25, 0, 1), Piece(0.0, 0.26, 2, 9)]
    with pytest.raises(Refusal, match="hole"):
        calibrations.from_certificate(pieces=holed, **given)


def test_the_own_rating_goes_before_the_groups():
    pair = world.meter()
    group = calibrations_group(pair)
    pair = MeterPair.objects.get(pk=pair.pk)
    assert answers.in_force(pair, AUTUMN) == group
    assert answers.meter_then(pair.pk, AUTUMN, spin_test_s=None).meter.calibrated_singly is False
    own = from_runs(pair, runs())
    assert answers.in_force(pair, AUTUMN) == own
    calibrations.withdraw(calibration=own, by=world.person(), at=AUTUMN, reason="wrong rotor")
    assert answers.in_force(pair, AUTUMN) == group


def calibrations_group(pair):
    group = instruments.group(name="Type C", by=world.person(), at=SPRING)
    instruments.put_in_group(pair=pair, group=group, by=world.person(), at=SPRING)
    return calibrations.from_certificate(
        owner=group, effective_from=SPRING, pieces=[Piece(0.01, 0.25, 0, 12)],
        by=world.person(), at=SPRING,
    )  # fmt: skip


def test_a_drifted_rating_lists_the_gaugings_made_in_between_and_what_each_would_become():
    pair, where = world.rated_meter(), world.station()
    row = gaugings.save(
        sheet=world.sheet(where, pair), form_id=uuid.uuid4(), by=world.person(), at=world.NOON
    )
    row = gaugings.sign(gauging=row, version=1, by=world.person(), at=world.NOON)
    newer = calibrations.from_certificate(
        owner=pair, effective_from=AUTUMN, pieces=[Piece(0.0, 0.26, 0.0, 20.0)],
        by=world.person(), at=AUTUMN,
    )  # fmt: skip
    look = meter_changes.look_back(newer)
    # 0.26 / 0.25 = +4 % at every speed, beyond the agency's 2 %; so is the discharge.
    assert list(look.change.change_percent) == pytest.approx([4.0] * 5)
    assert look.is_beyond
    (touched,) = look.gaugings
    assert touched.gauging == row
    assert touched.would_become_m3s == pytest.approx(1.04 * row.discharge_m3s)


def test_due_by_months_or_by_hours_of_use():
    pair, where = world.rated_meter(since=datetime(2024, 1, 10, tzinfo=UTC)), world.station()
    rules = instrument_answers.rules()
    due = instrument_answers.pair_due(pair, world.NOON, of=rules)
    assert due.due_on == date(2025, 1, 10)
    assert not due.is_due(date(2025, 1, 9))
    assert due.is_due(date(2025, 1, 10))
    gaugings.save(
        sheet=world.sheet(where, pair), form_id=uuid.uuid4(), by=world.person(), at=world.NOON
    )
    later = world.NOON + timedelta(days=1)
    pair.body.interval_hours = 1
    used = instrument_answers.pair_due(pair, later, of=rules)
    assert used.hours_used == pytest.approx(1.0)
    assert used.is_due(later.date())
