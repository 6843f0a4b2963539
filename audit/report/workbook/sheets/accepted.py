"""The accepted deviations: what is knowingly left, by whom, until when, and what returned."""

from __future__ import annotations

from collections.abc import Sequence

from openpyxl.worksheet.worksheet import Worksheet

from audit.findings.audit import Audit
from audit.findings.finding import Finding
from audit.report.record.parts import standing
from audit.report.workbook.sheets.layout import LETTERS, page, table, title

HEADINGS = (
    "", "motor", "check", "setting", "state", "reason", "accepted by", "until", "value now", "low now", "high now",
    "what is wrong",
)  # fmt: skip
WIDTHS = (4, 11, 30, 24, 26, 40, 16, 11, 12, 10, 10, 40)


def write_accepted(audit: Audit, findings: Sequence[Finding], sheet: Worksheet) -> None:
    """Write one row for each row of the site's table; value and ends are those to enter into that table."""
    source = audit.accepted_table
    below = (
        f"from {source.file}: a finding returns when its day passes, its value or range changes, or the reason is empty"
        if source is not None
        else "none: a table accepted_deviations.csv beside the workbooks (motor, check, setting, reason, accepted by, "
        "until, value, low, high) says which findings are knowingly left"
    )
    row = title(sheet, "Accepted deviations", below)
    by_code = dict(zip(audit.codes, findings, strict=True))
    rows = []
    for one in audit.accepted:
        finding = by_code.get(one.code) if one.code is not None else None
        deviation = one.deviation
        rows.append(
            [
                LETTERS[finding.severity] if finding else "",
                deviation.motor,
                deviation.check,
                finding.judges if finding else deviation.setting,
                standing(one),
                deviation.reason,
                deviation.accepted_by,
                deviation.until.isoformat() if deviation.until else "",
                *([finding.present_text, _end(finding.low), _end(finding.high)] if finding else ["", "", ""]),
                f"{finding.says}: {finding.because}" if finding else "",
            ]
        )
    table(sheet, row, HEADINGS, WIDTHS, rows)
    page(sheet, audit.fleet.site)


def _end(value: float | None) -> object:
    return "" if value is None or value != value else float(f"{value:.6g}")
