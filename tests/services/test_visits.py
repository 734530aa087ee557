"""Visits: saved once and whole, refused at the field, checked, and what they propose."""

from datetime import timedelta
from uuid import uuid4

import pytest

from network.models import Correction, RecorderCheck, Visit, VisitReading, WorkLeft
from network.queries import recorder_checks as answers
from network.queries import visits as visit_answers
from network.queries.visit_sheet import CheckRow, ReadingRow, WorkRow, across_midnight, sheet_of
from network.services import corrections, visits
from network.services.acts import Overtaken, Refusal
from network.services.recorder_checks import propose_from_checks
from tests import field_world
from tests import gauge_world as world
from tests.gauge_world import LATER, LEVELLED, plate, signed

pytestmark = pytest.mark.django_db
MINUTE = timedelta(minutes=1)


@pytest.fixture
def where():
    return world.gauged(field_world.station())


def save(where, form_id=None, by="ama", version=None, work_done=(), **changes):
    return visits.save_visit(
        form_id=form_id or uuid4(),
        sheet=world.visit_sheet(where, **changes),
        by=field_world.person(by),
        at=LATER,
        version=version,
        work_done=work_done,
    )


def read(where, label="P1", reading_m=0.5, minutes=5, **changes):
    at = LEVELLED + minutes * MINUTE
    return ReadingRow(
        **{"read_at": at, "plate": plate(where, label), "reading_m": reading_m} | changes
    )


def fields(where, at=LATER, **changes):
    found = visit_answers.findings(world.visit_sheet(where, **changes), at=at)
    return {finding.field: finding.sentence for finding in found}


def test_a_visit_comes_back_as_it_was_written(where):
    sheet = world.visit_sheet(
        where,
        departed_at=LEVELLED + 40 * MINUTE,
        party=(field_world.person(),),
        weather="dry",
        readings=(read(where), read(where, reading_m=None, observation="dry", minutes=9)),
        recorder_checks=(CheckRow(series=where.series.get(), checked_at=LEVELLED, found_m=0.5),),
        work_left=(WorkRow(text="paint the plate"),),
    )
    visit = visits.save_visit(form_id=uuid4(), sheet=sheet, by=field_world.person(), at=LATER)
    stored = sheet_of(visit)
    assert (stored.weather, stored.party, stored.departed_at) == (
        "dry", sheet.party, sheet.departed_at,
    )  # fmt: skip
    assert [row.observation for row in stored.readings] == ["read", "dry"]
    assert [row.text for row in stored.work_left] == ["paint the plate"]


def test_the_same_form_sent_twice_is_one_visit(where):
    form_id = uuid4()
    for _tap in range(2):
        save(where, form_id=form_id, readings=(read(where),))
    assert (Visit.objects.count(), VisitReading.objects.count()) == (1, 1)


def test_a_form_sent_again_after_someone_changed_the_visit_is_told(where):
    form_id = uuid4()
    save(where, form_id=form_id)
    save(where, form_id=form_id, version=1, by="ben", weather="rain")
    with pytest.raises(Overtaken):
        save(where, form_id=form_id)


def test_rows_are_changed_added_and_taken_out_by_their_keys(where):
    visit = save(where, readings=(read(where), read(where, reading_m=0.6, minutes=8)))
    first, second = sheet_of(visit).readings
    changed = ReadingRow(**{**vars(second), "reading_m": 0.61})
    save(where, form_id=visit.form_id, version=1, readings=(changed, read(where, "P2", 0.1)))
    kept = VisitReading.objects.get(pk=second.key)
    assert (kept.reading_m, kept.history.count()) == (0.61, 2)
    assert not VisitReading.objects.filter(pk=first.key).exists()
    assert visit.readings.count() == 2


@pytest.mark.parametrize(
    ("changes", "field"),
    [
        ({"arrived_at": LATER + timedelta(days=1)}, "arrived_at"),
        ({"departed_at": LEVELLED - MINUTE}, "departed_at"),
        ({"departed_at": LATER + timedelta(hours=3)}, "departed_at"),
    ],
)
def test_times_that_cannot_be_are_refused_at_their_field(where, changes, field):
    with pytest.raises(Refusal) as refused:
        save(where, **changes)
    assert refused.value.field == field
    assert not Visit.objects.exists()


def test_a_reading_ahead_of_the_clock_or_without_a_value_is_refused_at_its_row(where):
    ahead = ReadingRow(read_at=LATER + timedelta(days=1), plate=plate(where, "P1"), reading_m=1)
    with pytest.raises(Refusal) as refused:
        save(where, readings=(read(where), ahead))
    assert refused.value.field == "readings-1-read_at"
    with pytest.raises(Refusal, match="A reading has a value") as refused:
        save(where, readings=(read(where), read(where, reading_m=None)))
    assert refused.value.field == "readings-1"
    assert not Visit.objects.exists()


def test_a_time_after_midnight_means_the_next_day_within_half_a_day():
    arrived = LEVELLED.replace(hour=23, minute=10)
    typed = LEVELLED.replace(hour=0, minute=20)
    assert across_midnight(typed, arrived_at=arrived) == typed + timedelta(days=1)
    early = LEVELLED.replace(hour=8)
    assert across_midnight(early, arrived_at=LEVELLED) == early


