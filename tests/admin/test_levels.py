"""The level book in the staff site: reduced as typed, checked, adopted after before and after."""

import uuid

import pytest
from django.urls import reverse

from network.models import LevelCheck
from tests import gauge_world as world

pytestmark = pytest.mark.django_db
ADD = reverse("admin:network_levelcheck_add")


@pytest.fixture
def where(agency, station):
    return world.gauged(station)


@pytest.fixture
def client(client, agency, record_keeper):
    client.force_login(record_keeper)
    return client


def on(row):
    owner = row.benchmark or row.plate
    return f"{row.point}:{owner.pk}" if owner else row.point


def typed(where, rows=None, **changes):
    """The book of gauge_world as a browser sends it."""
    rows = world.book(where) if rows is None else rows
    sent = {
        "form_id": str(uuid.uuid4()),
        "station": where.pk,
        "levelled_at_0": "2024-05-14",
        "levelled_at_1": "13:00",
        "peg_test-TOTAL_FORMS": "1",
        "peg_test-INITIAL_FORMS": "0",
        "sights-TOTAL_FORMS": str(len(rows)),
        "sights-INITIAL_FORMS": "0",
    }
    for name, value in vars(world.PEG).items():
        sent[f"peg_test-0-{name}"] = str(value)
    for number, row in enumerate(rows):
        sent[f"sights-{number}-on"] = on(row)
        for name in ("graduation_m", "backsight_m", "intermediate_m", "foresight_m"):
            value = getattr(row, name)
            sent[f"sights-{number}-{name}"] = "" if value is None else f"{value:.3f}"
    return sent | changes


def change(check, view="change"):
    return reverse(f"admin:network_levelcheck_{view}", args=[check.pk])


def test_the_page_asks_for_the_station_first(client, where):
    page = client.get(ADD).content.decode()
    assert f'href="?station={where.pk}"' in page
    page = client.get(ADD, {"station": where.pk}).content.decode()
    assert page.count("BM</option>") == 9  # eight lines and the one that is copied


def test_a_book_is_reduced_while_it_is_typed(client, where):
    live = reverse("admin:network_levelcheck_live")
    answer = client.post(f"{live}?station={where.pk}", typed(where)).content.decode()
    assert "−1.0 mm" in answer
    for level in ("100.000", "98.998", "100.520", "99.700", "98.720", "98.999", "99.999"):
        assert level in answer
    assert "+20.5" in answer
    assert "stage 0.721 m" in answer
    assert not LevelCheck.objects.exists()


def test_half_a_book_is_reduced_as_far_as_it_goes(client, where):
    live = reverse("admin:network_levelcheck_live")
    answer = client.post(live, typed(where, world.book(where)[:3])).content.decode()
    assert "100.520" in answer
    assert "the book is not closed" in answer
    assert 'data-cell="sights-2-foresight_m"' in answer


def test_the_button_computes_without_script_and_saves_nothing(client, where):
    page = client.post(ADD, typed(where, _compute="1"))
    assert "−1.0 mm" in page.content.decode()
    assert "correct the error" not in page.content.decode()
    assert not LevelCheck.objects.exists()


def test_a_book_is_saved_once_checked_and_no_longer_edited(client, where):
    sent = typed(where)
    for _tap in range(2):
        assert client.post(ADD, sent).status_code == 302
    check = LevelCheck.objects.get()
    assert check.sights.count() == 8
    assert check.peg_test.distance_m == 40
    assert client.post(change(check, "check"), {}).status_code == 302
    page = client.get(change(check)).content.decode()
    assert "−1.0 mm" in page
    assert 'name="sights-0-backsight_m"' not in page


def test_a_forgotten_line_goes_after_the_one_it_names(client, where):
    rows = world.book(where)
    late = [*rows[:1], *rows[2:], rows[1]]
    assert client.post(ADD, typed(where, late, **{"sights-7-after": "1"})).status_code == 302
    stored = LevelCheck.objects.get().sights.values_list("point", "intermediate_m")
    assert list(stored) == [(row.point, row.intermediate_m) for row in rows]


def test_a_book_that_does_not_close_is_refused_with_the_figure(client, where):
    client.post(ADD, typed(where, world.book(where, last_foresight_m=1.296)))
    check = LevelCheck.objects.get()
    page = client.post(change(check, "check"), {}).content.decode()
    assert "+4.0 mm, allowed 1.3 mm" in page
    check.refresh_from_db()
    assert check.state == "draft"


@pytest.mark.parametrize(
    ("name", "text", "said"),
    [
        ("sights-1-intermediate_m", "two", "is not a number"),
        ("sights-1-on", "", "Say what the staff stood on"),
        ("levelled_at_0", "2099-05-14", "lies in the future"),
    ],
)
def test_what_cannot_be_is_said_at_its_field_and_the_rest_kept(client, where, name, text, said):
    page = client.post(ADD, typed(where, **{name: text})).content.decode()
    assert said in page
    assert 'value="1.301"' in page
    assert not LevelCheck.objects.exists()


def test_adopting_shows_before_and_after_and_then_sets_the_zero(client, where):
    check = world.checked_levels(where)
    address = change(check, "adopt")
    form = client.get(address).content.decode()
    assert "P2: 1.0205 m (+20.5 mm)" in form
    assert "P1: −0.0010 m (−1.0 mm)" in form
    p2 = where.plates.get(label="P2")
    sent = {
        "plates": [p2.pk],
        "effective_from_0": "2024-01-30",
        "effective_from_1": "06:00",
        "reason": "lifted by ice",
    }
    page = client.post(address, sent)
    assert "0 readings at visits give another stage" in page.content.decode()
    assert not p2.zeros.filter(level_check=check).exists()
    seen = page.context["differences"].fingerprint
    assert client.post(address, {**sent, "seen": seen}).status_code == 302
    assert p2.zeros.get(level_check=check).zero_m == 1.0205
    refused = client.post(address, {**sent, "seen": seen}).content.decode()
    assert "The record changed since this was shown" in refused


def test_a_field_party_books_levels_and_adopts_none(client, where, field_person):
    client.force_login(field_person)
    assert client.post(ADD, typed(where)).status_code == 302
    check = world.checked_levels(where)
    assert client.get(change(check, "adopt")).status_code == 403
