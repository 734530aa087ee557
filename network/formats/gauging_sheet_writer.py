"""Write a gauging sheet as a workbook: input cells, choices, protection, and the field check."""

from collections.abc import Callable, Iterable, Mapping, Sequence
from dataclasses import dataclass
from typing import IO, Any

from openpyxl import Workbook
from openpyxl.styles import Alignment, Font, PatternFill, Protection
from openpyxl.worksheet.datavalidation import DataValidation
from openpyxl.worksheet.worksheet import Worksheet

from network.formats import gauging_sheet_check as check
from network.formats import gauging_sheet_layout as layout
from network.formats.faults import Sentence
from network.formats.faults import sentence as _
from network.formats.gauging_sheet import GaugingBook, SheetRow, SlotCells

Words = Callable[[Sentence], str]
OPEN = Protection(locked=False)
PAPER = PatternFill("solid", fgColor="FFF7E6")
BOLD = Font(bold=True)
WITHOUT_END = 1e99


@dataclass(frozen=True, kw_only=True)
class CheckTables:
    """What the field check and the choices need; lists are (meant, shown) by kind.

    Kinds: way, sounding, bank, kind (edge, vertical), edge. wet_line: angle °, correction %.
    pieces: n to, a, b of the meter, three at most.
    """

    lists: Mapping[str, Sequence[tuple[str, str]]]
    edge_factors: Mapping[str, float]
    wet_line: Sequence[tuple[float, float]]
    surface_factor: float
    method: str
    pieces: Sequence[tuple[float, float, float]] = ()
    plates: Sequence[str] = ()
    cautions: Sequence[str] = ()


def write(book: GaugingBook, tables: CheckTables, stream: IO[bytes], *, words: Words = str) -> None:
    """Write a workbook; words turns the labels into the reader's language.

    Only input cells can be changed (protection without a password, against slips of the hand).
    """
    workbook = Workbook()
    head, verticals = workbook.active, workbook.create_sheet(layout.VERTICALS)
    head.title = layout.HEAD
    lookup, checks = workbook.create_sheet(layout.TABLES), workbook.create_sheet(layout.CHECK)
    _write_tables(lookup, book, tables)
    _write_head(head, book, tables, words)
    _write_verticals(verticals, book, tables, words)
    _write_check(checks, words)
    for page in (head, verticals, lookup, checks):
        page.protection.sheet = True
        page.protection.formatColumns = False
    workbook.save(stream)


def _write_head(page: Worksheet, book: GaugingBook, tables: CheckTables, words: Words) -> None:
    page["A1"], page["A1"].font = words(_("Gauging sheet")), Font(bold=True, size=14)
    for row, caution in enumerate(tables.cautions[:2], start=2):
        page[f"A{row}"] = caution
    shown = {kind: dict(pairs) for kind, pairs in tables.lists.items()}
    bank = "left" if book.from_left_bank else "right"
    lines = (
        (layout.STATION_CODE, _("station"), book.station_code, None),
        (layout.STATION_NAME, _("name"), book.station_name, None),
        (layout.FORM_ID, _("form"), str(book.form_id), None),
        (layout.VERSION, _("version"), book.version, None),
        (layout.DAY, _("day (record clock)"), book.day, "yyyy-mm-dd"),
        (layout.STARTED, _("started"), book.started, "hh:mm"),
        (layout.ENDED, _("ended"), book.ended, "hh:mm"),
        (layout.WAY, _("how"), shown["way"].get(book.way), "way"),
        (layout.SOUNDING, _("sounding"), shown["sounding"].get(book.sounding), "sounding"),
        (layout.BANK, _("starting bank"), shown["bank"][bank], "bank"),
        (layout.METER, _("current meter"), book.meter, None),
        (layout.SPIN_TEST, _("spin test, s"), book.spin_test_s, "0.0"),
        (layout.REMARKS, _("remarks"), book.remarks, "@"),
    )
    for cell, label, value, form in lines:
        page[f"A{cell[1:]}"] = words(label)
        _put(page, cell, value)
        if form is not None:
            _open(page, cell)
            page[cell].number_format = "@" if form in tables.lists else form
            if form in tables.lists:
                _choices(page, [cell], shown[form].values(), words)
    _numbers(page, [layout.SPIN_TEST], words, least=0)
    _write_stages(page, book, tables, words)
    _write_results(page, words)
    if book.signed_m3s is not None:
        cell = layout.SIGNED_RESULT
        page[f"D{cell[1:]}"], page[cell] = words(_("discharge as signed, m³/s")), book.signed_m3s
        page[cell].number_format = "0.000"
    page.column_dimensions["A"].width, page.column_dimensions["B"].width = 24, 30
    page.column_dimensions["D"].width, page.column_dimensions["E"].width = 34, 14


