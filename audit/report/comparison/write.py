"""Write a comparison: comparison.json and the workbook."""

from __future__ import annotations

import json
from pathlib import Path

from audit.findings.comparison import Comparison
from audit.report.atomic import whole_file
from audit.report.comparison.parts import comparison_part
from audit.report.comparison.workbook import write_workbook


def write_comparison(comparison: Comparison, folder: Path) -> list[Path]:
    """Write a comparison into a folder."""
    folder.mkdir(parents=True, exist_ok=True)
    record = folder / "comparison.json"
    with whole_file(record) as stream:
        json.dump(comparison_part(comparison), stream, ensure_ascii=False, allow_nan=False, indent=1)
        stream.write("\n")
    workbook = folder / "comparison.xlsx"
    write_workbook(comparison, workbook)
    return [record, workbook]
