"""Several sites on the terminal."""

from __future__ import annotations

from collections.abc import Sequence
from pathlib import Path

from rich.console import Console
from rich.padding import Padding
from rich.table import Table
from rich.text import Text

from audit.cautions import SHORT_CAUTION
from audit.checks.entry import SEVERITIES
from audit.expression.text import plain_number
from audit.report.sites.summary import SitesSummary
from audit.report.terminal.style import LETTER, counted, severity_word

MOST_LINES = 25


def show_sites(summary: SitesSummary, console: Console, written: Sequence[Path], *, everything: bool = False) -> None:
    """Print the summary of several sites."""
    most = None if everything else MOST_LINES
    sites = summary.sites()
    if summary.types:
        number = counted(len(summary.types), "setting")
        _heading(console, f"Same motor type, other settings · {number} (currents as multiples of full load)")
        rows = [
            [one.motor_type, one.label, one.unit, *(_figure(one.by_site.get(site)) for site in sites)]
            for one in summary.types[:most]
        ]
        _table(console, ["motor type", "setting", "", *sites], rows, len(summary.types))
    if summary.common:
        everywhere = sum(one.everywhere for one in summary.common)
        _heading(
            console,
            f"In common · {counted(len(summary.common), 'check')} at two sites or more, {everywhere} everywhere",
        )
        common: list[list[str | Text]] = [
            [one.function, severity_word(one.severity), one.says, *(_count(one.by_site.get(site, 0)) for site in sites)]
            for one in summary.common[:most]
        ]
        _table(console, ["function", "severity", "says", *sites], common, len(summary.common))
    _heading(console, "Findings by function")
    functions = [[name, *(_count(of[site]) for site in sites)] for name, of in summary.by_function.items()]
    _table(console, ["function", *sites], functions, len(functions))
    _heading(console, f"{counted(len(summary.results), 'site')}")
    _sites(summary, console)
    console.print()
    for path in written:
        console.print(Text(f"written: {path}"))
    console.print(Text(SHORT_CAUTION, "italic"))


def _sites(summary: SitesSummary, console: Console) -> None:
    rows: list[list[str | Text]] = []
    for result in summary.results:
        if result.record is None:
            rows.append([result.site, "", *[""] * len(SEVERITIES), f"could not be audited: {result.problem}"])
            continue
        counts = result.record.content["counts"]
        severities = [_count(counts["by_severity"][severity]) for severity in SEVERITIES]
        rows.append([result.site, f"{counts['motors']:,}", *severities, str(result.out)])
    _table(console, ["site", "motors", *(LETTER[severity] for severity in SEVERITIES), "record"], rows, len(rows))


def _heading(console: Console, text: str) -> None:
    console.print()
    console.rule(Text(text, "bold"), align="left", style="default")


def _table(console: Console, headings: Sequence[str], rows: Sequence[Sequence[str | Text]], number: int) -> None:
    table = Table(box=None, pad_edge=False, header_style="italic")
    for heading in headings:
        table.add_column(heading, overflow="fold")
    for row in rows:
        table.add_row(*[cell if isinstance(cell, Text) else Text(cell) for cell in row])
    console.print(Padding(table, (0, 0, 0, 2)))
    if number > len(rows):
        console.print(f"  … and {number - len(rows):,} more, all in sites.json and sites.xlsx")


def _figure(value: float | None) -> str:
    return "" if value is None else plain_number(value)


def _count(number: int) -> str:
    return f"{number:,}" if number else ""
