"""The whole job: a copy of a workbook with cells filled, notes below the existing ones and the report's sheets."""

from __future__ import annotations

import re
from collections import defaultdict
from collections.abc import Iterable, Mapping, Sequence
from dataclasses import dataclass
from pathlib import Path

from audit.fleet.addresses import a1
from audit.report.workbook.patch.graft import graft_report
from audit.report.workbook.patch.notes import write_notes
from audit.report.workbook.patch.ooxml import LARGEST_COLUMN, LARGEST_ROW
from audit.report.workbook.patch.package import Package
from audit.report.workbook.patch.painting import anchors, paint_sheet
from audit.report.workbook.patch.properties import list_worksheets
from audit.report.workbook.patch.record import Record, is_ours, marked_sheets, read_record, write_record
from audit.report.workbook.patch.refusal import CannotPatch
from audit.report.workbook.patch.saved_values import SavedValues
from audit.report.workbook.patch.sheet_names import free_names
from audit.report.workbook.patch.styles import MarkedCells, Styles
from audit.report.workbook.patch.undo import take_back
from audit.report.workbook.patch.workbook_part import WorkbookPart
from audit.report.workbook.patch.worksheet import Worksheet

SUFFIXES = (".xlsx", ".xlsm")


@dataclass(frozen=True)
class Mark:
    """A cell to fill, and what to say in its note; an empty note means the fill alone.

    `row` and `column` count from 1, `fill` is a colour as RRGGBB.
    """

    sheet: str
    row: int
    column: int
    fill: str
    note: str

    def __post_init__(self) -> None:
        """Refuse a cell that no sheet has and a colour that is none."""
        if not (1 <= self.row <= LARGEST_ROW and 1 <= self.column <= LARGEST_COLUMN):
            raise ValueError(f"no sheet has a cell in row {self.row}, column {self.column}")
        if not re.fullmatch("[0-9A-Fa-f]{6}", self.fill):
            raise ValueError(f"{self.fill!r} is not a colour as RRGGBB")


@dataclass(frozen=True)
class AnnotationOutcome:
    """What the copy got. Cells are (sheet, address).

    `sheet_names` gives for each sheet of the report its name in the copy. `threaded` cells carry a thread of
    comments, which was not touched: they are filled, and what their note would say stands nowhere in the sheet.
    `moved` cells lie within merged ones and were marked at the corner that shows.
    """

    target: Path
    sheet_names: Mapping[str, str]
    filled: int
    notes_added: int
    notes_extended: int
    threaded: tuple[tuple[str, str], ...]
    moved: Mapping[tuple[str, str], str]
    replaced_earlier: bool


def annotate_copy(
    source: Path,
    target: Path,
    marks: Iterable[Mark],
    report: Path | None,
    *,
    author: str = "Settings audit",
    first: bool = True,
    formulas: SavedValues | None = None,
) -> AnnotationOutcome:
    """Write a copy of `source` with marked cells and the sheets of `report`; nothing else in it changes.

    Several marks of one cell: the first one's fill holds, the notes follow one another. The report's sheets hold
    values only: a formula in them is written as the text that it is, unless `formulas` declares its sheet and cell,
    with the value that it has. References from the report to its own sheets
    follow their new names; `names_for_report` tells the names beforehand. Macros that count sheets by position
    see a change when `first` is set.

    Raises CannotPatch where a copy without loss is not possible; `target` is then as it was.
    """
    _check_paths(source, target, report)
    package = Package(source)
    book = WorkbookPart(package)
    record = read_record(book)
    replaced = is_ours(package)
    styles = Styles(package, book.part, record.formers)
    if replaced:
        take_back(book, styles, record)
    totals = _Totals()
    for name, sheet_marks in _by_sheet(marks).items():
        _mark_sheet(book, styles, name, sheet_marks, author, totals)
    names: dict[str, str] = {}
    if report is not None:
        names = graft_report(book, styles, report, first, formulas)
        list_worksheets(package, list(names.values()), [], first)
    authors = tuple(dict.fromkeys([*record.authors, author]))
    write_record(book, Record(tuple(names.values()), authors, tuple(styles.formers), tuple(totals.cells)))
    package.save(target)
    return AnnotationOutcome(
        target,
        names,
        totals.filled,
        totals.added,
        totals.extended,
        tuple(totals.threaded),
        totals.moved,
        replaced,
    )


