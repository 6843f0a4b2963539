"""Tables as text: separator, encoding and decimal mark are found; cells stay what was written."""

from __future__ import annotations

import csv
import io

import pytest
from hypothesis import given
from hypothesis import strategies as st

from audit.intake.opening import UnreadableWorkbook, open_workbook
from audit.intake.opening.text_table import read_text_table

ROWS = [["Tag", "Läge", "kW"], ["P-101", "01", "37.5"], ["NA", "", "1.5"]]


def as_text(rows, separator):
    text = io.StringIO(newline="")
    csv.writer(text, delimiter=separator).writerows(rows)
    return text.getvalue()


@pytest.mark.parametrize("separator", [",", ";", "\t", "|"])
@pytest.mark.parametrize("encoding", ["utf-8", "utf-8-sig", "utf-16", "utf-16-le", "cp1252"])
def test_separator_and_encoding_are_found(separator, encoding, tmp_path):
    path = tmp_path / "list.csv"
    path.write_bytes(as_text(ROWS, separator).encode(encoding))
    opened = open_workbook(path)
    assert opened.sheets[0].rows == [["Tag", "Läge", "kW"], ["P-101", "01", "37.5"], ["NA", None, "1.5"]]
    assert opened.sheets[0].name == "list"
    assert opened.remarks[0].startswith("read as text")


def test_a_decimal_comma_between_semicolons_is_no_separator(tmp_path):
    path = tmp_path / "list.csv"
    path.write_text("Tag;kW;A\nP-101;37,5;68,2\nP-102;1.250,5;2,25\n", encoding="utf-8")
    sheet = open_workbook(path).sheets[0]
    assert sheet.rows[1] == ["P-101", "37,5", "68,2"]
    assert sheet.decimal_comma is True


@pytest.mark.parametrize(("cells", "comma"), [("0.86;1,234", False), ("1,234;5", None), ("0,86;0.86", None)])
def test_the_decimal_mark_of_a_file_is_told_only_where_it_is_clear(cells, comma, tmp_path):
    path = tmp_path / "list.csv"
    path.write_text(f"a;b\n{cells}\n", encoding="utf-8")
    assert open_workbook(path).sheets[0].decimal_comma is comma


def test_a_title_above_the_table_does_not_hide_the_separator(tmp_path):
    path = tmp_path / "list.csv"
    path.write_text("Motor list\n\nTag;kW\nP-101;37\n", encoding="utf-8")
    assert open_workbook(path).sheets[0].rows == [["Motor list", None], [None, None], ["Tag", "kW"], ["P-101", "37"]]


def test_a_line_that_names_the_separator_is_obeyed_and_not_counted(tmp_path):
    path = tmp_path / "list.csv"
    path.write_bytes(b"sep=|\r\nTag|Note\r\nP-101|a;b;c\r\n")
    assert open_workbook(path).sheets[0].rows == [["Tag", "Note"], ["P-101", "a;b;c"]]


def test_quoted_cells_may_hold_separators_and_line_breaks(tmp_path):
    path = tmp_path / "list.csv"
    path.write_text('Tag,Note\nP-101,"one, two\nthree"\n', encoding="utf-8")
    assert open_workbook(path).sheets[0].rows[1] == ["P-101", "one, two\nthree"]


def test_a_cell_without_an_end_is_refused_with_its_row(tmp_path):
    path = tmp_path / "list.csv"
    path.write_text('Tag,Note\nP-101,"' + "x" * 200_000, encoding="utf-8")
    with pytest.raises(UnreadableWorkbook, match="row 2"):
        open_workbook(path)


def test_a_table_of_too_many_cells_is_refused(tmp_path):
    path = tmp_path / "list.csv"
    path.write_text(",".join("a" * 20_000) + "\n" + "b\n" * 1_000, encoding="utf-8")
    with pytest.raises(UnreadableWorkbook, match="cells"):
        open_workbook(path)


cells = st.text(alphabet=st.characters(exclude_categories=["C"]), min_size=1, max_size=8)


@given(
    st.lists(st.lists(cells, min_size=3, max_size=3), min_size=2, max_size=6), st.sampled_from([",", ";", "\t", "|"])
)
def test_whatever_was_written_is_read_back(tmp_path_factory, rows, separator):
    header = ["Tag", "kW", "Amps"]
    grid, _ = read_text_table(tmp_path_factory.getbasetemp() / "x.csv", as_text([header, *rows], separator).encode())
    # a text full of other separators may be cut otherwise; the header decides wherever the cells do not
    if not any(mark in cell for row in rows for cell in row for mark in ',;\t|"'):
        assert grid.rows == [header, *rows]
