"""The form of a gauging sheet: heading, table, and what other methods note, read into a sheet."""

import re
from collections.abc import Callable, Mapping, Sequence
from datetime import datetime
from types import SimpleNamespace
from typing import Any

from django import forms
from django.core.exceptions import ValidationError
from django.db import models
from django.http import QueryDict
from django.utils.translation import gettext as _
from django.utils.translation import gettext_lazy

from network.admin import gauging_lines
from network.admin.fields import DecimalTextField, RecordClockField
from network.admin.forms import StaffForm
from network.models import Channel, Gauging, MeterPair, StaffPlate, Station
from network.queries import field_sheets
from network.queries.field_sheets import FieldSheet, Heading, StageRow
from network.queries.sheet_lines import Table, lines_of
from network.services.gaugings import SheetRefused, said

ROW = re.compile(r"[\t; ]+")


class GaugingForm(StaffForm):
    """The heading as a model form; the table of verticals beside it."""

    starting_bank = forms.ChoiceField(
        label=gettext_lazy("starting bank"), choices=Channel.Bank.choices, required=False
    )
    floats = forms.CharField(
        label=gettext_lazy("floats"),
        required=False,
        widget=forms.Textarea(attrs={"rows": 8}),
        help_text=gettext_lazy("One float a line: part of the section, its area m², seconds."),
    )
    samples = forms.CharField(
        label=gettext_lazy("samples"),
        required=False,
        widget=forms.Textarea(attrs={"rows": 8}),
        help_text=gettext_lazy(
            "One sample a line: place of sampling, seconds since the injection (– at a constant "
            "rate), concentration kg/m³."
        ),
    )

    def __init__(self, *args: Any, **options: Any) -> None:
        super().__init__(*args, **options)
        stored = self._stored_sheet()
        channels = stored.channels if stored else ()
        self.fields["starting_bank"].initial = (
            "right" if channels and not channels[0].starts_at_left_bank else "left"
        )
        self.fields["floats"].initial = _float_text(stored)
        self.fields["samples"].initial = _sample_text(stored)
        if self.is_bound:
            self.table = gauging_lines.of_post(self.data)
        else:
            write = DecimalTextField().prepare_value
            shown = lambda value: "" if value is None else write(float(value))  # noqa: E731
            self.table = gauging_lines.of_lines(list(lines_of(channels)), shown)
        wants_more = not self.is_bound or "_rows" in self.data or not self.table.lines
        if (wants_more and not channels) or "_rows" in self.data:
            self.table.add_blank_lines()

    def is_valid(self) -> bool:
        """Let the page be shown again where the user asked for figures or for lines only."""
        asked = {"_compute", "_rows"} & set(self.data)
        return super().is_valid() and not asked and not self.table.has_errors

    def full_clean(self) -> None:
        """Clean the heading, read the table, and put a refused sheet's faults at their cells."""
        super().full_clean()
        if not self.is_bound:
            return
        self.read = read_lines(self.table, self.cleaned_data)
        refusal = getattr(self.request, "refusal", None)
        if isinstance(refusal, SheetRefused):
            for fault in refusal.faults:
                self.table.place(fault, said(fault.sentence), self.read)
        for name, reader in (("floats", _floats_of), ("samples", _samples_of)):
            self._read_text(name, reader)

    def _read_text(self, name: str, reader: Callable[[str], Any]) -> None:
        try:
            self.cleaned_data[name] = reader(self.cleaned_data.get(name, ""))
        except ValidationError as error:
            self.add_error(name, error)

    def _stored_sheet(self) -> FieldSheet | None:
        return field_sheets.of_gauging(self.instance) if self.instance.pk else None


def read_lines(table: gauging_lines.FormTable, heading: Mapping[str, Any]) -> Table:
    """Read the table; without a start its times of the day cannot be placed, the rest can."""
    start = heading.get("started_at") or datetime.fromisoformat("2000-01-01T12:00:00+00:00")
    return table.read(start, from_left=heading.get("starting_bank") != "right")


