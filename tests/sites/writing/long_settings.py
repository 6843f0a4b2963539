"""Settings as exported with one row a setting: relay, function, setting, value, unit."""

from __future__ import annotations

from datetime import date
from pathlib import Path

from openpyxl import Workbook
from openpyxl.styles import Font

from tests.sites.notation import LAYOUTS, as_written
from tests.sites.plant import Record, Site, number, text
from tests.sites.writing.motor_list import BOX, HEADING
from tests.sites.writing.same_bytes import save
from tests.sites.writing.wide_settings import switch_of
from tests.sites.writing.words import ratio, spelled

HEADERS = ("Relay", "Function", "Setting", "Value", "Unit")
GENERAL = (
    ("relay_role", "Feeder Kind"),
    ("relay_type", "Relay Type"),
    ("settings_export_date", "Export Date"),
    ("relay_frequency_hz", "Frequency"),
    ("relay_phase_rotation", "Phase Rotation"),
    ("relay_ct_count", "Phase CTs"),
    ("relay_earth_source", "Earth Fault Source"),
)
UNITS = {"relay_frequency_hz": "Hz"}
ELEMENTS = (
    ("50", "short_circuit", (("short_circuit_trip_pickup_a", "Pickup"), ("short_circuit_trip_delay_s", "Delay"))),
    (
        "49",
        "thermal",
        (
            ("thermal_pickup_a", "Pickup"),
            ("thermal_trip_class", "Trip Class"),
            ("heating_time_constant_s", "Heating Time Constant"),
            ("cooling_time_constant_s", "Cooling Time Constant"),
            ("hot_cold_ratio", "Hot/Cold Ratio"),
            ("unbalance_weight", "Unbalance Weight"),
        ),
    ),
    (
        "46",
        "unbalance",
        (
            ("unbalance_trip_pickup_pct", "Pickup"),
            ("unbalance_trip_delay_s", "Delay"),
            ("unbalance_alarm_pickup_pct", "Alarm Level"),
            ("unbalance_alarm_delay_s", "Alarm Delay"),
        ),
    ),
    ("48", "start_timer", (("start_timer_pickup_a", "Pickup"), ("start_timer_delay_s", "Delay"))),
    (
        "51LR",
        "jam",
        (("jam_trip_pickup_a", "Pickup"), ("jam_trip_delay_s", "Delay"), ("jam_block_s", "Block On Start")),
    ),
    (
        "37",
        "undercurrent",
        (
            ("undercurrent_trip_pickup_a", "Pickup"),
            ("undercurrent_trip_delay_s", "Delay"),
            ("undercurrent_block_s", "Block On Start"),
        ),
    ),
    ("51G", "earth_fault", (("earth_fault_trip_pickup_a", "Pickup"), ("earth_fault_trip_delay_s", "Delay"))),
    ("51", "overcurrent", ()),
    ("87", "differential", ()),
    ("27", "undervoltage", ()),
    ("59", "overvoltage", ()),
    ("47", "phase_sequence", ()),
    (
        "66",
        "starts_limit",
        (("starts_limit_per_hour", "Starts per Hour"), ("start_interval_min", "Time Between Starts")),
    ),
)
WORDS = (
    ("50", "short_circuit_filter", "50 Filter"),
    ("50", "short_circuit_blocked_above_device_rating", "50 Blocked By Current"),
    ("50", "short_circuit_opens", "50 Trips"),
    ("49", "thermal_hot_curve", "Hot Curve"),
    ("49", "thermal_opens", "49 Trips"),
    ("46", "unbalance_base", "46 Base"),
    ("46", "unbalance_opens", "46 Trips"),
    ("51LR", "jam_blocked_by_state", "Jam Blocked In Start"),
    ("51G", "earth_fault_opens", "51G Trips"),
)
ALARMS = {
    "undercurrent": ("37", "Alarm Enable"),
    "thermal": ("49", "Alarm Enable"),
    "unbalance": ("46", "Alarm Enable"),
}


WITHOUT_UNIT = ("jam_trip_delay_s",)
"""This export leaves the unit of these delays out: they are seconds, as everywhere in it."""


def write_long_settings(site: Site, path: Path) -> None:
    """Write the workbook with all relays of the 'lv_long' kind."""
    relays = [relay for relay in site.relays if relay["layout"] == "lv_long"]
    if not relays:
        return
    workbook = Workbook()
    sheet = workbook.worksheets[0]
    sheet.title = "Settings"
    sheet.cell(1, 1, f"Motor relays, 400 V motor control centres - {site.name}").font = Font(bold=True)
    for place, header in enumerate(HEADERS, start=1):
        cell = sheet.cell(3, place, header)
        cell.font, cell.fill, cell.border = Font(bold=True), HEADING, BOX
    row = 4
    for relay in relays:
        for line in relay_lines(relay, site.motor(text(relay, "motor"))):
            for place, content in enumerate((relay["relay_tag"], *line), start=1):
                cell = sheet.cell(row, place, content)
                cell.border = BOX
                if isinstance(content, date):
                    cell.number_format = "yyyy-mm-dd"
            row += 1
    for letter, width in zip("ABCDE", (14, 11, 26, 14, 10), strict=True):
        sheet.column_dimensions[letter].width = width
    sheet.freeze_panes = "A4"
    save(workbook, path)


def relay_lines(relay: Record, motor: Record) -> list[tuple[object, object, object, object]]:
    """Give the lines of one relay: function, setting, value, unit."""
    notation = LAYOUTS["lv_long"]
    lines: list[tuple[object, object, object, object]] = [
        ("General", words, spelled(relay, quantity), UNITS.get(quantity))
        for quantity, words in GENERAL
        if quantity in relay
    ]
    lines.append(("General", "Phase CT Ratio", ratio(relay, "relay_ct_primary_a", "relay_ct_secondary_a"), "A"))
    if "relay_earth_ct_primary_a" in relay:
        lines.append(
            ("General", "Earth CT Ratio", ratio(relay, "relay_earth_ct_primary_a", "relay_earth_ct_secondary_a"), "A")
        )
    if "relay_full_load_a" in relay:
        lines.append(("General", "Motor FLA", number(relay, "relay_full_load_a"), "A"))
    for function, element, quantities in ELEMENTS:
        switch = switch_of(element)
        if switch in relay:
            lines.append((function, "Enable", "ON" if relay[switch] else "OFF", None))
        for quantity, words in quantities:
            if quantity in relay:
                written = notation[quantity]
                unit = {"minutes": "min", "": None}.get(written.unit, written.unit)
                if quantity in WITHOUT_UNIT or quantity == relay.get("without_unit"):
                    unit = None
                lines.append((function, words, as_written(number(relay, quantity), written, relay, motor), unit))
        if element in ALARMS and f"{element}_alarm_on" in relay:
            lines.append((*ALARMS[element], "ON" if relay[f"{element}_alarm_on"] else "OFF", None))
        if element == "thermal" and "thermal_alarm_pct" in relay:
            lines.append((function, "Alarm Level", number(relay, "thermal_alarm_pct"), "%"))
        lines += [
            (at, words, spelled(relay, quantity), None)
            for at, quantity, words in WORDS
            if at == function and quantity in relay
        ]
    return lines
