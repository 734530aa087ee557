"""Every act: who did what, when and why; the rows it changed point back to it."""

from contextvars import ContextVar

from django.db import models
from django.utils.translation import gettext_lazy as _
from simple_history.models import HistoricalRecords

# The act under way in this thread or task; services.acts sets it, history rows read it.
current_act: ContextVar[int | None] = ContextVar("current_act", default=None)


def current_act_id() -> int | None:
    """Return the key of the act under way, or none."""
    return current_act.get()


class Act(models.Model):
    """One act of one person on one station, or on the network as a whole."""

    verb = models.CharField(_("act"), max_length=80)
    done_by = models.ForeignKey(
        "network.Person", models.PROTECT, null=True, blank=True, verbose_name=_("by")
    )
    done_at = models.DateTimeField(_("at"))
    reason = models.TextField(_("reason"), blank=True)
    station = models.ForeignKey(
        "network.Station", models.PROTECT, null=True, blank=True, related_name="acts"
    )

    class Meta:
        verbose_name = _("act")
        verbose_name_plural = _("acts")
        ordering = ["-done_at", "-pk"]
        indexes = [models.Index(fields=["station", "-done_at"], name="network_act_by_station")]

    def __str__(self) -> str:
        return self.verb


class TiedToAct(models.Model):
    """A history row that knows the act it belongs to."""

    act = models.ForeignKey(
        Act, models.PROTECT, null=True, default=current_act_id, related_name="+"
    )

    class Meta:
        abstract = True


def history(**options: object) -> HistoricalRecords:
    """Keep old and new of every row of a model, tied to the act that changed it."""
    return HistoricalRecords(bases=[TiedToAct], **options)
