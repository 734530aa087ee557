"""Before and after in the staff site: a form, what it would change, then the act confirmed.

Put `Tried` before ServedAdmin among the bases of a noun whose rows change the past. Verbs get the
same by `Verb(station_of=…)`. An act that changes nothing published is done at once.
"""

from collections.abc import Callable, Mapping
from typing import Any

from django.contrib import messages
from django.http import HttpRequest, HttpResponse
from django.template.response import TemplateResponse
from django.utils.translation import gettext as _

from network.models import Station
from network.services import trial
from network.services.acts import Refusal

SEEN, EDIT = "seen", "_edit"
NOT_TYPED = {"csrfmiddlewaretoken", SEEN, EDIT}


def tried(
    request: HttpRequest,
    station: Station,
    act: Callable[[], Any],
    *,
    touches_readings: bool = False,
    look: Callable[[], Mapping[str, Any]] | None = None,
) -> Any:
    """Do the act if its differences were seen or are none; else keep them for the page and return
    None. Refusals pass through, one of them where the record moved since it was shown.
    With `look`, other answers are compared too, and the page is shown in any case.
    """
    if EDIT in request.POST:
        raise Refusal(_("Nothing was written. Change what you typed, then save again."))
    seen = request.POST.get(SEEN)
    if not seen:
        found = trial.before_and_after(
            station, act, touches_readings=touches_readings, look=look or dict
        )
        if look or not found.is_nothing:
            request.differences = found
            return None
        messages.info(request, _("No published figure and no gauging changed."))
        seen = found.fingerprint
    return trial.confirm(station, act, seen=seen)


def page(request: HttpRequest, **context: Any) -> HttpResponse:
    """Show the differences kept by `tried`, with all that was typed carried along."""
    typed = [
        (name, value)
        for name, values in request.POST.lists()
        for value in values
        if name not in NOT_TYPED
    ]
    found = request.differences
    return TemplateResponse(
        request, "admin/before_and_after.html", {"differences": found, "typed": typed, **context}
    )


class Tried:
    """Put before and after between the form of a ServedAdmin and its act."""

    def station_of(self, filled: Any) -> Station:
        """Return the station whose figures the act changes."""
        station: Station = filled.values["station"]
        return station

    def serve(self, request: HttpRequest, filled: Any) -> Any:
        """Try the act first, or do it once its differences were seen."""

        def act() -> Any:
            return super(Tried, self).serve(request, filled)  # type: ignore[misc]

        saved = tried(request, self.station_of(filled), act)
        return saved if saved is not None else self.model()  # type: ignore[attr-defined]

    def response_add(self, request: HttpRequest, obj: Any, *args: Any) -> HttpResponse:
        """Show the differences where the act was only tried."""
        return self._shown(request) or super().response_add(request, obj, *args)  # type: ignore[misc]

    def response_change(self, request: HttpRequest, obj: Any) -> HttpResponse:
        """Show the differences where the act was only tried."""
        return self._shown(request) or super().response_change(request, obj)  # type: ignore[misc]

    def _shown(self, request: HttpRequest) -> HttpResponse | None:
        if not hasattr(request, "differences"):
            return None
        context = self.admin_site.each_context(request)  # type: ignore[attr-defined]
        opts = self.opts  # type: ignore[attr-defined]
        return page(request, **context, opts=opts, title=_("Before and after"))
