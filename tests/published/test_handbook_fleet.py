"""The main job against the outside: a fleet made row by row from handbook tables, from workbook to record.

Full-load currents: NFPA 70 table 430.250 (2008 text, from copies). Locked-rotor currents: NEMA MG 1 12.35, Design B,
230 V, other voltages in inverse proportion (from copies). Code letters: NFPA 70 table 430.7(B), bands taken half-open.
"""

from __future__ import annotations

import csv
import json
from datetime import date
from itertools import pairwise
from math import sqrt
from pathlib import Path

import pytest
from openpyxl import Workbook

from audit.pipeline import audit_path
from audit.report.record.write import write_record

VALUES = Path(__file__).parent / "values" / "handbook_motors.csv"
# NFPA 70 table 430.7(B): lower end of each band, kVA per horsepower
LETTERS = {
    "A": 0.0, "B": 3.15, "C": 3.55, "D": 4.0, "E": 4.5, "F": 5.0, "G": 5.6, "H": 6.3, "J": 7.1, "K": 8.0, "L": 9.0,
    "M": 10.0, "N": 11.2, "P": 12.5, "R": 14.0, "S": 16.0, "T": 18.0, "U": 20.0, "V": 22.4,
}  # fmt: skip
DATA_CHECKS = (
    "register-full-load-plausible",
    "register-start-current-plausible",
    "register-locked-rotor-letter-agrees",
)
KW_PER_HP = 0.745700
Motor = dict[str, float]


def handbook_motors() -> list[Motor]:
    with VALUES.open(encoding="utf-8", newline="") as stream:
        rows = [{name: float(value) for name, value in row.items()} for row in csv.DictReader(stream)]
    for row in rows:
        row["locked_rotor_a"] = row["locked_rotor_at_230_v_a"] * 230 / row["rated_voltage_v"]
    return rows


def letter_of(motor: Motor) -> str:
    kva = sqrt(3) * motor["rated_voltage_v"] * motor["locked_rotor_a"] / 1000 / motor["rated_power_hp"]
    return max(letter for letter, low in LETTERS.items() if kva >= low)


def audited(motors: list[Motor], letters: list[str], folder: Path) -> dict[str, dict[str, str]]:
    """Write a motor list, run the whole audit, and give for each check the motors found wrong, with the reason."""
    folder.mkdir()
    book = Workbook()
    sheet = book.worksheets[0]
    sheet.append(["Motor Tag", "HP", "Volts", "Hz", "Poles", "FLA", "LRA", "Code Letter", "Starting Method"])
    for number, (motor, letter) in enumerate(zip(motors, letters, strict=True)):
        sheet.append(
            [f"M-{number}", motor["rated_power_hp"], motor["rated_voltage_v"], 60, 4, motor["full_load_a"],
             round(motor["locked_rotor_a"], 1), letter, "FVNR"]
        )  # fmt: skip
    book.save(folder / "motors.xlsx")
    result = audit_path(folder, audited_on=date(2026, 11, 30))
    assert not [item for item in result.fleet.complaints if item.weight != "remark"]
    assert not result.fleet.questions
    write_record(result, folder / "out")
    record = json.loads((folder / "out" / "findings.json").read_text("utf-8"))
    found: dict[str, dict[str, str]] = {}
    for finding in record["findings"]:
        found.setdefault(finding["check"], {})[finding["motor"]] = finding["because"]
    for check in DATA_CHECKS:
        assert record["per_check"][check]["rows"] == len(motors)
    return found


def test_every_handbook_motor_passes_the_checks_of_its_data(tmp_path: Path) -> None:
    motors = handbook_motors()
    found = audited(motors, [letter_of(motor) for motor in motors], tmp_path / "site")
    assert {check: found.get(check) for check in DATA_CHECKS} == dict.fromkeys(DATA_CHECKS)


def test_every_rating_and_voltage_of_both_tables_is_there() -> None:
    motors = handbook_motors()
    # 21 ratings at 200 and 208 V, 21 at 230 V, 27 at 460 and 575 V
    assert len(motors) == 21 * 3 + 27 * 2
    assert {motor["rated_voltage_v"] for motor in motors} == {200, 208, 230, 460, 575}


@pytest.mark.parametrize("column", ["full_load_a", "locked_rotor_a"])
def test_a_figure_shifted_by_a_row_is_caught_wherever_it_leaves_the_band(column: str, tmp_path: Path) -> None:
    right = handbook_motors()
    shifted = [dict(motor) for motor in right]
    by_voltage: dict[float, list[int]] = {}
    for place, motor in enumerate(right):
        by_voltage.setdefault(motor["rated_voltage_v"], []).append(place)
    for places in by_voltage.values():
        for place, below in pairwise(places):
            shifted[place][column] = right[below][column]
    out_of_band = {f"M-{n}" for n, motor in enumerate(shifted) if _outside(motor, right[n], column)}
    found = audited(shifted, [letter_of(motor) for motor in right], tmp_path / "site")
    caught = {motor for check in DATA_CHECKS for motor in found.get(check, {})}
    assert out_of_band <= caught
    moved = sum(a[column] != b[column] for a, b in zip(right, shifted, strict=True))
    print(f"{column}: {moved} figures shifted, {len(caught)} caught, {len(out_of_band)} outside the band")
    assert len(caught) >= len(out_of_band) > 0


def _outside(motor: Motor, plate: Motor, column: str) -> bool:
    """Tell by hand whether a shifted figure leaves the band that the checks state, with 2 % for rounding of plates."""
    if column == "locked_rotor_a":
        low = LETTERS[letter_of(plate)]
        above = [bound for bound in LETTERS.values() if bound > low]
        kva = sqrt(3) * motor["rated_voltage_v"] * motor["locked_rotor_a"] / 1000 / motor["rated_power_hp"]
        outside_letter = bool(above) and kva > min(above) * 1.03
        return outside_letter or motor["locked_rotor_a"] / motor["full_load_a"] > 10.05
    product = motor["rated_power_hp"] * KW_PER_HP * 1000 / (sqrt(3) * motor["rated_voltage_v"] * motor["full_load_a"])
    low = 0.62 if motor["rated_power_hp"] * KW_PER_HP >= 7.5 else 0.30
    return product < low * 0.99 or motor["locked_rotor_a"] / motor["full_load_a"] < 2.95
