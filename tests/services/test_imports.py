"""A logger file comes in whole or not at all, the later wins, and withdrawing leaves no trace."""

import io
import os
import threading
import time
from datetime import UTC, date, datetime, timedelta
from pathlib import Path

import pytest
from django.db import connections

from network.models import Act, Block, ImportFault, LoggerImport, OperationPeriod, Station
from network.queries import blocks as stored
from network.services import blocks, imports, originals
from network.services.acts import Refusal
from tests.records import (
    AT,
    START,
    count_of_every_table,
    logger_text,
    make_person,
    make_profile,
    make_series,
    make_station,
    take,
)

pytestmark = pytest.mark.django_db
FIRST = logger_text([1.001, 1.002, 1.003, 1.004, 1.005, 1.006, 1.007, 1.008, 1.009, 1.010])
# Begins in the middle of FIRST, in January, and reaches further into February.
SECOND = logger_text([2.003, 2.004, 2.005, 2.006, 2.007, 2.008, 2.009, 2.010, 2.011, 2.012],
                     start=START + timedelta(hours=12))  # fmt: skip


@pytest.fixture
def keeper():
    return make_person()


@pytest.fixture
def into(keeper):
    """Where files go: the arguments that every import here shares."""
    return {"series": make_series(keeper), "profile": make_profile(keeper), "by": keeper}


def packed(series):
    return {month: bytes(data) for month, data in series.blocks.values_list("month", "data")}


def values(series):
    readings = stored.read(series.pk, 0, int(AT.timestamp()))
    return readings.values_m.tolist()


def media_files():
    return sorted(path.name for path in originals.path_of("0" * 64).parent.glob("*"))


def version_of(series):
    return Station.objects.get(pk=series.station_id).record_version


def test_a_file_is_kept_as_received_and_its_readings_are_packed_by_month(into):
    before = version_of(into["series"])
    row = take(FIRST, **into, name="C:\\loggers\\feb.csv")
    assert (row.rows_read, row.rows_kept, row.rows_faulty) == (10, 10, 0)
    assert row.original_name == "feb.csv"
    assert (row.first_at, row.last_at) == (START, START + timedelta(hours=54))
    assert Path(row.file.path).read_bytes() == FIRST.encode()
    assert sorted(packed(into["series"])) == [date(2024, 1, 1), date(2024, 2, 1)]
    assert values(into["series"]) == [1.001, 1.002, 1.003, 1.004, 1.005, 1.006, 1.007, 1.008,
                                      1.009, 1.010]  # fmt: skip
    assert version_of(into["series"]) == before + 1
    act = Act.objects.get(verb="import logger file")
    assert (act.done_by, act.done_at, act.station) == (into["by"], AT, into["series"].station)


def test_the_same_file_twice_changes_nothing_and_says_so(into):
    take(FIRST, **into)
    counts, months = count_of_every_table(), packed(into["series"])
    with pytest.raises(imports.AlreadyImported, match="already in the series"):
        take(FIRST, **into, name="another name.csv")
    assert (count_of_every_table(), packed(into["series"])) == (counts, months)
    assert len(media_files()) == 1


def test_the_same_file_may_go_into_another_series(into, keeper):
    take(FIRST, **into)
    other = make_series(keeper, make_station("QA-020"))
    take(FIRST, **into | {"series": other})
    assert values(other) == values(into["series"])


def test_where_files_overlap_the_later_wins(into):
    take(FIRST, **into)
    take(SECOND, **into)
    assert values(into["series"]) == [1.001, 1.002, 2.003, 2.004, 2.005, 2.006, 2.007, 2.008,
                                      2.009, 2.010, 2.011, 2.012]  # fmt: skip


