"""What the methods other than velocity-area with a meter noted at the river."""

from django.db import models
from django.db.models import Q
from django.utils.translation import gettext_lazy as _

from network.models.acts import history
from network.models.gaugings import Gauging


class BoatTrack(models.Model):
    """How a moving boat knew its path, and the moving-bed test, where one was made."""

    gauging = models.OneToOneField(Gauging, models.CASCADE, related_name="boat_track")
    tracks_the_bed = models.BooleanField(_("path taken from the bed"), default=True)
    bed_velocity_ms = models.FloatField(
        _("moving-bed test: speed over the bed, m/s"), null=True, blank=True
    )
    water_velocity_ms = models.FloatField(
        _("moving-bed test: speed of the water, m/s"), null=True, blank=True
    )

    history = history()

    class Meta:
        verbose_name = _("track of a boat")
        verbose_name_plural = _("tracks of boats")
        constraints = [
            models.CheckConstraint(
                name="network_boattrack_test_whole",
                condition=Q(bed_velocity_ms__isnull=True, water_velocity_ms__isnull=True)
                | Q(bed_velocity_ms__gte=0, water_velocity_ms__gt=0),
                violation_error_message=_(
                    "A moving-bed test has a speed over the bed of at least zero and a speed of "
                    "the water above zero."
                ),
            )
        ]

    def __str__(self) -> str:
        return f"{self.bed_velocity_ms} m/s"


class FloatReach(models.Model):
    """The reach over which floats were timed."""

    gauging = models.OneToOneField(Gauging, models.CASCADE, related_name="float_reach")
    length_m = models.FloatField(_("length of the reach, m"))

    history = history()

    class Meta:
        verbose_name = _("reach of floats")
        verbose_name_plural = _("reaches of floats")
        constraints = [
            models.CheckConstraint(
                name="network_floatreach_length",
                condition=Q(length_m__gt=0),
                violation_error_message=_("The reach is longer than 0 m."),
            )
        ]

    def __str__(self) -> str:
        return f"{self.length_m} m"


class TimedFloat(models.Model):
    """One float in one part of the section; floats of one part share its area."""

    reach = models.ForeignKey(FloatReach, models.CASCADE, related_name="floats")
    position = models.PositiveSmallIntegerField()
    panel = models.PositiveSmallIntegerField(_("part of the section"))
    area_m2 = models.FloatField(_("area of the part, m²"))
    seconds = models.FloatField(_("seconds"))

    history = history()

    class Meta:
        verbose_name = _("timed float")
        verbose_name_plural = _("timed floats")
        ordering = ["position"]
        constraints = [
            models.UniqueConstraint(
                name="network_timedfloat_position_once",
                fields=["reach", "position"],
                violation_error_message=_("Two floats stand on the same line."),
            ),
            models.CheckConstraint(
                name="network_timedfloat_plausible",
                condition=Q(area_m2__gt=0, seconds__gt=0),
                violation_error_message=_("A float has an area and a time above zero."),
            ),
        ]

    def __str__(self) -> str:
        return f"{self.seconds} s"


class VesselFill(models.Model):
    """One volume caught in a time."""

    gauging = models.ForeignKey(Gauging, models.CASCADE, related_name="fills")
    position = models.PositiveSmallIntegerField()
    volume_m3 = models.FloatField(_("volume, m³"))
    seconds = models.FloatField(_("seconds"))

    history = history()

    class Meta:
        verbose_name = _("fill of a vessel")
        verbose_name_plural = _("fills of a vessel")
        ordering = ["position"]
        constraints = [
            models.UniqueConstraint(
                name="network_vesselfill_position_once",
                fields=["gauging", "position"],
                violation_error_message=_("Two fills stand on the same line."),
            ),
            models.CheckConstraint(
                name="network_vesselfill_plausible",
                condition=Q(volume_m3__gt=0, seconds__gt=0),
                violation_error_message=_("A fill has a volume and a time above zero."),
            ),
        ]

    def __str__(self) -> str:
        return f"{self.volume_m3} m³"


class TracerInjection(models.Model):
    """A tracer put in at a constant rate, or a mass of it all at once."""

    gauging = models.OneToOneField(Gauging, models.CASCADE, related_name="injection")
    injection_m3s = models.FloatField(
        _("rate of injection, m³/s"), null=True, blank=True,
        help_text=_("Constant rate; blank where the tracer was put in all at once."),
    )  # fmt: skip
    injected_kgm3 = models.FloatField(_("strength of the solution, kg/m³"), null=True, blank=True)
    mass_kg = models.FloatField(_("mass put in at once, kg"), null=True, blank=True)
    background_kgm3 = models.FloatField(_("background concentration, kg/m³"), default=0)

    history = history()

    class Meta:
        verbose_name = _("injection of a tracer")
        verbose_name_plural = _("injections of tracers")
        constraints = [
            models.CheckConstraint(
                name="network_tracerinjection_one_way",
                condition=Q(
                    injection_m3s__isnull=False, injected_kgm3__isnull=False, mass_kg__isnull=True
                )
                | Q(injection_m3s__isnull=True, injected_kgm3__isnull=True, mass_kg__isnull=False),
                violation_error_message=_(
                    "A tracer is put in at a rate and strength, or as a mass at once."
                ),
            )
        ]

    def __str__(self) -> str:
        return str(self._meta.verbose_name)


class TracerSample(models.Model):
    """A concentration at one place of sampling; its time where the tracer passed as a cloud."""

    injection = models.ForeignKey(TracerInjection, models.CASCADE, related_name="samples")
    position = models.PositiveSmallIntegerField()
    probe = models.PositiveSmallIntegerField(_("place of sampling"), default=1)
    seconds = models.FloatField(_("seconds since the injection"), null=True, blank=True)
    concentration_kgm3 = models.FloatField(_("concentration, kg/m³"))

    class Meta:
        verbose_name = _("sample")
        verbose_name_plural = _("samples")
        ordering = ["position"]
        constraints = [
            models.UniqueConstraint(
                name="network_tracersample_position_once",
                fields=["injection", "position"],
                violation_error_message=_("Two samples stand on the same line."),
            )
        ]

    def __str__(self) -> str:
        return f"{self.concentration_kgm3} kg/m³"


class WeirHead(models.Model):
    """The head on a thin-plate notch and its sizes."""

    class Shape(models.TextChoices):
        V_NOTCH = "v", _("V-notch")
        RECTANGLE = "rectangle", _("rectangular notch")

    gauging = models.OneToOneField(Gauging, models.CASCADE, related_name="weir_head")
    shape = models.CharField(_("shape"), max_length=9, choices=Shape.choices)
    head_m = models.FloatField(_("head, m"))
    angle_deg = models.FloatField(_("angle of the notch, °"), null=True, blank=True)
    notch_width_m = models.FloatField(_("width of the notch, m"), null=True, blank=True)
    crest_height_m = models.FloatField(_("height of the crest above the bed, m"))
    channel_width_m = models.FloatField(_("width of the channel, m"))

    history = history()

    class Meta:
        verbose_name = _("head on a weir")
        verbose_name_plural = _("heads on weirs")
        constraints = [
            models.CheckConstraint(
                name="network_weirhead_sizes",
                condition=Q(shape="v", angle_deg__isnull=False)
                | Q(shape="rectangle", notch_width_m__isnull=False),
                violation_error_message=_(
                    "A V-notch needs its angle, a rectangular notch its width."
                ),
            )
        ]

    def __str__(self) -> str:
        return f"{self.head_m} m"
