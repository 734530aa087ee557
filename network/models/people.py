"""People who act: deactivated when they leave, never deleted."""

from django.contrib.auth.models import AbstractUser
from django.db import models
from django.utils.translation import gettext_lazy as _

from network.models.acts import history


class Person(AbstractUser):
    """A person with a login and, through the groups, a role."""

    office = models.ForeignKey(
        "network.Office", models.PROTECT, null=True, blank=True, verbose_name=_("office")
    )
    phone = models.CharField(_("telephone"), max_length=40, blank=True)

    history = history(excluded_fields=["password", "last_login"])

    class Meta:
        verbose_name = _("person")
        verbose_name_plural = _("people")
        ordering = ["last_name", "first_name", "username"]

    def __str__(self) -> str:
        return self.get_full_name() or self.username
