"""The hand-over sheet: what the engineer issues, what the contractor sets, and formulas that judge both."""

from __future__ import annotations

import hashlib
import math
from collections import defaultdict
from collections.abc import Sequence

from openpyxl.cell import Cell
from openpyxl.formatting.rule import Rule
from openpyxl.styles import Alignment, Border, Font, PatternFill, Protection, Side
from openpyxl.styles.differential import DifferentialStyle
from openpyxl.utils import get_column_letter
from openpyxl.worksheet.datavalidation import DataValidation
from openpyxl.worksheet.pagebreak import Break
from openpyxl.worksheet.worksheet import Worksheet

from audit.findings.audit import Audit
from audit.findings.finding import FindingCell
from audit.findings.handover.rows import WorkRow
from audit.fleet.addresses import Place
from audit.report.workbook.patch import SavedValue
from audit.report.workbook.sheets.findings import judged_cell, set_by
from audit.report.workbook.sheets.layout import (
    FILLS,
    HEADING_FILL,
    LETTERS,
    LINE_HEIGHT,
    MOST_LINKS,
    fill,
    lines_of,
    link,
    page,
    put,
    title,
)
from audit.report.workbook.sheets.work_columns import COLUMNS, LAST_PRINTED, LETTER, MARK, NUMBER, REPEATED, WorkColumn
from audit.report.workbook.sheets.work_formulas import formulas_of, other_key

BELOW_TITLE = (
    "one row a finding, ordered by bus, panel, motor and relay; a range is not an instruction: "
    "the contractor sets the ISSUED VALUE and nothing else"
)
NAMES_ROW, BAND_ROW, HEADING_ROW = 3, 4, 5
PLANT_STATES = ("in service", "standing still", "isolated", "isolated and earthed")
TRIP_LINKS = ("in", "out", "not fitted")
PROVED = ("yes", "no", "not possible")
OPEN_FILLS = {"engineer": "FFF8DC", "contractor": "EAF4E6"}
BANDS = {
    "tool": "from the audit",
    "engineer": "the engineer issues",
    "contractor": "the contractor fills in",
}
SCALE = 60
"""Per cent at which each of the four pages side by side fits on Letter, the narrower of the two papers."""
_THIN = Side(style="thin", color="B8C0C4")


def write_work(audit: Audit, rows: Sequence[WorkRow], sheet: Worksheet, own_file: str) -> dict[str, SavedValue]:
    """Write the sheet; give the value of each of its formulas by address."""
    title(sheet, f"Work: settings to be changed · {audit.fleet.site}", BELOW_TITLE, column=NUMBER["severity"])
    put(sheet, 1, NUMBER["stamp"], stamp(audit, rows), wrap=False)
    _headings(sheet)
    first, last = HEADING_ROW + 1, HEADING_ROW + max(len(rows), 1)
    saved: dict[str, SavedValue] = {}
    for at, row in enumerate(rows, start=first):
        _write_row(sheet, row, at, own_file)
        for name, formula in formulas_of(row, at, first, last).items():
            cell = sheet.cell(row=at, column=NUMBER[name])
            cell.value = f"={formula.text}"
            cell.data_type = "f"
            saved[cell.coordinate] = formula.value
    _validate(sheet, rows, first)
    _highlight(sheet, first, last)
    _protect(sheet)
    _print(sheet, audit.fleet.site, last)
    return saved


def stamp(audit: Audit, rows: Sequence[WorkRow]) -> str:
    """Give what tells this issue of the sheet from others: the day, and a hash of what was to be changed."""
    said = "\n".join(sorted(f"{row.key}={judged_from(row)}" for row in rows))
    return f"stamp:{audit.audited_on.isoformat()}:{hashlib.sha256(said.encode()).hexdigest()[:12]}"


def judged_from(row: WorkRow) -> str:
    """Give the present value and the range that a row was made from."""
    figures = (row.present, row.low, row.high)
    shown = [f"{value:.6g}" if value is not None and value == value else "" for value in figures]
    return "|".join([row.written.written, *shown])


def _headings(sheet: Worksheet) -> None:
    for column in COLUMNS:
        place = NUMBER[column.name]
        put(sheet, NAMES_ROW, place, MARK + column.name, wrap=False)
        heading = put(sheet, HEADING_ROW, place, column.heading)
        heading.font = Font(name="Calibri", size=10, bold=True, color="FFFFFF")
        heading.alignment = Alignment(vertical="center", wrap_text=True)
        fill(heading, HEADING_FILL)
        letter = get_column_letter(place)
        sheet.column_dimensions[letter].width = column.width
        sheet.column_dimensions[letter].hidden = column.owner == "hidden"
        band = put(sheet, BAND_ROW, place, "", wrap=False)
        band.font = Font(name="Calibri", size=10, italic=True)
        if _opens_band(column):
            band.value = BANDS[column.owner]
        fill(band, OPEN_FILLS.get(column.owner, "E4E8EA"))
    sheet.row_dimensions[NAMES_ROW].hidden = True
    sheet.row_dimensions[HEADING_ROW].height = 56
    sheet.freeze_panes = f"{LETTER['function']}{HEADING_ROW + 1}"


