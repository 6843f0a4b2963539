"""Time and memory of annotating a copy: patching the package against loading and saving it with openpyxl.

    python -m tests.benchmarks.annotate_workbook [ROWS ...]

Forty columns, a tenth of the rows' cells text, 3 % of the rows marked with a note, three report sheets. Each job
runs in a process of its own, so that its peak memory is its own.
"""

from __future__ import annotations

import random
import resource
import subprocess
import sys
import tempfile
import time
import zipfile
from pathlib import Path

import openpyxl
from openpyxl.comments import Comment
from openpyxl.styles import PatternFill

from audit.fleet.addresses import column_letters
from audit.report.workbook.patch import Mark, annotate_copy

COLUMNS = 40
MARKED_SHARE = 0.03
FILL = "FFC7CE"
MAIN = "http://schemas.openxmlformats.org/spreadsheetml/2006/main"


def write_workbook(path: Path, rows: int) -> None:
    """Write a workbook of invented numbers fast: an empty one whose sheet is replaced."""
    empty = path.with_suffix(".empty.xlsx")
    openpyxl.Workbook().save(empty)
    chance = random.Random(1)
    letters = [column_letters(column) for column in range(1, COLUMNS + 1)]

    def cell(letter: str, row: int) -> str:
        if letter == "A":
            return f'<c r="A{row}" t="inlineStr"><is><t>P-{row}</t></is></c>'
        return f'<c r="{letter}{row}"><v>{chance.randint(1, 99_999) / 10}</v></c>'

    with zipfile.ZipFile(empty) as old, zipfile.ZipFile(path, "w", zipfile.ZIP_DEFLATED) as new:
        for name in old.namelist():
            if not name.endswith("sheet1.xml"):
                new.writestr(name, old.read(name))
                continue
            with new.open(name, "w") as part:
                part.write(f'<worksheet xmlns="{MAIN}"><sheetData>'.encode())
                for row in range(1, rows + 1):
                    inside = "".join(cell(letter, row) for letter in letters)
                    part.write(f'<row r="{row}">{inside}</row>'.encode())
                part.write(b"</sheetData></worksheet>")
    empty.unlink()


def write_report(path: Path, rows: int) -> None:
    """Three sheets as a report has them: one short, one with a row a finding, one with a row in ten."""
    book = openpyxl.Workbook(write_only=True)
    cover = book.create_sheet("Cover")
    cover.append(["What was audited"])
    for title, count in (("Findings", int(rows * MARKED_SHARE)), ("Motors", rows // 10)):
        sheet = book.create_sheet(title)
        for number in range(count):
            sheet.append([f"P-{number}", "50", "nuisance", 900.5, 1020.0, "Raise to 1,020 A or more"])
    book.save(path)


def marked_rows(rows: int) -> list[int]:
    """Rows spread over the sheet."""
    return random.Random(2).sample(range(1, rows + 1), int(rows * MARKED_SHARE))


def patch(source: Path, report: Path, target: Path, rows: int) -> None:
    """Annotate with the project's own way."""
    marks = [Mark("Sheet", row, 5, FILL, "pickup 900 A; a start reaches 1,020 A") for row in marked_rows(rows)]
    annotate_copy(source, target, marks, report)


def load_and_save(source: Path, report: Path, target: Path, rows: int) -> None:
    """Annotate by loading everything and saving it again."""
    book = openpyxl.load_workbook(source)
    sheet = book["Sheet"]
    for row in marked_rows(rows):
        cell = sheet.cell(row, 5)
        cell.fill = PatternFill("solid", fgColor=FILL)
        cell.comment = Comment("pickup 900 A; a start reaches 1,020 A", "Settings audit")
    for other in openpyxl.load_workbook(report, read_only=True):
        new = book.create_sheet(other.title)
        for values in other.iter_rows(values_only=True):
            new.append(values)
    book.save(target)


JOBS = {"patch": patch, "openpyxl": load_and_save}


def main() -> None:
    """Run all jobs for each number of rows, or one job where this process was started for it."""
    if sys.argv[1:2] == ["--job"]:
        job, folder, rows = sys.argv[2], Path(sys.argv[3]), int(sys.argv[4])
        started = time.perf_counter()
        JOBS[job](folder / "source.xlsx", folder / "report.xlsx", folder / f"{job}.xlsx", rows)
        seconds = time.perf_counter() - started
        peak_mb = resource.getrusage(resource.RUSAGE_SELF).ru_maxrss / 1024
        print(f"{rows:>8,} rows  {job:<9} {seconds:7.2f} s  {peak_mb:7.0f} MB at most")
        return
    for rows in [int(number) for number in sys.argv[1:]] or [1_000, 10_000, 100_000]:
        with tempfile.TemporaryDirectory() as folder:
            write_workbook(Path(folder, "source.xlsx"), rows)
            write_report(Path(folder, "report.xlsx"), rows)
            for job in JOBS:
                command = [sys.executable, "-m", "tests.benchmarks.annotate_workbook", "--job", job, folder, str(rows)]
                subprocess.run(command, check=True)


if __name__ == "__main__":
    main()
