"""The record of a close-out: closeout.json."""

from __future__ import annotations

import json
from pathlib import Path
from typing import Any

from audit.cautions import CAUTIONS
from audit.findings.closeout.answers import AnswerKind
from audit.findings.closeout.matching import Matched
from audit.findings.closeout.sort import CloseOut
from audit.findings.closeout.states import Sorted
from audit.findings.comparison.changes import Change
from audit.report.atomic import whole_file
from audit.report.record.parts import finding_part, number_or_none, tool_version

RECORD_VERSION = 1


def write_closeout_record(result: CloseOut, folder: Path) -> Path:
    """Write closeout.json."""
    target = folder / "closeout.json"
    with whole_file(target) as stream:
        json.dump(closeout_part(result), stream, ensure_ascii=False, allow_nan=False, indent=1)
        stream.write("\n")
    return target


def closeout_part(result: CloseOut) -> dict[str, Any]:
    """Give the close-out as plain data."""
    export = result.export
    return {
        "closeout_version": RECORD_VERSION,
        "closed_out_on": result.after.audited_on.isoformat(),
        "tool_version": tool_version(),
        "fleet": result.before.fleet.site,
        "cautions": list(CAUTIONS),
        "returned": {"file": result.sheet_file, "sha256": result.sheet_sha256},
        "inputs": [{"file": item.file, "sha256": item.sha256} for item in result.before.fleet.inputs],
        "export": None
        if export is None
        else {
            "files": list(export.files),
            "days": {relay: day.isoformat() for relay, day in export.days.items()},
            "days_from": export.day_from,
        },
        "closed": result.is_closed(),
        "counts": {state.value: number for state, number in result.counts().items()},
        "remarks": list(result.matches.remarks),
        "rows_without_a_finding": list(result.matches.unknown_keys),
        "findings": [_item(item) for item in result.items],
        "proposed_deviations": [
            {
                "motor": item.finding.motor or item.finding.name,
                "check": item.finding.check,
                "setting": item.finding.judges,
                "reason": item.proposes_to_accept,
            }
            for item in result.items
            if item.proposes_to_accept
        ],
        "new_findings": [finding_part(finding) for finding in result.new_findings],
        "hand_over": [finding_part(finding) for finding in result.hand_over_findings],
        "altered": [_altered(change) for change in result.altered],
    }


def _item(item: Sorted) -> dict[str, Any]:
    finding, one = item.finding, item.matched
    part: dict[str, Any] = {
        "key": finding.key,
        "motor": finding.motor,
        "relay": finding.relay,
        "bus": finding.bus,
        "function": finding.function,
        "check": finding.check,
        "severity": finding.severity,
        "says": finding.says,
        "state": item.state.value,
        "reason": item.reason,
        "questions": list(item.questions),
        "remarks": list(item.remarks),
    }
    if one is not None:
        part |= {
            "setting": one.work.setting,
            "header": one.work.written.header,
            "unit": one.work.written.unit,
            "present": one.work.written.written,
            "low": number_or_none(one.work.low),
            "high": number_or_none(one.work.high),
            "issued": one.issued.written,
            "as_found": one.as_found.written,
            "as_left": one.as_left.written,
            "as_left_primary": _primary(one),
            "primary_unit": one.work.symbol,
            "exported": item.exported_text,
            **_signed(one),
        }
    return part


def _primary(one: Matched) -> float | None:
    if one.as_left.kind is not AnswerKind.VALUE or one.question:
        return None
    return number_or_none(one.work.written.primary(one.as_left.number))


def _signed(one: Matched) -> dict[str, Any]:
    names = (
        "issued_by", "revision", "plant_state", "trip_links", "injected", "measured", "trip_proved", "export_file",
        "done_by", "witnessed_by", "remark",
    )  # fmt: skip
    texts = {name: one.row.text(name) if one.row is not None else "" for name in names}
    return {**texts, "done_on": one.done_on.isoformat() if one.done_on is not None else None}


def _altered(change: Change) -> dict[str, Any]:
    cell = change.after_cell
    return {
        "relay": change.name,
        "motor": change.motor,
        "setting": change.quantity,
        "label": change.label,
        "kind": change.kind,
        "before": change.before_text,
        "after": change.after_text,
        "cell": {"file": cell.file, "sheet": cell.sheet, "cell": cell.cell} if cell is not None else None,
    }
