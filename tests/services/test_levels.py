"""A level check from the book to the zeros it sets: saved, reduced, checked, adopted."""

from datetime import UTC, datetime, timedelta
from uuid import uuid4

import pytest

from network.models import LevelCheck, Sight
from network.queries import adoption
from network.queries import levels as answers
from network.services import benchmarks, gauges, levels, trial
from network.services.acts import Overtaken, Refusal
from tests import field_world
from tests import gauge_world as world
from tests.gauge_world import LATER, book, plate, sight, signed

pytestmark = pytest.mark.django_db
LIFTED = datetime(2024, 1, 30, 5, tzinfo=UTC)


@pytest.fixture
def where():
    return world.gauged(field_world.station())


def test_a_book_that_closes_gives_every_level_worked_by_hand(where):
    reduction = answers.reduction_of(world.saved_levels(where))
    found = [line.reduced.level_m for line in reduction.lines]
    assert found == pytest.approx(world.LEVELS_BY_HAND, abs=1e-9)
    assert reduction.book.sum_difference_m == pytest.approx(-0.001)
    assert reduction.book.misclosure_mm == pytest.approx(-1.0)
    assert reduction.book.limit_mm == pytest.approx(0.9 * 2**0.5)
    assert reduction.book.sums_agree
    assert reduction.refusal == ""


def test_errors_below_the_tolerance_are_none(where):
    p1, p2 = answers.reduction_of(world.saved_levels(where)).plates
    assert (p1.found_m, p1.error_mm) == (pytest.approx(-0.001), 0)
    assert (p2.found_m, p2.error_mm) == (pytest.approx(1.0205), pytest.approx(20.5))
    assert p2.spread_mm == pytest.approx(0.5)


def test_the_water_sighted_has_a_stage(where):
    # 98.720 + 0.00075 − 98.000
    stages = answers.reduction_of(world.saved_levels(where)).water_stages_m
    assert stages == pytest.approx([0.72075])


def test_a_book_that_does_not_close_is_refused_with_the_figure(where):
    check = world.saved_levels(where, sights=book(where, last_foresight_m=1.296))
    reduction = answers.reduction_of(check)
    assert reduction.book.misclosure_mm == pytest.approx(4.0)
    assert reduction.plates == []
    with pytest.raises(Refusal, match=r"\+4\.0 mm, allowed 1\.3 mm with 2 set-ups"):
        levels.check_level_check(level_check=check, by=field_world.person(), at=LATER)
    check.refresh_from_db()
    assert check.state == LevelCheck.State.DRAFT


def test_half_a_book_is_saved_and_says_where_it_stops(where):
    check = world.saved_levels(where, sights=book(where)[:3])
    reduction = answers.reduction_of(check)
    assert [line.reduced.level_m for line in reduction.lines][-1] == pytest.approx(100.52)
    assert "not closed" in reduction.refusal
    with pytest.raises(Refusal) as refused:
        levels.check_level_check(level_check=check, by=field_world.person(), at=LATER)
    assert refused.value.field == "sights-2-foresight_m"


def test_a_plate_is_sighted_at_one_graduation_that_is_given(where):
    rows = list(book(where))
    rows[5] = sight(where, "P1 0.90", i=2.401)
    assert (
        "Row 6 (P1): sight the same graduation"
        in answers.reduce(world.level_sheet(where, sights=tuple(rows))).refusal
    )


def test_a_level_with_too_much_collimation_is_a_finding(where):
    # Near A the far staff reads 1.404 for 1.400: 4 mm in 40 m.
    peg = world.PegRow(distance_m=40, middle_a_m=1.4, middle_b_m=1.3, near_a_m=1.5, near_b_m=1.404)
    said = answers.reduce(world.level_sheet(where, peg=peg)).findings
    assert any("+0.100 mm in a metre, allowed 0.050" in sentence for sentence in said)
    assert answers.reduce(world.level_sheet(where)).findings == []


def test_the_same_form_sent_twice_is_one_check_and_the_lines_of_the_last(where):
    form_id, by = uuid4(), field_world.person()
    sheet = world.level_sheet(where, sights=book(where)[:3])
    levels.save_level_check(form_id=form_id, sheet=sheet, by=by, at=LATER)
    levels.save_level_check(form_id=form_id, sheet=world.level_sheet(where), by=by, at=LATER)
    check = LevelCheck.objects.get()
    assert [row.position for row in check.sights.all()] == [1, 2, 3, 4, 5, 6, 7, 8]
    assert check.sights.first().history.count() == 1


