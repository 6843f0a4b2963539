"""The motor list: a workbook with a sheet an area, as an electrical office keeps it."""

from __future__ import annotations

from dataclasses import replace
from datetime import date, datetime
from pathlib import Path

from openpyxl import Workbook
from openpyxl.cell.cell import Cell
from openpyxl.styles import Alignment, Border, Font, PatternFill, Side
from openpyxl.utils import get_column_letter
from openpyxl.worksheet.properties import PageSetupProperties
from openpyxl.worksheet.worksheet import Worksheet

from tests.sites.plant import Record, Site, number, text
from tests.sites.writing.motor_columns import BANDS, Column
from tests.sites.writing.same_bytes import save
from tests.sites.writing.words import ratio, spelled

THIN = Side(style="thin", color="999999")
BOX = Border(left=THIN, right=THIN, top=THIN, bottom=THIN)
HEADING = PatternFill("solid", fgColor="D9E2EC")
BAND = PatternFill("solid", fgColor="B8C7D6")
SECTION = PatternFill("solid", fgColor="EFEFEF")
ABSENT_MEANS_NO = (
    "must_run",
    "reaccelerated",
    "critical",
    "cannot_run_dry",
    "belt_drive",
    "speed_switch_fitted",
    "reverse_rotation_harmful",
    "relay_inside_delta",
    "undervoltage_by_bus_scheme",
)
WIDTHS = {"service": 30.0, "motor_make": 18.0, "driven_machine": 17.0, "starting_method": 10.0, "fuse": 18.0}
TEXT_NUMBERS = {"rated_power_kw": 9, "full_load_a": 11, "cable_length_m": 13}
"""Every so-manieth cell of these columns holds its number as text, as lists copied from other programs do."""


def write_motor_list(site: Site, path: Path) -> None:
    """Write the motor list; units stand in a row of their own on the first sheet, in brackets on the others."""
    workbook = Workbook()
    workbook.remove(workbook.worksheets[0])
    areas = sorted({text(motor, "area") for motor in site.motors}, reverse=True)
    for place, area in enumerate(areas):
        sheet = workbook.create_sheet(area)
        _write_area(sheet, site, area, unit_row=place == 0)
    save(workbook, path)


def _columns(motors: list[Record]) -> list[tuple[str, Column]]:
    """Columns of a sheet, by band; a column that nobody fills is left out."""
    kept = []
    for band, columns in BANDS:
        for column in columns:
            if any(quantity in motor for motor in motors for quantity in column.quantities):
                kept.append((band, column))
    return kept


def _split_stall(columns: list[tuple[str, Column]], apart: bool) -> list[tuple[str, Column]]:
    done = []
    for band, column in columns:
        if column.join == "stall" and apart:
            hot, cold = column.quantities
            done.append((band, Column("Safe Stall Time Hot", "s", (hot,))))
            done.append((band, Column("Safe Stall Time Cold", "s", (cold,))))
        elif column.join == "stall":
            done.append((band, replace(column, header="Safe Stall Time Hot/Cold", join="pair")))
        else:
            done.append((band, column))
    return done


def _write_area(sheet: Worksheet, site: Site, area: str, *, unit_row: bool) -> None:
    motors = [motor for motor in site.motors if motor["area"] == area]
    columns = _split_stall(_columns(motors), apart=unit_row)
    _title_block(sheet, site.name, area)
    row = 6
    _bands(sheet, row, columns)
    for place, (_, column) in enumerate(columns, start=1):
        header = column.header if unit_row or not column.unit else f"{column.header} ({column.unit})"
        _heading(sheet.cell(row + 1, place, header))
        if unit_row:
            _heading(sheet.cell(row + 2, place, f"[{column.unit}]" if column.unit else None))
    row += 3 if unit_row else 2
    sheet.freeze_panes = sheet.cell(row, 3)
    sheet.row_dimensions[7].height = 45
    _page(sheet, row)
    voltage = 0.0
    for motor in motors:
        rated = number(motor, "rated_voltage_v")
        nominal = min((number(bus, "bus_nominal_v") for bus in site.buses), key=lambda level: abs(level / rated - 1))
        if nominal != voltage:
            voltage = nominal
            heading = sheet.cell(row, 1, f"{voltage / 1000:g} kV MOTORS" if voltage > 1000 else f"{voltage:g} V MOTORS")
            heading.font = Font(bold=True)
            for place in range(1, len(columns) + 1):
                sheet.cell(row, place).fill = SECTION
            row += 1
        for place, (_, column) in enumerate(columns, start=1):
            cell = sheet.cell(row, place, _content(motor, column, row))
            cell.border = BOX
            cell.alignment = Alignment(horizontal="left" if place < 9 else "center")
            if isinstance(cell.value, datetime | date):
                cell.number_format = "yyyy-mm-dd"
        row += 1
    row += 1
    sheet.cell(row, 2, "TOTAL INSTALLED POWER").font = Font(bold=True)
    power = next(
        place for place, (_, column) in enumerate(columns, start=1) if column.quantities == ("rated_power_kw",)
    )
    sheet.cell(row, power, sum(number(motor, "rated_power_kw") for motor in motors)).font = Font(bold=True)
    sheet.cell(
        row + 1, 2, "Note: standby units are listed with the duty unit. Blank cells: not known at time of issue."
    )
    for place, (_, column) in enumerate(columns, start=1):
        sheet.column_dimensions[get_column_letter(place)].width = WIDTHS.get(
            column.quantities[0], max(9.0, min(len(column.header), 14) + 2.0)
        )


