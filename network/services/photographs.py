"""Photographs: made smaller, stripped of place and device, kept under their hash."""

import re
from datetime import datetime, timedelta
from io import BytesIO
from pathlib import Path
from typing import BinaryIO
from uuid import UUID, uuid4

from django.conf import settings
from django.utils.translation import gettext as _
from PIL import Image, ImageOps, UnidentifiedImageError

from network.formats import kept_files
from network.models import Person, Photograph, Visit
from network.services.acts import Refusal, open_act

FOLDER = "photographs"
NAME = re.compile(rf"{FOLDER}/[0-9a-f]{{64}}\.jpg")
SWEPT_AFTER = timedelta(days=1)
LIMIT_BYTES = 20 * 2**20
LIMIT_PIXELS = 60_000_000
LONGEST_SIDE = 2400
QUALITY = 85
# What a phone or camera gives; other readers of the library are never asked.
FORMATS = ("JPEG", "PNG", "WEBP")


def add_photograph(
    *,
    visit: Visit,
    name: str,
    by: Person,
    at: datetime,
    caption: str = "",
    form_id: UUID | None = None,
) -> Photograph:
    """Add a kept photograph to a visit; the same picture sent twice is there once."""
    if not is_kept(name):
        raise Refusal(_("The photograph is no longer here; choose it again."), field="photographs")
    with open_act(_("added a photograph"), by=by, at=at, station=visit.station):
        there = Photograph.objects.filter(visit=visit, image=name).first()
        if there is not None:
            return there
        return Photograph.objects.create(
            visit=visit, image=name, caption=caption.strip(), form_id=form_id or uuid4()
        )


def keep(upload: BinaryIO) -> str:
    """Keep a photograph under the hash of its re-encoded bytes; return its name.

    The file comes before its row: a crash in between leaves a file that no row names.
    """
    folder = Path(settings.MEDIA_ROOT, FOLDER)
    return f"{FOLDER}/{kept_files.keep(re_encoded(upload), folder=folder, ending='.jpg').name}"


def is_kept(name: str) -> bool:
    """Tell whether a name is that of a photograph in the folder."""
    return NAME.fullmatch(name) is not None and Path(settings.MEDIA_ROOT, name).is_file()


def unnamed_files(*, at: datetime) -> list[Path]:
    """Return the photographs that no row names, older than a day."""
    names = Photograph.objects.values_list("image", flat=True)
    return kept_files.unnamed(
        Path(settings.MEDIA_ROOT, FOLDER),
        named={name.removeprefix(f"{FOLDER}/") for name in names},
        before=at - SWEPT_AFTER,
    )


def sweep(*, at: datetime) -> list[Path]:
    """Remove the photographs that no row names, older than a day; return them."""
    swept = unnamed_files(at=at)
    for path in swept:
        path.unlink(missing_ok=True)
    return swept


def re_encoded(upload: BinaryIO) -> bytes:
    """Return the picture alone as JPEG, upright, its longest side within the limit.

    Only pixels pass: position, device, time and thumbnails stay behind.
    """
    data = upload.read(LIMIT_BYTES + 1)
    if len(data) > LIMIT_BYTES:
        text = _("The photograph is larger than %(limit)d MB.")
        raise Refusal(text % {"limit": LIMIT_BYTES // 2**20}, field="photographs")
    try:
        with Image.open(BytesIO(data), formats=FORMATS) as image:
            if image.width * image.height > LIMIT_PIXELS:
                raise Refusal(_("The photograph has too many pixels."), field="photographs")
            upright = ImageOps.exif_transpose(image).convert("RGB")
    except Image.DecompressionBombError as error:
        raise Refusal(_("The photograph has too many pixels."), field="photographs") from error
    except (UnidentifiedImageError, OSError, ValueError, SyntaxError) as error:
        raise Refusal(
            _("This is no photograph that can be read; send JPEG, PNG or WebP."),
            field="photographs",
        ) from error
    upright.thumbnail((LONGEST_SIDE, LONGEST_SIDE))
    # A picture made from the pixels alone carries nothing the camera wrote beside them.
    bare = Image.new("RGB", upright.size)
    bare.paste(upright)
    out = BytesIO()
    bare.save(out, "JPEG", quality=QUALITY, optimize=True)
    return out.getvalue()
