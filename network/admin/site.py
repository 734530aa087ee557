"""The agency's own staff site."""

from typing import Any

from django.contrib.admin import AdminSite
from django.db.models.base import ModelBase
from django.http import HttpRequest, HttpResponse
from django.urls import URLPattern, URLResolver
from django.utils.translation import gettext_lazy as _

from network.admin import calendar_links, work
from network.queries import desk

OUR_APPS = {"network", "reports"}


class StaffSite(AdminSite):
    """The Django admin under the agency's name, opening on the work due."""

    site_header = "Gaugewright"
    site_title = "Gaugewright"
    index_title = _("Work due")
    enable_nav_sidebar = False
    site_url = None

    def register(self, models: Any, admin_class: Any = None, **options: Any) -> None:
        """Take our own books only: roles come from one table, not from the pages of parts."""
        given = [models] if isinstance(models, ModelBase) else models
        own = [model for model in given if model._meta.app_label in OUR_APPS]
        super().register(own, admin_class, **options)

    def get_urls(self) -> list[URLPattern | URLResolver]:
        """Add the pages that belong to no single book."""
        return [*work.urls(self), *calendar_links.urls(self), *super().get_urls()]

    def index(self, request: HttpRequest, extra_context: Any = None) -> HttpResponse:
        """Show the work due with own drafts, and what the machine is busy with."""
        context = {
            **self.work_due(request),
            "jobs": desk.latest_jobs(),
            **(extra_context or {}),
        }
        return super().index(request, context)

    def work_due(self, request: HttpRequest) -> dict[str, Any]:
        """Return the work list for those who may see stations, nothing for others."""
        may_look = request.user.has_perm("network.view_station")
        return work.list_context(request) if may_look else {}
