"""The agency: its name, its clock, how it prints, and its offices."""

from django.core.validators import MaxValueValidator, MinValueValidator
from django.db import models
from django.db.models import Q
from django.utils.translation import gettext_lazy as _

from network.models.acts import history
from network.models.chains import Versioned


class Agency(Versioned):
    """The one agency of an installation."""

    class DischargeMethod(models.TextChoices):
        MID_SECTION = "mid", _("mid-section")
        MEAN_SECTION = "mean", _("mean-section")

    name = models.CharField(_("name"), max_length=200)
    address = models.TextField(_("address"), blank=True)
    licence_line = models.CharField(_("licence of the published data"), max_length=300, blank=True)
    logo = models.FileField(_("logo (SVG or PNG)"), upload_to="agency/", blank=True)
    record_utc_offset_minutes = models.SmallIntegerField(
        _("record clock, minutes ahead of UTC"),
        default=0,
        help_text=_("A fixed offset, no daylight saving; it cannot change once readings exist."),
    )
    civil_zone = models.CharField(
        _("zone of the watches"),
        max_length=64,
        default="UTC",
        help_text=_("The zone people's watches show, for example Europe/Vienna."),
    )
    day_starts_at_hour = models.PositiveSmallIntegerField(
        _("hour at which a day starts"), default=0, validators=[MaxValueValidator(23)]
    )
    water_year_start_month = models.PositiveSmallIntegerField(
        _("first month of the water year"),
        default=1,
        validators=[MinValueValidator(1), MaxValueValidator(12)],
    )
    water_year_named_by_end = models.BooleanField(
        _("the water year is named after the year in which it ends"), default=True
    )
    significant_figures = models.PositiveSmallIntegerField(_("significant figures"), default=3)
    max_decimals = models.PositiveSmallIntegerField(_("most decimals"), default=3)
    decimal_sign = models.CharField(
        _("decimal sign"), max_length=1, default=".", choices=[(".", _("point")), (",", _("comma"))]
    )
    language = models.CharField(_("language of print"), max_length=10, default="en")
    day_coverage_percent = models.PositiveSmallIntegerField(
        _("part of a day that must be recorded, %"),
        default=80,
        validators=[MinValueValidator(1), MaxValueValidator(100)],
    )
    months_need_every_day = models.BooleanField(
        _("monthly and annual means only when every day is there"), default=True
    )
    result_method = models.CharField(
        _("method that gives the discharge of a gauging"),
        max_length=4,
        choices=DischargeMethod.choices,
        default=DischargeMethod.MID_SECTION,
    )
    approver_differs = models.BooleanField(
        _("a rating is approved by someone else than its author"), default=True
    )

    history = history()

    class Meta:
        verbose_name = _("agency")
        verbose_name_plural = _("agency")
        constraints = [
            models.CheckConstraint(
                name="network_agency_only_one",
                condition=Q(pk=1),
                violation_error_message=_("An installation has one agency."),
            ),
            models.CheckConstraint(
                name="network_agency_clock_in_range",
                condition=Q(record_utc_offset_minutes__range=(-720, 840)),
                violation_error_message=_("The record clock lies between UTC−12 and UTC+14."),
            ),
            models.CheckConstraint(
                name="network_agency_start_month",
                condition=Q(water_year_start_month__range=(1, 12)),
                violation_error_message=_("The water year starts in a month from 1 to 12."),
            ),
            models.CheckConstraint(
                name="network_agency_day_start",
                condition=Q(day_starts_at_hour__range=(0, 23)),
                violation_error_message=_("A day starts at an hour from 0 to 23."),
            ),
        ]

    def __str__(self) -> str:
        return self.name


class Office(models.Model):
    """An office of the agency, from which stations are served."""

    name = models.CharField(_("name"), max_length=120)
    address = models.TextField(_("address"), blank=True)
    latitude_deg = models.FloatField(_("latitude, °"), null=True, blank=True)
    longitude_deg = models.FloatField(_("longitude, °"), null=True, blank=True)

    history = history()

    class Meta:
        verbose_name = _("office")
        verbose_name_plural = _("offices")
        ordering = ["name"]
        constraints = [
            models.UniqueConstraint(
                name="network_office_name_once",
                fields=["name"],
                violation_error_message=_("There is already an office of this name."),
            )
        ]

    def __str__(self) -> str:
        return self.name
