"""What the page of a visit shows beside its form: stages and findings, each at its field."""

from collections.abc import Mapping, Sequence
from dataclasses import replace
from datetime import datetime
from typing import Any

from network.queries import visits as answers
from network.queries.visit_sheet import VisitSheet

# A plate and another gauge are chosen in one list.
ASKED_AS = {"plate": "gauge", "other_gauge": "gauge"}


def shown_answer(
    sheet: VisitSheet, *, at: datetime, places: Mapping[str, Sequence[str]] | None = None
) -> dict[str, Any]:
    """Return the context of the answer to a sheet.

    places: for each row of a child the prefix of its fields; without them rows stand as counted.
    """
    known = places or {}
    stages = answers.stages(sheet)
    cells = [_cell(f"readings-{number}-reading_m", known) for number in range(len(stages))]
    findings = answers.findings(sheet, at=at)
    return {
        "stages": list(zip(cells, stages, strict=True)),
        "findings": [replace(found, field=_cell(found.field, known)) for found in findings],
    }


def _cell(field: str, places: Mapping[str, Sequence[str]]) -> str:
    """Name the field of the form that an answer means by "readings-1-plate", rows as counted."""
    parts = field.split("-")
    if len(parts) != 3:
        return field
    rows, number, name = parts
    place = places[rows][int(number)] if rows in places else f"{rows}-{number}"
    return f"{place}-{ASKED_AS.get(name, name)}"
