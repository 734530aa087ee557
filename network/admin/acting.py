"""What every page of the staff site does alike: saves as acts, refuses without loss, keeps a trail.

How to add a noun:

- Rows that no service guards (texts, papers, lists): subclass `RegistryAdmin` and name the model in
  SAVED_BY_ADMIN. Its save runs as one act.
- Children come as `ChildRows` or `ChildCards` (network/admin/children.py).
- Everything else: subclass `ServedAdmin` and write `serve(request, filled)`, which hands
  `filled.values` (cleaned fields), `filled.children` (prefix → list of cleaned rows, each with its
  stored row under "id" or None), `filled.row` (the stored row, None for a new one),
  `filled.version` (for claim_version) and `filled.form_id` (for a model with that column) to a
  service, keyword-only, with by=request.user and at=timezone.now(), and returns the saved row.
- A service says no by Refusal(sentence, field=...): the form comes back as typed, the sentence at
  "field", or at "readings-2-reading_m" for the third row of the children with prefix "readings".
- Rows only looked at: `ReadOnlyAdmin`. Acts on one row (check, reopen, withdraw): `verbs`, see
  network/admin/verbs.py.
- Models with form_id: the same form sent twice lands on the row it made the first time.
- Permissions come from services/roles.py; children follow their parent. Nothing is deleted here.
  History, draft keeping, version field, numbers and clocks come by themselves.
- Name the new module in network/admin/books.py; tests/admin walks its addresses for each role.
"""

from collections.abc import Mapping, Sequence
from dataclasses import dataclass
from typing import Any
from uuid import UUID

from django.contrib import admin, messages
from django.contrib.admin.utils import quote
from django.db import connection, models, transaction
from django.http import HttpRequest, HttpResponse, HttpResponseRedirect
from django.urls import reverse
from django.utils import timezone
from django.utils.text import capfirst
from django.utils.translation import gettext as _

from network.admin.children import kept_rows, place
from network.admin.fields import FieldParts
from network.admin.forms import HIDDEN, StaffForm
from network.admin.trail import TrailPage
from network.admin.verbs import VerbPages
from network.models import (
    Benchmark,
    Document,
    Instrument,
    KindInterval,
    MeterGroup,
    MeterPair,
    Office,
    OperationPeriod,
    OtherGauge,
    Person,
    SafetyItem,
    SiteCriterion,
    SiteSurvey,
    StaffPlate,
    Station,
)
from network.services import registry
from network.services.acts import Overtaken, Refusal

SAVED_BY_ADMIN = {
    Benchmark,
    Document,
    Instrument,
    KindInterval,
    MeterGroup,
    MeterPair,
    Office,
    OperationPeriod,
    OtherGauge,
    Person,
    SafetyItem,
    SiteCriterion,
    SiteSurvey,
    StaffPlate,
    Station,
}
SAVED_COOKIE = "saved_form"  # tells the browser which draft it may forget


class StaffAdmin(FieldParts, TrailPage, VerbPages, admin.ModelAdmin):
    """The shell of every noun: no deletes, no bulk actions, refusals shown, nothing lost."""

    form = StaffForm
    actions = None
    list_per_page = 50
    show_full_result_count = False
    show_facets = admin.ShowFacets.NEVER

    def has_delete_permission(self, request: HttpRequest, obj: Any = None) -> bool:
        """Delete nothing: a mistake is withdrawn, a person or a plate taken out of service."""
        return False

    def get_form(self, request: HttpRequest, obj: Any = None, **options: Any) -> Any:
        """Give the form its request, through which it hears of a refusal."""
        form = super().get_form(request, obj, **options)
        return type(form.__name__, (form,), {"request": request})

    def get_fields(self, request: HttpRequest, obj: Any = None) -> Sequence[Any]:
        """Leave out the hidden fields, which the page writes by itself."""
        return [name for name in super().get_fields(request, obj) if name not in HIDDEN]

    def get_object(self, request: HttpRequest, object_id: str, from_field: Any = None) -> Any:
        """Load a row; lock it when the page is about to change it."""
        row = super().get_object(request, object_id, from_field)
        if row is None or request.method != "POST" or not connection.in_atomic_block:
            return row
        rows = type(row)._base_manager.select_for_update(of=("self",))
        return rows.filter(pk=row.pk).first()

    def changelist_view(self, request: HttpRequest, extra_context: Any = None) -> HttpResponse:
        """Head the list by what it holds."""
        title = {"title": capfirst(str(self.opts.verbose_name_plural))}
        return super().changelist_view(request, {**title, **(extra_context or {})})

    def changeform_view(
        self,
        request: HttpRequest,
        object_id: str | None = None,
        form_url: str = "",
        extra_context: Any = None,
    ) -> HttpResponse:
        """Show or save the form; on a refusal roll back and show it again as it was typed."""
        context = {**(extra_context or {})}
        if request.method == "POST" and object_id is None and self.has_add_permission(request):
            saved = self._saved_before(request)
            if saved is not None:
                return self._to_saved(request, saved)
        try:
            response = super().changeform_view(request, object_id, form_url, context)
        except Refusal as refusal:
            return self._refused(request, object_id, refusal, form_url, context)
        if request.method == "POST" and isinstance(response, HttpResponseRedirect):
            response.set_cookie(
                SAVED_COOKIE, request.POST.get("form_id", ""), max_age=3600, samesite="Lax"
            )
        return response

    def render_change_form(
        self, request: HttpRequest, context: dict[str, Any], **options: Any
    ) -> HttpResponse:
        """Add the verbs of the row to its page."""
        row = options.get("obj")
        context["verb_links"] = self.verb_links(request, row) if row is not None else []
        return super().render_change_form(request, context, **options)

    def log_addition(self, *_entry: Any) -> None:
        """Write nothing: the act is the trail."""

    def log_change(self, *_entry: Any) -> None:
        """Write nothing: the act is the trail."""

    def construct_change_message(self, *_entry: Any) -> list[Any]:
        """Say nothing: the act is the trail."""
        return []

    def _create_formsets(self, request: HttpRequest, obj: Any, change: bool) -> Any:
        """Bind the children; put a refusal that speaks of one of them where it belongs."""
        formsets, inlines = super()._create_formsets(request, obj, change)
        refusal = getattr(request, "refusal", None)
        if refusal is not None and place(refusal, formsets):
            request.refusal = None
        return formsets, inlines

    def _saved_before(self, request: HttpRequest) -> Any:
        """Return the row that this very form already made, if any."""
        if not any(field.name == "form_id" and field.unique for field in self.opts.fields):
            return None
        try:
            form_id = UUID(request.POST.get("form_id", ""))
        except ValueError:
            return None
        return self.model._base_manager.filter(form_id=form_id).first()

    def _to_saved(self, request: HttpRequest, row: models.Model) -> HttpResponse:
        messages.info(
            request,
            _("This was saved already. If you changed something since, change it here."),
        )
        address = f"admin:{self.opts.app_label}_{self.opts.model_name}_change"
        response = HttpResponseRedirect(reverse(address, args=[quote(row.pk)]))
        response.set_cookie(SAVED_COOKIE, request.POST["form_id"], max_age=3600, samesite="Lax")
        return response

    def _refused(
        self,
        request: HttpRequest,
        object_id: str | None,
        refusal: Refusal,
        form_url: str,
        context: Any,
    ) -> HttpResponse:
        """Show the bound form with the refusal, after the transaction was rolled back."""
        saved = self._saved_before(request) if object_id is None else None
        if saved is not None:  # the other tap was quicker
            return self._to_saved(request, saved)
        request.refusal = refusal
        if isinstance(refusal, Overtaken):
            self._take_newer_version(request, object_id)
        with transaction.atomic():
            return self._changeform_view(request, object_id, form_url, context)

    def _take_newer_version(self, request: HttpRequest, object_id: str | None) -> None:
        """Let the next save of the same form pass: its author has been told."""
        row = self.get_object(request, object_id or "")
        request.POST = request.POST.copy()
        request.POST["version"] = str(row.version)


