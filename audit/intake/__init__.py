"""From workbooks to a fleet: open, find headers, read cells, resolve."""

from __future__ import annotations

from collections.abc import Callable
from pathlib import Path

from audit.fleet.fleet import Fleet
from audit.intake.gathered import CannotRead, Gathered
from audit.intake.gathering import gather
from audit.intake.resolve import resolve

__all__ = ["CannotRead", "Gathered", "gather", "read_fleet", "resolve"]


def read_fleet(path: Path, progress: Callable[[str], None] | None = None) -> Fleet:
    """Read a folder of workbooks, or one workbook, to a fleet.

    Raises
    ------
    CannotRead
        If nothing can be judged: no workbook could be read, or none holds a motor list.
    """
    gathered = gather(path, progress)
    if progress is not None:
        progress("resolving values")
    return resolve(gathered)
