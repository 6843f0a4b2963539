"""Start records (comma-separated text and workbook) and the bus list."""

from __future__ import annotations

import csv
from datetime import date, datetime
from pathlib import Path

from openpyxl import Workbook
from openpyxl.styles import Alignment, Font

from tests.sites.plant import Record, Site, number
from tests.sites.writing.motor_list import BOX, HEADING
from tests.sites.writing.same_bytes import save
from tests.sites.writing.words import spelled

START_HEADERS = (
    ("Motor Tag", "start_motor"),
    ("Date/Time", "start_moment"),
    ("Start Duration (s)", "start_time_s"),
    ("Starting Current Max (A)", "start_current_a"),
    ("Lowest Voltage (%)", "start_voltage_pct"),
    ("Completed", "start_completed"),
)
BUS_HEADERS = (
    ("Switchboard", "", "bus_name"),
    ("Nominal Voltage", "V", "bus_nominal_v"),
    ("Max Normal Voltage", "V", "bus_highest_voltage_v"),
    ("Frequency", "Hz", "bus_frequency_hz"),
    ("Phase Rotation", "", "bus_phase_rotation"),
    ("Ik max", "kA", "fault_max_ka"),
    ("Ik min", "kA", "fault_min_ka"),
    ("X/R", "", "fault_x_r_ratio"),
    ("Motors Included", "", "fault_includes_motors"),
    ("Fault Study Date", "", "fault_study_date"),
    ("Transformer Changed", "", "supply_changed_date"),
    ("System Earthing", "", "earthing"),
    ("Neutral Resistor", "ohm", "neutral_resistor_ohm"),
    ("Earth Fault Max", "A", "earth_fault_max_a"),
    ("Earth Fault Min", "A", "earth_fault_min_a"),
    ("Fault Clearing Time", "s", "bus_clearing_time_s"),
    ("Standing Unbalance", "%", "standing_unbalance_pct"),
    ("Incomer Overcurrent", "", "incomer_overcurrent_on"),
    ("Incomer Pickup", "A", "incomer_pickup_a"),
    ("Incomer Curve", "", "incomer_curve"),
    ("Incomer TMS", "", "incomer_time_multiplier"),
    ("Incomer Delay", "s", "incomer_delay_s"),
    ("Incomer Earth Fault", "", "incomer_earth_fault_on"),
    ("Incomer Earth Fault Pickup", "A", "incomer_earth_fault_pickup_a"),
    ("Incomer Earth Fault Delay", "s", "incomer_earth_fault_delay_s"),
    ("Auto Transfer", "", "automatic_transfer"),
)


def _ordered(starts: list[Record]) -> list[Record]:
    return sorted(starts, key=lambda start: (str(start["start_moment"]), str(start["start_motor"])))


def write_start_text(starts: list[Record], path: Path) -> None:
    """Write start records as comma-separated text, in order of time."""
    with path.open("w", encoding="utf-8", newline="") as file:
        writer = csv.writer(file, lineterminator="\n")
        writer.writerow(header for header, _ in START_HEADERS)
        for start in _ordered(starts):
            moment = start["start_moment"]
            line = [spelled(start, quantity) for _, quantity in START_HEADERS]
            if isinstance(moment, datetime):
                line[1] = moment.isoformat(sep=" ")
            writer.writerow("" if content is None else content for content in line)


def write_start_workbook(starts: list[Record], path: Path) -> None:
    """Write start records as a workbook, motor by motor, with the clock in a column of its own."""
    workbook = Workbook()
    sheet = workbook.worksheets[0]
    sheet.title = "Starts"
    sheet.cell(1, 1, "Recorded starts, read from the relays").font = Font(bold=True)
    headers = ("Motor Tag", "Date", "Time of Day", *(header for header, _ in START_HEADERS[2:]))
    for place, header in enumerate(headers, start=1):
        cell = sheet.cell(3, place, header)
        cell.font, cell.fill, cell.border = Font(bold=True), HEADING, BOX
        sheet.column_dimensions["ABCDEFGHI"[place - 1]].width = 16
    for row, start in enumerate(starts, start=4):
        moment = start["start_moment"]
        if not isinstance(moment, datetime):
            raise TypeError("a recorded start needs its moment")
        line = [start["start_motor"], moment.date(), moment.strftime("%H:%M:%S")]
        line += [spelled(start, quantity) for _, quantity in START_HEADERS[2:]]
        for place, content in enumerate(line, start=1):
            cell = sheet.cell(row, place, content)
            if isinstance(content, date):
                cell.number_format = "yyyy-mm-dd"
    save(workbook, path)


def write_bus_list(site: Site, path: Path) -> None:
    """Write the bus list; buses stand in rows, units in a row beneath the headers."""
    workbook = Workbook()
    sheet = workbook.worksheets[0]
    sheet.title = "Switchboards"
    sheet.cell(1, 1, f"{site.name} - switchboards and fault levels").font = Font(bold=True, size=13)
    sheet.cell(2, 1, "From the network study; least fault with one intake out of service")
    columns = [column for column in BUS_HEADERS if any(column[2] in bus for bus in site.buses)]
    for place, (header, unit, _) in enumerate(columns, start=1):
        for row, content in ((4, header), (5, f"[{unit}]" if unit else None)):
            cell = sheet.cell(row, place, content)
            cell.font, cell.fill, cell.border = Font(bold=True), HEADING, BOX
            cell.alignment = Alignment(wrap_text=True, horizontal="center")
    for row, bus in enumerate(site.buses, start=6):
        for place, (_, _, quantity) in enumerate(columns, start=1):
            cell = sheet.cell(row, place, spelled(bus, quantity))
            cell.border = BOX
            if isinstance(cell.value, date):
                cell.number_format = "yyyy-mm-dd"
    save(workbook, path)


def high_voltage_tags(site: Site) -> set[str]:
    """Give the tags of the motors above 1 kV."""
    return {str(motor["motor"]) for motor in site.motors if number(motor, "rated_voltage_v") > 1000}
