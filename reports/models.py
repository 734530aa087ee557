"""Editions and volumes: what was compiled and issued; issued ones are frozen."""

from django.conf import settings
from django.db import models
from django.db.models import Q
from django.utils.translation import gettext as _t
from django.utils.translation import gettext_lazy as _

from network.models.acts import history


class Edition(models.Model):
    """One compiled yearbook of a station and water year."""

    class State(models.TextChoices):
        COMPILED = "compiled", _("compiled")
        ISSUED = "issued", _("issued")
        SUPERSEDED = "superseded", _("superseded")

    station = models.ForeignKey("network.Station", models.PROTECT, related_name="editions")
    first_day = models.DateField(_("first day"))
    last_day = models.DateField(_("last day"))
    year_label = models.CharField(_("water year"), max_length=9)
    number = models.PositiveSmallIntegerField(_("edition"))
    language = models.CharField(_("language of print"), max_length=10, blank=True)
    state = models.CharField(
        max_length=10, choices=State.choices, default=State.COMPILED, editable=False
    )
    compiled_at = models.DateTimeField(_("compiled at"), editable=False)
    compiled_by = models.ForeignKey(
        settings.AUTH_USER_MODEL, models.PROTECT, editable=False, related_name="+"
    )
    issued_at = models.DateTimeField(_("issued at"), null=True, blank=True, editable=False)
    issued_by = models.ForeignKey(
        settings.AUTH_USER_MODEL, models.PROTECT, null=True, blank=True, editable=False,
        related_name="+",
    )  # fmt: skip
    reason = models.TextField(_("reason of a later edition"), blank=True)
    open_points = models.TextField(_("open points at issue"), blank=True)
    open_points_reason = models.TextField(_("issued all the same because"), blank=True)
    # The line of this edition in a volume's summary, as the edition itself prints it.
    mean_text = models.CharField(_("mean"), max_length=20, blank=True)
    highest_text = models.CharField(_("highest day"), max_length=20, blank=True)
    highest_on = models.DateField(_("on"), null=True, blank=True)
    lowest_text = models.CharField(_("lowest day"), max_length=20, blank=True)
    lowest_on = models.DateField(_("on"), null=True, blank=True)
    runoff_text = models.CharField(_("runoff, mm"), max_length=20, blank=True)
    days_given = models.PositiveSmallIntegerField(_("days with a value"), default=0)
    numbers_sha256 = models.CharField(_("SHA-256 of the numbers"), max_length=64)
    pdf = models.FileField(_("PDF"), upload_to="editions/", max_length=200)
    csv = models.FileField(_("data"), upload_to="editions/", max_length=200)

    history = history()

    class Meta:
        verbose_name = _("edition")
        verbose_name_plural = _("editions")
        ordering = ["station", "-first_day", "-number"]
        constraints = [
            models.UniqueConstraint(
                name="reports_edition_number_once",
                fields=["station", "first_day", "number"],
                violation_error_message=_("This year already has an edition of that number."),
            ),
            models.UniqueConstraint(
                name="reports_edition_one_issued",
                fields=["station", "first_day"],
                condition=Q(state="issued"),
                violation_error_message=_("A year has one issued edition; supersede it."),
            ),
            models.CheckConstraint(
                name="reports_edition_issue_whole",
                condition=Q(state="compiled", issued_at__isnull=True, issued_by__isnull=True)
                | (~Q(state="compiled") & Q(issued_at__isnull=False, issued_by__isnull=False)),
                violation_error_message=_("An issued edition says by whom and when."),
            ),
            models.CheckConstraint(
                name="reports_edition_open_points_explained",
                condition=Q(state="compiled") | Q(open_points="") | ~Q(open_points_reason=""),
                violation_error_message=_("Issuing past an open point needs a written reason."),
            ),
        ]

    def __str__(self) -> str:
        return _t("{station}, {year}, edition {number}").format(
            station=self.station, year=self.year_label, number=self.number
        )


class Volume(models.Model):
    """A year's issued editions bound in one PDF."""

    title = models.CharField(_("title"), max_length=200)
    first_day = models.DateField(_("first day"))
    year_label = models.CharField(_("water year"), max_length=9)
    bound_at = models.DateTimeField(_("bound at"), editable=False)
    bound_by = models.ForeignKey(
        settings.AUTH_USER_MODEL, models.PROTECT, editable=False, related_name="+"
    )
    editions = models.ManyToManyField(Edition, related_name="volumes", verbose_name=_("editions"))
    pdf = models.FileField(_("PDF"), upload_to="editions/", max_length=200)

    history = history()

    class Meta:
        verbose_name = _("volume")
        verbose_name_plural = _("volumes")
        ordering = ["-first_day", "-bound_at"]

    def __str__(self) -> str:
        return self.title
