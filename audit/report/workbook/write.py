"""Write the annotated workbooks: copies without loss where that is possible, a report workbook of our own otherwise."""

from __future__ import annotations

import tempfile
from collections.abc import Mapping, Sequence
from dataclasses import dataclass
from pathlib import Path

from openpyxl import Workbook
from openpyxl.worksheet.worksheet import Worksheet

from audit.findings.audit import Audit
from audit.findings.finding import Finding
from audit.findings.handover.rows import work_rows
from audit.findings.render import FindingRenderer
from audit.report.workbook.marks import marks_by_file
from audit.report.workbook.patch import (
    CannotPatch,
    SavedValue,
    SavedValues,
    annotate_copy,
    names_for_report,
    save_with_values,
)
from audit.report.workbook.sheets.accepted import write_accepted
from audit.report.workbook.sheets.cover import write_cover
from audit.report.workbook.sheets.findings import write_findings
from audit.report.workbook.sheets.layout import new_sheet
from audit.report.workbook.sheets.lists import write_checks, write_data_to_collect, write_inputs
from audit.report.workbook.sheets.motors import write_motors
from audit.report.workbook.sheets.ranges import write_ranges
from audit.report.workbook.sheets.since import write_since
from audit.report.workbook.sheets.work import write_work

COVER, FINDINGS, WORK, MOTORS, RANGES = "Audit", "Findings", "Work", "Motors", "Ranges"
DATA, SINCE, INPUTS, CHECKS = "Data to collect", "Since last audit", "Inputs", "Checks applied"
ACCEPTED = "Accepted deviations"
SHEETS = (COVER, FINDINGS, WORK, ACCEPTED, MOTORS, RANGES, DATA, SINCE, INPUTS, CHECKS)
PATCHABLE = (".xlsx", ".xlsm")


@dataclass(frozen=True, slots=True)
class WrittenWorkbook:
    """A workbook that was written, or the reason why a copy was not."""

    path: Path
    remark: str = ""


@dataclass(frozen=True, slots=True)
class BuiltSheets:
    """Our sheets, and the values of their formulas."""

    book: Workbook
    values: SavedValues


def write_workbooks(audit: Audit, folder: Path) -> list[WrittenWorkbook]:
    """Write an annotated copy of each workbook that holds a judged cell, our sheets in front of the motor list."""
    findings = list(FindingRenderer(audit).all())
    marks = marks_by_file(audit, findings)
    motor_file = _motor_file(audit)
    written: list[WrittenWorkbook] = []
    with tempfile.TemporaryDirectory() as scratch:
        for item in audit.fleet.inputs:
            source = Path(item.path)
            if item.file != motor_file and item.file not in marks:
                continue
            report = Path(scratch) / "sheets.xlsx"
            target = folder / f"{source.stem}-annotated{source.suffix}"
            try:
                if source.suffix.casefold() not in PATCHABLE:
                    raise CannotPatch(f"{source.suffix} files cannot be marked without loss")
                names = names_for_report(source, SHEETS)
                built = build_sheets(audit, findings, item.file, names, whole=item.file == motor_file)
                built.book.save(report)
                annotate_copy(source, target, marks.get(item.file, []), report, formulas=built.values)
                written.append(WrittenWorkbook(target))
            except CannotPatch as reason:
                written += _apart(audit, findings, item.file, motor_file, folder, str(reason))
    return written


def _apart(
    audit: Audit, findings: Sequence[Finding], file: str, motor_file: str, folder: Path, reason: str
) -> list[WrittenWorkbook]:
    """Write our sheets as a workbook of their own where the site's cannot be marked without loss."""
    if file != motor_file:
        return [WrittenWorkbook(folder / file, f"no marked copy of {file}: {reason}; see the findings sheet")]
    target = folder / "findings.xlsx"
    built = build_sheets(audit, findings, "", {}, whole=True)
    save_with_values(built.book, target, built.values)
    return [WrittenWorkbook(target, f"no marked copy of {file}: {reason}; our sheets stand in a workbook of their own")]


def _motor_file(audit: Audit) -> str:
    cells = audit.fleet.tables["motor"].columns["motor"].cell
    for address in cells.tolist():
        place = audit.fleet.book.place(address)
        if place is not None:
            return place.file
    return ""


def build_sheets(
    audit: Audit, findings: Sequence[Finding], own_file: str, names: Mapping[str, str], *, whole: bool
) -> BuiltSheets:
    """Build our sheets for one workbook: all of them for the motor list, cover and findings for the others.

    `names` gives the sheet names that are free in the workbook that they go into.
    """
    book = Workbook()
    book.remove(book.worksheets[0])

    def sheet(name: str) -> Worksheet:
        return new_sheet(book, names.get(name, name))

    write_cover(audit, sheet(COVER))
    write_findings(findings, sheet(FINDINGS), audit.fleet.site, own_file)
    values: dict[str, dict[str, SavedValue]] = {}
    if whole:
        work = sheet(WORK)
        values[work.title] = write_work(audit, work_rows(audit, findings), work, own_file)
        write_accepted(audit, findings, sheet(ACCEPTED))
        write_motors(audit, list(findings), sheet(MOTORS))
        write_ranges(audit, sheet(RANGES))
        write_data_to_collect(audit, sheet(DATA))
        write_since(audit, sheet(SINCE))
        write_inputs(audit, sheet(INPUTS))
        write_checks(audit, sheet(CHECKS))
    return BuiltSheets(book, values)
