"""System checks of a deployment: clock, database, data folder, secret key, print libraries.

`manage.py check` looks at what needs no database; with --deploy --database default at the rest.
"""

import ctypes
import os
import sys
from collections.abc import Iterable
from pathlib import Path
from typing import Any

from django.conf import settings
from django.core.checks import CheckMessage, Error, Tags, Warning, register
from django.db import connections
from django.db.migrations.executor import MigrationExecutor
from django.db.utils import Error as DatabaseError

from network.queries import clock

PRINTING = "printing"
# What WeasyPrint loads, and the Debian package each is in.
PRINT_LIBRARIES = {
    "libpango-1.0.so.0": "libpango-1.0-0",
    "libpangoft2-1.0.so.0": "libpangoft2-1.0-0",
    "libharfbuzz-subset.so.0": "libharfbuzz-subset0",
}


@register(Tags.security)
def own_secret_key(**_options: Any) -> list[CheckMessage]:
    """Warn of an installation that runs on the key everyone knows."""
    if settings.DEBUG or settings.SECRET_KEY != settings.INSECURE_KEY:
        return []
    return [
        Warning(
            "This installation has no secret key of its own: anyone could forge a login.",
            hint="Run “manage.py setup”.",
            id="network.W001",
        )
    ]


@register(PRINTING)
def print_libraries(**_options: Any) -> list[CheckMessage]:
    """Name the system libraries without which no PDF can be made."""
    packages = [package for name, package in PRINT_LIBRARIES.items() if not _loads(name)]
    if not packages or not sys.platform.startswith("linux"):
        return []
    return [
        Warning(
            f"No PDF can be made: the system lacks {', '.join(packages)}.",
            hint=f"On Debian: apt install {' '.join(packages)}",
            id="network.W002",
        )
    ]


@register(Tags.files, deploy=True)
def folders_can_be_written(**_options: Any) -> list[CheckMessage]:
    """Refuse a deployment that cannot keep what people hand in or what it issues."""
    folders = [Path(settings.DATA_DIR), Path(settings.MEDIA_ROOT)]
    return [
        Error(
            f"The folder {folder} cannot be written.",
            hint="Let the user who runs the server own the data folder (GAUGEWRIGHT_DATA).",
            id="network.E001",
        )
        for folder in folders
        if not os.access(_nearest(folder), os.W_OK | os.X_OK)
    ]


@register(Tags.security, deploy=True)
def key_is_private(**_options: Any) -> list[CheckMessage]:
    """Warn of a key file that others on the machine can read."""
    file = Path(settings.SECRET_KEY_FILE)
    if os.name != "posix" or not file.is_file() or not file.stat().st_mode & 0o077:
        return []
    return [
        Warning(
            f"Others on this machine can read {file}.",
            hint="Run “manage.py setup”, which narrows its permissions.",
            id="network.W003",
        )
    ]


@register(Tags.database, deploy=True)
def database_is_ready(
    databases: Iterable[str] | None = None, **_options: Any
) -> list[CheckMessage]:
    """Look whether the database answers, has every migration, and knows the agency's clock."""
    found: list[CheckMessage] = []
    for alias in databases or ():
        try:
            found += _state_of(alias)
        except DatabaseError as error:
            found.append(
                Error(
                    f"The database does not answer: {error}",
                    hint="DATABASE_URL says where it is.",
                    id="network.E002",
                )
            )
    return found


def _state_of(alias: str) -> list[CheckMessage]:
    executor = MigrationExecutor(connections[alias])
    if executor.migration_plan(executor.loader.graph.leaf_nodes()):
        return [
            Error(
                "The database is older than the program.",
                hint="Run “manage.py migrate”.",
                id="network.E003",
            )
        ]
    if clock.agency()._state.adding:
        return [
            Error(
                "The agency and its record clock are not set.",
                hint="Run “manage.py setup”.",
                id="network.E004",
            )
        ]
    return []


def _loads(library: str) -> bool:
    try:
        ctypes.CDLL(library)
    except OSError:
        return False
    return True


def _nearest(folder: Path) -> Path:
    """Return the folder itself or, where it is still missing, the nearest one that is there."""
    return next(path for path in (folder, *folder.parents) if path.exists())
