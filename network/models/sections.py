"""The section of a gauging: channels, verticals, points, and crossings of a boat."""

from django.db import models
from django.db.models import Q
from django.utils.translation import gettext_lazy as _

from network.models.acts import history
from network.models.gaugings import Gauging


class Channel(models.Model):
    """One channel of the section, from one edge of water to the other."""

    class Edge(models.TextChoices):
        SLOPING = "sloping", _("sloping bank")
        ROUGH = "rough", _("steep or rough bank")
        SMOOTH = "smooth", _("smooth wall")
        DEAD = "dead", _("dead water")
        TWO_THIRDS = "two_thirds", _("two thirds of the nearest velocity")

    class Bank(models.TextChoices):
        LEFT = "left", _("left bank")
        RIGHT = "right", _("right bank")

    gauging = models.ForeignKey(Gauging, models.CASCADE, related_name="channels")
    position = models.PositiveSmallIntegerField()
    starting_bank = models.CharField(
        _("starting bank"), max_length=5, choices=Bank.choices, default=Bank.LEFT
    )
    start_distance_m = models.FloatField(_("first edge at, m"))
    start_depth_m = models.FloatField(_("depth at the first edge, m"), default=0)
    start_edge = models.CharField(
        _("first edge"), max_length=10, choices=Edge.choices, default=Edge.SLOPING
    )
    start_velocity_ms = models.FloatField(
        _("velocity measured at the first edge, m/s"), null=True, blank=True
    )
    end_distance_m = models.FloatField(_("last edge at, m"))
    end_depth_m = models.FloatField(_("depth at the last edge, m"), default=0)
    end_edge = models.CharField(
        _("last edge"), max_length=10, choices=Edge.choices, default=Edge.SLOPING
    )
    end_velocity_ms = models.FloatField(
        _("velocity measured at the last edge, m/s"), null=True, blank=True
    )

    history = history()

    class Meta:
        verbose_name = _("channel")
        verbose_name_plural = _("channels")
        ordering = ["position"]
        constraints = [
            models.UniqueConstraint(
                name="network_channel_position_once",
                fields=["gauging", "position"],
                violation_error_message=_("Two channels stand at the same place."),
            )
        ]

    def __str__(self) -> str:
        return f"{self.position}"


class Vertical(models.Model):
    """One vertical or sounding of a channel."""

    channel = models.ForeignKey(Channel, models.CASCADE, related_name="verticals")
    position = models.PositiveSmallIntegerField()
    distance_m = models.FloatField(_("distance, m"))
    depth_m = models.FloatField(
        _("depth, m"), help_text=_("With a line angle: the line let out below the water surface.")
    )
    measured_at = models.DateTimeField(_("time"), null=True, blank=True)
    angle_deg = models.FloatField(_("angle of the flow, °"), default=0)
    ice_underside_m = models.FloatField(
        _("water surface to underside of ice, m"), null=True, blank=True
    )
    line_angle_deg = models.FloatField(_("angle of the line, °"), null=True, blank=True)
    air_line_m = models.FloatField(_("guide of the line above water, m"), null=True, blank=True)
    given_velocity_ms = models.FloatField(
        _("mean velocity given directly, m/s"), null=True, blank=True
    )
    # Stored on signing.
    mean_velocity_ms = models.FloatField(null=True, editable=False)
    panel_flow_m3s = models.FloatField(null=True, editable=False)
    panel_share_percent = models.FloatField(null=True, editable=False)

    history = history()

    class Meta:
        verbose_name = _("vertical")
        verbose_name_plural = _("verticals")
        ordering = ["position"]
        constraints = [
            models.UniqueConstraint(
                name="network_vertical_position_once",
                fields=["channel", "position"],
                violation_error_message=_("Two verticals stand on the same line."),
            ),
            models.CheckConstraint(
                name="network_vertical_depth_not_negative",
                condition=Q(depth_m__gte=0),
                violation_error_message=_("A depth is not negative."),
            ),
        ]

    def __str__(self) -> str:
        return f"{self.distance_m} m"


class VerticalPoint(models.Model):
    """One velocity in a vertical: revolutions and seconds, or the velocity itself."""

    vertical = models.ForeignKey(Vertical, models.CASCADE, related_name="points")
    position = models.PositiveSmallIntegerField()
    fraction = models.FloatField(
        _("part of the depth from the surface"), help_text=_("0 is the surface, 1 the bed.")
    )
    revolutions = models.FloatField(_("revolutions"), null=True, blank=True)
    seconds = models.FloatField(_("seconds"), null=True, blank=True)
    velocity_ms = models.FloatField(_("velocity, m/s"), null=True, blank=True)

    history = history()

    class Meta:
        verbose_name = _("point")
        verbose_name_plural = _("points")
        ordering = ["position"]
        constraints = [
            models.UniqueConstraint(
                name="network_verticalpoint_position_once",
                fields=["vertical", "position"],
                violation_error_message=_("Two points stand on the same line."),
            ),
            models.CheckConstraint(
                name="network_verticalpoint_in_depth",
                condition=Q(fraction__range=(0, 1)),
                violation_error_message=_("The part of the depth lies between 0 and 1."),
            ),
            models.CheckConstraint(
                name="network_verticalpoint_counted_or_given",
                condition=Q(revolutions__gte=0, seconds__gt=0, velocity_ms__isnull=True)
                | Q(revolutions__isnull=True, seconds__isnull=True, velocity_ms__isnull=False),
                violation_error_message=_(
                    "A point has revolutions and seconds, or a velocity, not both."
                ),
            ),
        ]

    def __str__(self) -> str:
        return f"{self.fraction}"


class Transect(models.Model):
    """One crossing of a moving boat; reciprocal crossings make a pair."""

    gauging = models.ForeignKey(Gauging, models.CASCADE, related_name="transects")
    position = models.PositiveSmallIntegerField()
    starting_bank = models.CharField(_("starting bank"), max_length=5, choices=Channel.Bank.choices)
    discharge_m3s = models.FloatField(_("discharge, m³/s"))
    seconds = models.FloatField(_("duration, s"))
    is_used = models.BooleanField(_("used"), default=True)

    history = history()

    class Meta:
        verbose_name = _("transect")
        verbose_name_plural = _("transects")
        ordering = ["position"]
        constraints = [
            models.UniqueConstraint(
                name="network_transect_position_once",
                fields=["gauging", "position"],
                violation_error_message=_("Two transects stand on the same line."),
            ),
            models.CheckConstraint(
                name="network_transect_lasts",
                condition=Q(seconds__gt=0),
                violation_error_message=_("A transect lasts some time."),
            ),
        ]

    def __str__(self) -> str:
        return f"{self.discharge_m3s} m³/s"
