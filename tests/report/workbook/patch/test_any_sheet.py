"""Whatever a sheet leaves out and wherever the marks fall, only the marked cells change."""

from __future__ import annotations

import tempfile
from pathlib import Path

from hypothesis import given, settings
from hypothesis import strategies as st
from openpyxl import load_workbook

from audit.fleet.addresses import column_letters
from audit.report.workbook.patch import Mark, annotate_copy, is_our_output
from tests.report.workbook.patch.fidelity import compare
from tests.report.workbook.patch.workbooks import plain_parts, write_parts

BODIES = ("", "<v>1</v>", "<f>A1</f><v>2</v>")


@st.composite
def sheet_rows(draw: st.DrawFn) -> str:
    """Rows and cells in order, some left out, some without their number or address."""
    rows, last_row = [], 0
    for row in sorted(draw(st.sets(st.integers(1, 12), max_size=6))):
        cells, last_column = [], 0
        for column in sorted(draw(st.sets(st.integers(1, 12), max_size=5))):
            bare = column == last_column + 1 and draw(st.booleans())
            address = "" if bare else f' r="{column_letters(column)}{row}"'
            style = draw(st.sampled_from(["", ' s="1"', " s='2'"]))
            body = draw(st.sampled_from(BODIES))
            cells.append(f"<c{style}{address}>{body}</c>" if body else f"<c{address}{style}/>")
            last_column = column
        number = "" if row == last_row + 1 and draw(st.booleans()) else f' r="{row}"'
        custom = draw(st.sampled_from(["", ' s="3" customFormat="1"', ' spans="1:3"']))
        rows.append(f"<row{number}{custom}>{''.join(cells)}</row>" if cells else f"<row{custom}{number}/>")
        last_row = row
    return "".join(rows)


places = st.sets(st.tuples(st.integers(1, 14), st.integers(1, 14)), min_size=1, max_size=8)


@settings(max_examples=60, deadline=None)
@given(rows=sheet_rows(), first=places, second=places)
def test_only_marked_cells_change(rows: str, first: set[tuple[int, int]], second: set[tuple[int, int]]) -> None:
    with tempfile.TemporaryDirectory() as folder:
        source = write_parts(Path(folder, "source.xlsx"), plain_parts(rows))
        once, twice = Path(folder, "once.xlsx"), Path(folder, "twice.xlsx")
        marks = [Mark("Motors", row, column, "FFC7CE", "x" * (row % 2)) for row, column in first]
        annotate_copy(source, once, marks, None)
        compare(source, once, marks, added_in_front=0)
        sheet = load_workbook(once)["Motors"]
        for row in range(1, 15):
            for column in range(1, 15):
                filled = sheet.cell(row, column).fill.fgColor.rgb == "FFFFC7CE"
                assert filled == ((row, column) in first)
                assert (sheet.cell(row, column).comment is not None) == ((row, column) in first and row % 2 == 1)
        # annotated again with other marks: as if it had been the source
        others = [Mark("Motors", row, column, "FFEB9C", "") for row, column in second]
        annotate_copy(once, twice, others, None)
        assert is_our_output(twice)
        compare(source, twice, [*marks, *others], added_in_front=0)
        sheet = load_workbook(twice)["Motors"]
        for row in range(1, 15):
            for column in range(1, 15):
                assert sheet.cell(row, column).comment is None
                colour = sheet.cell(row, column).fill.fgColor.rgb
                assert (colour == "FFFFEB9C") == ((row, column) in second)
                assert colour != "FFFFC7CE"
