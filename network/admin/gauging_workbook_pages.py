"""Gauging sheets as workbooks: download one for the river, load it afterwards."""

import io
import uuid
from typing import Any

from django import forms
from django.contrib import messages
from django.contrib.admin.utils import quote, unquote
from django.core.exceptions import PermissionDenied
from django.http import HttpRequest, HttpResponse, HttpResponseRedirect
from django.template.response import TemplateResponse
from django.urls import URLPattern, path, reverse
from django.utils import timezone
from django.utils.translation import gettext as _
from django.utils.translation import gettext_lazy

from network.models import Gauging, MeterPair, Station
from network.queries.cautions import AT_THE_RIVER
from network.queries.field_sheets import FieldSheet, Heading, of_gauging
from network.services import gauging_workbooks
from network.services.acts import Refusal

XLSX = "application/vnd.openxmlformats-officedocument.spreadsheetml.sheet"


class BlankSheetForm(forms.Form):
    """For which station and meter a blank workbook is made."""

    station = forms.ModelChoiceField(Station.objects.all(), label=gettext_lazy("station"))
    pair = forms.ModelChoiceField(
        MeterPair.objects.select_related("body", "rotor"),
        label=gettext_lazy("current meter"),
        required=False,
    )


class LoadForm(forms.Form):
    """The workbook that came back."""

    workbook = forms.FileField(
        label=gettext_lazy("workbook"), widget=forms.FileInput(attrs={"accept": ".xlsx"})
    )


class WorkbookPages:
    """Give the admin of gaugings its pages for workbooks."""

    def get_urls(self) -> list[URLPattern]:
        """Add the addresses of the pages."""
        wrap = self.admin_site.admin_view  # type: ignore[attr-defined]
        return [
            path("workbook/", wrap(self.workbook_view), name="network_gauging_workbook"),
            path(
                "<path:object_id>/workbook/",
                wrap(self.download_view),
                name="network_gauging_download",
            ),
            *super().get_urls(),  # type: ignore[misc]
        ]

    def download_view(self, request: HttpRequest, object_id: str) -> HttpResponse:
        """Send the workbook of a gauging."""
        row = self.get_object(request, unquote(object_id))  # type: ignore[attr-defined]
        if row is None or not self.has_view_permission(request, row):  # type: ignore[attr-defined]
            raise PermissionDenied
        return _sent(
            of_gauging(row),
            form_id=row.form_id,
            version=row.version,
            signed_m3s=row.discharge_m3s,
        )

    def workbook_view(self, request: HttpRequest) -> HttpResponse:
        """Make a blank workbook, or load one that was filled in."""
        if not self.has_add_permission(request):  # type: ignore[attr-defined]
            raise PermissionDenied
        blank = BlankSheetForm(request.GET if "station" in request.GET else None)
        if blank.is_bound and blank.is_valid():
            return _blank(blank.cleaned_data["station"], blank.cleaned_data["pair"])
        load = LoadForm(request.POST or None, request.FILES or None)
        if request.method == "POST" and load.is_valid():
            try:
                row = gauging_workbooks.load(
                    load.cleaned_data["workbook"], by=request.user, at=timezone.now()
                )
            except Refusal as refusal:
                for sentence in getattr(refusal, "sentences", [refusal.sentence]):
                    load.add_error("workbook", sentence)
            else:
                messages.success(request, _("The workbook was loaded: look at the sheet, sign it."))
                address = reverse("admin:network_gauging_change", args=[quote(row.pk)])
                return HttpResponseRedirect(address)
        context: dict[str, Any] = {
            **self.admin_site.each_context(request),  # type: ignore[attr-defined]
            "opts": Gauging._meta,
            "title": _("Without signal"),
            "blank": blank,
            "load": load,
        }
        return TemplateResponse(request, "admin/network/gauging/workbook.html", context)


def _blank(station: Station, pair: MeterPair | None) -> HttpResponse:
    now = timezone.now().replace(second=0, microsecond=0)
    heading = Heading(station=station, pair=pair, started_at=now, ended_at=now)
    return _sent(FieldSheet(heading), form_id=uuid.uuid4(), version=0)


def _sent(sheet: FieldSheet, **identity: Any) -> HttpResponse:
    stream = io.BytesIO()
    cautions = [str(caution) for caution in AT_THE_RIVER]
    gauging_workbooks.write(sheet, stream, cautions=cautions, **identity)
    response = HttpResponse(stream.getvalue(), content_type=XLSX)
    start = timezone.localtime(sheet.heading.started_at)
    name = f"gauging-{sheet.heading.station.code}-{start:%Y-%m-%d}.xlsx"
    response["Content-Disposition"] = f'attachment; filename="{name}"'
    return response
