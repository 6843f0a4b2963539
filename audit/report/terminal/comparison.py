"""A comparison on the terminal: what changed, what it breaks, whom it touches, what is to be looked at."""

from __future__ import annotations

from collections.abc import Iterable, Sequence
from itertools import groupby
from pathlib import Path

from rich.console import Console
from rich.padding import Padding
from rich.table import Table
from rich.text import Text

from audit.cautions import SHORT_CAUTION
from audit.findings.comparison import Comparison
from audit.findings.comparison.changes import Change
from audit.findings.comparison.looked_at import BY_HAND, LookedAt
from audit.findings.comparison.provable import ProofChange
from audit.findings.comparison.standing import FindingChange
from audit.findings.comparison.steps import Chain, chain_words
from audit.findings.comparison.touched import Touched
from audit.report.terminal.style import WIDE, counted, severity_word

MOST_LINES = 30
MOST_NAMES = 4
SILENT = ("looked at, no action", "looked at, does not apply")
"""What needs nobody's attention is counted; the workbook lists it for the signature."""


def show_comparison(
    comparison: Comparison, console: Console, written: Sequence[Path] = (), *, everything: bool = False
) -> None:
    """Print a comparison, the summary last."""
    shown = Printer(console, everything=everything)
    shown.changed(comparison)
    shown.findings(comparison)
    shown.proofs("No longer provable", comparison.no_longer_provable)
    shown.touched(comparison)
    shown.looked_at(comparison)
    console.print()
    console.rule(style="default")
    _summary(comparison, console)
    console.print()
    for path in written:
        console.print(Text(f"written: {path}"))
    console.print(Text(SHORT_CAUTION, "italic"))


class Printer:
    """Prints the tables of a comparison."""

    def __init__(self, console: Console, *, everything: bool) -> None:
        self.console = console
        self.most = None if everything else MOST_LINES
        self.wide = console.width >= WIDE

    def heading(self, text: str) -> None:
        """Print the heading of a table."""
        self.console.print()
        self.console.rule(Text(text, "bold"), align="left", style="default")

    def table(self, headings: Sequence[str], rows: Sequence[Sequence[str | Text]], *, ratio: int = -1) -> None:
        """Print a table, the longest ones cut with a word on what was left out."""
        table = Table(box=None, pad_edge=False, header_style="italic")
        for place, heading in enumerate(headings):
            table.add_column(heading, overflow="fold", ratio=1 if place == ratio % len(headings) else None)
        for row in rows[: self.most]:
            table.add_row(*[cell if isinstance(cell, Text) else Text(cell) for cell in row])
        self.console.print(Padding(table, (0, 0, 0, 2)))
        left = len(rows) - len(rows[: self.most])
        if left:
            self.console.print(f"  … and {left:,} more, all in comparison.json and in the workbook")

    def changed(self, comparison: Comparison) -> None:
        """Print what was changed, added and removed."""
        number = len(comparison.changed) + len(comparison.rows)
        self.heading(f"Changed · {counted(number, 'change')}")
        if comparison.rows:
            self.table(
                ("", "name", "bus"),
                [(f"{row.subject} {row.kind}", row.name, row.bus or row.motor) for row in comparison.rows],
            )
        if comparison.changed:
            headings = ["of", "what", "before", "after", *(["cell"] if self.wide else [])]
            self.table(headings, [self._change(change) for change in comparison.changed], ratio=1)
        for starts in comparison.starts[: self.most]:
            self.console.print(Text(f"  {starts.motor}: recorded starts, {starts.words()}"))
        for relay in comparison.relays[: self.most]:
            names = ", ".join((*relay.settings, *(f"{label} (follows)" for label in relay.follow)))
            of = f" of {relay.motor}" if relay.motor and relay.motor != relay.relay else ""
            self.console.print(Padding(Text(f"export of relay {relay.relay}{of} differs: {names}"), (0, 0, 0, 2)))
        if not number and not comparison.starts:
            self.console.print("  nothing")

    def _change(self, change: Change) -> list[str]:
        note = f", follows {', '.join(change.follows)}" if change.follows else ""
        cells = [
            change.name if change.subject == "motor" else f"{change.subject} {change.name}",
            f"{change.label}{note}",
            change.before_text,
            change.after_text,
        ]
        place = change.after_cell or change.before_cell
        if self.wide:
            cells.append(f"{place.file} › {place.sheet} › {place.cell}" if place else "")
        return cells

    def findings(self, comparison: Comparison) -> None:
        """Print the findings by how they stand; those still there are counted only."""
        counts = comparison.standing_counts()
        self.heading(f"Findings · {', '.join(f'{number:,} {standing}' for standing, number in counts.items())}")
        merged: dict[tuple[str, str, str, str], list[str]] = {}
        for finding in comparison.findings:
            if finding.standing != "still there":
                told = finding.standing, finding.severity, finding.check, _because_of(finding)
                merged.setdefault(told, []).append(finding.name)
        rows: list[list[str | Text]] = [
            [standing, severity_word(severity), _names(names), check, because]
            for (standing, severity, check, because), names in merged.items()
        ]
        if rows:
            self.table(("", "severity", "of", "check", "because"), rows)

    def proofs(self, heading: str, proofs: Sequence[ProofChange]) -> None:
        """Print the verdicts that were lost, and what is lacking."""
        if not proofs:
            return
        self.heading(f"{heading} · {counted(len(proofs), 'verdict')}")
        rows = [
            (one.name, one.check, f"was {one.before}; lacking: {', '.join(one.lacking)}{_because(one.chain)}")
            for one in proofs
        ]
        self.table(("of", "check", "because"), rows)

    def touched(self, comparison: Comparison) -> None:
        """Print whom changes of others touch, by the change that does."""
        number = counted(len(comparison.touched), "move")
        self.heading(f"Touched by changes of others · {number}, of figures over {comparison.share_pct:g} %")
        if not comparison.touched:
            self.console.print("  nobody")
        by_root: dict[str, list[Touched]] = {}
        for one in comparison.touched:
            by_root.setdefault(chain_words(one.chain)[0], []).append(one)
        for root, group in by_root.items():
            self.console.print(Text(f"  {root}", "bold"))
            merged: dict[tuple[str, ...], list[str]] = {}
            for one in group:
                way = " -> ".join(chain_words(one.chain)[1:])
                merged.setdefault((one.what, one.before_text, one.after_text, way), []).append(one.name)
            self.table(
                ("of", "what moved", "before", "after", "over"),
                [(_names(names), *told) for told, names in merged.items()],
            )

    def looked_at(self, comparison: Comparison) -> None:
        """Print what has to be looked at again, change by change, with its verdicts."""
        pairs = sum(len(one.names) for one in comparison.looked_at)
        by_hand = sum(not one.names for one in comparison.looked_at)
        if not comparison.looked_at:
            return
        self.heading(f"Looked at because of the changes · {counted(pairs, 'verdict')}, {by_hand:,} by hand")
        for _, group in groupby(comparison.looked_at, key=lambda one: (one.change, one.subject, one.name)):
            entries = list(group)
            self.console.print(Text(f"  {entries[0].subject} {entries[0].name}: {entries[0].change_says}", "bold"))
            told: dict[str, int] = {}
            for one in entries:
                told[one.action] = told.get(one.action, 0) + max(len(one.names), 1)
            self.console.print(Text("    " + "; ".join(f"{number:,} {action}" for action, number in told.items())))
            self.table(("check", "verdict", "of"), [_open_line(one) for one in entries if one.action not in SILENT])


