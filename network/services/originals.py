"""Logger files as received: kept under their hash, opened again, and swept when no row names them.

A file is written under a temporary name, flushed to the disk and renamed to its hash; only then
does a row name it. A crash in between leaves a file that no row names and that `sweep` removes.
"""

import os
import re
import tempfile
from collections.abc import Iterator
from contextlib import contextmanager
from datetime import datetime, timedelta
from pathlib import Path
from typing import IO, BinaryIO

from django.conf import settings
from django.utils.translation import gettext as _

from network.models import LoggerImport
from network.services.acts import Refusal

FOLDER = "logger"
HASH = re.compile(r"[0-9a-f]{64}")
SWEPT_AFTER = timedelta(days=1)


class OriginalLost(Refusal):
    """The original of an import is not where it was kept, or is no longer what it was."""


class Receiving:
    """A stream of bytes that is written to a temporary file while it is read."""

    def __init__(self, stream: BinaryIO, copy: IO[bytes]) -> None:
        self._stream = stream
        self._copy = copy
        self.kept = False

    def read(self, size: int = -1) -> bytes:
        """Read from the stream and write what came to the copy."""
        part = self._stream.read(size)
        self._copy.write(part)
        return part

    def seekable(self) -> bool:
        """Tell whether the stream's size can be found out before reading."""
        return self._stream.seekable()

    def seek(self, offset: int, whence: int = 0) -> int:
        """Move in the stream; only to find out its size before the first byte is read."""
        return self._stream.seek(offset, whence)

    def tell(self) -> int:
        """Return the place in the stream."""
        return self._stream.tell()

    def keep(self, sha256: str) -> None:
        """Keep the copy under its hash, once the stream was read to its end."""
        self._copy.flush()
        os.fsync(self._copy.fileno())
        os.replace(self._copy.name, path_of(sha256))
        self.kept = True
        _flush_folder()


@contextmanager
def receiving(stream: BinaryIO) -> Iterator[Receiving]:
    """Read a stream and keep a copy; nothing stays behind unless `keep` was called."""
    folder = Path(settings.MEDIA_ROOT, FOLDER)
    folder.mkdir(parents=True, exist_ok=True)
    with tempfile.NamedTemporaryFile(dir=folder, prefix="incoming-", delete=False) as copy:
        received = Receiving(stream, copy)
        try:
            yield received
        finally:
            if not received.kept:
                os.unlink(copy.name)


def name_of(sha256: str) -> str:
    """Return the name, below the media folder, of the file with this hash."""
    return f"{FOLDER}/{sha256}"


def path_of(sha256: str) -> Path:
    """Return where the file with this hash is kept. Refuses what is no hash."""
    if not HASH.fullmatch(sha256):
        raise OriginalLost(_("This is not the name of a kept file."))
    return Path(settings.MEDIA_ROOT, name_of(sha256))


@contextmanager
def opened(sha256: str, *, called: str) -> Iterator[BinaryIO]:
    """Open a kept file; refuses with the name it was `called` where it is not there."""
    try:
        stream = path_of(sha256).open("rb")
    except OSError as error:
        raise OriginalLost(
            _("The file “%(name)s” is not in the data folder; upload it again or restore a backup.")
            % {"name": called}
        ) from error
    with stream:
        yield stream


def unnamed_files(*, at: datetime) -> list[Path]:
    """Return the files in the folder of logger files that no row names, older than a day."""
    named = set(LoggerImport.objects.values_list("file", flat=True))
    return [
        path
        for path in sorted(Path(settings.MEDIA_ROOT, FOLDER).glob("*"))
        if f"{FOLDER}/{path.name}" not in named and _modified_before(path, at - SWEPT_AFTER)
    ]


def sweep(*, at: datetime) -> list[Path]:
    """Remove the files that no row names, older than a day; return them."""
    swept = unnamed_files(at=at)
    for path in swept:
        path.unlink(missing_ok=True)
    return swept


def _modified_before(path: Path, instant: datetime) -> bool:
    try:
        return path.stat().st_mtime < instant.timestamp()
    except FileNotFoundError:  # gone since it was listed
        return False


def _flush_folder() -> None:
    """Make the new name itself safe from a power cut, where the system can."""
    folder = os.open(Path(settings.MEDIA_ROOT, FOLDER), os.O_RDONLY)
    try:
        os.fsync(folder)
    finally:
        os.close(folder)
