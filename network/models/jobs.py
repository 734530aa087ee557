"""Long work in our own rows: a lease tells when its worker is gone, progress how far it is."""

from django.db import models
from django.db.models import F, Q
from django.utils.translation import gettext_lazy as _


class Job(models.Model):
    """One piece of long work."""

    class State(models.TextChoices):
        WAITING = "waiting", _("waiting")
        RUNNING = "running", _("running")
        DONE = "done", _("done")
        FAILED = "failed", _("failed")

    kind = models.CharField(_("kind"), max_length=60)
    subject = models.CharField(_("about"), max_length=200, blank=True)
    state = models.CharField(_("state"), max_length=8, choices=State.choices, default=State.WAITING)
    asked_at = models.DateTimeField(_("asked at"))
    asked_by = models.ForeignKey(
        "network.Person", models.PROTECT, null=True, related_name="jobs", verbose_name=_("by")
    )
    lease_until = models.DateTimeField(null=True)
    holder = models.CharField(max_length=40, blank=True)
    attempts = models.PositiveSmallIntegerField(_("attempts"), default=0)
    steps_done = models.PositiveIntegerField(_("done"), default=0)
    steps_total = models.PositiveIntegerField(_("of"), default=0)
    message = models.TextField(_("message"), blank=True)

    class Meta:
        verbose_name = _("job")
        verbose_name_plural = _("jobs")
        ordering = ["-asked_at", "-pk"]
        constraints = [
            models.CheckConstraint(
                name="network_job_running_has_lease",
                condition=~Q(state="running") | Q(lease_until__isnull=False),
                violation_error_message=_("Running work holds a lease."),
            ),
            models.CheckConstraint(
                name="network_job_progress",
                condition=Q(steps_done__lte=F("steps_total")),
                violation_error_message=_("Progress does not pass its total."),
            ),
        ]

    def __str__(self) -> str:
        return f"{self.kind} {self.subject}"
