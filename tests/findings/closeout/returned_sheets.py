"""Returned hand-over sheets in every state that a contractor may leave a row in, with the state each must be sorted to.

What each row must become follows from what is written into it, not from the close-out: a row whose value was set
as issued, typed with unit and day, and stands in the later export is verified, and so on.
"""

from __future__ import annotations

import re
import shutil
from collections.abc import Callable, Mapping, Sequence
from dataclasses import dataclass, field
from datetime import datetime
from pathlib import Path
from zipfile import ZIP_DEFLATED, ZipFile

from openpyxl import load_workbook
from openpyxl.cell.rich_text import CellRichText, TextBlock
from openpyxl.cell.text import InlineFont
from openpyxl.styles import Font
from openpyxl.worksheet.worksheet import Worksheet

from audit.findings.closeout.states import State
from audit.findings.handover.rows import WorkRow
from audit.fleet.addresses import Place
from audit.report.workbook.sheets.work_columns import MARK

WORK_DAY = datetime(2026, 10, 12)
EXPORT_DAY = "2026-10-15"


@dataclass
class Filled:
    """What is written into one row, and what the later export shows (None: the present value)."""

    expected: State
    cells: dict[str, object] = field(default_factory=dict)
    exported: float | None = None
    struck: tuple[str, ...] = ()
    deleted: bool = False


Maker = Callable[[WorkRow], Filled]


def _signed(row: WorkRow, as_left: object, **more: object) -> dict[str, object]:
    return {
        "issued": row.proposal.value,
        "issued_by": "A. Engineer",
        "revision": 1,
        "as_left": as_left,
        "unit": row.written.unit,
        "date": WORK_DAY,
        "done_by": "B. Fitter",
        **more,
    }


def _value(row: WorkRow) -> float:
    assert isinstance(row.proposal.value, float | int)
    return float(row.proposal.value)


def _comma(number: float) -> str:
    return f"{number:g}".replace(".", ",")


def _worse(row: WorkRow) -> float:
    """A value further outside than the present one."""
    number, step = row.written.number, row.written.step
    if row.low is not None and row.present < row.low:
        return round(max(number - max(0.08 * number, 2 * step), number / 3), 6)
    return round(number + max(0.07 * number, 2 * step), 6)


def _struck_and_new(row: WorkRow) -> CellRichText:
    old = TextBlock(InlineFont(strike=True), f"{row.written.number:g} ")
    return CellRichText(old, TextBlock(InlineFont(), f"{_value(row):g}"))


SCENARIOS: Mapping[str, Maker] = {
    "as issued": lambda r: Filled(State.VERIFIED, _signed(r, _value(r)), _value(r)),
    "unit in the cell": lambda r: Filled(
        State.VERIFIED, _signed(r, f"{_value(r):g} {r.written.unit}", unit=None), _value(r)
    ),
    "number as text": lambda r: Filled(State.VERIFIED, _signed(r, f" {_value(r):g} "), _value(r)),
    "no day": lambda r: Filled(State.REPORTED, _signed(r, _value(r), date=None), _value(r)),
    "work after the export": lambda r: Filled(
        State.REPORTED, _signed(r, _value(r), date=datetime(2026, 10, 17)), _value(r)
    ),
    "left as it was": lambda r: Filled(State.OPEN, _signed(r, r.written.number)),
    "further outside": lambda r: Filled(State.OUTSIDE, _signed(r, _worse(r)), _worse(r)),
    "ok": lambda r: Filled(State.WORDS, _signed(r, "ok"), _value(r)),
    "done": lambda r: Filled(State.WORDS, _signed(r, "Done."), _value(r)),
    "as per sheet": lambda r: Filled(State.WORDS, _signed(r, "set as per sheet", unit=None), _value(r)),
    "export shows the old one": lambda r: Filled(State.DISAGREES, _signed(r, _value(r))),
    "not issued, changed": lambda r: Filled(State.UNASKED, {**_signed(r, _value(r)), "issued": None}, _value(r)),
    "not issued, changed in the relay only": lambda r: Filled(State.UNASKED, {}, _value(r)),
    "nothing written": lambda r: Filled(State.NOT_ANSWERED, _signed(r, None)),
    "row deleted": lambda r: Filled(State.MISSING, {}, deleted=True),
    "ditto": lambda r: Filled(State.OPEN, _signed(r, '"'), _value(r)),
    "ditto in letters": lambda r: Filled(State.OPEN, _signed(r, "do."), _value(r)),
    "two values": lambda r: Filled(State.OPEN, _signed(r, f"{r.written.number:g} / {_value(r):g}"), _value(r)),
    "from, to": lambda r: Filled(State.OPEN, _signed(r, f"was {r.written.number:g} now {_value(r):g}"), _value(r)),
    "milli for whole": lambda r: Filled(State.OPEN, _signed(r, _value(r) * 1000), _value(r)),
    "decimal place": lambda r: Filled(State.OPEN, _signed(r, round(_value(r) / 10, 8)), _value(r)),
    "struck through": lambda r: Filled(State.NOT_ANSWERED, _signed(r, _value(r)), struck=("as_left",)),
    "old one struck through": lambda r: Filled(State.VERIFIED, _signed(r, _struck_and_new(r)), _value(r)),
    "unit of something else": lambda r: Filled(State.OPEN, _signed(r, _value(r), unit="kg"), _value(r)),
    "decimal comma": lambda r: Filled(State.VERIFIED, _signed(r, _comma(_value(r))), _value(r)),
    "day as text": lambda r: Filled(State.VERIFIED, _signed(r, _value(r), date="12.10.2026"), _value(r)),
    "not issued": lambda r: Filled(State.OPEN, {}),
    "tag retyped": lambda r: Filled(State.VERIFIED, _signed(r, _value(r), motor=f"{r.finding.motor} (new)"), _value(r)),
    "no unit, read from the export": lambda r: Filled(State.VERIFIED, _signed(r, _value(r), unit=None), _value(r)),
    "a bound": lambda r: Filled(State.OPEN, _signed(r, f">{_value(r):g}"), _value(r)),
    "a date by accident": lambda r: Filled(State.OPEN, _signed(r, datetime(2026, 5, 1)), _value(r)),
}


