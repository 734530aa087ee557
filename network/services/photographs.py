"""Photographs: made smaller, stripped of where and by which device they were taken, kept by hash."""

import hashlib
import os
import tempfile
from datetime import datetime
from io import BytesIO
from pathlib import Path
from typing import BinaryIO
from uuid import UUID, uuid4

from django.conf import settings
from django.utils.translation import gettext as _
from PIL import Image, ImageOps, UnidentifiedImageError

from network.models import Person, Photograph, Visit
from network.services.acts import Refusal, open_act

FOLDER = "photographs"
LIMIT_BYTES = 20 * 2**20
LIMIT_PIXELS = 60_000_000
LONGEST_SIDE = 2400
QUALITY = 85
# What a phone or camera gives; other readers of the library are never asked.
FORMATS = ("JPEG", "PNG", "WEBP", "MPO")


def add_photograph(
    *,
    visit: Visit,
    upload: BinaryIO,
    by: Person,
    at: datetime,
    caption: str = "",
    form_id: UUID | None = None,
) -> Photograph:
    """Add a photograph to a visit; the same picture sent twice is kept once.

    The file is written before its row: a crash in between leaves a file that no row names.
    """
    name = keep(upload)
    with open_act(_("added a photograph"), by=by, at=at, station=visit.station):
        there = Photograph.objects.filter(visit=visit, image=name).first()
        if there is not None:
            return there
        return Photograph.objects.create(
            visit=visit, image=name, caption=caption.strip(), form_id=form_id or uuid4()
        )


def keep(upload: BinaryIO) -> str:
    """Keep a photograph under the hash of its re-encoded bytes; return its name."""
    data = re_encoded(upload)
    name = f"{FOLDER}/{hashlib.sha256(data).hexdigest()}.jpg"
    path = Path(settings.MEDIA_ROOT, name)
    if not path.exists():
        path.parent.mkdir(parents=True, exist_ok=True)
        with tempfile.NamedTemporaryFile(dir=path.parent, delete=False) as temporary:
            temporary.write(data)
            temporary.flush()
            os.fsync(temporary.fileno())
        os.replace(temporary.name, path)
    return name


def re_encoded(upload: BinaryIO) -> bytes:
    """Return the picture alone as JPEG, upright, its longest side within the limit.

    Only pixels pass: position, device, time and thumbnails stay behind.
    """
    data = upload.read(LIMIT_BYTES + 1)
    if len(data) > LIMIT_BYTES:
        text = _("The photograph is larger than %(limit)d MB.")
        raise Refusal(text % {"limit": LIMIT_BYTES // 2**20}, field="image")
    try:
        with Image.open(BytesIO(data), formats=FORMATS) as image:
            if image.width * image.height > LIMIT_PIXELS:
                raise Refusal(_("The photograph has too many pixels."), field="image")
            upright = ImageOps.exif_transpose(image).convert("RGB")
    except (UnidentifiedImageError, OSError, ValueError, SyntaxError) as error:
        raise Refusal(
            _("This is no photograph that can be read; send JPEG, PNG or WebP."), field="image"
        ) from error
    upright.thumbnail((LONGEST_SIDE, LONGEST_SIDE))
    # A picture made from the pixels alone carries nothing the camera wrote beside them.
    bare = Image.new("RGB", upright.size)
    bare.paste(upright)
    out = BytesIO()
    bare.save(out, "JPEG", quality=QUALITY, optimize=True)
    return out.getvalue()
