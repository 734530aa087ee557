"""The history page of a row: acts with the rows they changed, old and new."""

from typing import Any

from django.contrib.admin.utils import unquote
from django.core.exceptions import PermissionDenied
from django.core.paginator import Paginator
from django.http import HttpRequest, HttpResponse
from django.template.response import TemplateResponse
from django.utils.translation import gettext as _

from network.queries import trail

ACTS_A_PAGE = 30


class TrailPage:
    """Give a ModelAdmin one history page that joins parent and children by act."""

    def history_view(
        self, request: HttpRequest, object_id: str, extra_context: Any = None
    ) -> HttpResponse:
        """Show who changed what, when and why."""
        row = self.get_object(request, unquote(object_id))  # type: ignore[attr-defined]
        if row is None or not self.has_view_or_change_permission(request, row):  # type: ignore[attr-defined]
            raise PermissionDenied
        page = Paginator(trail.acts_on(row), ACTS_A_PAGE).get_page(request.GET.get("page"))
        context = {
            **self.admin_site.each_context(request),  # type: ignore[attr-defined]
            "title": _("History"),
            "subtitle": str(row),
            "opts": row._meta,
            "object": row,
            "page": page,
            "entries": visible_entries(request, list(page.object_list)),
        }
        return TemplateResponse(request, "admin/object_history.html", context)


def visible_entries(request: HttpRequest, acts: list[Any]) -> list[trail.Entry]:
    """Return the acts with those changed rows whose owner or self this person may see."""
    found = trail.entries(acts)
    for entry in found:
        entry.rows = [change for change in entry.rows if _may_see(request, change.model)]
    return found


def _may_see(request: HttpRequest, model: Any) -> bool:
    opts = model._meta
    return bool(request.user.has_perm(f"{opts.app_label}.view_{opts.model_name}"))
