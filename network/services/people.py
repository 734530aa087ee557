"""People and their roles: taken on, and given what their role may do."""

from collections.abc import Sequence
from datetime import datetime
from typing import Any

from django.contrib.auth.models import Group
from django.contrib.auth.password_validation import validate_password
from django.utils.translation import gettext as _

from network.models import Person
from network.services import roles
from network.services.acts import Refusal, open_act


def take_on(
    *,
    username: str,
    password: str,
    roles_held: Sequence[str],
    by: Person | None,
    at: datetime,
    **particulars: Any,
) -> Person:
    """Take on a person who may log in, with the roles named as in services.roles.

    `particulars` are other fields of the person: first_name, office, phone and so on. Refuses a
    login that is taken, a password too easily guessed and a role that does not exist.
    """
    unknown = set(roles_held) - set(roles.TABLE)
    if unknown:
        raise Refusal(_("There is no role “%(name)s”.") % {"name": min(unknown)}, field="roles")
    person = Person(username=username.strip(), is_staff=True, **particulars)
    with open_act(_("took on a person"), by=by, at=at):
        validate_password(password, person)
        person.set_password(password)
        person.full_clean()
        person.save()
        person.groups.set(Group.objects.filter(name__in=roles_held))
    return person
