"""Visits of field parties: what was read, checked, done and left to do."""

import uuid

from django.conf import settings
from django.db import models
from django.db.models import F, Q
from django.utils.translation import gettext_lazy as _

from network.models.acts import history
from network.models.chains import Recorded, Versioned


class Visit(Recorded, Versioned):
    """One visit to a station."""

    class State(models.TextChoices):
        DRAFT = "draft", _("draft")
        CHECKED = "checked", _("checked")

    class Control(models.TextChoices):
        CLEAR = "clear", _("clear")
        WEED = "weed", _("weed")
        DEBRIS = "debris", _("debris")
        ICE = "ice", _("ice")
        SCOURED = "scoured", _("scoured")
        SILTED = "silted", _("silted")
        BACKWATER = "backwater", _("backwater")

    form_id = models.UUIDField(default=uuid.uuid4, unique=True, editable=False)
    station = models.ForeignKey("network.Station", models.PROTECT, related_name="visits")
    arrived_at = models.DateTimeField(_("arrived"))
    departed_at = models.DateTimeField(_("departed"), null=True, blank=True)
    party = models.ManyToManyField(
        settings.AUTH_USER_MODEL, blank=True, related_name="visits", verbose_name=_("party")
    )
    is_routine = models.BooleanField(_("routine"), default=True)
    is_for_gauging = models.BooleanField(_("gauging"), default=False)
    is_for_levels = models.BooleanField(_("level check"), default=False)
    is_for_repair = models.BooleanField(_("repair"), default=False)
    is_for_flood = models.BooleanField(_("flood"), default=False)
    weather = models.CharField(_("weather"), max_length=120, blank=True)
    river = models.CharField(_("river"), max_length=120, blank=True)
    control_condition = models.CharField(
        _("control"), max_length=10, choices=Control.choices, default=Control.CLEAR
    )
    instruments = models.ManyToManyField(
        "network.Instrument", blank=True, related_name="visits", verbose_name=_("instruments used")
    )
    work_done = models.TextField(_("work done"), blank=True)
    remarks = models.TextField(_("remarks"), blank=True)
    state = models.CharField(
        max_length=8, choices=State.choices, default=State.DRAFT, editable=False
    )
    checked_at = models.DateTimeField(null=True, blank=True, editable=False)
    checked_by = models.ForeignKey(
        settings.AUTH_USER_MODEL, models.PROTECT, null=True, blank=True, editable=False,
        related_name="+",
    )  # fmt: skip

    history = history()

    class Meta:
        verbose_name = _("visit")
        verbose_name_plural = _("visits")
        ordering = ["-arrived_at"]
        indexes = [
            models.Index(
                fields=["station", "-arrived_at", "is_routine"], name="network_visit_latest"
            ),
            models.Index(
                fields=["station", "arrived_at"],
                condition=Q(checked_by__isnull=True),
                name="network_visit_unchecked",
            ),
        ]
        constraints = [
            models.CheckConstraint(
                name="network_visit_departed_after_arrived",
                condition=Q(departed_at__isnull=True) | Q(departed_at__gte=F("arrived_at")),
                violation_error_message=_("The party departs after it arrived."),
            )
        ]

    def __str__(self) -> str:
        return f"{self.station} {self.arrived_at:%Y-%m-%d}"


class VisitReading(models.Model):
    """One reading of a plate or of another gauge, or that it was dry or frozen."""

    class Observation(models.TextChoices):
        READ = "read", _("read")
        DRY = "dry", _("dry")
        FROZEN = "frozen", _("frozen")

    visit = models.ForeignKey(Visit, models.CASCADE, related_name="readings")
    read_at = models.DateTimeField(_("time"))
    plate = models.ForeignKey(
        "network.StaffPlate", models.PROTECT, null=True, blank=True, verbose_name=_("plate")
    )
    other_gauge = models.ForeignKey(
        "network.OtherGauge", models.PROTECT, null=True, blank=True, verbose_name=_("other gauge")
    )
    observation = models.CharField(
        _("observation"), max_length=6, choices=Observation.choices, default=Observation.READ
    )
    reading_m = models.FloatField(_("reading, m"), null=True, blank=True)
    wave_m = models.FloatField(_("± wave, m"), null=True, blank=True)

    history = history()

    class Meta:
        verbose_name = _("gauge reading")
        verbose_name_plural = _("gauge readings")
        ordering = ["read_at", "pk"]
        constraints = [
            models.CheckConstraint(
                name="network_visitreading_one_gauge",
                condition=Q(plate__isnull=False, other_gauge__isnull=True)
                | Q(plate__isnull=True, other_gauge__isnull=False),
                violation_error_message=_("A reading names one plate or one other gauge."),
            ),
            models.CheckConstraint(
                name="network_visitreading_value_when_read",
                condition=Q(observation="read", reading_m__isnull=False)
                | (~Q(observation="read") & Q(reading_m__isnull=True)),
                violation_error_message=_("A reading has a value; dry or frozen has none."),
            ),
            models.CheckConstraint(
                name="network_visitreading_wave",
                condition=Q(wave_m__isnull=True) | Q(wave_m__gte=0),
                violation_error_message=_("The wave is not negative."),
            ),
        ]

    def __str__(self) -> str:
        return f"{self.plate or self.other_gauge}: {self.reading_m}"


