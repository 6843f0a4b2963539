"""From workbooks to a fleet: open, find headers, read cells, resolve."""

from __future__ import annotations

from collections.abc import Callable
from pathlib import Path

from audit.fleet.fleet import Complaint, Fleet
from audit.intake.gathered import CannotRead, Gathered
from audit.intake.gathering import gather
from audit.intake.resolve import resolve

MOST_HEADERS = 8

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
    gathered.complaints.extend(unread_columns(gathered))
    return resolve(gathered)


def unread_columns(gathered: Gathered) -> list[Complaint]:
    """Say for each workbook which columns with something in them were not read, so that none is lost in silence."""
    unread: dict[tuple[str, str], list[str]] = {}
    for column in gathered.columns:
        if not column.quantity and column.how.startswith(("unread", "proposed")) and column.header.strip():
            unread.setdefault((column.file, column.sheet), []).append(f"'{' '.join(column.header.split())}'")
    return [
        Complaint(
            file,
            sheet,
            "",
            f"{len(headers)} column{'s' if len(headers) > 1 else ''} not read: {', '.join(headers[:MOST_HEADERS])}"
            + (" …" if len(headers) > MOST_HEADERS else ""),
            "headers that name a quantity",
            "'motor-audit columns' shows how each column was understood; fleet.toml can name what it holds.",
            weight="remark",
        )
        for (file, sheet), headers in unread.items()
    ]
