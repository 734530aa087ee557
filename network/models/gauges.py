"""Station zeros, staff plates, other gauges and benchmarks, each a chain by date."""

from django.db import models
from django.db.models import F, Q
from django.utils.translation import gettext_lazy as _

from network.models.acts import history
from network.models.chains import ChainRow, one_standing

START_TAKEN = _("Another row already starts at this instant; withdraw it first.")


class StationZero(ChainRow):
    """Elevation of the station zero above the national datum."""

    class Kind(models.TextChoices):
        RE_DETERMINED = "redetermined", _("elevation re-determined: the mark did not move")
        MOVED = "moved", _("zero moved")

    station = models.ForeignKey("network.Station", models.PROTECT, related_name="zeros")
    elevation_m = models.FloatField(_("elevation above the datum, m"), null=True, blank=True)
    datum_name = models.CharField(_("national datum"), max_length=80)
    kind = models.CharField(
        _("what happened"), max_length=12, choices=Kind.choices, default=Kind.RE_DETERMINED
    )

    history = history()

    class Meta(ChainRow.Meta):
        verbose_name = _("station zero")
        verbose_name_plural = _("station zeros")
        constraints = [
            *ChainRow.Meta.constraints,
            one_standing(
                "station",
                "effective_from",
                model="stationzero",
                what="start_once",
                message=START_TAKEN,
            ),
        ]

    def __str__(self) -> str:
        return f"{self.elevation_m} m {self.datum_name}"


class StaffPlate(models.Model):
    """One section of a sectional staff gauge."""

    station = models.ForeignKey("network.Station", models.PROTECT, related_name="plates")
    label = models.CharField(_("label"), max_length=20)
    lowest_m = models.FloatField(_("lowest graduation, m"))
    highest_m = models.FloatField(_("highest graduation, m"))
    step_m = models.FloatField(_("step of the graduation, m"), default=0.01)
    installed_at = models.DateTimeField(_("installed"))
    removed_at = models.DateTimeField(_("removed"), null=True, blank=True)
    is_usual = models.BooleanField(_("usually read"), default=False)

    history = history()

    class Meta:
        verbose_name = _("staff plate")
        verbose_name_plural = _("staff plates")
        ordering = ["station", "label"]
        constraints = [
            models.UniqueConstraint(
                name="network_staffplate_label_once",
                fields=["station", "label", "installed_at"],
                violation_error_message=_("This station already has a plate of that label."),
            ),
            models.CheckConstraint(
                name="network_staffplate_range",
                condition=Q(highest_m__gt=F("lowest_m")),
                violation_error_message=_(
                    "The highest graduation lies above the lowest graduation."
                ),
            ),
            models.CheckConstraint(
                name="network_staffplate_step",
                condition=Q(step_m__gt=0),
                violation_error_message=_("The step of the graduation is above zero."),
            ),
            models.CheckConstraint(
                name="network_staffplate_removed_after_installed",
                condition=Q(removed_at__isnull=True) | Q(removed_at__gt=F("installed_at")),
                violation_error_message=_("A plate is removed after it was installed."),
            ),
        ]

    def __str__(self) -> str:
        return self.label


class PlateZero(ChainRow):
    """Height of a plate's zero above the station zero: stage = reading + plate zero."""

    plate = models.ForeignKey(StaffPlate, models.PROTECT, related_name="zeros")
    zero_m = models.FloatField(_("plate zero above the station zero, m"), null=True, blank=True)
    level_check = models.ForeignKey(
        "network.LevelCheck", models.PROTECT, null=True, blank=True, related_name="plate_zeros"
    )

    history = history()

    class Meta(ChainRow.Meta):
        verbose_name = _("plate zero")
        verbose_name_plural = _("plate zeros")
        constraints = [
            *ChainRow.Meta.constraints,
            one_standing(
                "plate", "effective_from", model="platezero", what="start_once", message=START_TAKEN
            ),
        ]

    def __str__(self) -> str:
        return f"{self.plate}: {self.zero_m} m"


class OtherGauge(models.Model):
    """A gauge beside the staff: wire weight, dipper, crest gauge or flood mark."""

    class Kind(models.TextChoices):
        WIRE_WEIGHT = "wire", _("wire-weight gauge")
        DIPPER = "dipper", _("dipper")
        CREST = "crest", _("crest gauge")
        FLOOD_MARK = "mark", _("flood mark")

    station = models.ForeignKey("network.Station", models.PROTECT, related_name="other_gauges")
    kind = models.CharField(_("kind"), max_length=8, choices=Kind.choices)
    label = models.CharField(_("label"), max_length=40)
    installed_at = models.DateTimeField(_("installed"))
    removed_at = models.DateTimeField(_("removed"), null=True, blank=True)

    history = history()

    class Meta:
        verbose_name = _("other gauge")
        verbose_name_plural = _("other gauges")
        ordering = ["station", "label"]
        constraints = [
            models.UniqueConstraint(
                name="network_othergauge_label_once",
                fields=["station", "label"],
                violation_error_message=_("This station already has a gauge of that label."),
            )
        ]

    def __str__(self) -> str:
        return self.label

    @property
    def reads_downwards(self) -> bool:
        """Whether a larger reading means a lower water surface."""
        return self.kind == self.Kind.DIPPER


class OtherGaugeZero(ChainRow):
    """Height of the gauge's zero mark above the station zero."""

    gauge = models.ForeignKey(OtherGauge, models.PROTECT, related_name="zeros")
    zero_m = models.FloatField(_("zero above the station zero, m"), null=True, blank=True)

    history = history()

    class Meta(ChainRow.Meta):
        verbose_name = _("zero of another gauge")
        verbose_name_plural = _("zeros of other gauges")
        constraints = [
            *ChainRow.Meta.constraints,
            one_standing(
                "gauge",
                "effective_from",
                model="othergaugezero",
                what="start_once",
                message=START_TAKEN,
            ),
        ]

    def __str__(self) -> str:
        return f"{self.gauge}: {self.zero_m} m"


class Benchmark(models.Model):
    """A fixed mark from which levels start."""

    station = models.ForeignKey("network.Station", models.PROTECT, related_name="benchmarks")
    label = models.CharField(_("label"), max_length=40)
    description = models.TextField(_("description"), blank=True)
    is_main = models.BooleanField(_("levels start here"), default=False)

    history = history()

    class Meta:
        verbose_name = _("benchmark")
        verbose_name_plural = _("benchmarks")
        ordering = ["station", "label"]
        constraints = [
            models.UniqueConstraint(
                name="network_benchmark_label_once",
                fields=["station", "label"],
                violation_error_message=_("This station already has a benchmark of that label."),
            )
        ]

    def __str__(self) -> str:
        return self.label


class BenchmarkElevation(ChainRow):
    """Elevation of a benchmark above the national datum."""

    benchmark = models.ForeignKey(Benchmark, models.PROTECT, related_name="elevations")
    elevation_m = models.FloatField(_("elevation above the datum, m"), null=True, blank=True)

    history = history()

    class Meta(ChainRow.Meta):
        verbose_name = _("benchmark elevation")
        verbose_name_plural = _("benchmark elevations")
        constraints = [
            *ChainRow.Meta.constraints,
            one_standing(
                "benchmark",
                "effective_from",
                model="benchmarkelevation",
                what="start_once",
                message=START_TAKEN,
            ),
        ]

    def __str__(self) -> str:
        return f"{self.benchmark}: {self.elevation_m} m"
