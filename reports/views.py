"""The public library: issued yearbooks and volumes, to look at and to take away; nothing else."""

from itertools import groupby

from django.core.paginator import Paginator
from django.http import FileResponse, HttpRequest, HttpResponse
from django.shortcuts import get_object_or_404, render
from django.views.decorators.cache import cache_control
from django.views.decorators.http import require_safe

from network.models import Station
from reports import editions
from reports.downloads import handed_over
from reports.models import Edition, Volume

STATIONS_A_PAGE = 60


@require_safe
@cache_control(public=True, max_age=300)
def library(request: HttpRequest) -> HttpResponse:
    """List the issued yearbooks by station and year, and the volumes."""
    issued = Edition.objects.filter(state=Edition.State.ISSUED)
    stations = Station.objects.filter(pk__in=issued.values("station")).order_by("code")
    page = Paginator(stations, STATIONS_A_PAGE).get_page(request.GET.get("page"))
    shown = issued.filter(station__in=list(page)).select_related("station")
    shown = shown.order_by("station__code", "-first_day")
    by_station = [(key, list(rows)) for key, rows in groupby(shown, key=lambda row: row.station)]
    context = {"by_station": by_station, "page": page, "volumes": Volume.objects.all()}
    return render(request, "reports/library.html", context)


@require_safe
@cache_control(public=True, max_age=3600)
def yearbook_file(request: HttpRequest, pk: int, ending: str) -> FileResponse:
    """Hand over the PDF or the data of an issued edition."""
    edition = get_object_or_404(
        Edition.objects.select_related("station"), pk=pk, state=Edition.State.ISSUED
    )
    file = edition.pdf if ending == "pdf" else edition.csv
    return handed_over(file, name=editions.file_name(edition, f".{ending}"))


@require_safe
@cache_control(public=True, max_age=3600)
def volume_file(request: HttpRequest, pk: int) -> FileResponse:
    """Hand over a volume."""
    volume = get_object_or_404(Volume, pk=pk)
    return handed_over(volume.pdf, name=editions.volume_name(volume))
