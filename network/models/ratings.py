"""Ratings: curves, the gaugings they rest on, their periods in force and shift tables."""

from django.conf import settings
from django.db import models
from django.db.models import F, Q
from django.utils.translation import gettext_lazy as _

from network.models.acts import history
from network.models.chains import (
    ChainRow,
    Recorded,
    Versioned,
    Withdrawable,
    one_standing,
)
from network.models.gauges import START_TAKEN


class Curve(Recorded, Versioned, Withdrawable):
    """A rating version: segments or a table; draft, then approved and never changed."""

    class Form(models.TextChoices):
        SEGMENTS = "segments", _("segments Q = C·(h − h₀)^b")
        TABLE_LOG = "log", _("table, linear in ln Q against ln(h − h₀)")
        TABLE_LINEAR = "linear", _("table, linear")

    class State(models.TextChoices):
        DRAFT = "draft", _("draft")
        APPROVED = "approved", _("approved")

    station = models.ForeignKey("network.Station", models.PROTECT, related_name="curves")
    number = models.CharField(_("rating version"), max_length=20)
    form = models.CharField(_("form"), max_length=10, choices=Form.choices, default=Form.SEGMENTS)
    h0_m = models.FloatField(
        _("h₀ of the table, m"), null=True, blank=True, help_text=_("Stage of zero flow.")
    )
    lowest_use_m = models.FloatField(_("used from stage, m"))
    highest_use_m = models.FloatField(_("used up to stage, m"))
    extrapolate_low_m = models.FloatField(_("extrapolated down to, m"), null=True, blank=True)
    extrapolate_high_m = models.FloatField(_("extrapolated up to, m"), null=True, blank=True)
    gauged_lowest_m = models.FloatField(_("lowest gauging, m"), null=True, blank=True)
    gauged_highest_m = models.FloatField(_("highest gauging, m"), null=True, blank=True)
    scatter_percent = models.FloatField(
        _("standard error of the gaugings about the curve, %"), null=True, blank=True
    )
    reason = models.TextField(_("reason"))
    state = models.CharField(
        max_length=10, choices=State.choices, default=State.DRAFT, editable=False
    )
    approved_at = models.DateTimeField(null=True, blank=True, editable=False)
    approved_by = models.ForeignKey(
        settings.AUTH_USER_MODEL, models.PROTECT, null=True, blank=True, editable=False,
        related_name="+",
    )  # fmt: skip

    history = history()

    class Meta(Withdrawable.Meta):
        verbose_name = _("rating version")
        verbose_name_plural = _("rating versions")
        ordering = ["station", "number"]
        constraints = [
            *Withdrawable.Meta.constraints,
            models.UniqueConstraint(
                name="network_curve_number_once",
                fields=["station", "number"],
                violation_error_message=_("This station already has a rating version so named."),
            ),
            models.CheckConstraint(
                name="network_curve_range_of_use",
                condition=Q(highest_use_m__gt=F("lowest_use_m")),
                violation_error_message=_("The range of use ends above its start."),
            ),
            models.CheckConstraint(
                name="network_curve_extrapolation_outside",
                condition=(
                    Q(extrapolate_low_m__isnull=True) | Q(extrapolate_low_m__lt=F("lowest_use_m"))
                )
                & (
                    Q(extrapolate_high_m__isnull=True)
                    | Q(extrapolate_high_m__gt=F("highest_use_m"))
                ),
                violation_error_message=_("Extrapolation lies outside the range of use."),
            ),
            models.CheckConstraint(
                name="network_curve_approval_whole",
                condition=Q(state="approved", approved_at__isnull=False, approved_by__isnull=False)
                | Q(state="draft", approved_at__isnull=True, approved_by__isnull=True),
                violation_error_message=_("An approved version says by whom and when."),
            ),
        ]

    def __str__(self) -> str:
        return self.number


class CurveSegment(models.Model):
    """One power law of a rating version, from a stage upwards."""

    curve = models.ForeignKey(Curve, models.CASCADE, related_name="segments")
    lower_stage_m = models.FloatField(_("from stage, m"))
    c = models.FloatField(_("C"))
    h0_m = models.FloatField(_("h₀, m"))
    b = models.FloatField(_("b"))

    history = history()

    class Meta:
        verbose_name = _("segment")
        verbose_name_plural = _("segments")
        ordering = ["lower_stage_m"]
        constraints = [
            models.UniqueConstraint(
                name="network_curvesegment_start_once",
                fields=["curve", "lower_stage_m"],
                violation_error_message=_("Two segments start at the same stage."),
            ),
            models.CheckConstraint(
                name="network_curvesegment_rises",
                condition=Q(c__gt=0, b__gt=0),
                violation_error_message=_("C and b are above zero."),
            ),
        ]

    def __str__(self) -> str:
        return f"{self.c}·(h − {self.h0_m})^{self.b}"


