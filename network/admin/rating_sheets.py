"""The rating sheet: choose gaugings, fit or type a curve, look, and keep it as a draft."""

from collections.abc import Mapping
from dataclasses import dataclass
from math import isnan
from typing import Any

from django.contrib import messages
from django.contrib.admin.utils import unquote
from django.core.exceptions import PermissionDenied
from django.http import HttpRequest, HttpResponse, HttpResponseRedirect
from django.template.response import TemplateResponse
from django.urls import URLPattern, path, reverse
from django.utils import timezone
from django.utils.translation import gettext as _

from network.admin import rating_forms
from network.admin.rating_forms import WAYS, GaugingsForm, VersionForm, Way
from network.models import Curve, RatingPeriod, Station
from network.queries import (
    clock,
    curves,
    in_force,
    rating_charts,
    rating_difference,
    rating_points,
    rating_sheet,
    rating_table,
    stages_that_occur,
)
from network.queries.rating_points import Points
from network.queries.rating_sheet import Sheet
from network.services import ratings
from network.services.acts import Refusal


@dataclass
class Asked:
    """The three forms of a sheet as sent or as first shown, and what was said of the gaugings."""

    gaugings: GaugingsForm
    curve: Any
    version: VersionForm
    answers: Mapping[int, str]
    faults: Mapping[int, str]

    @property
    def is_sound(self) -> bool:
        """Whether all that was sent can be used."""
        sound = [form.is_valid() for form in (self.gaugings, self.curve, self.version)]
        return all(sound) and not self.faults

    def points(self, station: Station) -> Points:
        """Return the station's gaugings, by the choice as far as it can be used."""
        usable = self.gaugings.is_bound and self.gaugings.is_valid()
        if usable:
            choice = self.gaugings.choice(self.answers)
        else:
            choice = rating_points.Choice(
                first_day=self.gaugings.initial.get("first_day"), answers=self.answers
            )
        return rating_points.points_of(station, choice)


class RatingSheetPages:
    """Give the admin of rating versions the sheet, for a new version and for a draft."""

    def has_add_permission(self, request: HttpRequest) -> bool:
        """Let those draft whom the table of roles names."""
        return bool(request.user.has_perm("network.add_curve"))

    def get_urls(self) -> list[URLPattern]:
        """Add the page on which a draft is drafted anew."""
        view = self.admin_site.admin_view(self.redraft_view)  # type: ignore[attr-defined]
        own = [path("<path:object_id>/redraft/", view, name="network_curve_redraft")]
        return own + super().get_urls()  # type: ignore[misc]

    def add_view(
        self, request: HttpRequest, form_url: str = "", extra_context: Any = None
    ) -> HttpResponse:
        """Ask for the station, then show its sheet."""
        self._require(request)
        key = request.GET.get("station", "")
        station = Station.objects.filter(pk=key).first() if key.isdigit() else None
        if station is None:
            rated = [each for each in Station.objects.all() if each.is_rated]
            return self._sheet_page(request, "choose", stations=rated)
        if not station.is_rated:
            messages.warning(request, _("This station is not rated here."))
            return HttpResponseRedirect(reverse("admin:network_curve_add"))
        return self._sheet_view(request, station, None)

    def redraft_view(self, request: HttpRequest, object_id: str) -> HttpResponse:
        """Show the sheet of a draft, to be replaced."""
        self._require(request)
        row = self.get_object(request, unquote(object_id))  # type: ignore[attr-defined]
        if row is None or row.state != Curve.State.DRAFT or not row.stands:
            messages.warning(request, _("Only a draft can be drafted anew."))
            return HttpResponseRedirect(reverse("admin:network_curve_changelist"))
        return self._sheet_view(request, row.station, row)

    def _sheet_view(
        self, request: HttpRequest, station: Station, row: Curve | None
    ) -> HttpResponse:
        way = _way(request, row)
        asked = _asked(request, way, station, row)
        points = asked.points(station)
        sheet = _computed(request, asked, points, row)
        if sheet is not None and "_keep" in request.POST:
            kept = _kept(request, asked, sheet, station=station, row=row)
            if kept is not None:
                messages.success(request, _("Kept as a draft."))
                return HttpResponseRedirect(reverse("admin:network_curve_change", args=[kept.pk]))
        return self._sheet_page(
            request,
            "sheet",
            station=station,
            row=row,
            ways=WAYS,
            way=way,
            asked=asked,
            lines=[(p, asked.faults.get(p.gauging.pk, "")) for p in points.rows],
            n_used=int(points.used.sum()),
            **(shown(sheet, station) if sheet else {}),
        )

    def _require(self, request: HttpRequest) -> None:
        if not self.has_add_permission(request):
            raise PermissionDenied

    def _sheet_page(self, request: HttpRequest, which: str, **context: Any) -> HttpResponse:
        return TemplateResponse(
            request,
            f"admin/network/curve/{which}.html",
            {
                **self.admin_site.each_context(request),  # type: ignore[attr-defined]
                "opts": self.opts,  # type: ignore[attr-defined]
                "title": _("Rating sheet"),
                "subtitle": str(context.get("station", "")),
                **context,
            },
        )