def _write_stages(page: Worksheet, book: GaugingBook, tables: CheckTables, words: Words) -> None:
    labels = (_("time"), _("reading or stage, m"), _("plate (blank: stage)"))
    for column, label in zip("ABC", labels, strict=True):
        cell = page[f"{column}{layout.STAGE_HEADER}"]
        cell.value, cell.font = words(label), BOLD
    rows = list(layout.STAGE_ROWS)
    for row, stage in zip(rows, book.stages, strict=False):
        values = (stage.time, stage.reading_m, stage.plate or None)
        for column, value in zip("ABC", values, strict=True):
            _put(page, f"{column}{row}", value)
    for row in rows:
        page[f"A{row}"].number_format, page[f"B{row}"].number_format = "hh:mm", "0.000"
        for column in "ABC":
            _open(page, f"{column}{row}")
    _numbers(page, [f"B{rows[0]}:B{rows[-1]}"], words)
    if tables.plates:
        _choices(page, [f"C{rows[0]}:C{rows[-1]}"], tables.plates, words)


def _write_results(page: Worksheet, words: Words) -> None:
    page["D4"], page["D4"].font = words(_("Field check: the program's figure counts")), BOLD
    labels = {
        "area": _("area, m²"),
        "mid": _("discharge by mid-section, m³/s"),
        "mean": _("discharge by mean-section, m³/s"),
        "velocity": _("mean velocity, m/s"),
    }
    for name, formula in check.results().items():
        cell = layout.RESULTS[name]
        page[f"D{cell[1:]}"], page[cell] = words(labels[name]), formula
        page[cell].number_format = "0.000"


def _write_verticals(page: Worksheet, book: GaugingBook, tables: CheckTables, words: Words) -> None:
    _write_labels(page, words)
    shown = {kind: dict(pairs) for kind, pairs in tables.lists.items()}
    for row, line in zip(layout.TABLE_ROWS, book.rows, strict=False):
        for cell, value in _cells_of(line, row, shown):
            _put(page, cell, value)
    columns = [*layout.COLUMNS.values(), *(c for slot in layout.SLOTS.values() for c in slot)]
    for row in layout.TABLE_ROWS:
        for column in columns:
            _open(page, f"{column}{row}")
        page[f"{layout.COLUMNS['time']}{row}"].number_format = "hh:mm"
        share = page[f"{layout.SHARE_COLUMN}{row}"]
        share.value, share.number_format = check.share(row), "0.0"
    _validate(page, tables, words)
    page.freeze_panes = f"D{layout.FIRST_ROW}"


def _write_labels(page: Worksheet, words: Words) -> None:
    labels = {
        "kind": _("edge or vertical"),
        "distance_m": _("distance, m"),
        "depth_m": _("depth, m"),
        "edge": _("kind of edge"),
        "time": _("time"),
        "angle_deg": _("angle of the flow, °"),
        "ice_underside_m": _("underside of ice, m"),
        "line_angle_deg": _("angle of the line, °"),
        "air_line_m": _("guide of the line above water, m"),
        "velocity_ms": _("mean velocity (at an edge: measured there), m/s"),
    }
    header = layout.FIRST_ROW - 1
    for name, column in layout.COLUMNS.items():
        page[f"{column}{header}"] = words(labels[name])
    points = {0.0: words(_("surface")), 1.0: words(_("bed"))}
    for fraction, slot in layout.SLOTS.items():
        page[f"{slot[0]}{header - 1}"] = points.get(fraction, f"{fraction:g}")
        each = (_("revolutions"), _("seconds"), _("or velocity, m/s"))
        for column, label in zip(slot, each, strict=True):
            page[f"{column}{header}"] = words(label)
    page[f"{layout.SHARE_COLUMN}{header}"] = words(_("field check: share of the flow, %%"))
    for cell in page[header]:
        cell.font, cell.alignment = BOLD, Alignment(wrap_text=True, vertical="top")


def _cells_of(
    line: SheetRow, row: int, shown: Mapping[str, Mapping[str, str]]
) -> Iterable[tuple[str, Any]]:
    columns = layout.COLUMNS
    yield f"{columns['kind']}{row}", shown["kind"]["edge" if line.is_edge else "vertical"]
    yield f"{columns['edge']}{row}", shown["edge"].get(line.edge) if line.is_edge else None
    yield f"{columns['time']}{row}", line.time
    for name in layout.NUMBERS:
        yield f"{columns[name]}{row}", getattr(line, name)
    for fraction, slot in layout.SLOTS.items():
        cells = line.points.get(fraction, SlotCells())
        values = (cells.revolutions, cells.seconds, cells.velocity_ms)
        yield from ((f"{column}{row}", v) for column, v in zip(slot, values, strict=True))


