"""Numerals with either decimal mark and either thousands separator.

'1,234' means 1.234 in one country and 1234 in another; it is never guessed. The other numerals of a
column often tell: '3,3' and '1.250,5' are written with a decimal comma, '0.86' and '1,250.5' with a point.
"""

from __future__ import annotations

import re
from collections.abc import Iterable

NUMERAL = r"(?:\d{1,3}(?:[ ']\d{3})+(?!\d)(?:[.,]\d+)?|\d+(?:[.,]\d+)*|[.,]\d+)(?:[eE][-+]?\d{1,3}(?![\d.,]))?"
"""Pattern of an unsigned numeral; what it means `numeral_values` says."""

_NUMERAL = re.compile(NUMERAL)
_POINT_GROUPS = re.compile(r"\d{1,3}(?:\.\d{3})+")
_COMMA_GROUPS = re.compile(r"\d{1,3}(?:,\d{3})+")


def numeral_values(numeral: str, decimal_comma: bool | None = None) -> tuple[float, ...]:
    """Possible values of an unsigned numeral: one, two where the decimal mark is open, none if it is none.

    >>> numeral_values("1 250,5"), numeral_values("1,250.5"), numeral_values("1.2.3")
    ((1250.5,), (1250.5,), ())
    >>> numeral_values("1,234"), numeral_values("1,234", decimal_comma=True)
    ((1.234, 1234.0), (1.234,))
    """
    body, mark, exponent = numeral.replace("E", "e").partition("e")
    exponent = mark + exponent
    if " " in body or "'" in body:
        body = body.replace(" ", "").replace("'", "").replace(",", ".")
        return (float(body + exponent),)
    points, commas = body.count("."), body.count(",")
    if points and commas:
        decimal, groups = (".", _COMMA_GROUPS) if body.rfind(".") > body.rfind(",") else (",", _POINT_GROUPS)
        whole, _, fraction = body.rpartition(decimal)
        if not groups.fullmatch(whole):
            return ()
        return (float(whole.replace(",", "").replace(".", "") + "." + fraction + exponent),)
    if points + commas > 1:
        groups = _POINT_GROUPS if points else _COMMA_GROUPS
        if not groups.fullmatch(body):
            return ()
        return (float(body.replace(",", "").replace(".", "") + exponent),)
    as_decimal = float(body.replace(",", ".") + exponent)
    if not points + commas or exponent or not _could_be_thousands(body):
        return (as_decimal,)
    as_thousands = float(body.replace(",", "").replace(".", ""))
    if decimal_comma is None:
        return (as_decimal, as_thousands)
    return (as_decimal,) if decimal_comma == bool(commas) else (as_thousands,)


def _could_be_thousands(body: str) -> bool:
    whole, _, fraction = body.replace(",", ".").partition(".")
    return len(fraction) == 3 and 1 <= len(whole) <= 3 and whole[0] != "0"


def find_decimal_comma(texts: Iterable[str]) -> bool | None:
    """Decimal mark that the numerals of several texts agree on; None if they are silent or contradict.

    >>> find_decimal_comma(["3,3 kV", "1,234"]), find_decimal_comma(["0.86", "1,250.5"])
    (True, False)
    >>> find_decimal_comma(["1,234"]) is None, find_decimal_comma(["3,3", "0.86"]) is None
    (True, True)
    """
    comma = point = False
    for text in texts:
        if "," not in text and "." not in text:
            continue
        for numeral in _NUMERAL.findall(text):
            says = _says_decimal_comma(numeral)
            comma = comma or says is True
            point = point or says is False
            if comma and point:
                return None
    return True if comma else False if point else None


def _says_decimal_comma(numeral: str) -> bool | None:
    body = numeral.replace("E", "e").partition("e")[0]
    points, commas = body.count("."), body.count(",")
    if not points + commas or not numeral_values(numeral):
        return None
    if points and commas:
        return body.rfind(",") > body.rfind(".")
    if points + commas > 1:
        return points > 1
    if " " not in body and "'" not in body and _could_be_thousands(body):
        return None
    return commas == 1
