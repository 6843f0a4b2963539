"""Writes one small fleet in many ways: layouts, header styles, unit styles, file formats.

The facts stand here once, in the quantities' own units. What a style changes is only how they are written, so
that any two ways must be read as the same fleet. All values are invented.
"""

from __future__ import annotations

import csv
import zipfile
from collections.abc import Callable, Iterable, Sequence
from datetime import date, datetime
from itertools import combinations, product
from pathlib import Path
from xml.sax.saxutils import escape

import openpyxl

Row = list[object]
Grid = list[Row]

MOTORS = {
    "P-101A": {
        "service": "Feed pump",
        "bus": "SWGR-1",
        "relay": "R-101",
        "rated_power_kw": 110.0,
        "rated_voltage_v": 3300.0,
        "full_load_a": 23.5,
        "locked_rotor_a": 141.0,
        "rated_speed_rpm": 1485.0,
        "service_factor": 1.15,
        "efficiency_pct": 94.5,
        "safe_stall_hot_s": 12.0,
        "safe_stall_cold_s": 18.0,
        "ct_primary_a": 50.0,
        "ct_secondary_a": 1.0,
        "cable_length_m": 120.0,
        "starting_method": "DOL",
    },
    "P-102": {
        "service": "Transfer pump",
        "bus": "SWGR-1",
        "relay": "R-102",
        "rated_power_kw": 250.0,
        "rated_voltage_v": 3300.0,
        "full_load_a": 51.25,
        "locked_rotor_a": 320.0,
        "rated_speed_rpm": 2975.0,
        "service_factor": 1.0,
        "efficiency_pct": 95.1,
        "safe_stall_hot_s": 9.5,
        "safe_stall_cold_s": 15.0,
        "ct_primary_a": 100.0,
        "ct_secondary_a": 1.0,
        "cable_length_m": 85.0,
        "starting_method": "DOL",
    },
    "F-201": {
        "service": "Cooling fan",
        "bus": "MCC-2",
        "relay": "R-201",
        "rated_power_kw": 37.0,
        "rated_voltage_v": 400.0,
        "full_load_a": 67.5,
        "locked_rotor_a": 473.0,
        "rated_speed_rpm": 980.0,
        "service_factor": 1.0,
        "efficiency_pct": 92.7,
        "safe_stall_hot_s": 14.0,
        "safe_stall_cold_s": 22.0,
        "ct_primary_a": 75.0,
        "ct_secondary_a": 5.0,
        "cable_length_m": 40.0,
        "starting_method": "VSD",
    },
}
SETTINGS = {
    "R-101": {
        "relay_full_load_a": 23.5,
        "relay_ct_primary_a": 50.0,
        "relay_ct_secondary_a": 1.0,
        "short_circuit_trip_pickup_a": 270.25,
        "short_circuit_trip_delay_s": 0.05,
        "jam_trip_pickup_a": 58.75,
        "jam_trip_delay_s": 2.0,
        "unbalance_trip_pickup_pct": 15.0,
        "unbalance_trip_delay_s": 5.0,
        "earth_fault_trip_pickup_a": 5.0,
        "start_timer_delay_s": 10.0,
    },
    "R-102": {
        "relay_full_load_a": 51.25,
        "relay_ct_primary_a": 100.0,
        "relay_ct_secondary_a": 1.0,
        "short_circuit_trip_pickup_a": 589.375,
        "short_circuit_trip_delay_s": 0.05,
        "jam_trip_pickup_a": None,
        "jam_trip_delay_s": None,
        "unbalance_trip_pickup_pct": 20.0,
        "unbalance_trip_delay_s": 4.0,
        "earth_fault_trip_pickup_a": 10.0,
        "start_timer_delay_s": 8.0,
    },
    "R-201": {
        "relay_full_load_a": 67.5,
        "relay_ct_primary_a": 75.0,
        "relay_ct_secondary_a": 5.0,
        "short_circuit_trip_pickup_a": 776.25,
        "short_circuit_trip_delay_s": 0.1,
        "jam_trip_pickup_a": 135.0,
        "jam_trip_delay_s": 3.0,
        "unbalance_trip_pickup_pct": 15.0,
        "unbalance_trip_delay_s": 5.0,
        "earth_fault_trip_pickup_a": 20.0,
        "start_timer_delay_s": 14.0,
    },
}
"""None: the function is switched off."""
BUSES = {
    "SWGR-1": {
        "bus_nominal_v": 3300.0,
        "fault_max_ka": 25.0,
        "fault_min_ka": 12.0,
        "fault_x_r_ratio": 14.0,
        "earthing": "NER",
    },
    "MCC-2": {
        "bus_nominal_v": 400.0,
        "fault_max_ka": 40.0,
        "fault_min_ka": 15.0,
        "fault_x_r_ratio": 6.0,
        "earthing": "TN-S",
    },
}
STARTS = [
    ("P-101A", datetime(2026, 3, 14, 6, 30), 3.2, 139.0),
    ("P-101A", datetime(2026, 3, 20, 18, 5), 3.4, 138.0),
    ("F-201", datetime(2026, 4, 2, 9, 0), 6.1, 455.0),
]
START_QUANTITIES = ("start_motor", "start_moment", "start_time_s", "start_current_a")

