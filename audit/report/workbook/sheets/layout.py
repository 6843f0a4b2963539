"""How our sheets look and print: colours by severity beside their letters, headings, widths, pages."""

from __future__ import annotations

import re
from collections.abc import Iterable, Sequence
from typing import Any

from openpyxl import Workbook
from openpyxl.cell import Cell
from openpyxl.styles import Alignment, Border, Font, NamedStyle, PatternFill, Side
from openpyxl.utils import get_column_letter
from openpyxl.worksheet.properties import PageSetupProperties
from openpyxl.worksheet.worksheet import Worksheet

from audit.cautions import SHORT_CAUTION

# tints that differ in lightness as well as in hue, so that they stay apart for colour-blind readers and in grey
FILLS = {"unsafe": "E8927C", "nuisance": "FFE08A", "inconsistent": "A9CBE8", "observation": "E4E4E4"}
HEADING_FILL = "3B4A54"
LETTERS = {"unsafe": "U", "nuisance": "N", "inconsistent": "I", "observation": "O"}
MOST_LINKS = 60_000
"""A sheet holds at most 65,530 links."""

LINE_HEIGHT = 13.0
MOST_LINES = 14

_THIN = Side(style="thin", color="B8C0C4")
_ROW_BORDER = Border(bottom=_THIN)
_BORDERS = {"audit text": Border(), "audit row": _ROW_BORDER}
_PLAIN, _BOLD = Font(name="Calibri", size=10), Font(name="Calibri", size=10, bold=True)
_WRAPPED, _ONE_LINE = Alignment(vertical="top", wrap_text=True), Alignment(vertical="top")
_UNPRINTABLE = re.compile(r"[\x00-\x08\x0b\x0c\x0e-\x1f]")


def new_sheet(book: Workbook, name: str) -> Worksheet:
    """Add an empty worksheet after those that a workbook has."""
    created = book.create_sheet(name)
    assert isinstance(created, Worksheet)
    return created


def put(sheet: Worksheet, row: int, column: int, value: Any, *, bold: bool = False, wrap: bool = True) -> Cell:
    """Write a value; text never becomes a formula."""
    cell = sheet.cell(row=row, column=column)
    assert isinstance(cell, Cell)
    if isinstance(value, str):
        cell.value = _UNPRINTABLE.sub(" ", value)[:32_000]
        cell.data_type = "s"
    else:
        cell.value = value
    if wrap and not bold:
        _dress(cell, sheet, "audit text")
    else:
        cell.alignment = _WRAPPED if wrap else _ONE_LINE
        cell.font = _BOLD if bold else _PLAIN
    return cell


def _dress(cell: Cell, sheet: Worksheet, style: str) -> None:
    """Give a cell one of our named styles, which is much quicker than dressing it piece by piece."""
    book = sheet.parent
    assert book is not None
    if style not in book.named_styles:
        book.add_named_style(NamedStyle(style, font=_PLAIN, alignment=_WRAPPED, border=_BORDERS[style]))
    cell.style = style


def fill(cell: Cell, colour: str) -> None:
    """Fill a cell."""
    cell.fill = PatternFill("solid", start_color=colour, end_color=colour)


def title(sheet: Worksheet, text: str, below: str = "", column: int = 1) -> int:
    """Write a sheet's title and the line below it; give the next free row."""
    put(sheet, 1, column, text, wrap=False).font = Font(name="Calibri", size=14, bold=True)
    put(sheet, 2, column, below, wrap=False).font = Font(name="Calibri", size=9, italic=True)
    return 4


def lines_of(values: Sequence[object], widths: Sequence[float]) -> int:
    """Tell how many lines a row needs: spreadsheet programs do not all fit heights when they open a file.

    >>> lines_of(["a short one", "a text that is longer than its column is wide"], [20, 20])
    3
    """
    most = 1
    for value, width in zip(values, widths, strict=False):
        if isinstance(value, str):
            across = max(int(width * 0.95), 1)
            most = max(most, sum(max(1, -(-len(line) // across)) for line in value.split("\n")))
    return min(most, MOST_LINES)


def table(
    sheet: Worksheet, first_row: int, headings: Sequence[str], widths: Sequence[float], rows: Iterable[Sequence[object]]
) -> int:
    """Write a table with a heading row, filter and frozen headings; give the row below it."""
    for column, (heading, width) in enumerate(zip(headings, widths, strict=True), start=1):
        cell = put(sheet, first_row, column, heading)
        cell.font = Font(name="Calibri", size=10, bold=True, color="FFFFFF")
        cell.alignment = Alignment(vertical="center", wrap_text=True)
        fill(cell, HEADING_FILL)
        sheet.column_dimensions[get_column_letter(column)].width = width
    row = first_row
    for values in rows:
        row += 1
        for column, value in enumerate(values, start=1):
            _dress(put(sheet, row, column, value), sheet, "audit row")
        sheet.row_dimensions[row].height = LINE_HEIGHT * lines_of(values, widths)
    sheet.freeze_panes = f"A{first_row + 1}"
    sheet.auto_filter.ref = f"A{first_row}:{get_column_letter(len(headings))}{max(row, first_row)}"
    sheet.print_title_rows = f"{first_row}:{first_row}"
    return row + 1


def page(sheet: Worksheet, site: str, *, pages_high: int = 0, print_area: str = "") -> None:
    """Set a sheet up for print: landscape, one page wide, caution and page number at the foot."""
    if print_area:
        sheet.print_area = print_area
    sheet.page_setup.orientation = "landscape"
    sheet.page_setup.paperSize = 9
    sheet.page_setup.fitToWidth = 1
    sheet.page_setup.fitToHeight = pages_high
    sheet.sheet_properties.pageSetUpPr = PageSetupProperties(fitToPage=True)
    sheet.page_margins.left = sheet.page_margins.right = 0.4
    sheet.page_margins.top, sheet.page_margins.bottom = 0.5, 0.8
    foot, top = sheet.oddFooter, sheet.oddHeader
    assert foot is not None
    assert top is not None
    left, right, head = foot.left, foot.right, top.right
    assert left is not None
    assert right is not None
    assert head is not None
    left.text, left.size = SHORT_CAUTION.replace("&", "&&"), 6
    right.text = "&P / &N"
    head.text, head.size = site.replace("&", "&&"), 8
    sheet.sheet_view.showGridLines = False


def link(cell: Cell, sheet_name: str, address: str) -> None:
    """Link a cell to a cell of the same workbook."""
    quoted = sheet_name.replace("'", "''")
    cell.hyperlink = f"#'{quoted}'!{address}"
    cell.font = Font(name="Calibri", size=10, underline="single", color="1F4E79")
