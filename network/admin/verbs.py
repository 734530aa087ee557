"""Pages for acts on one row: check, reopen, withdraw, adopt; a form, a preview, one POST."""

from collections.abc import Callable, Mapping
from dataclasses import dataclass
from functools import partial
from typing import Any

from django import forms
from django.contrib import messages
from django.contrib.admin.utils import quote, unquote
from django.core.exceptions import PermissionDenied
from django.db import models, transaction
from django.http import HttpRequest, HttpResponse, HttpResponseRedirect
from django.template.response import TemplateResponse
from django.urls import URLPattern, path, reverse
from django.utils import timezone
from django.utils.text import capfirst
from django.utils.translation import gettext as _t
from django.utils.translation import gettext_lazy as _

from network.admin import trying
from network.models import Station
from network.services.acts import Refusal


class ReasonForm(forms.Form):
    """Ask why."""

    reason = forms.CharField(label=_("reason"), widget=forms.Textarea(attrs={"rows": 3}))


class NoReasonForm(forms.Form):
    """Ask nothing but the tap itself."""


def always(_row: models.Model) -> bool:
    """Apply to every row."""
    return True


@dataclass(frozen=True)
class Verb:
    """One act on a row: who may, when it applies, what it asks and what does it.

    `run(row, by=, at=, **cleaned)` is the service; `preview(request, row, form)` returns the HTML
    of before and after, called when the page opens and again when "show" is pressed.
    With `station_of` the act is tried first: what it would change at that station is shown, and
    done once confirmed (network/admin/trying.py); say whether it touches readings. `look(row,
    **cleaned)` gives other answers to compare; `compare` makes `changes` of both sides for the
    template `shown_by`, and the page then always comes before the act.
    `form_for(row)` makes the form where it depends on the row.
    """

    name: str
    label: Any
    permission: str
    run: Callable[..., object]
    form: type[forms.Form] = ReasonForm
    applies: Callable[[Any], bool] = always
    preview: Callable[[HttpRequest, Any, forms.Form], str] | None = None
    caution: Any = ""
    station_of: Callable[[Any], Station] | None = None
    touches_readings: bool = False
    form_for: Callable[[Any], type[forms.Form]] | None = None
    look: Callable[..., Mapping[str, Any]] | None = None
    compare: Callable[[Mapping[str, Any]], Any] | None = None
    shown_by: str = ""


class VerbPages:
    """Give a ModelAdmin a page for each of its verbs, and the change page their buttons."""

    verbs: tuple[Verb, ...] = ()

    def get_urls(self) -> list[URLPattern]:
        """Add one address for each verb."""
        own = [
            path(
                f"<path:object_id>/{verb.name}/",
                self.admin_site.admin_view(self._view_of(verb)),  # type: ignore[attr-defined]
                name=self._address(verb),
            )
            for verb in self.verbs
        ]
        return own + super().get_urls()  # type: ignore[misc]

    def verb_links(self, request: HttpRequest, row: models.Model) -> list[dict[str, Any]]:
        """Return label and address of each verb this person may do to this row now."""
        return [
            {
                "label": verb.label,
                "url": reverse(f"admin:{self._address(verb)}", args=[quote(row.pk)]),
            }
            for verb in self.verbs
            if request.user.has_perm(verb.permission) and verb.applies(row)
        ]

    def verb_view(self, request: HttpRequest, object_id: str, verb: Verb) -> HttpResponse:
        """Show the form of a verb; do it on POST, or say what refused it."""
        row = self._allowed_row(request, object_id, verb)
        if not verb.applies(row):
            messages.warning(request, _t("This is done already, or cannot be done now."))
            return self._to_row(row)
        form_class = verb.form_for(row) if verb.form_for else verb.form
        form = form_class(request.POST if request.method == "POST" else None)
        meant = request.method == "POST" and "_show" not in request.POST
        if meant and form.is_valid() and _done(verb, row=row, form=form, request=request):
            if hasattr(request, "differences"):
                return self._before_and_after(request, row=row, verb=verb)
            said = {"verb": capfirst(str(verb.label)), "row": row}
            messages.success(request, _t("%(verb)s: %(row)s. Done.") % said)
            return self._to_row(row)
        return self._verb_page(request, row=row, verb=verb, form=form)

    def _before_and_after(
        self, request: HttpRequest, *, row: models.Model, verb: Verb
    ) -> HttpResponse:
        context = self.admin_site.each_context(request)  # type: ignore[attr-defined]
        context |= {"title": capfirst(str(verb.label)), "subtitle": str(row), "opts": row._meta}
        if verb.compare is not None:
            more = request.differences.more
            context |= {"changes": verb.compare(more), "shown_by": verb.shown_by}
        return trying.page(request, **context)

    def _view_of(self, verb: Verb) -> Callable[..., HttpResponse]:
        def view(request: HttpRequest, object_id: str) -> HttpResponse:
            return self.verb_view(request, object_id, verb)

        return view

    def _address(self, verb: Verb) -> str:
        opts = self.opts  # type: ignore[attr-defined]
        return f"{opts.app_label}_{opts.model_name}_{verb.name}"

    def _allowed_row(self, request: HttpRequest, object_id: str, verb: Verb) -> models.Model:
        row = self.get_object(request, unquote(object_id))  # type: ignore[attr-defined]
        may_look = self.has_view_permission(request, row)  # type: ignore[attr-defined]
        if row is None or not may_look or not request.user.has_perm(verb.permission):
            raise PermissionDenied
        return row

    def _to_row(self, row: models.Model) -> HttpResponseRedirect:
        opts = row._meta
        address = f"admin:{opts.app_label}_{opts.model_name}_change"
        return HttpResponseRedirect(reverse(address, args=[quote(row.pk)]))

    def _verb_page(
        self, request: HttpRequest, *, row: models.Model, verb: Verb, form: forms.Form
    ) -> HttpResponse:
        context = {
            **self.admin_site.each_context(request),  # type: ignore[attr-defined]
            "opts": row._meta,
            "original": row,
            "title": capfirst(str(verb.label)),
            "subtitle": str(row),
            "verb": verb,
            "form": form,
            "preview": verb.preview(request, row, form) if verb.preview else "",
        }
        return TemplateResponse(request, "admin/verb_form.html", context)


def _done(verb: Verb, *, row: models.Model, form: forms.Form, request: HttpRequest) -> bool:
    """Run or try the verb; on a refusal roll back and put the sentence on the form."""

    def act() -> object:
        fresh = type(row)._base_manager.get(pk=row.pk)
        return verb.run(fresh, by=request.user, at=timezone.now(), **form.cleaned_data)

    try:
        with transaction.atomic():
            if verb.station_of is None:
                act()
            else:
                trying.tried(
                    request,
                    verb.station_of(row),
                    act,
                    touches_readings=verb.touches_readings,
                    look=verb.look and partial(verb.look, row, **form.cleaned_data),
                )
    except Refusal as refusal:
        known = refusal.field in form.fields
        form.add_error(refusal.field if known else None, refusal.sentence)
        return False
    return True
