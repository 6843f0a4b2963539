"""What a cell of a workbook can hold once it has been opened."""

from __future__ import annotations

from dataclasses import dataclass
from datetime import date, datetime, time, timedelta
from typing import TypeAlias


@dataclass(frozen=True, slots=True)
class CellError:
    """A cell that shows an error of the spreadsheet program, such as `#REF!`."""

    code: str

    def __str__(self) -> str:
        """Show the code as the cell does."""
        return self.code


@dataclass(frozen=True, slots=True)
class UncachedFormula:
    """A cell with a formula whose result was never saved; what it would show is not known."""

    def __str__(self) -> str:
        """Say what the cell holds."""
        return "formula without a saved result"


CellValue: TypeAlias = (
    str | float | int | bool | date | datetime | time | timedelta | CellError | UncachedFormula | None
)
"""A value of a cell; None is a blank one."""
