"""The hand-over sheet filled in and calculated by LibreOffice: each formula says what its row demands.

The expected words follow from what is written into the cells: a value outside the ends shown is outside, an as-found
value that is not the present one means stop, and so on.
"""

from __future__ import annotations

import shutil
import subprocess
from dataclasses import dataclass
from datetime import date
from pathlib import Path

import pytest
from openpyxl import load_workbook
from openpyxl.worksheet.worksheet import Worksheet

from audit.findings.handover.rows import WorkRow, work_rows
from audit.findings.render import FindingRenderer
from audit.pipeline import audit_path
from audit.report.workbook.sheets import work_formulas as says
from audit.report.workbook.sheets.work_columns import NUMBER
from audit.report.workbook.write import write_workbooks

SITE = Path(__file__).parents[4] / "sample_fleet"
FIRST_ROW = 6
pytestmark = [
    pytest.mark.slow,
    pytest.mark.skipif(shutil.which("soffice") is None, reason="LibreOffice is not installed"),
    pytest.mark.filterwarnings("ignore:.*extension is not supported:UserWarning"),
]


@dataclass(frozen=True)
class Issued:
    workbook: Path
    rows: list[WorkRow]


@pytest.fixture(scope="module")
def issued(tmp_path_factory: pytest.TempPathFactory) -> Issued:
    audit = audit_path(SITE, audited_on=date(2026, 10, 1))
    folder = tmp_path_factory.mktemp("issued")
    write_workbooks(audit, folder)
    return Issued(folder / "motor_list-annotated.xlsx", work_rows(audit, FindingRenderer(audit).all()))


class Sheet:
    """The sheet Work, to be filled in by row and column name."""

    def __init__(self, path: Path, *, values: bool = False) -> None:
        self.book = load_workbook(path, data_only=values)
        found = self.book["Work"]
        assert isinstance(found, Worksheet)
        self.sheet = found

    def put(self, row: int, **cells: object) -> None:
        for name, value in cells.items():
            self.sheet.cell(row=FIRST_ROW + row, column=NUMBER[name]).value = value

    def get(self, row: int, name: str) -> object:
        return self.sheet.cell(row=FIRST_ROW + row, column=NUMBER[name]).value


def calculated(sheet: Sheet, folder: Path) -> Sheet:
    filled = folder / "filled.xlsx"
    sheet.book.save(filled)
    out = folder / "out"
    profile = f"-env:UserInstallation=file://{folder / 'profile'}"
    command = ["soffice", profile, "--headless", "--convert-to", "xlsx", "--outdir", str(out), str(filled)]
    subprocess.run(command, check=True, capture_output=True, timeout=180)
    return Sheet(out / "filled.xlsx", values=True)


def first(rows: list[WorkRow], wanted: object, skip: int = 0) -> int:
    assert callable(wanted)
    found = [at for at, row in enumerate(rows) if wanted(row)]
    return found[skip]


def plain(row: WorkRow) -> bool:
    both = row.low is not None and row.high is not None and row.low < row.high
    return both and row.proposal.value is not None and not row.again and row.kind == "number" and bool(row.written.unit)


def test_formulas_carry_values_before_anything_calculates_them(issued: Issued) -> None:
    formulas, values = Sheet(issued.workbook), Sheet(issued.workbook, values=True)
    for at, row in enumerate(issued.rows):
        assert str(formulas.get(at, "judged")).startswith("=IF(")
        assert (values.get(at, "judged") or "") == row.held
        if row.moving.low:
            assert values.get(at, "low") == pytest.approx(row.low)


