"""Where tables and progress go: tables to stdout, so that they can be kept in a file; progress to stderr."""

from __future__ import annotations

import os
import sys

from rich.console import Console

NARROWEST = 60


def table_console() -> Console:
    """Give the console for tables; a command that prints JSON on stdout prints no tables."""
    width = int(os.environ["COLUMNS"]) if os.environ.get("COLUMNS", "").isdigit() else None
    return Console(file=sys.stdout, highlight=False, width=max(width, NARROWEST) if width else None, soft_wrap=False)


def progress_console() -> Console:
    """Give the console for progress, always stderr."""
    return Console(file=sys.stderr, highlight=False)
