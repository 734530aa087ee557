"""The content of a yearbook against figures worked by hand, and against a published archive."""

import csv
from datetime import UTC, date, datetime, timedelta

import pytest

from network.models import Station, StationZero, TypedFlow
from network.numerics.marks import Mark
from network.services import notes, ratings, station_zeros, typed_flows
from network.services.station_zeros import NewRating, NewSetting
from reports import particulars
from reports.content import book
from reports.printed import RECORDED, SIGNS
from reports.words import MARK_WORDS
from tests.records import AT, make_person, make_profile, make_series, make_station, take
from tests.reference import reference_file

pytestmark = pytest.mark.django_db
DAY, HOUR = timedelta(days=1), timedelta(hours=1)
EDITION = particulars.Edition(number=1, compiled_on=date(2024, 3, 1))


@pytest.fixture
def keeper():
    return make_person("keeper")


@pytest.fixture
def approver():
    return make_person("approver")


@pytest.fixture
def station(agency, keeper):
    """A station of 86.4 km²: 1 m³/s over a day is 1 mm of runoff."""
    agency.record_utc_offset_minutes = 0
    agency.save()
    made = make_station()
    Station.objects.filter(pk=made.pk).update(catchment_km2=86.4)
    return Station.objects.get(pk=made.pk)


@pytest.fixture
def recorder(station, keeper):
    """A recorder that reads every six hours and may be silent for ten."""
    series = make_series(keeper, station)
    series.gap_limit_minutes = 600
    series.save()
    return series


def content_of(station, year=2023):
    return book.compile_book(station, year, edition=EDITION)[0]


