"""Hand over a kept file, or one printed on request, under a name that a reader can read."""

from collections.abc import Callable

from django.db.models.fields.files import FieldFile
from django.http import FileResponse, Http404, HttpResponse
from django.utils.translation import gettext as _

from reports.services import Refusal

CSV = "text/csv; charset=utf-8"
PDF = "application/pdf"


def handed_over(file: FieldFile, *, name: str) -> FileResponse:
    """Return a PDF to look at, or data to save. Raises Http404 where the file is not there."""
    try:
        opened = file.open("rb")
    except (OSError, ValueError):
        raise Http404(_("There is no such file.")) from None
    is_pdf = name.endswith(".pdf")
    response = FileResponse(
        opened, content_type=PDF if is_pdf else CSV, as_attachment=not is_pdf, filename=name
    )
    response.headers["X-Content-Type-Options"] = "nosniff"
    response.headers["Content-Security-Policy"] = "default-src 'none'; frame-ancestors 'none'"
    return response


def printed(pdf_of: Callable[[], bytes], *, name: str) -> HttpResponse:
    """Return a PDF made now, to look at; a sentence where this system cannot print."""
    try:
        body = pdf_of()
    except Refusal as refusal:
        return HttpResponse(str(refusal), status=503, content_type="text/plain; charset=utf-8")
    response = HttpResponse(body, content_type=PDF)
    response.headers["Content-Disposition"] = f'inline; filename="{name}.pdf"'
    return response
