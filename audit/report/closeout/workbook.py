"""The close-out as a workbook to sign: what is closed, what is not, what is new, what was altered."""

from __future__ import annotations

from collections.abc import Iterator
from pathlib import Path

from openpyxl import Workbook
from openpyxl.cell import Cell
from openpyxl.worksheet.worksheet import Worksheet

from audit.cautions import CAUTIONS
from audit.findings.accepted import HEADINGS as DEVIATION_HEADINGS
from audit.findings.closeout.sort import CloseOut
from audit.findings.closeout.states import CLOSED, MEANING, Sorted
from audit.findings.finding import Finding
from audit.findings.handover.rows import place_order
from audit.report.closeout.terminal import MARKS
from audit.report.record.parts import tool_version
from audit.report.workbook.sheets.cover import pairs, sign_off
from audit.report.workbook.sheets.layout import FILLS, LETTERS, fill, new_sheet, page, put, table, title

CLOSE_OUT, ROWS, NEW, ALTERED, PROPOSED = "Close-out", "Findings", "New findings", "Altered", "Proposed to accept"
HEADINGS = (
    "", "state", "bus", "panel", "motor", "relay", "function", "what was wrong", "setting", "unit", "present", "low",
    "high", "issued", "as-found", "as-left", "export", "reason, questions and remarks", "done by", "witnessed by",
    "date", "key",
)  # fmt: skip
WIDTHS = (4, 16, 9, 8, 10, 11, 8, 30, 18, 8, 9, 9, 9, 9, 9, 9, 9, 44, 10, 10, 11, 40)
PRINTED = "U"
_STATE_FILLS = {True: "DCEBDD", False: "F9D9D2"}


def write_closeout_workbook(result: CloseOut, folder: Path) -> Path:
    """Write closeout.xlsx."""
    folder.mkdir(parents=True, exist_ok=True)
    book = Workbook()
    book.remove(book.worksheets[0])

    def sheet(name: str) -> Worksheet:
        return new_sheet(book, name)

    _cover(result, sheet(CLOSE_OUT))
    _rows(result, sheet(ROWS))
    _new(result, sheet(NEW))
    _altered(result, sheet(ALTERED))
    _proposed(result, sheet(PROPOSED))
    target = folder / "closeout.xlsx"
    unfinished = folder / ".closeout-being-written.xlsx"
    try:
        book.save(unfinished)
        unfinished.replace(target)
    finally:
        unfinished.unlink(missing_ok=True)
    return target


def _cover(result: CloseOut, sheet: Worksheet) -> None:
    site = result.before.fleet.site
    day = result.after.audited_on.isoformat()
    row = title(sheet, f"Close-out of the hand-over · {site}", f"closed out on {day}")
    for column, width in zip("ABCD", (40, 22, 52, 26), strict=True):
        sheet.column_dimensions[column].width = width
    put(sheet, row, 1, "Findings", bold=True)
    for state, number in result.counts().items():
        row += 1
        fill(put(sheet, row, 1, f"{MARKS[state]}  {state.value}"), _STATE_FILLS[state in CLOSED])
        put(sheet, row, 2, number)
        put(sheet, row, 3, MEANING[state])
    row += 2
    export = result.export
    days = sorted({day.isoformat() for day in export.days.values()}) if export is not None else []
    row = pairs(
        sheet,
        row,
        "What it rests on",
        [
            ("returned workbook", f"{result.sheet_file}  sha256 {result.sheet_sha256}"),
            *((item.file, f"sha256 {item.sha256}") for item in result.before.fleet.inputs),
            (
                "settings read after the work",
                f"{', '.join(export.files)} of {', '.join(days)} (by {export.day_from})" if export else "none given",
            ),
            ("rules", f"version {tool_version()}, packs {', '.join(result.after.packs_in_scope)}, hand over"),
            *(("note", remark) for remark in result.matches.remarks),
        ],
    )
    row = pairs(
        sheet,
        row,
        "Beside the findings",
        [
            ("new findings", f"{len(result.new_findings):,}: checks that the values left break"),
            ("of the hand-over", f"{len(result.hand_over_findings):,}: sheet 'New findings'"),
            ("altered without being asked", f"{len(result.altered):,} settings: sheet 'Altered'"),
            ("all closed", "yes" if result.is_closed() else "NO"),
        ],
    )
    row = pairs(sheet, row, "Cautions", [("", caution) for caution in CAUTIONS])
    sign_off(sheet, row)
    page(sheet, site, pages_high=1)


