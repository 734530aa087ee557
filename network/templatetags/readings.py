"""Turns numbers and times into text, one way for every screen and print; templates format nothing.

Numbers take the decimal sign and the rounding of ``agency`` in the context, times are shown in the
active zone, which is the record clock.
"""

from datetime import date, datetime

from django import template
from django.template import Context
from django.utils import dateformat
from django.utils.translation import gettext, pgettext

from network.numerics.printing import ABSENT, figures_text, fixed_text

register = template.Library()


def _decimal_sign(context: Context) -> str:
    """Return the agency's decimal sign, a point before the agency is set up."""
    return getattr(context.get("agency"), "decimal_sign", ".")


@register.simple_tag(takes_context=True)
def flow(context: Context, value: float | None) -> str:
    """Write a flow, volume or runoff with the agency's significant figures."""
    agency = context.get("agency")
    return figures_text(
        value,
        decimal_sign=_decimal_sign(context),
        figures=getattr(agency, "significant_figures", 3),
        max_decimals=getattr(agency, "max_decimals", 3),
    )


@register.simple_tag(takes_context=True)
def stage(context: Context, value: float | None) -> str:
    """Write a stage or an elevation in metres to the millimetre."""
    return fixed_text(value, decimals=3, decimal_sign=_decimal_sign(context))


@register.simple_tag(takes_context=True)
def fixed(context: Context, value: float | None, decimals: int) -> str:
    """Write a number with so many decimals."""
    return fixed_text(value, decimals=decimals, decimal_sign=_decimal_sign(context))


@register.simple_tag(takes_context=True)
def change(context: Context, value: float | None, decimals: int) -> str:
    """Write a difference with its sign, plus or minus."""
    return fixed_text(value, decimals=decimals, decimal_sign=_decimal_sign(context), plus=True)


def _written(when: date | datetime | None, pattern: str) -> str:
    """Write a day or an instant by a pattern of the active language, a dash for none."""
    return ABSENT if when is None else dateformat.format(when, pattern)


@register.filter(expects_localtime=True)
def day(when: date | datetime | None) -> str:
    """Write "3 March 2020"."""
    return _written(when, pgettext("date pattern: day, month, year", "j F Y"))


@register.filter(expects_localtime=True)
def short_day(when: date | datetime | None) -> str:
    """Write "3 Mar 2020"."""
    return _written(when, pgettext("date pattern: short day, month, year", "j M Y"))


@register.filter(expects_localtime=True)
def day_of_year(when: date | datetime | None) -> str:
    """Write "3 Mar"; the year is said elsewhere."""
    return _written(when, pgettext("date pattern: day and short month", "j M"))


@register.filter(expects_localtime=True)
def moment(when: date | datetime | None) -> str:
    """Write "3 Mar 2020 14:05"; a bare day is written without a time."""
    if isinstance(when, datetime):
        return _written(when, pgettext("date pattern: short day and time", "j M Y H:i"))
    return short_day(when)


@register.filter(expects_localtime=True)
def month(when: date | datetime | None) -> str:
    """Write "Mar"."""
    return _written(when, "M")


def period(first: date, last: date) -> str:
    """Write "3 March 2020", "3 to 9 March 2020" or longer, naming no month or year twice."""
    if first == last:
        return day(first)
    if (first.year, first.month) == (last.year, last.month):
        pattern = pgettext("date pattern: day of the month alone", "j")
    elif first.year == last.year:
        pattern = pgettext("date pattern: day and month", "j F")
    else:
        return gettext("{first} to {last}").format(first=day(first), last=day(last))
    return gettext("{first} to {last}").format(first=_written(first, pattern), last=day(last))
