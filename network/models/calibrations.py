"""Calibrations of instruments: tow runs and meter ratings."""

from django.db import models
from django.db.models import Q
from django.utils.translation import gettext_lazy as _

from network.models.acts import history
from network.models.chains import ChainRow, one_standing


class Calibration(ChainRow):
    """A calibration of a meter, of a group of meters or of another instrument."""

    class Source(models.TextChoices):
        TOW_RUNS = "runs", _("fitted here to tow runs")
        CERTIFICATE = "certificate", _("typed from the certificate")

    class Outcome(models.TextChoices):
        PASSED = "passed", _("passed")
        ADJUSTED = "adjusted", _("adjusted and passed")
        FAILED = "failed", _("failed")

    pair = models.ForeignKey(
        "network.MeterPair", models.PROTECT, null=True, blank=True, related_name="calibrations",
        verbose_name=_("current meter"),
    )  # fmt: skip
    group = models.ForeignKey(
        "network.MeterGroup", models.PROTECT, null=True, blank=True, related_name="calibrations"
    )
    instrument = models.ForeignKey(
        "network.Instrument", models.PROTECT, null=True, blank=True, related_name="calibrations"
    )
    laboratory = models.CharField(_("laboratory"), max_length=120, blank=True)
    certificate_number = models.CharField(_("certificate number"), max_length=60, blank=True)
    certificate = models.FileField(_("certificate"), upload_to="certificates/", blank=True)
    source = models.CharField(
        _("source"), max_length=12, choices=Source.choices, default=Source.CERTIFICATE
    )
    lowest_velocity_ms = models.FloatField(_("valid from, m/s"), null=True, blank=True)
    highest_velocity_ms = models.FloatField(_("valid to, m/s"), null=True, blank=True)
    standard_error_ms = models.FloatField(_("standard error, m/s"), null=True, blank=True)
    uncertainty_percent = models.FloatField(
        _("standard uncertainty stated, %"), null=True, blank=True
    )
    outcome = models.CharField(
        _("outcome"), max_length=10, choices=Outcome.choices, default=Outcome.PASSED
    )

    history = history()

    class Meta(ChainRow.Meta):
        verbose_name = _("calibration")
        verbose_name_plural = _("calibrations")
        constraints = [
            *ChainRow.Meta.constraints,
            models.CheckConstraint(
                name="network_calibration_one_owner",
                condition=Q(pair__isnull=False, group__isnull=True, instrument__isnull=True)
                | Q(pair__isnull=True, group__isnull=False, instrument__isnull=True)
                | Q(pair__isnull=True, group__isnull=True, instrument__isnull=False),
                violation_error_message=_(
                    "A calibration belongs to a meter, a group of meters or an instrument."
                ),
            ),
            *(
                one_standing(
                    owner,
                    "effective_from",
                    model="calibration",
                    what=f"start_once_{owner}",
                    message=_("There is already a calibration from this instant."),
                )
                for owner in ("pair", "group", "instrument")
            ),
        ]

    def __str__(self) -> str:
        return f"{self.pair or self.group or self.instrument} {self.effective_from:%Y-%m-%d}"


class CalibrationPiece(models.Model):
    """One straight piece v = a + b·n of a meter rating with its range of n."""

    calibration = models.ForeignKey(Calibration, models.CASCADE, related_name="pieces")
    lowest_n = models.FloatField(_("from n, rev/s"), default=0)
    highest_n = models.FloatField(_("to n, rev/s"), null=True, blank=True)
    a_ms = models.FloatField(_("a, m/s"))
    b_m = models.FloatField(_("b, m"))

    class Meta:
        verbose_name = _("piece")
        verbose_name_plural = _("pieces")
        ordering = ["lowest_n"]
        constraints = [
            models.UniqueConstraint(
                name="network_calibrationpiece_start_once",
                fields=["calibration", "lowest_n"],
                violation_error_message=_("Two pieces start at the same n."),
            ),
            models.CheckConstraint(
                name="network_calibrationpiece_rises",
                condition=Q(b_m__gt=0),
                violation_error_message=_("The velocity rises with n: b is above zero."),
            ),
        ]

    def __str__(self) -> str:
        return f"v = {self.a_ms} + {self.b_m}·n"


class TowRun(models.Model):
    """One run of the carriage over the tank."""

    calibration = models.ForeignKey(Calibration, models.CASCADE, related_name="tow_runs")
    position = models.PositiveSmallIntegerField()
    speed_ms = models.FloatField(_("carriage speed, m/s"))
    revolutions = models.FloatField(_("revolutions"))
    seconds = models.FloatField(_("seconds"))

    class Meta:
        verbose_name = _("tow run")
        verbose_name_plural = _("tow runs")
        ordering = ["position"]
        constraints = [
            models.UniqueConstraint(
                name="network_towrun_position_once",
                fields=["calibration", "position"],
                violation_error_message=_("Two tow runs stand on the same line."),
            ),
            models.CheckConstraint(
                name="network_towrun_plausible",
                condition=Q(speed_ms__gte=0, revolutions__gte=0, seconds__gt=0),
                violation_error_message=_(
                    "A tow run has a speed and revolutions of at least zero and lasts some time."
                ),
            ),
        ]

    def __str__(self) -> str:
        return f"{self.speed_ms} m/s"
