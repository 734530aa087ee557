"""The digest by mail: what is new, what is late, to whom."""

from datetime import timedelta
from io import StringIO

import pytest
from django.core.management import CommandError, call_command
from django.utils import timezone

from network.models import Office, Person
from tests.people import make_person, make_station
from tests.work_rows import gauged, levelled, visited

pytestmark = pytest.mark.django_db


@pytest.fixture
def today(agency, station, office, record_keeper):
    """Two stations of the office: one visit late for weeks, one fallen due three days ago."""
    day = timezone.localdate()
    fresh = make_station(office, code="TE-020", name="Au & Steg")
    for row, days in ((station, 80), (fresh, 45)):
        visited(row, day - timedelta(days=days), record_keeper)
        levelled(row, day, record_keeper)
        gauged(row, day, record_keeper)
    Person.objects.filter(pk=record_keeper.pk).update(email="keeper@example.org")
    return day


def send(**options):
    out = StringIO()
    call_command("send_digest", stdout=out, **options)
    return out.getvalue()


def test_the_mail_tells_new_from_late_in_text_and_html(today, mailoutbox):
    assert send() == "Wrote to 1 person.\n"
    (mail,) = mailoutbox
    assert mail.to == ["keeper@example.org"]
    assert mail.subject.endswith("1 new, 1 late")
    new, late = mail.body.split("Late\n")
    assert "TE-020 Au & Steg" in new
    assert "TE-010 Mühlsteg" in late
    assert "last routine visit 80 days ago; every 42" in late
    html, kind = mail.alternatives[0]
    assert kind == "text/html"
    assert "Au &amp; Steg" in html


def test_with_a_shorter_look_back_nothing_is_new(today, mailoutbox):
    send(days=2)
    assert mailoutbox[0].subject.endswith("0 new, 2 late")


def test_who_has_no_address_left_or_has_nothing_due_is_not_written_to(today, mailoutbox):
    other = Office.objects.create(name="Unterau")
    make_person("guest", office=other, email="idle@example.org")
    make_person("gone", username="gone", email="gone@example.org", is_active=False)
    send()
    assert [mail.to for mail in mailoutbox] == [["keeper@example.org"]]


def test_no_days_are_refused(today):
    with pytest.raises(CommandError, match="at least one day"):
        send(days=0)
