"""Text of one cell to a number with what stands around it."""

from __future__ import annotations

import math
import re

from audit.intake.celltext.beside import unit_and_qualifier
from audit.intake.celltext.characters import plain
from audit.intake.celltext.numerals import NUMERAL, numeral_values
from audit.intake.celltext.reading import MISSING, CellKind, CellReading
from audit.intake.celltext.words import SAYS_ON, folded, kind_of_word, refers_to_a_note

LONGEST_TEXT = 120

_RELATION = re.compile(
    r"(?P<sign><=|>=|=<|=>|<|>|~)\s*|(?P<most>max(?:imum|\.)?|up to|at most)[ :=]*(?=[\d.,+-])"
    r"|(?P<least>min(?:imum|\.)?|at least)[ :=]*(?=[\d.,+-])|=\s*",
    re.IGNORECASE,
)
_SIMPLE = re.compile(r"[-+]?\d+(?:[.,]\d+)? ?[A-Za-z%°]{0,6}")
_FRACTIONS = r"1/2|1/4|3/4|1/3|2/3|1/8|3/8|5/8|7/8"
_MIXED = re.compile(
    rf"(?P<whole>\d+)(?: ?- ?| )(?P<top>\d)/(?P<bottom>[2348])(?![\d/])(?<=(?:{_FRACTIONS}))(?P<rest>.*)"
)
_FRACTION = re.compile(
    r"(?P<top>[1357])/(?P<bottom>[2348])(?P<rest>\s*(?:hp|h\.p\.?|horsepower|ps|cv)\b.*)", re.IGNORECASE
)
_KILO_FOR_POINT = re.compile(r"(?P<whole>\d+)[kK](?P<fraction>\d+)(?:\s*V)?")
_CLOCK = re.compile(r"(?P<first>\d{1,2}):(?P<second>[0-5]\d)(?::(?P<third>[0-5]\d(?:[.,]\d+)?))?")
_DURATION = re.compile(
    r"(?P<first>\d+)\s*(?P<large>h|hr|hrs|min|m)\.?\s*(?P<second>\d+)\s*(?P<small>min|mins|m|s|sec)\.?",
    re.IGNORECASE,
)
_NUMBER = re.compile(rf"(?P<sign>[-+]?)\s?(?P<numeral>{NUMERAL})(?P<rest>.*)", re.DOTALL)
_RANGE = re.compile(
    rf"(?P<low>{NUMERAL})(?P<unit>(?![eE][-+]?\d)[^\d\n/;|+-]{{0,8}}?)\s*(?:-|\.{{2,3}}|÷|\bto\b|\bthrough\b)\s*(?P<high>{NUMERAL}.*)",
    re.IGNORECASE,
)
_NEXT_VALUE = re.compile(r"\s*(?:/|\n|;|\||&|\band\b|,\s)\s*(?=[-+<>~]?\s?[.,]?\d)")
_PAIR = re.compile(rf"(?P<first>{NUMERAL})\s*:\s*(?P<second>{NUMERAL}.*)")
_SECONDS = {"h": 3600.0, "hr": 3600.0, "hrs": 3600.0, "min": 60.0, "m": 60.0}

WRITE_A_NUMBER = "write one number, with its unit if it is not that of the column, or leave the cell empty"


def read_number_text(text: str, decimal_comma: bool | None = None) -> CellReading:
    """Read the text of a cell that should hold a number.

    >>> read = read_number_text("6 x FLA")
    >>> read.number, read.unit_text
    (6.0, 'x FLA')
    >>> read_number_text("380-415").numbers
    (380.0, 415.0)
    """
    written = plain(text)
    if not written:
        return MISSING
    if len(written) > LONGEST_TEXT:
        return _bad(text, f"a text of {len(written)} characters is not a number; {WRITE_A_NUMBER}")
    if _SIMPLE.fullmatch(written):
        return _single(text, written, "", decimal_comma)
    kind = kind_of_word(written)
    if kind is not None:
        return _word(kind, text, written)
    special = _special(text, written)
    if special is not None:
        return special
    relation, value = _relation(written)
    pieces = _NEXT_VALUE.split(value)
    if len(pieces) > 1:
        return _several(text, written, pieces, decimal_comma)
    return (
        _range(text, value, decimal_comma)
        or _pair(text, value, decimal_comma)
        or _single(text, value, relation, decimal_comma)
    )


def _bad(text: str, remark: str) -> CellReading:
    return CellReading(CellKind.BAD, text=text, remark=remark)


def _word(kind: CellKind, text: str, written: str) -> CellReading:
    if kind is CellKind.ERROR:
        return CellReading(kind, text=text, remark=f"the cell shows the error {written}; repair its formula")
    if kind is CellKind.MISSING:
        return CellReading(kind, text=text, remark=f"'{written}' counts as missing")
    return CellReading(kind, text=text)


