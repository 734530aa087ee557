"""Editions: compiled, issued with the reasons owed, frozen, superseded, held against the record."""

from datetime import UTC, datetime, timedelta
from pathlib import Path

import pytest

from network.models import Act, Job, StationYear
from network.queries import station_years
from network.services import jobs, notes, trial, typed_flows
from network.services.acts import Refusal
from reports import editions, rendering, services
from reports.models import Edition
from tests.people import make_agency
from tests.records import AT, make_person
from tests.reports import world

pytestmark = pytest.mark.django_db
WHEN = {"at": datetime(2024, 2, 1, 10, tzinfo=UTC)}


@pytest.fixture
def quick(monkeypatch):
    monkeypatch.setattr(rendering, "render", world.small_pdf)


@pytest.fixture
def keeper(db):
    make_agency()
    return make_person("keeper")


@pytest.fixture
def approver(keeper):
    return make_person("approver")


@pytest.fixture
def station(keeper, approver):
    return world.make_flow_station(keeper, approver)


@pytest.fixture
def publisher(keeper):
    return make_person("publisher")


@pytest.fixture
def compiled(quick, station, publisher):
    return services.compile_edition(station=station, year=world.YEAR, by=publisher, **WHEN)


@pytest.fixture
def issued(compiled, publisher):
    return services.issue(edition=compiled, by=publisher, reason="the review follows", **WHEN)


def change_a_day(station, by):
    typed_flows.type_flow(
        station=station, day=datetime(2023, 3, 3).date(), flow_m3s=9.99, method="by eye",
        reason="test", by=by, at=AT,
    )  # fmt: skip


def test_a_compiled_edition_keeps_its_files_under_their_hashes(compiled):
    assert compiled.state == Edition.State.COMPILED
    assert compiled.number == 1
    data = Path(compiled.csv.path)
    assert data.name == f"{compiled.numbers_sha256}.csv"
    assert data.parent == Path(compiled.pdf.path).parent
    assert compiled.days_given == 365
    assert compiled.open_points == "The record has never been reviewed."
    assert Act.objects.filter(verb__contains="compiled").count() == 1


def test_open_points_are_written_in_the_language_of_the_print(quick, station, publisher):
    edition = services.compile_edition(
        station=station, year=world.YEAR, language="de", by=publisher, **WHEN
    )
    assert edition.open_points == "Die Aufzeichnung wurde noch nie durchgesehen."


def test_compiling_keeps_the_days_of_every_year_it_prints_beside(compiled, station):
    kept = StationYear.objects.filter(station=station).values_list("first_day", flat=True)
    assert compiled.first_day in kept
    assert len(kept) == len(station_years.years_on_record(station))


def test_compiling_again_replaces_what_was_never_issued(compiled, station, publisher):
    again = services.compile_edition(station=station, year=world.YEAR, by=publisher, **WHEN)
    assert (again.pk, again.number) == (compiled.pk, 1)


def test_a_year_without_a_record_is_refused(quick, station, publisher):
    with pytest.raises(Refusal, match="no record in 2019"):
        services.compile_edition(station=station, year=2019, by=publisher, **WHEN)
    assert not Edition.objects.exists()


def test_issuing_past_an_open_point_needs_a_reason(compiled, publisher):
    with pytest.raises(Refusal) as refused:
        services.issue(edition=compiled, by=publisher, **WHEN)
    assert refused.value.field == "reason"
    assert Edition.objects.get().state == Edition.State.COMPILED


def test_what_was_looked_at_is_what_is_issued(compiled, keeper, publisher):
    change_a_day(compiled.station, keeper)
    with pytest.raises(Refusal, match="changed since"):
        services.issue(edition=compiled, by=publisher, reason="in haste", **WHEN)
    assert Edition.objects.get().state == Edition.State.COMPILED


def test_an_issued_edition_is_not_issued_again(issued, publisher):
    with pytest.raises(Refusal, match="compiled edition"):
        services.issue(edition=issued, by=publisher, reason="again", **WHEN)


