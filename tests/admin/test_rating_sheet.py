"""The rating sheet in the staff site: choose, compute, keep, approve, put in force, look, print."""

import re
from datetime import UTC, datetime

import pytest
from django.urls import reverse

from network.models import Act, Curve, RatingPeriod, ShiftTable
from tests.people import make_person
from tests.rated_world import EARLY, approved, gauge, gauge_along, in_force, recorded
from tests.records import count_of_every_table

pytestmark = pytest.mark.django_db
STAGES = [0.5, 0.6, 0.7, 0.8, 0.9, 1.1, 1.3, 1.5, 1.8, 2.1, 2.4, 2.8]
NOISE = [0.03, -0.02, 0.01, -0.03, 0.02, -0.01, 0.03, -0.02, -0.01, 0.02, -0.03, 0.01]


@pytest.fixture
def gauged(agency, station):
    return gauge_along(station, STAGES, errors=NOISE)


@pytest.fixture
def keeper(client, record_keeper):
    client.force_login(record_keeper)
    return client


def text(response):
    """Return a page's words without its tags, blanks made single."""
    return re.sub(r"\s+", " ", re.sub(r"<[^>]+>", " ", response.content.decode()))


def sheet(station, way="fit"):
    return reverse("admin:network_curve_add") + f"?station={station.pk}&way={way}"


def sent(rows, left_out=(), **fields):
    """Return what the sheet sends: every gauging used but those left out with a reason."""
    data = {"segments": "1", "zero_1_m": "0,2", "gauging": [row.pk for row in rows], **fields}
    for row in rows:
        if row not in left_out:
            data[f"use-{row.pk}"] = "on"
    return data


def address(view, row):
    return reverse(f"admin:network_{row._meta.model_name}_{view}", args=[row.pk])


def test_the_sheet_opens_with_a_fit_of_all_gaugings(keeper, station, gauged):
    page = keeper.get(sheet(station))
    shown = text(page)
    assert "12 of 12 gaugings used" in shown
    assert "no sign that the curve lies off" in shown
    assert page.content.decode().count("<figure") == 4
    assert keeper.get(reverse("admin:network_curve_add")).status_code == 200
    assert not Curve.objects.exists()


def test_computing_shows_and_writes_nothing(keeper, station, gauged):
    counts = count_of_every_table()
    page = keeper.post(sheet(station), {**sent(gauged), "_compute": "1"})
    # h₀ given as 0.2: Q = 10·(h − 0.2)² within the noise
    found = re.search(r"Q = ([\d.]+) · \(h − 0\.200\) ([\d.]+)", text(page))
    assert float(found[1]) == pytest.approx(10.0, abs=0.3)
    assert float(found[2]) == pytest.approx(2.0, abs=0.05)
    assert count_of_every_table() == counts


def test_a_gauging_left_out_needs_its_reason_at_its_line(keeper, station, gauged):
    data = sent(gauged, left_out=gauged[:1])
    page = keeper.post(sheet(station), {**data, "_keep": "1", "number": "1", "reason": "r"})
    assert "A gauging is left out with a reason." in text(page)
    assert not Curve.objects.exists()
    data[f"because-{gauged[0].pk}"] = "weed"
    keeper.post(sheet(station), {**data, "_keep": "1", "number": "1", "reason": "first"})
    left = Curve.objects.get().gaugings.get(is_used=False)
    assert (left.gauging, left.left_out_because) == (gauged[0], "weed")


def test_a_fit_is_kept_as_a_draft_with_its_band(keeper, station, gauged, record_keeper):
    data = sent(gauged, number="A", reason="first", extrapolate_high_m="3,5", _keep="1")
    response = keeper.post(sheet(station), data)
    curve = Curve.objects.get()
    assert response.url == address("change", curve)
    assert (curve.number, curve.state, curve.recorded_by) == ("A", "draft", record_keeper)
    assert (curve.gauged_lowest_m, curve.gauged_highest_m, curve.extrapolate_high_m) == (
        0.5, 2.8, 3.5,
    )  # fmt: skip
    assert curve.band.count() > 30
    assert "draft anew" in text(keeper.get(response.url)).lower()


