"""Findings on the terminal: by severity, then by check, like ones on one line."""

from __future__ import annotations

from collections.abc import Iterable
from itertools import groupby

from rich.console import Console
from rich.padding import Padding
from rich.table import Table
from rich.text import Text

from audit.checks.entry import SEVERITIES
from audit.findings.audit import Audit
from audit.findings.finding import Finding
from audit.findings.render import FindingRenderer
from audit.report.terminal.since import standing_word
from audit.report.terminal.style import MEANING, STYLE, WIDE, counted, severity_word

MOST_LINES = 10
STATES_OF_RANGES = (
    "A permissible range is moving where an end depends on another setting, provisional where a check that sets an end "
    "is unproven or rests on an assumption. It is not an instruction: pickup and delay act together."
)
MOST_NAMES = 12


def print_findings(audit: Audit, console: Console, *, everything: bool = False) -> None:
    """Print the findings, worst first."""
    renderer = FindingRenderer(audit)
    by_severity = audit.by_severity()
    for severity in SEVERITIES:
        if not by_severity[severity]:
            continue
        console.print()
        heading = severity_word(severity)
        heading.append(f" · {counted(by_severity[severity], 'finding')}: {MEANING[severity]}", "default")
        console.rule(heading, align="left", style=STYLE[severity])
        codes = [code for code in audit.counted() if audit.outcomes[code.outcome].check.severity == severity]
        for _, group in groupby(codes, key=lambda code: audit.outcomes[code.outcome].check.key):
            _print_check([renderer.finding(code) for code in group], console, everything=everything)
    if any(by_severity.values()):
        console.print()
        console.print(Text(STATES_OF_RANGES))


def _print_check(findings: list[Finding], console: Console, *, everything: bool) -> None:
    first = findings[0]
    console.print()
    title = Text(f"{first.function:<5} ", STYLE[first.severity])
    title.append(first.says, "bold")
    title.append(f"  {first.check}", "default")
    console.print(title)
    merged = _merged(findings)
    shown = merged if everything else merged[:MOST_LINES]
    console.print(Padding(_table(shown, console.width), (0, 0, 0, 2)))
    left = sum(len(names) for names, _ in merged[len(shown) :])
    if left:
        console.print(f"  … and {left:,} more, all in findings.csv and in the workbook")
    console.print(Padding(Text(f"Do: {first.remedy}"), (0, 0, 0, 2)))


def _merged(findings: Iterable[Finding]) -> list[tuple[list[str], Finding]]:
    """Join findings that say the same of several motors."""
    lines: dict[tuple[str, str, str], tuple[list[str], Finding]] = {}
    for finding in findings:
        name = finding.motor or finding.name
        if finding.relay and finding.relay != name:
            name += f" ({finding.relay})"
        if finding.setting_group:
            name += f" (group {finding.setting_group})"
        name += standing_word(finding)
        key = (finding.label, finding.present_text, finding.range_text)
        same_reason = lines.get((*key[:2], finding.because)) if not finding.range_text else None
        target = same_reason or lines.setdefault(
            key if finding.range_text else (*key[:2], finding.because), ([], finding)
        )
        target[0].append(name)
    return list(lines.values())


def _names(names: list[str]) -> str:
    if len(names) <= MOST_NAMES:
        return ", ".join(names)
    return f"{', '.join(names[:MOST_NAMES])} … ({len(names)} in all)"


def _table(lines: list[tuple[list[str], Finding]], width: int) -> Table:
    wide = width >= WIDE
    table = Table(box=None, pad_edge=False, show_edge=False, header_style="italic", expand=False)
    first = lines[0][1]
    heading = "motor (relay)" if first.motor and first.relay else "motor" if first.motor else first.subject
    table.add_column(heading, overflow="fold", max_width=40 if wide else 22)
    if any(finding.range_text for _, finding in lines):
        table.add_column("present", justify="right", no_wrap=not wide, overflow="fold")
        table.add_column("permissible", overflow="fold", max_width=26 if wide else 22)
    table.add_column("because", overflow="fold", ratio=1)
    if wide:
        table.add_column("cell", overflow="fold", max_width=44)
    with_range = len(table.columns) >= 4 if not wide else len(table.columns) >= 5
    for names, finding in lines:
        reason = finding.because
        if finding.provisional:
            reason += " (provisional: " + "; ".join(finding.assumptions or ("rests on an assumption",)) + ")"
        place = _place(finding) if len(names) == 1 else ""
        cells = [_names(names)]
        if with_range:
            state = f" ({finding.range_state})" if finding.range_state else ""
            cells += [finding.present_text, finding.range_text + state]
        cells += [reason, place] if wide else [f"{reason}\n{place}" if place else reason]
        table.add_row(*[Text(cell) for cell in cells])
    return table


def _place(finding: Finding) -> str:
    if not finding.cells:
        return ""
    wanted = next((cell for cell in finding.cells if cell.quantity == finding.judges), finding.cells[0])
    return f"{wanted.file} › {wanted.sheet} › {wanted.cell}"