def _opens_band(column: WorkColumn) -> bool:
    before = COLUMNS[NUMBER[column.name] - 2] if NUMBER[column.name] > 1 else None
    return column.owner in BANDS and (before is None or before.owner != column.owner or before.page != column.page)


def _write_row(sheet: Worksheet, row: WorkRow, at: int, own_file: str) -> None:
    values = _values(row)
    for column in COLUMNS:
        cell = put(sheet, at, NUMBER[column.name], values.get(column.name))
        cell.border = Border(bottom=_THIN, left=_THIN, right=_THIN)
        if column.owner in OPEN_FILLS:
            cell.protection = Protection(locked=False)
            fill(cell, OPEN_FILLS[column.owner])
        if column.name in ("issued_date", "date"):
            cell.number_format = "yyyy-mm-dd"
        if column.name in ("present", "low", "high", "issued_primary"):
            cell.number_format = "#,##0.###"
    severity = sheet.cell(row=at, column=NUMBER["severity"])
    assert isinstance(severity, Cell)
    fill(severity, FILLS[row.finding.severity])
    for name in ("issued", "as_found", "as_left"):
        sheet.cell(row=at, column=NUMBER[name]).font = Font(name="Calibri", size=11, bold=True)
    place = _place(row)
    target = sheet.cell(row=at, column=NUMBER["cell"])
    if place is not None and place.file == own_file and at < MOST_LINKS and isinstance(target, Cell):
        link(target, place.sheet, place.cell)
    shown = [column for column in COLUMNS if column.owner != "hidden"]
    lines = lines_of([values.get(column.name) for column in shown], [column.width for column in shown])
    sheet.row_dimensions[at].height = LINE_HEIGHT * max(lines, 2)


def _values(row: WorkRow) -> dict[str, object]:
    finding, written = row.finding, row.written
    place = _place(row)
    group = f" (group {finding.setting_group})" if finding.setting_group else ""
    because = finding.because + (" (provisional)" if finding.provisional else "")
    state = f"\nrange: {finding.range_state}" if finding.range_state else ""
    issued_unit = written.unit or ("" if row.kind == "number" else "a word")
    return {
        "key": row.key,
        "severity": LETTERS[finding.severity],
        "bus": finding.bus,
        "cubicle": finding.cubicle,
        "motor": finding.motor or finding.name,
        "relay": finding.relay + group,
        "header": written.header or "not in the export",
        "function": row.function,
        "label": row.label,
        "written": _short(written.number) if _is_plain(row) else written.written,
        "written_unit": written.unit,
        "present": _short(row.present),
        "low": _short(row.low),
        "high": _short(row.high),
        "symbol": row.symbol,
        "set_by": set_by(finding),
        "wrong": f"{finding.says}: {because}{state}",
        "why": finding.why,
        "source": finding.source,
        "cell": place_words(place),
        "proposed": row.proposal.value if row.proposal.value is not None else "none",
        "how": row.proposal.how,
        "issued_unit": issued_unit,
        "primary_unit": row.symbol,
        "setting_key": row.setting_key,
        "step": _short(written.step) if written.step == written.step else 0,
        "factor": written.factor if math.isfinite(written.factor) else "",
        "offset": written.offset,
        "held": row.held,
        "again": row.again,
        "wanted": f"|{'|'.join(row.words_wanted)}|" if row.words_wanted else "",
        "low_other": other_key(row, row.moving.low) if row.moving.low else "",
        "high_other": other_key(row, row.moving.high) if row.moving.high else "",
        "present_number": _short(written.number),
        "judged_from": judged_from(row),
    }


def _place(row: WorkRow) -> Place | FindingCell | None:
    return row.written.place or judged_cell(row.finding)


def place_words(place: Place | FindingCell | None) -> str:
    """Write where a cell stands."""
    return f"{place.file}\n{place.sheet}!{place.cell}" if place is not None else ""


def _is_plain(row: WorkRow) -> bool:
    return (
        row.kind == "number"
        and row.written.number == row.written.number
        and row.written.written.strip() == (f"{row.written.number:g}")
    )


def _short(value: float | None) -> float | None:
    """Give a number that a cell can hold, without the dust of binary fractions."""
    if value is None or not math.isfinite(value):
        return None
    return float(f"{value:.12g}")


