"""Time to read a large site: `python tests/benchmarks/read_fleet.py [motors]`.

Writes an invented site of one workbook (motor list, settings in rows, five starts a motor, buses) to a temporary
folder, reads it, and prints how long opening with recognition and how long resolution took.
"""

from __future__ import annotations

import random
import sys
import tempfile
import time
from pathlib import Path

import openpyxl

from audit.intake import gather, resolve

MOTOR = ["Tag", "Description", "kW", "Rated Voltage (V)", "FLC (A)", "LRC (A)", "Efficiency (%)", "Power Factor",
         "Rated Speed (rpm)", "Poles", "Safe Stall Time Hot (s)", "Safe Stall Time Cold (s)", "Starting Method",
         "Switchboard", "Relay", "CT Ratio", "Cable Size (mm2)", "Cable Length (m)", "Insulation Class",
         "Driven Machine"]  # fmt: skip
RELAY = ["Relay", "Relay FLA (A)", "CT Ratio", "49 Pickup (x FLA)", "49 Trip Class", "50 Pickup", "50 Delay",
         "51LR Pickup (x FLA)", "51LR Delay (s)", "46 Trip Pickup (% FLA)", "46 Trip Delay (s)", "37 Trip Pickup",
         "37 Trip Delay (s)", "50G Pickup (A)", "50G Delay (ms)", "48 Delay (s)", "27 Pickup (% motor)",
         "27 Delay (s)", "66 Starts per Hour", "Stator RTD Trip (°C)"]  # fmt: skip


def write_site(folder: Path, motors: int) -> None:
    """Write the workbook."""
    pick = random.Random(1)
    book = openpyxl.Workbook(write_only=True)
    sheets = {name: book.create_sheet(name) for name in ("Motors", "Settings", "Starts", "Buses")}
    sheets["Motors"].append(MOTOR)
    sheets["Settings"].append(RELAY)
    sheets["Starts"].append(["Tag", "Date", "Start Time (s)", "Start Current (A)"])
    sheets["Buses"].append(["Bus", "Nominal Voltage (V)", "Frequency", "Isc max (kA)"])
    for number in range(motors // 100 + 1):
        sheets["Buses"].append([f"MCC-{number}", 400, 50, 40])
    for number in range(motors):
        power = pick.choice((7.5, 11, 15, 22, 30, 37, 45, 55, 75, 90, 110))
        load = round(power * 1.8, 1)
        tag, relay = f"P-{number:05d}", f"R-{number:05d}"
        primary = next(size for size in (20, 50, 100, 150, 200, 300) if size > load)
        sheets["Motors"].append(
            [tag, "Pump", power, 400, load, round(load * 6.5), 93.5, 0.86, 1480, 4, 14, 20, "DOL",
             f"MCC-{number // 100}", relay, f"{primary}/5", 25, 80, "F", "pump"]
        )  # fmt: skip
        sheets["Settings"].append(
            [relay, load, f"{primary}/5", 1.05, 10, "11 x FLA", "50 ms", 2, 2, 15, 5,
             pick.choice(("OFF", "50 % FLA", "-")), 5, 20, 150, 8, 70, 1, 3, 155]
        )  # fmt: skip
        for day in range(1, 6):
            sheets["Starts"].append([tag, f"2024-03-0{day}", 4.5, round(load * 6)])
    book.save(folder / "site.xlsx")


def main() -> None:
    """Write, read and print the times."""
    motors = int(sys.argv[1]) if len(sys.argv) > 1 else 10_000
    with tempfile.TemporaryDirectory() as name:
        folder = Path(name)
        write_site(folder, motors)
        start = time.perf_counter()
        gathered = gather(folder)
        opened = time.perf_counter()
        fleet = resolve(gathered)
        done = time.perf_counter()
    print(
        f"{motors} motors, {len(gathered.readings)} readings: opening and recognition {opened - start:.1f} s, "
        f"resolution {done - opened:.1f} s; {len(fleet.complaints)} complaints, {len(fleet.questions)} questions"
    )


if __name__ == "__main__":
    main()
