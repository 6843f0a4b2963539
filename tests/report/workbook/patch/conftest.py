"""A report as the project builds one, and workbooks to annotate."""

from __future__ import annotations

from collections.abc import Callable
from pathlib import Path

import pytest
from openpyxl import Workbook
from openpyxl.chart import BarChart, Reference
from openpyxl.formatting.rule import CellIsRule, DataBarRule
from openpyxl.styles import Font, PatternFill
from openpyxl.worksheet.datavalidation import DataValidation
from openpyxl.worksheet.table import Table

from tests.report.workbook.patch.workbooks import Parts, write_parts


@pytest.fixture
def report(tmp_path: Path) -> Path:
    """Cover, Findings and Motors with everything that is to be carried over."""
    book = Workbook()
    cover = book.active
    assert cover is not None
    cover.title = "Cover"
    cover["A1"] = "Audit of settings"
    cover["A1"].font = Font(name="Calibri", bold=True, size=18)
    cover["A2"] = "Motors"
    cover["A2"].hyperlink = "#Motors!A1"
    cover["A3"] = "see"
    cover["A3"].hyperlink = "https://example.org/standard"
    cover.merge_cells("A1:C1")
    cover.column_dimensions["A"].width = 42
    findings = book.create_sheet("Findings")
    findings.append(["Motor", "Margin", "Remark"])
    for number, remark in enumerate(["=1+1", "+2 A", "-5 A", "@x", "\tt", "_x0041_", "plain"]):
        findings.append([f"P-{number}", number * 8 - 20, remark])
    findings.conditional_formatting.add("B2:B8", DataBarRule("min", None, "max", None, color="638EC6"))
    below = CellIsRule("lessThan", ["0"], fill=PatternFill("solid", bgColor="FFC7CE"), font=Font(bold=True))
    findings.conditional_formatting.add("B2:B8", below)
    choices = DataValidation("list", formula1="Motors!$A$1:$A$3")
    choices.add("D2:D8")
    findings.add_data_validation(choices)
    findings.freeze_panes = "B2"
    findings.print_title_rows = "1:1"
    findings.print_area = "A1:D8"
    findings.protection.sheet = True
    findings.page_setup.orientation = "landscape"
    findings["B2"].number_format = '0.000" kA"'
    motors = book.create_sheet("Motors")
    for row in (["Motor", "Worst"], ["P-104", 3], ["P-105", 1]):
        motors.append(row)
    motors.add_table(Table(displayName="Motors_list", ref="A1:B3"))
    chart = BarChart()
    chart.add_data(Reference(motors, min_col=2, min_row=1, max_row=3), titles_from_data=True)
    motors.add_chart(chart, "D2")
    path = tmp_path / "report.xlsx"
    book.save(path)
    return path


@pytest.fixture
def workbook(tmp_path: Path) -> Callable[..., Path]:
    """Write a workbook from its parts."""

    def write(parts: Parts, name: str = "motors.xlsx") -> Path:
        return write_parts(tmp_path / name, parts)

    return write
