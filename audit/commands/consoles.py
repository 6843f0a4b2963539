"""Where tables and progress go: to the terminal, or to stderr when stdout is piped."""

from __future__ import annotations

import os
import sys

from rich.console import Console

NARROWEST = 60


def table_console() -> Console:
    """Give the console for tables: stdout on a terminal, stderr when stdout is piped."""
    stream = sys.stdout if sys.stdout.isatty() else sys.stderr
    width = int(os.environ["COLUMNS"]) if os.environ.get("COLUMNS", "").isdigit() else None
    return Console(file=stream, highlight=False, width=max(width, NARROWEST) if width else None, soft_wrap=False)


def progress_console() -> Console:
    """Give the console for progress, always stderr."""
    return Console(file=sys.stderr, highlight=False)