def record(recorder, keeper, stage_of, *, year=2023, missing=lambda at: False, step=6 * HOUR):
    """Import the stages of a year, from its first midnight to the last, both included."""
    start, end = (datetime(each, 1, 1, tzinfo=UTC) for each in (year, year + 1))
    instants = [start + n * step for n in range((end - start) // step + 1)]
    rows = [f"{at:%Y-%m-%d %H:%M},{stage_of(at):.3f}\n" for at in instants if not missing(at)]
    profile = make_profile(keeper, name=f"{recorder.station.code} {year}")
    take("time,level\n" + "".join(rows), series=recorder, profile=profile, by=keeper)


def rate(station, keeper, approver, *, number="1", factor=3.0, highest_m=10.0, **content):
    """Approve Q = factor · h as a linear table; return the curve."""
    use = {"lowest_use_m": 0.0, "highest_use_m": highest_m, **content.pop("use", {})}
    curve = ratings.draft(
        station=station, number=number,
        relation=ratings.Relation(points=[(0.0, 0.0), (10.0, 10.0 * factor)], form="linear"),
        use=ratings.Use(**use), reason="made for the test", by=keeper, at=AT, **content,
    )  # fmt: skip
    return ratings.approve(curve=curve, by=approver, at=AT)


def in_force(station, curve, keeper, *, since=datetime(2020, 1, 1, tzinfo=UTC)):
    ratings.put_in_force(
        station=station, curve=curve, effective_from=since, reason="made for the test",
        by=keeper, at=AT,
    )  # fmt: skip


@pytest.fixture
def rated(station, keeper, approver):
    """Q = 3 · h up to 10 m."""
    in_force(station, rate(station, keeper, approver), keeper)
    return station


def type_days(station, by, flows_m3s, *, first=date(2023, 1, 1)):
    """Type daily flows from a first day on; None leaves a day out."""
    TypedFlow.objects.bulk_create(
        TypedFlow(
            station=station, day=first + n * DAY, flow_m3s=flow, method="archive",
            reason="inherited", recorded_at=AT, recorded_by=by,
        )
        for n, flow in enumerate(flows_m3s) if flow is not None
    )  # fmt: skip


def days_of_year(year, flow=2.0, **others):
    """Give a flow for each day of a year; others name days as m03d29=value."""
    first = date(year, 1, 1)
    flows = [flow] * (date(year + 1, 1, 1) - first).days
    for name, value in others.items():
        flows[(date(year, int(name[1:3]), int(name[4:6])) - first).days] = value
    return flows


def test_months_and_year_follow_from_the_days(station, keeper):
    # January 2 m³/s but for one day of 33: (30·2 + 33)/31 = 3. The other 334 days 2 m³/s:
    # the year's mean is (31·3 + 334·2)/365 = 761/365 = 2.0849, its volume 761·0.0864 = 65.75 hm³,
    # its runoff 761 mm, its specific discharge 2.0849/86.4·1000 = 24.13 l/s/km².
    type_days(station, keeper, days_of_year(2023, m01d20=33.0))
    table = content_of(station).daily
    january = table.months[0]
    assert (january.mean.text, january.volume_hm3.text, january.runoff_mm.text) == (
        "3.00", "8.04", "93.0",
    )  # fmt: skip
    assert (january.highest.number.text, january.highest.when) == ("33.0", date(2023, 1, 20))
    assert (january.lowest.number.text, january.lowest.when) == ("2.00", date(2023, 1, 1))
    year = table.year
    assert (year.mean.text, year.volume_hm3.text, year.runoff_mm.text) == ("2.08", "65.8", "761")
    assert year.specific_ls_km2.text == "24.1"
    assert [len(month.cells) for month in table.months] == [31, 28, 31, 30, 31, 30, 31, 31, 30, 31,
                                                            30, 31]  # fmt: skip


def test_of_a_tie_the_first_date_stands(station, keeper):
    type_days(station, keeper, days_of_year(2023, m03d29=9.0, m08d04=9.0, m05d06=1.0, m05d07=1.0))
    year = content_of(station).daily.year
    assert (year.highest_day.when, year.lowest_day.when) == (date(2023, 3, 29), date(2023, 5, 6))
    # seven days with both days of 1 m³/s: (5·2 + 2·1)/7; the first such window ends on 7 May
    assert (year.lowest_seven_days.number.text, year.lowest_seven_days.when) == (
        "1.71", date(2023, 5, 7),
    )  # fmt: skip


def test_a_missing_day_blanks_the_mean_and_marks_the_maximum(station, keeper):
    type_days(station, keeper, days_of_year(2023, m06d10=None, m06d20=5.0))
    table = content_of(station).daily
    june = table.months[5]
    assert june.cells[9].text == "–"
    assert Mark.MISSING in june.cells[9].marks
    for blank in (june.mean, june.volume_hm3, june.runoff_mm, june.lowest.number, table.year.mean,
                  table.year.volume_hm3, table.year.lowest_day.number,
                  table.year.lowest_seven_days.number):  # fmt: skip
        assert (blank.value, blank.text) == (None, "–")
    assert (june.highest.number.text, june.highest.number.marks) == ("5.00", Mark.PARTIAL)
    assert table.year.highest_day.number.marks == Mark.PARTIAL
    july = table.months[6]
    assert (july.mean.text, july.highest.number.marks) == ("2.00", RECORDED)


def test_an_agency_may_print_figures_of_the_days_there_are(agency, station, keeper):
    agency.months_need_every_day = False
    agency.save()
    type_days(station, keeper, days_of_year(2023, m06d10=None))
    assert content_of(station).daily.months[5].mean.text == "2.00"


def rising_in_may(at):
    return 2.5 if at.date() == date(2023, 5, 3) and at.hour == 12 else 1.0


def test_the_peak_is_a_reading_with_time_and_stage(rated, recorder, keeper):
    record(recorder, keeper, rising_in_may)
    content = content_of(rated)
    peak = content.daily.extremes.year_highest
    assert (peak.flow_m3s.text, peak.stage_m.text) == ("7.50", "2.500")
    assert peak.at == datetime(2023, 5, 3, 12, tzinfo=UTC)
    # From 06:00 to 18:00 the flow lies on a triangle of 4.5 m³/s above 3: 3 + 4.5·(12 h/2)/24 h.
    assert content.daily.months[4].cells[2].text == "4.13"  # 4.125, halves up
    assert content.daily.months[4].cells[1].text == "3.00"


def test_a_peak_that_may_have_fallen_into_a_gap_is_at_least_that(rated, recorder, keeper):
    gap = (datetime(2023, 5, 10, tzinfo=UTC), datetime(2023, 5, 12, tzinfo=UTC))
    record(recorder, keeper, rising_in_may, missing=lambda at: gap[0] <= at < gap[1])
    extremes = content_of(rated).daily.extremes
    assert extremes.year_highest.flow_m3s.text == "≥ 7.50"
    assert extremes.record_highest.flow_m3s.text == "≥ 7.50"
    assert extremes.year_lowest.flow_m3s.text == "3.00"


def test_at_a_stage_only_station_a_peak_before_a_gap_is_at_least_that_too(
    station, recorder, keeper
):
    Station.objects.filter(pk=station.pk).update(kind=Station.Kind.STAGE_ONLY)
    gap = (datetime(2023, 5, 10, tzinfo=UTC), datetime(2023, 5, 12, tzinfo=UTC))
    record(recorder, keeper, rising_in_may, missing=lambda at: gap[0] <= at < gap[1])
    peak = content_of(Station.objects.get(pk=station.pk)).daily.extremes.year_highest
    assert (peak.stage_m.text, peak.stage_m.value) == ("≥ 2.500", 2.5)


def test_a_typed_day_above_all_readings_is_a_peak_of_at_least_that(rated, recorder, keeper):
    record(recorder, keeper, rising_in_may)
    typed_flows.type_flow(
        station=rated, day=date(2023, 8, 4), flow_m3s=12.0, method="flood marks", reason="flood",
        by=keeper, at=AT,
    )  # fmt: skip
    peak = content_of(rated).daily.extremes.year_highest
    assert (peak.flow_m3s.text, peak.at) == ("≥ 12.0", date(2023, 8, 4))


def test_a_stage_only_station_prints_stage_and_nothing_of_flow(station, recorder, keeper):
    Station.objects.filter(pk=station.pk).update(kind=Station.Kind.STAGE_ONLY)
    record(recorder, keeper, rising_in_may)
    content = content_of(Station.objects.get(pk=station.pk))
    may = content.daily.months[4]
    # the triangle again: 1 + 1.5·(12 h/2)/24 h = 1.375 m, and (30·1 + 1.375)/31 = 1.0121 m
    assert (may.cells[2].text, may.mean.text) == ("1.375", "1.012")
    assert (may.volume_hm3.value, may.runoff_mm.value) == (None, None)
    year = content.daily.year
    assert (year.volume_hm3.value, year.specific_ls_km2.value) == (None, None)
    assert content.daily.extremes.year_highest.flow_m3s.value is None
    assert content.daily.extremes.year_highest.stage_m.text == "2.500"
    assert (content.figures.flow, content.figures.rating, content.uncertainty) == (None, None, ())


def test_29_february_is_compared_with_the_years_that_have_one(station, keeper):
    type_days(station, keeper, days_of_year(2020, 4.0, m02d29=6.0), first=date(2020, 1, 1))
    type_days(station, keeper, days_of_year(2023, 2.0), first=date(2023, 1, 1))
    type_days(station, keeper, days_of_year(2024, 3.0)[:60], first=date(2024, 1, 1))
    content = content_of(station, 2024)
    table, band = content.daily, content.figures.flow.earlier
    assert (table.earlier_years, table.earlier_count, table.leap_years) == ("2020–2023", 2, 1)
    february = table.months[1]
    assert (len(february.cells), february.cells[28].text) == (29, "3.00")
    # 28 February: 4 and 2 m³/s; 29 February: 2020 alone
    assert (band.lowest[58], band.median[58], band.highest[58]) == (2.0, 3.0, 4.0)
    assert (band.lowest[59], band.median[59], band.highest[59]) == (6.0, 6.0, 6.0)
    # (28·4 + 6)/29 = 4.0690 and 2 m³/s: 3.0345
    assert february.earlier_mean.text == "3.03"
    assert (february.earlier_highest.number.text, february.earlier_highest.when) == (
        "6.00", date(2020, 2, 29),
    )  # fmt: skip


def test_an_earlier_week_without_flow_is_the_lowest_week(station, keeper):
    dry = {f"m07d{day:02d}": 0.0 for day in range(10, 20)}
    type_days(station, keeper, days_of_year(2021, **dry), first=date(2021, 1, 1))
    type_days(station, keeper, days_of_year(2022), first=date(2022, 1, 1))
    type_days(station, keeper, days_of_year(2023))
    week = content_of(station).daily.earlier.lowest_seven_days
    assert (week.number.text, week.when) == ("0", date(2021, 7, 16))


def test_marks_stand_behind_the_days_and_completeness_counts_them(
    station, recorder, keeper, approver
):
    # Above 2 m the table is extrapolated, to 3 m at most.
    curve = rate(station, keeper, approver, highest_m=2.0, use={"extrapolate_high_m": 3.0})
    in_force(station, curve, keeper)
    silent = (datetime(2023, 3, 5, tzinfo=UTC), datetime(2023, 3, 7, tzinfo=UTC))
    record(
        recorder, keeper, lambda at: 2.4 if at.month == 7 and 10 <= at.day < 13 else 1.0,
        missing=lambda at: silent[0] < at < silent[1], step=HOUR,
    )  # fmt: skip
    typed_flows.type_flow(
        station=station, day=date(2023, 3, 6), flow_m3s=3.3, method="neighbour", reason="gap",
        by=keeper, at=AT,
    )  # fmt: skip
    notes.add_note(
        station=station, start_at=datetime(2023, 1, 10, tzinfo=UTC),
        end_at=datetime(2023, 1, 15, tzinfo=UTC), cause="ice", flows="withheld", by=keeper, at=AT,
        text="Closed by ice.",
    )  # fmt: skip
    content = content_of(station)
    cells = {month: content.daily.months[month - 1].cells for month in (1, 3, 7)}
    assert str(cells[3][5]) == f"3.30{SIGNS[Mark.TYPED]}"
    assert cells[3][4].marks == Mark.MISSING
    assert str(cells[7][10]) == f"7.20{SIGNS[Mark.EXTRAPOLATED]}"
    assert cells[1][9].marks == Mark.ICE_OR_BACKWATER | Mark.WITHHELD | Mark.MISSING
    counted = {row.mark: (row.days, row.year) for row in content.completeness}
    assert counted[Mark.TYPED] == ((0, 0, 1, *[0] * 9), 1)
    assert counted[Mark.WITHHELD] == ((5, *[0] * 11), 5)
    assert counted[Mark.MISSING] == ((5, 0, 1, *[0] * 9), 6)
    assert counted[Mark.EXTRAPOLATED] == ((*[0] * 6, 3, *[0] * 5), 3)
    assert counted[RECORDED][1] == 365 - 1 - 6 - 3
    assert set(SIGNS) <= set(MARK_WORDS)
    assert "Closed by ice." in content.notes
    assert "5 days are withheld: 10 to 14 January 2023 (ice)." in content.notes
    assert "1 day is estimated: 6 March 2023 (neighbour)." in content.notes
    [rating] = content.ratings
    assert (rating.label, rating.until) == ("Rating 1", None)


def test_the_volume_is_sorted_by_the_uncertainty_the_rating_states(
    rated, recorder, keeper, approver
):
    # 1 m until the end of June: a band of 3 %, and 2·0.5 % scatter: √(3² + 1²) = 3.2 %, and the
    # stage's share; 2 m in the second half: 15 %. 181 days of 3 and 184 days of 6 m³/s.
    record(recorder, keeper, lambda at: 1.0 if at.month < 7 else 2.0)
    curve = rate(
        rated, keeper, approver, number="2", band=[(0.0, 3.0), (1.0, 3.0), (2.0, 15.0)],
        use={"scatter_percent": 0.5},
    )  # fmt: skip
    in_force(rated, curve, keeper, since=datetime(2022, 1, 1, tzinfo=UTC))
    rows = {row.within_percent: row for row in content_of(rated).uncertainty}
    # 30 June ends in the step from 18:00 (1 m) to midnight (2 m): its band lies between.
    assert (rows[5].days, rows[10].days, rows[20].days, rows[None].days) == (180, 1, 184, 0)
    volume = 180 * 3.0 + (3.0 + 3.0 / 8) + 184 * 6.0
    assert rows[5].volume_percent.text == f"{100 * 540 / volume:.1f}"
    assert rows[20].volume_percent.text == f"{100 * 1104 / volume:.1f}"


def test_a_zero_moved_in_mid_year_is_told(rated, recorder, keeper, approver):
    record(recorder, keeper, lambda at: 1.0)
    curve = rate(rated, keeper, approver, number="2")
    station_zeros.set_station_zero(
        station=rated, elevation_m=412.35, datum_name="national datum", reason="weir rebuilt",
        effective_from=datetime(2023, 7, 1, tzinfo=UTC), kind=StationZero.Kind.MOVED,
        settings=[NewSetting(series=recorder, offset_m=0.5)], rating=NewRating(curve=curve),
        by=keeper, at=AT,
    )  # fmt: skip
    content = content_of(rated)
    assert (
        "On 1 July 2023 the station zero moved: weir rebuilt. Stage before and after does not "
        "compare." in content.notes
    )
    # 1.000 m before and 1.500 m after the zero went down by half a metre; the same table for both
    assert content.daily.months[5].cells[10].text == "3.00"
    assert content.daily.months[6].cells[10].text == "4.50"
    moved = datetime(2023, 7, 1, tzinfo=UTC)
    assert [(rating.label, rating.until) for rating in content.ratings] == [
        ("Rating 1", moved), ("Rating 2", None),
    ]  # fmt: skip


def test_the_published_figures_of_2020_are_those_of_the_content(station, keeper):
    """Contains information licensed under the Open Government Licence – Canada."""
    Station.objects.filter(pk=station.pk).update(catchment_km2=403.0)
    with reference_file("data/hydat_daily_flow.csv").open() as stream:
        rows = [
            (date.fromisoformat(row["date"]), float(row["flow_m3s"]))
            for row in csv.DictReader(stream)
            if row["station"] == "05AA008" and "2016" <= row["date"] < "2021" and row["flow_m3s"]
        ]
    for day, flow in rows:
        type_days(station, keeper, [flow], first=day)
    table = content_of(Station.objects.get(pk=station.pk), 2020).daily
    assert [month.mean.text for month in table.months] == [
        "1.48", "1.47", "1.26", "4.07", "15.2", "15.2", "6.40", "2.96", "1.98", "1.81", "2.03",
        "1.44",
    ]  # fmt: skip
    year = table.year
    assert year.mean.text == "4.61"
    assert (year.lowest_day.number.text, year.lowest_day.when) == ("0.944", date(2020, 11, 30))
    assert (year.highest_day.number.text, year.highest_day.when) == ("28.6", date(2020, 6, 1))
    # second implementation beside the data, not published: 361.87 mm, 11.444 l/s/km², 145.835 hm³,
    # 1.17143 m³/s over the seven days to 19 January; Q5 17.0, Q50 1.915, Q95 1.21
    assert (year.runoff_mm.text, year.specific_ls_km2.text, year.volume_hm3.text) == (
        "362", "11.4", "146",
    )  # fmt: skip
    assert (year.lowest_seven_days.number.text, year.lowest_seven_days.when) == (
        "1.17", date(2020, 1, 19),
    )  # fmt: skip
    duration = {row.percent: row.value.text for row in table.duration}
    assert (duration[5], duration[50], duration[95]) == ("17.0", "1.92", "1.21")
    assert (table.earlier_years, table.earlier_count, table.leap_years) == ("2016–2019", 4, 1)
    assert all(SIGNS[Mark.TYPED] in cell.signs for month in table.months for cell in month.cells)
