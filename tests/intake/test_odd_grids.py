"""Grids thrown together at random: reading never fails, and each reading leads back to its own cell."""

from __future__ import annotations

import datetime
import random
import tomllib
from pathlib import Path

import pytest

import audit.intake.gathering as gathering
from audit.fleet.addresses import unpack
from audit.intake import CannotRead, gather
from audit.intake.cells import CellError, UncachedFormula
from audit.intake.celltext import cell_text
from audit.intake.opening import SheetGrid, WorkbookGrids

HEADERS = tomllib.loads(Path(__file__).with_name("headers.toml").read_text("utf-8"))
WORDS = [
    header
    for table in HEADERS.values()
    for found in table.values()
    for headers in ([found] if isinstance(found, list) else found.values())
    for header in headers
]
CELLS = [
    *("P-101A", "P-102", "R-101", "R-102", "SWGR-1", "A/B", "P-101 A/B", "6 x FLA", "12/18", "50:5", "200/1/1", "OFF"),
    *("-", "N/A", "TBC", "3 cold 2 hot", "2x(3x240)", "#2/0", "90/100", "1,250", "1.250", "3,3 kV", "INST", "yes"),
    *("Total", "Notes: x", "AREA 100", "see note 3", "F/B", "Group 2", "Relay", "Relay: R-101", "50 SHORT CIRCUIT"),
    *("Pickup", "Delay", "x FLA", "ms", "%", "kV", "", "  ", "x" * 200, "Δ/Y", "400/690", "=1+1", "e5"),
    *(150, 4000, 19.5, 0, 0.85, 999, 1e308, -5, float("nan"), True, False),
    *(datetime.datetime(2026, 1, 2), datetime.date(2020, 1, 1), datetime.time(14, 30)),
    *(CellError("#REF!"), UncachedFormula()),
]
MADE_FROM_SEVERAL = {"points", "sheet", "fleet.toml"}


def grid(draw: random.Random, name: str) -> SheetGrid:
    width, height = draw.randint(1, 12), draw.randint(1, 25)
    head = draw.randint(0, min(5, height - 1))
    rows = []
    for row in range(height):
        in_head = row == head or (row == head + 1 and draw.random() < 0.3)
        chances = (0.0, 0.85) if in_head else (0.7, 0.8)
        cells = []
        for _ in range(width):
            chance = draw.random()
            cells.append(
                draw.choice(CELLS) if chance < chances[0] else draw.choice(WORDS) if chance < chances[1] else None
            )
        rows.append(cells)
    merged = ((draw.randint(1, height), draw.randint(1, width), height, width),) if draw.random() < 0.5 else ()
    return SheetGrid(name, rows, merged=merged)


@pytest.mark.parametrize("seed", range(80))
def test_anything_is_read_or_refused_and_leads_back_to_its_cell(seed, tmp_path, monkeypatch):
    draw = random.Random(seed)
    sheets = {name: grid(draw, name) for name in ("Motors", "R-101", "Sheet3")}
    workbook = WorkbookGrids(tmp_path / "x.xlsx", "0", list(sheets.values()))
    monkeypatch.setattr(gathering, "open_workbook", lambda path: workbook)
    monkeypatch.setattr(gathering, "find_workbooks", lambda path: [workbook.path])
    try:
        read = gather(tmp_path)
    except CannotRead:
        return
    for row in read.readings.itertuples():
        place = read.book.place(row.cell)
        if place is None or row.header in MADE_FROM_SEVERAL:
            continue
        _, at_row, at_column = unpack(row.cell)
        value = sheets[place.sheet].rows[int(at_row) - 1][int(at_column) - 1]
        assert cell_text(row.written) in cell_text(value)
