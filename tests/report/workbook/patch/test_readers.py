"""Copies can be read: by two libraries, and by a whole spreadsheet program where one is installed."""

from __future__ import annotations

import shutil
import subprocess
from collections.abc import Callable
from pathlib import Path

import pytest
from openpyxl import load_workbook
from python_calamine import CalamineError, CalamineWorkbook, SheetTypeEnum

from audit.report.workbook.patch import CannotPatch, Mark, annotate_copy, our_sheet_names
from audit.report.workbook.patch.package import Package
from audit.report.workbook.patch.workbook_part import WorkbookPart
from tests.report.workbook.patch.test_fidelity import PUBLIC_WORKBOOKS, RICH_MARKS
from tests.report.workbook.patch.workbooks import rich_parts

SOFFICE = shutil.which("soffice")
pytestmark = pytest.mark.filterwarnings("ignore::UserWarning")  # what openpyxl would lose, for the originals as well


def values(path: Path) -> dict[str, list[list[object]]]:
    """All values by sheet."""
    found: dict[str, list[list[object]]] = {}
    book = CalamineWorkbook.from_path(path)
    for metadata in book.sheets_metadata:
        if metadata.typ == SheetTypeEnum.WorkSheet:
            found[metadata.name] = book.get_sheet_by_name(metadata.name).to_python(skip_empty_area=False)
    return found


def trimmed(rows: list[list[object]]) -> list[list[object]]:
    """Rows without the blank cells at their ends and the blank rows below."""
    kept = []
    for row in rows:
        last = max((position for position, value in enumerate(row) if value != ""), default=-1)
        kept.append(row[: last + 1])
    while kept and not kept[-1]:
        kept.pop()
    return kept


@pytest.mark.parametrize("source", PUBLIC_WORKBOOKS, ids=lambda path: path.name)
def test_values_read_from_a_copy_are_the_originals(source: Path, report: Path, tmp_path: Path) -> None:
    target = tmp_path / f"copy{source.suffix}"
    try:
        names = [sheet.name for sheet in WorkbookPart(Package(source)).sheets() if sheet.part]
        outcome = annotate_copy(source, target, [Mark(name, 3, 2, "FFC7CE", "x") for name in names], report)
    except CannotPatch:
        pytest.skip("refused; the refusal is tested elsewhere")
    try:
        before = values(source)
    except CalamineError:
        pytest.skip("the original cannot be read either")
    after = values(target)
    assert list(after) == [*outcome.sheet_names.values(), *before]
    for name, rows in before.items():
        assert trimmed(after[name]) == trimmed(rows)


def test_library_finds_fills_notes_and_sheets(workbook: Callable[..., Path], report: Path, tmp_path: Path) -> None:
    target = tmp_path / "copy.xlsm"
    annotate_copy(workbook(rich_parts(macros=True), "rich.xlsm"), target, RICH_MARKS, report)
    book = load_workbook(target, keep_vba=True)
    assert book.sheetnames == ["Cover", "Findings", "Motors (audit)", "Motors", "Lists"]
    for address, fill in (("B2", "FFC7CE"), ("C3", "FFEB9C"), ("A6", "FFEB9C"), ("E9", "FFC7CE")):
        assert book["Motors"][address].fill.fgColor.rgb == f"FF{fill}"
    assert "a start reaches 1,020 A" in book["Motors"]["B2"].comment.text


def resaved(source: Path, folder: Path) -> Path:
    """The workbook as a spreadsheet program saves it."""
    profile, out = folder / "profile", folder / "out"
    command = [str(SOFFICE), f"-env:UserInstallation={profile.as_uri()}", "--headless", "--convert-to", "xlsx"]
    subprocess.run([*command, "--outdir", str(out), str(source)], check=True, capture_output=True, timeout=170)
    return out / f"{source.stem}.xlsx"


@pytest.mark.slow
@pytest.mark.skipif(SOFFICE is None, reason="LibreOffice is not installed")
@pytest.mark.parametrize("suffix", [".xlsx", ".xlsm"])
def test_spreadsheet_program_opens_and_saves_a_copy(
    workbook: Callable[..., Path], report: Path, tmp_path: Path, suffix: str
) -> None:
    target = tmp_path / f"copy{suffix}"
    annotate_copy(workbook(rich_parts(macros=suffix == ".xlsm"), f"rich{suffix}"), target, RICH_MARKS, report)
    book = load_workbook(resaved(target, tmp_path))
    assert book.sheetnames == ["Cover", "Findings", "Motors (audit)", "Motors", "Lists"]
    motors = book["Motors"]
    for address, fill in (("B2", "FFC7CE"), ("C3", "FFEB9C"), ("A6", "FFEB9C"), ("E9", "FFC7CE")):
        assert motors[address].fill.fgColor.rgb == f"FF{fill}"
    assert "Checked on site" in motors["B2"].comment.text
    assert "a start reaches 1,020 A" in motors["B2"].comment.text
    assert "below the last row" in motors["E9"].comment.text
    assert book["Findings"]["C2"].value == "=1+1"
    assert book["Findings"]["C2"].data_type == "s" or book["Findings"]["C2"].quotePrefix
    assert motors["C2"].value == "=B2*1.7"


@pytest.mark.slow
@pytest.mark.skipif(SOFFICE is None, reason="LibreOffice is not installed")
def test_copy_that_a_program_saved_is_still_annotated_anew(
    workbook: Callable[..., Path], report: Path, tmp_path: Path
) -> None:
    once, twice = tmp_path / "once.xlsx", tmp_path / "twice.xlsx"
    annotate_copy(workbook(rich_parts()), once, RICH_MARKS, report)
    saved = resaved(once, tmp_path)
    assert our_sheet_names(saved) == {"Cover", "Findings", "Motors (audit)"}
    annotate_copy(saved, twice, [Mark("Motors", 4, 3, "FFC7CE", "new finding")], report)
    book = load_workbook(twice)
    assert book.sheetnames == ["Cover", "Findings", "Motors (audit)", "Motors", "Lists"]
    motors = book["Motors"]
    assert motors["C4"].fill.fgColor.rgb == "FFFFC7CE"
    assert [motors[address].fill.fill_type for address in ("B2", "C2", "C3", "E9")] == [None] * 4
    assert motors["A6"].fill.fgColor.rgb == "FFDDEBF7"
    assert motors["B2"].comment.text.rstrip() == "Checked on site"
    assert motors["E9"].comment is None
