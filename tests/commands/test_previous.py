"""`audit --previous`: what it prints, what stands in the record, the table and the annotated workbook."""

from __future__ import annotations

import csv
import json
from pathlib import Path

from openpyxl import Workbook, load_workbook

from tests.commands.conftest import Run

HEADERS = ("Tag No.", "Bus", "Rated Power (kW)", "Rated Voltage (V)", "Full Load Current (A)", "Switching Device",
           "Breaking Capacity (kA)", "50 Enable", "50 Pickup (A)")  # fmt: skip


def site(folder: Path, fault_ka: float, pickup_a: float) -> Path:
    folder.mkdir()
    motors, buses = Workbook(), Workbook()
    for book, rows in (
        (
            motors,
            [
                HEADERS,
                *((f"P-{n}", "B-1", 800, 6600, 82, "CB", breaks, "Y", pickup_a) for n, breaks in ((1, 25), (2, 15))),
            ],
        ),
        (buses, [("Switchboard", "Nominal Voltage (V)", "Ik max (kA)"), ("B-1", 6600, fault_ka)]),
    ):
        sheet = book.worksheets[0]
        for row in rows:
            sheet.append(row)
    motors.save(folder / "motors.xlsx")
    buses.save(folder / "buses.xlsx")
    return folder


def test_the_second_year_says_what_is_new_and_what_was_cleared(run: Run, tmp_path: Path) -> None:
    first = site(tmp_path / "first", 26, 900)
    second = site(tmp_path / "second", 20, 700)
    run("audit", first, "--out", tmp_path / "y1", "--on", "2025-11-30")
    status, printed, _ = run(
        "audit", second, "--out", tmp_path / "y2", "--on", "2026-11-30", "--previous", tmp_path / "y1"
    )
    assert status == 0
    told = " ".join(printed.split())
    assert "Since the audit of 2025-11-30" in told
    assert "Settings that changed although no change is listed and no finding asked for it" in told
    record = json.loads((tmp_path / "y2" / "findings.json").read_text("utf-8"))
    cleared = {(one["name"], one["check"]): one for one in record["cleared"]}
    one = cleared["P-1", "device-interrupts-bus-fault"]
    assert (one["how"], one["since"], one["cleared_on"]) == ("meets now", "2025-11-30", "2026-11-30")
    assert "26 kA to 20 kA" in one["what_changed"][0]
    assert {(c["motor"], c["before_text"], c["after_text"]) for c in record["setting_changes"]} == {
        ("P-1", "900 A", "700 A"),
        ("P-2", "900 A", "700 A"),
    }
    with (tmp_path / "y2" / "findings.csv").open(encoding="utf-8", newline="") as file:
        rows = list(csv.DictReader(file))
    device = [row for row in rows if row["check"] == "device-interrupts-bus-fault"]
    assert [(row["motor"], row["status"], row["since"], row["audits"]) for row in device] == [
        ("P-2", "repeated", "2025-11-30", "2")
    ]
    book = load_workbook(tmp_path / "y2" / "motors-annotated.xlsx")
    kinds = [row[0] for row in book["Since last audit"].iter_rows(min_row=5, values_only=True)]
    assert kinds.count("finding cleared") == len([c for c in record["cleared"] if c["cleared_on"] == "2026-11-30"])
    assert kinds.count("setting changed, nothing says why") == 2


def test_an_unchanged_fleet_has_neither_new_nor_cleared_findings(run: Run, tmp_path: Path) -> None:
    fleet = site(tmp_path / "site", 26, 900)
    run("audit", fleet, "--out", tmp_path / "y1", "--on", "2025-11-30")
    run("audit", fleet, "--out", tmp_path / "y2", "--on", "2026-11-30", "--previous", tmp_path / "y1" / "findings.json")
    record = json.loads((tmp_path / "y2" / "findings.json").read_text("utf-8"))
    assert {finding["status"] for finding in record["findings"]} == {"repeated"}
    assert {finding["audits"] for finding in record["findings"]} == {2}
    assert record["cleared"] == record["setting_changes"] == []
