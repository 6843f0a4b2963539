"""The summary: what was audited, the four counts, severities, packs in scope, changes of rules."""

from __future__ import annotations

from rich.console import Console
from rich.table import Table
from rich.text import Text

from audit.findings.audit import Audit
from audit.report.terminal.style import MEANING, counted, severity_word


def print_summary(audit: Audit, console: Console) -> None:
    """Print the summary of an audit."""
    fleet = audit.fleet
    console.print()
    console.print(Text(f"{fleet.site} · audit of motor-protection settings · {audit.audited_on.isoformat()}", "bold"))
    size = [
        counted(fleet.rows("motor"), "motor"),
        counted(fleet.rows("relay"), "relay"),
        counted(fleet.rows("bus"), "bus"),
        counted(fleet.rows("start"), "recorded start"),
        counted(len(fleet.inputs), "workbook"),
    ]
    console.print(", ".join(size))
    in_scope = ", ".join(audit.packs_in_scope)
    out = f"; out of scope: {', '.join(audit.packs_out_of_scope)}" if audit.packs_out_of_scope else ""
    console.print(f"{counted(len(audit.check_names()), 'check')} · packs in scope: {in_scope}{out}")
    for change in audit.catalogue.changes:
        was = f" {change.was} -> {change.now}" if change.was else ""
        console.print(f"site rule: {change.kind} {change.name}{was} ({change.reason})")
    console.print()
    console.print(_verdict_table(audit))
    console.print()
    console.print(_severity_table(audit))


def _verdict_table(audit: Audit) -> Table:
    counts = audit.counts()
    further = len(audit.codes) - counts["breach"]
    of_ranges = f"; {counted(further, 'further finding')} on ranges and setting groups" if further else ""
    table = Table(box=None, pad_edge=False, show_header=False)
    table.add_column(justify="right")
    table.add_column()
    table.add_column(overflow="fold")
    notes = {
        "meets": f"{audit.provisional():,} of these and the breaches are provisional: they rest on an assumption",
        "breach": f"a finding each{of_ranges}",
        "unproven": "a datum is missing; see data to collect",
        "not applicable": f"a plant fact makes it so; for {audit.without_evidence():,} no optional evidence was given",
    }
    for name, note in notes.items():
        table.add_row(f"{counts[name]:,}", name, note)
    return table


def _severity_table(audit: Audit) -> Table:
    table = Table(box=None, pad_edge=False, show_header=False)
    table.add_column(justify="right")
    table.add_column()
    table.add_column(overflow="fold")
    for severity, number in audit.by_severity().items():
        table.add_row(f"{number:,}", severity_word(severity), MEANING[severity])
    return table
