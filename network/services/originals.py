"""Logger files as received: kept under their hash, opened again, swept when no row names them."""

import re
from collections.abc import Iterator
from contextlib import contextmanager
from datetime import datetime, timedelta
from pathlib import Path
from typing import BinaryIO

from django.conf import settings
from django.utils.translation import gettext as _

from network.formats import kept_files
from network.formats.kept_files import Incoming
from network.models import LoggerImport
from network.services.acts import Refusal

FOLDER = "logger"
HASH = re.compile(r"[0-9a-f]{64}")
SWEPT_AFTER = timedelta(days=1)


class OriginalLost(Refusal):
    """The original of an import is not where it was kept, or is no longer what it was."""


class Receiving:
    """A stream of bytes that is written to a temporary file while it is read."""

    def __init__(self, stream: BinaryIO, file: Incoming) -> None:
        self._stream = stream
        self._file = file

    def read(self, size: int = -1) -> bytes:
        """Read from the stream and write what came to the copy."""
        part = self._stream.read(size)
        self._file.copy.write(part)
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
        self._file.keep(path_of(sha256).name)


@contextmanager
def receiving(stream: BinaryIO) -> Iterator[Receiving]:
    """Read a stream and keep a copy; nothing stays behind unless `keep` was called."""
    with kept_files.incoming(Path(settings.MEDIA_ROOT, FOLDER)) as file:
        yield Receiving(stream, file)


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
    names = LoggerImport.objects.values_list("file", flat=True)
    return kept_files.unnamed(
        Path(settings.MEDIA_ROOT, FOLDER),
        named={name.removeprefix(f"{FOLDER}/") for name in names},
        before=at - SWEPT_AFTER,
    )


def sweep(*, at: datetime) -> list[Path]:
    """Remove the files that no row names, older than a day; return them."""
    swept = unnamed_files(at=at)
    for path in swept:
        path.unlink(missing_ok=True)
    return swept
