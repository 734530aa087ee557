"""Yearbooks rendered once for all tests that look at them."""

import logging

import pytest

from reports import rendering
from tests.reports import sample

CSV = b"# station: FEN-031\ndate,value,marks\n2019-10-01,1.69,\n"


class Complaints(logging.Handler):
    """Keeps what the renderer complains of."""

    def __init__(self) -> None:
        super().__init__(logging.WARNING)
        self.texts: list[str] = []

    def emit(self, record: logging.LogRecord) -> None:
        self.texts.append(record.getMessage())


@pytest.fixture(scope="session")
def books():
    """Content by name: a flow station in German, a stage-only one in English."""
    return {"flow": sample.flow_station("de"), "stage": sample.stage_station()}


@pytest.fixture(scope="session")
def complaints():
    """What the renderer complained of while the fixtures were rendered."""
    return Complaints()


@pytest.fixture(scope="session")
def pdfs(books, complaints):
    """The PDF bytes of each, with the same small CSV attached."""
    logger = logging.getLogger("weasyprint")
    level = logger.level
    logger.addHandler(complaints)
    logger.setLevel(logging.WARNING)
    try:
        return {name: rendering.render(book, csv=CSV) for name, book in books.items()}
    finally:
        logger.removeHandler(complaints)
        logger.setLevel(level)


@pytest.fixture(params=["flow", "stage"])
def case(request, books, pdfs):
    """One content and its PDF."""
    return books[request.param], pdfs[request.param]
