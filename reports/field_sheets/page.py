"""Field sheets become HTML, then PDF; a code on each opens the visit form of its stop."""

from pathlib import Path
from types import SimpleNamespace
from typing import Any

import segno
from django.conf import settings
from django.contrib.staticfiles import finders
from django.template.loader import render_to_string
from django.urls import reverse
from django.utils import timezone, translation
from django.utils.translation import gettext as _

from network.models import Stop, Visit
from network.queries import clock
from reports import rendering
from reports.field_sheets.content import RoundSheets
from reports.figures import sketch

STYLESHEET = "reports/print/field.css"


def pdf_of(sheets: RoundSheets) -> bytes:
    """Return the field sheets as tagged PDF, in the agency's language of print."""
    own = clock.agency()
    with translation.override(own.language), timezone.override(clock.record_clock(own)):
        context = {
            "sheets": sheets,
            "agency": own,
            "clock": clock.record_clock(own),
            "controls": Visit.Control.labels,
            "css": Path(finders.find(STYLESHEET)).read_text(encoding="utf-8"),
        }
        html = render_to_string("reports/field_sheets.html", context)
        page = rendering.Page(html, _figures(sheets))
        return rendering.write_pdf(page, identity=f"field sheets {sheets.plan.pk}")


def address_of(stop: Stop) -> str:
    """Return the address that opens the visit form of a stop."""
    return settings.SITE_URL + reverse("admin:stop_visit", args=[stop.form_id])


def code_of(stop: Stop) -> str:
    """Return the address of a stop as a QR code, in SVG; a smudge of 15 % is borne (level M)."""
    code = segno.make(address_of(stop), error="m", micro=False)
    bare = code.svg_inline(border=4, omitsize=True)
    return bare.replace("<svg", '<svg xmlns="http://www.w3.org/2000/svg"', 1)


def _figures(sheets: RoundSheets) -> dict[str, str]:
    words: Any = SimpleNamespace(north=_("N"))  # all the words a sketch prints
    figures = {}
    for one in sheets.stops:
        figures[f"code-{one.number}"] = code_of(one.stop)
        figures[f"sketch-{one.number}"] = sketch.draw(one.sketch, words)
    return figures
