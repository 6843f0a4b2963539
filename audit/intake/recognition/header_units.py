"""Units that stand in a header: in brackets, after a comma or a stroke, as its last words, or as the header itself."""

from __future__ import annotations

import re
from collections.abc import Iterator
from functools import lru_cache

from audit.intake.celltext.characters import plain
from audit.intake.recognition.folding import without_note
from audit.vocabulary.quantities import Quantity
from audit.vocabulary.spellings import UnitReading, read_unit, read_units

_BRACKETS = re.compile(r"(?P<before>.*\S)\s*[(\[{](?P<inside>[^()\[\]{}]+)[)\]}]\s*\.?", re.DOTALL)
_TWO_BRACKETS = re.compile(
    r"(?P<before>.*\S)\s*[(\[](?P<inside>[^()\[\]]+)[(\[](?P<second>[^()\[\]]+)[)\]]\s*[)\]]?", re.DOTALL
)
_LEADING = re.compile(r"(?P<unit>%|pct|percent)\s+(?P<rest>\S.*)", re.IGNORECASE | re.DOTALL)
_SURE_WORDS = frozenset(
    [
        "kw",
        "hp",
        "horsepower",
        "bhp",
        "mw",
        "kv",
        "volts",
        "vac",
        "amps",
        "ka",
        "kaic",
        "rpm",
        "r/min",
        "hz",
        "awg",
        "kcmil",
        "mcm",
        "mm2",
        "%",
        "pct",
        "kva",
        "mva",
        "ohm",
        "ohms",
    ]
)


@lru_cache(maxsize=65536)
def is_unit(text: str) -> bool:
    """Tell whether a text is a unit, a multiple or a per cent of something.

    >>> is_unit("kW"), is_unit("x FLA"), is_unit("Pump")
    (True, True, False)
    """
    return 0 < len(text) <= 24 and bool(read_units(text))


def split_units(header: str) -> Iterator[tuple[str, str]]:
    """Give the ways to part a header into words and unit, best first; the first is the whole header.

    >>> list(split_units("FLA (A)"))[1]
    ('FLA', 'A')
    """
    text = without_note(plain(header))
    yield text, ""
    match = _BRACKETS.fullmatch(text)
    if match:
        if is_unit(match["inside"].strip()):
            yield match["before"], match["inside"].strip()
        else:
            for mark in "/,":
                first = match["inside"].partition(mark)[0].strip()
                if first != match["inside"].strip() and is_unit(first):
                    yield match["before"], first
    match = _TWO_BRACKETS.fullmatch(text)
    if match and is_unit(match["inside"].strip()) and is_unit(match["second"].strip()):
        yield match["before"], match["inside"].strip()
    for mark in (",", "/", " in ", "\n"):
        before, found, after = text.rpartition(mark)
        if found and before.strip() and is_unit(after.strip()):
            yield before.strip(" ,"), after.strip()
    match = _LEADING.fullmatch(text)
    if match:
        yield match["rest"], match["unit"]
    words = text.replace("\n", " ").replace("_", " ").split(" ")
    for count in (3, 2, 1):
        if len(words) > count:
            tail = " ".join(words[-count:]).strip("()[]")
            if is_unit(tail):
                yield " ".join(words[:-count]).rstrip(" ,-("), tail


def unit_in_words(header: str, quantity: Quantity) -> UnitReading | None:
    """Give the unit that the words of a header themselves name: 'HP', 'Bus kV', 'Full Load Amps', 'Min V'."""
    text = without_note(plain(header)).replace("_", " ").replace("\n", " ")
    words = text.casefold().replace("(", " ").replace(")", " ").replace(".", " ").split()
    if not words:
        return None
    whole = read_unit(text, quantity)
    if whole is not None and not whole.base:
        return whole
    for word in words:
        if word in _SURE_WORDS:
            reading = read_unit(word, quantity)
            if reading is not None and not reading.base:
                return reading
    if len(words) > 1 and len(words[-1]) <= 3:
        last = read_unit(words[-1], quantity)
        if last is not None and not last.base and last.unit not in ("cycles",):
            return last
    return None
