"""Forms of the yearbook desk."""

from typing import Any

from django import forms
from django.conf import settings
from django.utils.translation import gettext_lazy as _

from network.models import Station
from reports.services import Owed

LINES = forms.Textarea(attrs={"rows": 3})


class CompileForm(forms.Form):
    """Which stations' yearbooks to compile, of which year, in which language."""

    year = forms.IntegerField(widget=forms.HiddenInput)
    stations = forms.ModelMultipleChoiceField(
        Station.objects.all(), error_messages={"required": _("Tick the stations to compile.")}
    )
    language = forms.ChoiceField(label=_("language of print"), choices=settings.LANGUAGES)


class IssueForm(forms.Form):
    """The reasons owed before an edition can be issued; a reason that is not owed is not asked."""

    superseding = forms.CharField(label=_("This edition replaces the earlier one because"))
    reason = forms.CharField(label=_("Issued past the open points because"))

    def __init__(self, *args: Any, owed: Owed, **options: Any) -> None:
        super().__init__(*args, **options)
        for name, wanted in (("reason", owed.points), ("superseding", owed.earlier)):
            self.fields[name].widget = LINES
            if not wanted:
                del self.fields[name]

    def reasons(self) -> dict[str, str]:
        """Return the reasons given, as the service takes them."""
        return dict(self.cleaned_data)

    def refuse(self, field: str, sentence: str) -> None:
        """Put a refusal at the field it speaks of."""
        self.add_error(field if field in self.fields else None, sentence)


class VolumeForm(forms.Form):
    """The title of a volume."""

    title = forms.CharField(label=_("title"), max_length=200)


def told(form: forms.Form) -> str:
    """Return what is wrong with a form in one line."""
    return " ".join(str(text) for texts in form.errors.values() for text in texts)