def can_be_set(row: WorkRow, files: Sequence[str]) -> bool:
    """Tell whether a row has a number to set that stands plainly in a cell of one of these files."""
    plain = row.written.place is not None and row.written.place.file in files
    return (
        plain
        and row.kind == "number"
        and isinstance(row.proposal.value, float | int)
        and row.written.written.strip() == f"{row.written.number:g}"
        and bool(row.written.unit)
        and row.finding.severity in ("unsafe", "nuisance")
        and row.written.number != 0
    )


def fill_in(source: Path, target: Path, filled: Mapping[str, Filled], change: Callable[[Worksheet], None]) -> None:
    """Fill in the sheet Work of an issued workbook and save it; `change` moves rows and columns about."""
    book = load_workbook(source)
    sheet = book["Work"]
    columns, keys = _places(sheet)
    gone = []
    for key, row in filled.items():
        at = keys[key]
        if row.deleted:
            gone.append(at)
        for name, value in row.cells.items():
            sheet.cell(row=at, column=columns[name]).value = value
        for name in row.struck:
            sheet.cell(row=at, column=columns[name]).font = Font(strike=True)
    for at in sorted(gone, reverse=True):
        sheet.delete_rows(at)
    change(sheet)
    book.save(target)


def _places(sheet: Worksheet) -> tuple[dict[str, int], dict[str, int]]:
    columns = {
        str(cell.value).removeprefix(MARK): cell.column
        for row in sheet.iter_rows(max_row=10)
        for cell in row
        if isinstance(cell.value, str) and cell.value.startswith(MARK) and cell.column is not None
    }
    keys = {str(sheet.cell(row=at, column=columns["key"]).value): at for at in range(1, sheet.max_row + 1)}
    return columns, keys


def write_export(
    site: Path, folder: Path, rows: Sequence[WorkRow], filled: Mapping[str, Filled], days: Sequence[Place]
) -> Path:
    """Write the settings workbooks as they are read after the work; `days` are the cells with their days."""
    folder.mkdir()
    by_file: dict[str, list[tuple[str, str, object]]] = {}
    for place in days:
        by_file.setdefault(place.file, []).append((place.sheet, place.cell, EXPORT_DAY))
    for row in rows:
        place, value = row.written.place, filled[row.key].exported if row.key in filled else None
        if place is not None and value is not None:
            by_file.setdefault(place.file, []).append((place.sheet, place.cell, value))
    for file in site.glob("relay_settings_*.xlsx"):
        book = load_workbook(file)
        for sheet, cell, value in by_file.get(file.name, []):
            book[sheet][cell].value = value
        book.properties.modified = datetime.fromisoformat(EXPORT_DAY)
        book.save(folder / file.name)
        _dated(folder / file.name)
    return folder


def _dated(path: Path) -> None:
    """Give the file the day of the export: the library writes the day of saving."""
    beside = path.with_suffix(".tmp")
    with ZipFile(path) as old, ZipFile(beside, "w", ZIP_DEFLATED) as new:
        for name in old.namelist():
            content = old.read(name)
            if name == "docProps/core.xml":
                day = f"\\g<1>{EXPORT_DAY}T08:00:00Z\\g<2>".encode()
                content, changed = re.subn(rb"(<dcterms:modified[^>]*>)[^<]*(<)", day, content)
                assert changed == 1
            new.writestr(name, content)
    shutil.move(beside, path)