@pytest.mark.parametrize("withdrawn", [0, 1, 2])
def test_a_withdrawn_import_leaves_the_bytes_of_never_having_imported_it(into, keeper, withdrawn):
    third = logger_text([3.0004, 3.0], start=START + timedelta(hours=24))
    texts = [FIRST, SECOND, third]
    rows = [take(text, **into) for text in texts]
    imports.withdraw_import(logger_import=rows[withdrawn], by=keeper, at=AT, reason="wrong logger")
    never = into | {"series": make_series(keeper, make_station("QA-020"))}
    for text in texts[:withdrawn] + texts[withdrawn + 1 :]:
        take(text, **never)
    assert packed(into["series"]) == packed(never["series"])
    assert blocks.months_that_differ(into["series"]) == []
    row = LoggerImport.objects.get(pk=rows[withdrawn].pk)
    assert (row.withdrawn_by, row.withdrawn_reason) == (keeper, "wrong logger")


def test_the_only_import_withdrawn_leaves_no_block_and_may_come_in_again(into, keeper):
    row = take(FIRST, **into)
    before = packed(into["series"])
    imports.withdraw_import(logger_import=row, by=keeper, at=AT, reason="wrong logger")
    assert packed(into["series"]) == {}
    take(FIRST, **into)
    assert packed(into["series"]) == before


def test_an_import_is_withdrawn_once_and_with_a_reason(into, keeper):
    row = take(FIRST, **into)
    months = packed(into["series"])
    with pytest.raises(Refusal, match="reason"):
        imports.withdraw_import(logger_import=row, by=keeper, at=AT, reason="  ")
    assert packed(into["series"]) == months
    imports.withdraw_import(logger_import=row, by=keeper, at=AT, reason="wrong logger")
    with pytest.raises(Refusal, match="already withdrawn"):
        imports.withdraw_import(logger_import=row, by=keeper, at=AT, reason="again")


@pytest.mark.parametrize("damage", ["lost", "changed"])
def test_withdrawing_refuses_where_the_original_of_another_import_is(into, keeper, damage):
    kept = take(FIRST, **into)
    row = take(SECOND, **into)
    if damage == "lost":
        os.unlink(kept.file.path)
    else:
        Path(kept.file.path).write_text(FIRST.replace("1.004", "1.005"))
    counts, months = count_of_every_table(), packed(into["series"])
    with pytest.raises(originals.OriginalLost, match=r"file\.csv"):
        imports.withdraw_import(logger_import=row, by=keeper, at=AT, reason="wrong logger")
    assert (count_of_every_table(), packed(into["series"])) == (counts, months)


def test_a_block_changed_behind_the_books_is_found(into):
    take(FIRST, **into)
    february = Block.objects.get(series=into["series"], month=date(2024, 2, 1))
    january = Block.objects.get(series=into["series"], month=date(2024, 1, 1))
    Block.objects.filter(pk=february.pk).update(data=january.data)
    assert blocks.months_that_differ(into["series"]) == [date(2024, 2, 1)]


FAULTY = FIRST.replace("1.002", "wet").replace("1.004", "NaN")


def test_faulty_rows_are_named_and_nothing_is_written_until_they_may_be_skipped(into):
    counts = count_of_every_table()
    with pytest.raises(imports.FaultyRows) as refusal:
        take(FAULTY, **into)
    assert refusal.value.field == "skip_faulty"
    assert str(refusal.value) == (
        "2 rows are faulty (line 3: the value “wet” cannot be read as a number; "
        "line 5: the value “NaN” is not a number). Confirm that they may be skipped."
    )
    assert count_of_every_table() == counts
    assert media_files() == []


def test_faulty_rows_once_confirmed_are_skipped_and_listed(into):
    row = take(FAULTY, **into, skip_faulty=True)
    assert (row.rows_read, row.rows_kept, row.rows_faulty) == (10, 8, 2)
    assert list(row.faults.values_list("line", "text")) == [
        (3, "2024-01-30 06:00,wet"),
        (5, "2024-01-30 18:00,NaN"),
    ]


