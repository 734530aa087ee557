"""Pages of the work list: its filters, putting an item off, and saying that left work is done."""

from collections.abc import Callable
from typing import Any
from urllib.parse import urlencode
from uuid import UUID

from django import forms
from django.contrib import messages
from django.contrib.admin import AdminSite
from django.core.exceptions import PermissionDenied
from django.http import Http404, HttpRequest, HttpResponse, HttpResponseRedirect
from django.shortcuts import get_object_or_404
from django.template.response import TemplateResponse
from django.urls import URLPattern, path, reverse
from django.utils import timezone
from django.utils.text import capfirst
from django.utils.translation import gettext as _t
from django.utils.translation import gettext_lazy as _

from network.admin.fields import DayInput
from network.admin.work_links import draft_address, shown
from network.models import Station, Stop, Visit, WorkLeft
from network.queries.work_due import work_list
from network.queries.work_due.items import SUBJECTS, Kind
from network.queries.work_due.work_list import Filters, WorkList
from network.services import plans, visits
from network.services.acts import Refusal

WITHIN_DAYS = (0, 7, 14, 30, 60, 90)


class PostponeForm(forms.Form):
    """Ask until when, and why."""

    until = forms.DateField(label=_("until"), widget=DayInput)
    reason = forms.CharField(label=_("reason"), widget=forms.Textarea(attrs={"rows": 3}))


class DoneForm(forms.Form):
    """Ask nothing but the tap itself."""


def filters_of(request: HttpRequest) -> Filters:
    """Read the filters of an address; what cannot be is left out."""
    told = request.GET
    kind = told.get("kind", "")
    return Filters(
        office=_number(told.get("office", "")),
        river=told.get("river", ""),
        kind=Kind(kind) if kind in Kind.values else None,
        within_days=min(_number(told.get("within", "")) or 0, 366),
        with_postponed=told.get("postponed") == "1",
    )


def list_context(request: HttpRequest) -> dict[str, Any]:
    """Return what the work list's template shows to a person."""
    filters = filters_of(request)
    page = _number(request.GET.get("page", "")) or 1
    found = work_list.work_list(
        timezone.now(), filters=filters, page=page, agency=getattr(request, "agency", None)
    )
    own = [row for row in found.unfinished if row.recorded_by == request.user.pk]
    return {
        "drafts": [(row, draft_address(row)) for row in own],
        "work": found,
        "work_lines": shown(found.lines, person=request.user),
        "work_filters": filters,
        "work_kinds": _kind_links(request, found, filters),
        "work_pages": _page_links(request, found),
        "within_days": WITHIN_DAYS,
    }


def panel_context(
    request: HttpRequest, *, station: int | None = None, instrument: int | None = None
) -> dict[str, Any]:
    """Return the work due, with that of the next month, of one station or one instrument."""
    filters = Filters(within_days=30, with_postponed=True, station=station, instrument=instrument)
    found = work_list.work_list(timezone.now(), filters=filters, per_page=None)
    return {"panel_lines": shown(found.lines, person=request.user)}


def urls(site: AdminSite) -> list[URLPattern]:
    """Return the addresses of the acts of the work list."""

    def page(view: Callable[..., HttpResponse]) -> Callable[..., HttpResponse]:
        def called(request: HttpRequest, **keys: Any) -> HttpResponse:
            return view(site, request, **keys)

        return site.admin_view(called)

    return [
        path("work/postpone/", page(postpone), name="work_postpone"),
        path("work/left/<int:key>/done/", page(left_done), name="work_left_done"),
        path("stop/<uuid:form_id>/", page(stop_visit), name="stop_visit"),
    ]


