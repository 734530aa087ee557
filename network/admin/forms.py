"""The form behind every page of the staff site: its UUID, its version, and a refusal shown."""

import uuid
from typing import Any

from django import forms
from django.http import HttpRequest

from network.services.acts import Refusal

HIDDEN = ("form_id", "version")


class StaffForm(forms.ModelForm):
    """A model form that keeps what was typed when a service refuses it."""

    # The page's view sets these two on a class of its own for each request.
    request: HttpRequest | None = None
    form_id = forms.UUIDField(required=False, widget=forms.HiddenInput)
    version = forms.IntegerField(required=False, widget=forms.HiddenInput)

    def __init__(self, *args: Any, **options: Any) -> None:
        super().__init__(*args, **options)
        self.fields["form_id"].initial = (
            getattr(self.instance, "form_id", None) if self.instance.pk else None
        ) or uuid.uuid4()
        if hasattr(self.instance, "version"):
            self.fields["version"].initial = self.instance.version
        else:
            del self.fields["version"]

    def full_clean(self) -> None:
        """Clean, then say what a service refused: at its field, or on top."""
        super().full_clean()
        refusal: Refusal | None = getattr(self.request, "refusal", None)
        if self.is_bound and refusal is not None:
            known = refusal.field in self.fields and refusal.field not in HIDDEN
            self.add_error(refusal.field if known else None, refusal.sentence)
