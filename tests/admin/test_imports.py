"""A file is uploaded, looked at and confirmed; every refusal is a sentence on a page."""

import re

import pytest
from django.core.files.uploadedfile import SimpleUploadedFile
from django.urls import reverse

from network.models import LoggerImport, MappingProfile, SensorSetting
from network.services import originals
from network.services.profiles import record_profile
from network.services.series import open_series
from tests.records import AT, count_of_every_table, logger_text

pytestmark = pytest.mark.django_db
ADD = "admin:network_loggerimport_add"
TEXT = logger_text([1.001, 1.002, 1.003])


@pytest.fixture
def series(agency, station, record_keeper):
    return open_series(station=station, label="Recorder", is_primary=True, by=record_keeper, at=AT)


@pytest.fixture
def profile(record_keeper):
    return record_profile(profile=MappingProfile(name="plain"), by=record_keeper, at=AT)


@pytest.fixture
def keeper_client(client, record_keeper):
    client.force_login(record_keeper)
    return client


@pytest.fixture
def upload(keeper_client, series, profile):
    def post(text, name="feb.csv"):
        data = text if isinstance(text, bytes) else text.encode()
        file = SimpleUploadedFile(name, data)
        fields = {"series": series.pk, "profile": profile.pk, "file": file}
        return keeper_client.post(reverse(ADD), fields)

    return post


def page(response):
    """Return a page's text without its tags, blanks made single."""
    return re.sub(r"\s+", " ", re.sub(r"<[^>]+>", " ", response.content.decode()))


def test_an_uploaded_file_is_shown_before_anything_is_written(keeper_client, upload):
    counts = count_of_every_table()
    preview = keeper_client.get(upload(TEXT).url)
    shown = page(preview)
    assert "feb.csv into Recorder at TE-010 Mühlsteg" in shown
    assert "readings new to the series 3" in shown
    # Midnight UTC is one o'clock on the agency's record clock.
    assert "first reading 30 Jan 2024 01:00" in shown
    assert "skip the" not in shown
    assert count_of_every_table() == counts


def test_confirming_imports_the_kept_file(keeper_client, upload, series, record_keeper):
    address = upload(TEXT).url
    done = keeper_client.post(address, follow=True)
    row = LoggerImport.objects.get()
    assert "Imported feb.csv: 3 readings kept, 0 rows skipped." in page(done)
    assert (row.series, row.recorded_by, row.original_name) == (series, record_keeper, "feb.csv")
    assert originals.path_of(row.sha256).read_text() == TEXT
    assert set(keeper_client.session.keys()) <= {"_auth_user_id", "_auth_user_backend",
                                                 "_auth_user_hash"}  # fmt: skip


def test_faulty_rows_are_listed_and_need_the_tick(keeper_client, upload):
    address = upload(TEXT.replace("1.002", "<b>wet</b>")).url
    shown = keeper_client.get(address)
    assert "skip the 1 faulty row" in page(shown)
    assert "&lt;b&gt;wet&lt;/b&gt;" in shown.content.decode()
    refused = keeper_client.post(address, follow=True)
    assert "1 row is faulty (line 3" in page(refused)
    assert LoggerImport.objects.count() == 0
    keeper_client.post(address, {"skip_faulty": "on"})
    row = LoggerImport.objects.get()
    assert (row.rows_kept, row.rows_faulty) == (2, 1)
    seen = keeper_client.get(reverse("admin:network_loggerimport_change", args=[row.pk]))
    faults = reverse("admin:network_importfault_changelist")
    address = f"{faults}?logger_import__id__exact={row.pk}"
    assert address in seen.content.decode()
    assert "cannot be read as a number" in page(keeper_client.get(address))


def test_a_file_that_is_there_already_offers_no_import(keeper_client, upload):
    keeper_client.post(upload(TEXT).url)
    address = upload(TEXT, name="again.csv").url
    preview = keeper_client.get(address)
    assert "already in the series" in page(preview)
    assert 'value="Import"' not in preview.content.decode()
    assert "already in the series" in page(keeper_client.post(address, follow=True))
    assert LoggerImport.objects.count() == 1