def sheet_of(
    heading: Mapping[str, Any],
    table: Table,
    children: Mapping[str, Sequence[Mapping[str, Any]]],
) -> FieldSheet:
    """Put a sheet together from cleaned values."""
    fields = {name: heading[name] for name in Heading.__dataclass_fields__ if name in heading}
    return FieldSheet(
        Heading(**fields),
        tuple(
            StageRow(row["read_at"], row["reading_m"], row.get("plate"))
            for row in children.get("stages", ())
            if row.get("read_at") is not None and row.get("reading_m") is not None
        ),
        table.channels if heading.get("method") == Gauging.Method.VELOCITY_AREA else (),
        _other(heading, children),
    )


def typed_heading(data: Mapping[str, Any]) -> dict[str, Any] | None:
    """Read a heading as typed, asking no database; None without station or times."""
    found: dict[str, Any] = {"starting_bank": data.get("starting_bank")}
    for name in ("started_at", "ended_at"):
        found[name] = _cleaned(RecordClockField(), [data.get(f"{name}_0"), data.get(f"{name}_1")])
    for name in ("spin_test_seconds", "stated_discharge_m3s", "stated_u95_percent"):
        found[name] = _cleaned(DecimalTextField(required=False), data.get(name))
    for name, choices in (("way", Gauging.Way), ("method", Gauging.Method)):
        found[name] = data.get(name) if data.get(name) in choices.values else choices.values[0]
    for name, model in (("station", Station), ("pair", MeterPair)):
        found[name] = _row(model, data.get(name))
    for name, reader in (("floats", _floats_of), ("samples", _samples_of)):
        try:
            found[name] = reader(str(data.get(name) or ""))
        except ValidationError:
            found[name] = ()
    times = (found["started_at"], found["ended_at"])
    if found["station"] is None or None in times or times[1] < times[0]:
        return None
    return found


def typed_children(data: Mapping[str, Any]) -> dict[str, list[dict[str, Any]]]:
    """Read what is typed in the children's rows without asking the database."""
    return {prefix: _typed_rows(data, prefix, cells) for prefix, cells in CHILD_CELLS.items()}


def without_row_keys(data: QueryDict) -> QueryDict:
    """Return a form's data in which no child row names a stored one."""
    typed = data.copy()
    for prefix in CHILD_CELLS:
        if f"{prefix}-INITIAL_FORMS" in typed:
            typed[f"{prefix}-INITIAL_FORMS"] = "0"
        for name in [n for n in typed if n.startswith(f"{prefix}-") and n.endswith("-id")]:
            del typed[name]
    return typed


NUMBER = DecimalTextField(required=False)
CHILD_CELLS: dict[str, tuple[str, ...]] = {
    "stages": ("read_at", "plate", "reading_m"),
    "transects": ("starting_bank", "discharge_m3s", "seconds", "is_used"),
    "boat_track": ("tracks_the_bed", "bed_velocity_ms", "water_velocity_ms"),
    "float_reach": ("length_m",),
    "fills": ("volume_m3", "seconds"),
    "injection": ("injection_m3s", "injected_kgm3", "mass_kg", "background_kgm3"),
    "weir_head": (
        *("shape", "head_m", "angle_deg", "notch_width_m", "crest_height_m", "channel_width_m"),
    ),
}
PLAIN = {"starting_bank", "shape"}
TICKED = {"is_used", "tracks_the_bed"}


def _typed_rows(
    data: Mapping[str, Any], prefix: str, cells: tuple[str, ...]
) -> list[dict[str, Any]]:
    total = min(int(data.get(f"{prefix}-TOTAL_FORMS") or 0), 200)
    rows = [_typed_row(data, f"{prefix}-{number}", cells) for number in range(total)]
    return [row for row in rows if any(v for k, v in row.items() if k not in TICKED | PLAIN)]


def _typed_row(data: Mapping[str, Any], prefix: str, cells: tuple[str, ...]) -> dict[str, Any]:
    if data.get(f"{prefix}-DELETE"):
        return {}
    row: dict[str, Any] = {}
    for cell in cells:
        text = data.get(f"{prefix}-{cell}")
        if cell == "read_at":
            typed = [data.get(f"{prefix}-read_at_0"), data.get(f"{prefix}-read_at_1")]
            row[cell] = _cleaned(RecordClockField(), typed)
        elif cell == "plate":
            row[cell] = _row(StaffPlate, text)
        elif cell in TICKED:
            row[cell] = text is not None
        else:
            row[cell] = text if cell in PLAIN else _cleaned(NUMBER, text)
    return row


