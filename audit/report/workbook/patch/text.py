"""Text as a workbook stores it: escapes, our own section of a note, text that must not become a formula."""

from __future__ import annotations

import re

NOTE_BEGINS = "— Settings audit —"
NOTE_ENDS = "— end of audit note —"
LONGEST_NOTE = 32_000  # Excel keeps 32,767 characters of a note

_OURS = re.compile(rf"\n{{0,2}}{NOTE_BEGINS}\r?\n.*?(?:{NOTE_ENDS}|\Z)", re.DOTALL)
_LITERAL_ESCAPE = re.compile(r"_(?=x[0-9A-Fa-f]{4}_)")
_FORBIDDEN_IN_XML = re.compile("[\x00-\x08\x0b\x0c\x0e-\x1f\ud800-\udfff\ufffe\uffff]")
_FORMULA_STARTS = ("=", "+", "-", "@", "\t")


def escape_text(text: str) -> str:
    """Text in the form of ST_Xstring (ISO/IEC 29500-1, 22.9.2.19), so that reading gives it back unchanged.

    >>> escape_text("bell \\x07, and _x0041_ as typed")
    'bell _x0007_, and _x005F_x0041_ as typed'
    """
    return _FORBIDDEN_IN_XML.sub(lambda found: f"_x{ord(found[0]):04X}_", escape_literals(text))


def escape_literals(text: str) -> str:
    """Text whose `_xHHHH_` is meant as it stands, so that no program reads it as a character."""
    return _LITERAL_ESCAPE.sub("_x005F_", text)


def storable_text(text: str) -> str:
    """Text that openpyxl accepts in a cell: control characters become their visible pictures.

    >>> storable_text("bell \\x07")
    'bell ␇'
    """
    return _FORBIDDEN_IN_XML.sub(lambda found: chr(0x2400 + ord(found[0])) if found[0] < " " else "\ufffd", text)


def could_become_formula(text: str) -> bool:
    """Whether a spreadsheet would take the text for a formula when someone types it or edits its cell.

    >>> could_become_formula("=1+1"), could_become_formula("P-104")
    (True, False)
    """
    return text.startswith(_FORMULA_STARTS)


def our_note(text: str) -> str:
    """The section of a note that is ours, between the two lines that mark it off."""
    text = text.replace("\r\n", "\n").replace("\r", "\n").replace(NOTE_ENDS, "").replace(NOTE_BEGINS, "")
    if len(text) > LONGEST_NOTE:
        text = text[:LONGEST_NOTE] + "…"
    return f"{NOTE_BEGINS}\n{text}\n{NOTE_ENDS}"


def spans_of_our_note(text: str) -> list[tuple[int, int]]:
    """Where our sections stand in a note's text."""
    return [found.span() for found in _OURS.finditer(text)]


def strip_our_note(text: str) -> str:
    r"""The text of a note as its owner wrote it, without any section of ours.

    >>> strip_our_note("Tested 2021.\n\n" + our_note("pickup too low"))
    'Tested 2021.'
    >>> strip_our_note("Tested 2021.")
    'Tested 2021.'
    """
    return _OURS.sub("", text)
