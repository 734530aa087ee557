"""The page that changes intervals and first says how many items of work that makes due."""

from typing import Any

from django import forms
from django.db import models
from django.http import HttpRequest
from django.utils import timezone
from django.utils.html import format_html
from django.utils.translation import gettext as _t
from django.utils.translation import gettext_lazy as _

from network.admin.verbs import Verb
from network.services import plans
from network.services.acts import Refusal


class IntervalPages:
    """Show the intervals of a stored row; only the verb changes them."""

    def get_readonly_fields(self, request: HttpRequest, obj: Any = None) -> tuple[str, ...]:
        """Leave intervals to the page that says what they make due."""
        shown = tuple(super().get_readonly_fields(request, obj))  # type: ignore[misc]
        return shown if obj is None else (*shown, *plans.INTERVALS[type(obj)])


def interval_verb(model: type[models.Model]) -> Verb:
    """Return the verb that changes a model's intervals, for those who may change the row."""
    names = plans.INTERVALS[model]

    def run(row: models.Model, *, by: Any, at: Any, reason: str = "", **values: Any) -> None:
        plans.change_intervals(row=row, values=values, by=by, at=at, reason=reason)

    return Verb(
        name="intervals",
        label=_("change how often"),
        permission=f"network.change_{model._meta.model_name}",
        run=run,
        form=_form_of(model, names),
        preview=_preview,
    )


def _form_of(model: type[models.Model], names: tuple[str, ...]) -> type[forms.Form]:
    """Return a form of whole numbers; an empty one leaves the next rule to hold."""
    fields: dict[str, forms.Field] = {}
    for name in names:
        column = model._meta.get_field(name)
        fields[name] = forms.IntegerField(
            label=column.verbose_name,
            required=not column.null,
            min_value=0,
            max_value=9_999,
            widget=forms.TextInput(attrs={"inputmode": "numeric", "class": "number"}),
        )
    fields["reason"] = forms.CharField(label=_("reason"), required=False)
    return type(f"{model.__name__}IntervalForm", (IntervalForm,), fields)


class IntervalForm(forms.Form):
    """Intervals of one row; opened with those that hold."""

    def start_from(self, row: models.Model) -> None:
        """Show the row's own intervals."""
        for name in self.fields:
            if hasattr(row, name):
                self.fields[name].initial = getattr(row, name)


def _preview(request: HttpRequest, row: Any, form: forms.Form) -> str:
    assert isinstance(form, IntervalForm)
    form.start_from(row)
    if not form.is_bound or not form.is_valid():
        return ""
    values = {name: value for name, value in form.cleaned_data.items() if name != "reason"}
    try:
        change = plans.try_intervals(row=row, values=values, at=timezone.now())
    except Refusal as refusal:
        known = refusal.field in form.fields
        form.add_error(refusal.field if known else None, refusal.sentence)
        return ""
    said = _t("Due now: {before} items. With these intervals: {after} items ({more:+d}).")
    text = said.format(before=change.before, after=change.after, more=change.made_due)
    return format_html("<p><strong>{}</strong></p>", text.replace("-", "−"))
