"""The visit log in the staff site: started at a station, computed, refused by field, saved once."""

import io
import uuid
from datetime import timedelta

import pytest
from django.core.files.uploadedfile import SimpleUploadedFile
from django.urls import reverse
from django.utils import timezone
from PIL import Image

from network.models import Correction, Photograph, StaffPlate, Visit, WorkLeft
from tests import gauge_world as world
from tests.gauge_world import plate

pytestmark = pytest.mark.django_db
ADD = reverse("admin:network_visit_add")


@pytest.fixture
def where(agency, station):
    station.hazards = "Slippery steps."
    station.save()
    return world.gauged(station)


@pytest.fixture
def client(client, agency, field_person):
    client.force_login(field_person)
    return client


def at(name, time, day="2024-05-14"):
    return {f"{name}_0": day, f"{name}_1": time}


def reading(number, time, gauge, value="0,50", **more):
    row = f"readings-{number}"
    return {
        **at(f"{row}-read_at", time),
        f"{row}-gauge": f"plate:{gauge.pk}",
        f"{row}-observation": "read",
        f"{row}-reading_m": value,
    } | {f"{row}-{name}": told for name, told in more.items()}


def sent(where, *rows, **changes):
    """A visit as a browser sends it; rows are those of `reading`."""
    form = {
        "form_id": str(uuid.uuid4()),
        "station": str(where.pk),
        **at("arrived_at", "10:00"),
        **at("departed_at", "11:00"),
        "is_routine": "on",
        "control_condition": "clear",
        "readings-TOTAL_FORMS": str(len(rows)),
    }
    form |= {f"{name}-INITIAL_FORMS": "0" for name in CHILDREN}
    form |= {f"{name}-TOTAL_FORMS": "0" for name in CHILDREN if name != "readings"}
    for row in rows:
        form |= row
    return form | changes


CHILDREN = ("readings", "recorder_checks", "spin_tests", "work_left")


def check(where, **changes):
    return {
        "recorder_checks-TOTAL_FORMS": "1",
        "recorder_checks-0-series": str(where.series.get().pk),
        **at("recorder_checks-0-checked_at", "10:10"),
        "recorder_checks-0-found_m": "0,53",
        "recorder_checks-0-left_m": "0,50",
        "recorder_checks-0-clock_error_s": "-20",
        "recorder_checks-0-battery_v": "12,4",
    } | {f"recorder_checks-0-{name}": told for name, told in changes.items()}


def picture_file():
    data = io.BytesIO()
    Image.new("RGB", (40, 30), "green").save(data, "JPEG")
    return SimpleUploadedFile("bank.jpg", data.getvalue(), content_type="image/jpeg")


def errors(page):
    """Every sentence of the form by its field, children included."""
    found = dict(page.context["adminform"].form.errors)
    for shown in page.context["inline_admin_formsets"]:
        for form in shown.formset.forms:
            found |= {f"{form.prefix}-{name}": said for name, said in form.errors.items()}
    return {name: " ".join(said) for name, said in found.items()}


def test_a_new_visit_asks_for_its_station_first(client, where):
    page = client.get(ADD).content.decode()
    assert f'href="?station={where.pk}"' in page


@pytest.mark.parametrize("by", ["pk", "code"])
def test_a_visit_starts_with_what_is_usual_at_its_station(client, where, field_person, by):
    page = client.get(f"{ADD}?station={getattr(where, by)}")
    form = page.context["adminform"].form
    readings, checks = [shown.formset for shown in page.context["inline_admin_formsets"]][:2]
    assert form["station"].value() == where.pk
    assert form["party"].value() == [field_person.pk]
    assert readings.forms[0]["gauge"].value() == f"plate:{plate(where, 'P1').pk}"
    assert checks.forms[0]["series"].value() == where.series.get().pk
    assert "Slippery steps." in page.content.decode()
    assert "Work in and over water can kill" in page.content.decode()


def test_a_whole_visit_is_saved(client, where):
    p1, p2 = plate(where, "P1"), plate(where, "P2")
    rows = (reading(0, "10:05", p1), reading(1, "1007", p2, "0.1"), reading(2, "10:50", p1, "0.51"))
    form = sent(where, *rows, **check(where), weather="rain", control_condition="weed")
    form |= {"work_left-TOTAL_FORMS": "1", "work_left-0-text": "paint the plate"}
    form |= {"photographs": picture_file(), "caption": "left bank"}
    response = client.post(ADD, form)
    assert response.status_code == 302, errors(response)
    visit = Visit.objects.get()
    assert (visit.weather, visit.control_condition, visit.readings.count()) == ("rain", "weed", 3)
    kept = visit.recorder_checks.get()
    assert (kept.found_m, kept.left_m, kept.clock_error_s) == (0.53, 0.5, -20)
    assert Photograph.objects.get().caption == "left bank"
    assert WorkLeft.objects.get().text == "paint the plate"
    page = client.get(reverse("admin:network_visit_change", args=[visit.pk])).content.decode()
    assert Photograph.objects.get().image.url in page


