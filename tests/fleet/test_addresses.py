"""Addresses in one integer: they go in and come out, and stay exact in a float."""

from __future__ import annotations

import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st
from openpyxl.utils import column_index_from_string, get_column_letter

from audit.fleet.addresses import (
    LAST_COLUMN,
    LAST_ROW,
    LAST_SHEET_INDEX,
    NO_CELL,
    SheetBook,
    a1,
    column_letters,
    column_number,
    pack,
    unpack,
)

places = st.tuples(st.integers(0, LAST_SHEET_INDEX), st.integers(1, LAST_ROW), st.integers(1, LAST_COLUMN))


@given(st.lists(places, min_size=1))
def test_packed_addresses_come_out_as_they_went_in(cells):
    sheet, row, column = (np.array(part) for part in zip(*cells, strict=True))
    addresses = pack(sheet, row, column)
    assert [part.tolist() for part in unpack(addresses)] == [sheet.tolist(), row.tolist(), column.tolist()]
    assert (addresses < 2**53).all()
    assert (addresses.astype(np.float64).astype(np.int64) == addresses).all()


@given(places, places)
def test_packed_addresses_sort_by_sheet_then_row_then_column(one, other):
    assert (one < other) == (pack(*one) < pack(*other)).item()


def test_a_sheet_of_the_largest_size_fits():
    # ECMA-376: 1,048,576 rows and 16,384 columns
    assert a1(1_048_576, 16_384) == "XFD1048576"
    assert LAST_ROW >= 1_048_576
    assert LAST_COLUMN >= 16_384


@pytest.mark.parametrize(
    "cell", [(-1, 1, 1), (0, 0, 1), (0, 1, 0), (LAST_SHEET_INDEX + 1, 1, 1), (0, 1, LAST_COLUMN + 1)]
)
def test_an_address_outside_of_a_sheet_is_refused(cell):
    with pytest.raises(ValueError, match="outside"):
        pack(*cell)


@given(st.integers(1, 16_384))
def test_column_letters_agree_with_a_spreadsheet_library(column):
    # outside check: openpyxl
    assert column_letters(column) == get_column_letter(column)
    assert column_number(get_column_letter(column)) == column_index_from_string(get_column_letter(column))


@pytest.mark.parametrize("letters", ["", "A1", "Ä"])
def test_what_is_no_column_is_refused(letters):
    with pytest.raises(ValueError, match="column"):
        column_number(letters)


def test_a_book_gives_one_index_to_a_sheet_and_finds_the_cell_again():
    book = SheetBook()
    first, second = book.index("a.xlsx", "MCC 1"), book.index("b.xlsx", "MCC 1")
    assert (first, second, book.index("a.xlsx", "MCC 1")) == (0, 1, 0)
    assert book.places([int(pack(second, 7, 28)), NO_CELL]) == [("b.xlsx", "MCC 1", "AB7"), None]
