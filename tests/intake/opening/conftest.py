"""Workbooks made for a test, edited inside, and opened in a process of their own."""

from __future__ import annotations

import subprocess
import sys
import zipfile
from collections.abc import Callable, Mapping
from pathlib import Path

import openpyxl
import pytest

import audit

MAKE = """
import sys, time
from pathlib import Path
from audit.intake.opening import UnreadableWorkbook, open_workbook
for name in sys.argv[1:]:
    began = time.perf_counter()
    print("begin", name, flush=True)
    try:
        book = open_workbook(Path(name))
        said = f"read {len(book.sheets)} sheets"
    except UnreadableWorkbook as refusal:
        said = f"refused {refusal}"
    print("took", f"{time.perf_counter() - began:.2f}", said.replace(chr(10), " "), flush=True)
"""


@pytest.fixture
def workbook(tmp_path: Path) -> Path:
    """A small workbook: a header and two motors."""
    book = openpyxl.Workbook()
    sheet = book.active
    sheet.title = "Motors"
    for row in (["Tag", "kW", "Eff"], ["P-101", 37, 0.94], ["P-102", 55, 0.95]):
        sheet.append(row)
    path = tmp_path / "motors.xlsx"
    book.save(path)
    return path


@pytest.fixture
def edited() -> Callable[[Path, Mapping[str, Callable[[bytes], bytes]]], Path]:
    """Rewrite parts of a package in place; a part that is not there is added from nothing."""

    def edit(path: Path, changes: Mapping[str, Callable[[bytes], bytes]]) -> Path:
        with zipfile.ZipFile(path) as archive:
            parts = {name: archive.read(name) for name in archive.namelist()}
        for name, change in changes.items():
            before = parts.get(name, b"")
            parts[name] = change(before)
            assert parts[name] != before, f"the edit of {name} changed nothing"
        with zipfile.ZipFile(path, "w", zipfile.ZIP_DEFLATED) as archive:
            for name, content in parts.items():
                archive.writestr(name, content)
        return path

    return edit


@pytest.fixture
def opened_apart() -> Callable[..., list[str]]:
    """Open files in another process, which may die of them; gives one line of result a file."""

    def open_them(*paths: Path, timeout_s: float = 60) -> list[str]:
        done = subprocess.run(
            [sys.executable, "-c", MAKE, *map(str, paths)],
            capture_output=True,
            text=True,
            encoding="utf-8",
            timeout=timeout_s,
            cwd=Path(audit.__file__).parent.parent,
            env={"PYTHONIOENCODING": "utf-8", "PYTHONPATH": str(Path(audit.__file__).parent.parent)},
            check=False,
        )
        lines = done.stdout.splitlines()
        assert done.returncode == 0, f"the process died after {lines[-1:]}: {done.stderr[-500:]}"
        return [line.split(maxsplit=2)[2] for line in lines if line.startswith("took ")]

    return open_them
