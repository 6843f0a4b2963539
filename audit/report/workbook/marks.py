"""Which cells of the site's workbooks to fill and note: each judged cell that fails, and the tag of its motor."""

from __future__ import annotations

from collections import defaultdict
from collections.abc import Iterable

from audit.checks.entry import SEVERITIES
from audit.findings.audit import Audit
from audit.findings.finding import Finding
from audit.fleet.addresses import column_number, unpack
from audit.report.workbook.patch import Mark
from audit.report.workbook.sheets.findings import judged_cell
from audit.report.workbook.sheets.layout import FILLS, LETTERS

MOST_LINES = 12
_RANK: dict[str, int] = {severity: place for place, severity in enumerate(SEVERITIES)}


def marks_by_file(audit: Audit, findings: Iterable[Finding]) -> dict[str, list[Mark]]:
    """Give the marks of each input file."""
    at_cell: dict[tuple[str, str, str], list[Finding]] = defaultdict(list)
    at_motor: dict[str, list[Finding]] = defaultdict(list)
    for finding in findings:
        place = judged_cell(finding)
        if place is not None:
            at_cell[(place.file, place.sheet, place.cell)].append(finding)
        if finding.motor:
            at_motor[finding.motor].append(finding)
    marks: dict[str, list[Mark]] = defaultdict(list)
    for (file, sheet, cell), found in at_cell.items():
        row, column = _row_and_column(cell)
        marks[file].append(
            Mark(sheet, row, column, FILLS[_worst(found)], "\n".join(_note(f) for f in found[:MOST_LINES]))
        )
    tags = audit.fleet.tables["motor"].columns["motor"]
    for number, motor in enumerate(audit.fleet.tables["motor"].keys):
        found = sorted(at_motor.get(motor, []), key=lambda f: _RANK[f.severity])
        address = int(tags.cell[number])
        if not found or address < 0:
            continue
        tag_place = audit.fleet.book.place(address)
        assert tag_place is not None
        _, row, column = (int(part) for part in unpack(address))
        lines = [f"{LETTERS[f.severity]} {f.function} {f.says}" for f in found[:MOST_LINES]]
        more = [f"… and {len(found) - MOST_LINES} more, see sheet Findings"] if len(found) > MOST_LINES else []
        marks[tag_place.file].append(
            Mark(tag_place.sheet, row, column, FILLS[found[0].severity], "\n".join(lines + more))
        )
    return dict(marks)


def _worst(findings: list[Finding]) -> str:
    return min((finding.severity for finding in findings), key=lambda severity: _RANK[severity])


def _note(finding: Finding) -> str:
    permissible = f" Permissible: {finding.range_text}." if finding.range_text else ""
    head = f"{LETTERS[finding.severity]} {finding.severity}, {finding.function}"
    return f"{head}: {finding.because}.{permissible} {finding.remedy}"


def _row_and_column(cell: str) -> tuple[int, int]:
    letters = cell.rstrip("0123456789")
    return int(cell[len(letters) :]), column_number(letters)
