"""Accepted deviations on the terminal: apart from the findings, never hidden."""

from __future__ import annotations

from rich.console import Console
from rich.table import Table
from rich.text import Text

from audit.findings.audit import Audit
from audit.report.record.parts import standing
from audit.report.terminal.style import counted


def print_accepted(audit: Audit, console: Console) -> None:
    """Print every row of the site's table with what became of it."""
    if audit.accepted_table is None:
        return
    holding = sum(one.holds for one in audit.accepted)
    console.print()
    heading = f"accepted deviations · {counted(holding, 'finding')} left knowingly, by {audit.accepted_table.file}"
    console.rule(heading, align="left")
    table = Table(box=None, pad_edge=False, header_style="italic")
    for name in ("motor", "check", "until", "by", "state", "reason"):
        table.add_column(name, overflow="fold", ratio=1 if name == "reason" else None)
    for one in audit.accepted:
        row = one.deviation
        until = row.until.isoformat() if row.until else ""
        said = (row.motor, row.check, until, row.accepted_by, standing(one), row.reason)
        table.add_row(*(Text(text) for text in said))
    console.print(table)
