"""Forms of one station: it is chosen first, and every choice on the form then belongs to it."""

from typing import Any

from django import forms
from django.db.models import Q
from django.http import HttpRequest, HttpResponse
from django.template.response import TemplateResponse
from django.utils.translation import gettext as _

from network.models import Station


class AtStation:
    """Give a ServedAdmin a page that asks for the station, and keep it from then on."""

    def station_of_page(self, request: HttpRequest, row: Any = None) -> Station | None:
        """Return the station of the row, of the form, or the one the address asks for."""
        if row is not None and row.pk:
            station: Station = row.station
            return station
        asked = request.POST.get("station") or request.GET.get("station") or ""
        if not hasattr(request, "station_asked"):
            key = Q(pk=asked) if asked.isdecimal() else Q(code=asked)
            found = Station.objects.filter(key).first()
            request.station_asked = found
        chosen: Station | None = request.station_asked
        return chosen

    def get_changeform_initial_data(self, request: HttpRequest) -> dict[str, Any]:
        """Start at the station the address asks for, by its key or its code."""
        asked: dict[str, Any] = super().get_changeform_initial_data(request)  # type: ignore[misc]
        station = self.station_of_page(request)
        return asked if station is None else {**asked, "station": station.pk}

    def changeform_view(
        self,
        request: HttpRequest,
        object_id: str | None = None,
        form_url: str = "",
        extra_context: Any = None,
    ) -> HttpResponse:
        """Ask for the station first."""
        may = self.has_add_permission(request)  # type: ignore[attr-defined]
        if object_id is None and may and self.station_of_page(request) is None:
            return self._choose_station(request)
        return super().changeform_view(request, object_id, form_url, extra_context)  # type: ignore[misc]

    def formfield_for_dbfield(self, db_field: Any, request: Any, **options: Any) -> Any:
        """Keep the station as it was chosen."""
        field = super().formfield_for_dbfield(db_field, request, **options)  # type: ignore[misc]
        if db_field.name == "station":
            field.widget = forms.HiddenInput()
        return field

    def render_change_form(
        self, request: HttpRequest, context: dict[str, Any], **options: Any
    ) -> HttpResponse:
        """Name the station at the head of the page."""
        context["station"] = self.station_of_page(request, options.get("obj"))
        return super().render_change_form(request, context, **options)  # type: ignore[misc]

    def _choose_station(self, request: HttpRequest) -> HttpResponse:
        opts = self.opts  # type: ignore[attr-defined]
        told = {name: value for name, value in request.GET.items() if name != "station"}
        context = {
            **self.admin_site.each_context(request),  # type: ignore[attr-defined]
            "opts": opts,
            "title": _("Add %(what)s") % {"what": opts.verbose_name},
            "stations": Station.objects.order_by("code"),
            "told": told,
        }
        return TemplateResponse(request, "admin/choose_station.html", context)
