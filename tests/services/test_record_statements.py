"""Corrections, notes, infills, typed flows and reviews: each an act, each refusing nonsense."""

from datetime import UTC, date, datetime, timedelta

import pytest

from network.models import Act, Correction, Infill, Note, SensorSetting, Station
from network.services import corrections, infills, notes, reviews, typed_flows
from network.services import series as series_acts
from network.services.acts import Refusal
from tests.records import AT, make_person, make_series, make_station

pytestmark = pytest.mark.django_db
FROM = datetime(2024, 1, 10, tzinfo=UTC)
TO = datetime(2024, 1, 20, tzinfo=UTC)


@pytest.fixture
def who():
    return {"by": make_person(), "at": AT}


@pytest.fixture
def series(who):
    return make_series(who["by"])


@pytest.fixture
def station(series):
    return series.station


def version_of(station):
    return Station.objects.get(pk=station.pk).record_version


def correct(series, who, **given):
    values = {"start_at": FROM, "end_at": TO, "start_offset_m": 0.0, "end_offset_m": -0.012,
              "reason": "drift by the check of 20 January"}  # fmt: skip
    return corrections.propose_correction(series=series, **values | given, **who)


def note(station, who, **given):
    values = {"start_at": FROM, "end_at": TO, "cause": "ice", "flows": "withheld"}
    return notes.add_note(station=station, **values | given, **who)


def infill(station, who, **given):
    values = {"first_day": date(2024, 1, 10), "last_day": date(2024, 1, 12), "method": "line",
              "reason": "logger without power"}  # fmt: skip
    return infills.add_infill(station=station, **values | given, **who)


def type_flow(station, who, **given):
    values = {"day": date(2024, 1, 10), "flow_m3s": 1.5, "method": "by eye", "reason": "flood"}
    return typed_flows.type_flow(station=station, **values | given, **who)


def dismiss(series, who, **given):
    values = {"finding": "spike", "start_at": FROM, "end_at": FROM, "reason": "a real wave"}
    return reviews.dismiss_finding(series=series, **values | given, **who)


def review(station, who, **given):
    values = {"reviewed_through": date(2024, 1, 31)}
    return reviews.review_record(station=station, **values | given, **who)


def test_a_correction_counts_once_it_is_accepted(series, station, who):
    before = version_of(station)
    row = correct(series, who)
    assert (row.state, version_of(station)) == (Correction.State.PROPOSED, before)
    row = corrections.accept_correction(correction=row, **who)
    assert (row.accepted_by, row.accepted_at) == (who["by"], AT)
    assert version_of(station) == before + 1
    with pytest.raises(Refusal, match="already accepted"):
        corrections.accept_correction(correction=row, **who)
    corrections.withdraw_correction(correction=row, reason="wrong sign", **who)
    assert version_of(station) == before + 2
    with pytest.raises(Refusal, match="withdrawn"):
        corrections.accept_correction(correction=row, **who)


def test_a_withdrawn_proposal_changes_no_figure(series, station, who):
    before = version_of(station)
    corrections.withdraw_correction(correction=correct(series, who), reason="not needed", **who)
    assert version_of(station) == before
    acts = Act.objects.filter(station=station).order_by("pk").values_list("verb", flat=True)
    assert list(acts) == ["open series", "propose correction", "withdraw correction"]


@pytest.mark.parametrize(
    ("given", "sentence"),
    [
        ({"end_at": FROM}, "ends after it starts"),
        ({"end_offset_m": 0.0}, "changes nothing"),
        ({"end_offset_m": -120.0}, "is this metres"),
        ({"end_offset_m": float("nan")}, "is this metres"),
        ({"reason": " "}, "reason"),
    ],
)
def test_a_correction_of_nonsense_is_refused(series, who, given, sentence):
    with pytest.raises(Refusal, match=sentence):
        correct(series, who, **given)
    assert Correction.objects.count() == 0


def test_corrections_may_overlap_but_not_stand_twice(series, who):
    correct(series, who)
    correct(series, who, start_at=FROM + timedelta(days=5), end_at=TO + timedelta(days=5))
    with pytest.raises(Refusal, match="exactly this period"):
        correct(series, who)


def test_a_note_is_added_and_withdrawn(station, who):
    before = version_of(station)
    row = note(station, who, text="  frozen over  ")
    assert (row.text, version_of(station)) == ("frozen over", before + 1)
    notes.withdraw_note(note=row, reason="it was open", **who)
    assert version_of(station) == before + 2
    assert note(station, who).stands


@pytest.mark.parametrize(
    ("given", "sentence"),
    [
        ({"flows": "stand"}, "never rated as open water"),
        ({"cause": "frost"}, "not a valid choice"),
        ({"end_at": FROM}, "ends after it starts"),
        ({"uncertainty_percent": 0.0}, "above zero"),
    ],
)
def test_a_note_of_nonsense_is_refused(station, who, given, sentence):
    with pytest.raises(Refusal, match=sentence):
        note(station, who, **given)
    assert Note.objects.count() == 0


def test_notes_that_overlap_may_not_contradict(station, who):
    note(station, who)
    later = {"start_at": TO - timedelta(days=1), "end_at": TO + timedelta(days=9)}
    with pytest.raises(Refusal, match="of this cause stands already for 2024-01-10 00:00"):
        note(station, who, **later)
    with pytest.raises(Refusal, match="cannot be both"):
        note(station, who, cause="backwater", flows="estimated", **later)
    note(station, who, cause="fault", flows="withheld", **later)
    note(station, who, start_at=TO, end_at=TO + timedelta(days=1))  # they only touch


