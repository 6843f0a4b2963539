"""Headings and tables, alike in every part of what the terminal shows."""

from __future__ import annotations

from collections.abc import Sequence

from rich.console import Console
from rich.padding import Padding
from rich.table import Table
from rich.text import Text


def print_heading(console: Console, text: str) -> None:
    """Print the heading of a part, with an empty line above it."""
    console.print()
    console.rule(Text(text, "bold"), align="left", style="default")


def open_table(*headings: str) -> Table:
    """Give a table without lines, whose long texts fold."""
    table = Table(box=None, pad_edge=False, header_style="italic")
    for heading in headings:
        table.add_column(heading, overflow="fold")
    return table


def print_table(
    console: Console, headings: Sequence[str], rows: Sequence[Sequence[str | Text]], most: int | None, all_in: str
) -> None:
    """Print the first rows of a table, and how many more stand in the file named.

    A text without style is taken as it stands: what comes from a workbook can hold brackets that look like styles.
    """
    table = open_table(*headings)
    for row in rows[:most]:
        table.add_row(*[cell if isinstance(cell, Text) else Text(cell) for cell in row])
    console.print(Padding(table, (0, 0, 0, 2)))
    print_left_out(console, len(rows), most, all_in)


def print_left_out(console: Console, number: int, most: int | None, all_in: str) -> None:
    """Say how many lines were left out, where any were."""
    if most is not None and number > most:
        console.print(f"  … and {number - most:,} more, all in {all_in}")
