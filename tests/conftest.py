"""What every test shares: files of their own, and a person of each role."""

import pytest
from hypothesis import settings as hypothesis_settings

from network.models import Office
from network.services.roles import FIELD, MANAGER, PUBLISHER, RECORD_KEEPER
from tests.people import make_agency, make_person, make_station

# A busy machine makes no test wrong: examples are judged by their result, not by their time.
hypothesis_settings.register_profile("unhurried", deadline=None)
hypothesis_settings.load_profile("unhurried")


@pytest.fixture(autouse=True)
def own_files(settings, tmp_path):
    """Keep what a test stores away from the installation's own data."""
    settings.DATA_DIR = tmp_path
    settings.MEDIA_ROOT = tmp_path / "media"
    # The hash that takes its time on purpose is not what these tests are about.
    settings.PASSWORD_HASHERS = ["django.contrib.auth.hashers.MD5PasswordHasher"]


@pytest.fixture
def agency(db):
    return make_agency()


@pytest.fixture
def office(db):
    return Office.objects.create(name="Oberau")


@pytest.fixture
def field_person(office):
    return make_person(FIELD, office=office)


@pytest.fixture
def record_keeper(office):
    return make_person(RECORD_KEEPER, office=office)


@pytest.fixture
def manager(office):
    return make_person(MANAGER, office=office)


@pytest.fixture
def publisher(office):
    return make_person(PUBLISHER, office=office)


@pytest.fixture
def station(office):
    return make_station(office)
