"""The table of a gauging sheet as it stands in a form: every line kept as typed, faults by cell."""

from collections.abc import Mapping, Sequence
from dataclasses import dataclass, field
from datetime import datetime
from typing import Any

from django.core.exceptions import ValidationError
from django.utils.translation import gettext as _
from django.utils.translation import gettext_lazy

from network.admin.fields import DecimalTextField, TimeOfDayField
from network.models import Channel
from network.queries.field_sheets import Point
from network.queries.sheet_lines import Line, Table, table_of

PREFIX = "rows"
TOTAL = f"{PREFIX}-TOTAL_FORMS"
NUMBERS = {
    "distance_m": gettext_lazy("distance"),
    "depth_m": gettext_lazy("depth"),
    "velocity_ms": gettext_lazy("velocity"),
    "angle_deg": gettext_lazy("angle of the flow"),
    "ice_underside_m": gettext_lazy("underside of ice"),
    "line_angle_deg": gettext_lazy("angle of the line"),
    "air_line_m": gettext_lazy("guide above water"),
}
POINT_CELLS = {
    "revolutions": gettext_lazy("revolutions"),
    "seconds": gettext_lazy("seconds"),
    "velocity_ms": gettext_lazy("velocity"),
}
# What the choice of points means: the parts of the depth.
POINT_SETS = {
    "0.6": gettext_lazy("0.6"),
    "0.2 0.8": gettext_lazy("0.2 and 0.8"),
    "0.2 0.6 0.8": gettext_lazy("0.2, 0.6, 0.8"),
    "0 0.2 0.6 0.8 1": gettext_lazy("five points"),
    "0 0.2 0.4 0.6 0.8 1": gettext_lazy("six points"),
    "0": gettext_lazy("surface"),
    "0.5": gettext_lazy("0.5"),
    "given": gettext_lazy("mean velocity"),
    "": gettext_lazy("sounding only"),
}
USUAL = "0.6"
BLANK_LINES = 8


@dataclass
class FormLine:
    """One line as typed: cells by name, points by their place, and what is wrong with a cell."""

    number: int
    kind: str = "vertical"
    edge: str = "sloping"
    point_set: str = USUAL
    cells: dict[str, str] = field(default_factory=dict)
    points: list[dict[str, str]] = field(default_factory=list)
    errors: dict[str, list[str]] = field(default_factory=dict)

    @property
    def is_edge(self) -> bool:
        """Whether this is an edge of water."""
        return self.kind == "edge"

    @property
    def is_blank(self) -> bool:
        """Whether nothing is typed."""
        return not any([*self.cells.values(), *(text for p in self.points for text in p.values())])

    @property
    def fractions(self) -> list[str]:
        """The parts of the depth of the points."""
        return [] if self.point_set == "given" else self.point_set.split()

    @property
    def point_lines(self) -> list[dict[str, Any]]:
        """What the page shows for each point."""
        names = {"0": _("surface"), "1": _("bed")}
        return [
            {
                "fraction": names.get(fraction, fraction),
                "cells": [
                    self._shown(f"p{place}-{name}", typed.get(name, ""), label)
                    for name, label in POINT_CELLS.items()
                ],
            }
            for place, (fraction, typed) in enumerate(
                zip(self.fractions, self.points + [{}] * 7, strict=False)
            )
        ]

    @property
    def shown(self) -> dict[str, dict[str, Any]]:
        """The other cells by name, as the page shows them."""
        labels = {**NUMBERS, "time": _("time")}
        return {
            name: self._shown(name, self.cells.get(name, ""), label)
            for name, label in labels.items()
        }

    @property
    def has_more(self) -> bool:
        """Whether one of the cells that are folded away is filled or wrong."""
        folded = ("time", "angle_deg", "ice_underside_m", "line_angle_deg", "air_line_m")
        return any(self.cells.get(name) or self.errors.get(name) for name in folded)

    @property
    def other_set(self) -> str:
        """A set of points that is none of the usual ones, empty where it is usual."""
        return "" if self.point_set in POINT_SETS else self.point_set

    def name(self, cell: str) -> str:
        """Return the name of a cell's field."""
        return f"{PREFIX}-{self.number}-{cell}"

    def _shown(self, cell: str, typed: str, label: Any) -> dict[str, Any]:
        return {
            "name": self.name(cell),
            "value": typed,
            "label": label,
            "errors": self.errors.get(cell, ()),
            "signed": cell.endswith(("velocity_ms", "angle_deg")) and "line" not in cell,
        }


