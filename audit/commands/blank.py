"""An empty intake workbook as a command."""

from __future__ import annotations

from pathlib import Path

from audit.commands.consoles import table_console
from audit.intake.blank import write_blank


def run_blank(folder: Path) -> int:
    """Write the intake workbook."""
    for path in write_blank(folder):
        table_console().print(f"written: {path}")
    return 0
