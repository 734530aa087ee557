"""Refuse uploads over the limit while they arrive: CSRF parses them before any view."""

from typing import Any

from django.conf import settings
from django.core.files.uploadhandler import FileUploadHandler, StopUpload


class LimitedUploadHandler(FileUploadHandler):
    """Count the bytes of a request and stop it above UPLOAD_LIMIT_BYTES."""

    def __init__(self, request: Any = None) -> None:
        super().__init__(request)
        self.received = 0

    def receive_data_chunk(self, raw_data: bytes, start: int) -> bytes:
        """Pass the chunk on to the next handler, or stop the upload."""
        self.received += len(raw_data)
        if self.received > settings.UPLOAD_LIMIT_BYTES:
            raise StopUpload(connection_reset=False)  # so that the browser gets the sentence
        return raw_data

    def file_complete(self, file_size: int) -> None:
        """Leave the file to the next handler."""
        return
