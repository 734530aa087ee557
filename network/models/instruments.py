"""Instruments, meters as body and rotor, and where a recorder stood."""

from django.db import models
from django.db.models import F, Q
from django.utils.translation import gettext_lazy as _

from network.models.acts import history
from network.models.chains import Recorded


class Instrument(models.Model):
    """A piece of equipment with a serial number."""

    class Kind(models.TextChoices):
        FLOAT = "float", _("float recorder in a stilling well")
        BUBBLER = "bubbler", _("gas bubbler")
        PRESSURE = "pressure", _("pressure recorder")
        RADAR = "radar", _("radar recorder")
        METER_BODY = "body", _("current meter body")
        METER_ROTOR = "rotor", _("current meter rotor")
        ACOUSTIC = "acoustic", _("acoustic profiler")
        ELECTROMAGNETIC = "em", _("electromagnetic meter")
        LEVEL = "level", _("level")
        STAFF = "staff", _("levelling staff")
        CONDUCTIVITY = "salt", _("conductivity meter")
        WINCH = "winch", _("winch and weight")
        OTHER = "other", _("other")

    class Status(models.TextChoices):
        IN_SERVICE = "service", _("in service")
        IN_CALIBRATION = "calibration", _("in for calibration")
        SPARE = "spare", _("spare")
        WITHDRAWN = "withdrawn", _("withdrawn")

    kind = models.CharField(_("kind"), max_length=10, choices=Kind.choices)
    maker = models.CharField(_("maker"), max_length=80, blank=True)
    model = models.CharField(_("model"), max_length=80, blank=True)
    serial = models.CharField(_("serial number"), max_length=60)
    status = models.CharField(
        _("status"), max_length=12, choices=Status.choices, default=Status.IN_SERVICE
    )
    office = models.ForeignKey("network.Office", models.PROTECT, verbose_name=_("office"))
    interval_months = models.PositiveSmallIntegerField(
        _("calibrate every, months"), null=True, blank=True
    )
    interval_hours = models.PositiveSmallIntegerField(
        _("calibrate every, hours of use"), null=True, blank=True
    )
    remarks = models.TextField(_("remarks"), blank=True)

    history = history()

    class Meta:
        verbose_name = _("instrument")
        verbose_name_plural = _("instruments")
        ordering = ["kind", "serial"]
        constraints = [
            models.UniqueConstraint(
                name="network_instrument_serial_once",
                fields=["kind", "maker", "serial"],
                violation_error_message=_(
                    "There is already an instrument of this kind, maker and serial number."
                ),
            )
        ]

    def __str__(self) -> str:
        return f"{self.get_kind_display()} {self.serial}"


class MeterGroup(models.Model):
    """Meters of one type that share a group rating."""

    name = models.CharField(_("name"), max_length=80)

    history = history()

    class Meta:
        verbose_name = _("group of meters")
        verbose_name_plural = _("groups of meters")
        ordering = ["name"]
        constraints = [
            models.UniqueConstraint(
                name="network_metergroup_name_once",
                fields=["name"],
                violation_error_message=_("There is already a group of this name."),
            )
        ]

    def __str__(self) -> str:
        return self.name


class MeterPair(models.Model):
    """A body and a rotor: the meter rating belongs to the two together."""

    body = models.ForeignKey(Instrument, models.PROTECT, related_name="pairs_as_body")
    rotor = models.ForeignKey(Instrument, models.PROTECT, related_name="pairs_as_rotor")
    group = models.ForeignKey(
        MeterGroup, models.PROTECT, null=True, blank=True, related_name="pairs",
        verbose_name=_("group rating"),
    )  # fmt: skip
    is_cup_meter = models.BooleanField(_("cup meter (vertical axis)"), default=False)

    history = history()

    class Meta:
        verbose_name = _("current meter")
        verbose_name_plural = _("current meters")
        ordering = ["body__serial", "rotor__serial"]
        constraints = [
            models.UniqueConstraint(
                name="network_meterpair_once",
                fields=["body", "rotor"],
                violation_error_message=_("This body and rotor are already a pair."),
            ),
            models.CheckConstraint(
                name="network_meterpair_two_parts",
                condition=~Q(body=F("rotor")),
                violation_error_message=_("Body and rotor are two instruments."),
            ),
        ]

    def __str__(self) -> str:
        return f"{self.body.serial} / {self.rotor.serial}"


class Deployment(Recorded):
    """Which recorder fed a series from when to when."""

    series = models.ForeignKey("network.Series", models.PROTECT, related_name="deployments")
    instrument = models.ForeignKey(Instrument, models.PROTECT, related_name="deployments")
    installed_at = models.DateTimeField(_("installed"))
    removed_at = models.DateTimeField(_("removed"), null=True, blank=True)

    history = history()

    class Meta:
        verbose_name = _("deployment")
        verbose_name_plural = _("deployments")
        ordering = ["installed_at"]
        constraints = [
            models.UniqueConstraint(
                name="network_deployment_start_once",
                fields=["series", "installed_at"],
                violation_error_message=_("This series already has a recorder from that instant."),
            ),
            models.UniqueConstraint(
                name="network_deployment_instrument_in_one_place",
                fields=["instrument"],
                condition=Q(removed_at__isnull=True),
                violation_error_message=_("This instrument still stands at another series."),
            ),
            models.CheckConstraint(
                name="network_deployment_removed_after_installed",
                condition=Q(removed_at__isnull=True) | Q(removed_at__gt=F("installed_at")),
                violation_error_message=_("A recorder is removed after it was installed."),
            ),
        ]

    def __str__(self) -> str:
        return f"{self.instrument} {self.installed_at:%Y-%m-%d}"
