"""How the workbooks were understood, on the terminal: every column, its quantity, a sample value."""

from __future__ import annotations

from itertools import groupby

from rich.console import Console
from rich.text import Text

from audit.intake.gathered import Gathered
from audit.report.terminal.style import counted
from audit.report.terminal.tables import open_table, print_heading
from audit.vocabulary.quantities import vocabulary


def print_reading(gathered: Gathered, console: Console) -> None:
    """Print every column of every sheet as it was read."""
    known = vocabulary().quantities
    for (file, sheet), columns in groupby(gathered.columns, key=lambda column: (column.file, column.sheet)):
        as_read = next((s for s in gathered.sheets if s.file == file and s.sheet == sheet), None)
        kind = (
            f" · {as_read.table} list, layout {as_read.layout}, headers in row {as_read.header_row}" if as_read else ""
        )
        print_heading(console, f"{file} › {sheet}{kind}")
        table = open_table("cell", "header", "read as", "unit or base", "for instance", "how")
        for column in columns:
            labels = [known[name].label for name in column.quantity.split(", ") if name in known]
            read_as = f"{'; '.join(labels)} ({column.quantity})" if labels else column.quantity or "unread"
            unit = " ".join(part for part in (column.unit, column.base) if part)
            cells = (column.cell, column.header, read_as, unit, column.sample, column.how)
            table.add_row(*[Text(cell) for cell in cells])
        console.print(table)
    unread = sum(not column.quantity for column in gathered.columns)
    console.print()
    console.print(
        f"{counted(len(gathered.columns), 'column')}, {unread} unread, {counted(len(gathered.questions), 'question')}"
    )
    for question in gathered.questions:
        place = " › ".join(part for part in (question.file, question.sheet, question.cell) if part)
        console.print(Text(f"asked: {place}: {question.about}. {question.ask}"))
