"""Series of raw readings: settings, mapping profiles, imports and packed blocks."""

from django.db import models
from django.db.models import F, Q
from django.utils.translation import gettext_lazy as _

from network.models.acts import history
from network.models.chains import ChainRow, Recorded, Withdrawable, one_standing
from network.models.gauges import START_TAKEN


class Series(models.Model):
    """One series of raw readings at a station."""

    class Kind(models.TextChoices):
        RECORDER = "recorder", _("recorder")
        SECOND_RECORDER = "second", _("second recorder")
        OBSERVER = "observer", _("observer's readings")

    station = models.ForeignKey("network.Station", models.PROTECT, related_name="series")
    kind = models.CharField(_("kind"), max_length=10, choices=Kind.choices, default=Kind.RECORDER)
    label = models.CharField(_("label"), max_length=60)
    is_primary = models.BooleanField(_("primary"), default=False)
    gap_limit_minutes = models.PositiveIntegerField(
        _("longest step bridged by a straight line, minutes"), default=180
    )
    is_event_logger = models.BooleanField(
        _("records only changes"),
        default=False,
        help_text=_("The silence of such a logger is not a gap."),
    )
    sensor_lowest_m = models.FloatField(_("sensor's range from, m"), null=True, blank=True)
    sensor_highest_m = models.FloatField(_("sensor's range to, m"), null=True, blank=True)

    history = history()

    class Meta:
        verbose_name = _("series")
        verbose_name_plural = _("series")
        ordering = ["station", "-is_primary", "label"]
        constraints = [
            models.UniqueConstraint(
                name="network_series_label_once",
                fields=["station", "label"],
                violation_error_message=_("This station already has a series of that label."),
            ),
            models.UniqueConstraint(
                name="network_series_one_primary",
                fields=["station"],
                condition=Q(is_primary=True),
                violation_error_message=_("A station has one primary series."),
            ),
            models.CheckConstraint(
                name="network_series_gap_limit",
                condition=Q(gap_limit_minutes__gt=0),
                violation_error_message=_("The gap limit is above zero."),
            ),
        ]

    def __str__(self) -> str:
        return self.label


class SensorSetting(ChainRow):
    """From raw to stage: stage = scale × raw + offset; no scale means none in force."""

    series = models.ForeignKey(Series, models.PROTECT, related_name="settings")
    deployment = models.ForeignKey(
        "network.Deployment", models.PROTECT, null=True, blank=True, related_name="settings"
    )
    scale = models.FloatField(_("scale"), null=True, blank=True, default=1)
    offset_m = models.FloatField(_("offset, m"), default=0)

    history = history()

    class Meta(ChainRow.Meta):
        verbose_name = _("sensor setting")
        verbose_name_plural = _("sensor settings")
        constraints = [
            *ChainRow.Meta.constraints,
            one_standing(
                "series",
                "effective_from",
                model="sensorsetting",
                what="start_once",
                message=START_TAKEN,
            ),
        ]

    def __str__(self) -> str:
        return f"{self.scale} × raw + {self.offset_m} m"


