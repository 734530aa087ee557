"""The figures of the network for a period, on the screen, as CSV and as PDF; for staff."""

from datetime import date, timedelta
from typing import Any

from django import forms
from django.contrib import admin
from django.contrib.admin.views.decorators import staff_member_required
from django.core.exceptions import PermissionDenied
from django.core.paginator import Paginator
from django.http import HttpRequest, HttpResponse
from django.template.response import TemplateResponse
from django.utils import timezone
from django.utils.translation import gettext as _t
from django.utils.translation import gettext_lazy as _
from django.views.decorators.cache import never_cache
from django.views.decorators.http import require_safe

from network.queries.network_figures import NetworkFigures, Period, figures
from reports import downloads
from reports.network_figures import table
from reports.services import printer

STATIONS_A_PAGE = 50
LONGEST = timedelta(days=366 * 30)


class PeriodForm(forms.Form):
    """Ask for a period of whole days."""

    first = forms.DateField(label=_("from"), widget=forms.DateInput(attrs={"type": "date"}))
    last = forms.DateField(label=_("through"), widget=forms.DateInput(attrs={"type": "date"}))

    def clean(self) -> dict[str, Any]:
        """Refuse an end before the start, and more than thirty years."""
        told = super().clean() or {}
        first, last = told.get("first"), told.get("last")
        if first and last and last < first:
            self.add_error("last", _t("The last day is not before the first."))
        if first and last and last - first > LONGEST:
            self.add_error("last", _t("A period is at most thirty years long."))
        return told


@staff_member_required(login_url="admin:login")
@require_safe
@never_cache
def network_figures(request: HttpRequest, ending: str = "html") -> HttpResponse:
    """Show or hand over the figures of a period; at first those of the last year."""
    if not request.user.has_perm("network.view_station"):
        raise PermissionDenied
    form = PeriodForm(_told(request))
    if not form.is_valid():
        return _screen(request, form, None)
    period = Period(form.cleaned_data["first"], form.cleaned_data["last"])
    found = figures(period, at=timezone.now())
    if ending == "csv":
        response = HttpResponse(table.csv_of(found), content_type=downloads.CSV)
        response["Content-Disposition"] = f'inline; filename="{_name(period)}.csv"'
        return response
    if ending == "pdf":
        name = _name(period)
        return downloads.printed(lambda: printer("network_figures.page").pdf_of(found), name=name)
    return _screen(request, form, found)


def _told(request: HttpRequest) -> dict[str, str]:
    """Return the period asked for, else the year up to yesterday."""
    yesterday = timezone.localdate() - timedelta(days=1)
    usual = {"first": _year_before(yesterday).isoformat(), "last": yesterday.isoformat()}
    return {name: request.GET.get(name, value) for name, value in usual.items()}


def _year_before(day: date) -> date:
    return day - timedelta(days=364)


def _name(period: Period) -> str:
    return f"network_{period.first_day}_{period.last_day}"


def _screen(request: HttpRequest, form: PeriodForm, found: NetworkFigures | None) -> HttpResponse:
    stations = Paginator(found.stations if found else (), STATIONS_A_PAGE)
    context = {
        **admin.site.each_context(request),
        "title": _t("Network figures"),
        "form": form,
        "found": found,
        "stations": stations.get_page(request.GET.get("page")),
    }
    return TemplateResponse(request, "reports/network_figures_screen.html", context)
