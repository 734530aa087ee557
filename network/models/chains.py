"""What several models share: a place in a chain by date, a withdrawal, a form's version."""

from collections.abc import Sequence

from django.conf import settings
from django.db import models
from django.db.models import Q
from django.utils.translation import gettext_lazy as _


class StandingQuerySet(models.QuerySet):
    """Rows of which some are withdrawn."""

    def standing(self) -> "StandingQuerySet":
        """Keep the rows that are not withdrawn."""
        return self.filter(withdrawn_at__isnull=True)


def withdrawal_is_whole() -> models.CheckConstraint:
    """Ask for instant, person and reason of a withdrawal together or not at all."""
    return models.CheckConstraint(
        name="%(app_label)s_%(class)s_withdrawal_whole",
        condition=Q(withdrawn_at__isnull=True, withdrawn_by__isnull=True, withdrawn_reason="")
        | (Q(withdrawn_at__isnull=False, withdrawn_by__isnull=False) & ~Q(withdrawn_reason="")),
        violation_error_message=_("A withdrawal needs its instant, its author and a reason."),
    )


def one_standing(*fields: str, model: str, what: str, message: str) -> models.UniqueConstraint:
    """Allow one standing row for these fields; withdrawn ones do not count."""
    return models.UniqueConstraint(
        name=f"network_{model}_{what}",
        fields=fields,
        condition=Q(withdrawn_at__isnull=True),
        violation_error_message=message,
    )


class Withdrawable(models.Model):
    """A row that is never edited or deleted: a mistake is withdrawn with a reason."""

    withdrawn_at = models.DateTimeField(_("withdrawn at"), null=True, blank=True, editable=False)
    withdrawn_by = models.ForeignKey(
        settings.AUTH_USER_MODEL,
        models.PROTECT,
        null=True,
        blank=True,
        editable=False,
        related_name="+",
        verbose_name=_("withdrawn by"),
    )
    withdrawn_reason = models.TextField(_("reason of withdrawal"), blank=True, editable=False)

    objects = StandingQuerySet.as_manager()

    class Meta:
        abstract = True
        constraints: Sequence[models.BaseConstraint] = [withdrawal_is_whole()]

    @property
    def stands(self) -> bool:
        """Whether the row is not withdrawn."""
        return self.withdrawn_at is None


class Recorded(models.Model):
    """A row that says who recorded it and when."""

    recorded_at = models.DateTimeField(_("recorded at"), editable=False)
    recorded_by = models.ForeignKey(
        settings.AUTH_USER_MODEL,
        models.PROTECT,
        editable=False,
        related_name="+",
        verbose_name=_("recorded by"),
    )

    class Meta:
        abstract = True


class ChainRow(Recorded, Withdrawable):
    """A value in force from an instant until the next row of its chain begins."""

    effective_from = models.DateTimeField(_("in force from"))
    reason = models.TextField(_("reason"), blank=True)

    class Meta(Withdrawable.Meta):
        abstract = True
        ordering = ["effective_from"]


class Versioned(models.Model):
    """A row edited through forms: a save from an older version is told, not swallowed."""

    version = models.PositiveIntegerField(default=1, editable=False)

    class Meta:
        abstract = True
