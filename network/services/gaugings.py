"""Acts upon gaugings: save a sheet, sign it, check it, reopen it."""

from collections.abc import Iterable
from datetime import datetime
from uuid import UUID

from django.utils.translation import gettext as _
from simple_history.utils import bulk_update_with_history

from network.models import Gauging, GaugingFinding, Infill, Person, Vertical
from network.numerics.gaugings.gauging_faults import Fault
from network.numerics.gaugings.vertical_findings import Finding
from network.numerics.sentences import Sentence
from network.queries import clock, field_sheets, gaugings
from network.queries.field_sheets import FieldSheet
from network.queries.gaugings import Answer
from network.services import acts, sheet_rows
from network.services.acts import Overtaken, Refusal, open_act
from network.services.unstorable_cells import unstorable

RESULTS = (
    *("discharge_m3s", "mid_section_m3s", "mean_section_m3s", "area_m2", "width_m"),
    *("mean_velocity_ms", "greatest_depth_m", "hydraulic_radius_m", "froude", "u95_percent"),
    *("signed_stage_m", "signed_deviation_percent", "signed_shift_m"),
)


class SheetRefused(Refusal):
    """A sheet with faults: each with its place and sentence; nothing was written."""

    def __init__(self, faults: tuple[Fault, ...]) -> None:
        super().__init__(said(faults[0].sentence), field=path_of(faults[0]))
        self.faults = faults


def save(
    *,
    sheet: FieldSheet,
    form_id: UUID,
    by: Person,
    at: datetime,
    version: int | None = None,
    workbook_version: int | None = None,
    party: Iterable[Person] = (),
) -> Gauging:
    """Save a sheet as a draft under its form's name; the same form twice makes one gauging.

    version: the one the form was opened with, None for a new form. A sheet that is already stored
    just so is left as it is (a double tap). Raises Overtaken when someone else saved meanwhile,
    SheetRefused for cells that cannot be stored, Refusal when the gauging is signed.
    """
    _refuse_heading(sheet)
    if faults := unstorable(sheet):
        raise SheetRefused(faults)
    people = list(party)
    found = Gauging.objects.filter(form_id=form_id).first()
    if found is not None and _is_stored(found, sheet, people):
        return found
    with open_act(_("saved a gauging"), by=by, at=at, station=sheet.heading.station):
        row = Gauging.objects.select_for_update().filter(form_id=form_id).first()
        if row is not None and _is_stored(row, sheet, people):
            return row
        row = _claimed(row, version) if row else _new(form_id, by=by, at=at)
        for name in field_sheets.Heading.__dataclass_fields__:
            setattr(row, name, getattr(sheet.heading, name))
        row.workbook_version = workbook_version
        row.full_clean()
        row.save()
        row.party.set(people)
        sheet_rows.write(row, sheet)
    return row


def sign(*, gauging: Gauging, version: int, by: Person, at: datetime) -> Gauging:
    """Store exactly what the kernel gives for the stored sheet, with its findings and panels.

    Mean stage, deviation and closing shift are kept as they were at signing.
    Raises SheetRefused with every fault, Overtaken when the sheet moved on.
    """
    with open_act(_("signed a gauging"), by=by, at=at, station=gauging.station):
        row = _locked(gauging, Gauging.State.DRAFT, _("This gauging is already signed."))
        acts.claim_version(row, version=version)
        found = gaugings.of_stored(row)
        if found.faults:
            raise SheetRefused(found.faults)
        for name, value in results_of(found).items():
            setattr(row, name, value)
        row.calibration = found.calibration
        row.state, row.signed_by, row.signed_at = Gauging.State.SIGNED, by, at
        row.save()
        _store_panels(row, found)
        _store_findings(row, found)
        _raise_where_it_counts(row)
    return row


def check(*, gauging: Gauging, version: int, by: Person, at: datetime) -> Gauging:
    """Say that a signed gauging was looked through."""
    with open_act(_("checked a gauging"), by=by, at=at, station=gauging.station):
        row = _locked(gauging, Gauging.State.SIGNED, _("Only a signed gauging can be checked."))
        acts.claim_version(row, version=version)
        row.state, row.checked_by, row.checked_at = Gauging.State.CHECKED, by, at
        row.save()
    return row


def reopen(*, gauging: Gauging, version: int, by: Person, at: datetime, reason: str) -> Gauging:
    """Take a signed or checked gauging back to a draft; its result stays in the history."""
    reason = acts.required_reason(reason)
    with open_act(_("reopened a gauging"), by=by, at=at, reason=reason, station=gauging.station):
        row = Gauging.objects.select_for_update().get(pk=gauging.pk)
        if row.state == Gauging.State.DRAFT:
            raise Refusal(_("This gauging is a draft already."))
        acts.claim_version(row, version=version)
        _raise_where_it_counts(row)
        for name in (*RESULTS, "calibration", "signed_by", "signed_at", "checked_by", "checked_at"):
            setattr(row, name, None)
        row.state = Gauging.State.DRAFT
        row.save()
        row.findings.all().delete()
        for vertical in _verticals_of(row):
            vertical.mean_velocity_ms = vertical.panel_flow_m3s = None
            vertical.panel_share_percent = None
            vertical.save()
    return row


