"""The formulas of the hand-over sheet, from functions that every spreadsheet program has, and the values they have."""

from __future__ import annotations

from dataclasses import dataclass

from audit.findings.handover.moving import Line
from audit.findings.handover.rows import WorkRow, setting_key
from audit.report.workbook.patch import SavedValue
from audit.report.workbook.sheets.work_columns import LETTER

BELOW, ABOVE, INSIDE = "BELOW the range", "ABOVE the range", "inside the range"
AS_WANTED, NOT_WANTED = "as wanted", "NOT what is wanted"
NO_NUMBER = "write a number in the unit beside"
MOVED_FAR = "run the audit again: the other setting moved far"
STOP = "STOP AND RING: as-found is not the present value."
NOT_ISSUED = "as-left is not the issued value."
NOTHING_ISSUED = "no value was issued: do not set."
UNIT_MISSING = "unit missing."
UNIT_DIFFERS = "not the unit of the issued value: ring."
FOUND_NO_NUMBER, LEFT_NO_NUMBER = "as-found is no number.", "as-left is no number."
_SLACK = "1E-9"


@dataclass(frozen=True, slots=True)
class Formula:
    """A formula without its '=', and the value that it has while nothing is filled in."""

    text: str
    value: SavedValue


def formulas_of(row: WorkRow, at: int, first: int, last: int) -> dict[str, Formula]:
    """Give the formulas of one row by column; the sheet's rows of work run from `first` to `last`."""
    found = {
        "judged": Formula(_judged(row, at), row.held),
        "notice": Formula(_notice(row, at), ""),
    }
    if row.kind != "number":
        return found
    issued = f"${LETTER['issued']}{at}"
    if row.written.factor == row.written.factor:
        primary = f"({issued}+${LETTER['offset']}{at})*${LETTER['factor']}{at}"
        found["issued_primary"] = Formula(f'IF(ISNUMBER({issued}),{primary},"")', "")
    else:
        found["issued_primary"] = Formula(f'IF(ISNUMBER({issued}),"the base is not known","")', "")
    found["issued_key"] = Formula(f'IF(ISNUMBER(${LETTER["issued_primary"]}{at}),${LETTER["setting_key"]}{at},"")', "")
    for end, line, value in (("low", row.moving.low, row.low), ("high", row.moving.high, row.high)):
        if line is None or value is None:
            continue
        found[f"{end}_now"] = Formula(_other_now(end, line, at, first, last), line.present)
        found[end] = Formula(f"{line.intercept!r}+{line.slope!r}*${LETTER[f'{end}_now']}{at}", value)
    return found


def other_key(row: WorkRow, line: Line) -> str:
    """Give the key of the other setting that an end moves with."""
    return setting_key(row.finding.relay, line.other, row.finding.setting_group)


def _other_now(end: str, line: Line, at: int, first: int, last: int) -> str:
    """Find the other setting's issued primary value in whatever row it stands, else take its present value."""
    values = f"${LETTER['issued_primary']}${first}:${LETTER['issued_primary']}${last}"
    keys = f"${LETTER['issued_key']}${first}:${LETTER['issued_key']}${last}"
    return f"IFERROR(INDEX({values},MATCH(${LETTER[f'{end}_other']}{at},{keys},0)),{line.present!r})"


def _judged(row: WorkRow, at: int) -> str:
    issued, held = f"${LETTER['issued']}{at}", f"${LETTER['held']}{at}"
    inner = _judged_number(row, at) if row.kind == "number" else _judged_word(row, at)
    return f'IF({held}<>"",{held},IF({issued}="","",{inner}))'


def _judged_number(row: WorkRow, at: int) -> str:
    value, low, high = (f"${LETTER[name]}{at}" for name in ("issued_primary", "low", "high"))
    again = f"${LETTER['again']}{at}"
    inside = f'IF({again}<>"","{INSIDE}, but "&{again},"{INSIDE}")'
    far = []
    for end, line in (("low", row.moving.low), ("high", row.moving.high)):
        if line is not None:
            now = f"${LETTER[f'{end}_now']}{at}"
            least, most = line.span()
            far.append(f"{now}<{least!r},{now}>{most!r}")
    if far:
        inside = f'IF(OR({",".join(far)}),"{MOVED_FAR}",{inside})'
    if row.low is None and row.high is None:
        inside = again
    text = f'IF(AND(ISNUMBER({high}),{value}>{high}+{_SLACK}*ABS({high})),"{ABOVE}",{inside})'
    text = f'IF(AND(ISNUMBER({low}),{value}<{low}-{_SLACK}*ABS({low})),"{BELOW}",{text})'
    return f'IF(ISNUMBER({value}),{text},"{NO_NUMBER}")'


def _judged_word(row: WorkRow, at: int) -> str:
    issued, wanted = f"${LETTER['issued']}{at}", f"${LETTER['wanted']}{at}"
    if not row.words_wanted:
        return f"${LETTER['again']}{at}"
    return f'IF(ISNUMBER(FIND("|"&LOWER(TRIM({issued}))&"|",{wanted})),"{AS_WANTED}","{NOT_WANTED}")'


def _notice(row: WorkRow, at: int) -> str:
    cell = {name: f"${letter}{at}" for name, letter in LETTER.items()}
    found, left, unit, issued = cell["as_found"], cell["as_left"], cell["unit"], cell["issued"]
    if row.kind == "number":
        parts = _notice_of_numbers(row, cell)
    else:
        parts = [
            _said(f'AND({found}<>"",LOWER(TRIM({found}))<>LOWER(TRIM({cell["written"]})))', STOP),
            _said(f'AND({left}<>"",{issued}="")', NOTHING_ISSUED),
            _said(f'AND({left}<>"",{issued}<>"",LOWER(TRIM({left}))<>LOWER(TRIM({issued})))', NOT_ISSUED),
        ]
    if row.kind == "number" and row.written.unit:
        parts.append(_said(f'AND(OR({found}<>"",{left}<>""),{unit}="")', UNIT_MISSING))
        parts.append(_said(f'AND({unit}<>"",LOWER(TRIM({unit}))<>LOWER({cell["issued_unit"]}))', UNIT_DIFFERS))
    return f"TRIM({'&'.join(parts)})"


def _notice_of_numbers(row: WorkRow, cell: dict[str, str]) -> list[str]:
    found, left, issued, step = cell["as_found"], cell["as_left"], cell["issued"], cell["step"]
    present = cell["present_number"]
    apart = f"ABS({found}-{present})>{step}/2+{_SLACK}"
    if row.written.number == row.written.number:
        first = f'IF({found}="","",IF(ISNUMBER({found}),IF({apart},"{STOP} ",""),"{FOUND_NO_NUMBER} "))'
    else:
        same = f"LOWER(TRIM({found}))<>LOWER(TRIM({cell['written']}))"
        first = _said(f'AND({found}<>"",{same})', STOP)
    off = f"ABS({left}-{issued})>{step}*1.000001"
    number = f'IF(ISNUMBER({left}),IF({off},"{NOT_ISSUED} ",""),"{LEFT_NO_NUMBER} ")'
    return [first, f'IF({left}="","",IF({issued}="","{NOTHING_ISSUED} ",{number}))']


def _said(condition: str, text: str) -> str:
    return f'IF({condition},"{text} ","")'
