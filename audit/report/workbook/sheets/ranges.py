"""The permissible ranges: one row a motor and setting, with a picture of where the present value lies."""

from __future__ import annotations

import math
from collections.abc import Iterator

from openpyxl.styles import Font
from openpyxl.worksheet.worksheet import Worksheet

from audit.expression.text import plain_number
from audit.findings.audit import Audit
from audit.report.record import parts
from audit.report.workbook.sheets.layout import page, table, title

HEADINGS = (
    "motor", "setting", "unit", "present", "low", "high", "where the present value lies", "state", "low set by",
    "high set by", "preferred low", "preferred high",
)  # fmt: skip
WIDTHS = (14, 30, 7, 11, 11, 11, 30, 14, 30, 30, 15, 15)
CELLS = 21
_PICTURE = 7


def picture(present: float | None, low: float | None, high: float | None) -> str:
    """Draw the range between brackets and the present value as a dot, on a logarithmic scale.

    >>> picture(200.0, 100.0, 400.0)
    '     [────●────]     '
    >>> picture(50.0, 100.0, None)
    '●         [─────────►'
    """
    if low is None and high is None:
        return ""
    ends = [end for end in (low, high) if end is not None and end > 0]
    if not ends:
        return ""
    first, last = min(ends), max(ends)
    inside = 11 if low is not None and high is not None and last > first else 1
    start = (CELLS - inside) // 2
    span = math.log(last / first) if last > first else math.log(2)
    strip = [" "] * CELLS
    if low is not None and high is not None:
        for place in range(start, start + inside):
            strip[place] = "─"
        strip[start], strip[start + inside - 1] = "[", "]"
    elif low is not None:
        strip[start:] = ["─"] * (CELLS - start)
        strip[start], strip[-1] = "[", "►"
    else:
        strip[: start + 1] = ["─"] * (start + 1)
        strip[0], strip[start] = "◄", "]"
    if present is not None and present > 0:
        share = math.log(present / first) / span
        at = round(start + share * max(inside - 1, 10))
        strip[min(max(at, 0), CELLS - 1)] = "●"
    return "".join(strip)


def write_ranges(audit: Audit, sheet: Worksheet) -> None:
    """Write the ranges sheet."""
    below = "a range is not an instruction: pickup and delay act together, the engineer issues one value"
    row = title(sheet, "Permissible ranges", below)
    last = table(sheet, row, HEADINGS, WIDTHS, _rows(audit))
    for number in range(row + 1, last):
        sheet.cell(row=number, column=_PICTURE).font = Font(name="Courier New", size=8)
    page(sheet, audit.fleet.site)


def _rows(audit: Audit) -> Iterator[list[object]]:
    for item in parts.ranges(audit):
        label = audit.workings.quantities[item["setting"]].label
        yield [
            item["motor"],
            label,
            item["unit"],
            *(_shown(item[end]) for end in ("present", "low", "high")),
            picture(item["present"], item["low"], item["high"]),
            item["state"],
            item["low_set_by"],
            item["high_set_by"],
            *(_shown(item[end]) for end in ("preferred_low", "preferred_high")),
        ]


def _shown(value: float | None) -> object:
    return "" if value is None else float(plain_number(value).replace(",", ""))