# quantity: US header, IEC header, group above it
WORDS = {
    "motor": ("Tag No.", "KKS", "Identification"),
    "service": ("Load Description", "Service", "Identification"),
    "bus": ("MCC", "Switchboard", "Identification"),
    "relay": ("Relay ID", "Protection relay", "Identification"),
    "rated_power_kw": ("Nameplate HP", "Rated power", "Motor"),
    "rated_voltage_v": ("NP Volts", "Rated voltage", "Motor"),
    "full_load_a": ("FLA", "Full load current", "Motor"),
    "locked_rotor_a": ("LRA", "Locked rotor current", "Motor"),
    "rated_speed_rpm": ("FL RPM", "Rated speed", "Motor"),
    "service_factor": ("S.F.", "Service factor", "Motor"),
    "efficiency_pct": ("Eff", "η", "Motor"),
    "safe_stall_hot_s": ("Safe Stall Hot", "Locked-rotor time warm", "Motor"),
    "safe_stall_cold_s": ("Safe Stall Cold", "Locked-rotor time cold", "Motor"),
    "ct_primary_a": ("CT Primary", "CT primary", "CT"),
    "ct_secondary_a": ("CT Secondary", "CT secondary", "CT"),
    "cable_length_m": ("Cable Length", "Cable length", "Cable"),
    "starting_method": ("Starter Type", "Starting method", "Identification"),
    "relay_tag": ("Relay ID", "Protection relay", "Relay"),
    "relay_full_load_a": ("Motor FLA (relay)", "FLC set", "Relay"),
    "relay_ct_primary_a": ("CT Primary", "CT primary", "Relay"),
    "relay_ct_secondary_a": ("CT Secondary", "CT secondary", "Relay"),
    "short_circuit_trip_pickup_a": ("Inst PU", "I>> set", "50"),
    "short_circuit_trip_delay_s": ("Inst TD", "I>> delay", "50"),
    "jam_trip_pickup_a": ("Mech Jam Pickup", "Running stall pickup", "51LR"),
    "jam_trip_delay_s": ("Mech Jam Delay", "Running stall time", "51LR"),
    "unbalance_trip_pickup_pct": ("Current Unbal. PU", "I2> set", "46"),
    "unbalance_trip_delay_s": ("Current Unbal. TD", "I2> time", "46"),
    "earth_fault_trip_pickup_a": ("GF PU", "Io> set", "51G"),
    "start_timer_delay_s": ("Accel Timer", "Start-up time delay", "48"),
    "bus_name": ("SWGR", "Switchboard", "Bus"),
    "bus_nominal_v": ("System Voltage", "Rated bus voltage", "Bus"),
    "fault_max_ka": ("Max Fault", "Ik max", "Bus"),
    "fault_min_ka": ("Min Fault", "Ik min", "Bus"),
    "fault_x_r_ratio": ("X/R", "X/R", "Bus"),
    "earthing": ("Grounding", "System earthing", "Bus"),
    "start_motor": ("Motor Tag", "Motor", "Start"),
    "start_moment": ("Date & Time", "Date/time", "Start"),
    "start_time_s": ("Start Duration", "Run-up time", "Start"),
    "start_current_a": ("Max Start Current", "Starting current max", "Start"),
}
NUMBERED = {
    "short_circuit_trip_pickup_a": "50 PU",
    "short_circuit_trip_delay_s": "50 TD",
    "jam_trip_pickup_a": "51LR P/U",
    "jam_trip_delay_s": "51LR T.D.",
    "unbalance_trip_pickup_pct": "46-Pickup",
    "unbalance_trip_delay_s": "46_Delay",
    "earth_fault_trip_pickup_a": "51G PKP",
    "start_timer_delay_s": "48 Time",
}
BELOW = {
    # what stands below 'Motor', '50', ... in a heading of two rows
    "rated_power_kw": "Rated Power",
    "rated_voltage_v": "Voltage",
    "full_load_a": "Rated Current",
    "locked_rotor_a": "Starting Current",
    "rated_speed_rpm": "Speed",
    "ct_primary_a": "Primary",
    "ct_secondary_a": "Secondary",
    "cable_length_m": "Length",
    "relay_full_load_a": "FLA",
    "short_circuit_trip_pickup_a": "Pickup",
    "short_circuit_trip_delay_s": "Delay",
    "jam_trip_pickup_a": "Pickup",
    "jam_trip_delay_s": "Delay",
    "unbalance_trip_pickup_pct": "Pickup",
    "unbalance_trip_delay_s": "Delay",
    "earth_fault_trip_pickup_a": "Pickup",
    "start_timer_delay_s": "Delay",
}
# quantity: (unit, factor from the own unit) as IEC sites write, and as US sites write it in other units
IEC_UNITS = {"_kw": ("kW", 1.0), "_v": ("V", 1.0), "_ka": ("kA", 1.0), "_a": ("A", 1.0), "_s": ("s", 1.0),
             "_pct": ("%", 1.0), "_rpm": ("r/min", 1.0), "_m": ("m", 1.0)}  # fmt: skip
