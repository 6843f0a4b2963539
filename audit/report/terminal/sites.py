"""Several sites on the terminal."""

from __future__ import annotations

from collections.abc import Sequence
from pathlib import Path

from rich.console import Console
from rich.text import Text

from audit.cautions import SHORT_CAUTION
from audit.checks.entry import SEVERITIES
from audit.expression.text import plain_number
from audit.report.sites.summary import SitesSummary
from audit.report.terminal.style import LETTER, counted, severity_word
from audit.report.terminal.tables import print_heading, print_table

MOST_LINES = 25
SUMMARY = "sites.json and sites.xlsx"


def show_sites(summary: SitesSummary, console: Console, written: Sequence[Path], *, everything: bool = False) -> None:
    """Print the summary of several sites."""
    most = None if everything else MOST_LINES
    sites = summary.sites()
    if summary.types:
        number = counted(len(summary.types), "setting")
        print_heading(console, f"Same motor type, other settings · {number} (currents as multiples of full load)")
        rows = [
            [one.motor_type, one.label, one.unit, *(_figure(one.by_site.get(site)) for site in sites)]
            for one in summary.types
        ]
        print_table(console, ["motor type", "setting", "", *sites], rows, most, SUMMARY)
    if summary.common:
        everywhere = sum(one.everywhere for one in summary.common)
        print_heading(
            console,
            f"In common · {counted(len(summary.common), 'check')} at two sites or more, {everywhere} everywhere",
        )
        common: list[list[str | Text]] = [
            [one.function, severity_word(one.severity), one.says, *(_count(one.by_site.get(site, 0)) for site in sites)]
            for one in summary.common
        ]
        print_table(console, ["function", "severity", "says", *sites], common, most, SUMMARY)
    print_heading(console, "Findings by function")
    functions = [[name, *(_count(of[site]) for site in sites)] for name, of in summary.by_function.items()]
    print_table(console, ["function", *sites], functions, None, SUMMARY)
    print_heading(console, f"{counted(len(summary.results), 'site')}")
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
    headings = ["site", "motors", *(LETTER[severity] for severity in SEVERITIES), "record"]
    print_table(console, headings, rows, None, SUMMARY)


def _figure(value: float | None) -> str:
    return "" if value is None else plain_number(value)


def _count(number: int) -> str:
    return f"{number:,}" if number else ""
