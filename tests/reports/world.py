"""Rows behind yearbooks: a rated station and a stage-only one, a year of readings each."""

import hashlib
import io
from datetime import UTC, datetime, timedelta

import pikepdf

from network.models import Station
from network.services import ratings
from tests.records import AT, make_profile, make_series, make_station, take

YEAR = 2023
FIRST = datetime(2022, 12, 31, tzinfo=UTC)


def a_year_of_readings(*, missing_from=None, missing_to=None):
    """Write six-hourly stages over 2023, one a metre higher in May, as a logger file."""
    lines = ["time,level"]
    for n in range(4 * 367):
        at = FIRST + n * timedelta(hours=6)
        if missing_from and missing_from <= at < missing_to:
            continue
        stage_m = 1 + (n % 40) / 100 + (1 if at.month == 5 else 0)
        lines.append(f"{at:%Y-%m-%d %H:%M},{stage_m:.3f}")
    return "\n".join(lines) + "\n"


def make_flow_station(keeper, approver, code="QA-010", **gap):
    """Make a station with a year of stage, its gap limit at ten hours, and a table in force."""
    station = make_station(code)
    station.catchment_km2 = 80.0
    station.save()
    recorder = make_series(keeper, station)
    profile = make_profile(keeper, name=code)
    take(a_year_of_readings(**gap), series=recorder, profile=profile, by=keeper)
    recorder.gap_limit_minutes = 600
    recorder.save()
    curve = ratings.draft(
        station=station, number="1",
        relation=ratings.Relation(points=[(0.0, 0.0), (1.0, 2.0), (3.0, 30.0)], form="linear"),
        use=ratings.Use(lowest_use_m=0.0, highest_use_m=3.0), reason="test", by=keeper, at=AT,
    )  # fmt: skip
    ratings.approve(curve=curve, by=approver, at=AT)
    ratings.put_in_force(
        station=station, curve=curve, effective_from=FIRST, reason="test", by=keeper, at=AT
    )
    return Station.objects.get(pk=station.pk)


def make_stage_station(keeper, code="QA-020"):
    """Make a station whose stage is what is published."""
    station = make_station(code)
    station.kind = Station.Kind.STAGE_ONLY
    station.save()
    recorder, profile = make_series(keeper, station), make_profile(keeper, name=code)
    take(a_year_of_readings(), series=recorder, profile=profile, by=keeper)
    recorder.gap_limit_minutes = 600
    recorder.save()
    return station


def small_pdf(book, *, csv):
    """Stand in for the slow printer: two pages, a bookmark, the data attached, by content alone."""
    text = hashlib.sha256(repr((book.edition, book.title)).encode()).hexdigest()
    with pikepdf.new() as pdf:
        for _page in range(2):
            page = pdf.add_blank_page()
            page.contents_add(f"% {text}".encode())
        with pdf.open_outline() as outline:
            outline.root.append(pikepdf.OutlineItem("Daily values", 1, "XYZ", top=700))
        name = f"{book.station.code}_daily.csv"
        pdf.attachments[name] = pikepdf.AttachedFileSpec(
            pdf, csv, filename=name, creation_date="D:20240101000000Z",
            mod_date="D:20240101000000Z",
        )  # fmt: skip
        out = io.BytesIO()
        pdf.save(out, deterministic_id=True)
    return out.getvalue()