def test_an_infill_fills_each_day_once(station, who):
    before = version_of(station)
    row = infill(station, who)
    assert version_of(station) == before + 1
    with pytest.raises(Refusal, match="2024-01-10 – 2024-01-12 already have an infill"):
        infill(station, who, first_day=date(2024, 1, 12), last_day=date(2024, 1, 15))
    infill(station, who, first_day=date(2024, 1, 13), last_day=date(2024, 1, 15))
    infills.withdraw_infill(infill=row, reason="power was back", **who)
    infill(station, who, method="recession")


def test_an_infill_takes_its_source_from_elsewhere(series, station, who):
    other = make_series(who["by"], make_station("QA-020"))
    for given, sentence in [
        ({"method": "neighbour"}, "names its neighbour"),
        ({"method": "neighbour", "neighbour": station}, "its own neighbour"),
        ({"method": "series", "series": series}, "cannot fill its own gaps"),
        ({"method": "series", "series": other}, "belongs to another station"),
        ({"last_day": date(2024, 1, 9)}, "not before the first"),
    ]:
        with pytest.raises(Refusal, match=sentence):
            infill(station, who, **given)
    assert Infill.objects.count() == 0


def test_a_station_filled_from_a_neighbour_changes_with_it(series, who):
    filled = make_station("QA-020")
    infill(filled, who, method="neighbour", neighbour=series.station)
    before = version_of(filled)
    note(series.station, who)
    assert version_of(filled) == before + 1


def test_a_day_has_one_typed_flow(station, who):
    before = version_of(station)
    row = type_flow(station, who)
    assert version_of(station) == before + 1
    with pytest.raises(Refusal, match="withdraw it first"):
        type_flow(station, who, flow_m3s=1.6)
    typed_flows.withdraw_typed_flow(typed_flow=row, reason="misread", **who)
    type_flow(station, who, flow_m3s=0.0)


@pytest.mark.parametrize(
    ("given", "sentence"),
    [
        ({"flow_m3s": -0.1}, "not negative"),
        ({"flow_m3s": float("nan")}, "is a number"),
        ({"day": date(2024, 3, 2)}, "not begun"),
        ({"method": " "}, "blank"),
    ],
)
def test_a_typed_flow_of_nonsense_is_refused(station, who, given, sentence):
    with pytest.raises(Refusal, match=sentence):
        type_flow(station, who, **given)


def test_a_finding_is_dismissed_once_and_no_figure_changes(series, station, who):
    before = version_of(station)
    row = dismiss(series, who)
    with pytest.raises(Refusal, match="already dismissed"):
        dismiss(series, who)
    reviews.withdraw_dismissal(dismissal=row, reason="it was the logger", **who)
    dismiss(series, who)
    assert version_of(station) == before
    with pytest.raises(Refusal, match="no finding of this kind"):
        dismiss(series, who, finding="odd")
    with pytest.raises(Refusal, match="does not end before"):
        dismiss(series, who, finding="gap", end_at=FROM - timedelta(hours=1))


def test_a_record_is_reviewed_forwards_and_only_days_that_are_over(station, who):
    row = review(station, who)
    with pytest.raises(Refusal, match="already reviewed through 2024-01-31"):
        review(station, who, reviewed_through=date(2024, 1, 15))
    with pytest.raises(Refusal, match="days that are over"):
        review(station, who, reviewed_through=AT.date())
    reviews.withdraw_review(review=row, reason="a gap was missed", **who)
    review(station, who, reviewed_through=date(2024, 1, 15))


def test_a_series_opens_with_a_setting_of_scale_one_from_the_station_s_start(series, station):
    [setting] = series.settings.all()
    opened = station.operation_periods.get().opened_on
    assert (setting.scale, setting.offset_m) == (1, 0)
    assert setting.effective_from.date() == opened


def test_a_setting_is_replaced_from_the_same_instant_only_after_its_withdrawal(series, who):
    values = {"effective_from": FROM, "scale": 1.0, "offset_m": 0.5, "reason": "new bracket"}
    before = version_of(series.station)
    row = series_acts.set_sensor(series=series, **values, **who)
    with pytest.raises(Refusal):
        series_acts.set_sensor(series=series, **values, **who)
    with pytest.raises(Refusal, match="scale of zero"):
        series_acts.set_sensor(series=series, **values | {"scale": 0.0}, **who)
    series_acts.withdraw_setting(setting=row, reason="measured again", **who)
    series_acts.set_sensor(series=series, **values | {"offset_m": 0.6}, **who)
    assert SensorSetting.objects.standing().filter(series=series).count() == 2
    assert version_of(series.station) == before + 3


def test_a_series_keeps_its_rules_when_it_is_changed(series, who):
    before = version_of(series.station)
    series_acts.change_series(series=series, gap_limit_minutes=60, **who)
    assert version_of(series.station) == before + 1
    with pytest.raises(Refusal, match="ends above its start"):
        series_acts.change_series(series=series, sensor_lowest_m=2.0, sensor_highest_m=1.0, **who)
    with pytest.raises(Refusal, match="one primary series"):
        make_series(who["by"], series.station, label="Second")