def postpone(site: AdminSite, request: HttpRequest) -> HttpResponse:
    """Put an item of work off, with a reason."""
    if not request.user.has_perm("network.add_postponement"):
        raise PermissionDenied
    kind, key = request.GET.get("kind", ""), _number(request.GET.get("key", ""))
    if kind not in Kind.values or key is None:
        raise Http404
    station = _number(request.GET.get("station", ""))
    subject = f"{SUBJECTS.get(Kind(kind), 'station')}-{key}"
    filters = Filters(station=station, within_days=366, kind=Kind(kind), with_postponed=True)
    found = work_list.work_list(timezone.now(), filters=filters, per_page=None)
    line = next((line for line in found.lines if line.subject == subject), None)
    if line is None:
        messages.info(request, _t("This is not due any more."))
        return HttpResponseRedirect(reverse("admin:index"))

    def act(until: Any, reason: str) -> None:
        plans.postpone(
            kind=line.kind, subject=line.subject, station=_station(line.station),
            until=until, reason=reason, by=request.user, at=timezone.now(),
        )  # fmt: skip

    title = _t("Put off: %(what)s") % {"what": line.kind.label}
    said = f"{line.place}: {line.reason}"
    return _act_page(site, request, PostponeForm, act, title=title, said=said)


def left_done(site: AdminSite, request: HttpRequest, key: int) -> HttpResponse:
    """Say that work left at a visit is done."""
    if not request.user.has_perm("network.change_visit"):
        raise PermissionDenied
    work = get_object_or_404(WorkLeft.objects.select_related("visit__station"), pk=key)

    def act() -> None:
        visits.finish_work(work=work, by=request.user, at=timezone.now())

    said = f"{work.visit.station}: {work.text}"
    return _act_page(site, request, DoneForm, act, title=_t("This work is done"), said=said)


def stop_visit(site: AdminSite, request: HttpRequest, form_id: UUID) -> HttpResponse:
    """Lead from the code on a field sheet to the visit of that stop, or to the form of a new one.

    The form bears the stop's own number: opened by two phones, it still makes one visit.
    """
    stop = get_object_or_404(Stop, form_id=form_id)
    visit = Visit.objects.filter(form_id=form_id).first()
    if visit is not None:
        return HttpResponseRedirect(reverse("admin:network_visit_change", args=[visit.pk]))
    told = urlencode({"station": stop.station_id, "form_id": str(form_id)})
    return HttpResponseRedirect(f"{reverse('admin:network_visit_add')}?{told}")


def _act_page(
    site: AdminSite,
    request: HttpRequest,
    form_class: type[forms.Form],
    act: Callable[..., None],
    *,
    title: str,
    said: str,
) -> HttpResponse:
    """Show a form and do the act on POST, or say what refused it."""
    form = form_class(request.POST if request.method == "POST" else None)
    if request.method == "POST" and form.is_valid():
        try:
            act(**form.cleaned_data)
        except Refusal as refusal:
            known = refusal.field in form.fields
            form.add_error(refusal.field if known else None, refusal.sentence)
        else:
            messages.success(request, f"{capfirst(title)}.")
            return HttpResponseRedirect(reverse("admin:index"))
    context = {**site.each_context(request), "title": capfirst(title), "said": said, "form": form}
    return TemplateResponse(request, "admin/work_act.html", context)


def _kind_links(request: HttpRequest, found: WorkList, filters: Filters) -> list[dict[str, Any]]:
    """Return each kind with its count and the address that shows it alone."""
    every = {
        "label": _t("all"),
        "count": sum(found.counts.values()),
        "url": _with(request, kind=""),
        "chosen": filters.kind is None,
    }
    return [every] + [
        {
            "label": kind.label,
            "count": count,
            "url": _with(request, kind=kind.value),
            "chosen": filters.kind == kind,
        }
        for kind, count in found.counts.items()
    ]


def _page_links(request: HttpRequest, found: WorkList) -> dict[str, str]:
    return {
        "before": _with(request, page=found.page - 1) if found.page > 1 else "",
        "next": _with(request, page=found.page + 1) if found.page < found.pages else "",
    }


def _with(request: HttpRequest, **changed: object) -> str:
    """Return the address of the list with some of its filters changed."""
    kept = {name: value for name, value in request.GET.items() if name != "page"}
    told = {name: value for name, value in {**kept, **changed}.items() if value != ""}
    return reverse("admin:index") + (f"?{urlencode(told)}" if told else "")


def _station(key: int | None) -> Station | None:
    return None if key is None else get_object_or_404(Station, pk=key)


def _number(text: str) -> int | None:
    return int(text) if text.isascii() and text.isdigit() and len(text) < 10 else None
