"""Acts, to look at: who did what, when, why, and to which rows."""

from typing import Any

from django.contrib import admin
from django.http import HttpRequest, HttpResponse

from network.admin.acting import ReadOnlyAdmin
from network.admin.trail import visible_entries
from network.models import Act


@admin.register(Act)
class ActAdmin(ReadOnlyAdmin):
    """The list of acts."""

    list_display = ("done_at", "verb", "station", "done_by", "reason")
    list_display_links = ("done_at", "verb")
    list_filter = ("station", "done_by")
    list_select_related = ("station", "done_by")
    search_fields = ("verb", "reason", "station__code")
    date_hierarchy = "done_at"
    change_form_template = "admin/network/act/change_form.html"

    def render_change_form(
        self, request: HttpRequest, context: dict[str, Any], **options: Any
    ) -> HttpResponse:
        """Add the rows the act changed."""
        context["entries"] = visible_entries(request, [options["obj"]])
        return super().render_change_form(request, context, **options)
