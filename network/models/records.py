"""What is said about a stage record: corrections, notes, infills, typed flows, reviews."""

from django.conf import settings
from django.db import models
from django.db.models import F, Q
from django.utils.translation import gettext_lazy as _

from network.models.acts import history
from network.models.chains import Recorded, Withdrawable, one_standing

ENDS_AFTER_START = _("The period ends after it starts.")


class Correction(Recorded, Withdrawable):
    """A correction of stage, linear between its two ends."""

    class State(models.TextChoices):
        PROPOSED = "proposed", _("proposed")
        ACCEPTED = "accepted", _("accepted")

    series = models.ForeignKey("network.Series", models.PROTECT, related_name="corrections")
    start_at = models.DateTimeField(_("from"))
    end_at = models.DateTimeField(_("to"))
    start_offset_m = models.FloatField(_("added at the start, m"))
    end_offset_m = models.FloatField(_("added at the end, m"))
    reason = models.TextField(_("reason"))
    state = models.CharField(
        max_length=10, choices=State.choices, default=State.PROPOSED, editable=False
    )
    recorder_check = models.ForeignKey(
        "network.RecorderCheck", models.PROTECT, null=True, blank=True, related_name="corrections"
    )
    accepted_at = models.DateTimeField(null=True, blank=True, editable=False)
    accepted_by = models.ForeignKey(
        settings.AUTH_USER_MODEL, models.PROTECT, null=True, blank=True, editable=False,
        related_name="+",
    )  # fmt: skip

    history = history()

    class Meta(Withdrawable.Meta):
        verbose_name = _("correction")
        verbose_name_plural = _("corrections")
        ordering = ["start_at"]
        constraints = [
            *Withdrawable.Meta.constraints,
            models.CheckConstraint(
                name="network_correction_ends_after_start",
                condition=Q(end_at__gt=F("start_at")),
                violation_error_message=ENDS_AFTER_START,
            ),
            models.CheckConstraint(
                name="network_correction_acceptance_whole",
                condition=Q(state="accepted", accepted_at__isnull=False, accepted_by__isnull=False)
                | Q(state="proposed", accepted_at__isnull=True, accepted_by__isnull=True),
                violation_error_message=_("An accepted correction says by whom and when."),
            ),
        ]

    def __str__(self) -> str:
        return f"{self.start_offset_m:+.3f} … {self.end_offset_m:+.3f} m"


def _uncertainty_positive(model: str) -> models.CheckConstraint:
    return models.CheckConstraint(
        name=f"network_{model}_uncertainty_positive",
        condition=Q(uncertainty_percent__isnull=True) | Q(uncertainty_percent__gt=0),
        violation_error_message=_("The uncertainty is above zero."),
    )


class Note(Recorded, Withdrawable):
    """What happened to the record in a period, and what its flows then are."""

    class Cause(models.TextChoices):
        ICE = "ice", _("ice")
        BACKWATER = "backwater", _("backwater")
        WEED = "weed", _("weed")
        DATUM_DOUBT = "datum", _("doubt about the datum")
        INSTRUMENT_FAULT = "fault", _("instrument fault")
        REGULATION = "regulation", _("regulation")
        OTHER = "other", _("other")

    class Flows(models.TextChoices):
        STAND = "stand", _("flows stand as rated")
        ESTIMATED = "estimated", _("flows are estimated")
        WITHHELD = "withheld", _("flows are withheld")

    station = models.ForeignKey("network.Station", models.PROTECT, related_name="notes")
    start_at = models.DateTimeField(_("from"))
    end_at = models.DateTimeField(_("to"))
    cause = models.CharField(_("cause"), max_length=10, choices=Cause.choices)
    flows = models.CharField(_("flows"), max_length=10, choices=Flows.choices, default=Flows.STAND)
    uncertainty_percent = models.FloatField(_("± %"), null=True, blank=True)
    text = models.TextField(_("text"), blank=True)
    is_printed = models.BooleanField(_("printed in the yearbook"), default=True)

    history = history()

    class Meta(Withdrawable.Meta):
        verbose_name = _("note")
        verbose_name_plural = _("notes")
        ordering = ["start_at"]
        constraints = [
            *Withdrawable.Meta.constraints,
            models.CheckConstraint(
                name="network_note_ends_after_start",
                condition=Q(end_at__gt=F("start_at")),
                violation_error_message=ENDS_AFTER_START,
            ),
            # An ice or backwater period is never rated as open water.
            models.CheckConstraint(
                name="network_note_ice_is_not_open_water",
                condition=~Q(cause__in=["ice", "backwater"], flows="stand"),
                violation_error_message=_(
                    "Under ice or backwater flows are estimated or withheld, never rated as "
                    "open water."
                ),
            ),
            _uncertainty_positive("note"),
        ]

    def __str__(self) -> str:
        return f"{self.get_cause_display()} {self.start_at:%Y-%m-%d}"


