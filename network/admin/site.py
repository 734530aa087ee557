"""The agency's own staff site."""

from collections.abc import Sequence
from typing import Any

from django.contrib.admin import AdminSite
from django.db import models
from django.db.models.base import ModelBase
from django.http import HttpRequest, HttpResponse
from django.urls import reverse
from django.utils.translation import gettext_lazy as _

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

    def index(self, request: HttpRequest, extra_context: Any = None) -> HttpResponse:
        """Show work due, own drafts, stations, and what the machine is busy with."""
        context = {
            "work_due": self.work_due(request),
            "drafts": [_link(self, row) for row in desk.drafts_of(request.user)],
            "stations": [_link(self, row) for row in desk.stations()],
            "jobs": desk.latest_jobs(),
            **(extra_context or {}),
        }
        return super().index(request, context)

    def work_due(self, request: HttpRequest) -> Sequence[Any]:
        """Return the lines of the work list for this person; the block `work_due` shows them."""
        return []


def _link(site: StaffSite, row: models.Model) -> dict[str, Any]:
    """Return a row with the address of its page, empty where it has none."""
    opts = row._meta
    if not site.is_registered(type(row)):
        return {"row": row, "kind": opts.verbose_name, "url": ""}
    url = reverse(f"admin:{opts.app_label}_{opts.model_name}_change", args=[row.pk])
    return {"row": row, "kind": opts.verbose_name, "url": url}
