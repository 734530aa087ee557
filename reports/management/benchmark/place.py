"""A database and a folder for measuring, beside the real ones and gone afterwards."""

import json
import tempfile
from collections.abc import Iterator
from contextlib import contextmanager
from pathlib import Path

from django.conf import settings
from django.core.management import call_command
from django.db import connection

PROFILE = PERSON = "benchmark"
# The generator makes the station; this is what an import needs besides.
ROWS = [
    {"model": "network.agency", "pk": 1, "fields": {"name": "Benchmark"}},
    {"model": "network.workingrules", "pk": 1, "fields": {}},
    {"model": "network.person", "pk": 1, "fields": {"username": PERSON}},
    {"model": "network.mappingprofile", "pk": 1, "fields": {"name": PROFILE}},
]


@contextmanager
def throw_away() -> Iterator[Path]:
    """Work in an empty database of the same engine and an empty media folder; yield a folder.

    On PostgreSQL the user must be allowed to create databases.
    """
    kept = settings.MEDIA_ROOT
    with tempfile.TemporaryDirectory(prefix="benchmark-") as name:
        folder = Path(name)
        settings.MEDIA_ROOT = folder / "media"
        own = connection.settings_dict["TEST"]
        own["MIGRATE"], own["NAME"] = False, _database_name(folder)
        real = connection.settings_dict["NAME"]
        connection.creation.create_test_db(verbosity=0, autoclobber=True, serialize=False)
        try:
            _load(folder, ROWS)
            yield folder
        finally:
            connection.creation.destroy_test_db(real, verbosity=0)
            settings.MEDIA_ROOT = kept


def _load(folder: Path, rows: list[dict[str, object]]) -> None:
    path = folder / "rows.json"
    path.write_text(json.dumps(rows))
    call_command("loaddata", path, verbosity=0)


def _database_name(folder: Path) -> str | None:
    """Name a file on SQLite, which would else measure a database in memory."""
    return str(folder / "benchmark.sqlite3") if connection.vendor == "sqlite" else None