@pytest.mark.parametrize(
    ("fields", "sentence"),
    [
        ({"segments": "3"}, "12 gaugings with flow; 15 are needed"),
        ({"zero_1_m": "0,7"}, "is not below its lowest gauging with flow"),
        ({"lowest_use_m": "3", "highest_use_m": "2"}, "The range of use is empty"),
        ({"zero_1_m": "low"}, "is not a number"),
    ],
)
def test_what_cannot_be_fitted_is_refused_and_the_form_kept(
    keeper, station, gauged, fields, sentence
):
    data = {**sent(gauged, number="A", reason="kept words"), **fields, "_keep": "1"}
    page = keeper.post(sheet(station), data)
    assert sentence in text(page)
    assert "kept words" in page.content.decode()
    assert not Curve.objects.exists()


def test_a_number_already_taken_and_no_reason_are_refused_at_the_form(keeper, station, gauged):
    approved(station, "A")
    data = sent(gauged, number="A", reason="again", _keep="1")
    assert "already has a rating version so named" in text(keeper.post(sheet(station), data))
    data = sent(gauged, number="B", reason=" ", _keep="1")
    assert "Give a reason." in text(keeper.post(sheet(station), data))
    assert Curve.objects.count() == 1


def test_segments_are_typed_and_must_meet(keeper, station, gauged):
    fields = {"lower_1": "0,2", "c_1": "10", "h0_1": "0,2", "b_1": "2", "lower_2": "1", "c_2": "11",
              "h0_2": "0,2", "b_2": "2", "number": "A", "reason": "all", "_keep": "1"}  # fmt: skip
    page = keeper.post(sheet(station, "segments"), sent(gauged, **fields))
    assert "The segments do not meet: at a joint they differ by 10.0 %." in text(page)
    keeper.post(sheet(station, "segments"), sent(gauged, **fields, joints_may_gap="on"))
    assert Curve.objects.get().segments.count() == 2
    fields["b_2"] = ""
    page = keeper.post(sheet(station, "segments"), sent(gauged, **fields))
    assert "A segment has all four figures, or none." in text(page)


def test_a_table_is_pasted_and_its_bad_line_named(keeper, station, agency):
    fields = {"rule": "linear", "rows": "0,0\t0\n1,0\t2x", "number": "T", "reason": "old table",
              "_keep": "1"}  # fmt: skip
    page = keeper.post(sheet(station, "table"), fields)
    assert "Line 2 is not a stage and a flow" in text(page)
    keeper.post(sheet(station, "table"), {**fields, "rows": "0,0\t0\n\n1,0; 2,5\n"})
    assert list(Curve.objects.get().points.values_list("stage_m", "flow_m3s")) == [
        (0.0, 0.0), (1.0, 2.5),
    ]  # fmt: skip


def test_a_weir_fills_a_version_and_shows_the_standards_limits(keeper, station, agency):
    fields = {"kind": "v-notch", "crest_stage_m": "0,5", "height_m": "0,5", "channel_width_m": "1",
              "angle_deg": "90", "lowest_use_m": "0,51", "highest_use_m": "0,9"}  # fmt: skip
    page = keeper.post(sheet(station, "weir"), {**fields, "_compute": "1"})
    # h/p = 0.4/0.5 = 0.8, above 0.4 of a 90° notch; least head 0.01 m, below 0.06 m
    assert "h/p 0.8 above 0.4 (ISO 1438)" in text(page)
    assert "head 0.01 m below 0.06 m (ISO 1438)" in text(page)
    keeper.post(sheet(station, "weir"), {**fields, "number": "W", "reason": "weir", "_keep": "1"})
    assert (Curve.objects.get().form, Curve.objects.get().h0_m) == ("log", 0.5)
    page = keeper.post(sheet(station, "weir"), {**fields, "angle_deg": "", "_compute": "1"})
    assert "This kind of weir needs it." in text(page)


