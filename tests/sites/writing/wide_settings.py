"""Settings as exported with one row a relay and a column a setting; units in the headers."""

from __future__ import annotations

from dataclasses import dataclass
from datetime import date
from pathlib import Path

from openpyxl import Workbook
from openpyxl.styles import Alignment, Font
from openpyxl.utils import get_column_letter
from openpyxl.worksheet.worksheet import Worksheet

from tests.sites.notation import LAYOUTS, Written, as_written
from tests.sites.plant import Record, Site, number, text
from tests.sites.writing.motor_list import BOX, HEADING
from tests.sites.writing.same_bytes import save
from tests.sites.writing.words import ratio, spelled

SHEETS = {"mv_breaker": "6.6 kV breakers", "mv_contactor": "3.3 kV contactors", "lv_breaker": "690 V breakers"}
OTHER_RELAYS = {
    "mv_breaker": (("R-INC6A", "incomer"), ("R-INC6B", "incomer"), ("R-TX7", "transformer"), ("R-BT6", "coupler")),
    "mv_contactor": (("R-INC3A", "incomer"), ("R-3A09", "spare")),
    "lv_breaker": (("R-INC7", "incomer"),),
}
"""Relays of the same export that serve no motor."""

ELEMENTS = (
    (
        "short_circuit",
        "50",
        ("trip_pickup_a", "trip_delay_s"),
        ("short_circuit_filter", "50 Filter"),
        ("short_circuit_blocked_above_device_rating", "Overcurrent Blocking"),
        ("short_circuit_opens", "50 Trips"),
    ),
    ("overcurrent", "51", ("trip_pickup_a", "time_multiplier"), ("overcurrent_curve", "51 Curve")),
    ("thermal", "49", ("pickup_a",), ("thermal_hot_curve", "Thermal Hot Curve"), ("thermal_opens", "49 Trips")),
    (
        "unbalance",
        "46",
        ("trip_pickup_pct", "trip_delay_s", "alarm_pickup_pct", "alarm_delay_s"),
        ("unbalance_base", "46 Base"),
        ("unbalance_opens", "46 Trips"),
    ),
    ("start_timer", "48", ("pickup_a", "delay_s")),
    ("jam", "Jam", ("trip_pickup_a", "trip_delay_s", "block_s"), ("jam_blocked_by_state", "Jam Blocked In Start")),
    ("undercurrent", "37", ("trip_pickup_a", "trip_delay_s", "block_s")),
    (
        "earth_fault",
        "51G",
        ("trip_pickup_a", "trip_delay_s"),
        ("earth_fault_blocked_in_start", "GF Block On Start"),
        ("earth_fault_opens", "51G Trips"),
    ),
    (
        "differential",
        "87",
        ("run_pickup_a", "start_pickup_a", "run_delay_s", "start_delay_s"),
        ("differential_kind", "87 Type"),
    ),
    ("undervoltage", "27", ("trip_pickup_v", "trip_delay_s")),
    ("overvoltage", "59", ("trip_pickup_v", "trip_delay_s")),
    ("phase_sequence", "47", ("trip_pickup_pct", "trip_delay_s")),
    ("starts_limit", "66", ("per_hour",)),
    ("stator_temperature", "Stator RTD", ("trip_c", "alarm_c")),
    ("bearing_temperature", "Bearing RTD", ("trip_c", "alarm_c")),
)
THERMAL_OWN = (
    "heating_time_constant_s",
    "cooling_time_constant_s",
    "hot_cold_ratio",
    "unbalance_weight",
    "thermal_alarm_pct",
)
AFTER_LIMIT = ("start_interval_min", "restart_delay_s")
ALARMS = {
    "thermal": "49 Alarm On",
    "unbalance": "46 Alarm On",
    "stator_temperature": "Stator RTD Alarm On",
    "bearing_temperature": "Bearing RTD Alarm On",
    "jam": "",
    "undercurrent": "37 Alarm",
}


@dataclass(frozen=True)
class SettingColumn:
    """A column of the export: header, quantity, how it is written (None: words), and the switch that turns it off."""

    header: str
    quantity: str
    written: Written | None = None
    switch: str = ""


def switch_of(element: str) -> str:
    """Give the quantity that says whether an element trips."""
    return f"{element}_on" if element in ("start_timer", "starts_limit") else f"{element}_trip_on"


