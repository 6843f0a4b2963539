"""Since the last audit: findings cleared, settings that changed, starts that drift toward a limit."""

from __future__ import annotations

from collections.abc import Sequence

from openpyxl.worksheet.worksheet import Worksheet

from audit.findings.audit import Audit
from audit.findings.past import Cleared, SettingDrift
from audit.findings.trends import Drift, drifts
from audit.report.workbook.sheets.layout import page, table, title

HEADINGS = ("kind", "of", "what", "before", "now", "since", "audits", "because", "cell")
WIDTHS = (22, 16, 44, 18, 22, 12, 8, 60, 30)


def write_since(audit: Audit, sheet: Worksheet) -> None:
    """Write the sheet; without an earlier record it holds the trends only."""
    previous = audit.previous
    below = f"the last record is of {previous.audited_on}" if previous is not None else "no earlier record was given"
    row = title(sheet, "Since the last audit", below)
    rows: list[Sequence[object]] = []
    if previous is not None:
        rows += [_cleared(one) for one in previous.cleared_now(audit.audited_on.isoformat())]
        rows += [_setting(one) for one in previous.settings]
    rows += [_trend(drift) for drift in drifts(audit.workings)]
    table(sheet, row, HEADINGS, WIDTHS, rows)
    page(sheet, audit.fleet.site)


def _cleared(one: Cleared) -> Sequence[object]:
    kind = "finding cleared" if one.cleared_on else "finding no longer provable"
    because = "; ".join(one.what_changed)
    return kind, one.name, f"{one.says}: {one.check}", "", one.how, one.since, one.audits, because, ""


def _setting(one: SettingDrift) -> Sequence[object]:
    kind = "setting changed" if one.explained_by else "setting changed, nothing says why"
    cell = f"{one.file}\n{one.sheet}!{one.cell}" if one.file else ""
    return kind, one.relay, one.label, one.before_text, one.after_text, "", "", one.explained_by, cell


def _trend(drift: Drift) -> Sequence[object]:
    reached = f"reaches {drift.limit_says} ({drift.limit_text}) on {drift.reached_on}"
    because = f"{drift.per_year_text} a year more; {reached}"
    return "drifting", drift.motor, drift.label, "", drift.level_text, "", "", because, ""
