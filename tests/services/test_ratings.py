"""Acts upon ratings: drafted, drafted anew, approved by another, in force, back for a season."""

from datetime import UTC, datetime, timedelta

import pytest

from network.models import Act, Curve, RatingPeriod
from network.numerics.ratings.curves import Segment
from network.queries import curves, flows, in_force, rating_points, rating_sheet
from network.services import ratings
from network.services.acts import Refusal
from tests import records
from tests.people import make_agency
from tests.rated_world import AT, EARLY, approved, gauge_along, person, recorded
from tests.rated_world import in_force as put

pytestmark = pytest.mark.django_db
MAY, OCTOBER = datetime(2022, 5, 1, tzinfo=UTC), datetime(2022, 10, 1, tzinfo=UTC)
ONE = (Segment(0.2, 10.0, 0.2, 2.0),)
STAGES = [0.5, 0.7, 0.9, 1.1, 1.4, 1.8, 2.2, 2.7]


@pytest.fixture
def station():
    make_agency()
    return records.make_station()


def drafted(station, number="1", segments=ONE, **content):
    return ratings.draft(
        station=station, number=number, relation=ratings.Relation(segments=segments),
        use=ratings.Use(lowest_use_m=0.2, highest_use_m=5.0), reason="first",
        by=person("ama"), at=AT, **content,
    )  # fmt: skip


def version_at(station, instant):
    row = in_force.at(RatingPeriod.objects.filter(station=station), instant)
    return row.curve.number if row.curve else None


def test_a_draft_from_a_sheet_keeps_band_scatter_gaugings_and_range(station):
    rows = gauge_along(station, STAGES, errors=[0.02, -0.02] * 4)
    choice = rating_points.Choice(answers={rows[0].pk: "weed at the control"})
    sheet = rating_sheet.fitted(
        rating_points.points_of(station, choice), rating_sheet.FitChoice(zeros_m=(0.2,))
    )
    content = ratings.content_of(sheet)
    curve = ratings.draft(
        station=station, number="A", reason="first", by=person("ama"), at=AT, **vars(content)
    )
    assert (curve.gauged_lowest_m, curve.gauged_highest_m) == (0.7, 2.7)
    assert (curve.lowest_use_m, curve.highest_use_m) == (0.7, 2.7)
    assert curve.scatter_percent == pytest.approx(sheet.scatter_percent)
    assert curve.band.count() == len(sheet.band.stage_m)
    assert curve.gaugings.filter(is_used=True).count() == 7
    left = curve.gaugings.get(is_used=False)
    assert (left.gauging, left.left_out_because) == (rows[0], "weed at the control")
    assert left.deviation_percent == pytest.approx(float(sheet.deviations_percent[0]), abs=1e-9)
    again = rating_sheet.stored(curve)
    assert again.curve.flow_at(again.points.stage_m) == pytest.approx(
        sheet.curve.flow_at(sheet.points.stage_m)
    )


def test_a_draft_may_be_replaced_whole_and_leaves_its_trail(station):
    curve = drafted(station)
    content = ratings.Content(
        relation=ratings.Relation(points=[(0.0, 0.0), (2.0, 8.0)], form="linear"),
        use=ratings.Use(lowest_use_m=0.0, highest_use_m=2.0),
    )
    ratings.redraft(curve=curve, content=content, reason="a table", by=person("cora"), at=AT)
    curve = Curve.objects.get()
    assert (curve.form, curve.segments.count(), curve.points.count()) == ("linear", 0, 2)
    assert curve.recorded_by == person("cora")
    assert Act.objects.latest("pk").reason == "a table"


def test_an_approved_version_never_changes(station):
    curve = approved(station)
    content = ratings.Content(
        relation=ratings.Relation(segments=[Segment(0.2, 9.0, 0.2, 2.0)]),
        use=ratings.Use(lowest_use_m=0.2, highest_use_m=5.0),
    )
    with pytest.raises(Refusal, match="never changes"):
        ratings.redraft(curve=curve, content=content, reason="no", by=person("ama"), at=AT)
    assert curve.segments.get().c == 10.0


def test_none_of_those_who_drafted_a_version_may_approve_it(station):
    curve = drafted(station)
    content = ratings.Content(
        relation=ratings.Relation(segments=[Segment(0.2, 9.0, 0.2, 2.0)]),
        use=ratings.Use(lowest_use_m=0.2, highest_use_m=5.0),
    )
    curve = ratings.redraft(curve=curve, content=content, reason="c", by=person("ben"), at=AT)
    for author in ("ama", "ben"):
        with pytest.raises(Refusal, match="someone else than its author"):
            ratings.approve(curve=curve, by=person(author), at=AT)
    assert ratings.approve(curve=curve, by=person("cora"), at=AT).state == "approved"


def test_a_curve_comes_back_for_a_season_and_the_one_before_returns(station):
    put(station, approved(station, "open"))
    put(station, approved(station, "weed", c=8.0), MAY, until=OCTOBER)
    second = timedelta(seconds=1)
    told = [version_at(station, t) for t in (MAY - second, MAY, OCTOBER - second, OCTOBER)]
    assert told == ["open", "weed", "weed", "open"]
    put(station, Curve.objects.get(number="weed"), MAY.replace(year=2023),
        until=OCTOBER.replace(year=2023))  # fmt: skip
    assert version_at(station, datetime(2023, 7, 1, tzinfo=UTC)) == "weed"
    assert Curve.objects.count() == 2


