"""Small plants to compare: built from plain values, or written as workbooks."""

from __future__ import annotations

from collections.abc import Callable, Mapping, Sequence
from datetime import date
from pathlib import Path
from typing import Any

import pytest
from openpyxl import Workbook

from audit.checks.catalogue import Catalogue, load_catalogue
from audit.findings.audit import Audit
from audit.fleet.build import fleet_of
from audit.pipeline import audit_fleet

DAY = date(2026, 11, 30)
Row = Mapping[str, Any]

BUS: Row = {
    "bus_name": "B-1", "bus_nominal_v": 6600, "fault_max_ka": 20, "fault_min_ka": 10, "fault_x_r_ratio": 15,
    "fault_includes_motors": True, "incomer_overcurrent_on": True, "incomer_pickup_a": 2000,
    "incomer_curve": "definite_time", "incomer_delay_s": 0.5,
}  # fmt: skip
MOTOR: Row = {
    "motor": "P-1", "bus": "B-1", "relay": "R-1", "rated_power_kw": 800, "rated_voltage_v": 6600, "full_load_a": 82,
    "locked_rotor_a": 490, "starting_method": "direct_on_line", "switching_device": "breaker",
    "interrupting_rating_ka": 25, "device_opening_time_s": 0.08, "running_current_a": 70,
    "stated_start_time_at_lowest_voltage_s": 6, "motor_kind": "cage",
}  # fmt: skip
RELAY: Row = {
    "relay_tag": "R-1", "short_circuit_trip_on": True, "short_circuit_trip_pickup_a": 900,
    "short_circuit_trip_delay_s": 0.04, "start_timer_on": True, "start_timer_delay_s": 9, "thermal_trip_on": True,
}  # fmt: skip


@pytest.fixture(scope="session")
def catalogue() -> Catalogue:
    """Read the rules once."""
    return load_catalogue()


@pytest.fixture(scope="session")
def judged(catalogue: Catalogue) -> Callable[..., Audit]:
    """Judge a plant of plain values."""

    def judge(on: date = DAY, **tables: Sequence[Row]) -> Audit:
        return audit_fleet(fleet_of(**tables), catalogue, audited_on=on)

    return judge


def numbered(row: Row, name: str, number: int, **changes: Any) -> dict[str, Any]:
    """Give a row under the tags of another motor: P-2, R-2."""
    tags = {"motor": f"{name}-{number}", "relay": f"R-{number}"} if "motor" in row else {"relay_tag": f"R-{number}"}
    return {**row, **tags, **changes}


def plant(motors: int = 3, **bus: Any) -> dict[str, list[dict[str, Any]]]:
    """Give a bus with like motors P-1, P-2, … and their relays."""
    return {
        "bus": [{**BUS, **bus}],
        "motor": [numbered(MOTOR, "P", number) for number in range(1, motors + 1)],
        "relay": [numbered(RELAY, "P", number) for number in range(1, motors + 1)],
    }


HEADERS = {
    "motor": ("Tag No.", "Bus", "Relay", "Rated Power (kW)", "Rated Voltage (V)", "Full Load Current (A)",
              "Locked Rotor Current (A)", "Starting Method", "CT Primary (A)", "CT Secondary (A)"),
    "relay": ("Relay Tag", "50 Enable", "50 Pickup (x CT)", "50 Delay (s)", "48 Time (s)", "CT Primary (A)"),
    "bus": ("Switchboard", "Nominal Voltage (V)", "Ik max (kA)", "Ik min (kA)", "X/R"),
}  # fmt: skip


def sheet_rows() -> dict[str, list[tuple[Any, ...]]]:
    """Give the rows of a small site as they stand in its workbooks."""
    return {
        "motor": [
            (f"P-{n}", f"B-{1 + n % 2}", f"R-{n}", 800 - 20 * n, 6600, 82 - n, 490 + n, "DOL", 150, 1)
            for n in range(1, 7)
        ],
        "relay": [(f"R-{n}", "Y", 5 + n / 10, 0.04, 8 + n, 150) for n in range(1, 7)],
        "bus": [("B-1", 6600, 20, 10, 15), ("B-2", 6600, 21, 9, 12)],
    }


def write_site(folder: Path, files: Mapping[str, Sequence[tuple[str, str, Sequence[tuple[Any, ...]]]]]) -> Path:
    """Write workbooks: for each file its sheets as (name, table, rows)."""
    folder.mkdir(parents=True)
    for name, sheets in files.items():
        book = Workbook()
        book.remove(book.worksheets[0])
        for title, table, rows in sheets:
            sheet = book.create_sheet(title)
            sheet.append(HEADERS[table])
            for row in rows:
                sheet.append(row)
        book.save(folder / name)
    (folder / "fleet.toml").write_text('site = "Small works"\n', "utf-8")
    return folder


def usual_files(**changed: Sequence[tuple[Any, ...]]) -> dict[str, list[tuple[str, str, Sequence[tuple[Any, ...]]]]]:
    """Give one workbook a table, some tables with other rows."""
    rows = {**sheet_rows(), **changed}
    return {f"{table}s.xlsx": [(table, table, rows[table])] for table in ("motor", "relay", "bus")}