def _special(text: str, written: str) -> CellReading | None:
    """Notations that a general rule would misread: fractions, 6k6, clock times, 2 min 30 s."""
    match = _MIXED.fullmatch(written) or _FRACTION.fullmatch(written)
    if match:
        whole = float(match.groupdict().get("whole") or 0)
        number = whole + int(match["top"]) / int(match["bottom"])
        unit, qualifier = unit_and_qualifier(match["rest"].strip())
        if unit is not None:
            return CellReading(CellKind.NUMBER, number, unit, text, qualifier=qualifier)
    match = _KILO_FOR_POINT.fullmatch(written)
    if match:
        number = float(f"{match['whole']}.{match['fraction']}")
        return CellReading(CellKind.NUMBER, number, "kV", text, remark=f"'{written}' read as {number:g} kV")
    match = _DURATION.fullmatch(written)
    if match and match["large"].lower() != match["small"].lower():
        small = 1.0 if match["small"].lower().startswith("s") or match["large"].lower() == "m" else 60.0
        number = int(match["first"]) * _SECONDS[match["large"].lower()] + int(match["second"]) * small
        return CellReading(CellKind.NUMBER, number, "s", text)
    match = _CLOCK.fullmatch(written)
    if match is None:
        return None
    first, second = int(match["first"]), int(match["second"])
    if match["third"] is not None:
        number = first * 3600 + second * 60 + float(match["third"].replace(",", "."))
        return CellReading(CellKind.NUMBER, number, "s", text, remark=f"'{written}' read as {number:g} s")
    return CellReading(
        CellKind.AMBIGUOUS,
        unit_text="s",
        text=text,
        numbers=(first * 60.0 + second, first * 3600.0 + second * 60.0),
        remark=f"'{written}' may be minutes and seconds or hours and minutes; {WRITE_A_NUMBER}",
    )


def _relation(written: str) -> tuple[str, str]:
    match = _RELATION.match(written)
    if match is None:
        return "", written
    value = written[match.end() :]
    if match["most"]:
        return "<=", value
    if match["least"]:
        return ">=", value
    return {"=<": "<=", "=>": ">=", None: ""}.get(match["sign"], match["sign"] or ""), value


def _single(text: str, value: str, relation: str, decimal_comma: bool | None) -> CellReading:
    match = _NUMBER.fullmatch(value)
    if match is None:
        if refers_to_a_note(value):
            return _bad(text, f"'{value}' sends the reader elsewhere; {WRITE_A_NUMBER}")
        if folded(value) in SAYS_ON:
            return _bad(text, f"'{value}' says that the function is on, not its value; {WRITE_A_NUMBER}")
        return _bad(text, f"'{_short(value)}' is not a number; {WRITE_A_NUMBER}")
    unit, qualifier = unit_and_qualifier(match["rest"].strip())
    values = numeral_values(match["numeral"], decimal_comma)
    if unit is None or not values or not all(map(math.isfinite, values)):
        return _bad(text, f"'{_short(value)}' is not a number with a unit; {WRITE_A_NUMBER}")
    if match["sign"] == "-":
        values = tuple(-candidate for candidate in values)
    if len(values) > 1:
        return CellReading(
            CellKind.AMBIGUOUS,
            unit_text=unit,
            text=text,
            numbers=values,
            relation=relation,
            qualifier=qualifier,
            remark=(
                f"'{match['numeral']}' may be {values[0]:.15g} or {values[1]:.15g}, and the column does not "
                "tell which decimal mark it uses; write it without a thousands separator"
            ),
        )
    return CellReading(
        CellKind.NUMBER,
        values[0],
        unit,
        text,
        relation=relation,
        qualifier=qualifier,
        remark=_remark(match["numeral"], values[0], relation, qualifier),
    )


def _remark(numeral: str, number: float, relation: str, qualifier: str) -> str:
    bounds = {"<=": "at most", ">=": "at least", "<": "below", ">": "above", "~": "approximately"}
    remarks = []
    if " " in numeral:
        remarks.append(f"'{numeral}' read as {number:.15g}, the space as a thousands separator")
    if relation:
        remarks.append(f"the cell says {bounds[relation]} {number:.15g}")
    if qualifier:
        remarks.append(f"'{qualifier}' stands beside the value")
    return "; ".join(remarks)


def _range(text: str, value: str, decimal_comma: bool | None) -> CellReading | None:
    match = _RANGE.fullmatch(value)
    if match is None:
        return None
    low = _single(text, match["low"] + match["unit"], "", decimal_comma)
    high = _single(text, match["high"], "", decimal_comma)
    if low.kind is not CellKind.NUMBER or high.kind is not CellKind.NUMBER:
        return None
    if low.number > high.number:
        return _listed(text, (low, high), "-")
    unit = high.unit_text or low.unit_text
    return CellReading(
        CellKind.RANGE,
        unit_text=unit,
        text=text,
        numbers=(low.number, high.number),
        parts=(low, high),
        qualifier=high.qualifier,
        remark=f"a range from {low.number:.15g} to {high.number:.15g}, not one value",
    )


def _pair(text: str, value: str, decimal_comma: bool | None) -> CellReading | None:
    match = _PAIR.fullmatch(value)
    if match is None:
        return None
    first = _single(text, match["first"], "", decimal_comma)
    second = _single(text, match["second"], "", decimal_comma)
    if first.kind is not CellKind.NUMBER or second.kind is not CellKind.NUMBER:
        return None
    return _listed(text, (first, second), ":")


def _several(text: str, written: str, pieces: list[str], decimal_comma: bool | None) -> CellReading:
    parts = []
    for piece in pieces:
        relation, value = _relation(piece.strip())
        parts.append(_single(piece.strip(), value, relation, decimal_comma))
    if any(part.kind is not CellKind.NUMBER for part in parts):
        return _bad(text, f"'{_short(written)}' holds more than one value, not all of them numbers; {WRITE_A_NUMBER}")
    separator = next((mark for mark in "\n/;|&," if mark in written), "/")
    return _listed(text, tuple(parts), separator)


def _listed(text: str, parts: tuple[CellReading, ...], separator: str) -> CellReading:
    between = "on lines of their own" if separator == "\n" else f"parted by '{separator}'"
    return CellReading(
        CellKind.SEVERAL,
        unit_text=next((part.unit_text for part in reversed(parts) if part.unit_text), ""),
        text=text,
        numbers=tuple(part.number for part in parts),
        parts=parts,
        remark=f"{len(parts)} values {between}, not one",
    )


def _short(text: str) -> str:
    text = text.replace("\n", " ")
    return text if len(text) <= 40 else text[:37] + "..."
