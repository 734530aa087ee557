"""A stream of bytes in any usual encoding → blocks of whole lines in UTF-8, one at a time."""

import codecs
import hashlib
from collections.abc import Callable, Iterator
from dataclasses import dataclass
from typing import BinaryIO

import numpy as np
import numpy.typing as npt

from network.formats.faults import FileFault
from network.formats.faults import sentence as _

BLOCK_BYTES = 1 << 21
MAX_LINE_BYTES = 10_000
# Tab, line feed, carriage return, the old end-of-file mark and escape may stand in a text.
CONTROL_BYTES = bytes(set(range(32)) - {9, 10, 12, 13, 26, 27})
UTF_16_MARKS = {codecs.BOM_UTF16_LE: "utf-16-le", codecs.BOM_UTF16_BE: "utf-16-be"}

Progress = Callable[[int, int | None], None]


@dataclass(frozen=True, slots=True)
class TextBlock:
    """Whole lines in UTF-8; the very last line of a file may lack its line feed."""

    data: bytes
    first_line: int
    line_count: int


class TextReader:
    """Iterate over a stream as TextBlocks; afterwards know its size, hash and encoding.

    Takes a stream opened for bytes. "auto" means: by byte-order mark UTF-8 or UTF-16, else UTF-8
    until a block is not valid UTF-8, from there on CP1252 (which holds Latin-1's letters).
    Raises FileFault: empty, too large, binary, a line too long, not in the encoding stated.
    """

    def __init__(
        self, stream: BinaryIO, *, encoding: str, max_bytes: int, progress: Progress | None
    ) -> None:
        """Take the stream; nothing is read yet."""
        self.encoding = encoding
        self.size_bytes = 0
        self._stream = stream
        self._max_bytes = max_bytes
        self._progress = progress
        self._hash = hashlib.sha256()
        self._total_bytes = self._known_size()
        self._line = 1

    @property
    def sha256(self) -> str:
        """Give the hash of all bytes read, in hexadecimal."""
        return self._hash.hexdigest()

    def __iter__(self) -> Iterator[TextBlock]:
        """Yield the lines in order."""
        pending = b""
        for part in self._parts():
            cut = part.rfind(b"\n") + 1
            if cut:
                yield self._block(b"".join((pending, memoryview(part)[:cut])))
                pending = part[cut:]
            else:
                pending += part
            self._check_line_length(len(pending))
        if pending:
            yield self._block(pending)
        if not self.size_bytes:
            raise FileFault(_("The file is empty."))

    def _known_size(self) -> int | None:
        if not self._stream.seekable():
            return None
        here = self._stream.tell()
        size = self._stream.seek(0, 2) - here
        self._stream.seek(here)
        self._check_size(size)
        return size

    def _check_size(self, size_bytes: int) -> None:
        if size_bytes > self._max_bytes:
            most = self._max_bytes // 1_000_000
            raise FileFault(
                _("The file is larger than %(most)d MB; import it in parts.", most=most)
            )

    def _check_line_length(self, length: int) -> None:
        if length > MAX_LINE_BYTES:
            raise FileFault(
                _(
                    "Line %(line)d is longer than %(most)d characters; this is no logger file.",
                    line=self._line,
                    most=MAX_LINE_BYTES,
                )
            )

    def _raw(self) -> Iterator[bytes]:
        while part := self._stream.read(BLOCK_BYTES):
            self.size_bytes += len(part)
            self._check_size(self.size_bytes)
            self._hash.update(part)
            yield part
            if self._progress:
                self._progress(self.size_bytes, self._total_bytes)

    def _parts(self) -> Iterator[bytes]:
        """Yield the bytes without mark; UTF-16 comes out as UTF-8."""
        decoder = None
        for number, part in enumerate(self._raw()):
            text = self._without_mark(part) if number == 0 else part
            if self.encoding.startswith("utf-16"):
                decoder = decoder or codecs.getincrementaldecoder(self.encoding)()
                text = self._from_utf_16(decoder, text)
            # The first block is looked at closely, the others for what no text has.
            if b"\0" in text or (number == 0 and text.translate(None, CONTROL_BYTES) != text):
                raise FileFault(_("The file is binary, or UTF-16 without its byte-order mark."))
            yield text
        if decoder:
            self._from_utf_16(decoder, b"", final=True)

    def _without_mark(self, part: bytes) -> bytes:
        if part.startswith(codecs.BOM_UTF8) and self.encoding in ("auto", "utf-8"):
            self.encoding = "utf-8"
            return part[3:]
        if part[:2] in UTF_16_MARKS and self.encoding in ("auto", "utf-16"):
            self.encoding = UTF_16_MARKS[part[:2]]
            return part[2:]
        if self.encoding == "utf-16":
            raise FileFault(_("The file does not begin with the byte-order mark of UTF-16."))
        return part

    def _from_utf_16(
        self, decoder: codecs.IncrementalDecoder, part: bytes, *, final: bool = False
    ) -> bytes:
        try:
            return decoder.decode(part, final).encode()
        except UnicodeError:
            raise FileFault(
                _("The file is damaged: near line %(line)d it is not UTF-16.", line=self._line)
            ) from None

    def _block(self, data: bytes) -> TextBlock:
        feeds = np.frombuffer(data, np.uint8) == 10
        self._check_lines(feeds)
        count = int(np.count_nonzero(feeds)) + (not data.endswith(b"\n"))
        block = TextBlock(self._as_utf_8(data), self._line, count)
        self._line += count
        return block

    def _check_lines(self, feeds: npt.NDArray[np.bool_]) -> None:
        """Refuse a line too long before a parser sees it; `feeds` marks the line feeds."""
        # Where each window of half the limit has a line feed, no line passes the limit.
        half = MAX_LINE_BYTES // 2
        if feeds[: len(feeds) // half * half].reshape(-1, half).any(axis=1).all():
            return
        lengths = np.diff(np.flatnonzero(feeds), prepend=-1, append=len(feeds))
        if lengths.max() > MAX_LINE_BYTES:
            self._line += int(lengths.argmax())
        self._check_line_length(int(lengths.max()))

    def _as_utf_8(self, data: bytes) -> bytes:
        if data.isascii() or self.encoding.startswith("utf-16"):
            return data
        if self.encoding != "cp1252":
            try:
                data.decode()
            except UnicodeDecodeError:
                if self.encoding == "utf-8":
                    raise FileFault(
                        _("Near line %(line)d the file is not UTF-8.", line=self._line)
                    ) from None
                self.encoding = "cp1252"
            else:
                return data
        return data.decode("cp1252", errors="replace").encode()
