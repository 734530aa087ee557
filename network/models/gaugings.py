"""Gaugings: the sheet as written at the river, and the result stored on signing."""

import uuid

from django.conf import settings
from django.db import models
from django.db.models import F, Q
from django.utils.translation import gettext_lazy as _

from network.models.acts import history
from network.models.chains import Recorded, Versioned


class Gauging(Recorded, Versioned):
    """One measurement of discharge."""

    class State(models.TextChoices):
        DRAFT = "draft", _("draft")
        SIGNED = "signed", _("signed")
        CHECKED = "checked", _("checked")

    class Way(models.TextChoices):
        WADING = "wading", _("wading")
        BRIDGE = "bridge", _("bridge")
        CABLEWAY = "cableway", _("cableway")
        BOAT = "boat", _("boat")
        ICE = "ice", _("ice")
        BANK = "bank", _("from the bank")

    class Method(models.TextChoices):
        VELOCITY_AREA = "meter", _("velocity-area with a current meter")
        MOVING_BOAT = "acoustic", _("moving-boat acoustic")
        FLOAT = "float", _("floats")
        DILUTION = "dilution", _("dilution")
        VOLUMETRIC = "volume", _("volumetric")
        WEIR = "weir", _("weir")

    class Sounding(models.TextChoices):
        ROD = "rod", _("rod")
        LINE = "line", _("weight on a line")
        ACOUSTIC = "acoustic", _("echo sounder")

    form_id = models.UUIDField(default=uuid.uuid4, unique=True, editable=False)
    station = models.ForeignKey("network.Station", models.PROTECT, related_name="gaugings")
    visit = models.ForeignKey(
        "network.Visit", models.PROTECT, null=True, blank=True, related_name="gaugings"
    )
    started_at = models.DateTimeField(_("started"))
    ended_at = models.DateTimeField(_("ended"))
    way = models.CharField(_("how"), max_length=10, choices=Way.choices, default=Way.WADING)
    method = models.CharField(
        _("method"), max_length=10, choices=Method.choices, default=Method.VELOCITY_AREA
    )
    party = models.ManyToManyField(settings.AUTH_USER_MODEL, blank=True, related_name="gaugings")
    pair = models.ForeignKey(
        "network.MeterPair", models.PROTECT, null=True, blank=True, related_name="gaugings",
        verbose_name=_("current meter"),
    )  # fmt: skip
    instrument = models.ForeignKey(
        "network.Instrument", models.PROTECT, null=True, blank=True, related_name="gaugings",
        verbose_name=_("other instrument"),
    )  # fmt: skip
    calibration = models.ForeignKey(
        "network.Calibration", models.PROTECT, null=True, blank=True, editable=False,
        related_name="gaugings",
    )  # fmt: skip
    sounding = models.CharField(
        _("sounding"), max_length=10, choices=Sounding.choices, default=Sounding.ROD
    )
    spin_test_seconds = models.FloatField(_("spin test, s"), null=True, blank=True)
    remarks = models.TextField(_("remarks"), blank=True)

    # A result from another method, with its own stated uncertainty.
    stated_discharge_m3s = models.FloatField(_("discharge stated, m³/s"), null=True, blank=True)
    stated_u95_percent = models.FloatField(_("U₉₅ stated, %"), null=True, blank=True)

    # Version of the workbook that was loaded last; cleared when the sheet is saved otherwise.
    workbook_version = models.PositiveIntegerField(null=True, editable=False)
    state = models.CharField(
        max_length=8, choices=State.choices, default=State.DRAFT, editable=False
    )
    signed_at = models.DateTimeField(null=True, blank=True, editable=False)
    signed_by = models.ForeignKey(
        settings.AUTH_USER_MODEL, models.PROTECT, null=True, blank=True, editable=False,
        related_name="+",
    )  # fmt: skip
    checked_at = models.DateTimeField(null=True, blank=True, editable=False)
    checked_by = models.ForeignKey(
        settings.AUTH_USER_MODEL, models.PROTECT, null=True, blank=True, editable=False,
        related_name="+",
    )  # fmt: skip

    # Stored on signing: what the sheet and the calibration alone decide.
    discharge_m3s = models.FloatField(_("discharge, m³/s"), null=True, editable=False)
    mid_section_m3s = models.FloatField(_("mid-section, m³/s"), null=True, editable=False)
    mean_section_m3s = models.FloatField(_("mean-section, m³/s"), null=True, editable=False)
    area_m2 = models.FloatField(_("area, m²"), null=True, editable=False)
    width_m = models.FloatField(_("width, m"), null=True, editable=False)
    mean_velocity_ms = models.FloatField(_("mean velocity, m/s"), null=True, editable=False)
    greatest_depth_m = models.FloatField(_("greatest depth, m"), null=True, editable=False)
    hydraulic_radius_m = models.FloatField(_("hydraulic radius, m"), null=True, editable=False)
    froude = models.FloatField(_("Froude number"), null=True, editable=False)
    u95_percent = models.FloatField(_("U₉₅, %"), null=True, editable=False)
    # The value at signing, kept as history; the present answer is computed when asked.
    signed_stage_m = models.FloatField(_("mean stage at signing, m"), null=True, editable=False)
    signed_deviation_percent = models.FloatField(null=True, editable=False)
    signed_shift_m = models.FloatField(null=True, editable=False)

    history = history()

    class Meta:
        verbose_name = _("gauging")
        verbose_name_plural = _("gaugings")
        ordering = ["-started_at"]
        indexes = [
            models.Index(fields=["station", "-started_at"], name="network_gauging_latest"),
            models.Index(
                fields=["station", "started_at"],
                condition=Q(checked_by__isnull=True),
                name="network_gauging_unchecked",
            ),
            models.Index(fields=["pair", "started_at", "ended_at"], name="network_gauging_by_pair"),
        ]
        constraints = [
            models.CheckConstraint(
                name="network_gauging_ends_after_start",
                condition=Q(ended_at__gte=F("started_at")),
                violation_error_message=_("A gauging ends after it started."),
            ),
            models.CheckConstraint(
                name="network_gauging_signed_has_result",
                condition=Q(state="draft", signed_at__isnull=True, signed_by__isnull=True)
                | Q(
                    state__in=["signed", "checked"],
                    signed_at__isnull=False,
                    signed_by__isnull=False,
                    discharge_m3s__isnull=False,
                ),
                violation_error_message=_("A signed gauging has a discharge and a signature."),
            ),
            models.CheckConstraint(
                name="network_gauging_check_whole",
                condition=Q(state="checked", checked_at__isnull=False, checked_by__isnull=False)
                | (~Q(state="checked") & Q(checked_at__isnull=True, checked_by__isnull=True)),
                violation_error_message=_("A checked gauging says by whom and when."),
            ),
        ]

    def __str__(self) -> str:
        return f"{self.station} {self.started_at:%Y-%m-%d}"