def _rows(result: CloseOut, sheet: Worksheet) -> None:
    row = title(sheet, "Findings after the work", "ordered by bus, panel, motor and relay")
    items = sorted(result.items, key=lambda item: place_order(item.finding))
    table(sheet, row, HEADINGS, WIDTHS, (_values(item) for item in items))
    for at, item in enumerate(items, start=row + 1):
        for column, colour in ((1, FILLS[item.finding.severity]), (2, _STATE_FILLS[item.state in CLOSED])):
            cell = sheet.cell(row=at, column=column)
            assert isinstance(cell, Cell)
            fill(cell, colour)
    page(sheet, result.before.fleet.site, print_area=f"A1:{PRINTED}{row + max(len(items), 1)}")


def _values(item: Sorted) -> list[object]:
    finding, one = item.finding, item.matched
    start: list[object] = [
        LETTERS[finding.severity],
        f"{MARKS[item.state]} {item.state.value}",
        finding.bus,
        finding.cubicle,
        finding.motor or finding.name,
        finding.relay,
        finding.function,
        finding.says,
    ]
    said = "\n".join((item.reason, *item.questions, *item.remarks))
    if one is None:
        return [*start, finding.label, finding.unit, finding.present_text, "", "", "", "", "", "", said, "", "", "",
                finding.key]  # fmt: skip
    work, row = one.work, one.row
    signed = [row.text(name) if row is not None else "" for name in ("done_by", "witnessed_by", "date")]
    return [
        *start,
        work.written.header or work.label,
        work.written.unit,
        work.written.written,
        *(_end(value) for value in (work.low, work.high)),
        one.issued.written,
        one.as_found.written,
        one.as_left.written,
        item.exported_text,
        said,
        *signed,
        finding.key,
    ]


def _end(value: float | None) -> object:
    return "" if value is None else float(f"{value:.6g}")


def _new(result: CloseOut, sheet: Worksheet) -> None:
    row = title(sheet, "New findings", "checks that the values left break, and what the hand-over itself must show")
    headings = ("", "of", "motor", "relay", "function", "what is wrong", "because", "what to do", "source", "check")
    findings = [*_said("values left", result.new_findings), *_said("hand-over", result.hand_over_findings)]
    table(sheet, row, headings, (4, 12, 11, 12, 8, 36, 50, 36, 24, 30), findings)
    page(sheet, result.before.fleet.site)


def _said(of: str, findings: tuple[Finding, ...]) -> Iterator[list[object]]:
    for finding in findings:
        yield [
            LETTERS[finding.severity],
            of,
            finding.motor or finding.name,
            finding.relay,
            finding.function,
            finding.says,
            finding.because,
            finding.remedy,
            finding.source,
            finding.check,
        ]


def _altered(result: CloseOut, sheet: Worksheet) -> None:
    row = title(sheet, "Altered without being asked", "settings that the new export shows changed and no row asked for")
    rows = [
        [
            change.name,
            change.motor,
            change.label,
            change.kind,
            change.before_text,
            change.after_text,
            f"{change.after_cell.file}\n{change.after_cell.sheet}!{change.after_cell.cell}"
            if change.after_cell
            else "",
        ]
        for change in result.altered
    ]
    table(
        sheet, row, ("relay", "motor", "setting", "what", "before", "after", "cell"), (14, 12, 40, 16, 16, 16, 34), rows
    )
    page(sheet, result.before.fleet.site)


def _proposed(result: CloseOut, sheet: Worksheet) -> None:
    below = "remarks that propose to leave a finding: they take effect only in the site's table accepted_deviations"
    row = title(sheet, "Proposed to accept", below)
    rows = [
        [
            item.finding.motor or item.finding.name,
            item.finding.check,
            item.finding.judges,
            item.proposes_to_accept,
            "",
            "",
            item.finding.present_text,
            _end(item.finding.low),
            _end(item.finding.high),
        ]
        for item in result.items
        if item.proposes_to_accept
    ]
    table(sheet, row, DEVIATION_HEADINGS, (11, 36, 30, 50, 16, 12, 12, 10, 10), rows)
    page(sheet, result.before.fleet.site)