def test_findings_name_the_field(where):
    assert (
        "above plate P1"
        in fields(where, readings=(read(where, reading_m=1.3),))["readings-0-reading_m"]
    )
    below = fields(where, readings=(read(where, reading_m=-0.1),))["readings-0-reading_m"]
    assert "negative" in below
    apart = fields(where, readings=(read(where, reading_m=1.1), read(where, "P2", 0.15)))
    assert "0.050 m apart" in apart["readings-1-reading_m"]
    assert "future" in fields(where, at=LEVELLED - MINUTE)["arrived_at"]
    assert "before it arrived" in fields(where, departed_at=LEVELLED - MINUTE)["departed_at"]
    assert "20 hours" in fields(where, departed_at=LEVELLED + timedelta(hours=20))["departed_at"]
    outside = fields(where, readings=(read(where, minutes=-90),))
    assert "outside the visit" in outside["readings-0-read_at"]


def test_plates_that_agree_and_a_dry_plate_are_no_findings(where):
    rows = (
        read(where, reading_m=1.1),
        read(where, "P2", 0.105),
        read(where, reading_m=None, observation="dry"),
    )
    assert fields(where, readings=rows) == {}


def test_a_visit_across_midnight_is_no_finding(where):
    arrived = LEVELLED.replace(hour=23, minute=30)
    row = read(where, read_at=arrived + timedelta(hours=1))
    left = arrived + timedelta(hours=2)
    assert fields(where, arrived_at=arrived, departed_at=left, readings=(row,)) == {}


def test_a_new_visit_starts_with_what_is_usual(where):
    sheet = visit_answers.start_sheet(where, by=field_world.person(), at=LATER)
    assert [row.plate.label for row in sheet.readings] == ["P1"]
    assert [row.series.label for row in sheet.recorder_checks] == ["float"]
    assert sheet.party == (field_world.person(),)


def test_work_left_is_listed_until_a_later_visit_does_it(where):
    save(where, work_left=(WorkRow(text="cut the willow"),))
    (work,) = visit_answers.work_left(where)
    save(where, arrived_at=LEVELLED + timedelta(days=1), work_done=(work,))
    assert visit_answers.work_left(where) == []
    with pytest.raises(Refusal, match="already done"):
        visits.finish_work(work=WorkLeft.objects.get(), by=field_world.person(), at=LATER)


def test_a_checked_visit_is_reopened_only_with_a_reason(where):
    visit = save(where, departed_at=LEVELLED + MINUTE)
    checked = visits.check_visit(visit=visit, by=field_world.person("ben"), at=LATER)
    with pytest.raises(Refusal, match="reopen"):
        save(where, form_id=visit.form_id, version=checked.version)
    with pytest.raises(Refusal) as refused:
        visits.reopen_visit(visit=visit, by=field_world.person(), at=LATER, reason=" ")
    assert refused.value.field == "reason"
    assert visits.reopen_visit(visit=visit, **signed()).state == "draft"


def test_a_visit_is_checked_once_the_departure_is_known(where):
    with pytest.raises(Refusal) as refused:
        visits.check_visit(visit=save(where), by=field_world.person("ben"), at=LATER)
    assert refused.value.field == "departed_at"


def two_checks(where, **of_staff):
    """Left 0.0 m off on day 0, found 0.020 m too high on day 10 beside P1."""
    series = where.series.get()
    for days, found_m in ((0, 0.5), (10, 0.52)):
        at = LEVELLED + timedelta(days=days)
        check = CheckRow(series=series, checked_at=at, found_m=found_m, **of_staff)
        save(where, arrived_at=at, readings=(read(where, read_at=at),), recorder_checks=(check,))
    return series


def test_recorder_checks_propose_and_nothing_is_applied_until_accepted(where):
    series = two_checks(where)
    where.refresh_from_db()
    version = where.record_version
    (row,) = propose_from_checks(series=series, by=field_world.person(), at=LATER)
    assert (row.state, row.start_offset_m) == (Correction.State.PROPOSED, 0)
    assert row.end_offset_m == pytest.approx(-0.02)
    assert row.recorder_check == RecorderCheck.objects.last()
    where.refresh_from_db()
    assert where.record_version == version
    assert propose_from_checks(series=series, by=field_world.person(), at=LATER) == []
    corrections.accept_correction(correction=row, by=field_world.person(), at=LATER)
    where.refresh_from_db()
    assert where.record_version > version


def test_a_typed_staff_stage_counts_before_the_plate(where):
    series = two_checks(where, staff_stage_m=0.4)
    (proposal,) = answers.open_proposals(series)
    assert proposal.correction.start_offset_m == pytest.approx(-0.1)


def test_a_check_that_a_correction_rests_on_stays(where):
    series = two_checks(where)
    propose_from_checks(series=series, by=field_world.person(), at=LATER)
    visit = Visit.objects.first()
    with pytest.raises(Refusal, match="a correction rests on it"):
        save(where, form_id=visit.form_id, version=visit.version, arrived_at=visit.arrived_at)