HP_PER_KW = 1 / 0.74569987158227022
"""One horsepower is 550 ft lbf/s = 745.69987158227022 W."""
OTHER_UNITS = {"_kw": ("hp", HP_PER_KW), "_v": ("kV", 1e-3), "_ka": ("A", 1e3), "_a": ("amps", 1.0),
               "_s": ("ms", 1e3), "_pct": ("%", 1.0), "_rpm": ("RPM", 1.0), "_m": ("ft", 1 / 0.3048)}  # fmt: skip
LAYOUTS = ("in the motor list", "row a relay", "row a setting", "sheet a relay", "blocks side by side")
HEADERS = ("US", "IEC", "device numbers", "two rows", "odd spelling")
UNITS = ("brackets", "row below", "in cells", "after a comma", "other units")
FORMATS = ("xlsx", "csv", "decimal comma", "ods", "tsv")
SURROUNDINGS = ("bare", "title, areas, totals, notes", "shifted, blank rows and columns")


def pairwise(*axes: Sequence[str]) -> list[tuple[str, ...]]:
    """Give few combinations in which every pair of choices occurs, found greedily."""
    open_pairs = {(i, a, j, b) for i, j in combinations(range(len(axes)), 2) for a, b in product(axes[i], axes[j])}
    everything = list(product(*axes))
    chosen = []
    while open_pairs:
        best = max(everything, key=lambda row: len(_pairs(row) & open_pairs))
        chosen.append(best)
        open_pairs -= _pairs(best)
    return chosen


def _pairs(row: Sequence[str]) -> set[tuple[int, str, int, str]]:
    return {(i, row[i], j, row[j]) for i, j in combinations(range(len(row)), 2)}