def _validate(sheet: Worksheet, rows: Sequence[WorkRow], first: int) -> None:
    if not rows:
        return
    last = first + len(rows) - 1
    units: dict[str, list[int]] = defaultdict(list)
    for at, row in enumerate(rows, start=first):
        if row.kind == "number" and row.written.unit:
            choices = dict.fromkeys([row.written.unit, row.symbol, *_OTHER_UNITS.get(row.symbol, ())])
            units[",".join(choice for choice in choices if choice)].append(at)
    for listed, places in units.items():
        _choices(sheet, "unit", listed.split(","), places)
    everywhere = list(range(first, last + 1))
    for name, words in (("plant_state", PLANT_STATES), ("trip_links", TRIP_LINKS), ("trip_proved", PROVED)):
        _choices(sheet, name, words, everywhere)
    numbers = [at for at, row in enumerate(rows, start=first) if row.kind == "number"]
    for name in ("as_found", "as_left"):
        _numbers(sheet, name, numbers, "The number alone; its unit has a column of its own.")
    for name, what in (("injected", "amperes"), ("measured", "seconds")):
        _numbers(sheet, name, everywhere, f"A number in {what}.")
    for name in ("issued_date", "date"):
        rule = DataValidation(type="date", operator="greaterThan", formula1="36526", allow_blank=True)
        rule.error, rule.errorTitle, rule.showErrorMessage = "A day, for example 2026-11-30.", "Date", True
        rule.add(f"{LETTER[name]}{first}:{LETTER[name]}{last}")
        sheet.add_data_validation(rule)
    held = DataValidation(type="custom", formula1=f'${LETTER["held"]}{first}=""', allow_blank=True)
    held.error = "Held back: a datum that sets an end of the range is provisional. See the column 'judged'."
    held.errorTitle, held.showErrorMessage = "Held back", True
    held.add(f"{LETTER['issued']}{first}:{LETTER['issued']}{last}")
    sheet.add_data_validation(held)


_OTHER_UNITS = {"A": ("x CT", "x FLA", "% CT", "% FLA", "A sec"), "s": ("ms", "min", "cycles"), "V": ("V sec", "x VT")}


def _choices(sheet: Worksheet, name: str, words: Sequence[str], places: Sequence[int]) -> None:
    rule = DataValidation(type="list", formula1=f'"{",".join(words)}"', allow_blank=True)
    rule.errorStyle = "warning"
    rule.error, rule.errorTitle, rule.showErrorMessage = f"One of: {', '.join(words)}.", "Choose", True
    for place in places:
        rule.add(f"{LETTER[name]}{place}")
    sheet.add_data_validation(rule)


def _numbers(sheet: Worksheet, name: str, places: Sequence[int], says: str) -> None:
    if not places:
        return
    rule = DataValidation(type="decimal", operator="between", formula1="-1E9", formula2="1E9", allow_blank=True)
    rule.errorStyle = "warning"
    rule.error, rule.errorTitle, rule.showErrorMessage = says, "Number", True
    for place in places:
        rule.add(f"{LETTER[name]}{place}")
    sheet.add_data_validation(rule)


def _highlight(sheet: Worksheet, first: int, last: int) -> None:
    notice, judged = LETTER["notice"], LETTER["judged"]
    bad = f'AND(LEN(${judged}{first})>0,ISERROR(FIND("inside",${judged}{first})),${judged}{first}<>"as wanted")'
    for letter, condition in ((notice, f"LEN(${notice}{first})>0"), (judged, bad)):
        alert = DifferentialStyle(font=Font(bold=True, color="9C1B0B"), fill=PatternFill(bgColor="F9D9D2"))
        rule = Rule(type="expression", dxf=alert, formula=[condition])
        sheet.conditional_formatting.add(f"{letter}{first}:{letter}{last}", rule)


def _protect(sheet: Worksheet) -> None:
    """Protect what is not to be filled in, without a password: against slips, not against anybody."""
    protection = sheet.protection
    protection.sheet = True
    for allowed in ("formatColumns", "formatRows", "autoFilter", "sort", "selectLockedCells", "selectUnlockedCells"):
        setattr(protection, allowed, False)


def _print(sheet: Worksheet, site: str, last: int) -> None:
    heading = HEADING_ROW
    sheet.auto_filter.ref = f"{LETTER['key']}{heading}:{LETTER['stamp']}{last}"
    page(sheet, site, print_area=f"{LETTER['severity']}1:{LETTER[LAST_PRINTED]}{last}")
    sheet.print_title_rows = f"{BAND_ROW}:{heading}"
    sheet.print_title_cols = f"{LETTER[REPEATED[0]]}:{LETTER[REPEATED[1]]}"
    properties = sheet.sheet_properties.pageSetUpPr
    assert properties is not None
    properties.fitToPage = False
    sheet.page_setup.fitToWidth = sheet.page_setup.fitToHeight = None
    sheet.page_setup.scale = SCALE
    sheet.page_setup.pageOrder = "overThenDown"
    for column in COLUMNS:
        before = COLUMNS[NUMBER[column.name] - 2] if NUMBER[column.name] > 1 else None
        if before is not None and column.page > 1 and before.page == column.page - 1:
            sheet.col_breaks.append(Break(id=NUMBER[before.name]))
