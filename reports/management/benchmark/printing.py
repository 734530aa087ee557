"""Ratios of print: one yearbook, memory over many, binding ready PDFs."""

import io
import time
from collections.abc import Iterator
from concurrent.futures import ProcessPoolExecutor
from datetime import date
from multiprocessing import get_context
from pathlib import Path

import django
import pikepdf
import weasyprint
from django.core.management import call_command
from weasyprint.text.fonts import FontConfiguration

from network.models import Agency, Station
from reports import particulars, rendering, volumes
from reports.content import book
from reports.management.benchmark.records import LAST_YEAR
from reports.management.benchmark.timing import Ratio, medians, milliseconds, resident_mb
from reports.models import Edition

EARLY = 5  # yearbooks after which the fonts and sheets are there
STATIONS = 200  # of the volume


def ratios(folder: Path, *, runs: int, yearbooks: int) -> Iterator[Ratio]:
    """Measure print on the one station of the database."""
    station = Station.objects.get()
    edition = particulars.Edition(number=1, compiled_on=date(2025, 1, 1))
    call_command("recompute_years", verbosity=0, stdout=io.StringIO())

    def whole() -> bytes:
        content, values = book.compile_book(station, LAST_YEAR, edition=edition)
        return rendering.render(content, csv=values)

    page = rendering.finished_page(book.compile_book(station, LAST_YEAR, edition=edition)[0])
    taken = medians(
        {"whole": whole, "bare": lambda: _plain(page)}, runs=runs, clock=time.process_time
    )
    yield Ratio(
        "one yearbook, CPU, to WeasyPrint on the same finished HTML",
        taken.ratio("whole", "bare"),
        1.4,
        remark=milliseconds(all=taken["whole"], WeasyPrint=taken["bare"]),
    )
    done = 2 * runs + 2  # as many were rendered before
    early = resident_mb() if done >= EARLY else 0.0
    for _turn in range(yearbooks - done):
        whole()
    yield Ratio(
        f"memory after {max(yearbooks, done)} yearbooks, above that after {done}",
        resident_mb() - early,
        5,
        unit="MB",
    )
    path = folder / "yearbook.pdf"
    path.write_bytes(whole())
    with ProcessPoolExecutor(1, mp_context=get_context("spawn"), initializer=django.setup) as pool:
        seconds, peak_mb = pool.submit(bind_copies, path).result()
    yield Ratio(
        f"compiling {STATIONS} yearbooks, to binding them ready, CPU",
        taken["whole"] * STATIONS / seconds,
        50,
        at_least=True,
        remark=milliseconds(binding=seconds),
    )
    yield Ratio("peak memory of binding", peak_mb, 300, unit="MB")


def bind_copies(path: Path) -> tuple[float, float]:
    """Bind many copies of one PDF; return CPU seconds and the process's peak in MB."""
    with pikepdf.open(path) as document:
        pages = len(document.pages)
    first, last = date(LAST_YEAR, 1, 1), date(LAST_YEAR, 12, 31)
    parts = []
    for number in range(1, STATIONS + 1):
        station = Station(
            code=f"S-{number:03}", name=f"Ford {number}", river="Generated",
            latitude_deg=50 + number % 20 / 10, longitude_deg=10 + number / 100,
        )  # fmt: skip
        edition = Edition(station=station, first_day=first, last_day=last, year_label="2024")
        parts.append(volumes.Part(number, edition, str(path), pages, number * pages, "m³/s"))
    begun = time.process_time()
    agency = Agency(name="Benchmark")
    with path.with_name("volume.pdf").open("w+b") as out:
        volumes.write(parts, out, title="Benchmark", agency=agency, bound_on=last)
    return time.process_time() - begun, resident_mb(peak=True)


def _plain(page: rendering.Page) -> bytes:
    """Render a finished page as anyone would who renders one."""
    fonts, fetcher = FontConfiguration(), rendering.OwnFetcher(page.figures)
    sheets = [
        weasyprint.CSS(string=text, font_config=fonts, url_fetcher=fetcher)
        for text in rendering.stylesheet_texts()
    ]
    return weasyprint.HTML(string=page.html, url_fetcher=fetcher).write_pdf(
        stylesheets=sheets, font_config=fonts, pdf_variant="pdf/ua-1"
    )
