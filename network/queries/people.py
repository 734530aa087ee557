"""People, found by their login."""

from django.utils.translation import gettext as _

from network.models import Person
from network.queries.series import Unknown


def person_named(username: str) -> Person:
    """Return the active person with that login. Raises Unknown."""
    found = Person.objects.filter(username=username, is_active=True).first()
    if found is None:
        raise Unknown(_("There is no active person “%(name)s”.") % {"name": username})
    return found
