"""One yearbook costs little more than the renderer's own work on the finished page."""

import statistics
import time

import weasyprint
from weasyprint.text.fonts import FontConfiguration

from reports import rendering
from tests.reports import sample

HOLD = 1.4  # speed.md: one yearbook, CPU, against WeasyPrint on the same finished HTML


def cpu_seconds(work) -> float:
    """Return the CPU seconds of one call."""
    begun = time.process_time()
    work()
    return time.process_time() - begun


def plain(page: rendering.Page) -> bytes:
    """Render a finished page as anyone would who renders one."""
    fonts = FontConfiguration()
    fetcher = rendering.OwnFetcher(page.figures)
    sheets = [
        weasyprint.CSS(string=text, font_config=fonts, url_fetcher=fetcher)
        for text in rendering.stylesheet_texts()
    ]
    return weasyprint.HTML(string=page.html, url_fetcher=fetcher).write_pdf(
        stylesheets=sheets, font_config=fonts, pdf_variant="pdf/ua-1"
    )


def test_a_yearbook_costs_at_most_1_4_times_the_rendering_of_its_page():
    book = sample.stage_station()
    page = rendering.finished_page(book)
    rendering.render(book, csv=b"")  # parses the sheets, loads the fonts
    whole, bare = [], []
    for _ in range(3):
        whole.append(cpu_seconds(lambda: rendering.render(book, csv=b"")))
        bare.append(cpu_seconds(lambda: plain(page)))
    assert statistics.median(whole) / statistics.median(bare) <= HOLD
