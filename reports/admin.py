"""The yearbook desk of the staff site: compile, look, issue, check against the record, bind."""

from typing import Any

from django.contrib import admin, messages
from django.core.exceptions import PermissionDenied
from django.core.paginator import Paginator
from django.http import FileResponse, HttpRequest, HttpResponse, HttpResponseRedirect
from django.shortcuts import get_object_or_404
from django.template.response import TemplateResponse
from django.urls import URLPattern, path, reverse
from django.utils import timezone
from django.utils.translation import gettext as _t
from django.utils.translation import gettext_lazy as _

from network.models import Station
from network.queries import clock, station_years, trail
from reports import desk, editions, services
from reports.downloads import handed_over
from reports.forms import CompileForm, IssueForm, VolumeForm, told
from reports.models import Edition, Volume

STATIONS_A_PAGE = 50


class PublishedAdmin(admin.ModelAdmin):
    """Rows that only the services of this app write; everybody of the agency may look."""

    actions = None

    def has_add_permission(self, request: HttpRequest) -> bool:
        """Add nothing by a bare form."""
        return False

    def has_change_permission(self, request: HttpRequest, obj: Any = None) -> bool:
        """Change nothing by a bare form."""
        return False

    def has_delete_permission(self, request: HttpRequest, obj: Any = None) -> bool:
        """Delete nothing: what was issued stays known."""
        return False

    def history_view(
        self, request: HttpRequest, object_id: str, extra_context: Any = None
    ) -> HttpResponse:
        """Show the acts on a row."""
        row = self._row(request, object_id)
        entries = trail.entries(list(trail.acts_on(row)))
        return self._page(
            request, "admin/object_history.html", title=str(row), object=row, entries=entries
        )

    def _row(self, request: HttpRequest, object_id: Any) -> Any:
        if not self.has_view_permission(request):
            raise PermissionDenied
        return get_object_or_404(self.model, pk=object_id)

    def _page(self, request: HttpRequest, template: str, **context: Any) -> HttpResponse:
        shared = {**self.admin_site.each_context(request), "opts": self.opts}
        return TemplateResponse(request, template, {**shared, **context})

    def _own(self, name: str, route: str, view: Any) -> URLPattern:
        address = f"{self.opts.app_label}_{self.opts.model_name}_{name}"
        return path(route, self.admin_site.admin_view(view), name=address)


