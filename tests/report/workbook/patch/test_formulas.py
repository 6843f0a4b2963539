"""Formulas that a report declares are carried with their values; every other one stays text."""

from __future__ import annotations

from collections.abc import Callable
from pathlib import Path

import pytest
from lxml import etree
from openpyxl import Workbook, load_workbook
from python_calamine import CalamineWorkbook

from audit.report.workbook.patch import SavedValues, annotate_copy, save_with_values
from tests.report.workbook.patch.workbooks import MAIN, plain_parts, read_parts, rich_parts

Write = Callable[..., Path]
VALUES: SavedValues = {"Motors": {"B1": 'a "b" & <c>', "C1": 12.5, "D1": True}}
pytestmark = pytest.mark.filterwarnings("ignore:.*extension is not supported:UserWarning")


def report_of(path: Path) -> Path:
    book = Workbook()
    sheet = book.worksheets[0]
    sheet.title = "Motors"
    sheet["A1"] = 5
    sheet["B1"] = '=IF(A1>4,"a ""b"" & <c>","")'
    sheet["C1"] = "=Motors!A1*2.5"
    sheet["D1"] = "=A1=5"
    sheet["E1"] = "=A1*100"
    book.save(path)
    return path


def test_declared_formulas_keep_text_and_value_and_others_become_text(workbook: Write, tmp_path: Path) -> None:
    report, target = report_of(tmp_path / "report.xlsx"), tmp_path / "copy.xlsx"
    annotate_copy(workbook(plain_parts()), target, [], report, formulas=VALUES)
    formulas, values = (load_workbook(target, data_only=only)["Motors (audit)"] for only in (False, True))
    assert formulas["B1"].value == '=IF(A1>4,"a ""b"" & <c>","")'
    assert formulas["C1"].value == "='Motors (audit)'!A1*2.5"
    assert [values[cell].value for cell in ("B1", "C1", "D1")] == ['a "b" & <c>', 12.5, True]
    assert formulas["E1"].value == "=A1*100"
    assert formulas["E1"].data_type in ("s", "inlineStr")
    assert CalamineWorkbook.from_path(target).get_sheet_by_name("Motors (audit)").to_python()[0][1] == 'a "b" & <c>'


def test_no_chain_of_calculation_is_added_or_touched(workbook: Write, tmp_path: Path) -> None:
    report, target, source = report_of(tmp_path / "report.xlsx"), tmp_path / "copy.xlsx", workbook(rich_parts())
    annotate_copy(source, target, [], report, formulas=VALUES)
    before, after = read_parts(source), read_parts(target)
    chains = [name for name in after if "calcChain" in name]
    assert chains == [name for name in before if "calcChain" in name]
    assert all(before[name] == after[name] for name in chains)


def test_a_workbook_of_our_own_has_the_values_too(tmp_path: Path) -> None:
    book = load_workbook(report_of(tmp_path / "report.xlsx"))
    save_with_values(book, tmp_path / "own.xlsx", VALUES)
    values = load_workbook(tmp_path / "own.xlsx", data_only=True)["Motors"]
    assert [values[cell].value for cell in ("B1", "C1", "D1", "E1")] == ['a "b" & <c>', 12.5, True, None]
    part = etree.fromstring(read_parts(tmp_path / "own.xlsx")["xl/worksheets/sheet1.xml"])
    assert len(list(part.iter(f"{{{MAIN}}}f"))) == 4
    assert [path.name for path in tmp_path.iterdir() if path.name.startswith(".")] == []