def _page(sheet: Worksheet, first_data_row: int) -> None:
    """Print on A3 landscape, four pages wide, headings repeated."""
    sheet.page_setup.orientation, sheet.page_setup.paperSize = "landscape", sheet.PAPERSIZE_A3
    sheet.sheet_properties.pageSetUpPr = PageSetupProperties(fitToPage=True)
    sheet.page_setup.fitToWidth, sheet.page_setup.fitToHeight = 4, 0
    sheet.print_title_rows, sheet.print_title_cols = f"6:{first_data_row - 1}", "A:B"


def _title_block(sheet: Worksheet, site: str, area: str) -> None:
    sheet.cell(1, 1, site.upper()).font = Font(bold=True, size=14)
    sheet.cell(2, 1, f"MOTOR LIST - {area.upper()}").font = Font(bold=True, size=12)
    sheet.cell(3, 1, "Doc. no. TQL-E-ML-001")
    sheet.cell(3, 4, "Rev. 7")
    sheet.cell(3, 6, "Issued 2026-09-14")
    sheet.cell(4, 1, "Prepared: electrical office")
    sheet.cell(4, 6, "For protection audit")


def _bands(sheet: Worksheet, row: int, columns: list[tuple[str, Column]]) -> None:
    start = 1
    for place in range(1, len(columns) + 1):
        if place == len(columns) or columns[place][0] != columns[place - 1][0]:
            cell = sheet.cell(row, start, columns[place - 1][0])
            cell.fill, cell.font, cell.alignment = BAND, Font(bold=True), Alignment(horizontal="center")
            if place > start:
                sheet.merge_cells(start_row=row, end_row=row, start_column=start, end_column=place)
            start = place + 1


def _heading(cell: Cell | object) -> None:
    if isinstance(cell, Cell):
        cell.font, cell.fill, cell.border = Font(bold=True), HEADING, BOX
        cell.alignment = Alignment(wrap_text=True, horizontal="center", vertical="center")


def _content(motor: Record, column: Column, row: int) -> object:
    first = column.quantities[0]
    if column.join == "ratio":
        return ratio(motor, *column.quantities) or column.otherwise or None
    if column.join == "pair":
        if not all(quantity in motor for quantity in column.quantities):
            return spelled(motor, first)
        both = [motor[quantity] for quantity in column.quantities]
        return both[0] if isinstance(both[0], str) else "/".join(f"{value:g}" for value in both)
    if column.join == "cable":
        return _cable(motor)
    if first in ABSENT_MEANS_NO and not motor.get(first):
        return None
    if first not in motor:
        return column.otherwise or None
    value = spelled(motor, first)
    if column.unit == "ms":
        return round(number(motor, first) * 1000, 6)
    if first in TEXT_NUMBERS and row % TEXT_NUMBERS[first] == 0:
        return f"{value}"
    return value


def _cable(motor: Record) -> object:
    if "cable_size_mm2" not in motor:
        return None
    size, runs = number(motor, "cable_size_mm2"), int(number(motor, "cable_runs"))
    return f"3x{size:g}" if runs == 1 else f"{runs}x(3x{size:g})"