@dataclass
class FormTable:
    """All lines of the form; blank ones are kept on the page and count for nothing."""

    lines: list[FormLine]
    other_errors: list[str] = field(default_factory=list)

    @property
    def filled(self) -> list[FormLine]:
        """The lines that say something; the edges of a table with anything in it always do."""
        anything = any(not line.is_blank for line in self.lines)
        return [ln for ln in self.lines if not ln.is_blank or (anything and ln.is_edge)]

    @property
    def has_errors(self) -> bool:
        """Whether a cell could not be read."""
        return bool(self.other_errors) or any(line.errors for line in self.lines)

    def read(self, start: datetime, *, from_left: bool) -> Table:
        """Read the lines as a table of the sheet; cells that are no numbers are noted."""
        found = table_of([_line(line) for line in self.filled], start, from_left=from_left)
        for place, fault in found.faults:
            note(self.filled[place], fault.field, str(_(fault.sentence.text)))
        return found

    def place(self, fault: Any, sentence: str, table: Table) -> None:
        """Put a fault of the sheet at its cell, or on top where it speaks of no cell."""
        at = table.line_of(fault)
        if at is None:
            self.other_errors.append(sentence)
        else:
            note(self.filled[at], cell_of(fault), sentence)

    def add_blank_lines(self) -> None:
        """Add blank verticals before the last edge, and the edges where there are none."""
        lines = self.lines
        if not lines:
            lines.append(FormLine(0, kind="edge"))
        last = lines.pop() if len(lines) > 1 and lines[-1].is_edge else FormLine(0, kind="edge")
        usual = next((ln.point_set for ln in reversed(lines) if not ln.is_edge), USUAL)
        lines += [FormLine(0, point_set=usual) for _blank in range(BLANK_LINES)]
        lines.append(last)
        for number, line in enumerate(lines):
            line.number = number


def cell_of(fault: Any) -> str:
    """Name the cell of a line that a fault speaks of."""
    name = fault.field.rpartition(".")[2]
    if fault.point is not None:
        return f"p{fault.point}-{name}"
    return {"mean_velocity_ms": "velocity_ms"}.get(name, name)


def note(line: FormLine, cell: str, sentence: str) -> None:
    """Note what is wrong with a cell, once."""
    said = line.errors.setdefault(cell, [])
    if sentence not in said:
        said.append(sentence)


def of_post(data: Mapping[str, str]) -> FormTable:
    """Take the lines of a form as they were typed."""
    total = min(int(data.get(TOTAL) or 0), 400)
    return FormTable([_typed(data, number) for number in range(total)])


def of_lines(lines: Sequence[Line], write: Any) -> FormTable:
    """Show stored lines; write turns a number into the text of a field."""
    return FormTable([_stored(line, number, write) for number, line in enumerate(lines)])


def _typed(data: Mapping[str, str], number: int) -> FormLine:
    def cell(name: str) -> str:
        return str(data.get(f"{PREFIX}-{number}-{name}", "")).strip()

    line = FormLine(
        number,
        kind="edge" if cell("kind") == "edge" else "vertical",
        edge=cell("edge") or "sloping",
        point_set=cell("points"),
        cells={name: cell(name) for name in (*NUMBERS, "time")},
    )
    line.points = [
        {name: cell(f"p{place}-{name}") for name in POINT_CELLS}
        for place in range(len(line.fractions))
    ]
    return line


def _stored(line: Line, number: int, write: Any) -> FormLine:
    sets = " ".join(f"{point.fraction:g}" for point in line.points)
    given = line.velocity_ms is not None and not line.is_edge
    cells = {name: write(getattr(line, name)) for name in NUMBERS}
    return FormLine(
        number,
        kind="edge" if line.is_edge else "vertical",
        edge=str(line.edge),
        point_set="given" if given and not sets else sets,
        cells={**cells, "time": line.time.strftime("%H:%M") if line.time else ""},
        points=[{name: write(getattr(p, name)) for name in POINT_CELLS} for p in line.points],
    )


def _line(line: FormLine) -> Line:
    """Read a line; a cell that cannot be read is noted and counts as blank."""
    numbers: dict[str, Any] = {
        name: _number(line, name, line.cells.get(name, "")) for name in NUMBERS
    }
    if line.is_edge:
        edge = line.edge if line.edge in Channel.Edge.values else Channel.Edge.SLOPING
        kept = {name: numbers[name] for name in ("distance_m", "depth_m", "velocity_ms")}
        return Line(is_edge=True, edge=edge, **kept)
    if line.point_set != "given":
        numbers["velocity_ms"] = None
    return Line(time=_time(line), points=_points(line), **numbers)


def _points(line: FormLine) -> tuple[Point, ...]:
    """Read the points; where none of them is filled the vertical is a sounding."""
    if not any(text for point in line.points for text in point.values()):
        return ()
    found = []
    for place, (fraction, typed) in enumerate(zip(line.fractions, line.points, strict=False)):
        cells = {
            name: _number(line, f"p{place}-{name}", typed.get(name, "")) for name in POINT_CELLS
        }
        found.append(Point(_fraction(fraction), **cells))
    return tuple(found)


def _fraction(text: str) -> float | None:
    try:
        return float(text)
    except ValueError:
        return None


def _number(line: FormLine, cell: str, text: str) -> float | None:
    label = NUMBERS.get(cell) or POINT_CELLS.get(cell.rpartition("-")[2], "")
    try:
        return DecimalTextField(required=False, label=label).clean(text)
    except ValidationError as error:
        note(line, cell, " ".join(error.messages))
        return None


def _time(line: FormLine) -> Any:
    try:
        return TimeOfDayField(required=False).clean(line.cells.get("time", ""))
    except ValidationError as error:
        note(line, "time", " ".join(error.messages))
        return None
