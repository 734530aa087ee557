"""Content and figures become HTML, then PDF bytes; nothing is fetched from outside."""

import functools
import hashlib
import operator
import threading
from collections.abc import Callable
from dataclasses import dataclass
from datetime import UTC, datetime
from io import BytesIO
from pathlib import Path
from typing import Any

import pikepdf
import weasyprint
from django.contrib.staticfiles import finders
from django.template.loader import render_to_string
from django.utils import timezone, translation
from django.utils.translation import gettext as _
from pikepdf import Name
from weasyprint.text.fonts import FontConfiguration
from weasyprint.urls import FatalURLFetchingError, URLFetcher, URLFetcherResponse

from network.numerics.marks import Mark
from reports import daily_layout, words
from reports.figures import duration, hydrograph, plates, rating_plot, sketch, stage_hydrograph
from reports.figures.style import FONT_FILES
from reports.printed import RECORDED
from reports.yearbook import Yearbook

STYLESHEETS = (
    "network/css/tokens.css",
    "reports/print/fonts.css",
    "reports/print/page.css",
    "reports/print/tables.css",
    "reports/print/volume.css",
)
ALL_MARKS = functools.reduce(operator.or_, Mark)
# The font map and the parsed sheets belong to the process: one document at a time.
_one_at_a_time = threading.Lock()


@dataclass(frozen=True)
class Page:
    """The finished HTML and the figures it names, as SVG text by name."""

    html: str
    figures: dict[str, str]


class OwnFetcher(URLFetcher):
    """Hands out the figures of one page and the installed fonts, and refuses everything else."""

    def __init__(self, figures: dict[str, str]) -> None:
        super().__init__(allowed_protocols=())
        self._figures = figures

    def fetch(self, url: str, headers: dict[str, str] | None = None) -> URLFetcherResponse:
        """Return what stands under ``figure:name`` or ``font:weight``."""
        scheme, _colon, name = url.partition(":")
        if scheme == "figure" and name in self._figures:
            return _response(url, self._figures[name].encode(), "image/svg+xml")
        if scheme == "font" and name.isdigit() and int(name) in FONT_FILES:
            return _response(url, FONT_FILES[int(name)].read_bytes(), "font/ttf")
        raise FatalURLFetchingError(f"The yearbook fetches nothing from outside: {url}")


def _response(url: str, body: bytes, kind: str) -> URLFetcherResponse:
    return URLFetcherResponse(url, body, {"Content-Type": kind})


def render(book: Yearbook, *, csv: bytes) -> bytes:
    """Return the yearbook as PDF/UA with the daily values attached.

    The same content and CSV give the same bytes, whenever and wherever they are made.
    """
    return to_pdf(finished_page(book), book=book, csv=csv)


def finished_page(book: Yearbook) -> Page:
    """Return the yearbook's HTML and figures, in its language and on its clock."""
    with translation.override(book.language), timezone.override(book.agency.record_clock):
        table = daily_layout.lay_out(book.daily.months, decimal_sign=book.agency.decimal_sign)
        context = {
            "book": book,
            "agency": book.agency,
            "station": book.station,
            "daily": book.daily,
            "alt": words.descriptions(book),
            "days": table.days,
            "below": table.below,
            "marks": words.legend(_marks_printed(book)),
            "legend": words.legend(ALL_MARKS),
            "completeness": words.completeness(book),
            "attachment": attachment_name(book),
            "created": _edition_time(book).date().isoformat(),
            "unit": "m" if book.station.stage_only else "m³/s",
        }
        return Page(render_to_string("reports/yearbook.html", context), draw_figures(book))


def draw_figures(book: Yearbook) -> dict[str, str]:
    """Return the figures that the content has arrays for, as SVG text by name."""
    printed = words.figure_words(book)
    drawn: dict[str, tuple[Callable[..., str], Any]] = {
        "sketch": (sketch.draw, book.figures.sketch),
        "plates": (plates.draw, book.figures.plates),
        "flow": (hydrograph.draw, book.figures.flow),
        "stage": (stage_hydrograph.draw, book.figures.stage),
        "duration": (duration.draw, book.figures.duration),
        "rating": (rating_plot.draw, book.figures.rating),
    }
    return {
        name: draw(arrays, printed) for name, (draw, arrays) in drawn.items() if arrays is not None
    }


