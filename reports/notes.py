"""Writes the data-quality notes of a year as sentences from its facts, in the active language."""

from collections.abc import Iterator
from dataclasses import dataclass
from datetime import date

from django.utils.translation import gettext as _
from django.utils.translation import ngettext

from network.templatetags.readings import day, period
from reports.printed import NO_NUMBER, Number


@dataclass(frozen=True, kw_only=True)
class Spell:
    """Consecutive days alike; ``cause`` and ``method`` in words, ``percent`` the stated ±."""

    first: date
    last: date
    cause: str = ""
    method: str = ""
    percent: Number = NO_NUMBER

    @property
    def days(self) -> int:
        """Return how many days the spell lasts."""
        return (self.last - self.first).days + 1

    def __str__(self) -> str:
        margin = f"± {self.percent} %" if self.percent.value is not None else ""
        reasons = ", ".join(filter(None, (self.cause, self.method, margin)))
        return period(self.first, self.last) + (f" ({reasons})" if reasons else "")


@dataclass(frozen=True, kw_only=True)
class RatingUse:
    """A rating and the days of the year on which it was in force."""

    label: str
    first: date
    last: date


@dataclass(frozen=True, kw_only=True)
class ZeroChange:
    """A change of the station zero's elevation; ``moved`` when the mark itself moved."""

    on: date
    moved: bool
    reason: str


@dataclass(frozen=True, kw_only=True)
class Facts:
    """What the notes are written from; a number without value is not known and not mentioned."""

    days: int
    stage_only: bool
    missing: tuple[Spell, ...] = ()
    withheld: tuple[Spell, ...] = ()
    estimated: tuple[Spell, ...] = ()
    partial_days: int = 0
    extrapolated_days: int = 0
    extrapolated_volume_percent: Number = NO_NUMBER
    ratings: tuple[RatingUse, ...] = ()
    highest_stage_m: Number = NO_NUMBER
    highest_gauged_m: Number = NO_NUMBER
    gaugings: int = 0
    lowest_deviation_percent: Number = NO_NUMBER
    highest_deviation_percent: Number = NO_NUMBER
    zero_changes: tuple[ZeroChange, ...] = ()
    corrections: int = 0
    printed_notes: tuple[str, ...] = ()  # the record keeper's own, marked to be printed


def write(facts: Facts) -> tuple[str, ...]:
    """Return the notes in the order in which they are printed, at least one sentence."""
    sentences = [_completeness(facts), *_spells(facts)]
    if not facts.stage_only:
        sentences += [*_extrapolation(facts), _ratings(facts), _gaugings(facts)]
    return (*sentences, *_stage(facts), *facts.printed_notes)


def _completeness(facts: Facts) -> str:
    """Say how many days have a value."""
    absent = sum(spell.days for spell in (*facts.missing, *facts.withheld))
    if not absent:
        return _("Every one of the {days} days has a value.").format(days=facts.days)
    return _("{present} of {days} days have a value.").format(
        present=facts.days - absent, days=facts.days
    )


def _spells(facts: Facts) -> Iterator[str]:
    """Name the days that are missing, withheld, estimated or partly recorded."""
    if facts.missing:
        yield _listed(
            ngettext("{n} day is missing", "{n} days are missing", _n(facts.missing)), facts.missing
        )
    if facts.withheld:
        yield _listed(
            ngettext("{n} day is withheld", "{n} days are withheld", _n(facts.withheld)),
            facts.withheld,
        )
    if facts.estimated:
        yield _listed(
            ngettext("{n} day is estimated", "{n} days are estimated", _n(facts.estimated)),
            facts.estimated,
        )
    if facts.partial_days:
        yield ngettext(
            "On {n} day only part of the day was recorded; its mean is that of the recorded part.",
            "On {n} days only part of the day was recorded; the mean is that of the recorded part.",
            facts.partial_days,
        ).format(n=facts.partial_days)


def _n(spells: tuple[Spell, ...]) -> int:
    """Return the days of all spells."""
    return sum(spell.days for spell in spells)


def _listed(beginning: str, spells: tuple[Spell, ...]) -> str:
    """Return a sentence that begins with a count and lists its spells."""
    return f"{beginning.format(n=_n(spells))}: {'; '.join(map(str, spells))}."


def _extrapolation(facts: Facts) -> Iterator[str]:
    """Say on how many days, and for how much of the volume, a rating was extrapolated."""
    if facts.extrapolated_days:
        yield ngettext(
            "On {n} day the rating was extrapolated.",
            "On {n} days the rating was extrapolated.",
            facts.extrapolated_days,
        ).format(n=facts.extrapolated_days)
        if facts.extrapolated_volume_percent.value is not None:
            yield _("Extrapolated flow in the volume of the year: {percent} %.").format(
                percent=facts.extrapolated_volume_percent
            )
    highest, gauged = facts.highest_stage_m, facts.highest_gauged_m
    if highest.value is not None and gauged.value is not None and highest.value > gauged.value:
        yield _(
            "The highest stage of the year, {highest} m, lies above the highest gauging that the "
            "rating rests on, {gauged} m."
        ).format(highest=highest, gauged=gauged)


def _ratings(facts: Facts) -> str:
    """Say which ratings were used when."""
    if not facts.ratings:
        return _("No rating was in force: no flow is derived from stage.")
    uses = "; ".join(f"{use.label}, {period(use.first, use.last)}" for use in facts.ratings)
    return _("Ratings used: {uses}.").format(uses=uses)


def _gaugings(facts: Facts) -> str:
    """Say how many gaugings the year has and how far they lie from the rating."""
    if not facts.gaugings:
        return _("No gauging of the year tests the rating.")
    count = ngettext("{n} gauging was made", "{n} gaugings were made", facts.gaugings)
    low, high = facts.lowest_deviation_percent, facts.highest_deviation_percent
    if low.value is None or high.value is None:
        return count.format(n=facts.gaugings) + "."
    if low == high:
        return _("{count}; it deviates from the rating by {low} %.").format(
            count=count.format(n=facts.gaugings), low=low
        )
    return _("{count}; they deviate from the rating by {low} to {high} %.").format(
        count=count.format(n=facts.gaugings), low=low, high=high
    )


def _stage(facts: Facts) -> Iterator[str]:
    """Say what became of the station zero and how often the recorded stage was corrected."""
    if not facts.zero_changes:
        yield _("The station zero was the same all year.")
    for change in facts.zero_changes:
        sentence = (
            _("On {day} the station zero moved: {reason}. Stage before and after does not compare.")
            if change.moved
            else _(
                "On {day} the elevation of the station zero was determined anew: {reason}. "
                "The mark did not move and no stage changed."
            )
        )
        yield sentence.format(day=day(change.on), reason=change.reason)
    if facts.corrections:
        yield ngettext(
            "{n} correction was applied to the recorded stage.",
            "{n} corrections were applied to the recorded stage.",
            facts.corrections,
        ).format(n=facts.corrections)