@pytest.mark.parametrize(
    ("start", "until", "sentence"),
    [
        (OCTOBER, MAY, "ends after it starts"),
        (EARLY - timedelta(days=1), MAY, "no rating is in force that could return"),
        (MAY, datetime(2024, 1, 1, tzinfo=UTC), "starts within the season"),
    ],
)
def test_a_season_that_cannot_be_is_refused(station, start, until, sentence):
    curve = approved(station)
    put(station, curve)
    put(station, None, datetime(2023, 1, 1, tzinfo=UTC))
    with pytest.raises(Refusal, match=sentence):
        put(station, curve, start, until=until)
    assert RatingPeriod.objects.count() == 2


def test_a_start_already_taken_is_refused_unless_told_to_replace(station):
    first = put(station, approved(station, "1"))
    ratings.add_shift_table(
        period=first, effective_from=EARLY, points=[(1.0, 0.02)], by=person("ama"), at=AT,
        reason="scour",
    )  # fmt: skip
    other = approved(station, "2", c=11.0)
    with pytest.raises(Refusal, match="starts at"):
        put(station, other)
    put(station, other, replaces=True)
    first.refresh_from_db()
    assert not first.stands
    assert not first.shift_tables.standing().exists()
    assert version_at(station, EARLY) == "2"
    with pytest.raises(Refusal, match="nothing to replace"):
        put(station, other, MAY, replaces=True)


def test_a_version_is_withdrawn_only_once_no_period_uses_it(station):
    curve = approved(station)
    period = put(station, curve)
    with pytest.raises(Refusal, match="withdraw the period first"):
        ratings.withdraw_version(curve=curve, by=person("ama"), at=AT, reason="wrong")
    ratings.withdraw_period(period=period, by=person("ama"), at=AT, reason="wrong")
    ratings.withdraw_version(curve=curve, by=person("ama"), at=AT, reason="wrong")
    with pytest.raises(Refusal, match="Only an approved version"):
        put(station, curve)


@pytest.mark.parametrize(
    ("relation", "sentence"),
    [
        (ratings.Relation(points=[(0.0, 1.0), (1.0, 0.5)], form="linear"), "must not fall"),
        (ratings.Relation(points=[(0.0, 1.0)], form="linear"), "at least two points"),
        (ratings.Relation(), "at least one segment"),
        (
            # 10·(1 − 0.2)² = 6.4 against 11·0.8² = 7.04 m³/s at 1 m: 10 % apart.
            ratings.Relation(segments=[Segment(0.2, 10.0, 0.2, 2.0), Segment(1.0, 11.0, 0.2, 2.0)]),
            "at a joint they differ by 10.0 %",
        ),
    ],
)
def test_what_is_no_curve_is_refused_and_nothing_is_written(station, relation, sentence):
    with pytest.raises(Refusal, match=sentence):
        ratings.draft(
            station=station, number="1", relation=relation,
            use=ratings.Use(lowest_use_m=0.2, highest_use_m=5.0), reason="r", by=person("ama"),
            at=AT,
        )  # fmt: skip
    assert not Curve.objects.exists()
    assert not Act.objects.exists()


def test_segments_may_gap_where_told_so(station):
    segments = (Segment(0.2, 10.0, 0.2, 2.0), Segment(1.0, 11.0, 0.2, 2.0))
    assert drafted(station, segments=segments, joints_may_gap=True).segments.count() == 2


def test_a_gauging_of_another_station_and_an_empty_number_are_refused(station):
    [row] = gauge_along(records.make_station("QA-020"), [1.0])
    with pytest.raises(Refusal, match="another station"):
        drafted(station, gaugings=[ratings.GaugingChoice(gauging=row)])
    with pytest.raises(Refusal, match="number or a name"):
        drafted(station, number="  ")


def test_a_shift_belongs_to_its_period_and_never_reaches_the_next(station):
    recorded(station, [1.2] * (24 * 3 + 1))
    one, other = approved(station, "1"), approved(station, "2")
    period = put(station, one)
    put(station, other, EARLY + timedelta(days=2))
    ratings.add_shift_table(
        period=period, effective_from=EARLY + timedelta(days=1), points=[(1.0, -0.1)],
        by=person("ama"), at=AT, reason="weed",
    )  # fmt: skip
    days = flows.days_of(
        station, EARLY.date() + timedelta(days=1), EARLY.date() + timedelta(days=1)
    )
    # The record clock is an hour ahead of UTC: 2 January has 1 h before the shift, 23 h under it.
    # 10·(1.2 − 0.2)² = 10 and 10·(1.1 − 0.2)² = 8.1 m³/s: (10 + 23·8.1)/24.
    assert days.flow_m3s[0] == pytest.approx((10 + 23 * 8.1) / 24, abs=1e-9)
    third = EARLY.date() + timedelta(days=2)
    assert flows.days_of(station, third, third).flow_m3s[0] == pytest.approx(
        (8.1 + 23 * 10) / 24, abs=1e-9
    )
    with pytest.raises(Refusal, match="not in force at that instant"):
        ratings.add_shift_table(
            period=period, effective_from=EARLY + timedelta(days=2), points=[(1.0, 0.1)],
            by=person("ama"), at=AT, reason="late",
        )  # fmt: skip
    assert curves.kernel_curve(one).segments[0].c == 10.0
