"""The calculation sheet as a command."""

from __future__ import annotations

import sys
from datetime import date
from pathlib import Path

from audit.commands.consoles import progress_console
from audit.explain.sheet import CalculationSheet
from audit.pipeline import audit_path


def run_explain(
    fleet: Path, tag: str, check: str | None, *, rules: Path | None, audited_on: date | None, everything: bool
) -> int:
    """Print the calculation sheet of one motor."""
    with progress_console().status("reading", spinner="line"):
        result = audit_path(fleet, site_rules=rules, audited_on=audited_on)
    for line in CalculationSheet(result).lines(tag, check, everything=everything):
        sys.stdout.write(f"{line}\n")
    return 0
