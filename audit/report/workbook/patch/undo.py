"""Take an earlier annotation out of a copy: sheets, fills and notes, nothing else."""

from __future__ import annotations

from audit.report.workbook.patch.cells import with_formats_replaced
from audit.report.workbook.patch.markup import children
from audit.report.workbook.patch.notes import take_back_notes
from audit.report.workbook.patch.ooxml import REL_CALCULATION_CHAIN
from audit.report.workbook.patch.painting import unpaint_sheet
from audit.report.workbook.patch.properties import list_worksheets
from audit.report.workbook.patch.record import Record, marked_sheets
from audit.report.workbook.patch.relations import reachable, relations, targets, unrelate
from audit.report.workbook.patch.styles import Styles
from audit.report.workbook.patch.workbook_part import SheetEntry, WorkbookPart
from audit.report.workbook.patch.worksheet import Worksheet


def take_back(book: WorkbookPart, styles: Styles, record: Record) -> None:
    """Remove our sheets and give cells and notes back what they had."""
    ours = [sheet for sheet in marked_sheets(book) if sheet.name in record.sheets]
    for gone in reversed(ours):
        _remove(book, gone)
    list_worksheets(book.package, [], [gone.name for gone in ours], first=True)
    back = styles.ways_back()
    for entry in book.sheets():
        if entry.part is not None:
            sheet = Worksheet(book.package, entry.part)
            changed = take_back_notes(book.package, sheet, set(record.authors))
            if back:
                changed |= _restore_formats(sheet, back)
            else:
                changed |= unpaint_sheet(sheet, styles, [group for group in record.cells if group.sheet == entry.name])
            if changed:
                sheet.save()


def _restore_formats(sheet: Worksheet, back: dict[int, int]) -> bool:
    changed = False
    rows = sheet.data[sheet.start : sheet.end]
    restored = with_formats_replaced(rows, sheet.prefix, back)
    if restored is not rows:
        sheet.rows = [restored]
        changed = True
    for column in sheet.root.iterfind("{*}cols/{*}col"):
        style = column.get("style", "")
        if style.isdigit() and int(style) in back:
            column.set("style", str(back[int(style)]))
            changed = True
    return changed


def _remove(book: WorkbookPart, sheet: SheetEntry) -> None:
    """Remove a sheet with the parts that only it leads to."""
    package = book.package
    book.remove_sheet(sheet)
    for chain in targets(package, book.part, REL_CALCULATION_CHAIN):
        # a chain that names a sheet which is gone counts as damage; without one the program makes it anew
        if package.has(chain) and any(cell.get("i") == str(sheet.number) for cell in children(package.look(chain))):
            unrelate(package, book.part, chain)
            package.remove(chain)
    if sheet.part is None:
        return
    candidates = reachable(package, sheet.part)
    unrelate(package, book.part, sheet.part)
    package.remove(sheet.part)
    still_reached = set()
    for start in [found.target for found in relations(package) if not found.external]:
        still_reached |= {start} | reachable(package, start)
    for part in candidates - still_reached:
        package.remove(part)