def _open_line(one: LookedAt) -> tuple[str, str, str]:
    return one.check, one.verdict or BY_HAND, _names(one.names) or one.at


def _names(names: Sequence[str]) -> str:
    more = f" … ({len(names)} in all)" if len(names) > MOST_NAMES else ""
    return ", ".join(names[:MOST_NAMES]) + more


def _because_of(finding: FindingChange) -> str:
    margins = ""
    if finding.margin_before_pct is not None and finding.margin_after_pct is not None:
        margins = f"margin {finding.margin_before_pct:.1f} % to {finding.margin_after_pct:.1f} %; "
    return finding.why_gone or f"{margins}{finding.after_text or finding.before_text}"


def _because(chain: Chain) -> str:
    return f" ({' -> '.join(chain_words(chain))})" if chain else ""


def _summary(comparison: Comparison, console: Console) -> None:
    before, after = comparison.before, comparison.after
    console.print(Text(f"{after.fleet.site} · comparison of two states", "bold"))
    for word, audit, source in zip(("before", "after"), (before, after), comparison.sources, strict=True):
        motors = counted(audit.fleet.rows("motor"), "motor")
        console.print(Text(f"{word}: {source}, {motors}, judged as of {audit.audited_on.isoformat()}"))
    for one in comparison.supposed:
        console.print(Text(f"supposed: {one.subject} {one.name}, {one.label} {one.supposed} (read: {one.was})"))
    for notice in comparison.notices:
        console.print(Text(f"note: {notice}"))
    lines: Iterable[tuple[int, str]] = (
        (len(comparison.changed), "data and settings changed"),
        (len(comparison.rows), "motors, relays and buses added or removed"),
        *((number, f"findings {standing}") for standing, number in comparison.standing_counts().items()),
        (sum(len(one.names) for one in comparison.looked_at), "verdicts looked at because of the changes"),
        (sum(not one.names for one in comparison.looked_at), "things to be looked at by hand"),
        (len(comparison.no_longer_provable), "verdicts that can no longer be given"),
        (len({(one.subject, one.name) for one in comparison.touched}), "motors, relays, buses and groups touched"),
    )
    table = Table(box=None, pad_edge=False, show_header=False)
    table.add_column(justify="right")
    table.add_column()
    for number, text in lines:
        table.add_row(f"{number:,}", text)
    console.print(table)
