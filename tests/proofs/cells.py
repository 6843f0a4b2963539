"""Change the cells of a site's workbooks, whatever stands in them: blanks, disturbed values, other units."""

from __future__ import annotations

import csv
import shutil
from collections.abc import Callable, Iterator, Mapping
from dataclasses import dataclass, replace
from pathlib import Path

import numpy as np
from openpyxl import load_workbook

from tests.sites.plant import Site

SWAPPED = {"ON": "OFF", "OFF": "ON", "Y": "N", "N": "Y"}


@dataclass
class Column:
    """The cells of one column of a sheet, in rows that are about a motor, a relay, a bus or a start."""

    file: str
    head: list[object]
    """The cells above the first such row, from top to bottom: titles, headers, units."""
    values: list[object]

    def says(self, words: str) -> bool:
        """Tell whether a cell above the rows holds these words."""
        return any(isinstance(cell, str) and words in cell for cell in self.head)


Change = Callable[[Column], Column]
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
                for row, place, value in _changed(path.name, grid, names, change):
                    sheet.cell(row + 1, place + 1).value = value
            workbook.save(target / path.name)
        elif path.suffix == ".csv" and path.name.startswith("start_records"):
            with path.open(encoding="utf-8", newline="") as file:
                grid = [[_typed(text) for text in row] for row in csv.reader(file)]
            for row, place, value in _changed(path.name, grid, names, change):
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


def _changed(file: str, grid: Grid, names: set[str], change: Change) -> Iterator[tuple[int, int, object]]:
    rows = [row for row, cells in enumerate(grid) if cells and str(cells[0]) in names]
    if not rows:
        return
    above = list(range(rows[0]))
    for place in range(1, len(grid[rows[0]])):
        old = Column(file, [_at(grid, row, place) for row in above], [_at(grid, row, place) for row in rows])
        new = change(old)
        for row, was, now in zip((*above, *rows), (*old.head, *old.values), (*new.head, *new.values), strict=True):
            if now is not was:
                yield row, place, now


def _at(grid: Grid, row: int, place: int) -> object:
    return grid[row][place] if place < len(grid[row]) else None


def only_values(column: Column) -> bool:
    """Tell whether a column may be changed: in a list with a row a setting, only the values may."""
    return column.file != "relay_settings_lv_mcc.xlsx" or column.says("Value")


class Gaps:
    """Blanks a share of the cells, chosen by a seed."""

    def __init__(self, seed: int, share: float) -> None:
        self.random = np.random.default_rng(seed)
        self.share = share

    def __call__(self, column: Column) -> Column:
        """Give a column with gaps."""
        gone = self.random.uniform(size=len(column.values)) < self.share
        if not only_values(column):
            return column
        return replace(column, values=[None if lost else v for v, lost in zip(column.values, gone, strict=True)])


class Disturbed:
    """Makes some numbers three times as large or small, turns some switches over, and moves some words by a row."""

    def __init__(self, seed: int, share: float) -> None:
        self.random = np.random.default_rng(seed)
        self.share = share

    def __call__(self, column: Column) -> Column:
        """Give a disturbed column."""
        hit = self.random.uniform(size=len(column.values)) < self.share
        factors = self.random.choice((3.0, 1 / 3), size=len(column.values))
        if not only_values(column):
            return column
        before = [column.values[-1], *column.values[:-1]] if column.file == "motor_list.xlsx" else column.values
        values = [
            _other(value, above, float(factor)) if struck else value
            for value, above, struck, factor in zip(column.values, before, hit, factors, strict=True)
        ]
        return replace(column, values=values)


def _other(value: object, above: object, factor: float) -> object:
    if isinstance(value, bool | int | float):
        return float(f"{value * factor:.4g}")
    if isinstance(value, str):
        return SWAPPED.get(value, above)
    return value


class Restated:
    """Writes the numbers of lists in other units."""

    def __init__(self, units: Mapping[str, tuple[str, float]]) -> None:
        self.units = units
        """For each unit another one, and how many of it are one of the first."""

    def __call__(self, column: Column) -> Column:
        """Give the column in its other unit; what has no plain number, as ratios, stays as it is."""
        for place, cell in enumerate(column.head):
            for unit, (other, factor) in self.units.items():
                for was in (f"[{unit}]", f"({unit})"):
                    if isinstance(cell, str) and cell.endswith(was) and not column.says("Ratio"):
                        head = [*column.head]
                        head[place] = cell.removesuffix(was) + was.replace(unit, other)
                        return replace(column, head=head, values=[_times(value, factor) for value in column.values])
        return column


def _times(value: object, factor: float) -> object:
    if isinstance(value, int | float):
        return float(f"{value * factor:.12g}")
    if isinstance(value, str) and value[:1].isdigit():
        return "/".join(f"{float(part) * factor:.12g}" for part in value.split("/"))
    return value
