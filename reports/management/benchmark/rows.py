"""The same readings as one row each, to measure packed months against: a table of its own."""

from datetime import date

import numpy as np
import pandas as pd
from django.db import connection, models

from network.numerics.records.readings import Readings

TABLE = "benchmark_reading"
COLUMNS = {
    "postgresql": "id bigserial PRIMARY KEY, series bigint NOT NULL,"
    " at timestamptz NOT NULL, value_m double precision NOT NULL",
    "sqlite": "id integer PRIMARY KEY, series bigint NOT NULL,"
    " at datetime NOT NULL, value_m real NOT NULL",
}


class Reading(models.Model):
    """A reading as a row; the table is made and dropped by hand."""

    series = models.BigIntegerField()
    at = models.DateTimeField()
    value_m = models.FloatField()

    class Meta:
        app_label = "benchmark"
        managed = False
        db_table = TABLE

    def __str__(self) -> str:
        return f"{self.at} {self.value_m}"


def fill(readings: Readings) -> None:
    """Make the table with its index and fill it."""
    times = pd.to_datetime(readings.times_s, unit="s", utc=True)
    with connection.cursor() as cursor:
        cursor.execute(f"CREATE TABLE {TABLE} ({COLUMNS[connection.vendor]})")
        rows = zip(times.strftime("%Y-%m-%d %H:%M:%S"), readings.values_m.tolist(), strict=True)
        cursor.executemany(
            f"INSERT INTO {TABLE} (series, at, value_m) VALUES (1, %s, %s)", list(rows)
        )
        cursor.execute(f"CREATE INDEX benchmark_series_at ON {TABLE} (series, at)")


def drop() -> None:
    """Drop the table."""
    with connection.cursor() as cursor:
        cursor.execute(f"DROP TABLE {TABLE}")


def read() -> list[tuple[object, float]]:
    """Read all rows by ORM."""
    return list(Reading.objects.filter(series=1).order_by("at").values_list("at", "value_m"))


def daily_means(*, c: float, h0_m: float, b: float, first: date, days: int) -> pd.Series:
    """Rows by ORM, then rating and time-weighted daily means by pandas, by the same rule."""
    table = pd.DataFrame.from_records(read(), columns=["at", "stage_m"], index="at")
    flow = c * np.power(np.maximum(table["stage_m"] - h0_m, 0), b)
    midnights = pd.date_range(pd.Timestamp(first, tz="UTC"), periods=days + 1, freq="D")
    whole = flow.reindex(flow.index.union(midnights)).interpolate(method="time")
    seconds = whole.index.to_series().diff().dt.total_seconds()
    area = (whole + whole.shift()) / 2 * seconds
    day = (whole.index - pd.Timedelta(1, "ns")).floor("D")
    return area.groupby(day).sum() / 86_400


def table_bytes() -> int:
    """Return what the table and its indexes take on the disk."""
    return bytes_of(TABLE)


def bytes_of(table: str) -> int:
    """Return what a table takes on the disk, with its indexes and what stands beside its pages."""
    with connection.cursor() as cursor:
        if connection.vendor == "postgresql":
            cursor.execute("SELECT pg_total_relation_size(%s)", [table])
            return int(cursor.fetchone()[0])
        cursor.execute(
            "SELECT SUM(pgsize) FROM dbstat WHERE name IN"
            " (SELECT name FROM sqlite_master WHERE tbl_name = %s)",
            [table],
        )
        return int(cursor.fetchone()[0])
