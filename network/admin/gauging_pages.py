"""What the pages of a gauging show of an answer: figures, findings by place, a result a line."""

from collections.abc import Iterable
from dataclasses import dataclass
from typing import Any

from django.utils.translation import gettext

from network.admin.gauging_lines import FormTable, cell_of
from network.models import Agency, Gauging
from network.queries import gaugings as answers
from network.queries.gaugings import Answer
from network.queries.section_drawing import drawing
from network.queries.sheet_lines import Table
from network.services.gaugings import said


@dataclass(frozen=True)
class ShownFinding:
    """A finding or a fault in words, with its source and the cell it speaks of."""

    sentence: str
    source: str = ""
    cell: str = ""
    kind: str = ""
    is_advice: bool = False


@dataclass(frozen=True)
class LineResult:
    """What a line gives: mean velocity, wading product, share of the flow in %."""

    line: int
    depth_m: float | None
    velocity_ms: float | None
    product_m2s: float | None
    share_percent: float | None
    is_too_much: bool
    bar: float


def shown_answer(
    found: Answer, table: Table | None = None, lines: FormTable | None = None
) -> dict[str, Any]:
    """Return the context of the templates of an answer."""
    return {
        "answer": found,
        "drawing": drawing(found),
        "faults": [
            ShownFinding(said(fault.sentence), cell=_cell(fault, table, lines))
            for fault in found.faults
        ],
        "findings": grouped(
            ShownFinding(
                said(finding.sentence),
                said_source(finding.source),
                _cell(finding, table, lines),
                finding.kind,
                finding.advice,
            )
            for finding in found.findings
        ),
        "line_results": line_results(found, table, lines),
        "wading_limit_m2s": found.wading_limit_m2s,
    }


def stored_answer(row: Gauging, *, agency: Agency) -> dict[str, Any]:
    """Return what was signed, beside what the sheet gives today."""
    found = answers.of_stored(row, agency=agency)
    context = shown_answer(found)
    stored = row.findings.all()
    context["findings"] = grouped(
        ShownFinding(finding.sentence, finding.source, kind=finding.kind) for finding in stored
    )
    context["signed"] = row
    context["channels"] = row.channels.prefetch_related("verticals__points")
    return context


def grouped(found: Iterable[ShownFinding]) -> list[list[ShownFinding]]:
    """Put findings of one kind together, in the order of the first of each."""
    groups: dict[str, list[ShownFinding]] = {}
    for finding in found:
        groups.setdefault(finding.kind, []).append(finding)
    return list(groups.values())


def said_source(source: str) -> str:
    """Translate the source of a finding."""
    return gettext(source) if source else ""


def line_results(found: Answer, table: Table | None, lines: FormTable | None) -> list[LineResult]:
    """Give the results of the verticals by the line they stand on."""
    if table is None or lines is None or found.result is None:
        return []
    shares = {(p.channel, p.vertical): 100 * p.share for p in found.result.mid_panels}
    limit = found.wading_limit_m2s
    made = []
    for vertical in found.result.verticals:
        place = (vertical.channel, vertical.vertical)
        if place not in table.places:
            continue
        product, share = vertical.wading_product_m2s, shares.get(place)
        made.append(
            LineResult(
                line=lines.filled[table.places[place]].number,
                depth_m=vertical.depth_m,
                velocity_ms=vertical.velocity_ms,
                product_m2s=product,
                share_percent=share,
                is_too_much=product is not None and product > limit,
                bar=round(min(abs(share or 0) * 5, 100), 1),
            )
        )
    return made


def _cell(place: Any, table: Table | None, lines: FormTable | None) -> str:
    """Name the cell of the form a finding speaks of, empty where it speaks of no cell."""
    if table is None or lines is None:
        return ""
    at = table.line_of(place)
    if at is None:
        return ""
    name = cell_of(place)
    return lines.filled[at].name("depth_m" if name in {"points", "verticals"} else name)
