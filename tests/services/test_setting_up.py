"""An installation is set up once, by answers or by options, and a second run spoils nothing."""

import stat
from datetime import UTC, datetime
from io import StringIO
from zoneinfo import ZoneInfo

import pytest
from django.core.management import call_command
from django.core.management.base import CommandError

from network.management.commands.setup import PASSWORD, minutes_of
from network.models import Act, Agency, Person, WorkingRules
from network.services import people, roles, setting_up
from network.services.acts import Refusal

pytestmark = pytest.mark.django_db
NOW = datetime(2024, 11, 5, 9, tzinfo=UTC)
WORD = "seven plates in a row"


@pytest.fixture
def installation(settings, tmp_path):
    """An installation whose folder is not there yet."""
    settings.DATA_DIR = tmp_path / "new" / "data"
    settings.MEDIA_ROOT = settings.DATA_DIR / "media"
    settings.SECRET_KEY_FILE = settings.DATA_DIR / "secret_key"
    return settings


def run(**options):
    said = StringIO()
    options = {"no_input": True, "name": "Lower Fen Survey", **options}
    call_command("setup", stdout=said, **options)
    return said.getvalue()


def mode(path):
    return stat.S_IMODE(path.stat().st_mode)


def test_everything_is_made_by_options(installation, monkeypatch):
    monkeypatch.setenv(PASSWORD, WORD)
    run(record_clock="-03:30", civil_zone="America/St_Johns", water_year_starts="10", user="ada")
    agency = Agency.objects.get()
    assert (agency.name, agency.record_utc_offset_minutes) == ("Lower Fen Survey", -210)
    assert (agency.water_year_start_month, agency.water_year_named_by_end) == (10, True)
    assert WorkingRules.objects.count() == 1
    ada = Person.objects.get()
    assert ada.is_superuser
    assert ada.check_password(WORD)
    assert {group.name for group in ada.groups.all()} == set(roles.TABLE)
    assert Act.objects.count() == 2


def test_key_and_folders_belong_to_their_owner_alone(installation, monkeypatch):
    monkeypatch.setenv(PASSWORD, WORD)
    run()
    assert mode(installation.DATA_DIR) == mode(installation.MEDIA_ROOT) == 0o700
    assert mode(installation.SECRET_KEY_FILE) == 0o600
    assert len(installation.SECRET_KEY_FILE.read_text()) >= 50


def test_a_second_run_changes_nothing(installation, monkeypatch):
    monkeypatch.setenv(PASSWORD, WORD)
    run(user="ada")
    key = installation.SECRET_KEY_FILE.read_text()
    said = run(name="Another", user="bob", record_clock="+05:00")
    assert "Lower Fen Survey is there already and stays as it is" in said
    assert Agency.objects.get().record_utc_offset_minutes == 0
    assert Person.objects.get().username == "ada"
    assert installation.SECRET_KEY_FILE.read_text() == key


def test_it_asks_and_takes_the_defaults(installation, monkeypatch):
    answers = iter(["+01:00", "", "", "", "start", "Upper Moor Survey", ""])
    asked = []
    monkeypatch.setattr("builtins.input", lambda question: asked.append(question) or next(answers))
    monkeypatch.setattr("getpass.getpass", lambda _question: WORD)
    run(no_input=False, name=None)
    agency = Agency.objects.get()
    assert (agency.name, agency.record_utc_offset_minutes) == ("Upper Moor Survey", 60)
    assert not agency.water_year_named_by_end
    assert Person.objects.get().username == "manager"
    assert asked[0] == "Record clock, offset from UTC [+00:00]: "


@pytest.mark.parametrize(
    ("options", "sentence"),
    [
        ({"name": None}, "Name of the agency: give it with --name"),
        ({"record_clock": "CET"}, "an offset such as"),
        ({"record_clock": "+15:00"}, "between UTC−12 and UTC"),
        ({"civil_zone": "Moon/Sea"}, "not the name of a time zone"),
        ({"water_year_starts": "13"}, "12"),
        ({"water_year_starts": "May"}, "a whole number"),
        ({"water_year_named_by": "middle"}, "“start” or “end”"),
    ],
)
def test_a_bad_answer_is_told_and_leaves_no_agency(installation, options, sentence):
    with pytest.raises(CommandError, match=sentence):
        run(**options)
    assert not Agency.objects.exists()


def test_no_password_is_told(installation):
    with pytest.raises(CommandError, match=PASSWORD):
        run()
    assert not Person.objects.exists()


def test_a_password_too_easily_guessed_is_refused(installation, monkeypatch):
    monkeypatch.setenv(PASSWORD, "password")
    with pytest.raises(CommandError, match="too short"):
        run()
    assert not Person.objects.exists()


def test_a_key_of_the_environment_needs_no_file(installation, monkeypatch):
    monkeypatch.setenv(PASSWORD, WORD)
    monkeypatch.setenv("GAUGEWRIGHT_SECRET_KEY", "k" * 60)
    assert "taken from the environment" in run()
    assert not installation.SECRET_KEY_FILE.exists()


def test_permissions_of_a_key_are_narrowed(tmp_path):
    key = tmp_path / "secret_key"
    key.write_text("x" * 50)
    key.chmod(0o644)
    assert not setting_up.make_secret_key(key)
    assert mode(key) == 0o600
    assert key.read_text() == "x" * 50


def test_an_empty_key_file_is_filled(tmp_path):
    key = tmp_path / "secret_key"
    key.touch()
    assert setting_up.make_secret_key(key)
    assert key.read_text()


def test_there_is_one_agency():
    setting_up.found_agency(name="One", clocks=setting_up.Clocks(), at=NOW)
    with pytest.raises(Refusal, match="its agency already"):
        setting_up.found_agency(name="Two", clocks=setting_up.Clocks(), at=NOW)


def test_a_person_holds_the_roles_named():
    zoe = people.take_on(username="zoe", password=WORD, roles_held=["field"], by=None, at=NOW)
    assert [group.name for group in zoe.groups.all()] == ["field"]
    assert zoe.is_staff
    assert not zoe.is_superuser


def test_a_role_that_does_not_exist_is_refused():
    with pytest.raises(Refusal, match="no role “king”"):
        people.take_on(username="zoe", password=WORD, roles_held=["king"], by=None, at=NOW)


def test_a_login_is_taken_once():
    people.take_on(username="zoe", password=WORD, roles_held=[], by=None, at=NOW)
    with pytest.raises(Refusal, match="already exists"):
        people.take_on(username="zoe", password=WORD, roles_held=[], by=None, at=NOW)


@pytest.mark.parametrize(
    ("text", "minutes"),
    [("+01:00", 60), ("-3:30", -210), ("−0330", -210), ("UTC+10", 600), ("0", 0), ("UTC", 0)],
)
def test_offsets_as_people_write_them(text, minutes):
    assert minutes_of(text) == minutes


def test_the_default_zone_is_one():
    assert ZoneInfo(setting_up.Clocks().civil_zone)
