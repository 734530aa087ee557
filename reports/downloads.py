"""Hand a kept file over under a name that a reader can read."""

from django.db.models.fields.files import FieldFile
from django.http import FileResponse, Http404
from django.utils.translation import gettext as _

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
