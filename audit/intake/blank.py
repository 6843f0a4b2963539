"""An intake workbook made from the vocabulary: filled in, it is read without any map."""

from __future__ import annotations

from collections.abc import Sequence
from pathlib import Path

from openpyxl import Workbook
from openpyxl.comments import Comment
from openpyxl.styles import Alignment, Font, PatternFill
from openpyxl.utils import get_column_letter
from openpyxl.worksheet.datavalidation import DataValidation
from openpyxl.worksheet.worksheet import Worksheet

from audit.cautions import CAUTIONS
from audit.intake.recognition.matching import match_header
from audit.intake.sitemap_text import EMPTY_MAP
from audit.refusal import Refusal
from audit.vocabulary.quantities import Quantity, vocabulary
from audit.vocabulary.units import DIMENSIONLESS

WORKBOOK = "fleet-intake.xlsx"
MAP = "fleet.toml"
ROWS = 1000
LONGEST_LIST = 255
SHEETS = (("Motors", "motor"), ("Relays", "relay"), ("Buses", "bus"), ("Starts", "start"))
HEADER_ROW, UNIT_ROW, EXAMPLE_ROW = 1, 2, 3
EXAMPLE = "Example: delete this row"
_KEYS = {"motor": "motor", "relay": "relay_tag", "bus": "bus_name", "start": "start_motor"}
_OF_RELAYS = ("motor",)
_HEAD = PatternFill("solid", fgColor="DDE6F0")
_GREY = Font(italic=True, color="666666")
_UNIT_IN_WORDS = {"an hour": "per hour"}
_HOW = (
    ("How to fill in this workbook", True),
    ("One row a motor, relay (and setting group), bus or start. Leave empty what is not known.", False),
    (
        "The second row names the unit of a column. A cell may name another one: '6 x FLA', '50 ms', '150 hp'.",
        False,
    ),
    ("In a setting: OFF where the function is switched off, '-' where it is not used, empty where unknown.", False),
    ("Add columns of your own as you like; columns may be moved, and empty ones deleted.", False),
    ("Names join the sheets: the relay and the bus in a motor's row are those of the other sheets.", False),
    ("Point at a header to see what belongs below it; lists drop down where there is a choice.", False),
    ("The rows marked as examples are never read.", False),
)


EXAMPLES: dict[str, str | float] = {
    "service": "wash water pump", "area": "wash plant", "bus": "MCC-1", "cubicle": "3F", "relay": "R-101",
    "rated_power_kw": 75, "rated_voltage_v": 400, "frequency_hz": 50, "poles": 4, "rated_speed_rpm": 1482,
    "full_load_a": 133, "efficiency_pct": 94.5, "power_factor": 0.86, "locked_rotor_a": 900, "service_factor": 1,
    "safe_stall_hot_s": 12, "safe_stall_cold_s": 18, "starting_method": "direct on line",
    "switching_device": "breaker", "overload_device": "motor relay", "driven_machine": "pump", "must_run": "no",
    "ct_primary_a": 200, "ct_secondary_a": 1, "cable_size_mm2": 70, "cable_length_m": 85, "cable_conductor": "copper",
    "relay_full_load_a": 133, "relay_ct_primary_a": 200, "relay_ct_secondary_a": 1,
    "settings_export_date": "2026-03-14",
    "short_circuit_trip_on": "yes", "short_circuit_trip_pickup_a": 1600, "short_circuit_trip_delay_s": 0.05,
    "thermal_trip_on": "yes", "thermal_pickup_a": 140, "heating_time_constant_s": 900,
    "start_timer_on": "yes", "start_timer_delay_s": 6, "unbalance_trip_on": "yes", "unbalance_trip_pickup_pct": 20,
    "unbalance_trip_delay_s": 4, "unbalance_base": "full load", "bus_nominal_v": 400, "bus_frequency_hz": 50,
    "fault_max_ka": 25, "fault_min_ka": 12, "fault_x_r_ratio": 6, "earthing": "solid", "bus_clearing_time_s": 0.3,
    "start_moment": "2026-03-14 06:20", "start_time_s": 3.4, "start_current_a": 810, "start_voltage_pct": 96,
}  # fmt: skip
"""An invented motor, for the example row."""


def write_blank(directory: Path) -> list[Path]:
    """Write the intake workbook and an empty `fleet.toml` into a folder, which is made if need be.

    Raises
    ------
    Refusal
        If one of the two files is there already.
    """
    paths = [directory / WORKBOOK, directory / MAP]
    for path in paths:
        if path.exists():
            raise Refusal(f"{path}: this file exists already. Name another folder, or move the file away.")
    directory.mkdir(parents=True, exist_ok=True)
    book = Workbook()
    _explain(book)
    for title, table in SHEETS:
        _sheet(book.create_sheet(title), columns_of(table))
    book.save(paths[0])
    paths[1].write_text(EMPTY_MAP, "utf-8")
    return paths


def columns_of(table: str) -> list[tuple[str, Quantity]]:
    """Give the headers of a table of the intake workbook with their quantities, the name of the row first."""
    known = vocabulary().quantities
    quantities = [q for q in known.values() if q.subject == table and q.role != "derived"]
    if table == "relay":
        quantities += [known[name] for name in _OF_RELAYS]
    quantities.sort(key=lambda q: (q.name != _KEYS[table], q.name not in _OF_RELAYS))
    return [(header, q) for q in quantities if (header := header_of(q, table))]


