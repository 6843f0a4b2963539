"""The motors: one row a motor, one column a function, the worst severity by letter and colour."""

from __future__ import annotations

import re

import numpy as np
from openpyxl.cell import Cell
from openpyxl.worksheet.worksheet import Worksheet

from audit.checks.entry import SEVERITIES
from audit.checks.verdicts import MEETS, UNPROVEN
from audit.findings.audit import Audit
from audit.findings.finding import Finding
from audit.report.workbook.sheets.layout import FILLS, LETTERS, LINE_HEIGHT, fill, lines_of, page, table, title

MEETS_MARK, UNPROVEN_MARK, NOTHING = "✓", "?", ""
_NARROW = 7


def write_motors(audit: Audit, findings: list[Finding], sheet: Worksheet) -> None:
    """Write one row for each motor."""
    key = "  ".join(f"{letter} {severity}" for severity, letter in LETTERS.items())
    row = title(
        sheet,
        "Motors",
        f"worst finding by function: {key}  {MEETS_MARK} meets  {UNPROVEN_MARK} unproven; blank: not applicable",
    )
    outcomes = [o for o in audit.outcomes if o.check.subject == "motor" and o.check.stage == "rows"]
    functions = sorted({o.check.function for o in outcomes}, key=_by_device_number)
    worst = _worst(findings)
    states = {name: _states(audit, name) for name in functions}
    texts = {name: audit.workings.column("motor", name).values for name in ("service", "bus", "relay")}
    rows = []
    for number, motor in enumerate(audit.fleet.tables["motor"].keys):
        marks: list[object] = []
        for name in functions:
            severity = worst.get((motor, name))
            marks.append(LETTERS[severity] if severity else states[name][number])
        rows.append([motor, *(texts[name][number] or "" for name in texts), *marks])
    headings = ("motor", "service", "bus", "relay", *functions)
    table(sheet, row, headings, (14, 26, 12, 14, *([_NARROW] * len(functions))), rows)
    sheet.row_dimensions[row].height = LINE_HEIGHT * lines_of(headings, [_NARROW] * len(headings))
    by_letter = {letter: FILLS[severity] for severity, letter in LETTERS.items()}
    for offset, values in enumerate(rows, start=1):
        for column, value in enumerate(values[4:], start=5):
            cell = sheet.cell(row=row + offset, column=column)
            if isinstance(cell, Cell) and value in by_letter:
                fill(cell, by_letter[str(value)])
    sheet.freeze_panes = f"B{row + 1}"
    page(sheet, audit.fleet.site)


def _by_device_number(function: str) -> tuple[int, str]:
    """Order functions by their first device number, those without a number last.

    >>> sorted(["fleet", "50", "49/48", "14", "49"], key=_by_device_number)
    ['14', '49', '49/48', '50', 'fleet']
    """
    number = re.match(r"\d+", function)
    return (int(number.group()) if number else 1000), function


def _worst(findings: list[Finding]) -> dict[tuple[str, str], str]:
    rank: dict[str, int] = {severity: place for place, severity in enumerate(SEVERITIES)}
    worst: dict[tuple[str, str], str] = {}
    for finding in findings:
        key = (finding.motor, finding.function)
        if finding.motor and (key not in worst or rank[finding.severity] < rank[worst[key]]):
            worst[key] = finding.severity
    return worst


def _states(audit: Audit, function: str) -> list[str]:
    size = audit.fleet.rows("motor")
    any_unproven = np.zeros(size, dtype=bool)
    any_meets = np.zeros(size, dtype=bool)
    for outcome in audit.outcomes:
        if outcome.check.subject == "motor" and outcome.check.function == function and len(outcome.verdict) == size:
            any_unproven |= outcome.verdict == UNPROVEN
            any_meets |= outcome.verdict == MEETS
    return [UNPROVEN_MARK if u else MEETS_MARK if m else NOTHING for u, m in zip(any_unproven, any_meets, strict=True)]
