"""A hand-over issued, filled in, returned and closed out: every row is sorted as what was written into it demands."""

from __future__ import annotations

import random
from collections.abc import Callable
from dataclasses import dataclass
from datetime import date
from pathlib import Path

import pytest
from openpyxl.styles import Font
from openpyxl.worksheet.worksheet import Worksheet

from audit.commands.closeout import close_out_of
from audit.findings.closeout.sort import CloseOut
from audit.findings.closeout.states import State
from audit.findings.handover.rows import WorkRow, work_rows
from audit.findings.render import FindingRenderer
from audit.fleet.addresses import Place
from audit.pipeline import audit_path
from audit.report.workbook.write import write_workbooks
from tests.findings.closeout.returned_sheets import SCENARIOS, Filled, can_be_set, fill_in, write_export

SITE = Path(__file__).parents[3] / "sample_fleet"
FILES = ("relay_settings_lv_mcc.xlsx", "relay_settings_switchgear.xlsx")
pytestmark = [pytest.mark.slow, pytest.mark.filterwarnings("ignore:.*extension is not supported:UserWarning")]


def _as_it_came(sheet: Worksheet) -> None:
    """Change nothing."""


def _moved_about(sheet: Worksheet) -> None:
    """Rename the sheet, sort the rows anew, put a column in between."""
    sheet.title = "from site 2"
    rows = [[(cell.value, cell.font.strike) for cell in row] for row in sheet.iter_rows(min_row=6)]
    random.Random(4).shuffle(rows)
    for at, values in enumerate(rows, start=6):
        for column, (value, struck) in enumerate(values, start=1):
            cell = sheet.cell(row=at, column=column)
            cell.value, cell.font = value, Font(strike=struck)
    sheet.insert_cols(9)


@dataclass(frozen=True)
class Issued:
    """What was handed over."""

    workbook: Path
    rows: list[WorkRow]
    days: list[Place]


@pytest.fixture(scope="module")
def issued(tmp_path_factory: pytest.TempPathFactory) -> Issued:
    audit = audit_path(SITE, audited_on=date(2026, 10, 1))
    folder = tmp_path_factory.mktemp("issued")
    write_workbooks(audit, folder)
    readings = audit.fleet.readings
    cells = readings["cell"][readings["quantity"] == "settings_export_date"]
    days = [place for place in audit.fleet.book.places(cells) if place is not None]
    return Issued(folder / "motor_list-annotated.xlsx", work_rows(audit, FindingRenderer(audit).all()), days)


def _rows_to_fill(rows: list[WorkRow]) -> list[WorkRow]:
    seen: set[str] = set()
    chosen = []
    for row in rows:
        if can_be_set(row, FILES) and row.setting_key not in seen:
            chosen.append(row)
        seen.add(row.setting_key)
    return chosen


def round_trip(
    issued: Issued, folder: Path, shift: int, change: Callable[[Worksheet], None]
) -> tuple[dict[str, tuple[str, Filled]], CloseOut]:
    source, rows = issued.workbook, issued.rows
    names = [*SCENARIOS]
    written = {
        row.key: (names[(at + shift) % len(names)], SCENARIOS[names[(at + shift) % len(names)]](row))
        for at, row in enumerate(_rows_to_fill(rows))
    }
    filled = {key: one for key, (_, one) in written.items()}
    returned = folder / "returned.xlsx"
    fill_in(source, returned, filled, change)
    export = write_export(SITE, folder / "export", rows, filled, issued.days)
    result = close_out_of(returned, SITE, settings=export, rules=None, on=date(2026, 10, 20), tell=lambda text: None)
    return written, result


def missorted(written: dict[str, tuple[str, Filled]], result: CloseOut) -> list[str]:
    found = {item.finding.key: item for item in result.items}
    wrong = []
    for key, (name, filled) in written.items():
        item = found[key]
        if item.state is not filled.expected:
            wrong.append(f"{name}: {key}: {item.state} for {filled.expected} ({item.reason} {item.questions})")
    return wrong


@pytest.mark.parametrize(("shift", "change"), [(0, _as_it_came), (7, _moved_about), (13, _as_it_came)])
def test_every_row_is_sorted_as_written(
    issued: Issued, tmp_path: Path, shift: int, change: Callable[[Worksheet], None]
) -> None:
    written, result = round_trip(issued, tmp_path, shift, change)
    assert len(written) >= 60
    assert missorted(written, result) == []
    by_name = {name: key for key, (name, _) in written.items()}
    altered = {change.name for change in result.altered}
    relay_of = {row.key: row.relay_key for row in issued.rows}
    assert relay_of[by_name["not issued, changed in the relay only"]] in altered
    assert relay_of[by_name["left as it was"]] not in altered
    said = {(finding.check, finding.motor) for finding in result.hand_over_findings}
    motor_of = {row.key: row.finding.motor for row in issued.rows}
    assert ("as-left-equals-issued", motor_of[by_name["further outside"]]) in said
    assert ("only-asked-settings-altered", motor_of[by_name["not issued, changed in the relay only"]]) in said
    assert ("as-left-read-from-relay", motor_of[by_name["no day"]]) in said
    assert not result.is_closed()


def test_the_scenarios_reach_every_state(issued: Issued) -> None:
    row = _rows_to_fill(issued.rows)[0]
    assert {make(row).expected for make in SCENARIOS.values()} == set(State)
