"""Files kept under their hash: written beside, flushed to the disk, then renamed.

Only when a file has its name may a row name it. A crash in between leaves a file that no row names.
"""

import hashlib
import os
import tempfile
from collections.abc import Iterator
from contextlib import contextmanager
from datetime import datetime
from pathlib import Path
from typing import IO


class Incoming:
    """A file being written, which stays behind only when it is kept."""

    def __init__(self, copy: IO[bytes], folder: Path) -> None:
        self.copy = copy
        self.kept = False
        self._folder = folder

    def sha256(self) -> str:
        """Return the hash of what was written so far."""
        self.copy.flush()
        with open(self.copy.name, "rb") as written:
            return hashlib.file_digest(written, "sha256").hexdigest()

    def keep(self, name: str) -> Path:
        """Flush the file to the disk and give it its name in the folder; return where it is."""
        self.copy.flush()
        os.fsync(self.copy.fileno())
        target = self._folder / name
        os.replace(self.copy.name, target)
        self.kept = True
        _flush(self._folder)
        return target


@contextmanager
def incoming(folder: Path) -> Iterator[Incoming]:
    """Open a file under a temporary name in a folder, made where missing; for writing and reading.

    It is removed at the end unless it was kept.
    """
    folder.mkdir(parents=True, exist_ok=True)
    with tempfile.NamedTemporaryFile(dir=folder, prefix="incoming-", delete=False) as copy:
        file = Incoming(copy, folder)
        try:
            yield file
        finally:
            if not file.kept:
                os.unlink(copy.name)


def keep(data: bytes, *, folder: Path, ending: str = "") -> Path:
    """Keep bytes under their SHA-256 and an ending such as ".pdf"; return where they are."""
    with incoming(folder) as file:
        file.copy.write(data)
        return file.keep(hashlib.sha256(data).hexdigest() + ending)


def unnamed(folder: Path, *, named: set[str], before: datetime) -> list[Path]:
    """Return the files of a folder that are not among the names and were written before."""
    return [
        path
        for path in sorted(folder.glob("*"))
        if path.name not in named and _written_before(path, before)
    ]


def _written_before(path: Path, instant: datetime) -> bool:
    try:
        return path.stat().st_mtime < instant.timestamp()
    except FileNotFoundError:  # gone since it was listed
        return False


def _flush(folder: Path) -> None:
    """Make the new name itself safe from a power cut, where the system can."""
    opened = os.open(folder, os.O_RDONLY)
    try:
        os.fsync(opened)
    finally:
        os.close(opened)