def test_a_draft_is_drafted_anew_and_an_approved_version_is_not(keeper, station, gauged):
    keeper.post(sheet(station), sent(gauged, number="A", reason="first", _keep="1"))
    curve = Curve.objects.get()
    page = keeper.get(address("redraft", curve))
    assert "12 of 12 gaugings used" in text(page)
    data = sent(gauged, segments="2", zero_2_m="0,2", break_1_m="1,0", reason="second", _keep="1")
    keeper.post(address("redraft", curve), {**data, "joints_may_gap": "on"})
    assert (Curve.objects.get().reason, Curve.objects.get().segments.count()) == ("second", 2)
    keeper.force_login(make_person("record keeper", username="second-keeper"))
    keeper.post(address("approve", curve))
    assert Curve.objects.get().state == "approved"
    assert keeper.get(address("redraft", curve)).status_code == 302


def test_the_author_cannot_approve(keeper, station, gauged):
    keeper.post(sheet(station), sent(gauged, number="A", reason="first", _keep="1"))
    page = keeper.post(address("approve", Curve.objects.get()))
    assert "approved by someone else than its author" in text(page)


@pytest.fixture
def rated(station, gauged):
    """Ten days at 1.2 m under 10·(h − 0.2)²; a second version waits."""
    recorded(station, [1.2] * (24 * 10 + 1))
    in_force(station, approved(station, "1"))
    return approved(station, "2", c=20.0)


def in_force_form(**changes):
    return {"effective_from_0": "2020-01-06", "effective_from_1": "00:00",
            "reason": "flood", **changes}  # fmt: skip


def test_a_start_in_the_past_first_shows_what_it_changes(keeper, rated):
    counts = count_of_every_table()
    page = keeper.post(address("put-in-force", rated), in_force_form())
    shown = text(page)
    assert "Nothing is written yet." in shown
    assert "The largest change is +10.000 m³/s" in shown
    assert count_of_every_table() == counts
    seen = re.search(r'name="seen" value="(\w+)"', page.content.decode())[1]
    for name, value in in_force_form().items():
        assert f'name="{name}" value="{value}"' in page.content.decode()
    done = keeper.post(address("put-in-force", rated), in_force_form(seen=seen))
    assert done.status_code == 302
    assert RatingPeriod.objects.latest("effective_from").curve == rated


def test_going_back_keeps_what_was_typed_and_a_moved_record_is_told(keeper, rated, station):
    back = keeper.post(address("put-in-force", rated), in_force_form(seen="x", _edit="1"))
    assert "Nothing was written." in text(back)
    assert ">flood</textarea>" in back.content.decode().replace("\n", "")
    moved = keeper.post(address("put-in-force", rated), in_force_form(seen="0" * 32))
    assert "The record changed since this was shown." in text(moved)
    assert RatingPeriod.objects.count() == 1


def test_a_start_that_changes_nothing_is_done_at_once(keeper, rated):
    done = keeper.post(
        address("put-in-force", rated), in_force_form(effective_from_0="2024-01-06"), follow=True
    )
    assert "No published figure and no gauging changed." in text(done)
    assert RatingPeriod.objects.count() == 2


def test_a_start_already_taken_is_refused_at_the_form(keeper, rated):
    form = in_force_form(effective_from_0="2020-01-01", effective_from_1="01:00")
    page = keeper.post(address("put-in-force", rated), form)
    assert "already starts at this instant" in text(page)
    page = keeper.post(address("put-in-force", rated), {**form, "replaces": "on"})
    assert "Nothing is written yet." in text(page)


def test_the_rating_is_ended_on_the_page_of_periods(keeper, rated, station):
    fields = {"station": station.pk, "curve": "", "effective_from_0": "2020-01-06",
              "effective_from_1": "0000", "reason": "bridge works"}  # fmt: skip
    add = reverse("admin:network_ratingperiod_add")
    page = keeper.post(add, fields)
    assert "days would lose their figure" in text(page)
    seen = re.search(r'name="seen" value="(\w+)"', page.content.decode())[1]
    assert keeper.post(add, {**fields, "seen": seen}).status_code == 302
    assert RatingPeriod.objects.latest("effective_from").curve is None


