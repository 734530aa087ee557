"""The field sheets of a round as PDF, for staff who may see rounds."""

from django.contrib.admin.views.decorators import staff_member_required
from django.core.exceptions import PermissionDenied
from django.http import HttpRequest, HttpResponse
from django.shortcuts import get_object_or_404
from django.utils import timezone
from django.utils.text import slugify
from django.views.decorators.cache import never_cache
from django.views.decorators.http import require_safe

from network.models import Round
from reports import downloads
from reports.field_sheets import content
from reports.services import printer


@staff_member_required(login_url="admin:login")
@require_safe
@never_cache
def field_sheets(request: HttpRequest, pk: int) -> HttpResponse:
    """Print a round."""
    if not request.user.has_perm("network.view_round"):
        raise PermissionDenied
    plan = get_object_or_404(Round.objects.select_related("office"), pk=pk)
    sheets = content.sheets_of(plan, at=timezone.now())
    name = slugify(plan.name) or f"round-{plan.pk}"
    return downloads.printed(lambda: printer("field_sheets.page").pdf_of(sheets), name=name)
