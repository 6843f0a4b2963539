"""The findings, one row each, ordered so that one visit does one panel."""

from __future__ import annotations

from collections.abc import Sequence

from openpyxl.cell import Cell
from openpyxl.utils import get_column_letter
from openpyxl.worksheet.worksheet import Worksheet

from audit.findings.finding import Finding, FindingCell
from audit.report.workbook.sheets.layout import FILLS, LETTERS, MOST_LINKS, fill, link, page, table, title

HEADINGS = (
    "", "bus", "cubicle", "motor", "relay", "function", "what is wrong", "judged", "present", "permissible",
    "what to do", "cell", "service", "standing", "set by", "why", "assumptions", "source", "file", "check", "key",
)  # fmt: skip
WIDTHS = (4, 10, 9, 11, 12, 8, 44, 20, 10, 18, 34, 22, 24, 22, 34, 50, 34, 34, 26, 34, 40)
PRINTED = 12
KEY = ", ".join(f"{letter} {severity}" for severity, letter in LETTERS.items())
_CELL, _SEVERITY = 12, 1


def write_findings(findings: Sequence[Finding], sheet: Worksheet, site: str, own_file: str) -> None:
    """Write the findings sheet; `own_file` is the workbook that the sheet goes into, whose cells can be linked to."""
    below = f"ordered by bus, cubicle and motor; {KEY}; a permissible range is not an instruction"
    row = title(sheet, "Findings", below)
    ordered = sorted(findings, key=lambda f: (f.bus, f.cubicle, f.motor or f.name, f.function, f.check))
    table(sheet, row, HEADINGS, WIDTHS, (_row(finding) for finding in ordered))
    for offset, finding in enumerate(ordered, start=1):
        severity = sheet.cell(row=row + offset, column=_SEVERITY)
        assert isinstance(severity, Cell)
        fill(severity, FILLS[finding.severity])
        place = judged_cell(finding)
        target = sheet.cell(row=row + offset, column=_CELL)
        if place is not None and place.file == own_file and offset < MOST_LINKS and isinstance(target, Cell):
            link(target, place.sheet, place.cell)
    last = row + max(len(ordered), 1)
    page(sheet, site, print_area=f"A1:{get_column_letter(PRINTED)}{last}")


def judged_cell(finding: Finding) -> FindingCell | None:
    """Give the cell of the value judged, else the first cell that the finding rests on."""
    for cell in finding.cells:
        if cell.quantity == finding.judges:
            return cell
    return finding.cells[0] if finding.cells else None


def set_by(finding: Finding) -> str:
    """Say which checks set the ends of the permissible range."""
    ends = []
    if finding.low_set_by:
        ends.append(f"low: {finding.low_set_by}")
    if finding.high_set_by:
        ends.append(f"high: {finding.high_set_by}")
    return "\n".join(ends)


def _row(finding: Finding) -> list[object]:
    place = judged_cell(finding)
    state = f" ({finding.range_state})" if finding.range_state else ""
    motor = finding.motor or finding.name
    if finding.setting_group:
        motor += f" (group {finding.setting_group})"
    because = finding.because + (" (provisional)" if finding.provisional else "")
    return [
        LETTERS[finding.severity],
        finding.bus,
        finding.cubicle,
        motor,
        finding.relay,
        finding.function,
        f"{finding.says}: {because}",
        finding.label,
        finding.present_text,
        finding.range_text + state,
        finding.remedy,
        f"{place.sheet}!{place.cell}" if place else "",
        finding.service,
        "" if finding.status == "open" else f"{finding.status}, since {finding.since}, audits: {finding.audits}",
        set_by(finding),
        finding.why,
        "; ".join(finding.assumptions),
        finding.source,
        place.file if place else "",
        finding.check,
        finding.key,
    ]
