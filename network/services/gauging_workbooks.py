"""Gauging sheets as workbooks: made for a gauging, and loaded again from the field."""

from collections.abc import Sequence
from dataclasses import replace
from datetime import date, datetime, time, timedelta
from typing import IO, Any
from uuid import UUID

from django.utils import timezone
from django.utils.translation import gettext as _

from network.formats import gauging_sheet, gauging_sheet_layout, gauging_sheet_writer
from network.formats.faults import FileFault, Sentence
from network.formats.gauging_sheet import GaugingBook, SheetRow, SheetStage, SlotCells
from network.models import Channel as ChannelRow
from network.models import Gauging, MeterPair, Person, StaffPlate, Station
from network.numerics.gaugings.gauging_input import Channel, Point
from network.numerics.gaugings.sounding_lines import WET_LINE_ANGLES_DEG, WET_LINE_PERCENT
from network.queries import calibrations, clock
from network.queries.field_sheets import FieldSheet, Heading, StageRow, of_gauging
from network.queries.gaugings import settings_of
from network.queries.sheet_lines import Line, lines_of, near, table_of
from network.queries.working_rules import rules
from network.services import gaugings
from network.services.acts import Overtaken, Refusal


class WorkbookRefused(Refusal):
    """A workbook that cannot be taken: one sentence for every cell; nothing was written."""

    def __init__(self, sentences: Sequence[str]) -> None:
        super().__init__(" ".join(sentences), field="workbook")
        self.sentences = sentences


def write(
    sheet: FieldSheet,
    stream: IO[bytes],
    *,
    form_id: UUID,
    version: int,
    signed_m3s: float | None = None,
    cautions: Sequence[str] = (),
) -> None:
    """Write a sheet as a workbook; version 0 for a gauging that is not stored yet."""
    tables = gauging_sheet_writer.CheckTables(
        **_tables(sheet), plates=_plates(sheet.heading.station), cautions=cautions
    )
    book = replace(_book_of(sheet, form_id=form_id, version=version), signed_m3s=signed_m3s)
    gauging_sheet_writer.write(book, tables, stream, words=_words)


def load(stream: IO[bytes], *, by: Person, at: datetime) -> Gauging:
    """Save what a workbook holds as a draft; the same workbook again updates its gauging.

    Raises WorkbookRefused naming the cells, SheetRefused for cells no row can hold, and Overtaken
    when the sheet was saved otherwise since the workbook was downloaded.
    """
    try:
        book = gauging_sheet.read(stream)
    except gauging_sheet.BadWorkbook as bad:
        raise WorkbookRefused([_of_cell(fault) for fault in bad.faults]) from bad
    except FileFault as fault:
        raise WorkbookRefused([_words(fault.sentence)]) from fault
    stored = Gauging.objects.filter(form_id=book.form_id).first()
    if stored is not None and book.version not in (stored.version, stored.workbook_version):
        raise Overtaken(
            _(
                "This sheet was saved on another way since the workbook was downloaded: download "
                "it again and copy what is new."
            ),
            field="workbook",
        )
    return gaugings.save(
        sheet=_sheet_of(book, stored),
        form_id=book.form_id,
        version=stored.version if stored else None,
        workbook_version=book.version,
        party=stored.party.all() if stored else (by,),
        by=by,
        at=at,
    )


def _tables(sheet: FieldSheet) -> dict[str, Any]:
    settings = settings_of(clock.agency(), rules())
    heading = sheet.heading
    found = calibrations.in_force(heading.pair, heading.mid_time) if heading.pair else None
    pieces = calibrations.kernel_pieces(found) if found else ()
    return {
        "lists": _lists(),
        "edge_factors": {str(kind): k for kind, k in settings.edge_factors.items()},
        "wet_line": list(zip(WET_LINE_ANGLES_DEG.tolist(), WET_LINE_PERCENT.tolist(), strict=True)),
        "surface_factor": settings.surface_factor,
        "method": str(settings.method),
        "pieces": [(piece.n_to, piece.a_ms, piece.b_m) for piece in pieces],
    }


def _lists() -> dict[str, list[tuple[str, str]]]:
    kinds = [("edge", _("edge")), ("vertical", _("vertical"))]
    choices = {
        "way": Gauging.Way.choices,
        "sounding": Gauging.Sounding.choices,
        "bank": ChannelRow.Bank.choices,
        "kind": kinds,
        "edge": ChannelRow.Edge.choices,
    }
    return {
        kind: [(str(meant), str(shown)) for meant, shown in pairs]
        for kind, pairs in choices.items()
    }


def _plates(station: Station) -> list[str]:
    return [plate.label for plate in station.plates.filter(removed_at__isnull=True)]