def test_a_shift_table_is_tried_and_added_with_its_points(keeper, rated, station):
    fields = {"period": RatingPeriod.objects.get().pk, "effective_from_0": "2020-01-06",
              "effective_from_1": "00:00", "joins": "step", "reason": "scour",
              "points-TOTAL_FORMS": 2, "points-INITIAL_FORMS": 0, "points-0-stage_m": "1,0",
              "points-0-shift_m": "0,1", "points-1-stage_m": "",
              "points-1-shift_m": ""}  # fmt: skip
    add = reverse("admin:network_shifttable_add")
    page = keeper.post(add, fields)
    # 10·(1.3 − 0.2)² − 10 = 2.1
    assert "The largest change is +2.100 m³/s" in text(page)
    seen = re.search(r'name="seen" value="(\w+)"', page.content.decode())[1]
    keeper.post(add, {**fields, "seen": seen})
    assert ShiftTable.objects.get().points.get().shift_m == 0.1
    withdrawn = keeper.post(address("withdraw", ShiftTable.objects.get()), {"reason": "error"})
    assert "−2.100 m³/s" in text(withdrawn)
    assert ShiftTable.objects.get().stands


def test_a_note_is_tried_on_its_own_page_too(keeper, rated, station):
    fields = {"station": station.pk, "start_at_0": "2020-01-04", "start_at_1": "00:00",
              "end_at_0": "2020-01-06", "end_at_1": "00:00", "cause": "ice", "flows": "withheld",
              "text": "", "is_printed": "on"}  # fmt: skip
    acts = Act.objects.count()
    page = keeper.post(reverse("admin:network_note_add"), fields)
    assert "2 days would lose their figure." in text(page)
    assert Act.objects.count() == acts


def test_the_table_is_given_as_csv_and_pdf(keeper, rated):
    page = keeper.get(address("csv", rated))
    lines = page.content.decode().splitlines()
    assert page.headers["Content-Disposition"].endswith('"TE-010_rating_2.csv"')
    assert lines[4] == "stage_m,flow_m3s,extrapolated"
    # 20·(1.2 − 0.2)² = 20
    assert "1.20,20," in lines
    pdf = keeper.get(reverse("reports:rating_table", args=[rated.pk]))
    assert pdf.content.startswith(b"%PDF")
    again = keeper.get(reverse("reports:rating_table", args=[rated.pk]))
    assert pdf.content == again.content


def test_the_page_on_how_a_rating_holds_names_doubt(keeper, rated, station):
    for month in (2, 3, 4):
        gauge(station, 1.2, 11.0, at=datetime(2021, month, 1, tzinfo=UTC))
    page = keeper.get(reverse("admin:network_curve_health", args=[station.pk]))
    assert "The last 3 gaugings all lie above the curve beyond their U: in doubt." in text(page)


def test_those_without_the_role_see_versions_and_draft_none(client, rated, station, field_person):
    client.force_login(field_person)
    assert client.get(address("change", rated)).status_code == 200
    assert client.get(address("csv", rated)).status_code == 200
    for page in (sheet(station), address("redraft", rated), address("put-in-force", rated)):
        assert client.get(page).status_code == 403
        assert client.post(page, in_force_form()).status_code == 403


def test_a_row_that_is_no_curve_is_shown_with_the_reason(keeper, station, agency, record_keeper):
    row = Curve.objects.create(
        station=station, number="x", lowest_use_m=0, highest_use_m=1, reason="r",
        recorded_by=record_keeper, recorded_at=EARLY,
    )  # fmt: skip
    assert "A curve needs at least one segment." in text(keeper.get(address("change", row)))
    assert keeper.get(reverse("reports:rating_table", args=[row.pk])).status_code == 404
