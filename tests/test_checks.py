"""The system checks say what a deployment lacks, and nothing of one that lacks nothing."""

import os
import subprocess
import sys
from datetime import UTC, datetime
from pathlib import Path

import pytest
from django.db.utils import OperationalError

from network import checks
from network.services import setting_up

ROOT = Path(__file__).resolve().parents[1]
NOW = datetime(2024, 11, 5, tzinfo=UTC)


def ids(found):
    return [message.id for message in found]


def test_a_deployment_with_https_and_a_key_is_clean(tmp_path):
    environment = {
        **os.environ,
        "GAUGEWRIGHT_DATA": str(tmp_path),
        "GAUGEWRIGHT_SECRET_KEY": "".join(map(chr, range(40, 110))),
        "GAUGEWRIGHT_HTTPS": "yes",
        "GAUGEWRIGHT_HOSTS": "gauges.example.org",
        "GAUGEWRIGHT_DEBUG": "no",
    }
    done = subprocess.run(
        [sys.executable, "manage.py", "check", "--deploy", "--fail-level", "WARNING"],
        cwd=ROOT,
        env=environment,
        capture_output=True,
        text=True,
    )
    assert done.returncode == 0, done.stderr


def test_the_known_key_is_told(settings):
    settings.DEBUG, settings.SECRET_KEY = False, settings.INSECURE_KEY
    assert ids(checks.own_secret_key()) == ["network.W001"]
    settings.DEBUG = True
    assert checks.own_secret_key() == []
    settings.DEBUG, settings.SECRET_KEY = False, "own" * 20
    assert checks.own_secret_key() == []


def test_a_missing_system_library_is_named_by_its_package(monkeypatch):
    assert checks.print_libraries() == []
    monkeypatch.setitem(checks.PRINT_LIBRARIES, "libnowhere.so.9", "libnowhere9")
    (told,) = checks.print_libraries()
    assert told.hint == "On Debian: apt install libnowhere9"


def test_a_key_others_can_read_is_told(settings, tmp_path):
    settings.SECRET_KEY_FILE = tmp_path / "secret_key"
    assert checks.key_is_private() == []
    settings.SECRET_KEY_FILE.write_text("k")
    settings.SECRET_KEY_FILE.chmod(0o640)
    assert ids(checks.key_is_private()) == ["network.W003"]
    settings.SECRET_KEY_FILE.chmod(0o600)
    assert checks.key_is_private() == []


def test_a_folder_that_cannot_be_written_is_told(settings, tmp_path, monkeypatch):
    assert checks.folders_can_be_written() == []
    # the tests may run as one who may write everywhere
    monkeypatch.setattr("os.access", lambda path, _mode: Path(path) != settings.MEDIA_ROOT)
    settings.MEDIA_ROOT.mkdir()
    assert ids(checks.folders_can_be_written()) == ["network.E001"]


@pytest.mark.django_db
def test_a_database_without_an_agency_is_told():
    assert ids(checks.database_is_ready(databases=["default"])) == ["network.E004"]
    setting_up.found_agency(name="One", clocks=setting_up.Clocks(), at=NOW)
    assert checks.database_is_ready(databases=["default"]) == []


@pytest.mark.django_db
def test_a_database_older_than_the_program_is_told(monkeypatch):
    # the tests' tables are made from the models, so there is no migration to leave out
    monkeypatch.setattr(
        "django.db.migrations.executor.MigrationExecutor.migration_plan", lambda *_args: ["one"]
    )
    assert ids(checks.database_is_ready(databases=["default"])) == ["network.E003"]


def test_a_database_that_does_not_answer_is_told(monkeypatch):
    def refuse(_alias):
        raise OperationalError("connection refused")

    monkeypatch.setattr(checks, "_state_of", refuse)
    (told,) = checks.database_is_ready(databases=["default"])
    assert "connection refused" in told.msg
    assert checks.database_is_ready() == []
