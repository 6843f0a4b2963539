"""The plain lists: data to collect, inputs with complaints and questions, checks applied."""

from __future__ import annotations

from collections.abc import Sequence

from openpyxl.worksheet.worksheet import Worksheet

from audit.checks.entry import SEVERITIES
from audit.findings.audit import Audit
from audit.findings.costs import costs_of_complaints
from audit.report.workbook.sheets.layout import LETTERS, page, table, title

MOST_NAMES = 40
MOST_CHECKS = 12


def write_data_to_collect(audit: Audit, sheet: Worksheet) -> None:
    """Write which data would settle most verdicts."""
    row = title(
        sheet, "Data to collect", "which datum of which motor would settle how many verdicts; unsafe checks first"
    )
    rows = []
    for wanted in audit.data_to_collect:
        keys = audit.fleet.tables[wanted.subject].keys
        names = [keys[number] for number in wanted.rows[:MOST_NAMES].tolist()]
        counts = [wanted.by_severity[severity] or "" for severity in SEVERITIES]
        rows.append(
            [
                wanted.label,
                wanted.subject,
                len(wanted.rows),
                wanted.verdicts(),
                *counts,
                _some(names, len(wanted.rows)),
                _some(wanted.checks[:MOST_CHECKS], len(wanted.checks)),
            ]
        )
    letters = [LETTERS[severity] for severity in SEVERITIES]
    headings = ("datum", "of", "how many", "verdicts", *letters, "which", "checks")
    table(sheet, row, headings, (34, 8, 10, 9, 6, 6, 6, 6, 60, 60), rows)
    page(sheet, audit.fleet.site)


def _some(shown: Sequence[str], number: int) -> str:
    """Write the first of many names, and how many there are.

    >>> _some(["P-1", "P-2"], 2), _some(["P-1", "P-2"], 1200)
    ('P-1, P-2', 'P-1, P-2 … 1,200 in all')
    """
    more = f" … {number:,} in all" if number > len(shown) else ""
    return ", ".join(shown) + more


def write_inputs(audit: Audit, sheet: Worksheet) -> None:
    """Write every complaint about the inputs and every question."""
    row = title(
        sheet, "Inputs", "what could not be used of the workbooks, and what is asked; the values concerned are withheld"
    )
    complaints = [
        [
            item.weight,
            item.file,
            item.sheet,
            item.cell,
            item.key,
            item.found,
            item.expected,
            item.advice,
            ", ".join(cost),
        ]
        for item, cost in zip(audit.fleet.complaints, costs_of_complaints(audit), strict=True)
    ]  # fmt: skip
    questions = [
        ["asked", item.file, item.sheet, item.cell, "", item.about, item.ask, ", ".join(item.answers), ""]
        for item in audit.fleet.questions
    ]
    headings = ("kind", "file", "sheet", "cell", "row of", "found", "expected", "what to do", "leaves unproven")
    table(sheet, row, headings, (10, 22, 16, 8, 14, 44, 40, 44, 40), complaints + questions)
    page(sheet, audit.fleet.site)


def write_checks(audit: Audit, sheet: Worksheet) -> None:
    """Write every check applied with its counts."""
    row = title(sheet, "Checks applied", "the four counts of each check add up to the rows of its subject")
    rows = []
    for outcome in audit.outcomes:
        check, counts = outcome.check, outcome.counts()
        if check.stage == "ranges":
            continue
        numbers = [counts["meets"], counts["breach"], counts["unproven"], counts["not applicable"]]
        rows.append(
            [check.function, check.key, check.severity, check.subject, *numbers, int(outcome.provisional.sum()),
             check.says, check.why, check.source, check.pack]
        )  # fmt: skip
    headings = (
        "function", "check", "severity", "subject", "meets", "breach", "unproven", "not applicable", "provisional",
        "says", "why", "source", "pack",
    )  # fmt: skip
    table(sheet, row, headings, (9, 38, 12, 9, 8, 8, 9, 10, 10, 40, 60, 40, 12), rows)
    page(sheet, audit.fleet.site)
