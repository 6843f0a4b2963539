"""What an engineer gets of the sample: tables that fit the terminal, workbooks that open and carry the marks."""

from __future__ import annotations

from datetime import date
from io import StringIO
from pathlib import Path

import pytest
from openpyxl import load_workbook
from rich.console import Console

from audit.cautions import CAUTIONS
from audit.findings.audit import Audit
from audit.findings.render import FindingRenderer
from audit.pipeline import audit_path
from audit.report.record.write import harmless
from audit.report.terminal.show import show_audit
from audit.report.workbook.sheets.layout import FILLS
from audit.report.workbook.write import write_workbooks
from audit.rule_folder import sample_folder


@pytest.fixture(scope="module")
def sample() -> Audit:
    return audit_path(sample_folder(), audited_on=date(2026, 11, 30))


@pytest.fixture(scope="module")
def written(sample: Audit, tmp_path_factory: pytest.TempPathFactory) -> dict[str, Path]:
    folder = tmp_path_factory.mktemp("out")
    return {workbook.path.name: workbook.path for workbook in write_workbooks(sample, folder) if workbook.path.exists()}


@pytest.mark.parametrize("width", [80, 100, 160])
def test_no_line_is_wider_than_the_terminal(sample: Audit, width: int) -> None:
    console = Console(file=StringIO(), width=width, highlight=False)
    show_audit(sample, console)
    text = console.file.getvalue()
    assert max(len(line.rstrip()) for line in text.splitlines()) <= width
    for severity, number in sample.by_severity().items():
        assert f"{number:,}" in text
        assert severity in text
    for caution in CAUTIONS:
        assert caution[:40] in " ".join(text.split())


def test_every_check_with_findings_is_named_on_the_terminal(sample: Audit) -> None:
    console = Console(file=StringIO(), width=160, highlight=False)
    show_audit(sample, console)
    text = console.file.getvalue()
    for finding in FindingRenderer(sample).all():
        assert finding.check in text


def test_the_motor_list_carries_our_sheets_in_front_and_its_own_behind(written: dict[str, Path]) -> None:
    names = load_workbook(written["motor_list-annotated.xlsx"], read_only=True).sheetnames
    own = load_workbook(sample_folder() / "motor_list.xlsx", read_only=True).sheetnames
    assert names[-len(own) :] == own
    assert {"Audit", "Findings", "Motors", "Ranges", "Data to collect", "Inputs", "Checks applied"} <= set(names)


def test_each_judged_cell_that_fails_is_filled_and_noted(sample: Audit, written: dict[str, Path]) -> None:
    books = {name: load_workbook(path) for name, path in written.items()}
    checked = 0
    for finding in FindingRenderer(sample).all():
        judged = [cell for cell in finding.cells if cell.quantity == finding.judges]
        name = f"{Path(judged[0].file).stem}-annotated.xlsx" if judged else ""
        if name not in books:
            continue
        cell = books[name][judged[0].sheet][judged[0].cell]
        assert cell.fill.start_color.rgb[-6:] in FILLS.values(), finding.key
        assert cell.comment is not None, finding.key
        assert finding.because[:30] in cell.comment.text, finding.key
        checked += 1
    assert checked > 100


def test_no_text_of_the_inputs_becomes_a_formula(written: dict[str, Path]) -> None:
    for path in written.values():
        book = load_workbook(path)
        for sheet in book.worksheets:
            if sheet.title not in ("Audit", "Findings", "Motors", "Ranges", "Inputs", "Checks applied"):
                continue
            for row in sheet.iter_rows():
                assert all(cell.data_type != "f" for cell in row), (path.name, sheet.title)


@pytest.mark.parametrize("text", ["=1+1", "+1", "-1 A", "@x", "\tx"])
def test_no_text_of_the_table_can_become_a_formula(text: str) -> None:
    assert str(harmless(text)).startswith("'")


def test_an_annotated_copy_audited_again_gives_the_same_findings(
    sample: Audit, written: dict[str, Path], tmp_path: Path
) -> None:
    site = tmp_path / "site"
    site.mkdir()
    for path in sample_folder().iterdir():
        if path.is_file():
            marked = written.get(f"{path.stem}-annotated{path.suffix}")
            (site / path.name).write_bytes((marked or path).read_bytes())
    again = audit_path(site, audited_on=date(2026, 11, 30))
    assert [f.key for f in FindingRenderer(again).all()] == [f.key for f in FindingRenderer(sample).all()]
