"""The form of one stop of a round."""

from collections.abc import Callable
from typing import Any

from django import forms
from django.db import transaction
from django.utils.translation import gettext_lazy as _

from network.admin.fields import DecimalTextField
from network.models import Stop
from network.services.acts import Refusal


class StopForm(forms.Form):
    """Hours, cableway and tasks of a stop; a reason leaves it out."""

    hours = DecimalTextField(label=_("hours at the station"), signed=False)
    by_cableway = forms.BooleanField(
        label=_("gauging from the cableway"),
        required=False,
        help_text=_("Refused where the cableway is overdue or was found unsafe."),
    )
    tasks = forms.CharField(
        label=_("tasks, one a line"), required=False, widget=forms.Textarea(attrs={"rows": 6})
    )
    left_out_because = forms.CharField(
        label=_("left out because"),
        required=False,
        max_length=200,
        help_text=_("With a reason the stop stays on the paper and is not made."),
    )

    @staticmethod
    def filled(stop: Stop) -> dict[str, Any]:
        """Return the values of a stored stop."""
        return {
            "hours": stop.hours,
            "by_cableway": stop.by_cableway,
            "tasks": "\n".join(task.text for task in stop.tasks.all()),
            "left_out_because": stop.left_out_because,
        }

    def done_by(self, act: Callable[..., None]) -> bool:
        """Do the act with what was typed; put a refusal at its field."""
        told = {**self.cleaned_data, "tasks": self.cleaned_data["tasks"].splitlines()}
        try:
            with transaction.atomic():
                act(**told)
        except Refusal as refusal:
            known = refusal.field in self.fields
            self.add_error(refusal.field if known else None, refusal.sentence)
            return False
        return True