def results_of(found: Answer) -> dict[str, float | None]:
    """Return what signing stores of an answer, by the names of the gauging's columns."""
    stored: dict[str, float | None] = dict.fromkeys(RESULTS)
    stored |= {
        "discharge_m3s": found.discharge_m3s,
        "u95_percent": found.u95_percent,
        "signed_stage_m": found.stage.stage_m if found.stage else None,
        "signed_deviation_percent": found.deviation_percent,
        "signed_shift_m": found.shift_m,
    }
    if (result := found.result) is None:
        return stored
    section = result.section
    return stored | {
        "mid_section_m3s": result.mid_section_m3s,
        "mean_section_m3s": result.mean_section_m3s,
        "area_m2": section.area_m2,
        "width_m": section.width_m,
        "mean_velocity_ms": result.mean_velocity_ms,
        "greatest_depth_m": section.greatest_depth_m,
        "hydraulic_radius_m": section.hydraulic_radius_m,
        "froude": result.froude,
    }


def said(sentence: Sentence) -> str:
    """Translate a sentence of the kernel and put its values in."""
    values = {
        name: _(value) if isinstance(value, str) and value else value
        for name, value in sentence.values.items()
    }
    return _(sentence.text).format(**values)


def path_of(fault: Fault | Finding) -> str:
    """Name the cell of a fault: channel.vertical.point.field, counted from 0, as far as known."""
    places = (fault.channel, fault.vertical, fault.point, fault.row)
    return ".".join([*(str(place) for place in places if place is not None), fault.field])


def _refuse_heading(sheet: FieldSheet) -> None:
    heading = sheet.heading
    if heading.ended_at < heading.started_at:
        raise Refusal(_("The gauging ends before it starts."), field="ended_at")
    foreign = [row.plate for row in sheet.stages if row.plate is not None]
    if any(plate.station_id != heading.station.pk for plate in foreign):
        raise Refusal(_("This plate stands at another station."), field="stages")
    if heading.visit is not None and heading.visit.station_id != heading.station.pk:
        raise Refusal(_("This visit was to another station."), field="visit")


def _new(form_id: UUID, *, by: Person, at: datetime) -> Gauging:
    return Gauging(form_id=form_id, recorded_by=by, recorded_at=at)


def _claimed(row: Gauging, version: int | None) -> Gauging:
    if row.state != Gauging.State.DRAFT:
        raise Refusal(_("This gauging is signed: reopen it with a reason before changing it."))
    if version is None:
        raise Overtaken(_("This sheet was saved before, with other content: open it again."))
    acts.claim_version(row, version=version)
    return row


def _is_stored(row: Gauging, sheet: FieldSheet, people: list[Person]) -> bool:
    same_people = {person.pk for person in people} == set(row.party.values_list("pk", flat=True))
    return same_people and field_sheets.of_gauging(row) == sheet


def _locked(gauging: Gauging, state: str, sentence: str) -> Gauging:
    row = Gauging.objects.select_for_update().get(pk=gauging.pk)
    if row.state != state:
        raise Refusal(sentence)
    return row


def _verticals_of(row: Gauging) -> Iterable[Vertical]:
    rows = Vertical.objects.filter(channel__gauging=row)
    return rows.order_by("channel__position", "position")


def _store_panels(row: Gauging, found: Answer) -> None:
    """Store mean velocity, mid-section flow and share of every vertical that has them."""
    if (result := found.result) is None:
        return
    places = {
        (channel.position - 1, vertical.position - 1): vertical
        for channel in row.channels.prefetch_related("verticals")
        for vertical in channel.verticals.all()
    }
    velocities = {(v.channel, v.vertical): v.velocity_ms for v in result.verticals}
    changed = []
    for panel in result.mid_panels:
        if panel.vertical is None:
            continue
        vertical = places[panel.channel, panel.vertical]
        vertical.mean_velocity_ms = velocities[panel.channel, panel.vertical]
        vertical.panel_flow_m3s = panel.flow_m3s
        vertical.panel_share_percent = 100 * panel.share
        changed.append(vertical)
    fields = ["mean_velocity_ms", "panel_flow_m3s", "panel_share_percent"]
    bulk_update_with_history(changed, Vertical, fields)


def _store_findings(row: Gauging, found: Answer) -> None:
    GaugingFinding.objects.bulk_create(
        GaugingFinding(
            gauging=row,
            kind=finding.kind,
            place=path_of(finding),
            sentence=said(finding.sentence)[:300],
            source=_(finding.source)[:120],
        )
        for finding in found.findings
    )


def _raise_where_it_counts(row: Gauging) -> None:
    """Raise the record version where a winter estimate passes through this gauging."""
    middle = row.started_at + (row.ended_at - row.started_at) / 2
    day = clock.record_day(middle, of=clock.agency())
    winters = Infill.objects.standing().filter(
        station=row.station, method=Infill.Method.WINTER_RATIO
    )
    if winters.filter(first_day__lte=day, last_day__gte=day).exists():
        acts.raise_record_version(row.station)
