"""The close-out on the terminal: counts by state, then what is not closed, worst first."""

from __future__ import annotations

from collections.abc import Sequence
from pathlib import Path

from rich.console import Console
from rich.table import Table
from rich.text import Text

from audit.cautions import SHORT_CAUTION
from audit.findings.closeout.sort import CloseOut
from audit.findings.closeout.states import CLOSED, MEANING, Sorted, State
from audit.findings.finding import Finding
from audit.report.terminal.style import LETTER, counted

MOST_LINES = 40
MARKS = {
    State.VERIFIED: "✓✓",
    State.REPORTED: "✓",
    State.OPEN: "o",
    State.OUTSIDE: "x",
    State.WORDS: "w",
    State.DISAGREES: "≠",
    State.UNASKED: "!",
    State.NOT_ANSWERED: "-",
    State.MISSING: "?",
}
"""Say the same as the words, for a quick look along a column."""


def show_closeout(result: CloseOut, console: Console, written: Sequence[Path]) -> None:
    """Print the close-out."""
    console.print()
    site = result.before.fleet.site
    console.print(Text(f"{site} · close-out of {result.sheet_file} · {result.after.audited_on.isoformat()}", "bold"))
    if result.export is not None:
        files = ", ".join(result.export.files)
        console.print(f"settings read after the work: {files}; their day by {result.export.day_from}")
    else:
        console.print("no settings export after the work was given: nothing can be verified, only reported")
    for remark in result.matches.remarks:
        console.print(f"note: {remark}")
    if result.matches.unknown_keys:
        number = len(result.matches.unknown_keys)
        console.print(f"note: {counted(number, 'row')} came back whose finding this audit does not know")
    console.print()
    console.print(_counts(result))
    _items(result, console)
    _findings(result.new_findings, "new with the values left", console)
    _findings(result.hand_over_findings, "the hand-over itself", console)
    _altered(result, console)
    console.print()
    for path in written:
        console.print(f"written: {path}")
    console.print(Text(SHORT_CAUTION, "italic"))


def _counts(result: CloseOut) -> Table:
    table = Table(box=None, pad_edge=False, show_header=False)
    table.add_column(justify="right")
    table.add_column()
    table.add_column(overflow="fold")
    for state, number in result.counts().items():
        table.add_row(f"{number:,}", f"{MARKS[state]} {state.value}", MEANING[state])
    table.add_row(f"{len(result.new_findings):,}", "new findings", "checks that the values left break")
    table.add_row(f"{len(result.altered):,}", "settings altered unasked", "of relays that the new export holds")
    return table


def _items(result: CloseOut, console: Console) -> None:
    for state in State:
        found = [item for item in result.items if item.state is state]
        if state in CLOSED or not found:
            continue
        console.print()
        console.rule(f"{MARKS[state]} {state.value} · {counted(len(found), 'finding')}", align="left")
        table = Table(box=None, pad_edge=False, header_style="italic")
        for heading in ("", "motor", "setting", "issued", "as-left", "reason"):
            table.add_column(heading, overflow="fold", ratio=1 if heading == "reason" else None)
        for item in found[:MOST_LINES]:
            table.add_row(*(Text(text) for text in _line(item)))
        console.print(table)
        if len(found) > MOST_LINES:
            console.print(f"  … and {len(found) - MOST_LINES:,} more, all in closeout.json and in the workbook")


def _line(item: Sorted) -> tuple[str, ...]:
    finding, one = item.finding, item.matched
    said = "; ".join((item.reason, *item.questions, *item.remarks))
    setting = one.work.written.header if one is not None else finding.label
    issued, left = (one.issued.written, one.as_left.written) if one is not None else ("", "")
    return LETTER[finding.severity], finding.motor or finding.name, setting, issued, left, said


def _findings(findings: Sequence[Finding], heading: str, console: Console) -> None:
    if not findings:
        return
    console.print()
    console.rule(f"{heading} · {counted(len(findings), 'finding')}", align="left")
    for finding in findings[:MOST_LINES]:
        name = finding.motor or finding.name
        console.print(Text(f"{LETTER[finding.severity]} {name} {finding.function} {finding.says}: {finding.because}"))
    if len(findings) > MOST_LINES:
        console.print(f"  … and {len(findings) - MOST_LINES:,} more")


def _altered(result: CloseOut, console: Console) -> None:
    if not result.altered:
        return
    console.print()
    console.rule(f"altered without being asked · {counted(len(result.altered), 'setting')}", align="left")
    for change in result.altered[:MOST_LINES]:
        console.print(Text(f"{change.name} {change.label}: {change.before_text} -> {change.after_text}"))
    if len(result.altered) > MOST_LINES:
        console.print(f"  … and {len(result.altered) - MOST_LINES:,} more")