def test_judged_and_notice_say_what_the_row_demands(issued: Issued, tmp_path: Path) -> None:
    rows, sheet = issued.rows, Sheet(issued.workbook)
    numbers = [at for at, row in enumerate(rows) if plain(row)]
    inside, below, above, wrong, unset, no_unit, off_issue, found_other = numbers[:8]
    for at in (inside, off_issue, found_other, no_unit):
        sheet.put(at, issued=rows[at].proposal.value)
    row = rows[below]
    sheet.put(below, issued=row.written.number_for((row.low or 0) * 0.9))
    row = rows[above]
    sheet.put(above, issued=row.written.number_for((row.high or 0) * 1.1))
    sheet.put(wrong, issued="about 40")
    sheet.put(unset, as_left=rows[unset].proposal.value, unit=rows[unset].written.unit)
    row = rows[inside]
    sheet.put(inside, as_found=row.written.number, as_left=row.proposal.value, unit=row.written.unit)
    sheet.put(no_unit, as_left=rows[no_unit].proposal.value)
    row = rows[off_issue]
    assert isinstance(row.proposal.value, float)
    sheet.put(off_issue, as_left=row.proposal.value + 2 * row.written.step, unit=row.written.unit)
    row = rows[found_other]
    sheet.put(found_other, as_found=row.written.number + 2 * row.written.step, unit="kg")
    switch = first(rows, lambda one: bool(one.words_wanted))
    other_switch = first(rows, lambda one: bool(one.words_wanted), 1)
    sheet.put(switch, issued=rows[switch].proposal.value, as_found="something else")
    sheet.put(other_switch, issued="perhaps", as_left="perhaps not")

    done = calculated(sheet, tmp_path)

    assert done.get(inside, "judged") == says.INSIDE
    row = rows[inside]
    assert isinstance(row.proposal.value, float)
    assert done.get(inside, "issued_primary") == pytest.approx(row.written.primary(row.proposal.value))
    assert not done.get(inside, "notice")
    assert done.get(below, "judged") == says.BELOW
    assert done.get(above, "judged") == says.ABOVE
    assert done.get(wrong, "judged") == says.NO_NUMBER
    assert done.get(unset, "notice") == says.NOTHING_ISSUED
    assert done.get(no_unit, "notice") == says.UNIT_MISSING
    assert done.get(off_issue, "notice") == says.NOT_ISSUED
    assert done.get(found_other, "notice") == f"{says.STOP} {says.UNIT_DIFFERS}"
    assert done.get(switch, "judged") == says.AS_WANTED
    assert done.get(switch, "notice") == says.STOP
    assert done.get(other_switch, "judged") == says.NOT_WANTED
    assert done.get(other_switch, "notice") == says.NOT_ISSUED
    untouched = numbers[9]
    assert not done.get(untouched, "judged")
    assert not done.get(untouched, "notice")


def test_a_moving_end_follows_the_other_settings_issued_value(issued: Issued, tmp_path: Path) -> None:
    """The cooling time constant must not lie below the heating one: issue another heating value, and the end moves."""
    rows = issued.rows
    mover = first(rows, lambda row: row.moving.low is not None and row.moving.low.slope > 0)
    line = rows[mover].moving.low
    assert line is not None
    sheet = Sheet(issued.workbook)
    elsewhere = first(rows, lambda row: row.kind == "number" and row.finding.relay != rows[mover].finding.relay)
    # another row takes the part of the other setting, as if it had a finding of its own
    sheet.put(elsewhere, setting_key=f"{rows[mover].finding.relay}|{line.other}", factor=1, offset=0)
    sheet.put(elsewhere, issued=line.present * 1.5)
    sheet.put(mover, issued=rows[mover].written.number_for(line.present * 1.2))
    done = calculated(sheet, tmp_path)
    assert done.get(mover, "low") == pytest.approx(line.intercept + line.slope * line.present * 1.5)
    assert done.get(mover, "judged") == says.BELOW


def test_the_range_does_not_follow_beyond_where_its_line_was_tried(issued: Issued, tmp_path: Path) -> None:
    rows = issued.rows
    mover = first(rows, lambda row: row.moving.low is not None and row.moving.low.slope > 0)
    line = rows[mover].moving.low
    assert line is not None
    sheet = Sheet(issued.workbook)
    elsewhere = first(rows, lambda row: row.kind == "number" and row.finding.relay != rows[mover].finding.relay)
    sheet.put(elsewhere, setting_key=f"{rows[mover].finding.relay}|{line.other}", factor=1, offset=0)
    sheet.put(elsewhere, issued=line.present * 3)
    sheet.put(mover, issued=rows[mover].written.number_for(line.present * 4))
    done = calculated(sheet, tmp_path)
    assert done.get(mover, "judged") == says.MOVED_FAR
