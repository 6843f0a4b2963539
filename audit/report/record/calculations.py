"""The calculation sheet of every finding, beside the record: one finding a line."""

from __future__ import annotations

import json
from typing import IO

from audit.explain.sheet import CalculationSheet
from audit.findings.audit import Audit
from audit.findings.render import FindingRenderer

CALCULATIONS_FILE = "calculations.jsonl.gz"


def write_calculations(audit: Audit, stream: IO[str]) -> None:
    """Write for each finding its key and the lines of its working, as `motor-audit explain` prints them."""
    sheet = CalculationSheet(audit)
    renderer = FindingRenderer(audit)
    for code in audit.codes:
        outcome = audit.outcomes[code.outcome]
        if outcome.check.stage == "ranges" or code.group:
            # a range and another setting group have no row of verdicts of their own to lay out
            continue
        line = {"key": renderer.finding(code).key, "lines": list(sheet.check_lines(outcome, code.row))}
        stream.write(json.dumps(line, ensure_ascii=False) + "\n")