def names_for_report(source: Path, wanted: Sequence[str]) -> dict[str, str]:
    """Names that sheets of a report would get in a copy of a workbook, so that links can be written right."""
    book = WorkbookPart(Package(source))
    ours = {sheet.position for sheet in marked_sheets(book) if sheet.name in read_record(book).sheets}
    return free_names(wanted, [sheet.name for sheet in book.sheets() if sheet.position not in ours])


def is_our_output(path: Path) -> bool:
    """Whether a file is a copy that was annotated before; False for whatever cannot be opened."""
    try:
        return is_ours(Package(path))
    except (CannotPatch, OSError):
        return False


def our_sheet_names(path: Path) -> set[str]:
    """Sheets of a workbook that came from a report of ours and hold no data of the site."""
    try:
        package = Package(path)
        return {sheet.name for sheet in marked_sheets(WorkbookPart(package))} if is_ours(package) else set()
    except (CannotPatch, OSError):
        return set()


class _Totals:
    def __init__(self) -> None:
        self.filled = self.added = self.extended = 0
        self.threaded: list[tuple[str, str]] = []
        self.moved: dict[tuple[str, str], str] = {}
        self.cells: list[MarkedCells] = []


def _check_paths(source: Path, target: Path, report: Path | None) -> None:
    if source.suffix.lower() not in SUFFIXES:
        raise CannotPatch("only .xlsx and .xlsm workbooks can be annotated in a copy of themselves")
    if target.suffix.lower() != source.suffix.lower():
        raise CannotPatch(f"the copy of {source.name} must end in {source.suffix} too, not in {target.suffix}")
    for read in (source, report):
        if read is not None and (target.resolve() == read.resolve() or (target.exists() and target.samefile(read))):
            raise CannotPatch(f"{read.name} would be overwritten by its own copy; choose another name or folder")


def _by_sheet(marks: Iterable[Mark]) -> dict[str, list[Mark]]:
    found: dict[str, list[Mark]] = defaultdict(list)
    for mark in marks:
        found[mark.sheet].append(mark)
    return found


def _mark_sheet(
    book: WorkbookPart, styles: Styles, name: str, marks: Sequence[Mark], author: str, totals: _Totals
) -> None:
    entries = {entry.name: entry for entry in book.sheets()}
    if name not in entries:
        raise ValueError(f"the workbook has no sheet {name!r}; it has {', '.join(map(repr, entries))}")
    part = entries[name].part
    if part is None:
        raise ValueError(f"the sheet {name!r} has no cells to mark")
    sheet = Worksheet(book.package, part)
    corner = anchors(sheet, ((mark.row, mark.column) for mark in marks))
    fills: dict[tuple[int, int], str] = {}
    notes: dict[tuple[int, int], str] = {}
    for mark in marks:
        cell = (mark.row, mark.column)
        shown = corner.get(cell, cell)
        if shown != cell:
            totals.moved[name, a1(*cell)] = a1(*shown)
        fills.setdefault(shown, mark.fill)
        if mark.note:
            notes[shown] = f"{notes[shown]}\n\n{mark.note}" if shown in notes else mark.note
    totals.cells += paint_sheet(sheet, name, styles, fills)
    outcome = write_notes(book.package, sheet, notes, author)
    sheet.save()
    totals.filled += len(fills)
    totals.added += outcome.added
    totals.extended += outcome.extended
    totals.threaded += [(name, a1(*cell)) for cell in outcome.threaded]