def test_a_later_edition_owes_a_reason_and_supersedes(issued, station, publisher):
    files = [Path(each.path).read_bytes() for each in (issued.pdf, issued.csv)]
    later = services.compile_edition(station=station, year=world.YEAR, by=publisher, **WHEN)
    assert later.number == 2
    with pytest.raises(Refusal) as refused:
        services.issue(edition=later, by=publisher, reason="the review follows", **WHEN)
    assert refused.value.field == "superseding"
    later.refresh_from_db()
    services.issue(
        edition=later, by=publisher, reason="the review follows", superseding="a gauge was moved",
        **WHEN,
    )  # fmt: skip
    issued.refresh_from_db()
    assert issued.state == Edition.State.SUPERSEDED
    assert [Path(each.path).read_bytes() for each in (issued.pdf, issued.csv)] == files
    assert later.reason == "a gauge was moved"


def test_an_unchanged_record_still_says_what_was_issued(issued):
    assert editions.changed_since(issued) == []


def test_verifying_names_the_changed_day_and_by_how_much(issued, keeper):
    change_a_day(issued.station, keeper)
    (change,) = editions.changed_since(issued)
    assert change.day.isoformat() == "2023-03-03"
    assert change.now == 9.99
    assert change.difference == pytest.approx(9.99 - change.issued)
    assert editions.largest([change]) is change


def test_a_day_that_was_lost_is_a_change_without_a_difference(issued, keeper):
    notes.add_note(
        station=issued.station, start_at=datetime(2023, 7, 1, tzinfo=UTC),
        end_at=datetime(2023, 7, 3, tzinfo=UTC), cause="weed", flows="withheld", by=keeper, at=AT,
    )  # fmt: skip
    changes = editions.changed_since(issued)
    lost = {change.day.day for change in changes if change.now is None}
    assert {1, 2} <= lost
    assert editions.largest(changes).difference is None


def test_data_that_are_not_those_of_the_hash_are_not_trusted(issued):
    path = Path(issued.csv.path)
    path.write_bytes(path.read_bytes().replace(b"2023-03-03", b"2023-03-04"))
    with pytest.raises(editions.EditionLost, match="not the one"):
        editions.changed_since(issued)
    path.unlink()
    with pytest.raises(editions.EditionLost, match="cannot be read"):
        editions.changed_since(issued)


def test_an_act_that_touches_a_day_finds_the_issued_edition(issued):
    inside, outside = datetime(2023, 5, 1).date(), datetime(2024, 5, 1).date()
    assert editions.touched_by(issued.station, [inside]) == [issued]
    assert editions.touched_by(issued.station, [outside]) == []
    assert editions.touched_by(issued.station, []) == []


def test_a_tried_act_names_the_issued_edition_it_touches(issued, keeper):
    found = trial.before_and_after(issued.station, lambda: change_a_day(issued.station, keeper))
    assert list(found.editions) == [issued]
    assert editions.changed_since(issued) == []


def test_compiling_as_long_work_ends_with_the_edition(
    quick, station, publisher, django_capture_on_commit_callbacks
):
    with django_capture_on_commit_callbacks(execute=True):
        services.ask_to_compile(
            station=station, year=world.YEAR, language="de", by=publisher, **WHEN
        )
    job = Job.objects.get()
    assert (job.state, job.steps_done, job.steps_total) == (Job.State.DONE, 2, 2)
    assert Edition.objects.get().language == "de"
    assert services.COMPILING in jobs.WORK


def test_sweeping_leaves_what_a_row_names(issued):
    folder = Path(issued.pdf.path).parent
    stray = folder / f"{'0' * 64}.pdf"
    stray.write_bytes(b"left by a crash")
    before = {path for path in folder.iterdir() if path != stray}
    late = datetime.now(UTC) + timedelta(days=2)
    swept = services.sweep(at=late)
    assert stray in swept
    assert {Path(issued.pdf.path), Path(issued.csv.path)} <= before - set(swept)


def test_without_the_system_libraries_a_sentence_names_the_packages(monkeypatch):
    def lacking(_name):
        raise OSError("cannot load library 'libpango-1.0-0'")

    monkeypatch.setattr(services, "import_module", lacking)
    with pytest.raises(Refusal, match="libpango"):
        services.printer("rendering")
