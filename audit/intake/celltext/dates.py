"""Cells that should hold a day, with or without a time of day.

'03/04/25' is the third of April or the fourth of March; it is never guessed. Other dates of the column
tell ('25/04/25' can only be day first), else the reading is AMBIGUOUS.
"""

from __future__ import annotations

import re
from collections.abc import Iterable, Sequence
from datetime import date, datetime, time, timedelta

from audit.intake.cells import CellValue
from audit.intake.celltext.columns import cell_text, not_a_value
from audit.intake.celltext.reading import MISSING, CellKind, CellReading
from audit.intake.celltext.words import kind_of_word

EXPECTED = "write the day as 2025-04-03 (year, month, day), or leave the cell empty"
EARLIEST_YEAR = 1900
LAST_YEAR_OF_THIS_CENTURY = 68
"""Two-digit years: 69 to 99 lie in the 20th century, as POSIX strptime has it."""

_TIME = (
    r"(?:[ T,]+(?P<hour>\d{1,2})[:.](?P<minute>\d{2})(?:[:.](?P<second>\d{2})(?:[.,]\d+)?)?"
    r"\s*(?P<half>[ap]\.?m\.?)?(?P<zone>Z|[+-]\d{2}:?\d{2})?)?"
)
_YEAR_FIRST = re.compile(
    rf"(?P<year>\d{{4}})(?P<mark>[-/.])(?P<month>\d{{1,2}})(?P=mark)(?P<day>\d{{1,2}}){_TIME}", re.IGNORECASE
)
_YEAR_LAST = re.compile(
    rf"(?P<first>\d{{1,2}})(?P<mark>[-/.])(?P<second_part>\d{{1,2}})(?P=mark)(?P<year>\d{{4}}|\d{{2}}){_TIME}",
    re.IGNORECASE,
)
_DAY_NAMED_MONTH = re.compile(
    rf"(?P<day>\d{{1,2}})(?:st|nd|rd|th)?[-/. ]+(?P<name>[a-z]{{3,9}})[-/., ]+"
    rf"(?P<year>\d{{4}}|\d{{2}}){_TIME}",
    re.IGNORECASE,
)
_NAMED_MONTH_DAY = re.compile(
    rf"(?P<name>[a-z]{{3,9}})[-/. ]+(?P<day>\d{{1,2}})(?:st|nd|rd|th)?[-/., ]+(?P<year>\d{{4}}){_TIME}",
    re.IGNORECASE,
)
_YEAR_ONLY = re.compile(r"(?:19|20)\d{2}")
_MONTHS = (
    "january",
    "february",
    "march",
    "april",
    "may",
    "june",
    "july",
    "august",
    "september",
    "october",
    "november",
    "december",
)


def find_day_first(texts: Iterable[str]) -> bool | None:
    """Order that the dates of several texts agree on; None if they are silent or contradict.

    >>> find_day_first(["25/04/25", "03/04/25"]), find_day_first(["04/25/2025"])
    (True, False)
    >>> find_day_first(["03/04/25"]) is None
    True
    """
    orders = set()
    for text in texts:
        match = _YEAR_LAST.fullmatch(text)
        if match and match["mark"] != ".":
            first, second = int(match["first"]), int(match["second_part"])
            if first > 12 >= second:
                orders.add(True)
            elif second > 12 >= first:
                orders.add(False)
    return orders.pop() if len(orders) == 1 else None


def read_date_cells(cells: Sequence[CellValue], *, day_first: bool | None = None) -> list[CellReading]:
    """Readings of a column of dates: DATE with `moment`; `day_first` is what is known about the file."""
    texts = {cell: cell_text(cell) for cell in cells if isinstance(cell, str)}
    if day_first is None:
        day_first = find_day_first(texts.values())
    known = {cell: _read_date_text(text, day_first) for cell, text in texts.items()}
    return [known[cell] if isinstance(cell, str) else _not_text(cell) for cell in cells]


