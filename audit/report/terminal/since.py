"""What an audit says to the record of an earlier one: counts, cleared findings, settings that changed, trends."""

from __future__ import annotations

from collections import Counter

from rich.console import Console
from rich.padding import Padding
from rich.text import Text

from audit.findings.audit import Audit
from audit.findings.finding import Finding
from audit.findings.past import Previous
from audit.findings.trends import drifts
from audit.report.terminal.style import counted
from audit.report.terminal.tables import print_heading, print_left_out, print_table

MOST_LINES = 12
RECORD = "findings.json"


def standing_word(finding: Finding) -> str:
    """Say how a finding stands to earlier audits, '' where no earlier record was given."""
    if finding.status == "repeated":
        return f" (since {finding.since})"
    return f" ({finding.status})" if finding.status in ("new", "returned") else ""


def print_trends(audit: Audit, console: Console) -> None:
    """Print the start times and start currents that drift toward a limit."""
    found = drifts(audit.workings)
    if not found:
        return
    print_heading(console, f"Drifting toward a limit · {counted(len(found), 'trend')} of recorded starts")
    for drift in found[:MOST_LINES]:
        console.print(Padding(Text(f"{drift.motor}: {drift.words()}"), (0, 0, 0, 2)))
    print_left_out(console, len(found), MOST_LINES, RECORD)


def print_since(audit: Audit, console: Console) -> None:
    """Print what changed since the earlier record."""
    previous = audit.previous
    if previous is None:
        return
    today = audit.audited_on.isoformat()
    counts = Counter(past.status for past in previous.pasts.values())
    cleared = [one for one in previous.cleared_now(today) if one.cleared_on]
    told = ", ".join(f"{counts[word]:,} {word}" for word in ("new", "repeated", "returned"))
    print_heading(console, f"Since the audit of {previous.audited_on} · {told}, {len(cleared):,} cleared")
    for notice in previous.notices:
        console.print(Text(f"  note: {notice}"))
    _print_cleared(previous, today, console)
    _print_settings(previous, console)


def _print_cleared(previous: Previous, today: str, console: Console) -> None:
    found = previous.cleared_now(today)
    if not found:
        return
    headings = ("of", "finding cleared or no longer provable", "how", "what changed")
    rows = [(one.name, one.check, one.how, "; ".join(one.what_changed)) for one in found]
    print_table(console, headings, rows, MOST_LINES, RECORD)


def _print_settings(previous: Previous, console: Console) -> None:
    unexplained = [one for one in previous.settings if not one.explained_by]
    if not unexplained:
        return
    console.print(Text("  Settings that changed although no change is listed and no finding asked for it:", "bold"))
    rows = [
        (
            one.relay,
            one.label,
            one.before_text,
            one.after_text,
            f"{one.file} › {one.sheet} › {one.cell}" if one.file else "",
        )
        for one in unexplained
    ]
    print_table(console, ("relay", "setting", "before", "now", "cell"), rows, MOST_LINES, RECORD)
