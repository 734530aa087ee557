"""A gauging sheet as a workbook for the field: what it holds, and reading it back."""

import datetime as dt
import math
import re
import zipfile
from collections.abc import Iterable, Mapping
from dataclasses import dataclass, field
from typing import IO, Any, NoReturn
from uuid import UUID

from openpyxl import load_workbook
from openpyxl.utils.exceptions import InvalidFileException
from openpyxl.worksheet.worksheet import Worksheet

from network.formats import gauging_sheet_layout as layout
from network.formats.faults import FileFault, Sentence
from network.formats.faults import sentence as _

LARGEST_BYTES = 30 * 2**20  # unpacked: a sheet of this program has less than one
# What the library raises on a damaged or foreign file; a broken page of XML is a SyntaxError.
UNREADABLE = (
    *(zipfile.BadZipFile, InvalidFileException, SyntaxError),
    *(LookupError, ValueError, TypeError, AttributeError, OSError),
)
TIME = re.compile(r"([01]?\d|2[0-3])[:.h]([0-5]\d)(?::[0-5]\d)?")
Number = float | None


@dataclass(frozen=True)
class SlotCells:
    """What stands at one point of a vertical: revolutions and seconds, or a velocity in m/s."""

    revolutions: Number = None
    seconds: Number = None
    velocity_ms: Number = None


@dataclass(frozen=True, kw_only=True)
class SheetRow:
    """A line of the table: an edge of water (edge names its kind) or a vertical."""

    is_edge: bool = False
    distance_m: Number = None
    depth_m: Number = None
    edge: str = ""
    time: dt.time | None = None
    angle_deg: Number = None
    ice_underside_m: Number = None
    line_angle_deg: Number = None
    air_line_m: Number = None
    velocity_ms: Number = None
    points: Mapping[float, SlotCells] = field(default_factory=dict)  # by part of the depth


@dataclass(frozen=True, kw_only=True)
class SheetStage:
    """A stage read during the gauging; plate is its label, empty for a stage above zero."""

    time: dt.time | None
    reading_m: Number
    plate: str = ""


@dataclass(frozen=True, kw_only=True)
class GaugingBook:
    """A whole workbook; times are on the record clock, keys name rows of the installation."""

    form_id: UUID
    version: int
    station_code: str
    station_name: str = ""
    day: dt.date | None = None
    started: dt.time | None = None
    ended: dt.time | None = None
    way: str = ""
    sounding: str = ""
    from_left_bank: bool = True
    meter: str = ""
    meter_key: int | None = None
    spin_test_s: Number = None
    remarks: str = ""
    stages: tuple[SheetStage, ...] = ()
    rows: tuple[SheetRow, ...] = ()
    signed_m3s: Number = None  # the result as signed; written, never read back


@dataclass(frozen=True)
class CellFault:
    """A cell that cannot be used: its sheet and address, what stood there, and why."""

    sheet: str
    cell: str
    text: str
    reason: Sentence


class BadWorkbook(FileFault):
    """A workbook with cells that cannot be used; nothing of it was taken."""

    def __init__(self, faults: tuple[CellFault, ...]) -> None:
        """Keep the faults."""
        first = faults[0]
        super().__init__(_("Cell %(cell)s: %(reason)s", cell=first.cell, reason=first.reason))
        self.faults = faults


def read(stream: IO[bytes]) -> GaugingBook:
    """Read a workbook made by gauging_sheet_writer.

    Decimal commas and numbers written as text are taken as the numbers they show. Raises FileFault
    for a file that is no such workbook, BadWorkbook naming every cell in which a formula or a word
    stands where a number or a time belongs.
    """
    book = _opened(stream)
    for name in (layout.HEAD, layout.VERTICALS, layout.TABLES):
        if name not in book.sheetnames:
            _refuse(_("This is no gauging sheet of ours: it has no page “%(name)s”.", name=name))
    cells = _Cells(book[layout.HEAD], {})
    codes = _codes(book[layout.TABLES])
    found = _head(cells, codes, book[layout.TABLES])
    rows = _Cells(book[layout.VERTICALS], codes, cells.faults)
    found |= {"stages": tuple(_stages(cells)), "rows": tuple(_rows(rows))}
    if cells.faults:
        raise BadWorkbook(tuple(cells.faults))
    return GaugingBook(**found)


