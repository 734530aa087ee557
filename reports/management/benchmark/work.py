"""The work-due page against a page of the same rows read from a stored column."""

import io
from collections import Counter
from collections.abc import Iterator
from contextlib import contextmanager
from dataclasses import asdict, replace
from datetime import date
from typing import Any

from django.core.management import call_command
from django.db import connection
from django.test import Client
from django.test.utils import CaptureQueriesContext
from django.urls import reverse
from django.utils import timezone

from network.models import Person
from network.queries.work_due import work_list
from network.queries.work_due.items import Kind
from network.queries.work_due.work_list import Line, WorkList
from reports.management.benchmark.place import PERSON
from reports.management.benchmark.timing import Ratio, medians, milliseconds

HOLD, MOST_QUERIES = 3.0, 15
COLUMNS = (
    "kind", "key", "subject", "station", "place", "river", "office", "since", "due_on",
    "days_late", "reason", "is_urgent",
)  # fmt: skip
TABLE = "stored_work"


def ratios(*, runs: int, **size: int) -> Iterator[Ratio]:
    """Yield the ratio of times and the number of queries, on a network made in this database.

    size: stations, instruments, visits, gaugings; those of the house's promise unless given.
    """
    call_command("generate_work", by=PERSON, stdout=io.StringIO(), **size)
    with connection.cursor() as cursor:
        # As the database of a running network is: PostgreSQL's own housekeeping, done once.
        cursor.execute("VACUUM ANALYZE" if connection.vendor == "postgresql" else "ANALYZE")
    yield from measure(runs=runs)


def measure(*, runs: int) -> Iterator[Ratio]:
    """Yield the same on the network that is there; the page is asked for as its manager sees it."""
    client = Client(SERVER_NAME="localhost")
    person = Person.objects.get(username=PERSON)
    Person.objects.filter(pk=person.pk).update(is_staff=True, is_superuser=True)
    client.force_login(person, backend="django.contrib.auth.backends.ModelBackend")
    whole = work_list.work_list(timezone.now(), per_page=None)
    _store(whole)

    def page() -> None:
        response = client.get(reverse("admin:index"))
        if response.status_code != 200:
            raise RuntimeError(f"The page answered {response.status_code}.")

    def stored() -> None:
        with _answered_by(whole):
            page()

    taken = medians({"computed": page, "stored": stored}, runs=runs)
    with CaptureQueriesContext(connection) as made:
        page()
    what = f"work due, {whole.total} lines, against a stored column"
    yield Ratio(what, taken.ratio("computed", "stored"), HOLD, remark=milliseconds(**taken))
    yield Ratio("queries of the work-due page", len(made), MOST_QUERIES, unit="")


def _store(whole: WorkList) -> None:
    """Keep the lines in a table with an index on what orders them."""
    types = {"key": "bigint", "station": "bigint", "since": "date", "due_on": "date",
             "days_late": "integer", "is_urgent": "boolean"}  # fmt: skip
    columns = ", ".join(f'"{name}" {types.get(name, "text")}' for name in COLUMNS)
    marks = ", ".join(["%s"] * (len(COLUMNS) + 1))
    with connection.cursor() as cursor:
        cursor.execute(f"DROP TABLE IF EXISTS {TABLE}")
        cursor.execute(f'CREATE TABLE {TABLE} ("place_in_list" integer, {columns})')
        cursor.executemany(
            f"INSERT INTO {TABLE} VALUES ({marks})",
            [(n, *_values(line)) for n, line in enumerate(whole.lines)],
        )
        cursor.execute(f"CREATE INDEX {TABLE}_order ON {TABLE} (place_in_list)")
        cursor.execute("ANALYZE")


def _values(line: Line) -> list[Any]:
    told = {**asdict(replace(line, postponed=None)), "kind": line.kind.value}
    return [told[name] for name in COLUMNS]


@contextmanager
def _answered_by(whole: WorkList) -> Iterator[None]:
    """Let the page read its lines, counts and choices from the table for a while."""
    computed = work_list.work_list
    work_list.work_list = lambda *_asked, **_told: _read(whole)
    try:
        yield
    finally:
        work_list.work_list = computed


def _read(whole: WorkList) -> WorkList:
    """Read a page of lines, the counts by kind and the choices of the filters."""
    named = ", ".join(f'"{name}"' for name in COLUMNS)
    size = work_list.PER_PAGE
    with connection.cursor() as cursor:
        cursor.execute(f"SELECT {named} FROM {TABLE} ORDER BY place_in_list LIMIT %s", [size])
        lines = tuple(_line(row) for row in cursor.fetchall())
        cursor.execute(f"SELECT kind, count(*) FROM {TABLE} GROUP BY kind")
        counts = Counter({Kind(kind): count for kind, count in cursor.fetchall()})
        cursor.execute(f"SELECT DISTINCT river FROM {TABLE} ORDER BY river")
        rivers = tuple(river for (river,) in cursor.fetchall())
    return replace(whole, lines=lines, counts=counts, rivers=rivers)


def _line(row: tuple[Any, ...]) -> Line:
    told = dict(zip(COLUMNS, row, strict=True))
    told["kind"], told["is_urgent"] = Kind(told["kind"]), bool(told["is_urgent"])
    for name in ("since", "due_on"):
        if isinstance(told[name], str):  # SQLite keeps a day as text
            told[name] = date.fromisoformat(told[name])
    return Line(**told)