def _not_text(cell: CellValue) -> CellReading:
    if cell is None:
        return MISSING
    faulty = not_a_value(cell)
    if faulty is not None:
        return faulty
    text = cell_text(cell)
    if isinstance(cell, datetime):
        return _known(text, cell)
    if isinstance(cell, date):
        return _known(text, datetime.combine(cell, time()))
    if isinstance(cell, int | float) and not isinstance(cell, bool):
        if _YEAR_ONLY.fullmatch(text):
            return _year_only(text)
        if 20000 <= cell < 80000:
            day = datetime(1899, 12, 30) + timedelta(days=int(cell))
            return CellReading(
                CellKind.AMBIGUOUS,
                text=text,
                moments=(day,),
                remark=f"the cell holds the number {text}, which would be {day.date()} if it were "
                f"formatted as a date; {EXPECTED}",
            )
    return _bad(text)


def _bad(text: str) -> CellReading:
    return CellReading(CellKind.BAD, text=text, remark=f"'{text[:40]}' is not a date; {EXPECTED}")


def _year_only(text: str) -> CellReading:
    year = int(text)
    return CellReading(
        CellKind.AMBIGUOUS,
        text=text,
        moments=(datetime(year, 1, 1), datetime(year, 12, 31)),
        remark=f"'{text}' is a year, not a day; {EXPECTED}",
    )


def _known(text: str, moment: datetime) -> CellReading:
    if moment.year < EARLIEST_YEAR:
        return _bad(text)
    return CellReading(CellKind.DATE, text=text, moment=moment)


def _read_date_text(text: str, day_first: bool | None) -> CellReading:
    if not text:
        return MISSING
    kind = kind_of_word(text)
    if kind is not None:
        remark = (
            f"'{text}' is not a date" if kind is not CellKind.INSTANTANEOUS else f"'{text}' is not a date; {EXPECTED}"
        )
        return CellReading(CellKind.BAD if kind is CellKind.INSTANTANEOUS else kind, text=text, remark=remark)
    if _YEAR_ONLY.fullmatch(text):
        return _year_only(text)
    match = _YEAR_FIRST.fullmatch(text)
    if match:
        return _first_that_exists(text, [_moment(match, int(match["month"]), int(match["day"]))])
    match = _DAY_NAMED_MONTH.fullmatch(text) or _NAMED_MONTH_DAY.fullmatch(text)
    if match:
        return _first_that_exists(text, [_moment(match, _month(match["name"]), int(match["day"]))])
    match = _YEAR_LAST.fullmatch(text)
    if match is None:
        return _bad(text)
    first, second = int(match["first"]), int(match["second_part"])
    if match["mark"] == "." or day_first is True:
        return _first_that_exists(text, [_moment(match, second, first)])
    if day_first is False:
        return _first_that_exists(text, [_moment(match, first, second)])
    return _first_that_exists(text, [_moment(match, second, first), _moment(match, first, second)])


def _first_that_exists(text: str, candidates: list[datetime | None]) -> CellReading:
    existing = tuple(dict.fromkeys(moment for moment in candidates if moment is not None))
    if not existing:
        return _bad(text)
    if len(existing) == 1:
        return _known(text, existing[0])
    return CellReading(
        CellKind.AMBIGUOUS,
        text=text,
        moments=existing,
        remark=f"'{text}' may be {existing[0].date()} or {existing[1].date()}; {EXPECTED}",
    )


def _month(name: str) -> int:
    lowered = name.lower()
    if lowered == "sept":
        return 9
    for number, month in enumerate(_MONTHS, start=1):
        if lowered in (month, month[:3]):
            return number
    return 0


def _moment(match: re.Match[str], month: int, day: int) -> datetime | None:
    year = int(match["year"])
    if len(match["year"]) == 2:
        year += 2000 if year <= LAST_YEAR_OF_THIS_CENTURY else 1900
    hour, minute, second = (int(match[part] or 0) for part in ("hour", "minute", "second"))
    half = (match["half"] or "").lower()
    if half and not 1 <= hour <= 12:
        return None
    if half:
        hour = hour % 12 + (12 if half.startswith("p") else 0)
    try:
        return datetime(year, month, day, hour, minute, second)
    except ValueError:
        return None
