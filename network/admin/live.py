"""Forms that are answered while they are typed: by script, or by the button "Compute"."""

from collections.abc import Mapping, Sequence
from dataclasses import dataclass
from typing import Any

from django.core.exceptions import PermissionDenied
from django.http import HttpRequest, HttpResponse
from django.template.loader import render_to_string
from django.urls import URLPattern, path

from network.admin.children import kept_forms, kept_rows
from network.admin.forms import StaffForm

COMPUTE = "_compute"


@dataclass(frozen=True)
class Typed:
    """What of a form can be read so far: cleaned fields, and children by prefix.

    places: for each child of a prefix the prefix of its own fields, as "readings-2".
    """

    row: Any  # as stored, None when new
    values: Mapping[str, Any]
    children: Mapping[str, list[dict[str, Any]]]
    places: Mapping[str, list[str]]


class LiveForm(StaffForm):
    """A form that is shown again where only an answer was asked for."""

    def is_valid(self) -> bool:
        """Let nothing be saved by the button that computes."""
        return super().is_valid() and COMPUTE not in self.data


class LivePages:
    """Give a ServedAdmin an answer beside its form."""

    answer_template = ""

    def answer(self, request: HttpRequest, typed: Typed) -> dict[str, Any]:
        """Return the context of the answer to what is typed so far."""
        raise NotImplementedError

    def answer_to_stored(self, request: HttpRequest, row: Any) -> dict[str, Any]:
        """Return the context of the answer to a stored row."""
        raise NotImplementedError

    def get_urls(self) -> list[URLPattern]:
        """Add the address that answers while the form is typed."""
        opts = self.opts  # type: ignore[attr-defined]
        view = self.admin_site.admin_view(self.live_view)  # type: ignore[attr-defined]
        name = f"{opts.app_label}_{opts.model_name}_live"
        return [path("live/", view, name=name), *super().get_urls()]  # type: ignore[misc]

    def live_view(self, request: HttpRequest) -> HttpResponse:
        """Answer an unfinished form; nothing is written."""
        key = request.GET.get("row", "")
        row = self.get_object(request, key) if key else None  # type: ignore[attr-defined]
        may = self.has_change_permission if row else self.has_add_permission  # type: ignore[attr-defined]
        if request.method != "POST" or not (may(request, row) if row else may(request)):
            raise PermissionDenied
        form = self.get_form(request, row, change=row is not None)(  # type: ignore[attr-defined]
            request.POST, instance=row
        )
        form.is_valid()
        formsets, _inlines = self._create_formsets(  # type: ignore[attr-defined]
            request, form.instance, change=row is not None
        )
        context = self.answer(request, typed(row, form, formsets))
        return HttpResponse(render_to_string(self.answer_template, context, request))

    def render_change_form(
        self, request: HttpRequest, context: dict[str, Any], **options: Any
    ) -> HttpResponse:
        """Add the answer to what the page shows."""
        row, form = options.get("obj"), context["adminform"].form
        stored = row if row is not None and row.pk else None
        if form.is_bound:
            formsets = [each.formset for each in context["inline_admin_formsets"]]
            context |= self.answer(request, typed(stored, form, formsets))
        elif stored is not None:
            context |= self.answer_to_stored(request, stored)
        context["answer_template"] = self.answer_template
        new = stored is None
        context["editable"] = (
            self.has_add_permission(request)  # type: ignore[attr-defined]
            if new
            else self.has_change_permission(request, row)  # type: ignore[attr-defined]
        )
        return super().render_change_form(request, context, **options)  # type: ignore[misc]


def typed(row: Any, form: Any, formsets: Sequence[Any]) -> Typed:
    """Read what can be read of a bound form and its children."""
    for formset in formsets:
        formset.is_valid()
    children = {formset.prefix: kept_rows(formset) for formset in formsets}
    places = {formset.prefix: [form.prefix for form in kept_forms(formset)] for formset in formsets}
    return Typed(row, getattr(form, "cleaned_data", {}), children, places)