def _other(
    heading: Mapping[str, Any], children: Mapping[str, Sequence[Mapping[str, Any]]]
) -> field_sheets.Other | None:
    one = {name: SimpleNamespace(**rows[0]) for name, rows in children.items() if len(rows) == 1}
    method = heading.get("method")
    if method == Gauging.Method.MOVING_BOAT:
        return _boat(children.get("transects", []), one.get("boat_track"))
    if method == Gauging.Method.FLOAT and (heading.get("floats") or "float_reach" in one):
        reach = one.get("float_reach")
        return field_sheets.Floats(reach.length_m if reach else None, heading.get("floats") or ())
    if method == Gauging.Method.VOLUMETRIC and children.get("fills"):
        rows = children["fills"]
        return field_sheets.Fills(
            tuple(field_sheets.Fill(row["volume_m3"], row["seconds"]) for row in rows)
        )
    if method == Gauging.Method.DILUTION and "injection" in one:
        put = one["injection"]
        return field_sheets.Tracer(
            heading.get("samples") or (),
            put.background_kgm3 or 0.0,
            put.injection_m3s,
            put.injected_kgm3,
            put.mass_kg,
        )
    if method == Gauging.Method.WEIR and "weir_head" in one:
        noted = children["weir_head"][0]
        sizes: dict[str, Any] = {n: noted.get(n) for n in field_sheets.Weir.__dataclass_fields__}
        return field_sheets.Weir(**sizes)
    return None


def _boat(rows: Sequence[Mapping[str, Any]], track: Any) -> field_sheets.Boat | None:
    if not rows and track is None:
        return None
    crossings = tuple(
        field_sheets.Crossing(
            row["discharge_m3s"], row["seconds"], row["starting_bank"] == "left", row["is_used"]
        )
        for row in rows
    )
    if track is None:
        return field_sheets.Boat(crossings)
    return field_sheets.Boat(
        crossings, track.tracks_the_bed, track.bed_velocity_ms, track.water_velocity_ms
    )


def _cleaned(field: forms.Field, value: Any) -> Any:
    try:
        return field.clean(value)
    except ValidationError:
        return None


def _row(model: type[models.Model], text: Any) -> Any:
    return model(pk=int(text)) if str(text or "").isdecimal() else None


def _floats_of(text: str) -> tuple[field_sheets.TimedFloat, ...]:
    rows = numbers_of(text, 3, _("part, area and seconds"))
    return tuple(field_sheets.TimedFloat(int(part or 0), area, s) for part, area, s in rows)


def _samples_of(text: str) -> tuple[field_sheets.Sample, ...]:
    rows = numbers_of(text, 3, _("place, seconds or –, and concentration"))
    return tuple(field_sheets.Sample(int(place or 1), c, seconds) for place, seconds, c in rows)


def numbers_of(text: str, count: int, wanted: str) -> list[list[float | None]]:
    """Read lines of numbers apart by tabs, semicolons or blanks; a dash is no number."""
    rows = []
    for number, line in enumerate(text.splitlines(), start=1):
        if not line.strip():
            continue
        words = ROW.split(line.strip())
        try:
            row = [None if word in {"–", "-"} else NUMBER.clean(word) for word in words]
        except ValidationError:
            row = []
        if len(row) != count:
            said_of = {"line": number, "text": line.strip(), "wanted": wanted}
            raise ValidationError(_("Line %(line)s, “%(text)s”: %(wanted)s are wanted.") % said_of)
        rows.append(row)
    return rows


def _float_text(sheet: FieldSheet | None) -> str:
    if sheet is None or not isinstance(sheet.other, field_sheets.Floats):
        return ""
    return "\n".join(f"{f.panel}\t{f.area_m2:g}\t{f.seconds:g}" for f in sheet.other.floats)


def _sample_text(sheet: FieldSheet | None) -> str:
    if sheet is None or not isinstance(sheet.other, field_sheets.Tracer):
        return ""
    return "\n".join(
        f"{s.probe}\t{'–' if s.seconds is None else repr(s.seconds)}\t{s.concentration_kgm3!r}"
        for s in sheet.other.samples
    )
