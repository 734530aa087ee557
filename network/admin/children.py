"""Children on the page of the row that owns them: as rows of a table, or as cards."""

from collections.abc import Sequence
from typing import Any

from django.contrib import admin
from django.forms import BaseInlineFormSet, BaseModelForm
from django.http import HttpRequest

from network.admin.fields import FieldParts
from network.services.acts import Refusal


def kept_forms(formset: BaseInlineFormSet) -> list[BaseModelForm]:
    """Return the forms of a cleaned formset that are filled and not marked for removal."""
    return [
        form
        for form in formset.forms
        if (form.has_changed() or form.instance.pk)
        and not (formset.can_delete and formset._should_delete_form(form))
    ]


def kept_rows(formset: BaseInlineFormSet) -> list[dict[str, Any]]:
    """Return the cleaned rows of a formset that are filled and not marked for removal.

    Each has its stored row under "id", None for a new one; a stored row that is missing from the
    list is one the user took out.
    """
    left_out = {"DELETE", formset.fk.name}
    return [
        {name: value for name, value in form.cleaned_data.items() if name not in left_out}
        for form in kept_forms(formset)
    ]


def place(refusal: Refusal, formsets: Sequence[BaseInlineFormSet]) -> bool:
    """Put a refusal at the child row and field it names; tell whether there is one.

    A service counts the rows it was handed: empty lines of the form are none of them.
    """
    for formset in formsets:
        if not refusal.field.startswith(f"{formset.prefix}-"):
            continue
        formset.is_valid()  # so that the sentence is added to what else is wrong
        for number, form in enumerate(kept_forms(formset)):
            row = f"{formset.prefix}-{number}"
            if refusal.field == row or refusal.field.startswith(f"{row}-"):
                name = refusal.field.removeprefix(row).removeprefix("-")
                form.add_error(name if name in form.fields else None, refusal.sentence)
                return True
    return False


class FollowsParent(FieldParts):
    """Children have no permissions of their own: they follow the row that owns them."""

    extra = 0
    can_delete = False

    def has_add_permission(self, request: HttpRequest, obj: Any = None) -> bool:
        """Add where the owner may be changed, or added while it is new."""
        return self._may(request, "change" if obj is not None and obj.pk else "add")

    def has_change_permission(self, request: HttpRequest, obj: Any = None) -> bool:
        """Change where the owner may be changed."""
        return self._may(request, "change" if obj is not None and obj.pk else "add")

    def has_view_permission(self, request: HttpRequest, obj: Any = None) -> bool:
        """See what may be seen of the owner."""
        return self._may(request, "view") or self._may(request, "change")

    def has_delete_permission(self, request: HttpRequest, obj: Any = None) -> bool:
        """Take rows out of a form only where the form says so."""
        return self.can_delete and self.has_change_permission(request, obj)

    def _may(self, request: HttpRequest, action: str) -> bool:
        opts = self.parent_model._meta  # type: ignore[attr-defined]
        return request.user.has_perm(f"{opts.app_label}.{action}_{opts.model_name}")


class ChildRows(FollowsParent, admin.TabularInline):
    """Children as a table, which a phone shows as cards."""


class ChildCards(FollowsParent, admin.StackedInline):
    """Children as cards everywhere."""