class MappingProfile(models.Model):
    """How a kind of logger file is read; frozen once an import used it."""

    class Unit(models.TextChoices):
        M = "m", "m"
        CM = "cm", "cm"
        MM = "mm", "mm"

    class Clock(models.TextChoices):
        FIXED = "fixed", _("fixed offset from UTC")
        CIVIL = "civil", _("civil zone with daylight saving")

    name = models.CharField(_("name"), max_length=80)
    time_column = models.CharField(
        _("column of time or date"), max_length=80, default="1", help_text=_("Name or number.")
    )
    clock_column = models.CharField(
        _("column of the time of day, if apart"), max_length=80, blank=True
    )
    value_column = models.CharField(_("column of the value"), max_length=80, default="2")
    time_format = models.CharField(
        _("form of the time"),
        max_length=60,
        default="ISO",
        help_text=_("ISO, or signs such as %d.%m.%Y %H:%M"),
    )
    delimiter = models.CharField(
        _("delimiter"),
        max_length=6,
        default="auto",
        choices=[
            ("auto", _("found by itself")),
            (",", _("comma")),
            (";", _("semicolon")),
            ("tab", _("tab")),
            ("space", _("blanks")),
        ],
    )
    header_lines = models.PositiveSmallIntegerField(
        _("lines before the column names or data"), default=0
    )
    has_column_names = models.BooleanField(_("a line of column names follows"), default=True)
    decimal_sign = models.CharField(
        _("decimal sign"), max_length=1, default=".", choices=[(".", _("point")), (",", _("comma"))]
    )
    unit = models.CharField(_("unit"), max_length=2, choices=Unit.choices, default=Unit.M)
    encoding = models.CharField(
        _("encoding"),
        max_length=10,
        default="auto",
        choices=[
            ("auto", _("found by itself")),
            ("utf-8", "UTF-8"),
            ("latin-1", "Latin-1"),
            ("utf-16", "UTF-16"),
        ],
    )
    clock = models.CharField(_("clock"), max_length=5, choices=Clock.choices, default=Clock.FIXED)
    utc_offset_minutes = models.SmallIntegerField(_("minutes ahead of UTC"), default=0)
    civil_zone = models.CharField(_("civil zone"), max_length=64, blank=True)
    missing_texts = models.CharField(
        _("texts that mean missing, separated by blanks"), max_length=120, blank=True
    )

    history = history()

    class Meta:
        verbose_name = _("mapping profile")
        verbose_name_plural = _("mapping profiles")
        ordering = ["name"]
        constraints = [
            models.UniqueConstraint(
                name="network_mappingprofile_name_once",
                fields=["name"],
                violation_error_message=_("There is already a profile of this name."),
            ),
            models.CheckConstraint(
                name="network_mappingprofile_clock_whole",
                condition=Q(clock="fixed", civil_zone="") | (Q(clock="civil") & ~Q(civil_zone="")),
                violation_error_message=_("A civil clock names its zone, a fixed one does not."),
            ),
        ]

    def __str__(self) -> str:
        return self.name


class LoggerImport(Recorded, Withdrawable):
    """One logger file as received, and what was read from it."""

    series = models.ForeignKey(Series, models.PROTECT, related_name="imports")
    profile = models.ForeignKey(MappingProfile, models.PROTECT, related_name="imports")
    file = models.FileField(_("file"), upload_to="logger/", max_length=200)
    original_name = models.CharField(_("name of the file"), max_length=255)
    sha256 = models.CharField(max_length=64)
    rows_read = models.PositiveIntegerField(_("rows read"))
    rows_kept = models.PositiveIntegerField(_("rows kept"))
    rows_faulty = models.PositiveIntegerField(_("rows skipped"), default=0)
    first_at = models.DateTimeField(_("first reading"))
    last_at = models.DateTimeField(_("last reading"))

    class Meta(Withdrawable.Meta):
        verbose_name = _("import")
        verbose_name_plural = _("imports")
        ordering = ["recorded_at", "pk"]
        constraints = [
            *Withdrawable.Meta.constraints,
            one_standing(
                "series",
                "sha256",
                model="loggerimport",
                what="file_once",
                message=_("This file is already in the series."),
            ),
            models.CheckConstraint(
                name="network_loggerimport_in_order",
                condition=Q(last_at__gte=F("first_at")),
                violation_error_message=_("The last reading is not before the first."),
            ),
        ]

    def __str__(self) -> str:
        return self.original_name


class ImportFault(models.Model):
    """A row of a logger file that could not be read."""

    logger_import = models.ForeignKey(LoggerImport, models.CASCADE, related_name="faults")
    line = models.PositiveIntegerField(_("line"))
    text = models.CharField(_("text"), max_length=200, blank=True)
    reason = models.CharField(_("reason"), max_length=200)

    class Meta:
        verbose_name = _("skipped row")
        verbose_name_plural = _("skipped rows")
        ordering = ["line"]

    def __str__(self) -> str:
        return f"{self.line}: {self.reason}"


class Block(models.Model):
    """The readings of one series and UTC month, packed by numerics.blocks."""

    series = models.ForeignKey(Series, models.PROTECT, related_name="blocks")
    month = models.DateField(_("month"))  # its first day
    data = models.BinaryField()
    count = models.PositiveIntegerField(_("readings"))
    first_at = models.DateTimeField(_("first reading"))
    last_at = models.DateTimeField(_("last reading"))

    class Meta:
        verbose_name = _("block of readings")
        verbose_name_plural = _("blocks of readings")
        ordering = ["series", "month"]
        constraints = [
            models.UniqueConstraint(
                name="network_block_month_once",
                fields=["series", "month"],
                violation_error_message=_("A series has one block a month."),
            ),
            models.CheckConstraint(
                name="network_block_month_starts",
                condition=Q(month__day=1),
                violation_error_message=_("A block is named by the first day of its month."),
            ),
        ]

    def __str__(self) -> str:
        return f"{self.series} {self.month:%Y-%m}"
