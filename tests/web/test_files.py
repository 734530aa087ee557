"""Stored files go to logged-in staff only, never as a page of the site's own."""

import pytest
from django.core.files.base import ContentFile
from django.core.files.storage import default_storage
from django.urls import reverse

from network.models import Document
from tests.people import make_person
from tests.rows import a_row

pytestmark = pytest.mark.django_db


def stored(name, content=b"bytes"):
    return default_storage.url(default_storage.save(name, ContentFile(content)))


def test_a_visitor_is_sent_to_the_entrance(client):
    response = client.get(stored("documents/plan.pdf"))
    assert response.status_code == 302
    assert response.url.startswith(reverse("admin:login"))


def test_a_person_who_is_not_staff_is_sent_away(client, office, agency):
    person = make_person("nobody", office=office)
    person.is_staff = False
    person.save()
    client.force_login(person)
    assert client.get(stored("documents/plan.pdf")).status_code == 302


def test_a_photograph_is_shown_and_kept_private(client, field_person):
    client.force_login(field_person)
    response = client.get(stored("photographs/staff.jpg"))
    assert b"".join(response.streaming_content) == b"bytes"
    assert response.headers["Content-Type"] == "image/jpeg"
    assert response.headers["Content-Disposition"] == 'inline; filename="staff.jpg"'
    assert response.headers["X-Content-Type-Options"] == "nosniff"
    assert "private" in response.headers["Cache-Control"]
    assert response.headers["Content-Security-Policy"].startswith("default-src 'none'")


@pytest.mark.parametrize("name", ["page.html", "drawing.svg", "record.csv", "thing.xyz"])
def test_what_could_run_is_handed_over_as_a_download(client, field_person, name):
    client.force_login(field_person)
    response = client.get(stored(f"documents/{name}"))
    assert response.headers["Content-Disposition"] == f'attachment; filename="{name}"'
    response.close()


@pytest.mark.parametrize(
    "path", ["documents/none.pdf", "documents", "../secret_key", "..%2fsecret_key", "%00"]
)
def test_nothing_outside_the_folder_is_reached(client, field_person, tmp_path, path):
    (tmp_path / "secret_key").write_text("secret")
    (tmp_path / "media" / "documents").mkdir(parents=True)
    client.force_login(field_person)
    assert client.get(f"/media/{path}").status_code == 404


def test_a_documents_own_link_leads_here(client, agency, station, field_person):
    document = a_row(Document)
    client.force_login(field_person)
    response = client.get(document.file.url)
    assert response.status_code == 200
    response.close()
