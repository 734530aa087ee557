"""Level checks: peg test and booked sights, as written in the level book."""

import uuid

from django.conf import settings
from django.db import models
from django.db.models import Q
from django.utils.translation import gettext_lazy as _

from network.models.acts import history
from network.models.chains import Recorded, Versioned


class LevelCheck(Recorded, Versioned):
    """One run of levels over benchmarks, plates and water level."""

    class State(models.TextChoices):
        DRAFT = "draft", _("draft")
        CHECKED = "checked", _("checked")

    form_id = models.UUIDField(default=uuid.uuid4, unique=True, editable=False)
    station = models.ForeignKey("network.Station", models.PROTECT, related_name="level_checks")
    levelled_at = models.DateTimeField(_("levelled at"))
    party = models.ManyToManyField(
        settings.AUTH_USER_MODEL, blank=True, related_name="+", verbose_name=_("party")
    )
    instrument = models.ForeignKey(
        "network.Instrument", models.PROTECT, null=True, blank=True, verbose_name=_("level")
    )
    remarks = models.TextField(_("remarks"), blank=True)
    state = models.CharField(
        max_length=8, choices=State.choices, default=State.DRAFT, editable=False
    )
    checked_at = models.DateTimeField(null=True, blank=True, editable=False)
    checked_by = models.ForeignKey(
        settings.AUTH_USER_MODEL, models.PROTECT, null=True, blank=True, editable=False,
        related_name="+",
    )  # fmt: skip
    adopted_at = models.DateTimeField(null=True, blank=True, editable=False)
    adopted_by = models.ForeignKey(
        settings.AUTH_USER_MODEL, models.PROTECT, null=True, blank=True, editable=False,
        related_name="+",
    )  # fmt: skip

    history = history()

    class Meta:
        verbose_name = _("level check")
        verbose_name_plural = _("level checks")
        ordering = ["-levelled_at"]
        indexes = [
            models.Index(fields=["station", "-levelled_at"], name="network_levels_latest"),
            models.Index(
                fields=["station", "levelled_at"],
                condition=Q(checked_by__isnull=True),
                name="network_levels_unchecked",
            ),
        ]

    def __str__(self) -> str:
        return f"{self.station} {self.levelled_at:%Y-%m-%d}"


class PegTest(models.Model):
    """Two-peg test of a level before the run: staff readings from near and far."""

    level_check = models.OneToOneField(LevelCheck, models.CASCADE, related_name="peg_test")
    distance_m = models.FloatField(_("distance between the pegs, m"))
    # First set-up midway between the pegs A and B, second close to peg A.
    middle_a_m = models.FloatField(_("from the middle, staff on A, m"))
    middle_b_m = models.FloatField(_("from the middle, staff on B, m"))
    near_a_m = models.FloatField(_("from near A, staff on A, m"))
    near_b_m = models.FloatField(_("from near A, staff on B, m"))

    history = history()

    class Meta:
        verbose_name = _("peg test")
        verbose_name_plural = _("peg tests")
        constraints = [
            models.CheckConstraint(
                name="network_pegtest_distance",
                condition=Q(distance_m__gt=0),
                violation_error_message=_("The distance between the pegs is above zero."),
            )
        ]

    def __str__(self) -> str:
        return str(self.level_check)


class Sight(models.Model):
    """One line of the level book."""

    class Point(models.TextChoices):
        BENCHMARK = "benchmark", _("benchmark")
        PLATE = "plate", _("plate")
        WATER = "water", _("water surface")
        TURNING = "turning", _("turning point")

    level_check = models.ForeignKey(LevelCheck, models.CASCADE, related_name="sights")
    position = models.PositiveSmallIntegerField()
    point = models.CharField(_("on"), max_length=10, choices=Point.choices)
    benchmark = models.ForeignKey("network.Benchmark", models.PROTECT, null=True, blank=True)
    plate = models.ForeignKey("network.StaffPlate", models.PROTECT, null=True, blank=True)
    graduation_m = models.FloatField(
        _("graduation of the plate that was sighted, m"), null=True, blank=True
    )
    backsight_m = models.FloatField(_("backsight, m"), null=True, blank=True)
    intermediate_m = models.FloatField(_("intermediate sight, m"), null=True, blank=True)
    foresight_m = models.FloatField(_("foresight, m"), null=True, blank=True)
    remark = models.CharField(_("remark"), max_length=200, blank=True)

    history = history()

    class Meta:
        verbose_name = _("sight")
        verbose_name_plural = _("sights")
        ordering = ["position"]
        constraints = [
            models.UniqueConstraint(
                name="network_sight_position_once",
                fields=["level_check", "position"],
                violation_error_message=_("Two sights stand on the same line."),
            ),
            models.CheckConstraint(
                name="network_sight_names_its_point",
                condition=Q(point="benchmark", benchmark__isnull=False, plate__isnull=True)
                | Q(point="plate", plate__isnull=False, benchmark__isnull=True)
                | Q(point__in=["water", "turning"], plate__isnull=True, benchmark__isnull=True),
                violation_error_message=_("A sight names the benchmark or plate it was taken on."),
            ),
        ]

    def __str__(self) -> str:
        return f"{self.position} {self.get_point_display()}"
