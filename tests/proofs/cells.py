"""Change the cells of a site's workbooks, whatever stands in them: blanks, disturbed values, other units."""

from __future__ import annotations

import csv
import shutil
from collections.abc import Callable, Iterator
from dataclasses import dataclass
from pathlib import Path

import numpy as np
from openpyxl import load_workbook

from tests.sites.plant import Site

SWAPPED = {"ON": "OFF", "OFF": "ON", "Y": "N", "N": "Y"}


@dataclass
class Column:
    """The cells of one column of a sheet, in rows that are about a motor, a relay, a bus or a start."""

    file: str
    sheet: str
    header: str
    """All words above the first such row, from top to bottom."""
    keys: list[str]
    """What each row is about: the text of its first cell."""
    values: list[object]


Change = Callable[[Column], list[object]]
Grid = list[list[object]]


def known_names(site: Site) -> set[str]:
    """Give the tags and names that tell that a row holds data."""
    return {
        *(str(motor["motor"]) for motor in site.motors),
        *(str(relay["relay_tag"]) for relay in site.relays),
        *(str(bus["bus_name"]) for bus in site.buses),
    }


def change_workbooks(site: Site, source: Path, target: Path, change: Change) -> Path:
    """Copy a folder of workbooks with every column changed; first columns, which name the rows, stay."""
    names = known_names(site)
    target.mkdir(parents=True)
    for path in sorted(source.iterdir()):
        if path.suffix == ".xlsx":
            workbook = load_workbook(path)
            for sheet in workbook.worksheets:
                grid = [[cell.value for cell in row] for row in sheet.iter_rows()]
                for row, place, value in _changed(path.name, sheet.title, grid, names, change):
                    sheet.cell(row + 1, place + 1).value = value  # type: ignore[union-attr] # no merged cells in data
            workbook.save(target / path.name)
        elif path.suffix == ".csv" and path.name.startswith("start_records"):
            with path.open(encoding="utf-8", newline="") as file:
                grid = [[_typed(text) for text in row] for row in csv.reader(file)]
            for row, place, value in _changed(path.name, "", grid, names, change):
                grid[row][place] = value
            with (target / path.name).open("w", encoding="utf-8", newline="") as file:
                csv.writer(file, lineterminator="\n").writerows(grid)
        elif path.is_file():
            shutil.copy(path, target / path.name)
    return target


def _typed(text: str) -> object:
    if not text:
        return None
    try:
        return float(text)
    except ValueError:
        return text


def _changed(
    file: str, sheet: str, grid: Grid, names: set[str], change: Change
) -> Iterator[tuple[int, int, object]]:
    rows = [row for row, cells in enumerate(grid) if cells and str(cells[0]) in names]
    if not rows:
        return
    keys = [str(grid[row][0]) for row in rows]
    for place in range(1, len(grid[0])):
        above = (grid[row][place] for row in range(rows[0]))
        header = " ".join(str(words) for words in above if words is not None)
        values = [grid[row][place] for row in rows]
        for row, old, new in zip(rows, values, change(Column(file, sheet, header, keys, values)), strict=True):
            if new is not old:
                yield row, place, new


def is_list_of_settings(column: Column) -> bool:
    """Tell whether a sheet has a row a setting, where only the values may be changed."""
    return column.file == "relay_settings_lv_mcc.xlsx"


class Gaps:
    """Blanks a share of the cells, chosen by a seed."""

    def __init__(self, seed: int, share: float, of_buses: float | None = None) -> None:
        self.random = np.random.default_rng(seed)
        self.share = share
        self.of_buses = share if of_buses is None else of_buses

    def __call__(self, column: Column) -> list[object]:
        """Give a column with gaps."""
        share = self.of_buses if column.file == "bus_list.xlsx" else self.share
        gone = self.random.uniform(size=len(column.values)) < share
        if is_list_of_settings(column) and column.header.rpartition(" ")[2] != "Value":
            return column.values
        return [None if lost else value for value, lost in zip(column.values, gone, strict=True)]


class Disturbed:
    """Makes some numbers three times as large or small, turns some switches over, and moves some words by a row."""

    def __init__(self, seed: int, share: float) -> None:
        self.random = np.random.default_rng(seed)
        self.share = share

    def __call__(self, column: Column) -> list[object]:
        """Give a disturbed column."""
        if is_list_of_settings(column) and column.header.rpartition(" ")[2] != "Value":
            return column.values
        hit = self.random.uniform(size=len(column.values)) < self.share
        factors = self.random.choice((3.0, 1 / 3), size=len(column.values))
        return [
            self._other(column, row, value, float(factor)) if struck else value
            for row, (value, struck, factor) in enumerate(zip(column.values, hit, factors, strict=True))
        ]

    def _other(self, column: Column, row: int, value: object, factor: float) -> object:
        if isinstance(value, bool | int | float):
            return float(f"{value * factor:.4g}")
        if isinstance(value, str) and value in SWAPPED:
            return SWAPPED[value]
        if isinstance(value, str) and not is_list_of_settings(column):
            return column.values[row - 1]
        return value
