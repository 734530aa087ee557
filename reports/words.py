"""The words of the figures and the sentences that say what each of them shows."""

from dataclasses import dataclass

from django.utils.dates import MONTHS_3
from django.utils.translation import gettext as _
from django.utils.translation import gettext_lazy, ngettext

from network.numerics.marks import Mark
from network.numerics.printing import ABSENT
from network.templatetags.readings import day, moment
from reports.figures.inputs import Words
from reports.printed import RECORDED, SIGNS
from reports.yearbook import Yearbook

MARK_WORDS = {
    RECORDED: gettext_lazy("recorded"),
    Mark.ESTIMATED: gettext_lazy("estimated"),
    Mark.PARTIAL: gettext_lazy("from part of the day"),
    Mark.EXTRAPOLATED: gettext_lazy("rating extrapolated"),
    Mark.ICE_OR_BACKWATER: gettext_lazy("ice or backwater"),
    Mark.TYPED: gettext_lazy("entered by hand"),
    Mark.WITHHELD: gettext_lazy("withheld"),
    Mark.MISSING: gettext_lazy("missing"),
}


@dataclass(frozen=True)
class Explained:
    """A mark with its sign and its words; ``days`` and ``year`` when counted."""

    sign: str
    words: str
    days: tuple[int, ...] = ()
    year: int = 0


def legend(marks: Mark) -> list[Explained]:
    """Return the explanations of the signs among the given marks, the dash for a missing day."""
    return [
        Explained(SIGNS.get(mark, ABSENT), str(text))
        for mark, text in MARK_WORDS.items()
        if mark and mark in marks
    ]


def completeness(book: Yearbook) -> list[Explained]:
    """Return the rows of the completeness table with their signs and words."""
    return [
        Explained(SIGNS.get(row.mark, ""), str(MARK_WORDS[row.mark]), days=row.days, year=row.year)
        for row in book.completeness
    ]


def figure_words(book: Yearbook) -> Words:
    """Return every word the figures print, in the active language."""
    return Words(
        decimal_sign=book.agency.decimal_sign,
        months=tuple(str(MONTHS_3[number]).capitalize() for number in range(1, 13)),
        flow_axis=_("Flow, m³/s"),
        stage_axis=_("Stage, m"),
        percent_axis=_("Days on which the value is reached or exceeded, %"),
        estimated=_("estimated"),
        missing=_("missing"),
        gauging=_("gauging"),
        reading=_("staff reading"),
        extreme_range=_("lowest to\nhighest,\n{years}\n({count} years)"),
        middle_half=_("middle half"),
        median=_("median"),
        daily_range=_("range of the day"),
        this_year=book.year.label,
        earlier="{years}",
        band=_("95 % band"),
        extrapolated=_("extrapolated"),
        gauging_in_year=_("gauging of\nthe year, ± U"),
        gauging_before=_("gauging before"),
        north=_("N"),
        year_highest=_("highest of the year"),
        year_lowest=_("lowest of the year"),
        cease_to_flow=_("flow ceases"),
        log_axes=_("Stage, m (logarithmic axes)"),
        plain_axes=_("Stage, m (plain axes)"),
    )


def descriptions(book: Yearbook) -> dict[str, str]:
    """Return the alternative text of every figure by its name: what it shows, in sentences."""
    year, extremes = book.year.label, book.daily.extremes
    earlier = book.daily.earlier_years
    with_earlier = (
        " " + _("Behind it the range of {years}.").format(years=earlier) if earlier else ""
    )
    return {
        "sketch": _(
            "Sketch map: {station} on the {river}, at {place}, among its neighbours."
        ).format(
            station=book.station.name, river=book.station.river, place=book.station.coordinates
        ),
        "plates": _("The plates of the staff gauge drawn to scale: {plates}.").format(
            plates=", ".join(
                f"{plate.label} {plate.lowest_m.text}–{plate.highest_m.text} m"
                for plate in book.plates
            )
        ),
        "flow": _(
            "Hydrograph of daily mean flow in {year}: highest {highest} m³/s on {high_day}, "
            "lowest {lowest} m³/s on {low_day}."
        ).format(
            year=year,
            highest=book.daily.year.highest_day.number.text,
            high_day=day(book.daily.year.highest_day.when),
            lowest=book.daily.year.lowest_day.number.text,
            low_day=day(book.daily.year.lowest_day.when),
        )
        + with_earlier,
        "stage": _(
            "Hydrograph of stage in {year}: highest {highest} m on {high}, "
            "lowest {lowest} m on {low}."
        ).format(
            year=year,
            highest=extremes.year_highest.stage_m.text,
            high=moment(extremes.year_highest.at),
            lowest=extremes.year_lowest.stage_m.text,
            low=moment(extremes.year_lowest.at),
        ),
        "duration": _("Duration curve of {year}: {points}.").format(
            year=year,
            points="; ".join(f"{row.percent} % {row.value.text}" for row in book.daily.duration),
        ),
        "rating": _(
            "Stage and flow on logarithmic and on plain axes: {ratings}, with {count}."
        ).format(
            ratings=", ".join(rating.label for rating in book.ratings),
            count=ngettext(
                "{count} gauging of the year", "{count} gaugings of the year", len(book.gaugings)
            ).format(count=len(book.gaugings)),
        ),
    }
