"""What is said about a record: corrections, notes, infills, typed flows, dismissals, reviews.

Each is added through its service and never edited: a mistake is withdrawn with a reason.
"""

from collections.abc import Callable
from typing import Any

from django.contrib import admin
from django.db import models
from django.http import HttpRequest
from django.utils import timezone
from django.utils.translation import gettext_lazy as _

from network.admin.acting import Filled, ServedAdmin
from network.admin.records import stands
from network.admin.trying import Tried
from network.admin.verbs import NoReasonForm, Verb
from network.models import (
    Correction,
    Dismissal,
    Infill,
    Note,
    RecordReview,
    Station,
    TypedFlow,
)
from network.services import corrections, infills, notes, reviews, typed_flows


class Stated(ServedAdmin):
    """Rows that are added, looked at and withdrawn; with `Tried`, after before and after."""

    # The service that adds one, from the fields of the form.
    add: Callable[..., models.Model]

    def has_change_permission(self, request: HttpRequest, obj: Any = None) -> bool:
        """Edit nothing that was said."""
        return obj is None and super().has_change_permission(request)

    def serve(self, request: HttpRequest, filled: Filled) -> models.Model:
        """Add the row."""
        return type(self).add(**filled.values, by=request.user, at=timezone.now())


def withdrawal(
    model: type[models.Model],
    act: Callable[..., None],
    *,
    row_as: str,
    station_of: Callable[[Any], Station] | None = None,
) -> Verb:
    """Return the verb that withdraws a row of a model, given to its service as `row_as`."""
    return Verb(
        name="withdraw",
        label=_("withdraw"),
        permission=f"network.change_{model._meta.model_name}",
        applies=stands,
        run=lambda row, **filled: act(**{row_as: row}, **filled),
        station_of=station_of,
    )


def own_station(row: Any) -> Station:
    """Return the station that a row names."""
    station: Station = row.station
    return station


def station_of_series(row: Any) -> Station:
    """Return the station of the series that a row names."""
    station: Station = row.series.station
    return station


@admin.register(Correction)
class CorrectionAdmin(Stated):
    """Corrections of stage."""

    add = corrections.propose_correction
    list_display = ("series", "start_at", "end_at", "start_offset_m", "end_offset_m", "state",
                    "withdrawn_at")  # fmt: skip
    list_filter = ("series__station", "state")
    list_select_related = ("series__station",)
    verbs = (
        Verb(
            name="accept",
            label=_("accept"),
            permission="network.change_correction",
            form=NoReasonForm,
            applies=lambda row: stands(row) and row.state == Correction.State.PROPOSED,
            run=lambda row, **who: corrections.accept_correction(correction=row, **who),
            station_of=station_of_series,
        ),
        withdrawal(
            Correction,
            corrections.withdraw_correction,
            row_as="correction",
            station_of=station_of_series,
        ),
    )


@admin.register(Note)
class NoteAdmin(Tried, Stated):
    """Notes on the record."""

    add = notes.add_note
    list_display = ("station", "start_at", "end_at", "cause", "flows", "withdrawn_at")
    list_filter = ("station", "cause", "flows")
    list_select_related = ("station",)
    verbs = (withdrawal(Note, notes.withdraw_note, row_as="note", station_of=own_station),)


@admin.register(Infill)
class InfillAdmin(Tried, Stated):
    """Infills."""

    add = infills.add_infill
    list_display = ("station", "first_day", "last_day", "method", "withdrawn_at")
    list_filter = ("station", "method")
    list_select_related = ("station",)
    verbs = (withdrawal(Infill, infills.withdraw_infill, row_as="infill", station_of=own_station),)


@admin.register(TypedFlow)
class TypedFlowAdmin(Tried, Stated):
    """Typed daily flows."""

    add = typed_flows.type_flow
    list_display = ("station", "day", "flow_m3s", "method", "recorded_by", "withdrawn_at")
    list_filter = ("station",)
    list_select_related = ("station", "recorded_by")
    date_hierarchy = "day"
    verbs = (
        withdrawal(
            TypedFlow, typed_flows.withdraw_typed_flow, row_as="typed_flow", station_of=own_station
        ),
    )


@admin.register(Dismissal)
class DismissalAdmin(Stated):
    """Dismissed findings."""

    add = reviews.dismiss_finding
    list_display = ("series", "finding", "start_at", "end_at", "reason", "withdrawn_at")
    list_filter = ("series__station", "finding")
    list_select_related = ("series__station",)
    verbs = (withdrawal(Dismissal, reviews.withdraw_dismissal, row_as="dismissal"),)


@admin.register(RecordReview)
class RecordReviewAdmin(Stated):
    """Reviews of records."""

    add = reviews.review_record
    list_display = ("station", "reviewed_through", "recorded_by", "recorded_at", "withdrawn_at")
    list_filter = ("station",)
    list_select_related = ("station", "recorded_by")
    verbs = (withdrawal(RecordReview, reviews.withdraw_review, row_as="review"),)
