"""Days and hours found by the database itself, so that lists of thousands stay quick."""

from datetime import date
from typing import Any

from django.db.models import Field, FloatField, Func
from django.db.models.expressions import Combinable

from network.models import Agency


class AsFound(Field):
    """A whole number as the database gives it: converting thousands takes longer than finding them.

    It stands in queries only, in no model.
    """


class DayNumber(Func):
    """A date as a number; `day` makes a date of it again."""

    output_field = AsFound()
    date_on_sqlite, date_on_postgresql = "%(expressions)s", "(%(expressions)s)"

    def as_sqlite(self, compiler: Any, connection: Any, **context: Any) -> Any:
        """Write it for SQLite, which keeps dates as text; 1721424.5 ends before day 1."""
        template = f"CAST(julianday({self.date_on_sqlite}) - 1721424.5 AS integer)"
        return self.as_sql(compiler, connection, template=template, **context)

    def as_postgresql(self, compiler: Any, connection: Any, **context: Any) -> Any:
        """Write it for PostgreSQL."""
        template = f"({self.date_on_postgresql} - date '0001-01-01' + 1)"
        return self.as_sql(compiler, connection, template=template, **context)


class RecordDay(DayNumber):
    """The record day of an expression of instants, as a number; see queries.clock.record_day."""

    date_on_sqlite = "%(expressions)s, '%(ahead)d minutes', 'start of day'"
    date_on_postgresql = (
        "((%(expressions)s) AT TIME ZONE 'UTC' + interval '%(ahead)d minutes')::date"
    )

    def __init__(self, instant: Combinable | str, *, of: Agency) -> None:
        ahead = of.record_utc_offset_minutes - 60 * of.day_starts_at_hour
        super().__init__(instant, ahead=ahead)


class Negative(Func):
    """A day's number below zero: told apart without a second column, a look-up more a row."""

    output_field = AsFound()
    template = "(-(%(expressions)s))"


def day(number: int | None) -> date | None:
    """Return the date of a day's number."""
    return None if number is None else date.fromordinal(number)


class HoursBetween(Func):
    """The hours from one expression of instants to another."""

    arity = 2
    output_field = FloatField()

    def as_sqlite(self, compiler: Any, connection: Any, **context: Any) -> Any:
        """Write it for SQLite, by julian days."""
        return self._difference(compiler, connection, "(julianday({1}) - julianday({0})) * 24")

    def as_postgresql(self, compiler: Any, connection: Any, **context: Any) -> Any:
        """Write it for PostgreSQL."""
        return self._difference(compiler, connection, "EXTRACT(EPOCH FROM {1} - {0}) / 3600")

    def _difference(self, compiler: Any, connection: Any, template: str) -> Any:
        start, end = (compiler.compile(part) for part in self.get_source_expressions())
        # The end is written first.
        return template.format(start[0], end[0]), [*end[1], *start[1]]