class StageReading(models.Model):
    """A stage read during a gauging, on a plate or typed as stage above the station zero."""

    gauging = models.ForeignKey(Gauging, models.CASCADE, related_name="stages")
    read_at = models.DateTimeField(_("time"))
    plate = models.ForeignKey(
        "network.StaffPlate", models.PROTECT, null=True, blank=True, verbose_name=_("plate"),
        help_text=_("Blank: the reading is a stage above the station zero."),
    )  # fmt: skip
    reading_m = models.FloatField(_("reading, m"))

    history = history()

    class Meta:
        verbose_name = _("stage reading")
        verbose_name_plural = _("stage readings")
        ordering = ["read_at", "pk"]

    def __str__(self) -> str:
        return f"{self.reading_m} m"


class GaugingFinding(models.Model):
    """Something the program found about a signed gauging, with its limit and source."""

    gauging = models.ForeignKey(Gauging, models.CASCADE, related_name="findings")
    kind = models.CharField(max_length=40)
    place = models.CharField(_("where"), max_length=60, blank=True)
    sentence = models.CharField(_("finding"), max_length=300)
    source = models.CharField(_("source"), max_length=120, blank=True)

    class Meta:
        verbose_name = _("finding")
        verbose_name_plural = _("findings")

    def __str__(self) -> str:
        return self.sentence
