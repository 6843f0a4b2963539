"""Which files of a folder are workbooks to read."""

from __future__ import annotations

from pathlib import Path

from audit.intake.opening.kinds import WORKBOOK_SUFFIXES

SUFFIXES = WORKBOOK_SUFFIXES | {".csv", ".tsv"}
LOCK_BEGINNINGS = ("~$", ".~lock.")
ACCEPTED_DEVIATIONS = "accepted_deviations"
"""Name of the table beside the workbooks that says which findings are knowingly left: no data of the site."""


def find_workbooks(folder: Path) -> list[Path]:
    """Workbooks of a folder by name, without its sub-folders, hidden files and lock files.

    A path to a file gives that file alone.
    """
    if folder.is_file():
        return [folder]
    return sorted(
        (
            entry
            for entry in folder.iterdir()
            if entry.suffix.lower() in SUFFIXES
            and entry.stem.casefold() != ACCEPTED_DEVIATIONS
            and not entry.name.startswith((".", *LOCK_BEGINNINGS))
            and entry.is_file()
        ),
        key=lambda entry: (entry.name.casefold(), entry.name),
    )
