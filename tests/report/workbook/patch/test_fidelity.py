"""An annotated copy keeps everything that the annotation has no business with."""

from __future__ import annotations

from collections.abc import Callable
from pathlib import Path

import pytest
from openpyxl import Workbook
from openpyxl.chart import LineChart, Reference

from audit.report.workbook.patch import CannotPatch, Mark, annotate_copy
from audit.report.workbook.patch.package import Package
from audit.report.workbook.patch.workbook_part import WorkbookPart
from tests.report.workbook.patch.fidelity import compare
from tests.report.workbook.patch.workbooks import read_parts, rich_parts, write_parts

CORPUS = Path(__file__).resolve().parents[5] / "shared" / "corpus"
PUBLIC_WORKBOOKS = sorted(path for path in CORPUS.glob("*") if path.suffix in {".xlsx", ".xlsm"})
PLACES = ((1, 1), (2, 3), (7, 2), (200, 30))
RICH_MARKS = [
    Mark("Motors", 2, 2, "FFC7CE", "pickup 900 A; a start reaches 1,020 A"),
    Mark("Motors", 2, 3, "FFC7CE", "second"),
    Mark("Motors", 3, 3, "FFEB9C", ""),
    Mark("Motors", 7, 2, "FFEB9C", "within merged cells"),
    Mark("Motors", 9, 5, "FFC7CE", "below the last row"),
]


@pytest.mark.parametrize("first", [True, False])
@pytest.mark.parametrize("suffix", [".xlsx", ".xlsm"])
def test_rich_workbook_keeps_its_parts(
    workbook: Callable[..., Path], report: Path, tmp_path: Path, suffix: str, first: bool
) -> None:
    source = workbook(rich_parts(macros=suffix == ".xlsm"), f"rich{suffix}")
    target = tmp_path / f"copy{suffix}"
    annotate_copy(source, target, RICH_MARKS, report, first=first)
    compare(source, target, RICH_MARKS, added_in_front=3 if first else 0)
    before, after = read_parts(source), read_parts(target)
    untouched = [
        "xl/worksheets/sheet2.xml",
        "xl/sharedStrings.xml",
        "xl/calcChain.xml",
        "xl/drawings/drawing1.xml",
        "xl/media/image1.png",
        "xl/printerSettings/printerSettings1.bin",
        *(["xl/vbaProject.bin"] if suffix == ".xlsm" else []),
    ]
    assert {name for name in untouched if before[name] != after[name]} == set()


def test_comparison_notices_a_loss(workbook: Callable[..., Path], report: Path, tmp_path: Path) -> None:
    source, target = workbook(rich_parts()), tmp_path / "copy.xlsx"
    annotate_copy(source, target, RICH_MARKS, report)
    spoilt = {
        "xl/worksheets/sheet1.xml": (b"x14:sparkline", b"x14:sparklime"),
        "xl/styles.xml": (b'wrapText="1"', b""),
        "xl/comments1.xml": (b"<i/>", b""),
        "xl/drawings/vmlDrawing1.vml": (b"#ccffcc", b"#ffffff"),
        "xl/workbook.xml": (b"Motors!$B$2:$B$6", b"Motors!$B$2:$B$5"),
        "docProps/custom.xml": (b">invented<", b">other<"),
        "xl/media/image1.png": (b"PNG", b"GNP"),
    }
    for name, (old, new) in spoilt.items():
        parts = read_parts(target)
        assert old in parts[name]
        parts[name] = parts[name].replace(old, new)
        with pytest.raises(AssertionError):
            compare(source, write_parts(tmp_path / "spoilt.xlsx", parts), RICH_MARKS, added_in_front=3)


def test_chart_of_the_users_is_kept(report: Path, tmp_path: Path) -> None:
    book = Workbook()
    sheet = book.active
    assert sheet is not None
    for row in range(1, 6):
        sheet.append([row, row * row])
    chart = LineChart()
    chart.add_data(Reference(sheet, min_col=2, min_row=1, max_row=5))
    sheet.add_chart(chart, "E2")
    source, target = tmp_path / "chart.xlsx", tmp_path / "copy.xlsx"
    book.save(source)
    marks = [Mark("Sheet", 2, 2, "FFC7CE", "note")]
    annotate_copy(source, target, marks, report)
    compare(source, target, marks, added_in_front=3)
    assert read_parts(source)["xl/charts/chart1.xml"] == read_parts(target)["xl/charts/chart1.xml"]


@pytest.mark.parametrize("source", PUBLIC_WORKBOOKS, ids=lambda path: path.name)
def test_public_workbook_keeps_its_parts_or_is_refused(source: Path, report: Path, tmp_path: Path) -> None:
    target = tmp_path / f"copy{source.suffix}"
    try:
        sheets = [sheet.name for sheet in WorkbookPart(Package(source)).sheets() if sheet.part]
        marks = [Mark(name, row, column, "FFC7CE", "a note") for name in sheets for row, column in PLACES]
        annotate_copy(source, target, marks, report)
    except CannotPatch as error:
        refusal = str(error)
    else:
        refusal = ""
    if refusal:
        assert any(reason in refusal for reason in ("damaged", "corrupt", "encrypted", "text document")), refusal
        assert not target.exists()
    else:
        compare(source, target, marks, added_in_front=3)
