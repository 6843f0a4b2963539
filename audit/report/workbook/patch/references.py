"""References to cells as text, single cells and ranges."""

from __future__ import annotations

import re

from audit.fleet.addresses import a1, column_number

_CELL = re.compile(r"\$?([A-Za-z]{1,3})\$?([1-9][0-9]{0,6})")


def cell_of(reference: str) -> tuple[int, int] | None:
    """Row and column of a single cell.

    >>> cell_of("F17"), cell_of("$AA$3"), cell_of("F")
    ((17, 6), (3, 27), None)
    """
    found = _CELL.fullmatch(reference.strip())
    return (int(found[2]), column_number(found[1])) if found else None


def range_of(reference: str) -> tuple[int, int, int, int] | None:
    """First row, first column, last row and last column of a range.

    >>> range_of("A1:C3"), range_of("B2")
    ((1, 1, 3, 3), (2, 2, 2, 2))
    """
    first, _, last = reference.partition(":")
    start, end = cell_of(first), cell_of(last or first)
    if start is None or end is None:
        return None
    return (*start, *end)


def range_text(first_row: int, first_column: int, last_row: int, last_column: int) -> str:
    """Name of a range, of a single cell where it is one.

    >>> range_text(1, 1, 3, 3), range_text(2, 2, 2, 2)
    ('A1:C3', 'B2')
    """
    first, last = a1(first_row, first_column), a1(last_row, last_column)
    return first if first == last else f"{first}:{last}"
