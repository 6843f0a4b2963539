"""The same workbook saved as .xls, .ods and .xlsx by another program tells the same."""

from __future__ import annotations

import shutil
import subprocess

import openpyxl
import pytest
from openpyxl.styles import Font

from audit.intake.cells import CellError
from audit.intake.opening import open_workbook

OFFICE = shutil.which("soffice")


@pytest.mark.slow
@pytest.mark.skipif(OFFICE is None, reason="LibreOffice is not installed")
@pytest.mark.parametrize("kind", ["xlsx", "xls", "ods"])
def test_another_program_saves_what_is_read_here(kind, tmp_path):
    book = openpyxl.Workbook()
    sheet = book.active
    sheet.title = "Motors"
    for row in range(1, 8):
        for column in range(1, 6):
            sheet.cell(row, column, row * 10 + column)
    sheet["B2"], sheet["C3"], sheet["D4"], sheet["A6"] = 0.85, "=1/0", "=A1+1", "=NA()"
    sheet["B2"].number_format, sheet["B7"].number_format = "0.0%", '0" %"'
    sheet["E5"] = "old"
    sheet["E5"].font = Font(strike=True)
    sheet.row_dimensions[5].hidden = True
    sheet.column_dimensions["D"].hidden = True
    sheet.merge_cells("A1:B1")
    book.create_sheet("Notes")["A1"] = "n"
    book["Notes"].sheet_state = "hidden"
    made = tmp_path / "made.xlsx"
    book.save(made)
    profile = f"-env:UserInstallation={(tmp_path / 'profile').as_uri()}"
    subprocess.run(
        [str(OFFICE), profile, "--headless", "--convert-to", kind, "--outdir", str(tmp_path / "out"), str(made)],
        check=True,
        capture_output=True,
        timeout=120,
    )
    opened = open_workbook(tmp_path / "out" / f"made.{kind}")
    motors, notes = opened.sheets
    assert (motors.hidden, notes.hidden) == (False, True)
    assert motors.rows[0] == [11, None, 13, 14, 15]
    assert (motors.rows[2][2], motors.rows[3][3], motors.rows[5][0]) == (CellError("#DIV/0!"), 12, CellError("#N/A"))
    assert [bool(flag) for flag in motors.percent_in_column(2)] == [False, True] + [False] * 5
    assert (motors.hidden_rows, motors.hidden_columns) == ({5}, {4})
    assert motors.merged == ((1, 1, 1, 2),)
    if kind == "ods":
        assert motors.notes == ("struck-through text is not known for .ods",)
    else:
        assert motors.struck_in_column(5).tolist() == [False] * 4 + [True] + [False] * 2
