"""A complaint says what it costs: the checks that the withheld value leaves unproven."""

from __future__ import annotations

from datetime import date
from pathlib import Path

from openpyxl import Workbook

from audit.findings.costs import costs_of_complaints
from audit.pipeline import audit_path


def test_a_withheld_current_names_the_checks_that_it_leaves_unproven(tmp_path: Path) -> None:
    book = Workbook()
    sheet = book.worksheets[0]
    sheet.append(["Tag", "kW", "Voltage (V)", "FLA (A)", "LRA (A)", "Starting Method"])
    sheet.append(["P-1", 75, 400, "abt forty", 800, "DOL"])
    sheet.append(["P-2", 90, 400, 160, 960, "DOL"])
    book.save(tmp_path / "motors.xlsx")
    audit = audit_path(tmp_path, audited_on=date(2026, 11, 30))
    costs = {
        complaint.quantity: cost
        for complaint, cost in zip(audit.fleet.complaints, costs_of_complaints(audit), strict=True)
        if complaint.weight == "withheld"
    }
    # start current over full load cannot be judged for P-1 without its full-load current
    assert "register-start-current-plausible" in costs["full_load_a"]
