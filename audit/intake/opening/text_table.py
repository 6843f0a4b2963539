"""Tables as text: encoding, separator and decimal mark are found, every cell stays text.

Nothing is converted here: '01', 'NA' and '1,234' mean what the column they stand in says.
"""

from __future__ import annotations

import csv
import io
import re
from collections import Counter
from pathlib import Path

from audit.intake.cells import CellValue
from audit.intake.celltext.numerals import NUMERAL, find_decimal_comma
from audit.intake.opening.bounds import MAXIMUM_GRID_CELLS
from audit.intake.opening.grids import SheetGrid, UnreadableWorkbook

SEPARATORS = {";": "semicolon", ",": "comma", "\t": "tabulator", "|": "vertical bar"}
SAMPLE_ROWS = 200
SEPARATOR_LINE = re.compile(r"\Asep=(.)\r?\n", re.IGNORECASE)
A_NUMBER = re.compile(rf"\s*[-+]?{NUMERAL}\s*%?\s*")


def read_text_table(path: Path, data: bytes) -> tuple[SheetGrid, tuple[str, ...]]:
    """Grid of a text table and remarks on how it was understood."""
    text, encoding = _decode(path, data)
    remarks = []
    stated = SEPARATOR_LINE.match(text)
    if stated:
        separator = stated.group(1)
        text = text[stated.end() :]
        remarks.append("the first line names the separator and is not counted as a row")
    else:
        separator = _find_separator(text)
    rows = _rows(path, text, separator)
    decimal_comma = _decimal_comma(rows)
    remarks.insert(0, f"read as text: {encoding}, separator {SEPARATORS.get(separator, repr(separator))}")
    return SheetGrid(name=path.stem, rows=rows, decimal_comma=decimal_comma), tuple(remarks)


def _decode(path: Path, data: bytes) -> tuple[str, str]:
    if data.startswith(b"\xef\xbb\xbf"):
        candidates = [("utf-8-sig", "UTF-8")]
    elif data.startswith((b"\xff\xfe", b"\xfe\xff")):
        candidates = [("utf-16", "UTF-16")]
    elif b"\0" in data[:4096]:
        little = data[1:4096:2].count(0) > data[0:4096:2].count(0)
        candidates = [("utf-16-le" if little else "utf-16-be", "UTF-16")]
    else:
        candidates = [("utf-8", "UTF-8"), ("cp1252", "Windows western (cp1252)")]
    for codec, name in candidates:
        try:
            return data.decode(codec).rstrip("\x1a"), name
        except UnicodeDecodeError:
            continue
    raise UnreadableWorkbook(
        path,
        "the text is in no known encoding",
        "UTF-8, UTF-16 or Windows western text",
        "Save it as 'CSV UTF-8' in the program it comes from.",
    )


def _find_separator(text: str) -> str:
    """Separator that cuts the first rows most evenly into more than one cell."""
    sample = text[:200_000]
    best, best_score = ",", 0.0
    for separator in SEPARATORS:
        widths: list[int] = []
        try:
            for row in csv.reader(io.StringIO(sample, newline=""), delimiter=separator):
                if row:
                    widths.append(len(row))
                if len(widths) == SAMPLE_ROWS:
                    break
        except csv.Error:
            continue
        if not widths:
            continue
        width, often = Counter(widths).most_common(1)[0]
        if width < 2:
            # a title above the table may be the commonest width of a short file
            wider = [candidate for candidate in widths if candidate > 1]
            width, often = Counter(wider).most_common(1)[0] if wider else (1, 0)
        # even width weighs most, the number of columns settles a tie
        score = often / len(widths) + min(width, 50) / 1000 if width > 1 else 0.0
        if score > best_score:
            best, best_score = separator, score
    return best


def _rows(path: Path, text: str, separator: str) -> list[list[CellValue]]:
    rows: list[list[CellValue]] = []
    width = 0
    try:
        for row in csv.reader(io.StringIO(text, newline=""), delimiter=separator):
            width = max(width, len(row))
            rows.append([cell if cell else None for cell in row])
            if width * len(rows) > MAXIMUM_GRID_CELLS:
                raise UnreadableWorkbook(
                    path,
                    f"the table has more than {MAXIMUM_GRID_CELLS:,} cells",
                    "a table of motors or settings",
                    "Split it, or remove the rows and columns that hold none.",
                )
    except csv.Error as error:
        raise UnreadableWorkbook(
            path,
            f"row {len(rows) + 1} cannot be cut into cells ({error})",
            "quotation marks that close",
            "Look at the quotation marks of that row, or save the table as .xlsx.",
        ) from error
    while rows and all(cell is None for cell in rows[-1]):
        rows.pop()
    for cells in rows:
        cells.extend([None] * (width - len(cells)))
    return rows


def _decimal_comma(rows: list[list[CellValue]]) -> bool | None:
    """Decimal mark of the file; None where its numbers do not tell, or contradict each other."""
    numerals = (cell for row in rows[:5000] for cell in row if isinstance(cell, str) and A_NUMBER.fullmatch(cell))
    return find_decimal_comma(numerals)
