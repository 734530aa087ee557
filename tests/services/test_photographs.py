"""Photographs leave the camera's notes behind, above all where they were taken."""

from io import BytesIO
from pathlib import Path
from uuid import uuid4

import pytest
from django.conf import settings
from PIL import Image

from network.models import Photograph
from network.services import photographs, visits
from network.services.acts import Refusal
from tests import field_world
from tests import gauge_world as world

pytestmark = pytest.mark.django_db


def camera(size=(3000, 2000), kind="JPEG", rotated=False):
    """A picture with position, maker and time beside its pixels, red on the left."""
    image = Image.new("RGB", size, "blue")
    image.paste("red", (0, 0, size[0] // 2, size[1]))
    exif = Image.Exif()
    exif[0x010F] = "Some Maker"
    if rotated:
        exif[0x0112] = 6  # to be turned by 90° clockwise
    exif.get_ifd(0x8825).update({1: "N", 2: (47.0, 30.0, 0.0), 3: "E", 4: (13.0, 15.0, 0.0)})
    out = BytesIO()
    image.save(out, kind, exif=exif)
    out.seek(0)
    return out


@pytest.fixture
def visit():
    where = field_world.station()
    return visits.save_visit(
        form_id=uuid4(), sheet=world.visit_sheet(where), by=field_world.person(), at=world.LATER
    )


def add(visit, upload, **changes):
    name = photographs.keep(upload)
    return photographs.add_photograph(
        visit=visit, name=name, by=field_world.person(), at=world.LATER, **changes
    )


def test_position_maker_and_time_are_gone(visit):
    original = camera()
    assert Image.open(original).getexif().get_ifd(0x8825)
    original.seek(0)
    photo = add(visit, original, caption="from the bridge")
    data = Path(settings.MEDIA_ROOT, photo.image.name).read_bytes()
    stored = Image.open(BytesIO(data))
    assert dict(stored.getexif()) == {}
    assert b"Some Maker" not in data
    assert max(stored.size) == photographs.LONGEST_SIDE
    assert photo.caption == "from the bridge"


def test_a_picture_taken_upright_is_stored_upright():
    stored = Image.open(BytesIO(photographs.re_encoded(camera((300, 200), rotated=True))))
    assert stored.size == (200, 300)
    red, _green, blue = stored.getpixel((100, 20))
    assert red > 200 > blue


def test_the_same_picture_sent_twice_is_there_once(visit):
    assert add(visit, camera()) == add(visit, camera())
    assert Photograph.objects.count() == 1
    assert len(list(Path(settings.MEDIA_ROOT, "photographs").iterdir())) == 1


def test_what_is_too_large_or_no_picture_is_refused_at_the_field(monkeypatch):
    with pytest.raises(Refusal, match="no photograph") as refused:
        photographs.keep(BytesIO(b"%PDF-1.7 not a picture"))
    assert refused.value.field == "photographs"
    monkeypatch.setattr(photographs, "LIMIT_PIXELS", 100)
    with pytest.raises(Refusal, match="too many pixels"):
        photographs.keep(camera())
    monkeypatch.setattr(photographs, "LIMIT_BYTES", 1000)
    with pytest.raises(Refusal, match="larger than"):
        photographs.keep(camera())


@pytest.mark.parametrize(
    "name", ["../secret_key", "photographs/x.jpg", f"photographs/{'0' * 64}.jpg"]
)
def test_a_name_that_was_not_kept_here_is_refused(visit, name):
    with pytest.raises(Refusal, match="choose it again"):
        photographs.add_photograph(visit=visit, name=name, by=field_world.person(), at=world.LATER)
