"""What is lacking, on the terminal: data to collect, complaints and questions about the inputs."""

from __future__ import annotations

from rich.console import Console
from rich.padding import Padding
from rich.table import Table
from rich.text import Text

from audit.checks.entry import SEVERITIES
from audit.findings.audit import Audit
from audit.findings.costs import costs_of_complaints
from audit.report.terminal.style import LETTER, counted
from audit.report.terminal.tables import print_heading, print_left_out

MOST_DATA = 12
MOST_COMPLAINTS = 10


def print_data_to_collect(audit: Audit, console: Console) -> None:
    """Print which data would settle most verdicts."""
    if not audit.data_to_collect:
        return
    print_heading(console, "Data to collect · what would settle most, unsafe checks first")
    table = Table(box=None, pad_edge=False, header_style="italic")
    table.add_column("datum", overflow="fold", ratio=2)
    table.add_column("of", justify="right", no_wrap=True)
    table.add_column("settles", justify="right")
    for severity in SEVERITIES:
        table.add_column(LETTER[severity], justify="right")
    table.add_column("for instance", overflow="fold", ratio=2)
    for wanted in audit.data_to_collect[:MOST_DATA]:
        keys = audit.fleet.tables[wanted.subject].keys
        names = ", ".join(keys[row] for row in wanted.rows[:4].tolist())
        noun = wanted.subject if wanted.subject in ("motor", "relay", "bus") else "group"
        counts = [f"{wanted.by_severity[severity] or ''}" for severity in SEVERITIES]
        more = " …" if len(wanted.rows) > 4 else ""
        table.add_row(
            Text(wanted.label), counted(len(wanted.rows), noun), f"{wanted.verdicts():,}", *counts, Text(names + more)
        )
    console.print(table)
    left = len(audit.data_to_collect) - MOST_DATA
    if left > 0:
        console.print(f"… and {left} further data, all in the workbook and in findings.json")


def print_complaints(audit: Audit, console: Console) -> None:
    """Print what of the inputs could not be used, worst first, and what is asked."""
    pairs = zip(audit.fleet.complaints, costs_of_complaints(audit), strict=True)
    weights = ("stop", "withheld", "remark")
    complaints = sorted(pairs, key=lambda pair: (weights.index(pair[0].weight), -len(pair[1])))
    if complaints:
        print_heading(console, f"The inputs · {counted(len(complaints), 'complaint')}")
        for item, cost in complaints[:MOST_COMPLAINTS]:
            leaves = f" Leaves unproven: {', '.join(cost)}." if cost else ""
            console.print(Padding(Text(item.sentence() + leaves), (0, 0, 0, 2)))
        print_left_out(console, len(complaints), MOST_COMPLAINTS, "the workbook's data sheet")
    if audit.fleet.questions:
        asked = counted(len(audit.fleet.questions), "question")
        print_heading(console, f"Asked · {asked}; the values concerned are withheld")
        for question in audit.fleet.questions[:MOST_COMPLAINTS]:
            place = " › ".join(part for part in (question.file, question.sheet, question.cell) if part)
            console.print(Padding(Text(f"{place}: {question.about}. {question.ask}"), (0, 0, 0, 2)))
        if len(audit.fleet.questions) > MOST_COMPLAINTS:
            console.print(f"  … and {len(audit.fleet.questions) - MOST_COMPLAINTS:,} more, see 'motor-audit columns'")