@pytest.mark.parametrize(
    ("text", "sentence"),
    [
        ("", "The file is empty."),
        (bytes(range(256)), "The file is binary"),
        ("time,level\n", "header but no rows"),
        (TEXT.replace("2024", "3024"), "does not lie between"),
    ],
)
def test_a_file_that_cannot_be_used_is_refused_at_its_field(upload, text, sentence):
    counts = count_of_every_table()
    response = upload(text)
    assert response.status_code == 200
    assert sentence in " ".join(response.context["form"].errors["file"])
    assert count_of_every_table() == counts


def test_an_upload_over_the_limit_is_refused_with_a_sentence(upload, settings):
    settings.UPLOAD_LIMIT_BYTES = 1 * 2**20
    response = upload(TEXT + "x" * 2 * 2**20)
    assert response.status_code == 200
    assert "larger than 1 MB" in page(response)


def test_a_kept_file_that_was_swept_asks_for_another_upload(keeper_client, upload):
    address = upload(TEXT).url
    for path in originals.path_of("0" * 64).parent.glob("*"):
        path.unlink()
    assert "upload it again" in page(keeper_client.post(address, follow=True))
    bad = reverse("admin:network_loggerimport_kept", args=["..%2Fsecret"])
    assert "Choose the series" in page(keeper_client.get(bad, follow=True))


def test_only_those_the_roles_name_may_import(client, series, field_person, manager):
    for person in (field_person, manager):
        client.force_login(person)
        assert client.get(reverse(ADD)).status_code == 403
        kept = reverse("admin:network_loggerimport_kept", args=["0" * 64])
        assert client.get(kept).status_code == 403


def test_an_import_is_withdrawn_with_a_reason(keeper_client, upload):
    keeper_client.post(upload(TEXT).url)
    row = LoggerImport.objects.get()
    address = reverse("admin:network_loggerimport_withdraw", args=[row.pk])
    assert "This field is required" in page(keeper_client.post(address, {"reason": ""}))
    keeper_client.post(address, {"reason": "wrong logger"})
    row.refresh_from_db()
    assert row.withdrawn_reason == "wrong logger"


def test_a_series_is_opened_and_its_sensor_set(keeper_client, agency, station):
    fields = {"station": station.pk, "kind": "recorder", "label": "Radar",
              "gap_limit_minutes": "120"}  # fmt: skip
    keeper_client.post(reverse("admin:network_series_add"), fields)
    first = SensorSetting.objects.get(series__label="Radar")
    assert (first.scale, first.offset_m) == (1, 0)
    keeper_client.post(
        reverse("admin:network_series_set-sensor", args=[first.series_id]),
        {"effective_from_0": "2024-02-01", "effective_from_1": "13:00", "scale": "0,001",
         "offset_m": "-0,25", "reason": "new sensor in mm"},
    )  # fmt: skip
    setting = SensorSetting.objects.latest("pk")
    assert (setting.scale, setting.offset_m) == (0.001, -0.25)
    assert setting.effective_from.isoformat() == "2024-02-01T12:00:00+00:00"
    seen = page(keeper_client.get(reverse("admin:network_series_change", args=[first.series_id])))
    assert "import a logger file" in seen.lower()


def test_a_used_profile_is_read_only_and_may_be_copied(keeper_client, upload, profile):
    keeper_client.post(upload(TEXT).url)
    address = reverse("admin:network_mappingprofile_change", args=[profile.pk])
    assert keeper_client.post(address, {"name": "other"}).status_code == 403
    copy = reverse("admin:network_mappingprofile_copy", args=[profile.pk])
    assert copy in keeper_client.get(address).content.decode()
    keeper_client.post(copy, {"name": "plain 2"})
    assert MappingProfile.objects.get(name="plain 2").unit == profile.unit
