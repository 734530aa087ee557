"""Every page carries the strict policy and the usual headers, and none needs an exception."""

import re

import pytest
from django.urls import reverse

pytestmark = pytest.mark.django_db


@pytest.fixture
def pages(client, agency, station, manager):
    """Entrance, home, a list, a form, a history."""
    entrance = client.get(reverse("admin:login"))
    client.force_login(manager)
    return [
        entrance,
        client.get(reverse("admin:index")),
        client.get(reverse("admin:network_station_changelist")),
        client.get(reverse("admin:network_station_change", args=[station.pk])),
        client.get(reverse("admin:network_station_history", args=[station.pk])),
    ]


def test_every_page_carries_a_strict_policy(pages):
    for page in pages:
        policy = page.headers["Content-Security-Policy"]
        assert "default-src 'none'" in policy
        assert "script-src 'self';" in policy
        assert "unsafe" not in policy


def test_every_page_carries_the_usual_headers(pages):
    for page in pages:
        assert page.headers["X-Content-Type-Options"] == "nosniff"
        assert page.headers["X-Frame-Options"] == "DENY"
        assert page.headers["Referrer-Policy"] == "same-origin"
        assert page.headers["Cross-Origin-Opener-Policy"] == "same-origin"


def test_staff_pages_are_not_kept_by_caches(pages):
    for page in pages:
        assert "no-store" in page.headers["Cache-Control"]


def test_no_page_has_script_or_style_in_line(pages):
    for page in pages:
        html = page.content.decode()
        assert re.search(r"<style|\sstyle=|\son[a-z]+=|javascript:", html) is None
        assert all("src=" in tag for tag in re.findall(r"<script[^>]*>", html))


def test_times_are_said_to_be_on_the_record_clock(pages):
    assert "UTC+01:00" in pages[1].content.decode()
