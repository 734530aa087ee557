"""Inspections of safety items, work that was put off, calendar links."""

from typing import Any

from django.contrib import admin
from django.http import HttpRequest
from django.utils import timezone
from django.utils.translation import gettext_lazy as _

from network.admin.acting import Filled, ReadOnlyAdmin, ServedAdmin
from network.admin.verbs import Verb
from network.models import FeedLink, Inspection, Postponement
from network.services import feeds, plans


def stands(row: Any) -> bool:
    """Tell whether a row is not withdrawn."""
    return bool(row.stands)


def _withdraw_inspection(row: Inspection, **told: Any) -> None:
    plans.withdraw_inspection(inspection=row, **told)


def _withdraw_postponement(row: Postponement, **told: Any) -> None:
    plans.withdraw_postponement(postponement=row, **told)


def _withdraw_link(row: FeedLink, **told: Any) -> None:
    feeds.withdraw_link(link=row, **told)


@admin.register(Inspection)
class InspectionAdmin(ServedAdmin):
    """Inspections: recorded once, withdrawn when wrong."""

    list_display = ("item", "station", "inspected_on", "is_safe", "stands")
    list_filter = ("is_safe", "item__kind", "item__station")
    list_select_related = ("item__station",)
    fields = ("item", "inspected_on", "is_safe", "remarks")
    verbs = (
        Verb(
            name="withdraw",
            label=_("withdraw"),
            permission="network.change_inspection",
            run=_withdraw_inspection,
            applies=stands,
        ),
    )

    @admin.display(description=_("station"))
    def station(self, row: Inspection) -> str:
        """Name the station of the item."""
        return str(row.item.station)

    @admin.display(description=_("stands"), boolean=True)
    def stands(self, row: Inspection) -> bool:
        """Tell whether the inspection is not withdrawn."""
        return row.stands

    def has_change_permission(self, request: HttpRequest, obj: Any = None) -> bool:
        """Change none: a wrong one is withdrawn."""
        return False

    def serve(self, request: HttpRequest, filled: Filled) -> Inspection:
        """Record the inspection."""
        return plans.record_inspection(**filled.values, by=request.user, at=timezone.now())


@admin.register(Postponement)
class PostponementAdmin(ReadOnlyAdmin):
    """Work put off, until when and why; put off on the work list, brought back here."""

    list_display = ("rule", "station", "until", "reason", "recorded_by")
    list_filter = ("rule", "station")
    list_select_related = ("station", "recorded_by")
    verbs = (
        Verb(
            name="withdraw",
            label=_("bring back"),
            permission="network.change_postponement",
            run=_withdraw_postponement,
            applies=stands,
        ),
    )


@admin.register(FeedLink)
class FeedLinkAdmin(ReadOnlyAdmin):
    """All calendar links; a lost one is withdrawn."""

    list_display = ("__str__", "person", "office", "recorded_at", "withdrawn_at")
    list_select_related = ("person", "office")
    fields = ("person", "office", "recorded_at", "recorded_by", "withdrawn_at", "withdrawn_reason")
    verbs = (
        Verb(
            name="withdraw",
            label=_("withdraw"),
            permission="network.change_feedlink",
            run=_withdraw_link,
            applies=stands,
        ),
    )
