"""Plans: rounds and stops, safety items and inspections, postponements, feeds."""

import uuid

from django.conf import settings
from django.db import models
from django.db.models import F, Q
from django.utils.translation import gettext_lazy as _

from network.models.acts import history
from network.models.chains import Recorded, Versioned, Withdrawable
from network.models.instruments import Instrument


class KindInterval(models.Model):
    """How often instruments of a kind are calibrated, unless one says otherwise."""

    kind = models.CharField(_("kind"), max_length=10, choices=Instrument.Kind.choices)
    months = models.PositiveSmallIntegerField(_("months"), null=True, blank=True)
    hours = models.PositiveSmallIntegerField(_("hours of use"), null=True, blank=True)

    history = history()

    class Meta:
        verbose_name = _("interval of a kind of instrument")
        verbose_name_plural = _("intervals of kinds of instruments")
        constraints = [
            models.UniqueConstraint(
                name="network_kindinterval_once",
                fields=["kind"],
                violation_error_message=_("This kind already has an interval."),
            )
        ]

    def __str__(self) -> str:
        return self.get_kind_display()


class SafetyItem(models.Model):
    """A structure people trust their lives to, with inspections."""

    class Kind(models.TextChoices):
        CABLEWAY = "cableway", _("cableway")
        WALKWAY = "walkway", _("walkway")
        LADDER = "ladder", _("ladder")
        STILLING_WELL = "well", _("stilling well")
        BOAT = "boat", _("boat")

    station = models.ForeignKey("network.Station", models.PROTECT, related_name="safety_items")
    kind = models.CharField(_("kind"), max_length=10, choices=Kind.choices)
    label = models.CharField(_("label"), max_length=60)
    interval_months = models.PositiveSmallIntegerField(
        _("inspect every, months"), null=True, blank=True
    )
    removed_on = models.DateField(_("removed"), null=True, blank=True)

    history = history()

    class Meta:
        verbose_name = _("safety item")
        verbose_name_plural = _("safety items")
        ordering = ["station", "label"]
        constraints = [
            models.UniqueConstraint(
                name="network_safetyitem_label_once",
                fields=["station", "label"],
                violation_error_message=_("This station already has an item of that label."),
            )
        ]

    def __str__(self) -> str:
        return f"{self.get_kind_display()} {self.label}"


class Inspection(Recorded, Withdrawable):
    """An inspection of a safety item."""

    item = models.ForeignKey(SafetyItem, models.PROTECT, related_name="inspections")
    inspected_on = models.DateField(_("inspected on"))
    is_safe = models.BooleanField(_("safe to use"))
    remarks = models.TextField(_("remarks"), blank=True)

    history = history()

    class Meta(Withdrawable.Meta):
        verbose_name = _("inspection")
        verbose_name_plural = _("inspections")
        ordering = ["-inspected_on"]
        constraints = [*Withdrawable.Meta.constraints]

    def __str__(self) -> str:
        return f"{self.item} {self.inspected_on}"


class Round(Recorded, Versioned):
    """A planned round of visits."""

    name = models.CharField(_("name"), max_length=120)
    office = models.ForeignKey("network.Office", models.PROTECT, verbose_name=_("office"))
    first_day = models.DateField(_("first day"))
    last_day = models.DateField(_("last day"))
    party = models.ManyToManyField(settings.AUTH_USER_MODEL, blank=True, related_name="rounds")
    vehicle = models.CharField(_("vehicle"), max_length=80, blank=True)
    meters = models.ManyToManyField(
        "network.MeterPair", blank=True, related_name="rounds", verbose_name=_("current meters")
    )
    remarks = models.TextField(_("remarks"), blank=True)
    done_at = models.DateTimeField(null=True, blank=True, editable=False)
    done_by = models.ForeignKey(
        settings.AUTH_USER_MODEL, models.PROTECT, null=True, blank=True, editable=False,
        related_name="+",
    )  # fmt: skip

    history = history()

    class Meta:
        verbose_name = _("round")
        verbose_name_plural = _("rounds")
        ordering = ["-first_day"]
        constraints = [
            models.CheckConstraint(
                name="network_round_in_order",
                condition=Q(last_day__gte=F("first_day")),
                violation_error_message=_("The last day is not before the first."),
            )
        ]

    def __str__(self) -> str:
        return self.name


class Stop(models.Model):
    """One station of a round, in order, or left out with a reason."""

    round = models.ForeignKey(Round, models.CASCADE, related_name="stops")
    position = models.PositiveSmallIntegerField()
    station = models.ForeignKey("network.Station", models.PROTECT, related_name="stops")
    form_id = models.UUIDField(default=uuid.uuid4, unique=True, editable=False)
    hours = models.FloatField(_("hours at the station"), default=2)
    by_cableway = models.BooleanField(_("gauging from the cableway"), default=False)
    left_out_because = models.CharField(_("left out because"), max_length=200, blank=True)

    history = history()

    class Meta:
        verbose_name = _("stop")
        verbose_name_plural = _("stops")
        ordering = ["position"]
        constraints = [
            models.UniqueConstraint(
                name="network_stop_station_once",
                fields=["round", "station"],
                violation_error_message=_("A station stands once in a round."),
            )
        ]

    def __str__(self) -> str:
        return f"{self.position} {self.station}"


class StopTask(models.Model):
    """One thing to do at a stop."""

    stop = models.ForeignKey(Stop, models.CASCADE, related_name="tasks")
    text = models.CharField(_("task"), max_length=200)

    history = history()

    class Meta:
        verbose_name = _("task")
        verbose_name_plural = _("tasks")

    def __str__(self) -> str:
        return self.text


class Postponement(Recorded, Withdrawable):
    """Work put off until a day, with the reason."""

    # Which item of the work list: its rule and the row it speaks of.
    rule = models.CharField(_("rule"), max_length=30)
    subject = models.CharField(_("subject"), max_length=60)
    station = models.ForeignKey(
        "network.Station", models.PROTECT, null=True, blank=True, related_name="postponements"
    )
    until = models.DateField(_("until"))
    reason = models.TextField(_("reason"))

    history = history()

    class Meta(Withdrawable.Meta):
        verbose_name = _("postponement")
        verbose_name_plural = _("postponements")
        ordering = ["until"]
        constraints = [*Withdrawable.Meta.constraints]

    def __str__(self) -> str:
        return f"{self.rule} {self.until}"


class FeedLink(Recorded, Withdrawable):
    """A secret calendar link of a person or an office, kept only as its hash."""

    person = models.ForeignKey(
        settings.AUTH_USER_MODEL, models.PROTECT, null=True, blank=True, related_name="feeds"
    )
    office = models.ForeignKey(
        "network.Office", models.PROTECT, null=True, blank=True, related_name="feeds"
    )
    secret_sha256 = models.CharField(max_length=64, unique=True, editable=False)

    history = history()

    class Meta(Withdrawable.Meta):
        verbose_name = _("calendar link")
        verbose_name_plural = _("calendar links")
        constraints = [*Withdrawable.Meta.constraints]

    def __str__(self) -> str:
        return str(self.person or self.office or "")