class _Cells:
    """Reads cells of a page and notes every fault instead of stopping at the first."""

    def __init__(
        self,
        page: Worksheet,
        codes: Mapping[str, Mapping[str, str]],
        faults: list[CellFault] | None = None,
    ) -> None:
        self.page, self.codes = page, codes
        self.faults: list[CellFault] = [] if faults is None else faults

    def number(self, cell: str) -> Number:
        value = self._value(cell)
        if value is None or (isinstance(value, float | int) and not isinstance(value, bool)):
            number = None if value is None else float(value)
        else:
            number = _as_number(value) if isinstance(value, str) else math.nan
        if number is not None and not math.isfinite(number):
            self._fault(cell, value, _("a number belongs here"))
            return None
        return number

    def time(self, cell: str) -> dt.time | None:
        value = self._value(cell)
        if isinstance(value, dt.datetime):
            value = value.time()
        if value is None or isinstance(value, dt.time):
            return None if value is None else value.replace(second=0, microsecond=0)
        found = TIME.fullmatch(str(value).strip())
        if found is None:
            self._fault(cell, value, _("a time belongs here, like 14:05"))
            return None
        return dt.time(int(found[1]), int(found[2]))

    def day(self, cell: str) -> dt.date | None:
        value = self._value(cell)
        if isinstance(value, dt.datetime):
            return value.date()
        if value is None or isinstance(value, dt.date):
            return value
        try:
            return dt.date.fromisoformat(str(value).strip())
        except ValueError:
            self._fault(cell, value, _("a day belongs here, like 2024-05-14"))
            return None

    def text(self, cell: str) -> str:
        value = self._value(cell)
        return "" if value is None else str(value).strip()

    def code(self, cell: str, kind: str) -> str:
        label = self.text(cell)
        codes = self.codes.get(kind, {})
        if label and label not in codes:
            self._fault(cell, label, _("choose one of the list"))
            return ""
        return codes.get(label, "")

    def _value(self, cell: str) -> Any:
        value = self.page[cell].value
        if self.page[cell].data_type == "f":
            self._fault(cell, value, _("a formula stands here; type its value"))
            return None
        if self.page[cell].data_type == "e":
            self._fault(cell, value, _("the spreadsheet shows an error here"))
            return None
        return None if isinstance(value, str) and not value.strip() else value

    def _fault(self, cell: str, value: Any, reason: Sentence) -> None:
        self.faults.append(CellFault(self.page.title, cell, str(value), reason))


def _opened(stream: IO[bytes]) -> Any:
    try:
        with zipfile.ZipFile(stream) as packed:
            if sum(part.file_size for part in packed.infolist()) > LARGEST_BYTES:
                _refuse(_("This workbook is far larger than a gauging sheet."))
        stream.seek(0)
        return load_workbook(stream)
    except UNREADABLE as error:
        if isinstance(error, FileFault):
            raise
        _refuse(_("This file is no workbook (.xlsx) that can be opened."))


def _refuse(sentence: Sentence) -> NoReturn:
    raise FileFault(sentence)


def _as_number(text: str) -> float:
    """Read a number written as text, comma or point, any minus; not a number for words."""
    plain = text.strip().replace("−", "-").replace("\u00a0", "").replace(",", ".")
    return float(plain) if re.fullmatch(r"[+-]?(\d+\.?\d*|\.\d+)", plain) else math.nan


def _codes(page: Worksheet) -> dict[str, dict[str, str]]:
    """Read the lists behind the choices: what is shown → what is meant, by kind."""
    codes: dict[str, dict[str, str]] = {}
    for kind, shown, meant in page.iter_rows(
        min_row=2, min_col=layout.LIST_COLUMN, max_col=layout.LIST_COLUMN + 2, values_only=True
    ):
        if kind is not None:
            codes.setdefault(str(kind), {})[str(shown)] = str(meant)
    return codes


def _head(
    cells: _Cells, codes: Mapping[str, Mapping[str, str]], tables: Worksheet
) -> dict[str, Any]:
    cells.codes = codes
    key = tables[layout.METER_KEY].value
    try:
        form_id, version = UUID(cells.text(layout.FORM_ID)), int(cells.number(layout.VERSION) or 0)
    except ValueError:
        _refuse(_("The form number of this workbook was changed: download the sheet again."))
    return {
        "form_id": form_id,
        "version": version,
        "station_code": cells.text(layout.STATION_CODE),
        "station_name": cells.text(layout.STATION_NAME),
        "day": cells.day(layout.DAY),
        "started": cells.time(layout.STARTED),
        "ended": cells.time(layout.ENDED),
        "way": cells.code(layout.WAY, "way"),
        "sounding": cells.code(layout.SOUNDING, "sounding"),
        "from_left_bank": cells.code(layout.BANK, "bank") != "right",
        "meter": cells.text(layout.METER),
        "meter_key": int(key) if isinstance(key, int | float) else None,
        "spin_test_s": cells.number(layout.SPIN_TEST),
        "remarks": cells.text(layout.REMARKS),
    }


def _stages(cells: _Cells) -> Iterable[SheetStage]:
    for row in layout.STAGE_ROWS:
        stage = SheetStage(
            time=cells.time(f"A{row}"),
            reading_m=cells.number(f"B{row}"),
            plate=cells.text(f"C{row}"),
        )
        if stage.time is not None or stage.reading_m is not None:
            yield stage


def _rows(cells: _Cells) -> Iterable[SheetRow]:
    for row in layout.TABLE_ROWS:
        found = _row(cells, row)
        if found != SheetRow() and found != SheetRow(is_edge=True):
            yield found


def _row(cells: _Cells, row: int) -> SheetRow:
    columns = layout.COLUMNS
    numbers = {name: cells.number(f"{columns[name]}{row}") for name in layout.NUMBERS}
    points = {
        fraction: SlotCells(*(cells.number(f"{column}{row}") for column in slot))
        for fraction, slot in layout.SLOTS.items()
    }
    return SheetRow(
        is_edge=cells.code(f"{columns['kind']}{row}", "kind") == "edge",
        edge=cells.code(f"{columns['edge']}{row}", "edge"),
        time=cells.time(f"{columns['time']}{row}"),
        points={fraction: slot for fraction, slot in points.items() if slot != SlotCells()},
        **numbers,
    )
