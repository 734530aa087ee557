"""The data-quality notes say what the facts say, and nothing of what is not known."""

from datetime import date

from django.utils import translation

from reports import notes
from reports.printed import Number

WHOLE = notes.Facts(
    days=366,
    stage_only=False,
    ratings=(notes.RatingUse(label="Rating 3", first=date(2019, 10, 1), last=date(2020, 9, 30)),),
)


def spell(first: str, last: str, **more) -> notes.Spell:
    return notes.Spell(first=date.fromisoformat(first), last=date.fromisoformat(last), **more)


def test_a_whole_year_says_so_and_names_its_rating():
    assert notes.write(WHOLE) == (
        "Every one of the 366 days has a value.",
        "Ratings used: Rating 3, 1 October 2019 to 30 September 2020.",
        "No gauging of the year tests the rating.",
        "The station zero was the same all year.",
    )


def test_missing_and_withheld_days_are_counted_and_named_with_their_cause():
    facts = notes.Facts(
        days=365,
        stage_only=True,
        missing=(
            spell("2021-06-08", "2021-06-12", cause="battery"),
            spell("2021-07-01", "2021-07-01"),
        ),
        withheld=(spell("2021-01-30", "2021-02-02", cause="ice"),),
    )
    assert notes.write(facts)[:3] == (
        "355 of 365 days have a value.",
        "6 days are missing: 8 to 12 June 2021 (battery); 1 July 2021.",
        "4 days are withheld: 30 January to 2 February 2021 (ice).",
    )


def test_an_estimate_states_cause_method_and_margin():
    ice = spell(
        "2019-12-30",
        "2020-01-02",
        cause="ice",
        method="winter ratio",
        percent=Number(25.0, "25"),
    )
    facts = notes.Facts(days=366, stage_only=True, estimated=(ice,))
    assert (
        "4 days are estimated: 30 December 2019 to 2 January 2020 (ice, winter ratio, ± 25 %)."
        in notes.write(facts)
    )


def test_extrapolation_is_given_with_its_share_of_the_volume():
    facts = notes.Facts(
        days=365,
        stage_only=False,
        extrapolated_days=2,
        extrapolated_volume_percent=Number(3.1, "3.1"),
        highest_stage_m=Number(2.98, "2.98"),
        highest_gauged_m=Number(2.4, "2.40"),
    )
    sentences = notes.write(facts)
    assert "On 2 days the rating was extrapolated." in sentences
    assert "Extrapolated flow in the volume of the year: 3.1 %." in sentences
    assert any("2.98 m, lies above the highest gauging" in sentence for sentence in sentences)
    assert "No rating was in force: no flow is derived from stage." in sentences


def test_gaugings_state_the_reach_of_their_deviations():
    low, high = Number(-3.4, "−3.4"), Number(2.9, "+2.9")
    facts = notes.Facts(
        days=365,
        stage_only=False,
        gaugings=7,
        lowest_deviation_percent=low,
        highest_deviation_percent=high,
    )
    expected = "7 gaugings were made; they deviate from the rating by −3.4 to +2.9 %."
    assert expected in notes.write(facts)


def test_a_moved_zero_is_told_apart_from_one_determined_anew():
    moved = notes.ZeroChange(on=date(2020, 5, 4), moved=True, reason="new sill")
    anew = notes.ZeroChange(on=date(2020, 6, 1), moved=False, reason="new levelling")
    facts = notes.Facts(days=366, stage_only=True, zero_changes=(moved, anew), corrections=1)
    first, second, third = notes.write(facts)[1:]
    assert first.startswith("On 4 May 2020 the station zero moved: new sill.")
    assert "The mark did not move and no stage changed." in second
    assert third == "1 correction was applied to the recorded stage."


def test_notes_come_in_the_language_of_print():
    with translation.override("de"):
        sentences = notes.write(
            notes.Facts(days=366, stage_only=True, missing=(spell("2020-06-08", "2020-06-12"),))
        )
    assert sentences[:2] == (
        "361 von 366 Tagen haben einen Wert.",
        "5 Tage fehlen: 8. bis 12. Juni 2020.",
    )
