"""Words that stand in a cell instead of a value, as the trade writes them."""

from __future__ import annotations

import re

from audit.intake.celltext.reading import CellKind

_OFF = "off, disabled, disable, dis, disa, dsbl, inactive, not active, not enabled, defeated, never, infinity"
_NOT_USED = "n/a, na, not applicable, not used, not in use, n/u, unused, not fitted, n/f, none, nil, not provided"
_MISSING = "unknown, not known, not available, no data, blank, missing, illegible, not legible, unreadable"
_TO_BE_CONFIRMED = (
    "tbc, tba, tbd, to be confirmed, to be advised, to be determined, to be defined, to be decided, "
    "to follow, later, hold, pending, on hold, by vendor, by others, by supplier, ?, ??, ???, *, **"
)
_INSTANTANEOUS = "inst, instantaneous, instant, no delay, no intentional delay, undelayed"
_ERRORS = "#ref!, #n/a, #value!, #div/0!, #name?, #num!, #null!, #spill!, #calc!, #getting_data"
_YES = (
    "y, yes, true, t, 1, on, enabled, enable, enbl, ena, active, activated, x, ✓, ✔, ☑, √, in, in service, "
    "in use, used, fitted"
)
_NO = (
    "n, no, false, f, 0, off, disabled, disable, dis, disa, dsbl, inactive, not active, not enabled, out, "
    "out of service, not in service, not fitted, ✗, ✘, ☐"
)


def _listed(words: str) -> frozenset[str]:
    return frozenset(word.strip() for word in words.split(","))


YES = _listed(_YES)
NO = _listed(_NO)
SAYS_ON = YES - {"1", "x", "t", "y", "in"}
INSTEAD_OF_A_VALUE: dict[str, CellKind] = (
    dict.fromkeys(_listed(_OFF) | {"∞"}, CellKind.OFF)
    | dict.fromkeys(_listed(_NOT_USED), CellKind.NOT_USED)
    | dict.fromkeys(_listed(_MISSING), CellKind.MISSING)
    | dict.fromkeys(_listed(_TO_BE_CONFIRMED), CellKind.TO_BE_CONFIRMED)
    | dict.fromkeys(_listed(_INSTANTANEOUS), CellKind.INSTANTANEOUS)
    | dict.fromkeys(_listed(_ERRORS), CellKind.ERROR)
)
_DASHES = re.compile(r"[-_./ ]*-[-_./ ]*")
_OVERFLOW = re.compile(r"#{2,}")
_NOTE = re.compile(r"(?:see|refer(?: to)?|ref\.?|as per|per)\b.*|(?:foot)?note\b.*", re.IGNORECASE)


def folded(text: str) -> str:
    """Word as it is looked up: lower case, no dots at letters, no brackets around it.

    >>> folded("N.A."), folded("(Disabled)")
    ('na', 'disabled')
    """
    word = text.casefold().replace("\n", " ").strip(" ()[]\"'!:;")
    return word.replace(".", "") if any(letter.isalpha() for letter in word) else word


def kind_of_word(text: str) -> CellKind | None:
    """Kind of a word that stands instead of a value; None for anything else.

    >>> kind_of_word("---"), kind_of_word("T.B.C."), kind_of_word("40")
    (<CellKind.NOT_USED: 'not_used'>, <CellKind.TO_BE_CONFIRMED: 'to_be_confirmed'>, None)
    """
    kind = INSTEAD_OF_A_VALUE.get(text.casefold()) or INSTEAD_OF_A_VALUE.get(folded(text))
    if kind is not None:
        return kind
    if _DASHES.fullmatch(text):
        return CellKind.NOT_USED
    if _OVERFLOW.fullmatch(text):
        return CellKind.ERROR
    return None


def refers_to_a_note(text: str) -> bool:
    """Tell whether a cell sends its reader elsewhere, as 'see note 3' does."""
    return _NOTE.fullmatch(text) is not None
