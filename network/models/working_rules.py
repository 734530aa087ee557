"""The agency's limits and intervals: rules that are data."""

from django.db import models
from django.db.models import Q
from django.utils.translation import gettext_lazy as _

from network.models.acts import history


class WorkingRules(models.Model):
    """The one row of limits and default intervals of an installation."""

    # Levels: closure 0.9·√n mm, never above 4.6 mm (USGS TM 3-A19, Kenney 2010, in SI).
    level_closure_mm = models.FloatField(_("closure of levels per √set-up, mm"), default=0.9)
    level_closure_cap_mm = models.FloatField(_("largest closure of levels, mm"), default=4.6)
    level_tolerance_mm = models.FloatField(
        _("smallest error of a plate that counts, mm"), default=3
    )
    peg_test_limit_mm = models.FloatField(_("collimation error, mm in 50 m"), default=2.5)
    plates_agree_mm = models.FloatField(_("two plates read together agree within, mm"), default=10)
    plate_overlap_m = models.FloatField(_("overlap of neighbouring plates, m"), default=0.1)
    correction_tolerance_mm = models.FloatField(
        _("smallest recorder error that is corrected, mm"), default=5
    )
    # Current meters: one year or 300 h, whichever first (ISO 2537 practice).
    calibration_months = models.PositiveSmallIntegerField(_("calibration, months"), default=12)
    calibration_hours = models.PositiveSmallIntegerField(
        _("calibration, hours of use"), default=300
    )
    calibration_change_percent = models.FloatField(
        _("change between calibrations that calls for a look, %"), default=2
    )
    visit_days = models.PositiveSmallIntegerField(_("routine visit, days"), default=42)
    level_check_months = models.PositiveSmallIntegerField(_("level check, months"), default=36)
    gaugings_per_year = models.PositiveSmallIntegerField(_("gaugings a year"), default=6)
    inspection_months = models.PositiveSmallIntegerField(_("safety inspection, months"), default=12)
    silence_days = models.PositiveSmallIntegerField(_("no data since, days"), default=45)
    review_days = models.PositiveSmallIntegerField(_("record unreviewed, days"), default=90)
    check_days = models.PositiveSmallIntegerField(_("visit or gauging unchecked, days"), default=14)
    doubt_count = models.PositiveSmallIntegerField(
        _("gaugings in a row on one side that put a rating in doubt"), default=3
    )
    one_point_depth_m = models.FloatField(_("one point suffices up to a depth of, m"), default=0.5)
    two_point_depth_m = models.FloatField(_("two points wanted from a depth of, m"), default=0.8)
    surface_factor = models.FloatField(_("surface velocity to mean velocity"), default=0.86)
    systematic_percent = models.FloatField(_("systematic standard uncertainty, %"), default=1.0)
    wading_product_m2s = models.FloatField(_("wading below depth × velocity of, m²/s"), default=0.9)
    weigh_bands_by_time = models.BooleanField(
        _("gaugings wanted where water stands most of the time, not where most volume passes"),
        default=False,
    )
    stage_uncertainty_mm = models.FloatField(_("standard uncertainty of stage, mm"), default=5)

    history = history()

    class Meta:
        verbose_name = _("working rules")
        verbose_name_plural = _("working rules")
        constraints = [
            models.CheckConstraint(
                name="network_workingrules_only_one",
                condition=Q(pk=1),
                violation_error_message=_("An installation has one set of working rules."),
            )
        ]

    def __str__(self) -> str:
        return str(self._meta.verbose_name)
