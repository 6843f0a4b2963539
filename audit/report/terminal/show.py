"""An audit on the terminal, whole."""

from __future__ import annotations

from collections.abc import Sequence
from pathlib import Path

from rich.console import Console
from rich.text import Text

from audit.cautions import SHORT_CAUTION
from audit.findings.audit import Audit
from audit.report.terminal.accepted import print_accepted
from audit.report.terminal.findings import print_findings
from audit.report.terminal.lacks import print_complaints, print_data_to_collect
from audit.report.terminal.since import print_since, print_trends
from audit.report.terminal.summary import print_summary


def show_audit(audit: Audit, console: Console, written: Sequence[Path] = (), *, everything: bool = False) -> None:
    """Print an audit: findings first, so that the summary stands where the eye is when the run ends."""
    print_complaints(audit, console)
    print_data_to_collect(audit, console)
    print_findings(audit, console, everything=everything)
    print_accepted(audit, console)
    print_trends(audit, console)
    print_since(audit, console)
    console.print()
    console.rule(style="default")
    print_summary(audit, console)
    console.print()
    for path in written:
        console.print(Text(f"written: {path}"))
    console.print(Text(SHORT_CAUTION, "italic"))
