"""Rounds: their heading, and the planner that puts stations into them."""

from typing import Any

from django.contrib import admin, messages
from django.contrib.admin.utils import quote
from django.core.exceptions import PermissionDenied
from django.http import HttpRequest, HttpResponse, HttpResponseRedirect
from django.shortcuts import get_object_or_404
from django.template.response import TemplateResponse
from django.urls import URLPattern, path, reverse
from django.utils import timezone
from django.utils.text import capfirst
from django.utils.translation import gettext as _t
from django.utils.translation import gettext_lazy as _

from network.admin.acting import Filled, ServedAdmin
from network.admin.stop_forms import StopForm
from network.admin.verbs import NoReasonForm, Verb
from network.models import Instrument, Round, Station, Stop
from network.queries import round_choice, rounds
from network.services import rounds as acts
from network.services.acts import Refusal

MAY_PLAN = "network.change_round"


def not_made(row: Round) -> bool:
    """Tell whether a round is still to be made."""
    return row.done_at is None


def _finish(row: Round, **told: Any) -> None:
    acts.finish_round(round=row, **told)


@admin.register(Round)
class RoundAdmin(ServedAdmin):
    """Rounds."""

    list_display = ("name", "office", "first_day", "last_day", "vehicle", "done_at")
    list_filter = ("office",)
    list_select_related = ("office",)
    date_hierarchy = None
    fields = ("name", "office", "first_day", "last_day", "party", "vehicle", "meters", "remarks")
    change_form_template = "admin/network/round/change_form.html"
    verbs = (
        Verb(
            name="finish",
            label=_("round was made"),
            permission=MAY_PLAN,
            run=_finish,
            form=NoReasonForm,
            applies=not_made,
        ),
    )

    def get_urls(self) -> list[URLPattern]:
        """Add the planner and its stops."""
        view = self.admin_site.admin_view
        return [
            path("<int:key>/plan/", view(self.plan_view), name="network_round_plan"),
            path(
                "<int:key>/plan/add/<int:station>/",
                view(self.add_stop_view),
                name="network_stop_add",
            ),
            path(
                "<int:key>/plan/stop/<int:stop>/",
                view(self.change_stop_view),
                name="network_stop_edit",
            ),
            *super().get_urls(),
        ]

    def serve(self, request: HttpRequest, filled: Filled) -> Round:
        """Plan the round or change its heading."""
        return acts.save_round(
            round=filled.row,
            version=filled.version,
            **filled.values,
            by=request.user,
            at=timezone.now(),
        )

    def response_post_save_add(self, request: HttpRequest, obj: Round) -> HttpResponse:
        """Go on to the stops."""
        return self._to_plan(obj)

    def response_post_save_change(self, request: HttpRequest, obj: Round) -> HttpResponse:
        """Go back to the stops."""
        return self._to_plan(obj)

    def plan_view(self, request: HttpRequest, key: int) -> HttpResponse:
        """Show a round with its stops and what can be added; on POST do what a button says."""
        plan = self._round(request, key, changing=request.method == "POST")
        if request.method == "POST":
            try:
                self._press(request, plan)
            except Refusal as refusal:
                messages.error(request, refusal.sentence)
            return self._to_plan(plan)
        now = timezone.now()
        found = round_choice.choices(plan, at=now)
        context = {
            **self.admin_site.each_context(request),
            "opts": self.opts,
            "plan": plan,
            "title": _t("Round"),
            "subtitle": plan.name,
            "sheet": rounds.sheet(plan),
            "choices": found,
            "to_add": [choice for choice in found if choice.position is None],
            "map_size": (round_choice.MAP_WIDTH, round_choice.MAP_HEIGHT),
            "spares": rounds.at_hand(plan.office, status=Instrument.Status.SPARE, at=now),
            "laboratory": rounds.at_hand(
                plan.office, status=Instrument.Status.IN_CALIBRATION, at=now
            ),
            "may_plan": request.user.has_perm(MAY_PLAN) and not_made(plan),
        }
        return TemplateResponse(request, "admin/network/round/plan.html", context)

    def add_stop_view(self, request: HttpRequest, key: int, station: int) -> HttpResponse:
        """Add a stop, its tasks filled in with what is due there."""
        plan = self._round(request, key, changing=True)
        row = get_object_or_404(Station, pk=station)
        try:
            due = round_choice.choice_of(plan, row, at=timezone.now())
        except LookupError:
            raise PermissionDenied from None
        form = StopForm(request.POST or None, initial={"tasks": "\n".join(due.tasks), "hours": 2})

        def act(*, left_out_because: str, **told: Any) -> None:
            who = {"by": request.user, "at": timezone.now()}
            stop = acts.add_stop(round=plan, station=row, **told, **who)
            if left_out_because:
                acts.leave_out(stop=stop, reason=left_out_because, **who)

        return self._stop_page(request, plan, row, form, act, title=_t("Add stop"))

    def change_stop_view(self, request: HttpRequest, key: int, stop: int) -> HttpResponse:
        """Change a stop, or leave it out with a reason."""
        plan = self._round(request, key, changing=True)
        row = get_object_or_404(Stop.objects.select_related("station"), pk=stop, round=plan)
        form = StopForm(request.POST or None, initial=StopForm.filled(row))

        def act(**told: Any) -> None:
            acts.change_stop(stop=row, by=request.user, at=timezone.now(), **told)

        return self._stop_page(request, plan, row.station, form, act, title=_t("Change stop"))

    def _stop_page(
        self,
        request: HttpRequest,
        plan: Round,
        station: Station,
        form: StopForm,
        act: Any,
        *,
        title: str,
    ) -> HttpResponse:
        if request.method == "POST" and form.is_valid() and form.done_by(act):
            return self._to_plan(plan)
        context = {
            **self.admin_site.each_context(request),
            "title": capfirst(title),
            "said": f"{plan}: {station}",
            "form": form,
            "back": reverse("admin:network_round_plan", args=[plan.pk]),
        }
        return TemplateResponse(request, "admin/work_act.html", context)

    def _press(self, request: HttpRequest, plan: Round) -> None:
        """Do what a button of the planner says."""
        told = {"by": request.user, "at": timezone.now()}
        button, _colon, number = request.POST.get("press", "").partition(":")
        if button == "add":
            for choice in round_choice.choices(plan, at=timezone.now()):
                if str(choice.station.pk) in request.POST.getlist("station"):
                    acts.add_stop(round=plan, station=choice.station, tasks=choice.tasks, **told)
            return
        stop = get_object_or_404(plan.stops, pk=number if number.isdigit() else 0)
        if button in {"up", "down"}:
            acts.move_stop(stop=stop, places=-1 if button == "up" else 1, **told)
        elif button == "remove":
            acts.remove_stop(stop=stop, **told)
        elif button == "take_up":
            acts.take_up(stop=stop, **told)

    def _round(self, request: HttpRequest, key: int, *, changing: bool) -> Round:
        may_look = request.user.has_perm("network.view_round")
        if not may_look or (changing and not request.user.has_perm(MAY_PLAN)):
            raise PermissionDenied
        return get_object_or_404(Round.objects.select_related("office"), pk=key)

    def _to_plan(self, plan: Round) -> HttpResponseRedirect:
        return HttpResponseRedirect(reverse("admin:network_round_plan", args=[quote(plan.pk)]))
