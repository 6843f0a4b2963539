"""The committed sample workbooks are what their generator writes."""

from __future__ import annotations

import csv
from pathlib import Path

import pytest
from openpyxl import load_workbook

from tests.sites.write_sample import SAMPLE_FLEET, write_all

WORKED_OUT_BY_HAND = {Path("after_modification") / "expected_comparison.csv"}


@pytest.fixture(scope="module")
def written(tmp_path_factory: pytest.TempPathFactory) -> Path:
    """Write everything anew."""
    folder = tmp_path_factory.mktemp("sample_fleet")
    write_all(folder)
    return folder


def _content(path: Path) -> object:
    if path.suffix != ".xlsx":
        return path.read_text("utf-8")
    workbook = load_workbook(path)
    return {sheet.title: [[cell.value for cell in row] for row in sheet.iter_rows()] for sheet in workbook.worksheets}


def test_committed_files_hold_what_the_generator_writes(written: Path):
    made = sorted(path.relative_to(written) for path in written.rglob("*") if path.is_file())
    assert made
    for path in made:
        assert _content(SAMPLE_FLEET / path) == _content(written / path), path


def test_no_workbook_is_left_over_from_an_earlier_generator(written: Path):
    kinds = ("*.xlsx", "*.csv")
    committed = {path.relative_to(SAMPLE_FLEET) for kind in kinds for path in SAMPLE_FLEET.rglob(kind)}
    assert committed - WORKED_OUT_BY_HAND == {
        path.relative_to(written) for kind in kinds for path in written.rglob(kind)
    }


def test_planted_defects_cover_many_checks():
    with (SAMPLE_FLEET / "planted_defects.csv").open(encoding="utf-8", newline="") as file:
        rows = list(csv.DictReader(file))
    assert len({row["check"] for row in rows}) >= 40
    assert {row["severity"] for row in rows} == {"unsafe", "nuisance", "inconsistent", "observation"}
    keys = [(row["subject_key"], row["check"], row["setting_or_datum"]) for row in rows]
    assert len(keys) == len(set(keys))
