"""Columns of cells: plain numbers at once, every other cell told apart, nothing turned into a number silently."""

from __future__ import annotations

import math
import time
from datetime import date, datetime, timedelta
from datetime import time as clock

import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st

from audit.intake.cells import CellError, UncachedFormula
from audit.intake.celltext import (
    KIND_CODES,
    CellKind,
    cell_text,
    read_number_cells,
    read_number_column,
    read_text_cells,
)


def kinds(cells, **options):
    return [reading.kind for reading in read_number_cells(cells, **options)]


def test_numbers_blanks_and_texts_keep_their_places():
    column = read_number_column([1.5, None, 3, "40 A", "OFF", "bad one"])
    assert column.values[[0, 2, 3]].tolist() == [1.5, 3.0, 40.0]
    assert np.isnan(column.values[[1, 4, 5]]).all()
    assert [column.kind(index) for index in range(6)] == [
        CellKind.NUMBER, CellKind.MISSING, CellKind.NUMBER, CellKind.NUMBER, CellKind.OFF, CellKind.BAD,
    ]  # fmt: skip
    assert column.reading(3).unit_text == "A"
    assert sorted(column.odd) == [3, 4, 5]


def test_the_rest_of_the_column_settles_an_open_decimal_mark():
    assert [reading.number for reading in read_number_cells(["1,234", "3,3"])] == [1.234, 3.3]
    assert [reading.number for reading in read_number_cells(["1,234", "0.86"])] == [1234.0, 0.86]
    assert kinds(["1,234", 12.5]) == [CellKind.AMBIGUOUS, CellKind.NUMBER]


def test_what_is_known_of_the_file_settles_it_too():
    assert read_number_cells(["1,234"], decimal_comma=True)[0].number == 1.234
    assert read_number_cells(["1.234"], decimal_comma=True)[0].number == 1234.0


def test_a_percentage_is_given_as_shown():
    # 0.07 * 100 is 7.000000000000001 in binary; the sheet shows 7 %
    shown = read_number_cells([0.85, 0.07, 85.0], percent=np.array([True, True, False]))
    assert [(reading.number, reading.unit_text) for reading in shown] == [(85.0, "%"), (7.0, "%"), (85.0, "")]


def test_a_text_in_a_cell_with_percent_format_is_read_as_written():
    assert read_number_cells(["85%"], percent=np.array([True]))[0].number == 85.0


@pytest.mark.parametrize("cell", [date(2025, 2, 1), datetime(2025, 2, 1)])
def test_a_date_among_numbers_names_its_likely_cause(cell):
    reading = read_number_cells([cell])[0]
    assert reading.kind is CellKind.BAD
    assert "'2-1'" in reading.remark
    assert "'1/2'" in reading.remark


def test_a_clock_time_with_seconds_is_a_duration_and_without_is_asked():
    # 0:00:08 is eight seconds; a cell that shows 0:08 may be meant as 8 s and holds eight minutes
    short, open_one = read_number_cells([clock(0, 0, 8), clock(0, 8)])
    assert (short.kind, short.number, short.unit_text) == (CellKind.NUMBER, 8.0, "s")
    assert (open_one.kind, open_one.numbers) == (CellKind.AMBIGUOUS, (8.0, 480.0))
    assert read_number_cells([timedelta(hours=30, seconds=5)])[0].number == 108_005.0


def test_truths_errors_and_formulas_without_result_are_no_numbers():
    cells = [True, CellError("#REF!"), UncachedFormula(), math.nan, math.inf]
    readings = read_number_cells(cells)
    assert [reading.kind for reading in readings] == [
        CellKind.BAD, CellKind.ERROR, CellKind.ERROR, CellKind.BAD, CellKind.BAD,
    ]  # fmt: skip
    assert all(reading.remark for reading in readings)
    assert np.isnan(read_number_column(cells).values).all()


@given(
    st.lists(
        st.one_of(
            st.none(), st.floats(), st.integers(-(10**12), 10**12), st.booleans(), st.text(max_size=8), st.dates()
        )
    )
)
def test_a_value_stands_exactly_where_the_kind_is_number(cells):
    column = read_number_column(cells)
    assert (np.isfinite(column.values) == (column.kinds == KIND_CODES[CellKind.NUMBER])).all()
    assert len(column) == len(cells)


def test_plain_texts_are_read_as_singly_written_ones():
    # a file without cell types holds every number as text
    texts = [f"{number / 100:.2f}" for number in range(-500, 500)]
    assert read_number_column(texts).values.tolist() == [float(text) for text in texts]


@pytest.mark.parametrize(
    "cells", [[float(number) for number in range(100_000)], [f"{number}.25" for number in range(100_000)]]
)
def test_a_hundred_thousand_plain_cells_take_moments(cells):
    began = time.perf_counter()
    column = read_number_column(cells)
    # a generous bound: about 0.04 s and 0.7 s were measured on a busy two-core machine
    assert time.perf_counter() - began < 10
    assert column.values[-1] == float(cells[-1])


def test_a_tag_typed_as_a_number_is_its_digits():
    assert [cell_text(cell) for cell in (101.0, 101, "0012", " P-101\u00a0A ", True, None, date(2025, 4, 3))] == [
        "101", "101", "0012", "P-101 A", "TRUE", "", "2025-04-03",
    ]  # fmt: skip


def test_free_texts_tell_blank_unused_and_unconfirmed_apart():
    cells = ["Class 10", None, "-", "TBC", CellError("#N/A"), 7.0]
    assert [reading.kind for reading in read_text_cells(cells)] == [
        CellKind.TEXT, CellKind.MISSING, CellKind.NOT_USED, CellKind.TO_BE_CONFIRMED, CellKind.ERROR, CellKind.TEXT,
    ]  # fmt: skip
