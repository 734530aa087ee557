"""Certificates of calibrations: kept as received under their hash, before a row names them."""

import hashlib
import os
import tempfile
from pathlib import Path
from typing import BinaryIO

from django.conf import settings
from django.utils.translation import gettext as _

from network.services.acts import Refusal

FOLDER = "certificates"
LIMIT_BYTES = 20 * 2**20
# What a laboratory sends, told by its first bytes and not by its name.
KINDS = ((b"%PDF-", "pdf"), (b"\x89PNG\r\n", "png"), (b"\xff\xd8\xff", "jpg"))


def keep(upload: BinaryIO) -> str:
    """Keep a certificate (PDF, PNG or JPEG) under its hash; return its name in the media folder."""
    data = upload.read(LIMIT_BYTES + 1)
    if len(data) > LIMIT_BYTES:
        raise Refusal(_("A certificate has at most 20 MB."), field="certificate")
    kind = next((name for start, name in KINDS if data.startswith(start)), None)
    if kind is None:
        raise Refusal(_("A certificate is a PDF, a PNG or a JPEG."), field="certificate")
    name = f"{FOLDER}/{hashlib.sha256(data).hexdigest()}.{kind}"
    path = Path(settings.MEDIA_ROOT, name)
    path.parent.mkdir(parents=True, exist_ok=True)
    with tempfile.NamedTemporaryFile(dir=path.parent, delete=False) as copy:
        copy.write(data)
        copy.flush()
        os.fsync(copy.fileno())
    os.replace(copy.name, path)
    return name
