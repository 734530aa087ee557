"""The table of a rating version as a printable PDF, for staff who may see ratings."""

from typing import Any

from django.contrib.admin.views.decorators import staff_member_required
from django.core.exceptions import PermissionDenied
from django.http import Http404, HttpRequest, HttpResponse
from django.shortcuts import get_object_or_404
from django.template.loader import render_to_string
from django.utils import timezone, translation
from django.utils.text import slugify
from django.views.decorators.cache import never_cache
from django.views.decorators.http import require_safe

from network.models import Curve
from network.numerics.sentences import Refused
from network.queries import clock, rating_sheet, rating_table
from reports import downloads
from reports.services import printer


@staff_member_required(login_url="admin:login")
@require_safe
@never_cache
def rating_table_file(request: HttpRequest, pk: int) -> HttpResponse:
    """Print the table of a version; 404 where it is no curve."""
    if not request.user.has_perm("network.view_curve"):
        raise PermissionDenied
    row = get_object_or_404(Curve.objects.select_related("station", "approved_by"), pk=pk)
    name = slugify(f"{row.station.code}-rating-{row.number}")
    try:
        return downloads.printed(lambda: pdf_of(row), name=name)
    except Refused as refused:
        raise Http404(rating_sheet.sentence_of(refused)) from refused


def pdf_of(row: Curve) -> bytes:
    """Return the table of a version as tagged PDF; raises Refused where it is no curve.

    The same row gives the same bytes.
    """
    own = clock.agency()
    with translation.override(own.language), timezone.override(clock.record_clock(own)):
        html = render_to_string("reports/rating_table.html", _content(row))
    identity = f"rating {row.pk} {row.recorded_at} {row.approved_at}"
    rendering = printer("rendering")
    pdf: bytes = rendering.write_pdf(rendering.Page(html, {}), identity=identity)
    return pdf


def _content(row: Curve) -> dict[str, Any]:
    sheet = rating_sheet.stored(row)
    return {
        "agency": clock.agency(),
        "row": row,
        "sheet": sheet,
        "segments": sheet.segments(),
        "table": rating_table.decimetres(sheet.curve),
        "n_used": int(sheet.points.used.sum()),
        "periods": row.periods.standing(),
    }
