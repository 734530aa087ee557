"""Stations, when they ran, how their site was judged, and their papers."""

from django.conf import settings
from django.db import models
from django.db.models import F, Q
from django.utils.translation import gettext_lazy as _

from network.models.acts import history
from network.models.chains import Recorded, Versioned


class Station(Versioned):
    """A gauging station on a river."""

    class Kind(models.TextChoices):
        DISCHARGE = "discharge", _("stage–discharge station")
        STAGE_ONLY = "stage", _("stage-only station")
        WEIR = "weir", _("weir")

    class Unrated(models.TextChoices):
        BACKWATER = "backwater", _("variable backwater")
        INDEX_VELOCITY = "velocity", _("index velocity")
        TIDAL = "tidal", _("tide")

    code = models.CharField(_("code"), max_length=20)
    name = models.CharField(_("name"), max_length=120)
    river = models.CharField(_("river"), max_length=120)
    basin = models.CharField(_("basin"), max_length=120, blank=True)
    latitude_deg = models.FloatField(_("latitude, °"))
    longitude_deg = models.FloatField(_("longitude, °"))
    catchment_km2 = models.FloatField(_("catchment area, km²"), null=True, blank=True)
    kind = models.CharField(_("kind"), max_length=10, choices=Kind.choices, default=Kind.DISCHARGE)
    unrated_because = models.CharField(
        _("no single rating because of"),
        max_length=10,
        choices=Unrated.choices,
        blank=True,
        help_text=_("Such a station keeps its stage record and gaugings; it is not rated here."),
    )
    control = models.TextField(_("control"), blank=True)
    description = models.TextField(_("description"), blank=True)
    highlights = models.TextField(_("what stood out"), blank=True)
    office = models.ForeignKey("network.Office", models.PROTECT, verbose_name=_("office"))
    hazards = models.TextField(_("hazards"), blank=True)
    safety_notes = models.TextField(_("safety notes"), blank=True)
    access_notes = models.TextField(_("access"), blank=True)
    visit_interval_days = models.PositiveSmallIntegerField(
        _("routine visit every, days"), null=True, blank=True
    )
    level_check_interval_months = models.PositiveSmallIntegerField(
        _("level check every, months"), null=True, blank=True
    )
    gaugings_wanted_per_year = models.PositiveSmallIntegerField(
        _("gaugings wanted a year"), null=True, blank=True
    )
    # Raised by every act that touches an input of the published figures.
    record_version = models.PositiveIntegerField(default=1, editable=False)

    history = history(excluded_fields=["record_version"])

    class Meta:
        verbose_name = _("station")
        verbose_name_plural = _("stations")
        ordering = ["code"]
        constraints = [
            models.UniqueConstraint(
                name="network_station_code_once",
                fields=["code"],
                violation_error_message=_("There is already a station with this code."),
            ),
            models.CheckConstraint(
                name="network_station_on_earth",
                condition=Q(latitude_deg__range=(-90, 90), longitude_deg__range=(-180, 180)),
                violation_error_message=_("Latitude lies within ±90°, longitude within ±180°."),
            ),
            models.CheckConstraint(
                name="network_station_catchment_positive",
                condition=Q(catchment_km2__isnull=True) | Q(catchment_km2__gt=0),
                violation_error_message=_("The catchment area is above zero."),
            ),
        ]

    def __str__(self) -> str:
        return f"{self.code} {self.name}"

    @property
    def is_rated(self) -> bool:
        """Whether stage is turned into flow here."""
        return self.kind != self.Kind.STAGE_ONLY and not self.unrated_because


class OperationPeriod(models.Model):
    """A period in which a station was run."""

    station = models.ForeignKey(Station, models.CASCADE, related_name="operation_periods")
    opened_on = models.DateField(_("opened"))
    closed_on = models.DateField(_("closed"), null=True, blank=True)

    history = history()

    class Meta:
        verbose_name = _("period of operation")
        verbose_name_plural = _("periods of operation")
        ordering = ["opened_on"]
        constraints = [
            models.UniqueConstraint(
                name="network_operationperiod_opened_once",
                fields=["station", "opened_on"],
                violation_error_message=_("This station already has a period opened on that day."),
            ),
            models.CheckConstraint(
                name="network_operationperiod_closed_after_opened",
                condition=Q(closed_on__isnull=True) | Q(closed_on__gte=F("opened_on")),
                violation_error_message=_("A station closes on or after the day it opened."),
            ),
        ]

    def __str__(self) -> str:
        return f"{self.opened_on} – {self.closed_on or ''}"


class SiteSurvey(Recorded):
    """A dated judgement of a site against the usual criteria."""

    station = models.ForeignKey(Station, models.PROTECT, related_name="site_surveys")
    surveyed_on = models.DateField(_("surveyed on"))
    remarks = models.TextField(_("remarks"), blank=True)

    history = history()

    class Meta:
        verbose_name = _("site survey")
        verbose_name_plural = _("site surveys")
        ordering = ["-surveyed_on"]
        constraints = [
            models.UniqueConstraint(
                name="network_sitesurvey_day_once",
                fields=["station", "surveyed_on"],
                violation_error_message=_("This station already has a site survey of that day."),
            )
        ]

    def __str__(self) -> str:
        return f"{self.station} {self.surveyed_on}"


class SiteCriterion(models.Model):
    """One criterion of a site survey and how it was met."""

    class Criterion(models.TextChoices):
        STRAIGHT = "straight", _("straight reach")
        STABLE = "stable", _("stable, well-defined section")
        ONE_CHANNEL = "channel", _("one channel at all stages")
        NO_BACKWATER = "backwater", _("free of backwater")
        NO_WEED = "weed", _("free of weed")
        ACCESS = "access", _("accessible in every season and at flood")
        VELOCITY = "velocity", _("velocities within the meter's range")

    class Verdict(models.TextChoices):
        MET = "met", _("met")
        NOT_MET = "not_met", _("not met")
        NOT_KNOWN = "not_known", _("not known")

    survey = models.ForeignKey(SiteSurvey, models.CASCADE, related_name="criteria")
    criterion = models.CharField(_("criterion"), max_length=12, choices=Criterion.choices)
    verdict = models.CharField(
        _("verdict"), max_length=10, choices=Verdict.choices, default=Verdict.NOT_KNOWN
    )
    remark = models.CharField(_("remark"), max_length=300, blank=True)

    history = history()

    class Meta:
        verbose_name = _("criterion")
        verbose_name_plural = _("criteria")
        constraints = [
            models.UniqueConstraint(
                name="network_sitecriterion_once",
                fields=["survey", "criterion"],
                violation_error_message=_("Each criterion is judged once in a survey."),
            )
        ]

    def __str__(self) -> str:
        return self.get_criterion_display()


class Document(models.Model):
    """A document or photograph of a station."""

    station = models.ForeignKey(Station, models.PROTECT, related_name="documents")
    title = models.CharField(_("title"), max_length=200)
    file = models.FileField(_("file"), upload_to="documents/")
    dated = models.DateField(_("date"), null=True, blank=True)
    caption = models.CharField(_("caption"), max_length=300, blank=True)
    uploaded_at = models.DateTimeField(_("uploaded at"), editable=False)
    uploaded_by = models.ForeignKey(
        settings.AUTH_USER_MODEL, models.PROTECT, editable=False, related_name="+"
    )

    history = history()

    class Meta:
        verbose_name = _("document")
        verbose_name_plural = _("documents")
        ordering = ["-dated", "title"]

    def __str__(self) -> str:
        return self.title