def _validate(page: Worksheet, tables: CheckTables, words: Words) -> None:
    def span(column: str) -> str:
        return f"{column}{layout.FIRST_ROW}:{column}{layout.LAST_ROW}"

    shown = {kind: dict(pairs).values() for kind, pairs in tables.lists.items()}
    columns = layout.COLUMNS
    _choices(page, [span(columns["kind"])], shown["kind"], words)
    _choices(page, [span(columns["edge"])], shown["edge"], words)
    slots = list(layout.SLOTS.values())
    above = [columns[name] for name in ("depth_m", "ice_underside_m", "air_line_m")]
    above += [column for slot in slots for column in slot[:2]]
    signed = [columns["distance_m"], columns["velocity_ms"], *(slot[2] for slot in slots)]
    _numbers(page, [span(column) for column in above], words, least=0)
    _numbers(page, [span(column) for column in signed], words)
    _numbers(page, [span(columns["angle_deg"])], words, least=-89.9, most=89.9)
    _numbers(page, [span(columns["line_angle_deg"])], words, least=0, most=30)


def _write_check(page: Worksheet, words: Words) -> None:
    page["A1"] = words(_("Field check: the program's figure counts"))
    for name, column in check.COLUMNS.items():
        page[f"{column}{check.HEADER_ROW}"] = name
    for row in layout.TABLE_ROWS:
        for column, formula in check.formulas(row).items():
            page[f"{column}{row}"] = formula


def _write_tables(page: Worksheet, book: GaugingBook, tables: CheckTables) -> None:
    kinds = dict(tables.lists["edge"])
    page[layout.METER_KEY] = book.meter_key
    _write_pieces(page, tables.pieces)
    page[layout.SURFACE_FACTOR], page[layout.RESULT_METHOD] = tables.surface_factor, tables.method
    page["B8"], page["B9"] = kinds["sloping"], dict(tables.lists["kind"])["edge"]
    for row, (angle, percent) in enumerate(tables.wet_line, start=layout.WET_LINE_FIRST):
        page[f"F{row}"], page[f"G{row}"] = angle, percent
    row = 2
    for kind, pairs in tables.lists.items():
        for meant, shown in pairs:
            for cell, value in zip("IJK", (kind, shown, meant), strict=True):
                _put(page, f"{cell}{row}", value)
            if kind == "edge":
                page[f"{layout.EDGE_FACTORS_COLUMN}{row}"] = tables.edge_factors[meant]
            row += 1


def _write_pieces(page: Worksheet, pieces: Sequence[tuple[float, float, float]]) -> None:
    """Write three pieces: of fewer the last is repeated, and ends nowhere."""
    rows, to, a, b = layout.PIECES
    given = list(pieces[: len(rows)]) or [(WITHOUT_END, 0.0, 0.0)]
    given[-1] = (WITHOUT_END, *given[-1][1:])
    given += [given[-1]] * (len(rows) - len(given))
    for row, values in zip(rows, given, strict=True):
        for column, value in zip((to, a, b), values, strict=True):
            page[f"{column}{row}"] = value


def _put(page: Worksheet, cell: str, value: Any) -> None:
    """Write a value; text that begins like a formula stays text."""
    page[cell] = value
    if isinstance(value, str):
        page[cell].data_type = "s"


def _open(page: Worksheet, cell: str) -> None:
    page[cell].protection, page[cell].fill = OPEN, PAPER


def _choices(page: Worksheet, spans: list[str], shown: Iterable[str], words: Words) -> None:
    listed = ",".join(shown)
    rule = DataValidation(type="list", formula1=f'"{listed}"', allow_blank=True)
    _add(page, rule, spans, words(_("choose one of the list")))


def _numbers(
    page: Worksheet, spans: list[str], words: Words, *, least: float = -1e6, most: float = 1e6
) -> None:
    rule = DataValidation(
        type="decimal",
        operator="between",
        formula1=f"{least:g}",
        formula2=f"{most:g}",
        allow_blank=True,
    )
    _add(page, rule, spans, words(_("a number belongs here")))


def _add(page: Worksheet, rule: DataValidation, spans: list[str], error: str) -> None:
    rule.error, rule.showErrorMessage = error, True
    for span in spans:
        rule.add(span)
    page.add_data_validation(rule)
