"""The cover: scope, inputs with hashes, rules and overrides, counts, key, cautions, sign-off."""

from __future__ import annotations

from collections.abc import Sequence

from openpyxl.styles import Border, Font, Side
from openpyxl.worksheet.worksheet import Worksheet

from audit.cautions import CAUTIONS
from audit.findings.audit import Audit
from audit.report.record.parts import tool_version
from audit.report.terminal.style import MEANING
from audit.report.workbook.sheets.layout import FILLS, LETTERS, fill, page, put, title

HOW_TO_FILL_IN = [
    (
        "the engineer",
        "writes ISSUED VALUE in the unit and base of the export, as the column beside it names them, with name, "
        "revision and date. The cell 'judged' must say that it lies inside the range. A row that is held back gets "
        "no value until the datum that it names is settled.",
    ),
    (
        "the contractor",
        "sets the issued value and nothing else. AS-FOUND before, AS-LEFT after, each read from the relay: the number "
        "alone, its unit in the column 'unit'. A notice appears where something does not agree; at STOP AND RING no "
        "setting is changed before the engineer has answered. A row that cannot be done stays empty, with a remark.",
    ),
    (
        "afterwards",
        "read the settings of the relay into a file and name it. Return this workbook with that file; rows may be "
        "sorted and filtered, not deleted. What is not locked is open to both; the rest is protected without a "
        "password, against slips.",
    ),
    (
        "the formulas",
        "use common functions only and were tried in LibreOffice; in other programs try one row before the sheet is "
        "handed over.",
    ),
]
_LINE = Side(style="thin", color="3B4A54")


def write_cover(audit: Audit, sheet: Worksheet) -> None:
    """Write the cover sheet."""
    fleet = audit.fleet
    row = title(
        sheet, f"Audit of motor-protection settings · {fleet.site}", f"audited on {audit.audited_on.isoformat()}"
    )
    for column, width in zip("ABCD", (26, 22, 52, 40), strict=True):
        sheet.column_dimensions[column].width = width
    row = pairs(sheet, row, "Scope", _scope(audit))
    row = pairs(sheet, row, "Verdicts", _verdicts(audit))
    row = _severities(audit, sheet, row)
    row = pairs(sheet, row, "Cautions", [("", caution) for caution in CAUTIONS])
    row = pairs(sheet, row, "How to fill in the sheet 'Work'", HOW_TO_FILL_IN)
    row = pairs(sheet, row, "Input files", [(item.file, f"sha256 {item.sha256}") for item in fleet.inputs])
    changes = [
        (change.kind, f"{change.name}{f': {change.was} -> {change.now}' if change.was else ''} ({change.reason})")
        for change in audit.catalogue.changes
    ]
    row = pairs(sheet, row, "Rules", [("version", tool_version()), *(changes or [("site rules", "none")])])
    sign_off(sheet, row)
    page(sheet, fleet.site, pages_high=1)


def _scope(audit: Audit) -> list[tuple[str, str]]:
    fleet = audit.fleet
    out = ", ".join(audit.packs_out_of_scope)
    return [
        ("motors", f"{fleet.rows('motor'):,}"),
        ("relays, buses, starts", f"{fleet.rows('relay'):,}, {fleet.rows('bus'):,}, {fleet.rows('start'):,}"),
        ("checks", f"{len(audit.check_names()):,}"),
        ("packs in scope", ", ".join(audit.packs_in_scope)),
        ("packs out of scope", out or "none"),
        ("complaints about inputs", f"{len(fleet.complaints):,} (sheet 'Inputs')"),
        ("questions asked", f"{len(fleet.questions):,} (sheet 'Inputs')"),
    ]


def _verdicts(audit: Audit) -> list[tuple[str, str]]:
    counts = audit.counts()
    further = len(audit.codes) - counts["breach"]
    of_ranges = f"; {further:,} further on ranges and setting groups" if further else ""
    return [
        ("meets", f"{counts['meets']:,}"),
        ("breach", f"{counts['breach']:,}, a finding each{of_ranges}"),
        ("provisional", f"{audit.provisional():,} of meets and breach rest on an assumption"),
        ("unproven", f"{counts['unproven']:,} for want of a datum (sheet 'Data to collect')"),
        (
            "not applicable",
            f"{counts['not applicable']:,}, of these {audit.without_evidence():,} without optional evidence",
        ),
    ]


def pairs(sheet: Worksheet, row: int, heading: str, told: Sequence[tuple[str, str]]) -> int:
    """Write a heading and names with texts below it; give the next free row."""
    put(sheet, row, 1, heading, bold=True)
    for name, text in told:
        row += 1
        put(sheet, row, 1, name)
        put(sheet, row, 2, text, wrap=True)
        sheet.merge_cells(start_row=row, start_column=2, end_row=row, end_column=4)
        sheet.row_dimensions[row].height = 14 * (1 + len(text) // 105)
    return row + 2


def _severities(audit: Audit, sheet: Worksheet, row: int) -> int:
    put(sheet, row, 1, "Findings", bold=True)
    for severity, number in audit.by_severity().items():
        row += 1
        fill(put(sheet, row, 1, f"{LETTERS[severity]}  {severity}", bold=True), FILLS[severity])
        put(sheet, row, 2, number).font = Font(name="Calibri", size=10, bold=True)
        put(sheet, row, 3, MEANING[severity])
    row += 1
    put(sheet, row, 1, "Letters and colours mean the same on every sheet and in the marked cells.")
    sheet.merge_cells(start_row=row, start_column=1, end_row=row, end_column=4)
    return row + 2


def sign_off(sheet: Worksheet, row: int, roles: Sequence[str] = ("prepared", "checked", "approved")) -> None:
    """Write the lines on which people sign."""
    put(sheet, row, 1, "Sign-off", bold=True)
    for column, heading in enumerate(("", "name", "signature", "date"), start=1):
        put(sheet, row + 1, column, heading).font = Font(name="Calibri", size=9, italic=True)
    for offset, role in enumerate(roles, start=2):
        put(sheet, row + offset, 1, role)
        sheet.row_dimensions[row + offset].height = 24
        for column in range(1, 5):
            sheet.cell(row=row + offset, column=column).border = Border(bottom=_LINE)