def test_a_double_tap_saves_once(client, where):
    form = sent(where, reading(0, "10:05", plate(where, "P1")))
    first, second = (client.post(ADD, form) for _tap in range(2))
    assert (first.status_code, second.status_code) == (302, 302)
    assert Visit.objects.get().readings.count() == 1


def test_compute_shows_the_stage_without_script_and_saves_nothing(client, where):
    form = sent(where, reading(0, "10:05", plate(where, "P2"), "0,25"), _compute="1")
    page = client.post(ADD, form)
    assert "1.250 m" in page.content.decode()  # P2 stands 1 m above the station zero
    assert not Visit.objects.exists()


def live(client, where, form):
    address = reverse("admin:network_visit_live")
    return client.post(f"{address}?station={where.pk}", form).content.decode()


def test_a_reading_becomes_a_stage_while_it_is_typed(client, where):
    assert "1.250 m" in live(
        client, where, sent(where, reading(0, "10:05", plate(where, "P2"), "0,25"))
    )
    assert live(client, where, {}) is not None
    assert not Visit.objects.exists()


def test_the_live_answer_needs_the_right_to_write(client, where, publisher):
    client.force_login(publisher)
    assert client.post(reverse("admin:network_visit_live"), sent(where)).status_code == 403


def test_a_reading_above_its_plate_is_a_finding_at_its_field_and_still_saved(client, where):
    form = sent(where, reading(0, "10:05", plate(where, "P1"), "1,75"))
    assert 'data-cell="readings-0-reading_m"' in live(client, where, form)
    assert client.post(ADD, form).status_code == 302
    assert Visit.objects.get().readings.get().reading_m == 1.75


def test_empty_lines_do_not_shift_a_finding_or_a_refusal(client, where):
    empty = reading(0, "10:00", plate(where, "P1"), "")
    form = sent(where, empty, reading(1, "10:05", plate(where, "P1"), "1,75"))
    assert 'data-cell="readings-1-reading_m"' in live(client, where, form)
    form |= at("readings-1-read_at", "10:05", TOMORROW)
    assert list(errors(client.post(ADD, form))) == ["readings-1-read_at"]


def test_a_negative_stage_is_a_finding_at_its_field(client, where):
    answer = live(client, where, sent(where, reading(0, "10:05", plate(where, "P1"), "−0,05")))
    assert 'data-cell="readings-0-reading_m"' in answer
    assert "is negative" in answer


def test_a_dry_gauge_is_an_observation_without_a_value(client, where):
    form = sent(where, reading(0, "10:05", plate(where, "P1"), "", observation="dry"))
    assert client.post(ADD, form).status_code == 302
    assert Visit.objects.get().readings.get().observation == "dry"


def test_a_dry_gauge_with_a_value_is_refused_at_its_row_and_the_rest_kept(client, where):
    form = sent(where, reading(0, "10:05", plate(where, "P1"), "0,4", observation="dry"))
    page = client.post(ADD, form | {"weather": "rain"})
    assert any(name.startswith("readings-0") for name in errors(page))
    assert 'value="0,4"' in page.content.decode()
    assert 'value="rain"' in page.content.decode()
    assert not Visit.objects.exists()


@pytest.fixture
def keeper(client, record_keeper):
    client.force_login(record_keeper)
    return client


def test_a_check_proposes_corrections_which_are_accepted_from_the_visit(keeper, where):
    read = {"found_m": "0,50", "left_m": "0,50", "staff_stage_m": "0,50"}
    before = at("arrived_at", "09:00", "2024-04-14") | at("departed_at", "11:00", "2024-04-14")
    before |= check(where, **read) | at("recorder_checks-0-checked_at", "10:10", "2024-04-14")
    keeper.post(ADD, sent(where, **before))
    keeper.post(ADD, sent(where, **check(where, **read | {"found_m": "0,53"})))
    visit = Visit.objects.order_by("arrived_at").last()
    address = reverse("admin:network_visit_change", args=[visit.pk])
    propose = reverse("admin:network_visit_propose", args=[visit.pk])
    assert propose in keeper.get(address).content.decode()
    keeper.post(propose)
    row = Correction.objects.get()
    assert (row.start_offset_m, row.end_offset_m) == (0, pytest.approx(-0.03))
    accept = reverse("admin:network_correction_accept", args=[row.pk])
    assert accept in keeper.get(address).content.decode()


TOMORROW = (timezone.now() + timedelta(days=2)).date().isoformat()
REFUSED = [
    (at("departed_at", "09:00", "2024-05-13"), "departed_at"),
    (at("arrived_at", "10:00", TOMORROW) | at("departed_at", "", ""), "arrived_at"),
    (at("readings-0-read_at", "10:05", TOMORROW), "readings-0-read_at"),
    ({"readings-0-reading_m": "half"}, "readings-0-reading_m"),
    ({"readings-0-gauge": "plate:0"}, "readings-0-gauge"),
]


