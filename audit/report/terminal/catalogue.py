"""The catalogue on the terminal: by function, or one check in full with its worked cases."""

from __future__ import annotations

from itertools import groupby

from rich.console import Console
from rich.padding import Padding
from rich.table import Table
from rich.text import Text

from audit.checks.cases import CaseResult
from audit.checks.catalogue import Catalogue
from audit.checks.entry import Check
from audit.checks.wording import requirement_in_words
from audit.expression.text import render
from audit.report.terminal.style import counted, severity_word


def print_catalogue(catalogue: Catalogue, console: Console) -> None:
    """Print every check, by pack and function."""
    table = Table(box=None, pad_edge=False, header_style="italic")
    for heading in ("function", "check", "severity", "says"):
        table.add_column(heading, overflow="fold")
    by_name = {check.name: check for check in reversed(catalogue.checks)}
    in_order = sorted(
        by_name.values(), key=lambda check: (check.pack != "core", check.pack, check.file, check.function)
    )
    for pack, checks in groupby(in_order, key=lambda check: check.pack):
        table.add_row(Text(pack, "bold"), "", "", "")
        for check in checks:
            table.add_row(check.function, check.name, severity_word(check.severity), Text(check.says))
    console.print(table)
    console.print(f"{counted(len(by_name), 'check')}; one in full: motor-audit checks NAME")


def print_check(check: Check, catalogue: Catalogue, console: Console) -> None:
    """Print one check in full."""
    title = Text(f"{check.function} · {check.name} · ", "bold")
    title.append_text(severity_word(check.severity))
    console.print(title)
    lines = [
        ("says", check.says),
        ("severity because", check.severity_because),
        ("subject", f"{check.subject}; pack {check.pack}; declared in {check.file}"),
        ("applies when", render(check.when, catalogue.label_of, catalogue.reads)),
        *(("wanted", requirement_in_words(r, catalogue.label_of, catalogue.reads)) for r in check.requirements),
        ("why", check.why),
        ("blind spots", check.blind_spots),
        ("remedy", check.remedy),
        ("source", check.source),
    ]
    if check.evidence:
        lines.append(("evidence", f"judged only where given: {', '.join(map(catalogue.label_of, check.evidence))}"))
    table = Table(box=None, pad_edge=False, show_header=False)
    table.add_column(style="italic", no_wrap=True)
    table.add_column(overflow="fold")
    for name, text in lines:
        table.add_row(name, Text(text))
    console.print(Padding(table, (0, 0, 1, 2)))
    for case in check.cases:
        console.print(Padding(Text(f"worked case, {case.gives}: {case.working}"), (0, 0, 0, 2)))


def print_verification(results: list[CaseResult], console: Console) -> None:
    """Print how the worked cases came out."""
    for result in results:
        if not result.holds():
            case = result.case
            console.print(Text(f"{result.check.key}: '{case.working}' gives {result.found}, must give {case.gives}"))
    failed = sum(not result.holds() for result in results)
    console.print(f"{counted(len(results), 'worked case')} run, {failed} wrong")