def to_pdf(page: Page, *, book: Yearbook, csv: bytes) -> bytes:
    """Return a finished page as PDF bytes; identifier and dates come from the edition alone."""
    at = _edition_time(book)
    name = attachment_name(book)
    with translation.override(book.language):
        described = _("Daily values")
    attachment = weasyprint.Attachment(
        string=csv,
        name=name,
        description=described,
        created=at,
        modified=at,
        relationship="Data",
    )
    return write_pdf(page, identity=f"{name} {book.edition}", attachments=[attachment])


def write_pdf(page: Page, *, identity: str, **options: Any) -> bytes:
    """Return a finished page as tagged PDF; the same page and identity give the same bytes."""
    with _one_at_a_time:
        sheets, fonts = stylesheets()
        document = weasyprint.HTML(string=page.html, url_fetcher=OwnFetcher(page.figures))
        pdf = document.write_pdf(
            stylesheets=sheets,
            font_config=fonts,
            pdf_variant="pdf/ua-1",
            pdf_identifier=hashlib.sha256(identity.encode()).digest()[:16],
            finisher=add_scopes,
            **options,
        )
    return _written_anew(pdf)


def _written_anew(pdf: bytes) -> bytes:
    """Write WeasyPrint's PDF in object streams of a hundred, the texts of figures as plain forms.

    Its one stream of objects must be read whole before the first page, and each text of a figure
    has resources of its own: a volume of 200 would open each part for fifteen times as long and
    take twice the memory. And each such text is a transparency group, of which a browser at screen
    size cuts off a part of the first letter.
    """
    written, shared = BytesIO(), dict[bytes, pikepdf.Object]()
    with pikepdf.open(BytesIO(pdf)) as document:
        for one in document.objects:
            if isinstance(one, pikepdf.Stream) and Name.Resources in one:
                resources = one.Resources
                one.Resources = shared.setdefault(resources.unparse(resolved=True), resources)
                if one.get(Name.Subtype) == Name.Form and Name.Group in one:
                    del one.Group
        document.save(
            written, deterministic_id=True, object_stream_mode=pikepdf.ObjectStreamMode.generate
        )
    return written.getvalue()


def attachment_name(book: Yearbook) -> str:
    """Return the file name of the attached daily values."""
    year = book.year.label.replace("/", "-")
    return f"{book.station.code}_{year}_edition-{book.edition.number}_daily.csv"


@functools.cache
def stylesheets() -> tuple[list[weasyprint.CSS], FontConfiguration]:
    """Return the print style sheets and their fonts, parsed once in a process."""
    fonts = FontConfiguration()
    fetcher = OwnFetcher({})
    sheets = [
        weasyprint.CSS(string=text, font_config=fonts, url_fetcher=fetcher)
        for text in stylesheet_texts()
    ]
    return sheets, fonts


def stylesheet_texts() -> list[str]:
    """Return the print style sheets, tokens first."""
    return [Path(finders.find(name)).read_text(encoding="utf-8") for name in STYLESHEETS]


def add_scopes(document: weasyprint.Document, _pdf: Any) -> None:
    """Write the scope of every header cell into its tag; the renderer keeps only the tag.

    Its cells still carry the tag's dictionary as ``mark``.
    """
    for page in document.pages:
        for box in page._page_box.descendants():
            if getattr(box, "mark", None) is not None and box.element_tag == "th":
                row = box.element.get("scope") == "row"
                box.mark["A"]["Scope"] = "/Row" if row else "/Column"


def _edition_time(book: Yearbook) -> datetime:
    """Return the midnight (UTC) of the day the edition was issued or, before that, compiled."""
    day = book.edition.issued_on or book.edition.compiled_on
    return datetime(day.year, day.month, day.day, tzinfo=UTC)


def _marks_printed(book: Yearbook) -> Mark:
    """Return the marks that the daily table bears."""
    cells = (cell for month in book.daily.months for cell in month.cells)
    return functools.reduce(operator.or_, (cell.marks for cell in cells), RECORDED)