def test_rows_out_of_order_are_sorted_in_once_confirmed(into):
    lines = FIRST.splitlines(keepends=True)
    backwards = "".join([*lines[:3], lines[4], lines[3], *lines[5:]])
    with pytest.raises(imports.FaultyRows, match="goes backwards"):
        take(backwards, **into)
    row = take(backwards, **into, skip_faulty=True)
    assert (row.rows_kept, row.rows_faulty, row.faults.count()) == (10, 0, 1)
    assert values(into["series"]) == [1.001, 1.002, 1.003, 1.004, 1.005, 1.006, 1.007, 1.008,
                                      1.009, 1.010]  # fmt: skip


@pytest.mark.parametrize(
    ("text", "sentence"),
    [
        ("", "empty"),
        ("time,level\n", "header but no rows"),
        (bytes(range(256)) * 20, "binary"),
        ("time;level\n2024-01-01;\n2024-01-02;\n", "empty"),
        ("one\n2024-01-01T00:00\n", "1 columns, the profile wants column 2"),
        ("time,level\n2024-01-01 00:00,NaN\n2024-01-01 01:00,NaN\n", "not a number"),
        (logger_text([1.0, 1.1], start=datetime(3024, 1, 1, tzinfo=UTC)), "does not lie between"),
        (logger_text([1.0, 1.1], start=datetime(2009, 1, 1, tzinfo=UTC)), "does not lie between"),
        ("time,level\n" + "1" * 20_000, "longer than"),
        (b"\xff\xfe" + b"2\x00" * 3 + b"\x00\xd8" * 4, "UTF-16"),
    ],
)
def test_a_file_that_cannot_be_used_is_refused_whole_with_a_sentence(into, text, sentence):
    counts = count_of_every_table()
    with pytest.raises(Refusal, match=sentence) as refusal:
        take(text, **into, skip_faulty=True)
    assert refusal.value.field == "file"
    assert count_of_every_table() == counts
    assert media_files() == []


