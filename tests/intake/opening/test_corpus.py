"""Odd public workbooks: each ends in a reading or in one clear refusal, in time and without dying."""

from __future__ import annotations

import struct
from functools import partial
from pathlib import Path

import pytest

import audit
from audit.fleet.addresses import a1
from audit.intake.cells import CellError
from audit.intake.opening import UnreadableWorkbook, open_workbook
from audit.intake.opening.archive import SafeArchive
from audit.intake.opening.facts import united
from audit.intake.opening.package import read_package
from audit.intake.opening.sheet_elements import scan_elements
from audit.intake.opening.sheet_pieces import UnusualSheet, scan_pieces

CORPUS = Path(audit.__file__).parents[2] / "shared" / "corpus"
FILES = sorted(path for path in CORPUS.glob("*.*") if path.suffix != ".md") if CORPUS.is_dir() else []
pytestmark = pytest.mark.skipif(not FILES, reason="the folder of odd workbooks is not here")
ENCRYPTED = ("pass_protected", "protected_passtika", "poi-60284")
BROKEN = ("clusterfuzz", "poi-crash", "poi-61300")


def test_each_file_is_read_or_refused_in_time(opened_apart):
    said = opened_apart(*FILES, timeout_s=10 * len(FILES))
    assert len(said) == len(FILES)
    for path, line in zip(FILES, said, strict=True):
        if any(mark in path.name for mark in ENCRYPTED):
            assert "encrypted with a password" in line, (path.name, line)
        elif any(mark in path.name for mark in BROKEN):
            assert line.startswith(f"refused {path.name}: "), (path.name, line)
        else:
            assert line.startswith("read "), (path.name, line)


@pytest.mark.parametrize(
    "path", [path for path in FILES if path.suffix in (".xlsx", ".xlsm")], ids=lambda path: path.name
)
def test_the_quick_and_the_patient_way_tell_the_same(path):
    try:
        archive = SafeArchive(path, path.read_bytes())
        package = read_package(archive)
    except UnreadableWorkbook:
        return
    for name, part in package.sheets.items():
        chunks = partial(archive.chunks, part)
        patient = scan_elements(path, name, part, chunks(), package.formats)
        try:
            quick = scan_pieces(path, name, chunks(), package.formats)
        except UnusualSheet:
            continue
        assert quick.markers == patient.markers
        assert (quick.last_row, quick.last_column) == (patient.last_row, patient.last_column)
        assert (quick.hidden_rows, quick.hidden_columns) == (patient.hidden_rows, patient.hidden_columns)
        assert united(quick.percent).tolist() == united(patient.percent).tolist()
        assert united(quick.struck).tolist() == united(patient.struck).tolist()


@pytest.mark.parametrize(
    ("name", "sheet", "cells"),
    [
        ("poi-57003-FixedFunctionTestCaseData.xls", "Code", {"B16", "C16", "B17", "C17", "B18", "C18"}),
        ("poi-testVarious.xlsb", "mySheet1", {"B14"}),
    ],
)
def test_error_cells_of_older_formats_are_seen(name, sheet, cells):
    # outside check: xlrd and pyxlsb name the same cells
    rows = next(grid.rows for grid in open_workbook(CORPUS / name).sheets if grid.name == sheet)
    assert {
        a1(row, column)
        for row, values in enumerate(rows, start=1)
        for column, value in enumerate(values, start=1)
        if isinstance(value, CellError)
    } == cells


@pytest.mark.parametrize("path", FILES, ids=lambda path: path.name)
def test_the_scan_and_the_reader_of_values_see_as_far_as_each_other(path):
    try:
        opened = open_workbook(path)
    except UnreadableWorkbook:
        return
    assert not [note for sheet in opened.sheets for note in sheet.notes if "could not be read" in note]
    assert not [note for sheet in opened.sheets for note in sheet.notes if "not known for this sheet" in note]


def test_an_old_workbook_that_lies_about_its_extent_is_refused(tmp_path, opened_apart):
    # record 0x0200 of [MS-XLS]: first row, row behind the last, first column, column behind the last
    content = (CORPUS / "poi-finance.xls").read_bytes()
    start = content.index(struct.pack("<HH", 0x0200, 14)) + 4
    path = tmp_path / "lies.xls"
    path.write_bytes(content[:start] + struct.pack("<IIHH", 0, 2**31, 0, 2**15) + content[start + 12 :])
    assert "states an extent that no .xls sheet can have" in opened_apart(path)[0]