class RecorderCheck(models.Model):
    """The recorder against the staff, as found and as left."""

    visit = models.ForeignKey(Visit, models.CASCADE, related_name="recorder_checks")
    series = models.ForeignKey(
        "network.Series", models.PROTECT, related_name="recorder_checks", verbose_name=_("series")
    )
    checked_at = models.DateTimeField(_("time"))
    found_m = models.FloatField(_("recorder as found, m"), null=True, blank=True)
    left_m = models.FloatField(_("recorder as left, m"), null=True, blank=True)
    staff_stage_m = models.FloatField(_("stage by the staff, m"), null=True, blank=True)
    wave_m = models.FloatField(_("± wave, m"), null=True, blank=True)
    clock_error_s = models.IntegerField(
        _("clock error, s"), null=True, blank=True, help_text=_("Above zero: the recorder is fast.")
    )
    battery_v = models.FloatField(_("battery, V"), null=True, blank=True)
    gas_kpa = models.FloatField(_("gas pressure, kPa"), null=True, blank=True)
    was_purged = models.BooleanField(_("purged"), default=False)
    was_downloaded = models.BooleanField(_("download taken"), default=False)

    history = history()

    class Meta:
        verbose_name = _("recorder check")
        verbose_name_plural = _("recorder checks")
        ordering = ["checked_at"]
        constraints = [
            models.UniqueConstraint(
                name="network_recordercheck_once",
                fields=["visit", "series", "checked_at"],
                violation_error_message=_("A series is checked once at one time."),
            )
        ]

    def __str__(self) -> str:
        return f"{self.series} {self.checked_at:%Y-%m-%d}"


class SpinTest(models.Model):
    """How long a rotor turned freely."""

    visit = models.ForeignKey(Visit, models.CASCADE, related_name="spin_tests")
    pair = models.ForeignKey("network.MeterPair", models.PROTECT, verbose_name=_("current meter"))
    seconds = models.FloatField(_("seconds"))
    is_good = models.BooleanField(_("good"), default=True)

    history = history()

    class Meta:
        verbose_name = _("spin test")
        verbose_name_plural = _("spin tests")
        constraints = [
            models.CheckConstraint(
                name="network_spintest_seconds",
                condition=Q(seconds__gte=0),
                violation_error_message=_("A spin test lasts at least zero seconds."),
            )
        ]

    def __str__(self) -> str:
        return f"{self.pair}: {self.seconds} s"


class WorkLeft(models.Model):
    """Work that a visit left to do, until someone says it is done."""

    visit = models.ForeignKey(Visit, models.CASCADE, related_name="work_left")
    text = models.CharField(_("work left"), max_length=300)
    done_at = models.DateTimeField(null=True, blank=True, editable=False)
    done_by = models.ForeignKey(
        settings.AUTH_USER_MODEL, models.PROTECT, null=True, blank=True, editable=False,
        related_name="+",
    )  # fmt: skip

    history = history()

    class Meta:
        verbose_name = _("work left")
        verbose_name_plural = _("work left")

    def __str__(self) -> str:
        return self.text


class Photograph(models.Model):
    """A photograph of a visit, stored without its position data."""

    visit = models.ForeignKey(Visit, models.CASCADE, related_name="photographs")
    form_id = models.UUIDField(default=uuid.uuid4, editable=False)
    image = models.ImageField(_("photograph"), upload_to="photographs/", max_length=200)
    caption = models.CharField(_("caption"), max_length=200, blank=True)

    history = history()

    class Meta:
        verbose_name = _("photograph")
        verbose_name_plural = _("photographs")

    def __str__(self) -> str:
        return self.caption or self.image.name
