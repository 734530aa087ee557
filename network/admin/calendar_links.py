"""Calendar links: a person makes their own, a manager also those of offices; the secret once."""

from collections.abc import Callable
from typing import Any

from django import forms
from django.contrib import messages
from django.contrib.admin import AdminSite
from django.http import HttpRequest, HttpResponse, HttpResponseRedirect
from django.shortcuts import get_object_or_404
from django.template.response import TemplateResponse
from django.urls import URLPattern, path, reverse
from django.utils import timezone
from django.utils.translation import gettext as _t
from django.utils.translation import gettext_lazy as _

from network.models import FeedLink, Office
from network.queries import feeds
from network.services import feeds as acts
from network.services.acts import Refusal

MAY_MAKE = "network.add_feedlink"  # for offices; one's own needs no right


class LinkForm(forms.Form):
    """Ask whose work the link shows."""

    office = forms.ModelChoiceField(
        label=_("of an office"), queryset=Office.objects.all(), required=False,
        empty_label=_("my own"),
    )  # fmt: skip


def urls(site: AdminSite) -> list[URLPattern]:
    """Return the addresses of one's own calendar links."""

    def page(view: Callable[..., HttpResponse]) -> Callable[..., HttpResponse]:
        def called(request: HttpRequest, **keys: Any) -> HttpResponse:
            return view(site, request, **keys)

        return site.admin_view(called)

    return [
        path("calendar/", page(links), name="calendar_links"),
        path("calendar/<int:key>/withdraw/", page(withdraw), name="calendar_withdraw"),
    ]


def links(site: AdminSite, request: HttpRequest) -> HttpResponse:
    """Show one's own links; on POST make one and show its address this once."""
    may_office = request.user.has_perm(MAY_MAKE)
    typed = request.POST if request.method == "POST" else None
    form = LinkForm(typed) if may_office else None
    made = ""
    if request.method == "POST" and (form is None or form.is_valid()):
        office = form.cleaned_data["office"] if form else None
        person = None if office else request.user
        _link, secret = acts.make_link(
            person=person, office=office, by=request.user, at=timezone.now()
        )
        made = request.build_absolute_uri(reverse("network:calendar", args=[secret]))
    context = {
        **site.each_context(request),
        "title": _t("Calendar"),
        "form": form,
        "made": made,
        "links": feeds.links_of(request.user),
    }
    return TemplateResponse(request, "admin/calendar_links.html", context)


def withdraw(site: AdminSite, request: HttpRequest, key: int) -> HttpResponse:
    """Withdraw one of one's own links."""
    link = get_object_or_404(FeedLink, pk=key, person=request.user)
    if request.method == "POST":
        try:
            acts.withdraw_link(link=link, by=request.user, at=timezone.now())
        except Refusal as refusal:
            messages.error(request, refusal.sentence)
    return HttpResponseRedirect(reverse("admin:calendar_links"))
