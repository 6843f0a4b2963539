"""Addresses of cells: sheet, row and column in one integer, so that an address travels in an array.

A packed address is below 2**53, hence exact in a float64 as well. Rows and columns count from 1 as a
spreadsheet program shows them; sheets count from 0 in the order in which a `SheetBook` met them.
"""

from __future__ import annotations

from collections.abc import Iterable
from dataclasses import dataclass, field
from typing import NamedTuple

import numpy as np
from numpy.typing import ArrayLike, NDArray

NO_CELL = -1
"""Stands where a value comes from no cell."""

COLUMN_BITS = 15
ROW_BITS = 22
SHEET_BITS = 15
LAST_COLUMN = 2**COLUMN_BITS - 1
LAST_ROW = 2**ROW_BITS - 1
LAST_SHEET_INDEX = 2**SHEET_BITS - 1


class Place(NamedTuple):
    """A cell as a reader looks for it."""

    file: str
    sheet: str
    cell: str


def column_letters(column: int) -> str:
    """Letters of a column that counts from 1.

    >>> column_letters(1), column_letters(27), column_letters(16384)
    ('A', 'AA', 'XFD')
    """
    if column < 1:
        raise ValueError(f"columns count from 1, not {column}")
    letters = ""
    while column:
        column, remainder = divmod(column - 1, 26)
        letters = chr(ord("A") + remainder) + letters
    return letters


def column_number(letters: str) -> int:
    """Number of a column, from 1.

    >>> column_number("A"), column_number("AA"), column_number("xfd")
    (1, 27, 16384)
    """
    number = 0
    for letter in letters.upper():
        if not "A" <= letter <= "Z":
            raise ValueError(f"{letters!r} is not a column: letters A to Z only")
        number = number * 26 + ord(letter) - ord("A") + 1
    if not number:
        raise ValueError("a column has at least one letter")
    return number


def a1(row: int, column: int) -> str:
    """Name of a cell as a spreadsheet program shows it.

    >>> a1(17, 6)
    'F17'
    """
    if row < 1:
        raise ValueError(f"rows count from 1, not {row}")
    return f"{column_letters(column)}{row}"


def pack(sheet_index: ArrayLike, row: ArrayLike, column: ArrayLike) -> NDArray[np.int64]:
    """Pack sheet, row and column into one integer each; arrays broadcast.

    Examples
    --------
    >>> [part.item() for part in unpack(pack(2, 17, 6))]
    [2, 17, 6]
    """
    sheet_index = np.asarray(sheet_index, dtype=np.int64)
    row = np.asarray(row, dtype=np.int64)
    column = np.asarray(column, dtype=np.int64)
    for name, numbers, first, last in (
        ("sheet index", sheet_index, 0, LAST_SHEET_INDEX),
        ("row", row, 1, LAST_ROW),
        ("column", column, 1, LAST_COLUMN),
    ):
        if numbers.size and (numbers.min() < first or numbers.max() > last):
            raise ValueError(f"{name} lies outside {first} to {last}")
    return np.asarray((sheet_index << (ROW_BITS + COLUMN_BITS)) | (row << COLUMN_BITS) | column, dtype=np.int64)


def unpack(
    addresses: ArrayLike,
) -> tuple[NDArray[np.int64], NDArray[np.int64], NDArray[np.int64]]:
    """Sheet indexes, rows and columns of packed addresses; `NO_CELL` gives -1, 0 and 0."""
    packed = np.asarray(addresses, dtype=np.int64)
    known = packed >= 0
    sheet_index = np.where(known, packed >> (ROW_BITS + COLUMN_BITS), -1)
    row = np.where(known, (packed >> COLUMN_BITS) & LAST_ROW, 0)
    column = np.where(known, packed & LAST_COLUMN, 0)
    return sheet_index, row, column


@dataclass
class SheetBook:
    """The sheets of a run: index to file and sheet name.

    Examples
    --------
    >>> book = SheetBook()
    >>> index = book.index("motors.xlsx", "MCC 3")
    >>> book.place(pack(index, 17, 6))
    Place(file='motors.xlsx', sheet='MCC 3', cell='F17')
    """

    sheets: list[tuple[str, str]] = field(default_factory=list)
    _indexes: dict[tuple[str, str], int] = field(default_factory=dict, repr=False)

    def __post_init__(self) -> None:
        """Know the sheets given at the start."""
        self._indexes = {sheet: index for index, sheet in enumerate(self.sheets)}

    def index(self, file: str, sheet: str) -> int:
        """Index of a sheet, given out at the first call."""
        known = self._indexes.get((file, sheet))
        if known is not None:
            return known
        index = len(self.sheets)
        if index > LAST_SHEET_INDEX:
            raise ValueError(f"more than {LAST_SHEET_INDEX + 1} sheets in one run")
        self.sheets.append((file, sheet))
        self._indexes[(file, sheet)] = index
        return index

    def place(self, address: int | np.integer | NDArray[np.int64]) -> Place | None:
        """File, sheet and cell of one packed address; None for `NO_CELL`."""
        sheet_index, row, column = unpack(int(address))
        if sheet_index < 0:
            return None
        file, sheet = self.sheets[int(sheet_index)]
        return Place(file, sheet, a1(int(row), int(column)))

    def places(self, addresses: Iterable[int]) -> list[Place | None]:
        """Places of several packed addresses, in their order."""
        return [self.place(address) for address in addresses]
