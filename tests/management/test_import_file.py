"""The commands around logger files say in one sentence what they did or why they refused."""

import io
import os
import time

import pytest
from django.core.management import CommandError, call_command

from network.models import Block, LoggerImport
from network.services import originals
from tests.records import count_of_every_table, logger_text, make_person, make_profile, make_series

pytestmark = pytest.mark.django_db
TEXT = logger_text([1.001, 1.002, 1.003])


@pytest.fixture
def file(tmp_path):
    by = make_person()
    make_series(by)
    make_profile(by)
    path = tmp_path / "feb.csv"
    path.write_text(TEXT)
    return path


def run(command, *args):
    out = io.StringIO()
    call_command(command, *args, stdout=out)
    return out.getvalue()


def import_it(path, *options, station="QA-010", series="Recorder", profile="plain", by="keeper"):
    return run("import_file", station, series, profile, str(path), "--by", by, *options)


def test_a_file_is_imported(file):
    said = import_it(file)
    row = LoggerImport.objects.get()
    assert said == f"Import {row.pk}: 3 readings kept, 0 rows skipped.\n"
    assert row.original_name == "feb.csv"


def test_the_same_file_again_is_no_error(file):
    import_it(file)
    assert "already in the series" in import_it(file)
    assert LoggerImport.objects.count() == 1


def test_a_dry_run_lists_the_faults_and_writes_nothing(file):
    file.write_text(TEXT.replace("1.002", "dry?"))
    counts = count_of_every_table()
    assert import_it(file, "--dry-run") == (
        "line 3: the value “dry?” cannot be read as a number\n"
        "3 rows from 2024-01-30 00:00 to 2024-01-30 12:00 UTC: 2 readings new, 0 changed, "
        "0 equal.\n"
        "1 month is touched.\n"
    )
    assert count_of_every_table() == counts


def test_faulty_rows_need_their_option(file):
    file.write_text(TEXT.replace("1.002", "dry?"))
    with pytest.raises(CommandError, match="1 row is faulty"):
        import_it(file)
    assert "2 readings kept, 1 rows skipped" in import_it(file, "--skip-faulty-rows")


@pytest.mark.parametrize(
    ("wrong", "sentence"),
    [
        ({"station": "QA-999"}, "Station “QA-999” has no series “Recorder”; it has: –."),
        ({"series": "Second"}, "Station “QA-010” has no series “Second”; it has: Recorder."),
        ({"profile": "other"}, "There is no profile “other”; there are: plain."),
        ({"by": "nobody"}, "There is no active person “nobody”."),
    ],
)
def test_a_wrong_name_is_answered_with_those_there_are(file, wrong, sentence):
    with pytest.raises(CommandError) as error:
        import_it(file, **wrong)
    assert (str(error.value), error.value.returncode) == (sentence, 1)


def test_a_file_that_is_not_there_is_named(file):
    with pytest.raises(CommandError, match=r"gone\.csv"):
        import_it(file.with_name("gone.csv"))


def test_an_import_is_withdrawn_by_its_number(file):
    import_it(file)
    row = LoggerImport.objects.get()
    said = run("withdraw_import", str(row.pk), "--by", "keeper", "--reason", "wrong logger")
    assert said == f"Import {row.pk} (feb.csv) is withdrawn.\n"
    assert Block.objects.count() == 0
    with pytest.raises(CommandError, match="There is no import 999"):
        run("withdraw_import", "999", "--by", "keeper", "--reason", "wrong logger")


def test_sweep_removes_old_files_that_no_row_names(file):
    import_it(file)
    orphan = originals.path_of("0" * 64)
    orphan.write_text("left by a crash")
    os.utime(orphan, times=(time.time() - 200_000,) * 2)
    assert run("sweep", "--dry-run") == f"{orphan.name}\n1 files to remove.\n"
    assert orphan.exists()
    assert run("sweep") == f"{orphan.name}\n1 removed.\n"
    assert run("sweep") == "0 removed.\n"


def test_verify_blocks_compares_with_the_originals(file):
    import_it(file)
    assert run("verify_blocks") == "All months equal their original files.\n"
    os.unlink(LoggerImport.objects.get().file.path)
    with pytest.raises(CommandError, match="1 differences"):
        run("verify_blocks", "--station", "QA-010")