def header_of(quantity: Quantity, table: str) -> str:
    """Give a header that is read as this quantity and nothing else, '' where the vocabulary has none.

    >>> header_of(vocabulary().quantities["full_load_a"], "motor")
    'Full-load current'
    """
    label = quantity.label[0].upper() + quantity.label[1:]
    element = vocabulary().elements.get(quantity.element or "")
    part = vocabulary().parts.get(quantity.part or "")
    composed = [f"{element.function} {word}" for word in part.words if word] if element and part else []
    for header in (label, *composed, *quantity.headers):
        found = match_header(header, table)
        if found.quantity == quantity.name and not found.group and (found.unit is None or not found.unit.base):
            return header
    return ""


def _explain(book: Workbook) -> None:
    sheet = book.active
    assert isinstance(sheet, Worksheet)
    sheet.title = "Read me"
    sheet.column_dimensions["A"].width = 110
    for text, bold in (*_HOW, ("Cautions", True), *((caution, False) for caution in CAUTIONS)):
        sheet.append([text])
        line = sheet.cell(sheet.max_row, 1)
        line.alignment = Alignment(wrap_text=True, vertical="top")
        line.font = Font(bold=bold)


def _sheet(sheet: Worksheet, columns: Sequence[tuple[str, Quantity]]) -> None:
    for column, (header, quantity) in enumerate(columns, 1):
        head = sheet.cell(HEADER_ROW, column, header)
        head.font, head.fill = Font(bold=True), _HEAD
        head.alignment = Alignment(wrap_text=True, vertical="top")
        head.comment = Comment(_note(quantity), "motor-audit", width=320, height=160)
        unit = sheet.cell(UNIT_ROW, column, _unit(quantity))
        unit.font, unit.fill = _GREY, _HEAD
        example = sheet.cell(EXAMPLE_ROW, column, EXAMPLE if column == 1 else _example(quantity))
        example.font = _GREY
        letter = get_column_letter(column)
        sheet.column_dimensions[letter].width = 26 if column == 1 else 14
        if column == 1:
            for row in range(EXAMPLE_ROW, 300):
                # a tag such as 1-2 would become a date
                sheet.cell(row, 1).number_format = "@"
        validation = _validation(quantity)
        if validation is not None:
            validation.add(f"{letter}{EXAMPLE_ROW}:{letter}{ROWS}")
            sheet.add_data_validation(validation)
    sheet.row_dimensions[HEADER_ROW].height = 62
    sheet.freeze_panes = f"B{EXAMPLE_ROW}"
    sheet.print_title_rows = f"{HEADER_ROW}:{UNIT_ROW}"
    sheet.page_setup.orientation = "landscape"


def _unit(quantity: Quantity) -> str | None:
    if quantity.kind != "number" or quantity.unit is None or quantity.unit == DIMENSIONLESS:
        return None
    return _UNIT_IN_WORDS.get(quantity.unit.symbol, quantity.unit.symbol)


def _note(quantity: Quantity) -> str:
    lines = [quantity.label[0].upper() + quantity.label[1:] + "."]
    unit = _unit(quantity)
    if quantity.kind == "number" and quantity.plausible:
        low, high = quantity.plausible
        lines.append(f"Plausible: {low:g} to {high:g}{' ' + unit if unit else ''}.")
    elif quantity.kind == "choice":
        lines.append("One of: " + ", ".join(_spelled(choice) for choice in quantity.choices) + ".")
    elif quantity.kind == "truth":
        lines.append("yes or no." + (" Empty counts as no." if quantity.absent_means_no else ""))
    elif quantity.kind == "date":
        lines.append("A day, such as 2026-03-14.")
    if quantity.bases:
        lines.append(
            "May be a multiple or a per cent: name its base in the cell, such as "
            + " or ".join(f"'{_BASE_EXAMPLES[base]}'" for base in quantity.bases if base in _BASE_EXAMPLES)
            + "."
        )
    if quantity.role == "setting":
        lines.append("OFF where it is switched off.")
    if quantity.ask:
        lines.append(quantity.ask)
    return "\n".join(lines)


_BASE_EXAMPLES = {
    "full_load": "6 x FLA",
    "ct": "1.2 x CT",
    "earth_ct": "0.2 x GFCT",
    "secondary": "5 A sec",
    "motor_voltage": "80 % motor voltage",
    "system_voltage": "80 % system voltage",
    "vt": "80 % VT",
}


def _spelled(choice: str) -> str:
    return choice.replace("_", " ")


def _example(quantity: Quantity) -> str | float | None:
    """Give what stands in the example row: an invented motor's main data; not a recommendation, and never read."""
    return EXAMPLES.get(quantity.name)


def _validation(quantity: Quantity) -> DataValidation | None:
    """Give the drop-down or the plausible range of a column; both warn, and let the user keep the entry."""
    label = quantity.label[:1].upper() + quantity.label[1:]
    if quantity.kind in ("choice", "truth"):
        words = ["yes", "no"] if quantity.kind == "truth" else [_spelled(choice) for choice in quantity.choices]
        formula = '"' + ",".join(words) + '"'
        if len(formula) > LONGEST_LIST:
            return None
        validation = DataValidation(type="list", formula1=formula, allow_blank=True)
    elif quantity.kind == "number" and quantity.plausible:
        low, high = quantity.plausible
        validation = DataValidation(
            type="decimal", operator="between", formula1=f"{low:.15g}", formula2=f"{high:.15g}", allow_blank=True
        )
    elif quantity.kind == "date":
        validation = DataValidation(type="date", operator="greaterThan", formula1="32874", allow_blank=True)
    else:
        return None
    validation.errorStyle = "warning"
    validation.showErrorMessage = True
    validation.errorTitle = "Please check"
    validation.error = f"{label}: see the note at the header. Keep the entry if it is meant."[:225]
    return validation
