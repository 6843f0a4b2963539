"""One spelling for characters that look alike: spaces, minus signs, quotes, digits."""

from __future__ import annotations

import re

SPACES = "\u00a0\u1680\u2000\u2001\u2002\u2003\u2004\u2005\u2006\u2007\u2008\u2009\u200a\u202f\u205f\u3000\t\v\f\r"
NOTHING = "\u200b\u200c\u200d\u200e\u200f\u2060\ufeff\u00ad"
MINUS_SIGNS = "\u2212\u2010\u2011\u2012\u2013\u2014\u2015\uff0d\ufe63"
APOSTROPHES = "\u2019\u2018\u02bc\u00b4\u0060\uff07"
TIMES_SIGNS = "\u00d7\u2715\u2716\u2a2f\uff0a"

_SAME: dict[int, str] = (
    dict.fromkeys(map(ord, SPACES), " ")
    | dict.fromkeys(map(ord, NOTHING), "")
    | dict.fromkeys(map(ord, MINUS_SIGNS), "-")
    | dict.fromkeys(map(ord, APOSTROPHES), "'")
    | dict.fromkeys(map(ord, TIMES_SIGNS), "x")
    | {ord("\u2264"): "<=", ord("\u2265"): ">=", ord("\u2248"): "~", ord("\u223c"): "~"}
    | {ord("\u2026"): "...", ord("\u00bd"): " 1/2", ord("\u00bc"): " 1/4", ord("\u00be"): " 3/4"}
    | {
        ord("\u2044"): "/",
        ord("\uff05"): "%",
        ord("\uff0c"): ",",
        ord("\uff0e"): ".",
        ord("\u0394"): "\u0394",
    }
    | {0xFF10 + digit: str(digit) for digit in range(10)}
)
_ESCAPED_RETURN = "_x000D_"
_MANY_SPACES = re.compile(" {2,}")


def plain(text: str) -> str:
    """Text with one kind of space, minus, apostrophe and digit, trimmed; line breaks stay.

    >>> plain("  1\\u202f250,5\\u00a0A ")
    '1 250,5 A'
    """
    if not text.isascii():
        text = text.translate(_SAME)
    elif "\t" in text or "\r" in text:
        text = text.replace("\r\n", "\n").replace("\t", " ").replace("\r", " ")
    if _ESCAPED_RETURN in text:
        text = text.replace(_ESCAPED_RETURN, "")
    return _MANY_SPACES.sub(" ", text).strip()