def shown(sheet: Sheet, station: Station, *, leave_out: Curve | None = None) -> dict[str, Any]:
    """Return what the templates of a sheet want: charts, tests, table, difference."""
    now = in_force.at(
        RatingPeriod.objects.filter(station=station).select_related("curve"), timezone.now()
    )
    version = now.curve if now and now.curve != leave_out else None
    before = curves.kernel_curve(version) if version else None
    stages = stages_that_occur.of_station(station)
    sign = clock.agency().decimal_sign
    return {
        "sheet": sheet,
        "charts": rating_charts.charts(sheet, before=before, decimal_sign=sign),
        "verdicts": sheet.verdicts(),
        "later_verdicts": sheet.later_verdicts(),
        "segment_lines": sheet.segments(),
        "gauging_lines": _gauging_lines(sheet),
        "table": rating_table.decimetres(sheet.curve),
        "version_in_force": version,
        "difference": rating_difference.compare(before, sheet.curve, stages) if before else None,
    }


def _gauging_lines(sheet: Sheet) -> list[tuple[Any, float | None]]:
    """Return each gauging with its deviation, None where there is none."""
    deviations = sheet.deviations_percent.tolist()
    return [
        (point, None if isnan(deviation) else deviation)
        for point, deviation in zip(sheet.points.rows, deviations, strict=True)
    ]


def _way(request: HttpRequest, row: Curve | None) -> Way:
    stored = "fit"
    if row is not None and not row.band.exists():
        stored = "segments" if row.form == Curve.Form.SEGMENTS else "table"
    name = request.GET.get("way", stored)
    return next((way for way in WAYS if way.name == name), WAYS[0])


def _asked(request: HttpRequest, way: Way, station: Station, row: Curve | None) -> Asked:
    if request.method == "POST":
        answers, faults = rating_forms.answers_of(request.POST)
        sent = request.POST
        return Asked(
            GaugingsForm(sent), way.form(sent), VersionForm(sent), answers=answers, faults=faults
        )
    moved = rating_points.last_move_of_zero(station)
    day = clock.record_day(moved, of=clock.agency()) if moved else None
    answers = {}
    if row is not None:
        answers = {g.gauging_id: g.left_out_because for g in row.gaugings.all()}
    return Asked(
        GaugingsForm(initial={"first_day": day}),
        way.form(initial=_stored_curve(way, row)),
        VersionForm(initial=_stored_version(row)),
        answers,
        {},
    )


def _stored_curve(way: Way, row: Curve | None) -> dict[str, Any]:
    if row is None:
        return {}
    segments = list(row.segments.all())
    if way.name == "segments":
        return rating_forms.SegmentsForm.initial_of(segments)
    if way.name == "table":
        rows = rating_forms.TableForm.initial_of(row.points.all())
        return {"rule": row.form, "h0_m": row.h0_m, "rows": rows}
    return {"segments": max(len(segments), 1)} if way.name == "fit" else {}


def _stored_version(row: Curve | None) -> dict[str, Any]:
    if row is None:
        return {}
    names = ("lowest_use_m", "highest_use_m", "extrapolate_low_m", "extrapolate_high_m", "reason")
    return {name: getattr(row, name) for name in names}


def _computed(
    request: HttpRequest, asked: Asked, points: Points, row: Curve | None
) -> Sheet | None:
    """Return the sheet asked for; None with the reason on the form where there is none.

    Before anything was sent, a fit of one segment is shown where the gaugings carry it.
    """
    if request.method != "POST":
        if row is not None or not isinstance(asked.curve, rating_forms.FitForm):
            return None
        try:
            return rating_sheet.fitted(points, rating_sheet.FitChoice())
        except ValueError:
            return None
    if not asked.is_sound:
        return None
    try:
        sheet: Sheet = asked.curve.sheet(points, asked.version.use)
        return sheet
    except ValueError as error:  # Refused and FitRefused of the kernel among them
        asked.curve.add_error(None, rating_sheet.sentence_of(error))
        return None


def _kept(
    request: HttpRequest, asked: Asked, sheet: Sheet, *, station: Station, row: Curve | None
) -> Curve | None:
    """Draft the sheet's curve; None with the sentence on the form where it is refused."""
    told = asked.version.cleaned_data
    may_gap = asked.curve.cleaned_data.get("joints_may_gap", False)
    content = ratings.content_of(sheet, joints_may_gap=may_gap)
    signed = {"reason": told["reason"], "by": request.user, "at": timezone.now()}
    try:
        if row is not None:
            return ratings.redraft(curve=row, content=content, **signed)
        return ratings.draft(station=station, number=told["number"], **vars(content), **signed)
    except Refusal as refusal:
        known = refusal.field in asked.version.fields
        asked.version.add_error(refusal.field if known else None, refusal.sentence)
        return None