@admin.register(Edition)
class EditionAdmin(PublishedAdmin):
    """The desk is the list of editions; each has a page, and one for issuing it."""

    def get_urls(self) -> list[URLPattern]:
        """Add the pages of the desk."""
        return [
            self._own("compile", "compile/", self.compile_view),
            self._own("issue", "<int:pk>/issue/", self.issue_view),
            self._own("pdf", "<int:pk>/yearbook.pdf", self.pdf_view),
            self._own("csv", "<int:pk>/daily.csv", self.csv_view),
            *super().get_urls(),
        ]

    def changelist_view(self, request: HttpRequest, extra_context: Any = None) -> HttpResponse:
        """Show the desk of one year."""
        if not self.has_view_permission(request):
            raise PermissionDenied
        years = desk.years()
        asked = request.GET.get("year", "")
        year = int(asked) if asked.isdecimal() and int(asked) in years else next(iter(years), None)
        page = Paginator(Station.objects.order_by("code"), STATIONS_A_PAGE).get_page(
            request.GET.get("page")
        )
        calendar = station_years.calendar()
        return self._page(
            request,
            "reports/desk.html",
            title=_("Yearbook desk"),
            page=page,
            year=year,
            year_label=calendar.label(year) if year else "",
            years=[(each, calendar.label(each)) for each in years],
            lines=desk.lines(list(page), year) if year else [],
            jobs=desk.latest_jobs(services.COMPILING),
            form=CompileForm(initial={"language": clock.agency().language}),
            may_compile=request.user.has_perm("reports.add_edition"),
            may_issue=request.user.has_perm("reports.change_edition"),
            may_bind=request.user.has_perm("reports.add_volume"),
        )

    def compile_view(self, request: HttpRequest) -> HttpResponse:
        """Have the ticked stations' yearbooks compiled, each as a piece of long work."""
        if not request.user.has_perm("reports.add_edition") or request.method != "POST":
            raise PermissionDenied
        form = CompileForm(request.POST)
        if not form.is_valid():
            messages.error(request, told(form))
            return HttpResponseRedirect(reverse("admin:reports_edition_changelist"))
        year, stations = form.cleaned_data["year"], form.cleaned_data["stations"]
        for station in stations:
            services.ask_to_compile(
                station=station,
                year=year,
                language=form.cleaned_data["language"],
                by=request.user,
                at=timezone.now(),
            )
        messages.info(request, _t("Asked for: %(n)d. The list below says how far they are.")
                      % {"n": len(stations)})  # fmt: skip
        return HttpResponseRedirect(
            reverse("admin:reports_edition_changelist", query={"year": year})
        )

    def change_view(
        self,
        request: HttpRequest,
        object_id: str,
        form_url: str = "",
        extra_context: Any = None,
    ) -> HttpResponse:
        """Show one edition and whether the record still says what it says."""
        row = self._row(request, object_id)
        if request.method == "POST":
            raise PermissionDenied
        changes, lost = [], ""
        try:
            changes = editions.changed_since(row)
        except editions.EditionLost as error:
            lost = str(error)
        return self._page(
            request, "reports/edition.html", title=str(row), edition=row, changes=changes,
            largest=editions.largest(changes), lost=lost,
            unit="m³/s" if row.station.is_rated else "m",
            may_issue=request.user.has_perm("reports.change_edition"),
        )  # fmt: skip

    def issue_view(self, request: HttpRequest, pk: int) -> HttpResponse:
        """List what is open, ask for the reasons owed, and issue."""
        row = self._row(request, pk)
        if not request.user.has_perm("reports.change_edition"):
            raise PermissionDenied
        to_row = HttpResponseRedirect(reverse("admin:reports_edition_change", args=[pk]))
        if row.state != Edition.State.COMPILED:
            messages.warning(request, _t("This edition is issued already."))
            return to_row
        owed = services.owed(row)
        form = IssueForm(request.POST or None, owed=owed)
        if request.method == "POST" and form.is_valid():
            try:
                services.issue(edition=row, by=request.user, at=timezone.now(), **form.reasons())
            except services.Refusal as refusal:
                form.refuse(refusal.field, refusal.sentence)
                row.refresh_from_db()
            else:
                messages.success(request, _t("Issued: %(row)s.") % {"row": row})
                return to_row
        return self._page(
            request, "reports/issue.html", title=_("Issue"), edition=row, owed=owed, form=form
        )

    def pdf_view(self, request: HttpRequest, pk: int) -> FileResponse:
        """Hand over the PDF of an edition, issued or not."""
        row = self._row(request, pk)
        return handed_over(row.pdf, name=editions.file_name(row, ".pdf"))

    def csv_view(self, request: HttpRequest, pk: int) -> FileResponse:
        """Hand over the data of an edition, issued or not."""
        row = self._row(request, pk)
        return handed_over(row.csv, name=editions.file_name(row, ".csv"))


@admin.register(Volume)
class VolumeAdmin(PublishedAdmin):
    """The volumes, and the page that binds one."""

    list_display = ("title", "year_label", "bound_at", "bound_by")
    fields = ("title", "year_label", "bound_at", "bound_by", "editions", "pdf")

    def get_urls(self) -> list[URLPattern]:
        """Add the page that binds."""
        return [self._own("bind", "bind/<int:year>/", self.bind_view), *super().get_urls()]

    def bind_view(self, request: HttpRequest, year: int) -> HttpResponse:
        """Ask for the title and bind the issued editions of a year."""
        if not request.user.has_perm("reports.add_volume"):
            raise PermissionDenied
        calendar = station_years.calendar()
        bound = editions.issued_in(calendar.first_day(year))
        title = _t("Yearbook %(year)s") % {"year": calendar.label(year)}
        form = VolumeForm(request.POST or None, initial={"title": title})
        if request.method == "POST" and form.is_valid():
            try:
                volume = services.bind(
                    bound=bound, title=form.cleaned_data["title"], by=request.user,
                    at=timezone.now(),
                )  # fmt: skip
            except services.Refusal as refusal:
                form.add_error(None, refusal.sentence)
            else:
                messages.success(request, _t("Bound: %(volume)s.") % {"volume": volume})
                return HttpResponseRedirect(
                    reverse("admin:reports_volume_change", args=[volume.pk])
                )
        return self._page(
            request, "reports/bind.html", title=_("Bind a volume"), bound=bound, form=form
        )