def _book_of(sheet: FieldSheet, *, form_id: UUID, version: int) -> GaugingBook:
    heading = sheet.heading
    start, end = _local(heading.started_at), _local(heading.ended_at)
    return GaugingBook(
        form_id=form_id,
        version=version,
        station_code=heading.station.code,
        station_name=heading.station.name,
        day=start.date(),
        started=start.time(),
        ended=end.time(),
        way=heading.way,
        sounding=heading.sounding,
        from_left_bank=sheet.channels[0].starts_at_left_bank if sheet.channels else True,
        meter="" if heading.pair is None else str(heading.pair),
        meter_key=None if heading.pair is None else heading.pair.pk,
        spin_test_s=heading.spin_test_seconds,
        remarks=heading.remarks,
        stages=tuple(
            SheetStage(
                time=_local(row.read_at).time(),
                reading_m=row.reading_m,
                plate=row.plate.label if row.plate else "",
            )
            for row in sheet.stages
        ),
        rows=tuple(_row(line) for line in lines_of(sheet.channels)),
    )


def _row(line: Line) -> SheetRow:
    noted = {name: value for name, value in vars(line).items() if name != "points"}
    points = {
        point.fraction: SlotCells(point.revolutions, point.seconds, point.velocity_ms)
        for point in line.points
        if point.fraction is not None
    }
    return SheetRow(**noted | {"edge": str(line.edge)}, points=points)


def _line(row: SheetRow) -> Line:
    noted = {name: value for name, value in vars(row).items() if name != "points"}
    points = tuple(
        Point(fraction, cells.velocity_ms, cells.revolutions, cells.seconds)
        for fraction, cells in sorted(row.points.items())
    )
    return Line(**noted, points=points)


def _sheet_of(book: GaugingBook, stored: Gauging | None) -> FieldSheet:
    station = Station.objects.filter(code=book.station_code).first()
    if station is None:
        raise WorkbookRefused([_("There is no station “%s”.") % book.station_code])
    if book.day is None or book.started is None or book.ended is None:
        raise WorkbookRefused([_("Note the day, the start and the end of the gauging.")])
    start = _instant(book.day, book.started)
    plates = {plate.label: plate for plate in StaffPlate.objects.filter(station=station)}
    old = of_gauging(stored).heading if stored else None
    heading = Heading(
        station=station,
        started_at=start,
        ended_at=_after(start, book.ended),
        way=book.way or Gauging.Way.WADING,
        sounding=book.sounding or Gauging.Sounding.ROD,
        pair=MeterPair.objects.filter(pk=book.meter_key).first(),
        visit=old.visit if old else None,
        spin_test_seconds=book.spin_test_s,
        remarks=book.remarks,
    )
    return FieldSheet(
        heading,
        tuple(_stage(row, start, plates) for row in book.stages),
        _channels(book, start),
    )


def _stage(row: SheetStage, start: datetime, plates: dict[str, StaffPlate]) -> StageRow:
    if row.time is None or row.reading_m is None:
        raise WorkbookRefused([_("Every stage reading needs a time and a value.")])
    if row.plate and row.plate not in plates:
        raise WorkbookRefused([_("This station has no plate “%s”.") % row.plate])
    return StageRow(near(start, row.time), row.reading_m, plates.get(row.plate))


def _channels(book: GaugingBook, start: datetime) -> tuple[Channel, ...]:
    table = table_of([_line(row) for row in book.rows], start, from_left=book.from_left_bank)
    if table.faults:
        place, fault = table.faults[0]
        cell = f"A{gauging_sheet_layout.FIRST_ROW + place}"
        said = {"cell": cell, "reason": gaugings.said(fault.sentence)}
        raise WorkbookRefused([_("Cell %(cell)s: %(reason)s") % said])
    return table.channels


def _local(at: datetime) -> datetime:
    return timezone.localtime(at)


def _instant(day: date, at: time) -> datetime:
    return timezone.make_aware(datetime.combine(day, at))


def _after(start: datetime, at: time) -> datetime:
    """Return the first instant of that time of day from the start on: midnight may lie between."""
    same_day = start.replace(hour=at.hour, minute=at.minute)
    return same_day if same_day >= start else same_day + timedelta(days=1)


def _words(sentence: Sentence) -> str:
    return _(sentence.template) % sentence.values


def _of_cell(fault: gauging_sheet.CellFault) -> str:
    said = {
        "page": fault.sheet,
        "cell": fault.cell,
        "text": fault.text,
        "reason": _words(fault.reason),
    }
    return _("%(page)s %(cell)s, “%(text)s”: %(reason)s.") % said