class RegistryAdmin(StaffAdmin):
    """Rows the admin saves itself, each save one act on the row's station."""

    # Changing one of these fields, or a child, makes published figures of the station stale.
    figure_fields: frozenset[str] = frozenset()

    def verb_for(self, form: Any, *, change: bool) -> str:
        """Name the act."""
        what = {"what": self.opts.verbose_name}
        return _("change %(what)s") % what if change else _("add %(what)s") % what

    def save_model(self, request: HttpRequest, obj: Any, form: Any, change: bool) -> None:
        """Wait for the children: row and children are saved as one act."""

    def save_related(self, request: HttpRequest, form: Any, formsets: Any, change: bool) -> None:
        """Save row and children as one act."""

        def save() -> None:
            super(RegistryAdmin, self).save_model(request, form.instance, form, change)
            super(RegistryAdmin, self).save_related(request, form, formsets, change)

        registry.keep(
            form.instance,
            save=save,
            verb=self.verb_for(form, change=change),
            by=request.user,
            at=timezone.now(),
            version=form.cleaned_data.get("version"),
            touches_figures=self._touches_figures(form, formsets),
        )

    def _touches_figures(self, form: Any, formsets: Any) -> bool:
        if not self.figure_fields:
            return False
        touched = self.figure_fields.intersection(form.changed_data)
        return bool(touched) or any(formset.has_changed() for formset in formsets)


class ReadOnlyAdmin(StaffAdmin):
    """Rows that are only looked at; what changes them are verbs or other pages."""

    def has_add_permission(self, request: HttpRequest) -> bool:
        """Add nothing here."""
        return False

    def has_change_permission(self, request: HttpRequest, obj: Any = None) -> bool:
        """Change nothing here."""
        return False


@dataclass(frozen=True)
class Filled:
    """A valid form, ready for a service."""

    row: Any  # as stored, None when new
    values: dict[str, Any]
    children: Mapping[str, list[dict[str, Any]]]
    version: int
    form_id: UUID


class ServedAdmin(StaffAdmin):
    """Rows saved by a service, which may refuse."""

    def serve(self, request: HttpRequest, filled: Filled) -> models.Model:
        """Hand the filled form to the service and return the saved row."""
        raise NotImplementedError

    def save_model(self, request: HttpRequest, obj: Any, form: Any, change: bool) -> None:
        """Leave the row to the service."""

    def save_related(self, request: HttpRequest, form: Any, formsets: Any, change: bool) -> None:
        """Hand row and children to the service."""
        values = dict(form.cleaned_data)
        version, form_id = values.pop("version", None), values.pop("form_id", None)
        filled = Filled(
            row=self.model._base_manager.get(pk=form.instance.pk) if change else None,
            values=values,
            children={formset.prefix: kept_rows(formset) for formset in formsets},
            version=version or 0,
            form_id=form_id or form["form_id"].initial,
        )
        row = self.serve(request, filled)
        form.instance.pk = row.pk