class Writer:
    """Writes the fleet in one combination of styles."""

    def __init__(self, headers: str, units: str, surroundings: str) -> None:
        self.headers = headers
        self.units = units
        self.surroundings = surroundings
        self.merges: dict[str, list[tuple[int, int, int, int]]] = {}

    def unit(self, quantity: str) -> tuple[str, float]:
        table = OTHER_UNITS if self.units == "other units" else IEC_UNITS
        if quantity == "service_factor" or quantity.endswith("_ratio"):
            return "", 1.0
        for ending, unit in sorted(table.items(), key=lambda item: -len(item[0])):
            if quantity.endswith(ending):
                return unit
        return "", 1.0

    def words(self, quantity: str) -> str:
        us, iec, _ = WORDS[quantity]
        if self.headers == "device numbers":
            return NUMBERED.get(quantity, us)
        if self.headers == "odd spelling":
            return us.upper().replace(" ", "\n").replace("NO.", "No")
        text = iec if self.headers == "IEC" else us
        if quantity == "rated_power_kw" and self.units != "other units":
            return "Rated Power"
        return text

    def header(self, quantity: str) -> str:
        unit, _ = self.unit(quantity)
        text = self.words(quantity)
        if quantity == "rated_power_kw" and self.units != "other units":
            text = text.replace("NAMEPLATE\nHP", "RATED\nPOWER").replace("Nameplate HP", "Rated Power")
        if not unit or self.units in ("row below", "in cells"):
            return text
        return f"{text}, {unit}" if self.units == "after a comma" else f"{text} ({unit})"

    def value(self, quantity: str, value: object) -> object:
        if value is None:
            return "OFF"
        if not isinstance(value, float):
            return value
        unit, factor = self.unit(quantity)
        number = float(f"{value * factor:.12g}")
        return f"{number:.12g} {unit}" if self.units == "in cells" and unit else number

    def table(self, quantities: Sequence[str], rows: Iterable[Row], title: str, area: bool = False) -> Grid:
        """Give a table with headers, units and what surrounds it."""
        grid: Grid = []
        top = len(self.before(title))
        if self.headers == "two rows":
            groups = [WORDS[q][2] for q in quantities]
            grid.append([g if i == 0 or groups[i - 1] != g else None for i, g in enumerate(groups)])
            grid.append([self._below(q) for q in quantities])
            shift = self.shift()
            start = 0
            for i in range(1, len(groups) + 1):
                if i == len(groups) or groups[i] != groups[start]:
                    if i - start > 1:
                        self.merges.setdefault(title, []).append((top + 1, start + 1 + shift, top + 1, i + shift))
                    start = i
        else:
            grid.append([self.header(q) for q in quantities])
        if self.units == "row below":
            grid.append([self.unit(q)[0] or None for q in quantities])
        body = [[self.value(q, v) for q, v in zip(quantities, row, strict=True)] for row in rows]
        return self.surround(grid, body, title, len(quantities), area)

    def _below(self, quantity: str) -> str:
        unit, _ = self.unit(quantity)
        text = BELOW.get(quantity) or self.words(quantity)
        if not unit or self.units in ("row below", "in cells"):
            return text
        return f"{text}, {unit}" if self.units == "after a comma" else f"{text} ({unit})"

    def before(self, title: str) -> Grid:
        if self.surroundings == "bare":
            return []
        if self.surroundings.startswith("title"):
            return [[f"{title} of the example works"], ["Rev. 3", None, "checked"], []]
        return [[], []]

    def shift(self) -> int:
        return 1 if self.surroundings.startswith("shifted") else 0

    def surround(self, head: Grid, body: Grid, title: str, width: int, area: bool) -> Grid:
        if self.surroundings == "bare":
            return head + body
        if self.surroundings.startswith("title"):
            first = [["AREA 100"]] if area else []
            notes = [[], ["Notes:"], ["1. All data as found on the plates."]]
            total = [["Total", None, None, None, 397.0]] if area else []
            return self.before(title) + head + first + body + total + notes
        spread = [row for pair in zip(body, [[]] * len(body), strict=True) for row in pair]
        return [[None, *row] if row else row for row in self.before(title) + head + spread]