def _element_columns(layout: str) -> list[SettingColumn]:
    notation = LAYOUTS[layout]
    states = layout != "mv_contactor"
    columns = []
    for element, word, parts, *own in ELEMENTS:
        switch = switch_of(element)
        if states:
            columns.append(SettingColumn(f"{word} Enable", switch))
        for part in parts:
            quantity = f"{element}_{part}" if f"{element}_{part}" in notation else f"{element}s_{part}"
            if quantity not in notation:
                quantity = f"starts_limit_{part}"
            written = notation[quantity]
            off_here = not states and part in (parts[0],)
            columns.append(SettingColumn(_header(written), quantity, written, switch if off_here else ""))
        if element == "thermal":
            columns += [SettingColumn(_header(notation[name]), name, notation[name]) for name in THERMAL_OWN]
        if element == "starts_limit":
            columns += [SettingColumn(_header(notation[name]), name, notation[name]) for name in AFTER_LIMIT]
        columns += [SettingColumn(header, quantity) for quantity, header in own]
        if ALARMS.get(element):
            columns.append(SettingColumn(ALARMS[element], f"{element}_alarm_on"))
    return columns


def _header(written: Written) -> str:
    unit = {"minutes": "min", "A sec earth": "A sec"}.get(written.unit, written.unit)
    return f"{written.header} ({unit})" if unit else written.header


GENERAL = (
    SettingColumn("Relay Tag", "relay_tag"),
    SettingColumn("Feeder Kind", "relay_role"),
    SettingColumn("Relay Type", "relay_type"),
    SettingColumn("Setting Group", "setting_group"),
    SettingColumn("Active Group", "group_active"),
    SettingColumn("Selectable", "group_selectable"),
    SettingColumn("Export Date", "settings_export_date"),
    SettingColumn("System Frequency (Hz)", "relay_frequency_hz"),
    SettingColumn("Phase Rotation", "relay_phase_rotation"),
    SettingColumn("Phase CT Ratio", "relay_ct_primary_a"),
    SettingColumn("Phase CTs", "relay_ct_count"),
    SettingColumn("Earth Fault Source", "relay_earth_source"),
    SettingColumn("Earth CT Ratio", "relay_earth_ct_primary_a"),
    SettingColumn("VT Ratio", "relay_vt_primary_v"),
    SettingColumn("VT Connection", "relay_vt_connection"),
)
RATIOS = {
    "relay_ct_primary_a": "relay_ct_secondary_a",
    "relay_earth_ct_primary_a": "relay_earth_ct_secondary_a",
    "relay_vt_primary_v": "relay_vt_secondary_v",
}


def write_wide_settings(site: Site, path: Path) -> None:
    """Write the workbook, a sheet a kind of relay."""
    workbook = Workbook()
    workbook.remove(workbook.worksheets[0])
    for layout, title in SHEETS.items():
        relays = [relay for relay in site.relays if relay["layout"] == layout]
        if relays:
            _write_sheet(workbook.create_sheet(title), site, layout, relays)
    if workbook.worksheets:
        save(workbook, path)


def _write_sheet(sheet: Worksheet, site: Site, layout: str, relays: list[Record]) -> None:
    notation = LAYOUTS[layout]
    full_load = notation["relay_full_load_a"]
    columns = [*GENERAL, SettingColumn(_header(full_load), "relay_full_load_a", full_load), *_element_columns(layout)]
    columns = [column for column in columns if any(_present(relay, column) for relay in relays)]
    sheet.cell(1, 1, f"{site.name} - relay settings as read").font = Font(bold=True, size=13)
    sheet.cell(2, 1, f"{SHEETS[layout]}, all values as they stand in the relay")
    for place, column in enumerate(columns, start=1):
        cell = sheet.cell(4, place, column.header)
        cell.font, cell.fill, cell.border = Font(bold=True), HEADING, BOX
        cell.alignment = Alignment(wrap_text=True, horizontal="center", vertical="center")
        sheet.column_dimensions[get_column_letter(place)].width = max(9, min(len(column.header), 14) + 2)
    others = [{"relay_tag": tag, "relay_role": role} for tag, role in OTHER_RELAYS[layout] if len(relays) > 4]
    for row, relay in enumerate([*relays, *others], start=5):
        motor = site.motor(text(relay, "motor")) if "motor" in relay else {}
        for place, column in enumerate(columns, start=1):
            cell = sheet.cell(row, place, _content(relay, motor, column))
            cell.border, cell.alignment = BOX, Alignment(horizontal="center")
            if isinstance(cell.value, date):
                cell.number_format = "yyyy-mm-dd"
    sheet.freeze_panes = "B5"


def _present(relay: Record, column: SettingColumn) -> bool:
    return column.quantity in relay or bool(column.switch and column.switch in relay)


def _content(relay: Record, motor: Record, column: SettingColumn) -> object:
    if column.quantity in RATIOS:
        return ratio(relay, column.quantity, RATIOS[column.quantity])
    if column.switch and relay.get(column.switch) is False:
        return "OFF"
    if column.written is None:
        return spelled(relay, column.quantity)
    if column.quantity not in relay:
        return None
    value = as_written(number(relay, column.quantity), column.written, relay, motor)
    return int(value) if value == int(value) else value