class Large(io.RawIOBase):
    """A stream of that many bytes that are never held together."""

    def __init__(self, size, line):
        self.size, self.line, self.place = size, line, 0

    def seekable(self):
        return True

    def tell(self):
        return self.place

    def seek(self, offset, whence=0):
        self.place = offset + (self.size if whence == 2 else 0)
        return self.place

    def read(self, size=-1):
        part = (self.line * (size // len(self.line) + 1))[: min(size, self.size - self.place)]
        self.place += len(part)
        return part


@pytest.mark.parametrize(
    ("size", "line", "sentence"),
    [
        (100_000_000, b"1", "longer than"),
        (201_000_000, b"2024-01-01 00:00,1.000\n", "200 MB"),
    ],
)
def test_one_line_of_100_mb_and_a_file_over_200_mb_are_refused(into, size, line, sentence):
    counts = count_of_every_table()
    with pytest.raises(Refusal, match=sentence):
        take_stream(Large(size, line), into)
    assert count_of_every_table() == counts
    assert media_files() == []


def take_stream(file, into, **more):
    return imports.import_file(
        **into, file=file, original_name="x", skip_faulty=False, at=AT, **more
    )


def test_readings_outside_the_station_s_operation_are_faults(into):
    OperationPeriod.objects.update(closed_on=date(2024, 1, 31))
    row = take(FIRST, **into, skip_faulty=True)
    # 30 and 31 January have eight readings six hours apart; the closing midnight still counts.
    assert (row.rows_kept, row.rows_faulty) == (9, 1)


@pytest.mark.parametrize("encoding", ["utf-8", "utf-8-sig", "latin-1", "utf-16"])
def test_a_file_in_any_usual_encoding_gives_the_same_readings(into, keeper, encoding):
    profile = make_profile(keeper, name="other", value_column="Höhe", time_column="Zeit", unit="m")
    text = FIRST.replace("time,level", "Zeit,Höhe")
    take(text.encode(encoding), **into | {"profile": profile})
    assert values(into["series"])[:2] == [1.001, 1.002]


def test_a_dry_run_counts_what_an_import_would_change_and_writes_nothing(into):
    take(FIRST, **into)
    counts, files = count_of_every_table(), media_files()
    text = SECOND.replace("2.003", "1.003").replace("2.012", "?")
    preview = imports.dry_run(
        series=into["series"], profile=into["profile"], file=io.BytesIO(text.encode()), at=AT
    )
    assert (preview.rows_new, preview.rows_changed, preview.rows_equal) == (1, 7, 1)
    assert (preview.rows_read, preview.rows_kept, preview.rows_faulty) == (10, 9, 1)
    assert preview.months == (date(2024, 1, 1), date(2024, 2, 1))
    assert [(fault.line, fault.kept) for fault in preview.faults] == [(11, False)]
    assert preview.already is None
    assert (count_of_every_table(), media_files()) == (counts, files)


def test_a_dry_run_may_keep_the_file_for_the_confirmation(into):
    preview = imports.dry_run(
        series=into["series"], profile=into["profile"], file=io.BytesIO(FIRST.encode()), at=AT,
        keep=True,
    )  # fmt: skip
    assert media_files() == [preview.sha256]
    with originals.opened(preview.sha256, called="feb.csv") as file:
        imports.import_file(**into, file=file, original_name="feb.csv", skip_faulty=False, at=AT)
    assert media_files() == [preview.sha256]
    assert LoggerImport.objects.get().sha256 == preview.sha256


def test_progress_is_told_in_bytes(into):
    told = []
    take_stream(io.BytesIO(FIRST.encode()), into, progress=lambda *bytes_: told.append(bytes_))
    assert told == [(len(FIRST), len(FIRST))]


def test_a_crash_between_file_and_row_leaves_a_file_that_sweep_removes_a_day_later(
    into, monkeypatch
):
    def crash(*_args, **_kwargs):
        raise MemoryError

    counts = count_of_every_table()
    with monkeypatch.context() as patched:
        patched.setattr("network.services.blocks.merge_in", crash)
        with pytest.raises(MemoryError):
            take(FIRST, **into)
    assert count_of_every_table() == counts
    [orphan] = media_files()
    kept = take(SECOND, **into)
    now = datetime.fromtimestamp(time.time(), UTC)
    assert originals.sweep(at=now) == []
    assert [path.name for path in originals.sweep(at=now + timedelta(days=2))] == [orphan]
    assert media_files() == [kept.sha256]


@pytest.mark.usefixtures("file_database")
@pytest.mark.django_db(transaction=True)
class TestTwoAtOnce:
    """Needs real commits: threads have connections of their own."""

    def _both(self, jobs):
        start, errors = threading.Barrier(len(jobs)), []

        def run(job):
            start.wait()
            try:
                job()
            except Refusal as refusal:
                errors.append(refusal)
            finally:
                connections.close_all()

        threads = [threading.Thread(target=run, args=(job,)) for job in jobs]
        for thread in threads:
            thread.start()
        for thread in threads:
            thread.join()
        return errors

    def test_two_files_of_one_month_both_come_in(self, into, monkeypatch):
        save = blocks._save

        def save_slowly(*args):
            time.sleep(0.3)  # long enough for the other to read the month it would then lose
            save(*args)

        monkeypatch.setattr(blocks, "_save", save_slowly)
        odd = logger_text([1.5] * 200, start=START - timedelta(days=20), step=timedelta(hours=2))
        even = logger_text([1.6] * 200, start=START - timedelta(days=20, hours=1),
                           step=timedelta(hours=2))  # fmt: skip
        errors = self._both([lambda: take(odd, **into), lambda: take(even, **into)])
        assert errors == []
        assert len(values(into["series"])) == 400
        assert blocks.months_that_differ(into["series"]) == []

    def test_the_same_file_twice_at_once_comes_in_once(self, into):
        errors = self._both([lambda: take(FIRST, **into)] * 2)
        assert [type(error) for error in errors] == [imports.AlreadyImported]
        assert LoggerImport.objects.count() == 1
        assert ImportFault.objects.count() == 0