def test_a_line_taken_out_moves_the_others_up(where):
    check = world.saved_levels(where)
    rows = book(where)
    levels.save_level_check(
        form_id=check.form_id,
        sheet=world.level_sheet(where, sights=rows[:4] + rows[5:]),
        version=1,
        by=field_world.person(),
        at=LATER,
    )
    assert list(check.sights.values_list("point", flat=True)) == [
        row.point for row in rows[:4] + rows[5:]
    ]
    assert Sight.objects.count() == 7


def test_an_older_form_is_told_that_someone_else_saved(where):
    check = world.saved_levels(where)
    again = {"form_id": check.form_id, "sheet": world.level_sheet(where), "at": LATER}
    levels.save_level_check(**again, version=1, by=field_world.person("ben"))
    with pytest.raises(Overtaken):
        levels.save_level_check(**again, version=1, by=field_world.person())


def test_a_date_ahead_of_the_clock_is_refused_at_its_field(where):
    with pytest.raises(Refusal) as refused:
        world.saved_levels(where, levelled_at=LATER + timedelta(hours=2))
    assert refused.value.field == "levelled_at"


def test_a_checked_book_is_changed_only_once_reopened(where):
    check = world.checked_levels(where)
    with pytest.raises(Refusal, match="reopen"):
        levels.save_level_check(
            form_id=check.form_id,
            sheet=world.level_sheet(where),
            version=check.version,
            by=field_world.person(),
            at=LATER,
        )
    opened = levels.reopen_level_check(level_check=check, **signed())
    assert (opened.state, opened.checked_by) == ("draft", None)


def adopt(check, **changes):
    return levels.adopt(**{"level_check": check, "effective_from": LIFTED} | signed() | changes)


def test_adopting_sets_the_zero_of_the_moved_plate_from_the_chosen_instant(where):
    check = world.checked_levels(where)
    (zero,) = adopt(check)
    assert (zero.plate.label, zero.zero_m, zero.level_check) == ("P2", 1.0205, check)
    check.refresh_from_db()
    assert check.adopted_at == LATER
    with pytest.raises(Refusal, match="withdraw them first"):
        levels.reopen_level_check(level_check=check, **signed())


def test_a_plate_within_the_tolerance_is_adopted_only_where_asked(where):
    zeros = adopt(world.checked_levels(where), plates=[plate(where, "P1")])
    assert [(zero.plate.label, zero.zero_m) for zero in zeros] == [("P1", -0.001)]


def test_a_draft_is_not_adopted(where):
    with pytest.raises(Refusal, match="Check the level book first"):
        adopt(world.saved_levels(where))


def test_a_zero_of_its_own_in_between_is_in_the_way(where):
    gauges.set_plate_zero(
        plate=plate(where, "P2"), zero_m=1.01, effective_from=LIFTED + timedelta(days=9), **signed()
    )
    with pytest.raises(Refusal, match="zero of its own after that instant"):
        adopt(world.checked_levels(where))


def test_benchmarks_are_adopted_where_asked(where):
    benchmarks.add_benchmark(
        station=where, label="B2", elevation_m=101.0, effective_from=world.SINCE, **signed()
    )
    mark = where.benchmarks.get(label="B2")
    row = world.SightRow(point="benchmark", benchmark=mark, intermediate_m=0.49)
    rows = (book(where)[0], row, *book(where)[1:])
    adopt(world.checked_levels(where, sights=rows), benchmarks=[mark])
    # 101.500 − 0.490 + 0.00025
    assert mark.elevations.standing().last().elevation_m == pytest.approx(101.0102)


def test_before_and_after_shows_stages_and_the_corrections_that_follow(where):
    """Two checks a month apart, the recorder right on the plate as it was read."""
    world.read_twice(where, LIFTED)
    check = world.checked_levels(where)
    found = trial.before_and_after(
        where, lambda: adopt(check), look=lambda: adoption.look(where, since=LIFTED)
    )
    changes = adoption.changes(found.more)
    assert [(c.before_m, c.after_m) for c in changes.visits] == [(1.5, 1.5205)] * 2
    (correction,) = changes.corrections
    assert correction.before is None
    assert correction.after.start_offset_m == pytest.approx(0.0205)
    assert not plate(where, "P2").zeros.filter(effective_from=LIFTED).exists()
