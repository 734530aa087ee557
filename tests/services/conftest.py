"""A database that several threads can open at once."""

import sqlite3

import pytest
from django.db import connections


@pytest.fixture
def file_database(transactional_db, tmp_path):
    """Move an in-memory SQLite database into a file for one test: only there do writers queue."""
    memory = connections["default"]
    if memory.vendor != "sqlite" or not memory.is_in_memory_db():
        yield
        return
    memory.ensure_connection()
    target = sqlite3.connect(tmp_path / "books.sqlite3")
    memory.connection.backup(target)
    target.close()
    in_file = {**memory.settings_dict, "NAME": str(tmp_path / "books.sqlite3")}
    connections.databases["default"] = in_file
    del connections["default"]
    yield
    connections["default"].close()
    connections.databases["default"] = memory.settings_dict
    connections["default"] = memory
