"""Mapping profiles: how logger files are read; frozen once an import used one."""

from typing import Any

from django import forms
from django.contrib import admin
from django.http import HttpRequest
from django.utils import timezone
from django.utils.translation import gettext_lazy as _

from network.admin.acting import Filled, ServedAdmin
from network.admin.verbs import Verb
from network.models import MappingProfile
from network.queries.series import is_used
from network.services import profiles


class CopyForm(forms.Form):
    """Ask what the copy is called."""

    name = forms.CharField(label=_("name of the copy"), max_length=80)


@admin.register(MappingProfile)
class MappingProfileAdmin(ServedAdmin):
    """Mapping profiles."""

    list_display = ("name", "unit", "clock", "delimiter")
    search_fields = ("name",)
    verbs = (
        Verb(
            name="copy",
            label=_("copy"),
            permission="network.add_mappingprofile",
            form=CopyForm,
            run=lambda row, **filled: profiles.copy_profile(profile=row, **filled),
        ),
    )

    def has_change_permission(self, request: HttpRequest, obj: Any = None) -> bool:
        """Leave a used profile as it was: its imports must stay readable."""
        return super().has_change_permission(request, obj) and not (obj and is_used(obj))

    def serve(self, request: HttpRequest, filled: Filled) -> MappingProfile:
        """Record the profile."""
        return profiles.record_profile(
            profile=filled.row or MappingProfile(),
            by=request.user,
            at=timezone.now(),
            values=filled.values,
        )
