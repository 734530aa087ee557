"""People: the manager adds, assigns roles and deactivates; nobody is deleted."""

from typing import Any

from django import forms
from django.contrib import admin
from django.contrib.auth.admin import UserAdmin
from django.contrib.auth.forms import (
    AdminPasswordChangeForm,
    AdminUserCreationForm,
    UserChangeForm,
)
from django.contrib.auth.models import Group
from django.http import HttpRequest
from django.utils import timezone
from django.utils.translation import gettext as _t
from django.utils.translation import gettext_lazy as _

from network.admin.acting import RegistryAdmin
from network.admin.forms import StaffForm
from network.models import Person
from network.services import registry
from network.services.roles import TABLE


class RolesField(forms.ModelMultipleChoiceField):
    """The four roles as boxes to tick."""

    def __init__(self, **options: Any) -> None:
        roles = Group.objects.filter(name__in=TABLE).order_by("name")
        super().__init__(
            roles,
            label=_("roles"),
            required=False,
            widget=forms.CheckboxSelectMultiple,
            **options,
        )


class PersonForm(StaffForm, UserChangeForm):
    """A person with roles."""

    groups = RolesField()


class PersonAddForm(StaffForm, AdminUserCreationForm):
    """A new person with a password and roles; without a password nobody logs in."""

    groups = RolesField()

    def _post_clean(self) -> None:
        super()._post_clean()
        self.instance.is_staff = True


class PasswordForm(AdminPasswordChangeForm):
    """A new password for a person, set as an act."""

    def save(self, commit: bool = True) -> Person:
        """Set the password and leave an act that says so."""
        registry.keep(
            self.user,
            save=super().save,
            verb=_t("set a password"),
            by=self.user.opened_by,
            at=timezone.now(),
        )
        return self.user


@admin.register(Person)
class PersonAdmin(RegistryAdmin, UserAdmin):
    """People who log in."""

    form = PersonForm
    add_form = PersonAddForm
    change_password_form = PasswordForm
    list_display = ("username", "last_name", "first_name", "office", "is_active")
    list_filter = ("is_active", "office", "groups")
    filter_horizontal = ()
    ordering = ("last_name", "first_name", "username")
    fieldsets = (
        (None, {"fields": ("username", "password")}),
        (
            _("Person"),
            {"fields": ("first_name", "last_name", "office", "phone", "email")},
        ),
        (_("Roles"), {"fields": ("groups", "is_active")}),
    )
    add_fieldsets = (
        (
            None,
            {
                "classes": ("wide",),
                "fields": ("username", "usable_password", "password1", "password2"),
            },
        ),
        (
            _("Person"),
            {"fields": ("first_name", "last_name", "office", "phone", "email", "groups")},
        ),
    )

    def has_change_permission(self, request: HttpRequest, obj: Any = None) -> bool:
        """Let only one of them touch an account that may do everything."""
        guarded = obj is not None and obj.is_superuser and not request.user.is_superuser
        return super().has_change_permission(request, obj) and not guarded

    def get_readonly_fields(self, request: HttpRequest, obj: Any = None) -> tuple[str, ...]:
        """Let nobody give roles to themselves, or lock themselves out."""
        return ("groups", "is_active") if obj is not None and obj == request.user else ()

    def verb_for(self, form: Any, *, change: bool) -> str:
        """Name the roles in the act where they changed: the history of rows has no sets."""
        if "groups" not in form.changed_data:
            return super().verb_for(form, change=change)
        roles = ", ".join(str(role) for role in form.cleaned_data["groups"]) or "–"
        verb = _t("give %(person)s the roles %(roles)s")
        return (verb % {"person": form.instance, "roles": roles})[:80]

    def get_object(self, request: HttpRequest, object_id: str, from_field: Any = None) -> Any:
        """Remember who opened the row: the password form asks for it."""
        person = super().get_object(request, object_id, from_field)
        if person is not None:
            person.opened_by = request.user
        return person