class CurvePoint(models.Model):
    """One pair of stage and flow of a table."""

    curve = models.ForeignKey(Curve, models.CASCADE, related_name="points")
    stage_m = models.FloatField(_("stage, m"))
    flow_m3s = models.FloatField(_("flow, m³/s"))

    history = history()

    class Meta:
        verbose_name = _("point of the table")
        verbose_name_plural = _("points of the table")
        ordering = ["stage_m"]
        constraints = [
            models.UniqueConstraint(
                name="network_curvepoint_stage_once",
                fields=["curve", "stage_m"],
                violation_error_message=_("A stage stands once in a table."),
            ),
            models.CheckConstraint(
                name="network_curvepoint_not_negative",
                condition=Q(flow_m3s__gte=0),
                violation_error_message=_("A flow in a table is not negative."),
            ),
        ]

    def __str__(self) -> str:
        return f"{self.stage_m} m: {self.flow_m3s} m³/s"


class CurveBand(models.Model):
    """The 95 % band of the mean relation at one stage, frozen with the version."""

    curve = models.ForeignKey(Curve, models.CASCADE, related_name="band")
    stage_m = models.FloatField(_("stage, m"))
    u95_percent = models.FloatField(_("U₉₅ of the mean relation, %"))

    class Meta:
        verbose_name = _("point of the band")
        verbose_name_plural = _("points of the band")
        ordering = ["stage_m"]
        constraints = [
            models.UniqueConstraint(
                name="network_curveband_stage_once",
                fields=["curve", "stage_m"],
                violation_error_message=_("A stage stands once in a band."),
            )
        ]

    def __str__(self) -> str:
        return f"{self.stage_m} m: ±{self.u95_percent} %"


class CurveGauging(models.Model):
    """A gauging a rating version looked at: used, or left out with the reason."""

    curve = models.ForeignKey(Curve, models.CASCADE, related_name="gaugings")
    gauging = models.ForeignKey("network.Gauging", models.PROTECT, related_name="curves")
    is_used = models.BooleanField(_("used"), default=True)
    left_out_because = models.CharField(_("left out because"), max_length=200, blank=True)
    deviation_percent = models.FloatField(_("deviation, %"), null=True, blank=True)

    history = history()

    class Meta:
        verbose_name = _("gauging of a rating")
        verbose_name_plural = _("gaugings of a rating")
        constraints = [
            models.UniqueConstraint(
                name="network_curvegauging_once",
                fields=["curve", "gauging"],
                violation_error_message=_("A gauging stands once in a rating version."),
            ),
            models.CheckConstraint(
                name="network_curvegauging_reason_when_left_out",
                condition=Q(is_used=True, left_out_because="")
                | (Q(is_used=False) & ~Q(left_out_because="")),
                violation_error_message=_("A gauging is left out with a reason."),
            ),
        ]

    def __str__(self) -> str:
        return str(self.gauging)


class RatingPeriod(ChainRow):
    """From when a rating version is in force; without a version none is."""

    station = models.ForeignKey("network.Station", models.PROTECT, related_name="rating_periods")
    curve = models.ForeignKey(
        Curve, models.PROTECT, null=True, blank=True, related_name="periods",
        verbose_name=_("rating version"),
    )  # fmt: skip

    history = history()

    class Meta(ChainRow.Meta):
        verbose_name = _("period of a rating")
        verbose_name_plural = _("periods of ratings")
        constraints = [
            *ChainRow.Meta.constraints,
            one_standing(
                "station",
                "effective_from",
                model="ratingperiod",
                what="start_once",
                message=START_TAKEN,
            ),
        ]

    def __str__(self) -> str:
        return f"{self.curve or _('none')} {self.effective_from:%Y-%m-%d}"


class ShiftTable(ChainRow):
    """Shifts by stage within a period in force."""

    class Joins(models.TextChoices):
        STEP = "step", _("holds until the next")
        LINEAR = "linear", _("changes linearly in time to the next")

    period = models.ForeignKey(RatingPeriod, models.PROTECT, related_name="shift_tables")
    joins = models.CharField(
        _("towards the next table"), max_length=6, choices=Joins.choices, default=Joins.STEP
    )

    history = history()

    class Meta(ChainRow.Meta):
        verbose_name = _("shift table")
        verbose_name_plural = _("shift tables")
        constraints = [
            *ChainRow.Meta.constraints,
            one_standing(
                "period",
                "effective_from",
                model="shifttable",
                what="start_once",
                message=START_TAKEN,
            ),
        ]

    def __str__(self) -> str:
        return f"{self.effective_from:%Y-%m-%d}"


class ShiftPoint(models.Model):
    """One pair of stage and shift."""

    table = models.ForeignKey(ShiftTable, models.CASCADE, related_name="points")
    stage_m = models.FloatField(_("stage, m"))
    shift_m = models.FloatField(_("shift, m"))

    history = history()

    class Meta:
        verbose_name = _("point of a shift table")
        verbose_name_plural = _("points of a shift table")
        ordering = ["stage_m"]
        constraints = [
            models.UniqueConstraint(
                name="network_shiftpoint_stage_once",
                fields=["table", "stage_m"],
                violation_error_message=_("A stage stands once in a shift table."),
            )
        ]

    def __str__(self) -> str:
        return f"{self.stage_m} m: {self.shift_m:+.3f} m"