def write_fleet(folder: Path, layout: str, headers: str, units: str, form: str, surroundings: str) -> None:
    """Write the fleet into a folder."""
    writer = Writer(headers, units, surroundings)
    sheets: dict[str, Grid] = {}
    motor_quantities = ["motor", *next(iter(MOTORS.values()))]
    rows = [[tag, *facts.values()] for tag, facts in MOTORS.items()]
    if layout == "in the motor list":
        extra = [q for q in next(iter(SETTINGS.values())) if not q.startswith("relay_ct")]
        motor_quantities += extra
        for row, facts in zip(rows, MOTORS.values(), strict=True):
            row += [SETTINGS[str(facts["relay"])][q] for q in extra]
    sheets["Motors"] = writer.table(motor_quantities, rows, "Motors", area=True)
    if layout == "in the motor list":
        # what the relay is told of its transformers cannot stand beside the fitted ones
        told = ["relay_tag", "relay_ct_primary_a", "relay_ct_secondary_a"]
        sheets["Relays"] = writer.table(told, [[r, *(s[q] for q in told[1:])] for r, s in SETTINGS.items()], "Relays")
    elif layout == "row a relay":
        told = ["relay_tag", *next(iter(SETTINGS.values()))]
        sheets["Relays"] = writer.table(told, [[r, *s.values()] for r, s in SETTINGS.items()], "Relays")
    elif layout == "row a setting":
        sheets["Relays"] = _list(writer)
    elif layout == "sheet a relay":
        sheets |= {relay: _block(writer, relay, settings) for relay, settings in SETTINGS.items()}
    else:
        blocks = [_block(writer, relay, settings, named=True) for relay, settings in SETTINGS.items()]
        height = max(map(len, blocks))
        width = max(len(row) for block in blocks for row in block) + 1
        sheets["Relays"] = [
            [cell for block in blocks for cell in _padded(block[i] if i < len(block) else [], width)]
            for i in range(height)
        ]
    buses = ["bus_name", *next(iter(BUSES.values()))]
    sheets["Buses"] = writer.table(buses, [[b, *facts.values()] for b, facts in BUSES.items()], "Buses")
    sheets["Starts"] = writer.table(START_QUANTITIES, [list(start) for start in STARTS], "Starts")
    FORMS[form](folder, sheets, writer.merges)


def _padded(row: Row, width: int) -> Row:
    return row + [None] * (width - len(row))


def _list(writer: Writer) -> Grid:
    """Give one row a setting; units have a column unless they stand in the cells."""
    own_column = writer.units != "in cells"
    head: Row = ["Value", "Relay", "Setting", "Remarks"] + (["Unit"] if own_column else [])
    body: Grid = []
    for relay, settings in SETTINGS.items():
        for quantity, value in settings.items():
            unit = writer.unit(quantity)[0]
            row: Row = [writer.value(quantity, value), relay, writer.words(quantity), "ok"]
            body.append(row + ([unit or None] if own_column else []))
    return writer.surround([head], body, "Relays", len(head), area=False)


def _block(writer: Writer, relay: str, settings: dict[str, object], named: bool = False) -> Grid:
    """Give names beside values, by functions where the headers are of two rows."""
    own_column = writer.units in ("row below", "other units")
    grid: Grid = [["Relay", relay]] if named else [[f"Settings as left in {relay}"], []]
    last = ""
    for quantity, value in settings.items():
        group = WORDS[quantity][2]
        if writer.headers == "two rows" and group != last and group != "Relay":
            grid.append([group])
        last = group
        name = writer._below(quantity) if writer.headers == "two rows" else writer.header(quantity)
        unit = writer.unit(quantity)[0]
        row: Row = [name.partition(" (")[0] if own_column and name.endswith(f"({unit})") else name]
        row.append(writer.value(quantity, value))
        grid.append(row + ([unit or None] if own_column else []))
    return grid