class Infill(Recorded, Withdrawable):
    """Estimated daily flows for whole days, made by a stated method."""

    class Method(models.TextChoices):
        LINE = "line", _("straight line")
        OTHER_SERIES = "series", _("other series")
        NEIGHBOUR = "neighbour", _("log-log regression on a neighbour")
        WINTER_RATIO = "winter", _("winter ratio between gaugings")
        RECESSION = "recession", _("recession")

    station = models.ForeignKey("network.Station", models.PROTECT, related_name="infills")
    first_day = models.DateField(_("first day"))
    last_day = models.DateField(_("last day"))
    method = models.CharField(_("method"), max_length=10, choices=Method.choices)
    neighbour = models.ForeignKey(
        "network.Station", models.PROTECT, null=True, blank=True, related_name="+",
        verbose_name=_("neighbour"),
    )  # fmt: skip
    series = models.ForeignKey(
        "network.Series", models.PROTECT, null=True, blank=True, related_name="+",
        verbose_name=_("other series"),
    )  # fmt: skip
    reason = models.TextField(_("reason"))
    uncertainty_percent = models.FloatField(_("± %"), null=True, blank=True)

    history = history()

    class Meta(Withdrawable.Meta):
        verbose_name = _("infill")
        verbose_name_plural = _("infills")
        ordering = ["first_day"]
        constraints = [
            *Withdrawable.Meta.constraints,
            _uncertainty_positive("infill"),
            models.CheckConstraint(
                name="network_infill_in_order",
                condition=Q(last_day__gte=F("first_day")),
                violation_error_message=_("The last day is not before the first."),
            ),
            models.CheckConstraint(
                name="network_infill_names_its_source",
                condition=Q(method="neighbour", neighbour__isnull=False, series__isnull=True)
                | Q(method="series", series__isnull=False, neighbour__isnull=True)
                | (
                    ~Q(method__in=["neighbour", "series"])
                    & Q(neighbour__isnull=True, series__isnull=True)
                ),
                violation_error_message=_("An infill names its neighbour or its other series."),
            ),
        ]

    def __str__(self) -> str:
        return f"{self.get_method_display()} {self.first_day} – {self.last_day}"


class TypedFlow(Recorded, Withdrawable):
    """A daily flow typed by a person; recorded by is its author."""

    station = models.ForeignKey("network.Station", models.PROTECT, related_name="typed_flows")
    day = models.DateField(_("day"))
    flow_m3s = models.FloatField(_("daily mean flow, m³/s"))
    method = models.CharField(_("method"), max_length=120)
    reason = models.TextField(_("reason"))
    uncertainty_percent = models.FloatField(_("± %"), null=True, blank=True)

    history = history()

    class Meta(Withdrawable.Meta):
        verbose_name = _("typed daily flow")
        verbose_name_plural = _("typed daily flows")
        ordering = ["day"]
        constraints = [
            *Withdrawable.Meta.constraints,
            one_standing(
                "station",
                "day",
                model="typedflow",
                what="day_once",
                message=_("This day already has a typed flow; withdraw it first."),
            ),
            _uncertainty_positive("typedflow"),
            models.CheckConstraint(
                name="network_typedflow_not_negative",
                condition=Q(flow_m3s__gte=0),
                violation_error_message=_("A typed daily flow is not negative."),
            ),
        ]

    def __str__(self) -> str:
        return f"{self.day}: {self.flow_m3s} m³/s"


class Dismissal(Recorded, Withdrawable):
    """A finding of the screening that was looked at and let stand, with the reason."""

    series = models.ForeignKey("network.Series", models.PROTECT, related_name="dismissals")
    finding = models.CharField(_("finding"), max_length=20)
    start_at = models.DateTimeField(_("from"))
    end_at = models.DateTimeField(_("to"))
    reason = models.TextField(_("reason"))

    class Meta(Withdrawable.Meta):
        verbose_name = _("dismissed finding")
        verbose_name_plural = _("dismissed findings")
        ordering = ["start_at"]
        constraints = [
            *Withdrawable.Meta.constraints,
            one_standing(
                "series",
                "finding",
                "start_at",
                model="dismissal",
                what="finding_once",
                message=_("This finding is already dismissed."),
            ),
        ]

    def __str__(self) -> str:
        return f"{self.finding} {self.start_at:%Y-%m-%d}"


class RecordReview(Recorded, Withdrawable):
    """A statement that the record was reviewed up to and including a day."""

    station = models.ForeignKey("network.Station", models.PROTECT, related_name="reviews")
    reviewed_through = models.DateField(_("reviewed through"))
    remarks = models.TextField(_("remarks"), blank=True)

    class Meta(Withdrawable.Meta):
        verbose_name = _("review of a record")
        verbose_name_plural = _("reviews of records")
        ordering = ["-reviewed_through"]
        constraints = [*Withdrawable.Meta.constraints]
        indexes = [
            models.Index(
                fields=["station", "-reviewed_through"],
                condition=Q(withdrawn_at__isnull=True),
                name="network_review_latest",
            )
        ]

    def __str__(self) -> str:
        return f"{self.station} {self.reviewed_through}"


class StationYear(models.Model):
    """The one cache: packed daily figures of a station and water year."""

    station = models.ForeignKey("network.Station", models.CASCADE, related_name="years")
    first_day = models.DateField()
    record_version = models.PositiveIntegerField()
    data = models.BinaryField()
    days_present = models.PositiveSmallIntegerField()
    days_in_year = models.PositiveSmallIntegerField()

    class Meta:
        verbose_name = _("station year")
        verbose_name_plural = _("station years")
        constraints = [
            models.UniqueConstraint(
                name="network_stationyear_once",
                fields=["station", "first_day"],
                violation_error_message=_("A station has one row a year."),
            )
        ]

    def __str__(self) -> str:
        return f"{self.station} {self.first_day}"
