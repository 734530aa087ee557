"""Days and hours found by the database itself, so that lists of thousands stay quick."""

from typing import Any

from django.db.models import DateField, FloatField, Func
from django.db.models.expressions import Combinable

from network.models import Agency


class RecordDay(Func):
    """The record day of an expression of instants; see queries.clock.record_day."""

    output_field = DateField()

    def __init__(self, instant: Combinable | str, *, of: Agency) -> None:
        ahead = of.record_utc_offset_minutes - 60 * of.day_starts_at_hour
        super().__init__(instant, ahead=ahead)

    def as_sqlite(self, compiler: Any, connection: Any, **context: Any) -> Any:
        """Write it for SQLite, which keeps instants as text in UTC."""
        template = "date(%(expressions)s, '%(ahead)d minutes')"
        return self.as_sql(compiler, connection, template=template, **context)

    def as_postgresql(self, compiler: Any, connection: Any, **context: Any) -> Any:
        """Write it for PostgreSQL."""
        template = "((%(expressions)s) AT TIME ZONE 'UTC' + interval '%(ahead)d minutes')::date"
        return self.as_sql(compiler, connection, template=template, **context)


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