def _write_xlsx(folder: Path, sheets: dict[str, Grid], merges: dict[str, list[tuple[int, int, int, int]]]) -> None:
    book = openpyxl.Workbook()
    book.remove(book.active)
    for title, grid in sheets.items():
        sheet = book.create_sheet(title)
        for row in grid:
            sheet.append(row)
        for top, left, bottom, right in merges.get(title, ()):
            sheet.merge_cells(start_row=top, start_column=left, end_row=bottom, end_column=right)
    book.save(folder / "fleet.xlsx")


def _text(value: object, comma: bool) -> str:
    if value is None:
        return ""
    if isinstance(value, datetime | date):
        return value.isoformat(sep=" ") if isinstance(value, datetime) else value.isoformat()
    text = f"{value:.12g}" if isinstance(value, float) else str(value)
    numeral = isinstance(value, float) or (text[:1].isdigit() and " " in text)
    return text.replace(".", ",") if comma and numeral else text


def _separated(separator: str, comma: bool, suffix: str) -> Callable[..., None]:
    def write(folder: Path, sheets: dict[str, Grid], merges: object) -> None:
        for title, grid in sheets.items():
            width = max(len(row) for row in grid)
            with (folder / f"{title}{suffix}").open("w", encoding="utf-8", newline="") as file:
                lines = csv.writer(file, delimiter=separator)
                lines.writerows([_text(cell, comma) for cell in _padded(row, width)] for row in grid)

    return write


def _write_ods(folder: Path, sheets: dict[str, Grid], merges: object) -> None:
    """Write a minimal OpenDocument spreadsheet (OASIS OpenDocument 1.2, part 1)."""
    tables = []
    for title, grid in sheets.items():
        rows = []
        for row in grid:
            cells = "".join(map(_ods_cell, row)) or "<table:table-cell/>"
            rows.append(f"<table:table-row>{cells}</table:table-row>")
        tables.append(f'<table:table table:name="{escape(title)}">{"".join(rows)}</table:table>')
    content = (
        '<?xml version="1.0" encoding="UTF-8"?><office:document-content office:version="1.2" '
        'xmlns:office="urn:oasis:names:tc:opendocument:xmlns:office:1.0" '
        'xmlns:table="urn:oasis:names:tc:opendocument:xmlns:table:1.0" '
        'xmlns:text="urn:oasis:names:tc:opendocument:xmlns:text:1.0">'
        f"<office:body><office:spreadsheet>{''.join(tables)}</office:spreadsheet></office:body>"
        "</office:document-content>"
    )
    kind = "application/vnd.oasis.opendocument.spreadsheet"
    manifest = (
        '<?xml version="1.0" encoding="UTF-8"?><manifest:manifest '
        'xmlns:manifest="urn:oasis:names:tc:opendocument:xmlns:manifest:1.0" manifest:version="1.2">'
        f'<manifest:file-entry manifest:full-path="/" manifest:media-type="{kind}"/>'
        '<manifest:file-entry manifest:full-path="content.xml" manifest:media-type="text/xml"/></manifest:manifest>'
    )
    with zipfile.ZipFile(folder / "fleet.ods", "w") as archive:
        archive.writestr("mimetype", kind)
        archive.writestr("content.xml", content)
        archive.writestr("META-INF/manifest.xml", manifest)


def _ods_cell(value: object) -> str:
    if value is None:
        return "<table:table-cell/>"
    if isinstance(value, float):
        return f'<table:table-cell office:value-type="float" office:value="{value!r}"/>'
    if isinstance(value, datetime):
        return f'<table:table-cell office:value-type="date" office:date-value="{value.isoformat()}"/>'
    lines = "".join(f"<text:p>{escape(line)}</text:p>" for line in str(value).split("\n"))
    return f'<table:table-cell office:value-type="string">{lines}</table:table-cell>'


FORMS: dict[str, Callable[..., None]] = {
    "xlsx": _write_xlsx,
    "csv": _separated(",", False, ".csv"),
    "decimal comma": _separated(";", True, ".csv"),
    "tsv": _separated("\t", False, ".tsv"),
    "ods": _write_ods,
}
