"""A staff site with one served noun, to try the shell without any noun of the program."""

from django.urls import include, path
from django.utils.safestring import mark_safe

from network.admin.acting import ServedAdmin
from network.admin.children import ChildRows
from network.admin.rounds import RoundAdmin
from network.admin.site import StaffSite
from network.admin.stations import StationAdmin
from network.admin.verbs import Verb
from network.models import Round, Station, Visit, VisitReading
from network.services.acts import Refusal, claim_version, open_act, required_reason


def keep_visit(*, row, values, readings, version, form_id, by, at):
    """Save a visit with its readings; refuse some remarks."""
    with open_act("keep visit", by=by, at=at, station=values["station"]):
        visit = row or Visit(form_id=form_id, recorded_by=by, recorded_at=at)
        if row is not None:
            claim_version(visit, version=version)
        for name, value in values.items():
            setattr(visit, name, value)
        visit.save()
        for reading in readings:
            stored = reading["id"] or VisitReading(visit=visit)
            for name in ("read_at", "plate", "other_gauge", "observation", "reading_m"):
                setattr(stored, name, reading[name])
            stored.save()
        if values["remarks"] == "too high":
            raise Refusal("Above its plate.", field="readings-0-reading_m")
    return visit


def check(visit, *, by, at, reason):
    """Check a visit."""
    with open_act("check visit", by=by, at=at, reason=required_reason(reason)):
        if reason == "no":
            raise Refusal("Not with that reason.", field="reason")
        visit.state, visit.checked_at, visit.checked_by = "checked", at, by
        visit.save()


class ReadingRows(ChildRows):
    model = VisitReading
    fields = ("read_at", "plate", "other_gauge", "observation", "reading_m")


class VisitAdmin(ServedAdmin):
    change_form_template = "admin/change_form.html"  # not the visit log's own
    fields = ("station", "arrived_at", "remarks")
    inlines = (ReadingRows,)
    verbs = (
        Verb(
            name="check",
            label="check",
            permission="network.change_visit",
            run=check,
            applies=lambda visit: visit.state == "draft",
            preview=lambda _request, _visit, form: mark_safe(
                f"<p>before and after {form.is_bound}</p>"
            ),
        ),
    )

    def serve(self, request, filled):
        return keep_visit(
            row=filled.row,
            values=filled.values,
            readings=filled.children["readings"],
            version=filled.version,
            form_id=filled.form_id,
            by=request.user,
            at=filled.values["arrived_at"],
        )


site = StaffSite(name="admin")
site.register(Station, StationAdmin)
site.register(Round, RoundAdmin)
site.register(Visit, VisitAdmin)
urlpatterns = [path("staff/", site.urls), path("", include("network.web.urls"))]