@pytest.mark.parametrize(("changes", "field"), REFUSED)
def test_what_cannot_be_is_refused_at_its_field_and_the_rest_kept(client, where, changes, field):
    rows = (
        reading(0, "10:05", plate(where, "P1")),
        reading(1, "10:50", plate(where, "P1"), "0,61"),
    )
    page = client.post(ADD, sent(where, *rows, **changes) | {"weather": "rain"})
    assert page.status_code == 200
    assert field in errors(page)
    assert 'value="rain"' in page.content.decode()
    assert 'value="0,61"' in page.content.decode()
    assert not Visit.objects.exists()


def test_a_visit_across_midnight_rolls_to_the_next_day(client, where):
    row = reading(0, "00:20", plate(where, "P1"))
    form = sent(where, row, **at("arrived_at", "23:10") | at("departed_at", "00:40"))
    assert client.post(ADD, form).status_code == 302
    visit = Visit.objects.get()
    assert visit.departed_at - visit.arrived_at == timedelta(minutes=90)
    assert visit.readings.get().read_at - visit.arrived_at == timedelta(minutes=70)


def test_a_photograph_of_a_refused_form_need_not_be_chosen_again(client, where):
    bad = sent(where, **at("departed_at", "09:00", "2024-05-13"))
    page = client.post(ADD, bad | {"photographs": picture_file()})
    kept = page.context["adminform"].form.kept
    assert len(kept) == 1
    assert not Photograph.objects.exists()
    client.post(ADD, bad | at("departed_at", "11:00") | {"kept": kept})
    assert Photograph.objects.get().image.name == kept[0]


def test_what_is_no_photograph_is_refused_at_its_field(client, where):
    file = SimpleUploadedFile("bank.jpg", b"no picture", content_type="image/jpeg")
    page = client.post(ADD, sent(where) | {"photographs": file})
    assert "no photograph that can be read" in errors(page)["photographs"]


def test_a_photograph_is_served_to_staff_only(client, where):
    client.post(ADD, sent(where) | {"photographs": picture_file()})
    url = Photograph.objects.get().image.url
    served = client.get(url)
    assert b"".join(served.streaming_content).startswith(b"\xff\xd8")
    client.logout()
    assert client.get(url).status_code == 302


def test_a_row_is_changed_and_another_taken_out(client, where):
    p1 = plate(where, "P1")
    client.post(ADD, sent(where, reading(0, "10:05", p1), reading(1, "10:50", p1, "0,61")))
    visit = Visit.objects.get()
    first, second = visit.readings.all()
    keys = {"readings-INITIAL_FORMS": "2", "readings-0-id": first.pk, "readings-1-id": second.pk}
    form = sent(where, reading(0, "10:05", p1, "0,55"), reading(1, "10:50", p1, "0,61"))
    form |= keys | {"version": visit.version, "readings-1-DELETE": "on"}
    address = reverse("admin:network_visit_change", args=[visit.pk])
    response = client.post(address, form)
    assert response.status_code == 302, errors(response)
    assert [(row.pk, row.reading_m) for row in visit.readings.all()] == [(first.pk, 0.55)]


def test_the_second_of_two_is_told_and_loses_nothing(client, where):
    client.post(ADD, sent(where))
    visit = Visit.objects.get()
    address = reverse("admin:network_visit_change", args=[visit.pk])
    client.post(address, sent(where, version=visit.version, weather="sun"))
    page = client.post(address, sent(where, version=visit.version, weather="rain"))
    assert page.status_code == 200
    assert 'value="rain"' in page.content.decode()
    assert Visit.objects.get().weather == "sun"


def test_work_an_earlier_visit_left_is_offered_and_done(client, where):
    left = {"work_left-TOTAL_FORMS": "1", "work_left-0-text": "paint the plate"}
    client.post(ADD, sent(where) | left)
    work = WorkLeft.objects.get()
    assert "paint the plate" in client.get(f"{ADD}?station={where.pk}").content.decode()
    client.post(ADD, sent(where, work_finished=[work.pk]))
    work.refresh_from_db()
    assert work.done_at is not None


def test_a_visit_is_checked_and_reopened_with_a_reason(client, where):
    client.post(ADD, sent(where, reading(0, "10:05", plate(where, "P1"))))
    visit = Visit.objects.get()
    verb = {name: reverse(f"admin:network_visit_{name}", args=[visit.pk]) for name in VERBS}
    client.post(verb["check"])
    visit.refresh_from_db()
    assert visit.state == "checked"
    page = client.get(reverse("admin:network_visit_change", args=[visit.pk]))
    assert not page.context["editable"]
    assert "0.500 m" in page.content.decode()
    assert "<p>P1</p>" in page.content.decode()
    client.post(verb["reopen"], {"reason": ""})
    visit.refresh_from_db()
    assert visit.state == "checked"
    client.post(verb["reopen"], {"reason": "wrong plate"})
    visit.refresh_from_db()
    assert visit.state == "draft"


VERBS = ("check", "reopen")


def test_a_plate_taken_out_stands_last_and_says_so(client, where):
    StaffPlate.objects.filter(label="P1").update(removed_at=world.LEVELLED)
    shown = client.get(f"{ADD}?station={where.pk}").context["inline_admin_formsets"][0]
    offered = [label for _value, label in shown.formset.forms[0].fields["gauge"].choices]
    assert offered == ["P2", "P1, removed 2024-05-14"]
