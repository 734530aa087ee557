"""The page of a station's file, and the verb that sets its zero."""

from collections.abc import Callable
from datetime import datetime
from typing import Any

from django import forms
from django.contrib.admin.utils import unquote
from django.core.exceptions import PermissionDenied
from django.http import Http404, HttpRequest, HttpResponse
from django.template.response import TemplateResponse
from django.urls import URLPattern, path
from django.utils import timezone
from django.utils.translation import gettext_lazy as _

from network.admin.fields import DecimalTextField, RecordClockField
from network.admin.verbs import ReasonForm, Verb
from network.models import Curve, Person, Station, StationZero
from network.queries import gauges, in_force
from network.queries.station_file import station_file
from network.services import station_zeros
from network.services.station_zeros import NewGaugeZero, NewPlateZero, NewRating, NewSetting

NONE_IN_FORCE = "none"


class StationFilePage:
    """Give the station its file: one page to read before going there."""

    def get_urls(self) -> list[URLPattern]:
        """Add the address of the file."""
        view = self.admin_site.admin_view(self.file_view)  # type: ignore[attr-defined]
        own = path("<path:object_id>/file/", view, name="network_station_file")
        return [own, *super().get_urls()]  # type: ignore[misc]

    def file_view(self, request: HttpRequest, object_id: str) -> HttpResponse:
        """Show the file."""
        if not self.has_view_permission(request):  # type: ignore[attr-defined]
            raise PermissionDenied
        station = self.get_object(request, unquote(object_id))  # type: ignore[attr-defined]
        if station is None:
            raise Http404
        context = {
            **self.admin_site.each_context(request),  # type: ignore[attr-defined]
            "opts": Station._meta,
            "original": station,
            "station": station,
            "title": str(station),
            "file": station_file(station, at=timezone.now()),
            "belongings": self.belongings(request, station),  # type: ignore[attr-defined]
            "verb_links": self.verb_links(request, station),  # type: ignore[attr-defined]
        }
        return TemplateResponse(request, "admin/network/station/file.html", context)


def zero_form(station: Station) -> type[forms.Form]:
    """Ask for a station zero and, should it have moved, for all that hangs on it now."""
    now = timezone.now()
    zero = gauges.station_zero(station, now)
    fields: dict[str, forms.Field] = {
        "kind": forms.ChoiceField(label=_("what happened"), choices=StationZero.Kind.choices),
        "elevation_m": DecimalTextField(label=_("elevation above the datum, m")),
        "datum_name": forms.CharField(
            label=_("national datum"), max_length=80, initial=zero.datum_name if zero else ""
        ),
        "effective_from": RecordClockField(label=_("in force from")),
        "reason": ReasonForm.base_fields["reason"],
    }
    fields |= {f"move_{name}": field for name, field in _moving_fields(station, now).items()}
    return type("ZeroForm", (forms.Form,), fields)


def _moving_fields(station: Station, now: datetime) -> dict[str, forms.Field]:
    """Name a field for each plate, other gauge and series in service, and for the rating."""
    said = _("Only where the zero moved.")
    fields: dict[str, forms.Field] = {}
    for then in gauges.plates_in_service(station, now):
        label = _("zero of plate %s, m") % then.plate
        fields[f"plate_{then.plate.pk}"] = _optional(label, said)
    for gauge in gauges.other_gauges_in_service(station, now):
        fields[f"gauge_{gauge.pk}"] = _optional(_("zero of %s, m") % gauge, said)
    for series in station.series.all():
        fields[f"offset_{series.pk}"] = _optional(_("offset of series %s, m") % series, said)
    if station.is_rated:
        versions = Curve.objects.filter(station=station, state=Curve.State.APPROVED).standing()
        choices = [("", "–"), (NONE_IN_FORCE, _("none in force"))]
        choices += [(str(curve.pk), str(curve)) for curve in versions]
        fields["rating"] = forms.ChoiceField(
            label=_("rating version"), choices=choices, required=False, help_text=said
        )
    return fields


def _optional(label: Any, said: Any) -> forms.Field:
    return DecimalTextField(label=label, required=False, help_text=said)


def set_zero(station: Station, *, by: Person, at: datetime, **typed: Any) -> StationZero:
    """Hand what was typed to the service."""
    moving = {name[5:]: value for name, value in typed.items() if name.startswith("move_")}
    rest = {name: value for name, value in typed.items() if not name.startswith("move_")}
    chosen = moving.pop("rating", "")
    none = chosen == NONE_IN_FORCE
    curve = Curve.objects.get(pk=chosen) if chosen and not none else None
    scales = {row.pk: _scale(row, rest["effective_from"]) for row in station.series.all()}
    return station_zeros.set_station_zero(
        station=station,
        by=by,
        at=at,
        **rest,
        plate_zeros=_given(
            moving,
            "plate_",
            lambda key, m: NewPlateZero(plate=station.plates.get(pk=key), zero_m=m),
        ),
        gauge_zeros=_given(
            moving,
            "gauge_",
            lambda key, m: NewGaugeZero(gauge=station.other_gauges.get(pk=key), zero_m=m),
        ),
        settings=_given(
            moving,
            "offset_",
            lambda key, m: NewSetting(
                series=station.series.get(pk=key), offset_m=m, scale=scales[key]
            ),
        ),
        rating=NewRating(curve=curve) if chosen else None,
    )


def _given(moving: dict[str, Any], prefix: str, row: Callable[[int, float], Any]) -> list[Any]:
    return [
        row(int(name.removeprefix(prefix)), value)
        for name, value in moving.items()
        if name.startswith(prefix) and value is not None
    ]


def _scale(series: Any, instant: datetime) -> float:
    """Return the scale in force: a moved zero shifts stages, it does not stretch them."""
    setting = in_force.at(series.settings.all(), instant)
    return setting.scale if setting is not None and setting.scale is not None else 1.0


ZERO_VERB = Verb(
    name="zero",
    label=_("set the station zero"),
    permission="network.add_stationzero",
    form_for=zero_form,
    run=set_zero,
    station_of=lambda station: station,
    caution=_(
        "“Re-determined” means the mark did not move and nothing else changes. Where the zero "
        "moved, give the new zeros, offsets and rating for the same instant."
    ),
)
